//! One unit in the list: what it is, how its last call stands, and the way back into it.

use yew::{Callback, Html, MouseEvent, Properties, component, html};

use crate::app::deed::{Deed, Snapshot};
use crate::app::parts::{Icon, Shape};
use crate::app::platform::clock;
use crate::app::route::Route;
use crate::app::state::Listed;
use crate::assessment::Assessment;
use crate::faults::FaultId;
use crate::record::{Closing, Visit};

/// Properties of [`UnitCard`].
#[derive(Clone, PartialEq, Properties)]
pub struct UnitCardProps {
    /// The unit, its last call, what it asks for.
    pub listed: Listed,
    /// The state.
    pub state: Snapshot,
    /// Wishes.
    pub deed: Callback<Deed>,
}

/// Below this no cause is said to lead.
const LEADS_FROM: f64 = 0.3;

/// A probability in words: never 0 % or 100 %.
pub fn percent(probability: f64) -> String {
    let rounded = (probability * 100.0).round();
    if !rounded.is_finite() {
        "not known".to_owned()
    } else if rounded >= 100.0 {
        "over 99 %".to_owned()
    } else if rounded < 1.0 {
        "under 1 %".to_owned()
    } else {
        format!("{rounded} %")
    }
}

/// The cause of a closed visit in words.
pub fn closing_words(closing: &Closing) -> String {
    let quoted = serde_json::Value::String(closing.cause.clone());
    let cause = serde_json::from_value::<FaultId>(quoted)
        .ok()
        .and_then(crate::faults::find);
    // Closed before it was asked whether it was proved: what proved it says so.
    let is_proved = closing.is_proved || !closing.proof.trim().is_empty();
    let found = if is_proved { "Found" } else { "Not proved" };
    match cause {
        Some(fault) => format!("{found}: {}", fault.title),
        None if closing.cause.is_empty() => "Closed without a cause found".to_owned(),
        None => format!("{found}: {}", closing.cause),
    }
}

/// Where an open visit stands, in words.
pub fn standing_words(visit: &Visit, assessment: Option<&Assessment>) -> String {
    let readings = visit
        .readings
        .iter()
        .filter(|reading| reading.seen.is_some())
        .count();
    if readings == 0 && visit.observations.is_empty() {
        return "Nothing entered yet".to_owned();
    }
    match assessment.and_then(|assessment| assessment.causes.first()) {
        Some(lead) if lead.probability >= LEADS_FROM => {
            format!("Leads: {}, {}", lead.title, percent(lead.probability))
        }
        Some(_) => "No cause leads yet".to_owned(),
        None => match (readings, visit.observations.len()) {
            (1, _) => "1 reading".to_owned(),
            (0, 1) => "1 observation".to_owned(),
            (0, seen) => format!("{seen} observations"),
            (readings, _) => format!("{readings} readings"),
        },
    }
}

/// The card.
#[component]
pub fn UnitCard(props: &UnitCardProps) -> Html {
    let (
        Listed {
            unit,
            last,
            attention,
        },
        state,
    ) = (&props.listed, &props.state);
    let on_start = {
        let (deed, id) = (props.deed.clone(), unit.id.clone());
        Callback::from(move |_: MouseEvent| deed.emit(Deed::StartCall(id.clone())))
    };
    let open = last.as_ref().filter(|visit| visit.closed.is_none());
    let line = last.as_ref().map(|visit| match &visit.closed {
        Some(closing) => (closing_words(closing), "Closed", clock::tell(&closing.when)),
        None => {
            let (assessment, _) = state.answer(&visit.id);
            (
                standing_words(visit, assessment.as_deref()),
                "Open call",
                clock::tell(&visit.opened),
            )
        }
    });
    html! {
        <article class="panel unit-card" aria-labelledby={format!("unit-{}", unit.id)} data-testid="unit-card">
            <div class="unit-card-head">
                <h2 id={format!("unit-{}", unit.id)}>{ &unit.name }</h2>
                <p class="soft small">
                    { unit.class.words() }
                    { " " }
                    if crate::demo::is_demo(&unit.id) { <span class="tag">{ "demo" }</span> }
                </p>
            </div>
            <div class="unit-card-call">
                if let Some(words) = attention.words() {
                    <p class="unit-card-presses" data-testid="unit-presses"><Icon shape={Shape::Warning} />{ words }</p>
                }
                if let Some((words, what, when)) = line {
                    <p class="unit-card-lead" data-testid="unit-lead">{ words }</p>
                    <p class="soft small">{ format!("{what}, {when}") }</p>
                } else {
                    <p class="soft">{ "No call yet" }</p>
                }
            </div>
            <div class="actions unit-card-actions">
                if let Some(visit) = open {
                    <a class="button is-main" href={Route::Call(visit.id.clone()).href()} data-testid="continue-call">
                        { "Continue" }
                        <span class="hidden-text">{ format!(" the call on {}", unit.name) }</span>
                        <Icon shape={Shape::Forward} />
                    </a>
                } else {
                    <button type="button" class="button is-main" onclick={on_start} data-testid="start-call">
                        { "Start a call" }
                        <Icon shape={Shape::Forward} />
                    </button>
                }
                <a class="button" href={Route::Unit(unit.id.clone()).href()} data-testid="unit-profile">{ "Profile" }</a>
            </div>
        </article>
    }
}
