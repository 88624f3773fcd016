//! The field that the keys work on, and what stands beside it on the page.

use crate::quantity::strokes::{Stroke, press};
use wasm_bindgen::JsCast;
use web_sys::{Element, Event, EventInit, HtmlElement, HtmlInputElement, HtmlSelectElement};

/// Every field of a figure.
const FIELDS: &str = "input[data-figure]";

/// A field of a figure, for a target of an event.
pub fn figure(element: &Element) -> Option<HtmlInputElement> {
    let is_figure = element.has_attribute("data-figure");
    element
        .dyn_ref::<HtmlInputElement>()
        .filter(|_| is_figure)
        .cloned()
}

/// The field of a figure that has the keyboard now.
pub fn focused() -> Option<HtmlInputElement> {
    let document = web_sys::window()?.document()?;
    figure(&document.active_element()?)
}

/// True where a minus makes sense.
pub fn is_signed(field: &HtmlInputElement) -> bool {
    field.has_attribute("data-signed")
}

/// What the field is called.
pub fn name(field: &HtmlInputElement) -> String {
    field.get_attribute("aria-label").unwrap_or_default()
}

/// Presses a key on the field, at its caret.
pub fn strike(field: &HtmlInputElement, stroke: Stroke) {
    let text = field.value();
    let units: Vec<u16> = text.encode_utf16().collect();
    // The page counts in UTF-16, the core in letters.
    let letters = |units_before: u32| {
        let units_before = usize::try_from(units_before)
            .unwrap_or(usize::MAX)
            .min(units.len());
        let head = units.get(..units_before).unwrap_or_default();
        String::from_utf16_lossy(head).chars().count()
    };
    let end = u32::try_from(units.len()).unwrap_or(u32::MAX);
    let place = |place: Result<Option<u32>, _>| place.ok().flatten().unwrap_or(end);
    let (from, to) = (place(field.selection_start()), place(field.selection_end()));
    let (after, caret) = press(&text, letters(from), letters(to), stroke);
    field.set_value(&after);
    let caret = after
        .chars()
        .take(caret)
        .map(char::len_utf16)
        .sum::<usize>();
    let caret = u32::try_from(caret).unwrap_or(u32::MAX);
    tell(field, "input");
    // A field that takes no caret keeps its text all the same.
    let _ = field.set_selection_range(caret, caret);
}

/// An event as the browser itself would send it.
fn tell(target: &Element, name: &str) {
    let how = EventInit::new();
    how.set_bubbles(true);
    if let Ok(event) = Event::new_with_event_init_dict(name, &how) {
        // Whether it was taken is seen on the page.
        let _ = target.dispatch_event(&event);
    }
}

/// The list of units beside the field.
fn units_of(field: &HtmlInputElement) -> Option<HtmlSelectElement> {
    let beside = field.closest(".field-box").ok().flatten()?;
    beside
        .query_selector("select")
        .ok()
        .flatten()?
        .dyn_into()
        .ok()
}

/// Units that the field can be read in: code, symbol, and whether it is the one at hand.
pub fn units(field: &HtmlInputElement) -> Vec<(String, String, bool)> {
    let Some(list) = units_of(field) else {
        return Vec::new();
    };
    let chosen = list.value();
    let options = list.query_selector_all("option").ok();
    let count = options.as_ref().map_or(0, web_sys::NodeList::length);
    (0..count)
        .filter_map(|place| options.as_ref()?.get(place)?.dyn_into::<Element>().ok())
        .map(|option| {
            let code = option.get_attribute("value").unwrap_or_default();
            let is_chosen = code == chosen;
            (code, option.text_content().unwrap_or_default(), is_chosen)
        })
        .collect()
}

/// Takes another unit.
pub fn take_unit(field: &HtmlInputElement, code: &str) {
    if let Some(list) = units_of(field) {
        list.set_value(code);
        tell(&list, "change");
    }
}

/// The one-touch answers of the reading that the field belongs to: code, words, and whether it is the one given.
pub fn answers(field: &HtmlInputElement) -> Vec<(String, String, bool)> {
    buttons(field)
        .into_iter()
        .filter_map(|button| {
            let code = button.get_attribute("data-answer")?;
            let is_given = button.get_attribute("aria-pressed").as_deref() == Some("true");
            Some((code, button.text_content().unwrap_or_default(), is_given))
        })
        .collect()
}

fn buttons(field: &HtmlInputElement) -> Vec<HtmlElement> {
    let around = field.closest(".entry").ok().flatten();
    let found = around.and_then(|around| around.query_selector_all("[data-answer]").ok());
    let count = found.as_ref().map_or(0, web_sys::NodeList::length);
    (0..count)
        .filter_map(|place| found.as_ref()?.get(place)?.dyn_into().ok())
        .collect()
}

/// Gives one of them.
pub fn answer(field: &HtmlInputElement, code: &str) {
    let button = buttons(field)
        .into_iter()
        .find(|button| button.get_attribute("data-answer").as_deref() == Some(code));
    if let Some(button) = button {
        button.click();
    }
}

/// The next field of a figure down the page that is shown.
pub fn next(field: &HtmlInputElement) -> Option<HtmlInputElement> {
    let all = field.owner_document()?.query_selector_all(FIELDS).ok()?;
    let fields =
        (0..all.length()).filter_map(|place| all.get(place)?.dyn_into::<HtmlInputElement>().ok());
    fields
        .skip_while(|other| !field.is_same_node(Some(other)))
        .skip(1)
        // What is folded away has no place on the page.
        .find(|other| other.offset_parent().is_some())
}

/// Keeps the field in sight above the keys.
pub fn bring_up(field: &HtmlInputElement, covered_px: f64) {
    let height = web_sys::window()
        .and_then(|window| window.inner_height().ok())
        .and_then(|height| height.as_f64());
    let bottom = field.get_bounding_client_rect().bottom();
    if height.is_some_and(|height| bottom > height - covered_px) {
        field.scroll_into_view();
    }
}
