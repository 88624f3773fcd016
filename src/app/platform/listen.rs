//! Listening to an event until the listener is dropped.

use wasm_bindgen::JsCast;
use wasm_bindgen::closure::Closure;
use web_sys::{Event, EventTarget};

/// A listener at work.
pub struct Listener {
    target: EventTarget,
    name: &'static str,
    call: Closure<dyn FnMut(Event)>,
}

impl Listener {
    /// Calls for every event of this name at `target`.
    pub fn at(
        target: impl Into<EventTarget>,
        name: &'static str,
        call: impl FnMut(Event) + 'static,
    ) -> Option<Listener> {
        let target = target.into();
        let call = Closure::wrap(Box::new(call) as Box<dyn FnMut(Event)>);
        target
            .add_event_listener_with_callback(name, call.as_ref().unchecked_ref())
            .ok()?;
        Some(Listener { target, name, call })
    }

    /// As [`Listener::at`], at the window.
    pub fn at_window(name: &'static str, call: impl FnMut(Event) + 'static) -> Option<Listener> {
        Listener::at(web_sys::window()?, name, call)
    }

    /// As [`Listener::at`], at the document.
    pub fn at_document(name: &'static str, call: impl FnMut(Event) + 'static) -> Option<Listener> {
        Listener::at(web_sys::window()?.document()?, name, call)
    }
}

impl Drop for Listener {
    fn drop(&mut self) {
        // A target that is gone has no listeners.
        let _ = self
            .target
            .remove_event_listener_with_callback(self.name, self.call.as_ref().unchecked_ref());
    }
}
