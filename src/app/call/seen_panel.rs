//! What was seen, heard and felt before any gauge: the complaint and the ticks. "Not looked" is no answer, and never a no.

use super::cautions;
use super::change::Change;
use super::seen_keys;
use crate::app::parts::{Choice, Opt, TextField};
use crate::caution::Stands;
use crate::observations::{self, Group, Observation};
use crate::record::limits::TEXT_CHARACTERS;
use crate::record::{Answer, Visit};
use crate::unit::MachineClass;
use std::rc::Rc;
use yew::{Callback, Html, Properties, component, html, use_state};

/// Properties of [`SeenPanel`].
#[derive(Clone, PartialEq, Properties)]
pub struct SeenPanelProps {
    /// Visit.
    pub visit: Rc<Visit>,
    /// Class of machine: two paths or one.
    pub class: MachineClass,
    /// An edit.
    pub on_change: Callback<Change>,
}

/// True where left and right have a pump each, so that a pull to one side can come from the drive.
fn has_two_paths(class: MachineClass) -> bool {
    matches!(class, MachineClass::CompactTracked | MachineClass::Crawler)
}

/// The panel.
#[component]
pub fn SeenPanel(props: &SeenPanelProps) -> Html {
    let visit = &props.visit;
    let yes_no = || vec![Opt::new(true, "Yes", "yes"), Opt::new(false, "No", "no")];
    let answered = visit.observations.len();
    html! {
                <section class="panel seen" aria-labelledby="seen-title" id="seen" tabindex="-1">
                    <h2 id="seen-title">{ "What was seen" }{ count_of(answered) }</h2>
                    <TextField
                        id="complaint"
                        label="Complaint, in the operator’s words"
                        value={visit.complaint.clone()}
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
                            value={visit.alone}
                            on_change={props.on_change.reform(|answer| Change::Alone(Some(answer)))}
                        />
                        <Choice<bool>
                            name="after-repair"
                            label="Began straight after a repair?"
                            options={yes_no()}
                            class="is-inline"
                            value={visit.after_repair}
                            on_change={props.on_change.reform(|answer| Change::AfterRepair(Some(answer)))}
                        />
                    </div>
                    if visit.alone == Some(true) {
                    { cautions::at(Stands::Alone) }
                }
    <div class="seen-groups">
                    { for Group::ALL.into_iter().map(|group| html! {
                        <SeenGroup key={format!("{group:?}")} {group} visit={visit.clone()} class={props.class} on_change={props.on_change.clone()} />
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
    visit: Rc<Visit>,
    class: MachineClass,
    on_change: Callback<Change>,
}

/// One group, folded once it was answered.
#[component]
fn SeenGroup(props: &SeenGroupProps) -> Html {
    let offered: Vec<&'static Observation> = observations::all()
        .filter(|observation| observation.group == props.group)
        .filter(|observation| {
            // An answer that is kept is shown, even where the class was changed since.
            !observation.two_path
                || has_two_paths(props.class)
                || props.visit.observations.contains_key(observation.id)
        })
        .collect();
    let answers = || {
        offered
            .iter()
            .filter_map(|observation| props.visit.observations.get(observation.id))
    };
    let yes = answers().filter(|answer| is_yes(**answer)).count();
    let no = answers().count() - yes;
    let starts_open =
        use_state(|| props.group == Group::Complaint && props.visit.observations.is_empty());
    html! {
        <details class="seen-group" open={*starts_open}>
            <summary data-testid={format!("seen-{:?}", props.group)}>
                <span class="seen-group-name">{ props.group.words() }</span>
                <span class="count">{ tally(yes, no, offered.len()) }</span>
            </summary>
            <ul class="seen-list">
                { for offered.iter().map(|observation| tick(observation, props)) }
            </ul>
        </details>
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
    let given = props.visit.observations.get(observation.id).copied();
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
