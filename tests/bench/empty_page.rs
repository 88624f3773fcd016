//! An empty Yew page: what the transfer size is held against. Built by `.ci/bench`.

#[cfg(target_arch = "wasm32")]
fn main() {
    #[yew::component]
    fn Empty() -> yew::Html {
        yew::html! { <p>{ "empty" }</p> }
    }
    yew::Renderer::<Empty>::new().render();
}

#[cfg(not(target_arch = "wasm32"))]
fn main() {
    println!("built for the browser by .ci/bench");
}
