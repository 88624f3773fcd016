//! What to do next: the check that tells most for its minutes, what its readings would say, the repair, and when to stop.

use super::change::Change;
use super::words;
use crate::assessment::Assessment;
use crate::checks;
use crate::next::{Advice, Foretold, Offer, RepairOffer};
use crate::quantity::UnitPrefs;
use crate::readings::Reading;
use std::rc::Rc;
use yew::{Callback, Html, MouseEvent, Properties, component, html};

/// Properties of [`NextPanel`].
#[derive(Clone, PartialEq, Properties)]
pub struct NextPanelProps {
    /// The assessment, with its advice once it is there.
    pub assessment: Option<Rc<Assessment>>,
    /// The advice belongs to readings that have changed since.
    pub updating: bool,
    /// Readings there are.
    pub readings: Vec<Reading>,
    /// Units.
    pub prefs: UnitPrefs,
    /// An edit.
    pub on_change: Callback<Change>,
}

/// The panel.
#[component]
pub fn NextPanel(props: &NextPanelProps) -> Html {
    let advice = props.assessment.as_ref().and_then(|a| a.advice.as_ref());
    html! {
        <section class="panel next" aria-labelledby="next-title" id="next" tabindex="-1" data-testid="next">
            <h2 id="next-title">{ "What to do next" }</h2>
            { match advice {
                Some(advice) => shown(advice, props),
                None => html! { <p class="soft" role="status">{ "Working out which check tells most…" }</p> },
            } }
        </section>
    }
}

fn shown(advice: &Advice, props: &NextPanelProps) -> Html {
    html! {
        <>
        if props.updating {
            <p class="soft">{ "For the readings as they were a moment ago." }</p>
        }
        if let Some(stop) = &advice.stop {
            <p class="next-stop" data-testid="next-stop">{ stop.clone() }</p>
        }
        { for advice.repair.iter().filter(|r| r.now).map(repair) }
        <ol class="next-list">
            { for advice.checks.iter().enumerate().map(|(place, offer)| check(place, offer, props)) }
        </ol>
        { for advice.repair.iter().filter(|r| !r.now).map(repair) }
        if !advice.held_back.is_empty() {
            <details class="next-held">
                <summary>{ format!("Held back for now: {}", advice.held_back.len()) }</summary>
                <ul>
                    { for advice.held_back.iter().map(|(title, why)| html! {
                        <li><strong>{ title.clone() }</strong>{ ": " }{ why.clone() }</li>
                    }) }
                </ul>
            </details>
        }
        <p class="soft next-first">{ crate::caution::MANUAL_FIRST }</p>
        </>
    }
}

/// Minutes for a person: halves under five, whole above.
fn minutes(value: f64) -> String {
    if value < 1.0 {
        String::from("under 1 min")
    } else {
        format!("{value:.0} min")
    }
}

fn check(place: usize, offer: &Offer, props: &NextPanelProps) -> Html {
    let known = checks::find(&offer.id);
    let missing: Vec<_> = offer
        .foretold
        .iter()
        .map(|f| (f.port, f.condition))
        .filter(|(port, condition)| {
            !props
                .readings
                .iter()
                .any(|r| r.port == *port && r.condition == *condition)
        })
        .collect();
    let on_change = props.on_change.clone();
    let add = missing.clone();
    let on_add = Callback::from(move |_: MouseEvent| on_change.emit(Change::Add(add.clone())));
    html! {
        <li class="next-check" data-testid={format!("next-{place}")}>
            <p class="next-head">
                <span class="next-name">{ offer.title.clone() }</span>
                <span class="next-minutes figure">{ minutes(offer.minutes) }</span>
                if offer.hazard >= 2 {
                    <span class="next-hazard">{ if offer.hazard >= 3 { "danger" } else { "take care" } }</span>
                }
            </p>
            <p class="next-why">{ offer.why.clone() }</p>
            if !missing.is_empty() {
                <button type="button" class="button" data-testid={format!("next-add-{place}")} onclick={on_add}>
                    { if missing.len() > 1 { format!("Take these {} readings", missing.len()) } else { String::from("Take this reading") } }
                </button>
            }
            if !offer.foretold.is_empty() {
                <details class="next-told">
                    <summary>{ "What it will say" }</summary>
                    { for offer.foretold.iter().map(|f| foretold(f, &props.prefs)) }
                </details>
            }
            if let Some(known) = known {
                <details class="next-told">
                    <summary>{ "How it is done" }</summary>
                    <ul>{ for known.how.iter().map(|step| html! { <li>{ *step }</li> }) }</ul>
                    <p class="soft">{ "Needs: " }{ known.instruments }{ "." }</p>
                    if !known.put_back.is_empty() {
                        <p>{ "Put back afterwards: " }{ known.put_back.join("; ") }{ "." }</p>
                    }
                </details>
            }
        </li>
    }
}

/// One reading: what it would be under each leading cause.
fn foretold(f: &Foretold, prefs: &UnitPrefs) -> Html {
    html! {
        <table class="next-table">
            <caption>{ f.port.words() }{ ", " }{ words::condition(&f.condition, prefs) }</caption>
            <thead><tr><th scope="col">{ "If it is" }</th><th scope="col">{ "it reads" }</th></tr></thead>
            <tbody>
                { for f.would.iter().map(|w| {
                    let (low, high) = words::ends(f.port, w.low, w.high, prefs);
                    html! {
                        <tr>
                            <th scope="row">{ w.title.clone() }</th>
                            <td class="figure">{ low }{ " to " }{ high }</td>
                        </tr>
                    }
                }) }
            </tbody>
        </table>
    }
}

fn repair(offer: &RepairOffer) -> Html {
    html! {
        <div class={if offer.now { "next-repair is-now" } else { "next-repair" }} data-testid="next-repair">
            <p class="next-head">
                <span class="next-name">{ if offer.now { "Quicker than any check: " } else { "If it proves out: " } }{ offer.repair.clone() }</span>
                <span class="next-minutes figure">{ minutes(offer.minutes) }</span>
            </p>
            <p>{ format!("Ends the trouble with {}. ", words::percent(offer.probability)) }
                if !offer.proof.is_empty() {
                    { "Proved by: " }{ offer.proof.clone() }
                }
            </p>
            if offer.needs_manual {
                <p>{ "Only as the unit's manual says." }</p>
            }
            if !offer.caution.is_empty() {
                <p class="next-caution">{ offer.caution.clone() }</p>
            }
            if !offer.proved_by.is_empty() {
                <p class="soft">{ format!("Afterwards, {} must come back into its window.", if offer.proved_by.len() > 1 { format!("each of the {} readings that are off now", offer.proved_by.len()) } else { String::from("the reading that is off now") }) }</p>
            }
        </div>
    }
}
