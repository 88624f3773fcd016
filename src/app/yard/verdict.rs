//! The verdict at the head of the sheet, with its reasons and what was not checked.

use yew::{Html, Properties, component, html};

use crate::app::parts::{Icon, Shape};
use crate::assessment::upper_first;
use crate::yard::{Grade, Report, Verdict};

/// Properties of [`VerdictPanel`].
#[derive(Clone, PartialEq, Properties)]
pub struct VerdictProps {
    /// What the sheet comes to.
    pub report: Report,
}

/// Sign of a grade.
pub fn shape(grade: Grade) -> Shape {
    match grade {
        Grade::Good => Shape::Done,
        Grade::Watch => Shape::Warning,
        Grade::Stop => Shape::Danger,
    }
}

/// Class of a grade.
pub fn class(grade: Grade) -> &'static str {
    match grade {
        Grade::Good => "is-good",
        Grade::Watch => "is-watch",
        Grade::Stop => "is-stop",
    }
}

/// A verdict with its first reason in a line.
pub fn verdict_words(report: &Report) -> String {
    match report.reasons.first() {
        Some((_, why)) => format!("{}: {why}", report.verdict.words()),
        None => report.verdict.words().to_owned(),
    }
}

/// The panel.
#[component]
pub fn VerdictPanel(props: &VerdictProps) -> Html {
    let report = &props.report;
    let (class, shape) = match report.verdict {
        Verdict::NothingChecked => ("is-open", Shape::Note),
        Verdict::NothingFound => ("is-good", Shape::Done),
        Verdict::Watch => ("is-watch", Shape::Warning),
        Verdict::DoNotSendOut => ("is-stop", Shape::Danger),
    };
    let (done, all) = report.steps;
    html! {
        <section class={yew::classes!("panel", "yard-verdict", class)} aria-labelledby="yard-verdict-title" data-testid="yard-verdict">
            <h2 id="yard-verdict-title" class="yard-verdict-word" role="status" data-testid="verdict">
                <Icon {shape} />
                { report.verdict.words() }
            </h2>
            <p class="soft small">{ format!("{done} of {all} steps whole") }</p>
            if !report.reasons.is_empty() {
                <ul class="yard-reasons" data-testid="reasons">
                    { for report.reasons.iter().map(|(grade, why)| html! {
                        <li class={yew::classes!("yard-reason", self::class(*grade))}>
                            <Icon shape={self::shape(*grade)} />
                            <span><strong>{ format!("{}: ", upper_first(grade.words())) }</strong>{ why }</span>
                        </li>
                    }) }
                </ul>
            }
            if let Some(cold) = &report.cold {
                <p class="yard-reason is-watch" data-testid="yard-cold">
                    <Icon shape={Shape::Note} />
                    <span>{ format!("Only what does not leak counts: {cold}.") }</span>
                </p>
            }
            <details class="yard-not-checked" open={report.verdict != Verdict::NothingChecked} data-testid="not-checked">
                <summary><h3>{ format!("Not checked ({})", report.not_checked.len()) }</h3></summary>
                <ul>
                    { for report.not_checked.iter().map(|what| html! { <li>{ what }</li> }) }
                </ul>
            </details>
        </section>
    }
}
