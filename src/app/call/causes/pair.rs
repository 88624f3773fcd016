//! Two causes at work at the same time: their names together, and what each explains that the other does not.

use super::row::Told;
use crate::assessment::{Cause, Pair};
use crate::observations;
use yew::{Html, html};

/// Both names under one heading.
pub fn title(pair: &Pair) -> Html {
    let [one, other] = &pair.titles;
    html! { <>
        <span class="pair-word">{ "Two causes together" }</span>
        <span class="pair-name">{ one.clone() }</span>
        <span class="pair-and">{ "and" }</span>
        <span class="pair-name">{ other.clone() }</span>
    </> }
}

/// What each of the two explains; nothing for a single cause.
pub fn explained(cause: &Cause, told: &Told) -> Html {
    let Some(pair) = &cause.pair else {
        return Html::default();
    };
    html! {
        <div class="pair" data-testid="pair">
            { for pair.titles.iter().zip(&pair.explains).map(|(title, of)| html! {
                <div class="pair-side" key={title.clone()}>
                    <h3>{ title.clone() }{ of.is_empty().then_some(" explains nothing that the other does not.") }</h3>
                    if !of.is_empty() {
                        <p class="soft">{ "explains" }</p>
                        <ul class="plain-list">
                            { for of.iter().map(|id| html! { <li key={id.clone()}>{ item(id, cause, told) }</li> }) }
                        </ul>
                    }
                </div>
            }) }
        </div>
    }
}

/// A reading, to be touched, or what was seen.
fn item(id: &str, cause: &Cause, told: &Told) -> Html {
    if let Some(reading) = told.reading(id) {
        return told.link(reading);
    }
    let evidence = cause.evidence.iter().find(|evidence| evidence.of == id);
    let words = evidence.map(|evidence| evidence.words.clone());
    let seen = || observations::find(id).map(|observation| observation.words.to_owned());
    html! { { words.or_else(seen).unwrap_or_else(|| id.to_owned()) } }
}
