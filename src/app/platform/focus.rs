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

/// DOM ids of what has the keyboard and of all that it lies in.
pub fn within() -> Vec<String> {
    let active = web_sys::window()
        .and_then(|window| window.document())
        .and_then(|document| document.active_element());
    std::iter::successors(active, |element| element.parent_element())
        .map(|element| element.id())
        .filter(|id| !id.is_empty())
        .collect()
}

/// What has the keyboard.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Named {
    /// DOM id, or where there is none the test id.
    pub id: String,
    /// What it is called.
    pub name: String,
    /// True where letters go into it.
    pub is_typing: bool,
}

/// Longest name that is told, in characters.
const LONGEST: usize = 40;

/// What has the keyboard now; none where nothing has, as after a touch in some browsers.
pub fn named() -> Option<Named> {
    let document = web_sys::window()?.document()?;
    let element = document.active_element()?;
    let tag = element.tag_name().to_ascii_lowercase();
    if tag == "body" {
        return None;
    }
    let id = Some(element.id()).filter(|id| !id.is_empty());
    let id = id
        .or_else(|| element.get_attribute("data-testid"))
        .unwrap_or_default();
    let label = || {
        let label = document
            .query_selector(&format!("label[for=\"{id}\"]"))
            .ok()
            .flatten();
        label.or_else(|| element.closest("label").ok().flatten())
    };
    let name = element
        .get_attribute("aria-label")
        .or_else(|| label().and_then(|label| label.text_content()))
        .or_else(|| element.text_content())
        .unwrap_or_default();
    let kind = element.get_attribute("type").unwrap_or_default();
    let is_typing = tag == "textarea"
        || tag == "input" && !matches!(kind.as_str(), "checkbox" | "radio" | "button" | "file");
    let name: Vec<&str> = name.split_whitespace().collect();
    Some(Named {
        is_typing: is_typing && !id.is_empty(),
        id,
        name: shortened(&name.join(" ")),
    })
}

fn shortened(name: &str) -> String {
    if name.chars().count() <= LONGEST {
        return name.to_owned();
    }
    let head: String = name.chars().take(LONGEST - 1).collect();
    format!("{}…", head.trim_end())
}
