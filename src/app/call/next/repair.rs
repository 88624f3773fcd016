//! The repair: what, how long, what proves the cause first, and which readings must come back.

use super::NextPanelProps;
use crate::app::call::words;
use crate::app::parts::{Caution, Grade};
use crate::assessment::sided;
use crate::next::RepairOffer;
use yew::{Callback, Html, MouseEvent, html};

/// The repair on offer.
pub fn shown(offer: &RepairOffer, props: &NextPanelProps) -> Html {
    let title = crate::faults::find(offer.id).map(|fault| sided(offer.path, fault.title));
    html! {
        <div class={if offer.now { "next-repair is-now" } else { "next-repair" }} data-testid="next-repair">
            <p class="next-word">
                { if offer.now { "Repair now: quicker than any check" } else { "The repair, if it proves out" } }
            </p>
            <h3 class="next-head">
                <span class="next-name">{ offer.repair.clone() }</span>
                <span class="next-minutes figure">{ words::minutes(offer.minutes) }</span>
            </h3>
            <dl class="next-facts">
                if let Some(title) = title {
                    <div>
                        <dt>{ "For" }</dt>
                        <dd>{ title }{ format!(", {}", chance(offer, props)) }</dd>
                    </div>
                }
                if !offer.proof.is_empty() {
                    <div><dt>{ "Prove first" }</dt><dd>{ offer.proof.clone() }</dd></div>
                }
                { back(offer, props) }
            </dl>
            if !offer.caution.is_empty() {
                <Caution grade={Grade::Caution} class="small-caution"><p>{ offer.caution.clone() }</p></Caution>
            }
            if !offer.waits.is_empty() {
                <p class="next-waits" data-testid="next-waits">{ offer.waits.clone() }</p>
            }
            if offer.needs_manual {
                <p>{ "Only as the unit’s manual says." }</p>
            }
        </div>
    }
}

fn chance(offer: &RepairOffer, props: &NextPanelProps) -> String {
    let trust = props.assessment.as_deref().map(|a| a.trust.clone());
    words::chance(offer.probability, &trust.unwrap_or_default())
}

/// The readings that are off now and have to come back.
fn back(offer: &RepairOffer, props: &NextPanelProps) -> Html {
    let off: Vec<_> = offer
        .proved_by
        .iter()
        .filter_map(|id| props.taken.iter().find(|r| r.id == *id))
        .collect();
    if off.is_empty() {
        return Html::default();
    }
    html! {
        <div>
            <dt>{ "Afterwards, back in the window" }</dt>
            <dd>
                <ul class="plain-list">
                    { for off.into_iter().map(|reading| {
                        let (on_reading, id) = (props.on_reading.clone(), reading.id.clone());
                        let on_click = Callback::from(move |_: MouseEvent| on_reading.emit(id.clone()));
                        html! {
                            <li key={reading.id.clone()}>
                                <button type="button" class="link" onclick={on_click}>{ props.sides.port(reading.port, reading.path) }</button>
                                { ", " }{ words::condition(&reading.condition, &props.prefs) }
                            </li>
                        }
                    }) }
                </ul>
            </dd>
        </div>
    }
}
