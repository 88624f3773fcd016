//! Light, dark, or for the sun: one attribute of the root element; the style sheet does the rest.

use crate::record::Theme;

/// Shows the page in this theme.
pub fn show(theme: Theme) {
    let root = web_sys::window()
        .and_then(|window| window.document())
        .and_then(|document| document.document_element());
    let Some(root) = root else { return };
    // An attribute that cannot be set leaves the page in the theme it has.
    let _ = match theme {
        Theme::System => root.remove_attribute("data-theme"),
        other => root.set_attribute("data-theme", other.code()),
    };
}
