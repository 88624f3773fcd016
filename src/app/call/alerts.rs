//! What must not be overlooked: stop work, and for a screen reader the change of the leading cause.

use super::steady::Answer;
use super::words::{self, Verdict};
use crate::app::parts::{Caution, Grade, Retold};
use crate::caution::{self, Stands};
use crate::faults;
use crate::record::{self, Visit};
use yew::{Html, Properties, component, html};

/// The observation of a machine that keeps moving with its lever in neutral.
const RUNS_ON: &str = "runs-on";
/// Probability from which a cause that forbids moving the machine is told at the head of the screen.
const STOP_FROM: f64 = 0.2;

/// True where someone says or saw that the machine keeps going in neutral: nothing is tested by driving then.
pub fn runs_on(visit: &Visit) -> bool {
    matches!(
        visit.observations.get(RUNS_ON),
        Some(record::Answer::Seen | record::Answer::OperatorSays)
    )
}

/// Properties of [`StopWork`].
#[derive(Clone, PartialEq, Properties)]
pub struct StopWorkProps {
    /// It keeps going in neutral.
    pub runs_on: bool,
    /// Last answer of the engine.
    pub assessment: Option<Answer>,
}

/// The red panel.
#[component]
pub fn StopWork(props: &StopWorkProps) -> Html {
    if props.runs_on {
        return html! {
            <Caution grade={Grade::Danger} title="stop work" role="alert" testid="stop-work">
                { for caution::at(Stands::KeepsGoing).map(|caution| html! { <p><Retold text={caution.text} /></p> }) }
                <p>{ "Nobody in front of it or behind it. Readings on its wheels or tracks stay closed." }</p>
            </Caution>
        };
    }
    let told = props
        .assessment
        .as_deref()
        .filter(|a| words::verdict(a) != Verdict::TooLittle);
    let Some(assessment) = told else {
        return Html::default();
    };
    let grave = assessment.causes.iter().find(|cause| {
        cause.probability >= STOP_FROM
            && cause
                .ids
                .iter()
                .filter_map(|id| faults::find(*id))
                .any(|fault| fault.stop_work)
    });
    match grave {
        Some(cause) => html! {
            <Caution grade={Grade::Danger} title="stop work until it is ruled out" role="alert" testid="stop-work">
                <p>{ format!("{} ({}). Engine off, chock both ways; do not drive or test it before this is ruled out.",
                    words::cause_title(cause), words::chance(cause.probability, &assessment.trust)) }</p>
            </Caution>
        },
        None => Html::default(),
    }
}

/// Properties of [`LeadStatus`].
#[derive(Clone, PartialEq, Properties)]
pub struct LeadStatusProps {
    /// Last answer of the engine.
    pub assessment: Option<Answer>,
    /// A word of the screen itself.
    pub said: String,
}

/// Speaks when the leading cause changes, and what was undone. Seen by nobody, heard by those who need it.
#[component]
pub fn LeadStatus(props: &LeadStatusProps) -> Html {
    let lead = props
        .assessment
        .as_deref()
        .map_or_else(String::new, |assessment| {
            match (words::verdict(assessment), assessment.causes.first()) {
                // The percentage is left out: the same cause with another figure is no news.
                (verdict @ (Verdict::SoFar | Verdict::Uncertain), Some(cause)) => {
                    format!(
                        "Leading cause, {}: {}.",
                        verdict.words(),
                        words::cause_title(cause)
                    )
                }
                _ => String::from("Too little to tell."),
            }
        });
    html! { <>
        <p class="hidden-text" role="status" aria-live="polite" data-testid="lead-status">{ lead }</p>
        <p class="hidden-text" role="status" aria-live="polite">{ props.said.clone() }</p>
    </> }
}
