//! One row of the ranking.

use super::{detail, pair};
use crate::app::call::side::Sides;
use crate::app::call::steady::{Answer, Fold};
use crate::app::call::words::{self, Verdict};
use crate::assessment::Cause;
use crate::faults;
use crate::quantity::UnitPrefs;
use crate::readings::Reading;
use yew::{Callback, Html, MouseEvent, Properties, component, html};

/// Properties of [`CauseRow`].
#[derive(Clone, PartialEq, Properties)]
pub struct CauseRowProps {
    /// Place in the ranking, from 0.
    pub place: usize,
    /// The answer that it stands in.
    pub assessment: Answer,
    /// How far the order can be relied on.
    pub verdict: Verdict,
    /// Readings of the visit.
    pub readings: Vec<Reading>,
    /// Ports that are there twice.
    pub sides: Sides,
    /// Units.
    pub prefs: UnitPrefs,
    /// Opens a reading, by id.
    pub on_reading: Callback<String>,
}

/// What a row looks its readings up in, and names them with.
pub struct Told<'a> {
    /// Opens a reading, by id.
    pub on_reading: &'a Callback<String>,
    /// Readings of the visit.
    pub readings: &'a [Reading],
    /// Ports that are there twice.
    pub sides: Sides,
    /// Units.
    pub prefs: &'a UnitPrefs,
}

impl Told<'_> {
    /// A reading by id.
    pub fn reading(&self, id: &str) -> Option<&Reading> {
        self.readings.iter().find(|reading| reading.id == id)
    }

    /// A reading in words, to be touched.
    pub fn link(&self, reading: &Reading) -> Html {
        let (on_reading, id) = (self.on_reading.clone(), reading.id.clone());
        let on_click = Callback::from(move |_: MouseEvent| on_reading.emit(id.clone()));
        let words = format!(
            "{}, {}",
            self.sides.name(reading),
            words::condition(&reading.condition, self.prefs)
        );
        html! { <button type="button" class="link" onclick={on_click}>{ words }</button> }
    }
}

/// The row: title, probability, and behind it the reasons, the proof and the repair.
#[component]
pub fn CauseRow(props: &CauseRowProps) -> Html {
    let Some(cause) = props.assessment.causes.get(props.place) else {
        return Html::default();
    };
    let told = props.verdict != Verdict::TooLittle;
    let stop = cause
        .ids
        .iter()
        .filter_map(|id| faults::find(*id))
        .any(|fault| fault.stop_work);
    let head = html! { <>
        <span class="cause-title">{ title(cause) }</span>
        if told {
            <span class="cause-share figure">{ words::chance(cause.probability, &props.assessment.trust) }</span>
            { bar(cause.probability) }
        }
        if stop {
            <span class="cause-stop">{ "Stop work" }</span>
        }
        if cause.ids.len() > 1 && cause.pair.is_none() {
            <span class="cause-members soft">{ members(cause) }</span>
        }
        if props.place == 0 && told {
            { lead_proof(cause) }
        }
    </> };
    let inside = {
        let props = props.clone();
        Callback::from(move |()| body(&props))
    };
    html! {
        <li class="cause" data-testid={format!("cause-{}", props.place)}>
            <Fold
                {head}
                body={inside}
                class="cause-fold"
                head_class="cause-head"
                testid={format!("cause-open-{}", props.place)}
            />
        </li>
    }
}

/// Reasons, what the gauges would show, the proof and the repair.
fn body(props: &CauseRowProps) -> Html {
    let Some(cause) = props.assessment.causes.get(props.place) else {
        return Html::default();
    };
    let told = Told {
        on_reading: &props.on_reading,
        readings: &props.readings,
        sides: props.sides,
        prefs: &props.prefs,
    };
    html! {
        <div class="cause-body">
            { pair::explained(cause, &told) }
            { detail::set(cause) }
            { detail::evidence(cause, &told) }
            { detail::would_read(cause, &told) }
            { detail::others(cause, props.assessment.advice.as_ref(), &told) }
            { for cause.members().map(|member| detail::member(member, cause)) }
        </div>
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
fn members(cause: &Cause) -> String {
    let titles: Vec<String> = cause.members().map(|member| member.title()).collect();
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
