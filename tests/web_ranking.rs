//! Wasm gives the ranking that native code gives: same order, probabilities within 1e-6.
#![cfg(target_arch = "wasm32")]

mod support;

use wasm_bindgen_test::{wasm_bindgen_test, wasm_bindgen_test_configure};

wasm_bindgen_test_configure!(run_in_browser);

#[wasm_bindgen_test]
fn ranking_is_the_same_as_native() {
    support::reference::compare(include_str!("fixtures/ranking_reference.json"));
}
