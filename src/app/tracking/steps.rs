//! The order of the work, with the cautions at the step and the runs that belong to it.

use super::screen::Edit;
use super::words;
use crate::app::call::cautions;
use crate::app::parts::{Choice, Icon, Opt, Retold, Section, Shape};
use crate::tracking::{Answer, Setting, Step, TrackingSheet, WORK, What};
use yew::{AttrValue, Callback, Html, MouseEvent, Properties, component, html};

/// Properties of [`Steps`].
#[derive(Clone, PartialEq, Properties)]
pub struct StepsProps {
    /// The sheet.
    pub sheet: TrackingSheet,
    /// Id of the visit.
    pub visit: AttrValue,
    /// Edits.
    pub on_edit: Callback<Edit>,
    /// A run is to be added.
    pub on_add: Callback<(What, Setting)>,
}

/// True where the runs of a step have been made, or it was answered.
fn is_done(step: &Step, sheet: &TrackingSheet) -> bool {
    let made = |what: What, setting: Setting| {
        sheet.runs.iter().any(|line| {
            let counted = [What::Turns, What::TurnsApart, What::WheelSpeeds];
            let is_alike =
                line.what == what || (counted.contains(&line.what) && counted.contains(&what));
            is_alike && (what == What::RollOut || line.setting == setting)
        })
    };
    let answered = sheet
        .steps
        .get(step.id)
        .is_some_and(|answer| *answer != Answer::Off);
    answered || (!step.runs.is_empty() && step.runs.iter().all(|(what, set)| made(*what, *set)))
}

/// The steps.
#[component]
pub fn Steps(props: &StepsProps) -> Html {
    let sheet = &props.sheet;
    let done = WORK.iter().filter(|step| is_done(step, sheet)).count();
    let off = WORK
        .iter()
        .find(|step| sheet.steps.get(step.id) == Some(&Answer::Off));
    let state = match off {
        Some(step) => format!("put right first: {}", step.title.to_lowercase()),
        None => format!("{done} of {} done", WORK.len()),
    };
    let first = WORK.iter().position(|step| !is_done(step, sheet));
    html! {
        <Section id="tracking-steps" title="Order of the work" {state} is_open=true>
            <p class="soft small">{ "What comes first spoils all that comes after. Common practice; the manual of the unit comes first." }</p>
            <ol class="tracking-steps">
                { for WORK.iter().enumerate().map(|(at, step)| html! {
                    <li key={step.id}>{ one(props, step, at, first == Some(at)) }</li>
                }) }
            </ol>
        </Section>
    }
}

fn one(props: &StepsProps, step: &'static Step, at: usize, is_next: bool) -> Html {
    let answer = props.sheet.steps.get(step.id).copied();
    let done = is_done(step, &props.sheet);
    let standing = match answer {
        Some(Answer::Off) => "not good",
        Some(Answer::None) => "has none",
        _ if done => "done",
        _ if is_next => "next",
        _ => "",
    };
    let on_answer = props.on_edit.reform(move |answer: Answer| -> Edit {
        Box::new(move |sheet| {
            sheet.steps.insert(step.id.to_owned(), answer);
        })
    });
    html! {
        <details class="tracking-step" data-testid={format!("step-{}", step.id)}>
            <summary>
                <span class="tracking-step-number">{ at + 1 }</span>
                <strong>{ step.title }</strong>
                <span class={if standing == "not good" { "tracking-standing is-off" } else { "tracking-standing" }}>
                    if done { <Icon shape={Shape::Done} /> }
                    if standing == "not good" { <Icon shape={Shape::Warning} /> }
                    { standing }
                </span>
            </summary>
            <div class="stack">
                { cautions::all(step.stands) }
                <p><Retold text={step.how} /></p>
                <p><strong>{ "Good: " }</strong><Retold text={step.good} /></p>
                if !step.fools.is_empty() {
                    <p><strong>{ "What fools: " }</strong>{ step.fools }</p>
                }
                <div class="actions">
                    { for step.runs.iter().map(|(what, setting)| {
                        let (on_add, what, setting) = (props.on_add.clone(), *what, *setting);
                        let label = format!("{}: {}", words::what(what), words::setting(what, setting));
                        html! {
                            <button
                                key={label.clone()}
                                type="button"
                                class="button"
                                onclick={Callback::from(move |_: MouseEvent| on_add.emit((what, setting)))}
                            ><Icon shape={Shape::Plus} />{ label }</button>
                        }
                    }) }
                </div>
                <Choice<Answer>
                    name={format!("answer-{}", step.id)}
                    label="How it is"
                    options={vec![
                        Opt::new(Answer::Good, "Good", "good"),
                        Opt::new(Answer::Off, "Not good", "off"),
                        Opt::new(Answer::None, "Has none", "none"),
                    ]}
                    value={answer}
                    on_change={on_answer}
                />
            </div>
        </details>
    }
}
