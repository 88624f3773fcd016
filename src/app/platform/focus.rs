//! Where the keyboard stands.

use wasm_bindgen::JsCast;
use web_sys::HtmlElement;

/// Puts the focus on the element with this id, and scrolls to the top of the page with it.
pub fn heading(id: &str) {
    let Some(window) = web_sys::window() else {
        return;
    };
    window.scroll_to_with_x_and_y(0.0, 0.0);
    to(id);
}

/// Puts the focus on the element with this id, if it is there.
pub fn to(id: &str) {
    let element = web_sys::window()
        .and_then(|window| window.document())
        .and_then(|document| document.get_element_by_id(id))
        .and_then(|element| element.dyn_into::<HtmlElement>().ok());
    if let Some(element) = element {
        // A focus that cannot be set leaves the page as usable as before.
        let _ = element.focus();
    }
}

/// As [`to`], with the head of the element in view: a tall one would else be shown somewhere in its middle.
pub fn to_head(id: &str) {
    to(id);
    let element = web_sys::window()
        .and_then(|window| window.document())
        .and_then(|document| document.get_element_by_id(id));
    if let Some(element) = element {
        element.scroll_into_view();
    }
}
