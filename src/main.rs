//! Starts the app: in the browser the whole of it, in a worker only the part that calculates.

#[cfg(target_arch = "wasm32")]
fn main() {
    lowside::app::start();
}

#[cfg(not(target_arch = "wasm32"))]
fn main() {
    println!(
        "Lowside runs in a browser: `bash .ci/serve` builds it and serves it on this machine."
    );
}
