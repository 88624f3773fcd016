//! How dangerous a check is, as shape, word and colour: a triangle is not an octagon, and "take care" is not "danger".

use crate::app::parts::{Icon, Shape};
use yew::{Html, html};

/// The mark of a hazard, 0 to 3. None for a check without any.
pub fn mark(hazard: u8) -> Html {
    let (class, shape, words) = match hazard {
        0 => return Html::default(),
        1 => ("is-ordinary", Shape::Note, "ordinary care: engine runs"),
        2 => (
            "is-care",
            Shape::Warning,
            "take care: turning wheels or hot oil",
        ),
        _ => (
            "is-danger",
            Shape::Danger,
            "danger: high pressure, or it may move with force",
        ),
    };
    html! {
        <span class={format!("hazard {class}")} data-testid="hazard"><Icon {shape} /><span>{ words }</span></span>
    }
}
