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
mod front;
pub mod hands;
pub mod keypad;
mod later;
pub mod neutral;
pub mod parts;
pub mod persist;
pub mod platform;
mod room;
mod rooms;
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
        yew::platform::spawn_local(async {
            match later::engine().await {
                Ok(answer) => answer(),
                // The page hears of it and calculates by itself.
                Err(_) => fail("The engine could not be fetched."),
            }
        });
        return;
    };
    let root = window
        .document()
        .and_then(|document| document.get_element_by_id("app"));
    match root {
        Some(root) => {
            yew::set_custom_panic_hook(Box::new(|info| fail(&info.to_string())));
            if front::is_first_visit(&window) {
                front::show(root);
            } else {
                front::straight_in(root);
            }
        }
        None => fail("The page has no place for the app."),
    }
}

/// Shows the failure screen, which works without any of this; in a worker, ends it with this error.
fn fail(message: &str) {
    web_sys::console::error_1(&JsValue::from_str(message));
    call_script("lowsideFailed", message);
}

/// Calls a function of the start-up scripts, where there is one.
fn call_script(name: &str, word: &str) {
    let found = js_sys::Reflect::get(&js_sys::global(), &JsValue::from_str(name))
        .ok()
        .and_then(|found| found.dyn_into::<js_sys::Function>().ok());
    if let Some(function) = found
        && let Err(error) = function.call1(&JsValue::NULL, &JsValue::from_str(word))
    {
        web_sys::console::error_1(&error);
    }
}
