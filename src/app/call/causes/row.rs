//! One row of the ranking.

use super::{detail, pair};
use crate::app::call::words::{self, Verdict};
use crate::assessment::{Cause, Trust};
use crate::faults::{self, FaultId};
use crate::next::Advice;
use crate::quantity::UnitPrefs;
use crate::readings::Reading;
use yew::{Callback, Html, Properties, component, html};

/// Properties of [`CauseRow`].
#[derive(Clone, PartialEq, Properties)]
pub struct CauseRowProps {
    /// Place in the ranking, from 0.
    pub place: usize,
    /// The cause, or the set.
    pub cause: Cause,
    /// How far the integral behind it can be trusted.
    pub trust: Trust,
    /// How far the order can be relied on.
    pub verdict: Verdict,
    /// What is on offer next: what its ports would show.
    pub advice: Option<Advice>,
    /// Readings of the visit.
    pub readings: Vec<Reading>,
    /// Units.
    pub prefs: UnitPrefs,
    /// Opens a reading, by id.
    pub on_reading: Callback<String>,
}

/// The row: title, probability, and behind it the reasons, the proof and the repair.
#[component]
pub fn CauseRow(props: &CauseRowProps) -> Html {
    let cause = &props.cause;
    let told = props.verdict != Verdict::TooLittle;
    let stop = cause
        .ids
        .iter()
        .filter_map(|id| faults::find(*id))
        .any(|fault| fault.stop_work);
    html! {
        <li class="cause" data-testid={format!("cause-{}", props.place)}>
            <details class="cause-fold">
                <summary class="cause-head">
                    <span class="cause-title">{ title(cause) }</span>
                    if told {
                        <span class="cause-share figure">{ words::chance(cause.probability, &props.trust) }</span>
                        { bar(cause.probability) }
                    }
                    if stop {
                        <span class="cause-stop">{ "Stop work" }</span>
                    }
                    if cause.ids.len() > 1 && cause.pair.is_none() {
                        <span class="cause-members soft">{ members(&cause.ids) }</span>
                    }
                    if props.place == 0 && told {
                        { lead_proof(cause) }
                    }
                </summary>
                <div class="cause-body">
                    { pair::explained(cause, &props.on_reading, &props.readings, &props.prefs) }
                    { detail::set(cause) }
                    { detail::evidence(cause, &props.on_reading, &props.readings, &props.prefs) }
                    { detail::would_read(cause, &props.readings, &props.prefs) }
                    { detail::others(cause, props.advice.as_ref(), &props.readings, &props.prefs) }
                    { for cause.ids.iter().map(|id| detail::member(*id, cause)) }
                </div>
            </details>
        </li>
    }
}

/// The probability as a bar.
fn bar(probability: f64) -> Html {
    let width = format!("{:.1}%", (probability * 100.0).clamp(0.5, 100.0));
    html! {
        <svg class="cause-bar" width="100%" height="10" aria-hidden="true" focusable="false">
            <rect width="100%" height="10" rx="2" class="cause-bar-track" />
            <rect {width} height="10" rx="2" class="cause-bar-fill" />
        </svg>
    }
}

/// The title; two causes at work together say so first.
fn title(cause: &Cause) -> Html {
    match &cause.pair {
        Some(pair) => pair::title(pair),
        None => html! { { cause.title.clone() } },
    }
}

/// Names the members of a set that no reading taken so far can split.
fn members(ids: &[FaultId]) -> String {
    let titles: Vec<&str> = ids
        .iter()
        .filter_map(|id| faults::find(*id))
        .map(|fault| fault.title)
        .collect();
    format!("Alike in every reading taken: {}", titles.join("; "))
}

/// The lead says at once what would prove it, or for a set what splits it.
fn lead_proof(cause: &Cause) -> Html {
    if cause.pair.is_some() {
        return html! { <span class="cause-proof">{ "Each is proved by itself: open this row." }</span> };
    }
    let proof = cause
        .ids
        .first()
        .and_then(|id| faults::find(*id))
        .map(|fault| fault.proof)
        .unwrap_or_default();
    let (lead, text) = if cause.ids.len() > 1 && !cause.split.is_empty() {
        ("Split by: ", cause.split.as_str())
    } else {
        ("Proved by: ", proof)
    };
    if text.is_empty() {
        return Html::default();
    }
    html! { <span class="cause-proof"><b>{ lead }</b>{ text.to_owned() }</span> }
}
