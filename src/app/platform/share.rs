//! Handing words over to the person: the share sheet of the phone, the clipboard, the printer.

use js_sys::{Function, Object, Promise, Reflect};
use wasm_bindgen::closure::Closure;
use wasm_bindgen::{JsCast, JsValue};

/// True where the device has a share sheet.
pub fn can_share() -> bool {
    function_of(&navigator(), "share").is_some()
}

/// Opens the share sheet with a text. `done` hears whether it was handed on; a person who closes the sheet is no failure.
pub fn share(title: &str, text: &str, done: impl FnOnce(bool) + 'static) {
    let navigator = navigator();
    let data = Object::new();
    let is_set = [("title", title), ("text", text)]
        .into_iter()
        .all(|(name, value)| Reflect::set(&data, &name.into(), &value.into()).is_ok());
    let promise = function_of(&navigator, "share")
        .filter(|_| is_set)
        .and_then(|share| share.call1(&navigator, &data).ok());
    settle(promise, done);
}

/// Copies a text. `done` hears whether it is on the clipboard.
pub fn copy(text: &str, done: impl FnOnce(bool) + 'static) {
    let clipboard = Reflect::get(&navigator(), &"clipboard".into()).unwrap_or(JsValue::UNDEFINED);
    let promise = function_of(&clipboard, "writeText")
        .and_then(|write| write.call1(&clipboard, &text.into()).ok());
    settle(promise, done);
}

/// Opens the browser's print dialogue.
pub fn print() {
    if let Some(window) = web_sys::window()
        && let Some(print) = function_of(&window, "print")
        && let Err(error) = print.call0(&window)
    {
        web_sys::console::warn_1(&error);
    }
}

/// The address of the app, up to `#`.
pub fn address() -> String {
    let href = web_sys::window().and_then(|window| window.location().href().ok());
    let href = href.unwrap_or_default();
    let end = href.find('#').unwrap_or(href.len());
    href.get(..end).unwrap_or_default().to_owned()
}

fn navigator() -> JsValue {
    web_sys::window().map_or(JsValue::UNDEFINED, |window| window.navigator().into())
}

fn function_of(object: &JsValue, name: &str) -> Option<Function> {
    if !object.is_object() {
        return None;
    }
    Reflect::get(object, &name.into()).ok()?.dyn_into().ok()
}

/// Hears how a promise ends; none is one that failed.
fn settle(promise: Option<JsValue>, done: impl FnOnce(bool) + 'static) {
    let Some(promise) = promise.and_then(|promise| promise.dyn_into::<Promise>().ok()) else {
        return done(false);
    };
    let done = std::rc::Rc::new(std::cell::RefCell::new(Some(done)));
    let hear = |is_good: bool| {
        let done = done.clone();
        Closure::once(move |_: JsValue| {
            if let Some(done) = done.borrow_mut().take() {
                done(is_good);
            }
        })
    };
    let (good, bad) = (hear(true), hear(false));
    let _ = promise.then2(&good, &bad);
    // The promise calls one of them, once, at a time of its own.
    good.forget();
    bad.forget();
}
