//! Two causes at work at the same time: their names together, and what each explains that the other does not.

use crate::app::call::words;
use crate::assessment::{Cause, Pair};
use crate::observations;
use crate::quantity::UnitPrefs;
use crate::readings::Reading;
use yew::{Callback, Html, MouseEvent, html};

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
pub fn explained(
    cause: &Cause,
    on_reading: &Callback<String>,
    readings: &[Reading],
    prefs: &UnitPrefs,
) -> Html {
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
                            { for of.iter().map(|id| html! {
                                <li key={id.clone()}>{ item(id, cause, on_reading, readings, prefs) }</li>
                            }) }
                        </ul>
                    }
                </div>
            }) }
        </div>
    }
}

/// A reading, to be touched, or what was seen.
fn item(
    id: &str,
    cause: &Cause,
    on_reading: &Callback<String>,
    readings: &[Reading],
    prefs: &UnitPrefs,
) -> Html {
    if let Some(reading) = readings.iter().find(|reading| reading.id == id) {
        let (on_reading, id) = (on_reading.clone(), id.to_owned());
        let words = format!(
            "{}, {}",
            reading.port.words(),
            words::condition(&reading.condition, prefs)
        );
        let on_click = Callback::from(move |_: MouseEvent| on_reading.emit(id.clone()));
        return html! { <button type="button" class="link" onclick={on_click}>{ words }</button> };
    }
    let told = cause.evidence.iter().find(|evidence| evidence.of == id);
    let words = told.map(|evidence| evidence.words.clone());
    let seen = || observations::find(id).map(|observation| observation.words.to_owned());
    html! { { words.or_else(seen).unwrap_or_else(|| id.to_owned()) } }
}
