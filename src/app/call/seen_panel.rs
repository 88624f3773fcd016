//! What was seen, heard and felt before any gauge: the complaint and the ticks. "Not looked" is no answer, and never a no.

use super::cautions;
use super::change::Change;
use super::seen_keys;
use super::steady::Fold;
use crate::app::parts::{Choice, MeasureField, Opt, TextField};
use crate::caution::Stands;
use crate::observations::{self, Group, Observation};
use crate::quantity::{DecimalMark, Measure, Typed, Unit};
use crate::record::Answer;
use crate::record::limits::{MOST_HOURS, TEXT_CHARACTERS};
use crate::unit::Paths;
use std::collections::BTreeMap;
use yew::{Callback, Html, Properties, component, html};

/// Properties of [`SeenPanel`].
#[derive(Clone, PartialEq, Properties)]
pub struct SeenPanelProps {
    /// Complaint as typed.
    pub complaint: String,
    /// Hour meter as typed.
    pub hours: Typed,
    /// Decimal mark.
    pub mark: DecimalMark,
    /// Alone on site.
    pub alone: Option<bool>,
    /// Began straight after a repair.
    pub after_repair: Option<bool>,
    /// Answers.
    pub observations: BTreeMap<String, Answer>,
    /// Drive paths of the machine: what needs two is asked only there.
    pub paths: Paths,
    /// An edit.
    pub on_change: Callback<Change>,
}

/// The panel.
#[component]
pub fn SeenPanel(props: &SeenPanelProps) -> Html {
    let yes_no = || vec![Opt::new(true, "Yes", "yes"), Opt::new(false, "No", "no")];
    let answered = props.observations.len();
    html! {
                <section class="panel seen" aria-labelledby="seen-title" id="seen" tabindex="-1">
                    <h2 id="seen-title">{ "What was seen" }{ count_of(answered) }</h2>
                    <TextField
                        id="complaint"
                        label="Complaint, in the operator’s words"
                        value={props.complaint.clone()}
                        on_input={props.on_change.reform(Change::Complaint)}
                        lines={true}
                        maxlength={u32::try_from(TEXT_CHARACTERS).unwrap_or(2000)}
                        testid="complaint"
                    />
                    <div class="seen-asks">
                        <Choice<bool>
                            name="alone"
                            label="Alone on site?"
                            options={yes_no()}
                            class="is-inline"
                            value={props.alone}
                            on_change={props.on_change.reform(|answer| Change::Alone(Some(answer)))}
                        />
                        <Choice<bool>
                            name="after-repair"
                            label="Began straight after a repair?"
                            options={yes_no()}
                            class="is-inline"
                            value={props.after_repair}
                            on_change={props.on_change.reform(|answer| Change::AfterRepair(Some(answer)))}
                        />
                    </div>
                    if props.alone == Some(true) {
                    { cautions::at(Stands::Alone) }
                }
    <div class="seen-hours">
                        <MeasureField
                            id="hours"
                            label="Hour meter"
                            hint="wear is drawn over the hours"
                            unit={Unit::Hour}
                            typed={props.hours.typed.clone()}
                            value={props.hours.value}
                            range={Some((Measure::literal(0.0, Unit::Hour), Measure::literal(MOST_HOURS, Unit::Hour)))}
                            mark={props.mark}
                            on_entry={props.on_change.reform(Change::Hours)}
                            testid="hours"
                        />
                    </div>
    <div class="seen-groups">
                    { for Group::ALL.into_iter().map(|group| html! {
                        <SeenGroup key={format!("{group:?}")} {group} observations={props.observations.clone()} paths={props.paths} on_change={props.on_change.clone()} />
                    }) }
                    </div>
                </section>
            }
}

fn count_of(answered: usize) -> Html {
    if answered == 0 {
        return Html::default();
    }
    html! { <span class="count">{ format!("{answered} answered") }</span> }
}

/// Properties of [`SeenGroup`].
#[derive(Clone, PartialEq, Properties)]
struct SeenGroupProps {
    group: Group,
    observations: BTreeMap<String, Answer>,
    paths: Paths,
    on_change: Callback<Change>,
}

/// One group, folded once it was answered.
#[component]
fn SeenGroup(props: &SeenGroupProps) -> Html {
    let offered: Vec<&'static Observation> = observations::all()
        .filter(|observation| observation.group == props.group)
        .filter(|observation| {
            // An answer that is kept is shown, even where the paths were changed since.
            !observation.two_path
                || !props.paths.is_one()
                || props.observations.contains_key(observation.id)
        })
        .collect();
    let answers = || {
        offered
            .iter()
            .filter_map(|observation| props.observations.get(observation.id))
    };
    let yes = answers().filter(|answer| is_yes(**answer)).count();
    let no = answers().count() - yes;
    let head = html! { <>
        <span class="seen-group-name">{ props.group.words() }</span>
        <span class="count">{ tally(yes, no, offered.len()) }</span>
    </> };
    let body = {
        let props = props.clone();
        Callback::from(move |()| {
            html! {
                <ul class="seen-list">
                    { for offered.iter().map(|observation| tick(observation, &props)) }
                </ul>
            }
        })
    };
    html! {
        <Fold
            {head}
            {body}
            is_open={props.group == Group::Complaint && props.observations.is_empty()}
            class="seen-group"
            testid={format!("seen-{:?}", props.group)}
        />
    }
}

fn tally(yes: usize, no: usize, of: usize) -> String {
    match (yes, no) {
        (0, 0) => format!("{of}, none answered"),
        (yes, 0) => format!("{yes} yes of {of}"),
        (0, no) => format!("{no} no of {of}"),
        (yes, no) => format!("{yes} yes, {no} no of {of}"),
    }
}

fn is_yes(answer: Answer) -> bool {
    matches!(answer, Answer::Seen | Answer::OperatorSays)
}

fn tick(observation: &'static Observation, props: &SeenGroupProps) -> Html {
    let given = props.observations.get(observation.id).copied();
    let state = match given {
        Some(answer) if is_yes(answer) => "is-yes",
        Some(_) => "is-no",
        None => "is-open",
    };
    html! {
        <li class={format!("seen-tick {state}")} key={observation.id}>
            { seen_keys::ask(observation, given, "seen", &props.on_change) }
        </li>
    }
}
