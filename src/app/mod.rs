//! The app above the pure core: state, screens, the engine in its worker, and what the browser gives.
//!
//! [`state`] holds everything and is changed by [`state::Action`]s alone; a screen asks for a [`deed::Deed`]; [`hands`] does
//! it. [`persist`] writes the state to the shelf, [`engine`] calculates in a worker.

mod app_screen;
pub mod bench;
pub mod call;
pub mod deed;
pub mod engine;
mod exchange;
pub mod hands;
pub mod keypad;
pub mod neutral;
pub mod parts;
pub mod persist;
pub mod platform;
pub mod route;
pub mod screens;
mod shell;
pub mod state;
pub mod tracking;
pub mod undo;
pub mod yard;

use wasm_bindgen::{JsCast, JsValue};

/// Starts the app on the page. In a worker, where there is no page, starts answering calculations.
pub fn start() {
    let Some(window) = web_sys::window() else {
        engine::worker::install();
        return;
    };
    let root = window
        .document()
        .and_then(|document| document.get_element_by_id("app"));
    match root {
        Some(root) => {
            yew::set_custom_panic_hook(Box::new(|info| fail(&info.to_string())));
            yew::Renderer::<app_screen::App>::with_root(root).render();
        }
        None => fail("The page has no place for the app."),
    }
}

/// Shows the failure screen, which works without any of this.
fn fail(message: &str) {
    web_sys::console::error_1(&JsValue::from_str(message));
    let shown = js_sys::Reflect::get(&js_sys::global(), &JsValue::from_str("lowsideFailed"))
        .ok()
        .and_then(|shown| shown.dyn_into::<js_sys::Function>().ok());
    if let Some(show) = shown
        && let Err(error) = show.call1(&JsValue::NULL, &JsValue::from_str(message))
    {
        web_sys::console::error_1(&error);
    }
}
