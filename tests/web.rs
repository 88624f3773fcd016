//! What can only be tried in a browser. Runs under `wasm-bindgen-test-runner`; elsewhere this file is empty.
#![cfg(target_arch = "wasm32")]

use wasm_bindgen_test::{wasm_bindgen_test, wasm_bindgen_test_configure};

wasm_bindgen_test_configure!(run_in_browser);

/// Without the element that the page provides there is nothing to mount on; starting must not throw.
#[wasm_bindgen_test]
fn start_without_a_root_leaves_the_page_alone() {
    let document = web_sys::window()
        .and_then(|window| window.document())
        .expect("a page");
    let before = document.body().expect("a body").inner_html();
    lowside::app::start();
    assert_eq!(document.body().expect("a body").inner_html(), before);
}
