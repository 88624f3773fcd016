//! What to do next: the check that tells most for its minutes, what its readings would say before the hose goes on, the
//! repair, and when to stop.

mod foretold;
mod offer;
mod repair;

use super::change::Change;
use super::side::Sides;
use super::steady::Answer;
use super::taken::Taken;
use crate::app::parts::{Caution, Grade, Late};
use crate::next::{Advice, Offer};
use crate::quantity::UnitPrefs;
use crate::record;
use std::collections::BTreeMap;
use yew::{Callback, Html, Properties, component, html, use_mut_ref};

/// Properties of [`NextPanel`].
#[derive(Clone, PartialEq, Properties)]
pub struct NextPanelProps {
    /// The assessment, with its advice once it is there.
    pub assessment: Option<Answer>,
    /// The advice belongs to readings that have changed since.
    pub updating: bool,
    /// Readings there are.
    pub taken: Vec<Taken>,
    /// Ports that are there twice.
    pub sides: Sides,
    /// Observations answered.
    pub observations: BTreeMap<String, record::Answer>,
    /// Checks marked as made.
    pub made: Vec<String>,
    /// Units.
    pub prefs: UnitPrefs,
    /// An edit.
    pub on_change: Callback<Change>,
    /// Opens a reading, by id.
    pub on_reading: Callback<String>,
}

impl NextPanelProps {
    fn advice(&self) -> Option<&Advice> {
        self.assessment.as_deref()?.advice.as_ref()
    }
}

/// The panel.
#[component]
pub fn NextPanel(props: &NextPanelProps) -> Html {
    // A newer ranking comes before its advice. Until that is there the last one stays, marked as such: a panel that vanished at
    // every key could not be read. What is seen can bar checks, so no advice outlives a change there.
    let last = use_mut_ref(|| None::<(Answer, BTreeMap<String, record::Answer>)>);
    let kept = {
        let mut last = last.borrow_mut();
        match &props.assessment {
            Some(answer) if answer.advice.is_some() => {
                *last = Some((answer.clone(), props.observations.clone()));
            }
            Some(_)
                if last
                    .as_ref()
                    .is_some_and(|kept| kept.1 == props.observations) => {}
            _ => *last = None,
        }
        last.as_ref().map(|kept| kept.0.clone())
    };
    let is_old = props.updating || kept != props.assessment;
    html! {
        <section class="panel next" aria-labelledby="next-title" id="next" tabindex="-1" data-testid="next">
            <h2 id="next-title">
                { "What to do next" }
                if is_old && kept.is_some() {
                    <span class="count">{ "updating…" }</span>
                }
            </h2>
            { match kept {
                Some(kept) => html! {
                    // The inside is drawn anew when the advice is, not at every key on the way to it.
                    <div class={if is_old { "next-body is-updating" } else { "next-body" }}>
                        <Late<Inside> of={NextPanelProps { assessment: Some(kept), updating: false, ..props.clone() }} />
                    </div>
                },
                None => html! { <p class="soft" role="status">{ "Working out which check tells most…" }</p> },
            } }
        </section>
    }
}

/// What is still to be checked: the check that is pressed, where one is, and the others. What was made already has nothing more to say
/// today; where it is time to stop, no check is pressed on anybody.
fn open<'a>(advice: &'a Advice, made: &[String]) -> (Option<&'a Offer>, Vec<&'a Offer>) {
    let mut left = advice
        .checks
        .iter()
        .filter(|offer| !made.contains(&offer.id));
    let best = if advice.stop.is_none() {
        left.next()
    } else {
        None
    };
    (best, left.collect())
}

/// The inside of the panel.
#[component]
fn Inside(props: &NextPanelProps) -> Html {
    let Some(advice) = props.advice() else {
        return Html::default();
    };
    let made = advice
        .checks
        .iter()
        .filter(|offer| props.made.contains(&offer.id));
    let made: Vec<&Offer> = made.collect();
    let (best, _) = open(advice, &props.made);
    html! {
        <>
            if let Some(stop) = &advice.stop {
                <Caution grade={Grade::Note} title="Stop checking" class="small-caution" testid="next-stop">
                    <p>{ stop.clone() }</p>
                </Caution>
            }
            { for advice.repair.iter().filter(|r| r.now).map(|r| repair::shown(r, props)) }
            { for best.map(|best| offer::best(best, props)) }
            <Late<Others> of={props.clone()} />
            { for advice.repair.iter().filter(|r| !r.now).map(|r| repair::shown(r, props)) }
            if !made.is_empty() {
                <ul class="plain-list" data-testid="next-made">
                    { for made.into_iter().map(|made| offer::made(made, props)) }
                </ul>
            }
            { held_back(advice) }
            <p class="soft small">{ crate::caution::MANUAL_FIRST }</p>
        </>
    }
}

/// The checks that come after the best one.
#[component]
fn Others(props: &NextPanelProps) -> Html {
    let Some(advice) = props.advice() else {
        return Html::default();
    };
    let (best, others) = open(advice, &props.made);
    let first = usize::from(best.is_some());
    if others.is_empty() {
        return Html::default();
    }
    html! { <>
        <h3 class="next-other">{ if best.is_some() { "Or" } else { "If you check on all the same" } }</h3>
        <ol class="next-list">
            { for others.iter().enumerate().map(|(place, other)| offer::other(first + place, other, props)) }
        </ol>
    </> }
}

/// What may not be offered yet, and what it waits for.
fn held_back(advice: &Advice) -> Html {
    if advice.held_back.is_empty() {
        return Html::default();
    }
    html! {
        <details class="advice" data-testid="next-held">
            <summary>{ format!("Held back for now: {}", advice.held_back.len()) }</summary>
            <ul>
                { for advice.held_back.iter().map(|(title, why)| html! {
                    <li key={title.clone()}><strong>{ title.clone() }</strong>{ ": " }{ why.clone() }</li>
                }) }
            </ul>
        </details>
    }
}
