//! A reading that does not fit the rest: it says so itself, and is taken again with one touch. What it read before stays.

use super::change::Change;
use super::words;
use crate::app::parts::{Icon, Shape};
use crate::app::platform::clock;
use crate::quantity::UnitPrefs;
use crate::readings::Reading;
use crate::record::Earlier;
use yew::{Callback, Html, MouseEvent, html};

/// The mark beside the name: two lines that do not meet, and the word.
pub fn badge() -> Html {
    html! {
        <span class="badge is-doubt" data-testid="does-not-fit">
            <svg class="badge-mark" viewBox="-13 -13 26 26" width="22" height="22" aria-hidden="true" focusable="false">
                <g class="mark is-doubt">
                    <path d="M-11 -7L0 -12 11 -7V7L0 12 -11 7Z" class="mark-body" />
                    <path d="M-5 -2.5H5M-5 2.5H5M3 -6.5L-3 6.5" class="mark-sign" />
                </g>
            </svg>
            <span class="badge-word">{ "does not fit" }</span>
        </span>
    }
}

/// Why, and the two ways on: read it anew, or it reads the same.
pub fn ask(
    reading: &Reading,
    number: usize,
    why: &str,
    earlier: &[Earlier],
    on_change: &Callback<Change>,
) -> Html {
    let touch = |same: bool| {
        let id = reading.id.clone();
        on_change.reform(move |_: MouseEvent| Change::Retake {
            id: id.clone(),
            when: clock::now(),
            same,
        })
    };
    html! {
        <div class="retake" data-testid={format!("retake-{number}")}>
            <p class="retake-why"><Icon shape={Shape::Warning} /><span>{ why.to_owned() }</span></p>
            if !earlier.is_empty() {
                <p>{ "Taken again already, and it still does not fit: a second gauge beside it, and the port by the drawing." }</p>
            }
            <div class="actions">
                <button type="button" class="button" data-testid={format!("take-again-{number}")} onclick={touch(false)}>
                    { "Read it anew" }
                </button>
                <button type="button" class="button is-quiet" data-testid={format!("same-again-{number}")} onclick={touch(true)}>
                    { "Looked again: the same" }
                </button>
            </div>
        </div>
    }
}

/// What the reading showed before it was taken again.
pub fn before(reading: &Reading, number: usize, earlier: &[Earlier], prefs: &UnitPrefs) -> Html {
    if earlier.is_empty() {
        return Html::default();
    }
    let one = |earlier: &Earlier| {
        let what = match &earlier.seen {
            Some(seen) => words::seen(reading.port, seen, prefs),
            None => earlier.typed.clone(),
        };
        format!("{what}, until {}", clock::tell(&earlier.when))
    };
    let told: Vec<String> = earlier.iter().map(one).collect();
    html! {
        <p class="reading-before" data-testid={format!("before-{number}")}>{ "Read before: " }{ told.join("; ") }{ "." }</p>
    }
}
