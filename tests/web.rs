//! What can only be tried in a browser. Runs under `wasm-bindgen-test-runner`; elsewhere this file is empty.
#![cfg(target_arch = "wasm32")]

use std::cell::RefCell;
use std::rc::Rc;

use wasm_bindgen::JsValue;
use wasm_bindgen::closure::Closure;
use wasm_bindgen_test::{wasm_bindgen_test, wasm_bindgen_test_configure};

wasm_bindgen_test_configure!(run_in_browser);

/// Without the place that the page provides for it, the app says so on the failure screen instead of ending in silence.
#[wasm_bindgen_test]
fn start_without_a_root_is_told_to_the_failure_screen() {
    let told = Rc::new(RefCell::new(Vec::new()));
    let failed = Closure::<dyn FnMut(String)>::new({
        let told = told.clone();
        move |message| told.borrow_mut().push(message)
    });
    let window = JsValue::from(js_sys::global());
    js_sys::Reflect::set(&window, &"lowsideFailed".into(), failed.as_ref()).expect("settable");
    lowside::app::start();
    assert_eq!(told.borrow().len(), 1, "{:?}", told.borrow());
}
