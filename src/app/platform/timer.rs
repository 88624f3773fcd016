//! A timer that is called off when it is dropped.

use wasm_bindgen::JsCast;
use wasm_bindgen::closure::Closure;

/// A call to come.
pub struct Timer {
    handle: i32,
    _call: Closure<dyn FnMut()>,
}

impl Timer {
    /// Calls once after so many milliseconds. None where there is no window.
    pub fn once(milliseconds: i32, call: impl FnOnce() + 'static) -> Option<Timer> {
        let call = Closure::once(call);
        let handle = web_sys::window()?
            .set_timeout_with_callback_and_timeout_and_arguments_0(
                call.as_ref().unchecked_ref(),
                milliseconds,
            )
            .ok()?;
        Some(Timer {
            handle,
            _call: call,
        })
    }
}

impl Drop for Timer {
    fn drop(&mut self) {
        if let Some(window) = web_sys::window() {
            window.clear_timeout_with_handle(self.handle);
        }
    }
}
