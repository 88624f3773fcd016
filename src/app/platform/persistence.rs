//! Whether the browser promises to keep what is stored.

use js_sys::{Promise, Reflect};
use wasm_bindgen::closure::Closure;
use wasm_bindgen::{JsCast, JsValue};
use web_sys::StorageManager;

/// What the browser says about keeping the data.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Keeping {
    /// Not asked yet, or no answer yet.
    #[default]
    Unknown,
    /// Kept until the person removes it.
    Promised,
    /// May be cleared when the device runs out of space, or after weeks without use.
    BestEffort,
}

impl Keeping {
    /// In words.
    pub fn words(self) -> &'static str {
        match self {
            Keeping::Unknown => {
                "This browser does not say how long it keeps data. Save a file from time to time."
            }
            Keeping::Promised => {
                "The browser keeps the data until you remove it. A file elsewhere is still wise: phones fall into sumps."
            }
            Keeping::BestEffort => {
                "The browser may clear the data when the device runs out of space or the app is not used for weeks. Save a \
                 file from time to time."
            }
        }
    }
}

/// The manager, where there is one: old browsers and insecure addresses have none.
fn manager() -> Option<StorageManager> {
    let navigator = web_sys::window()?.navigator();
    let value = Reflect::get(navigator.as_ref(), &JsValue::from_str("storage")).ok()?;
    (!value.is_undefined() && !value.is_null()).then(|| value.unchecked_into())
}

fn answer(promise: &Promise, done: impl FnOnce(Keeping) + 'static) {
    let told = Closure::once(move |value: JsValue| {
        done(match value.as_bool() {
            Some(true) => Keeping::Promised,
            Some(false) => Keeping::BestEffort,
            None => Keeping::Unknown,
        });
    });
    let refused = Closure::once(|_: JsValue| {});
    let _ = promise.then2(&told, &refused);
    // The promise calls one of them, once, at a time of its own.
    told.forget();
    refused.forget();
}

/// Asks how the data is kept now. No answer where the browser does not say.
pub fn look(done: impl FnOnce(Keeping) + 'static) {
    if let Some(promise) = manager().and_then(|manager| manager.persisted().ok()) {
        answer(&promise, done);
    }
}

/// Asks the browser to keep the data. Some ask the person, others decide by themselves.
pub fn ask(done: impl FnOnce(Keeping) + 'static) {
    if let Some(promise) = manager().and_then(|manager| manager.persist().ok()) {
        answer(&promise, done);
    }
}
