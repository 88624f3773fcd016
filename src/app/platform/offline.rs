//! Whether the app works without a network here, and whether a newer version waits. The start-up script knows; it tells
//! by attributes of the root element and by events.

use js_sys::Reflect;
use wasm_bindgen::JsValue;
use web_sys::{CustomEvent, Event};

/// State of the offline copy.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Offline {
    /// Still being made.
    #[default]
    Making,
    /// Complete: the app opens without a network.
    Ready,
    /// Could not be made.
    Failed,
    /// This browser keeps none here.
    Unsupported,
}

impl Offline {
    /// In words.
    pub fn words(self) -> &'static str {
        match self {
            Offline::Making => "The copy for use without a network is being made.",
            Offline::Ready => "Ready offline: the app opens without a network.",
            Offline::Failed => {
                "Not ready offline. It is tried again at the next start with a network."
            }
            Offline::Unsupported => {
                "This browser keeps no offline copy here: a private window, or an address without https."
            }
        }
    }
}

fn attribute(name: &str) -> Option<String> {
    web_sys::window()?
        .document()?
        .document_element()?
        .get_attribute(name)
}

/// The state as it stands.
pub fn state() -> Offline {
    match attribute("data-offline").as_deref() {
        Some("ready") => Offline::Ready,
        Some("failed") => Offline::Failed,
        Some("unsupported") => Offline::Unsupported,
        // At a later start the page comes out of the copy before the start-up script has looked.
        _ if is_from_copy() => Offline::Ready,
        _ => Offline::Making,
    }
}

/// True where this very page was served from the offline copy.
fn is_from_copy() -> bool {
    let get = |of: &JsValue, name: &str| {
        Reflect::get(of, &JsValue::from_str(name)).unwrap_or(JsValue::UNDEFINED)
    };
    let is_there = |value: &JsValue| !value.is_undefined() && !value.is_null();
    web_sys::window().is_some_and(|window| {
        let container = get(window.navigator().as_ref(), "serviceWorker");
        is_there(&container) && is_there(&get(&container, "controller"))
    })
}

/// True where a newer version waits to take over.
pub fn update_waits() -> bool {
    attribute("data-update").is_some()
}

/// The version of the app as it was built.
pub fn version() -> String {
    attribute("data-version")
        .filter(|version| !version.starts_with('@'))
        .unwrap_or_else(|| env!("CARGO_PKG_VERSION").to_owned())
}

/// Lets the waiting version take over; the page is loaded anew. Never done unasked.
pub fn apply_update() {
    let sent = CustomEvent::new("lowside-apply-update")
        .ok()
        .zip(web_sys::window())
        .is_some_and(|(event, window)| window.dispatch_event(event.as_ref()).is_ok());
    if !sent {
        web_sys::console::warn_1(&"the update could not be asked for".into());
    }
}

/// Events of the start-up script that change what this module tells.
pub const EVENTS: [&str; 3] = [
    "lowside-offline-ready",
    "lowside-offline-failed",
    "lowside-update-ready",
];

/// True for the event that comes once, when the first offline copy is complete.
pub fn is_first_ready(event: &Event) -> bool {
    event.type_() == "lowside-offline-ready"
}
