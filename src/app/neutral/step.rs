//! One step: cautions first, what to do, what is good, what fools, and the entries with what they come to.

use std::rc::Rc;

use yew::{AttrValue, Callback, Event, Html, Properties, TargetCast, component, html, use_memo};

use super::creep::Creep;
use super::edit::Edits;
use super::figures::SheetField;
use super::lines::Lines;
use super::scale::OffsetScale;
use super::series::Series;
use crate::app::call::cautions;
use crate::app::call::gate::Gate;
use crate::app::call::gate_panel::GatePanel;
use crate::app::parts::{Choice, Lay, Opt, Retold};
use crate::app::platform::clock;
use crate::caution::{self, Stands, Weight};
use crate::neutral::report::{Report, condition};
use crate::neutral::steps::{Enter, Step};
use crate::neutral::words::{Line, Tone, Writer};
use crate::quantity::UnitPrefs;
use crate::readings::{Condition, Doing, Port};
use crate::record::neutral::{Field, Gauging};
use crate::record::{NeutralSheet, Visit};
use crate::unit::Unit;

/// Properties of [`StepPart`].
#[derive(Clone, PartialEq, Properties)]
pub struct StepPartProps {
    /// The step.
    pub id: &'static str,
    /// Its number, from 1.
    pub number: usize,
    /// Open at the start.
    pub is_open: bool,
    /// The unit.
    pub unit: Rc<Unit>,
    /// The visit: precautions.
    pub visit: Rc<Visit>,
    /// The sheet.
    pub sheet: Rc<NeutralSheet>,
    /// What it comes to.
    pub report: Rc<Report>,
    /// Units.
    pub prefs: UnitPrefs,
    /// Edits.
    pub edits: Edits,
    /// Places whose cautions stand in an earlier step.
    pub told: Vec<Stands>,
    /// Minutes since the screen was opened: ticks grow old.
    pub minute: u32,
}

/// The step.
#[component]
pub fn StepPart(props: &StepPartProps) -> Html {
    let is_open = *use_memo((), |()| props.is_open);
    let steps = crate::neutral::steps::steps(props.unit.ticks.control);
    let Some(step) = steps.into_iter().find(|step| step.id == props.id) else {
        return Html::default();
    };
    let is_done = props.sheet.done.iter().any(|done| done == step.id);
    let on_done = {
        let (edits, id) = (props.edits.clone(), step.id);
        Callback::from(move |event: Event| {
            let done = event
                .target_unchecked_into::<web_sys::HtmlInputElement>()
                .checked();
            edits.make(|sheet| {
                sheet.done.retain(|other| other != id);
                if done {
                    sheet.done.push(id.to_owned());
                }
            });
        })
    };
    html! {
        <details class="panel neutral-step" id={format!("step-{}", step.id)} open={is_open} data-testid={format!("step-{}", step.id)}>
            <summary>
                <span class="neutral-number" aria-hidden="true">{ props.number }</span>
                <h3>{ step.title }</h3>
                if is_done {
                    <span class="section-state">{ "done" }</span>
                }
            </summary>
            <div class="stack">
                { warned(step, &props.told) }
                <ol class="neutral-how">{ for step.how.iter().map(|how| html! { <li><Retold text={*how} /></li> }) }</ol>
                if !step.good.is_empty() {
                    <div class="neutral-good">
                        <strong>{ "Good, common practice" }</strong>
                        <ul>{ for step.good.iter().map(|good| html! { <li><Retold text={*good} /></li> }) }</ul>
                    </div>
                }
                if !step.pitfalls.is_empty() {
                    <div class="neutral-fools">
                        <strong>{ "What fools here" }</strong>
                        <ul>{ for step.pitfalls.iter().map(|fools| html! { <li><Retold text={*fools} /></li> }) }</ul>
                    </div>
                }
                { for step.enters.iter().map(|enter| entry(props, step, *enter)) }
                <label class="tick">
                    <input type="checkbox" checked={is_done} onchange={on_done} data-testid={format!("done-{}", step.id)} />
                    <span>{ "Done" }</span>
                </label>
            </div>
        </details>
    }
}

/// Cautions of the step: those that can kill always in full, the others folded where an earlier step has them.
fn warned(step: &Step, told: &[Stands]) -> Html {
    let can_kill = |stands: &Stands| caution::at(*stands).any(|c| c.weight == Weight::Stop);
    let (full, again): (Vec<Stands>, Vec<Stands>) = step
        .stands
        .iter()
        .partition(|stands| can_kill(stands) || !told.contains(stands));
    html! { <>
        { cautions::all(&full) }
        if !again.is_empty() {
            <details class="advice">
                <summary>{ "Cautions as in the steps before" }</summary>
                { cautions::all(&again) }
            </details>
        }
    </> }
}

/// What the machine does for an entry, and the port it is read at: its precautions open it.
fn guarded(enter: Enter) -> Option<(Doing, Port)> {
    match enter {
        Enter::Creep | Enter::Series | Enter::Currents | Enter::PilotStart => {
            Some((Doing::NeutralFree, Port::Wheel))
        }
        Enter::CreepBridged => Some((Doing::NeutralBridged, Port::Wheel)),
        Enter::Difference => Some((Doing::Held, Port::LoopA)),
        Enter::Servo => Some((Doing::NeutralFree, Port::Servo)),
        Enter::PilotRest => None,
    }
}

fn entry(props: &StepPartProps, step: &Step, enter: Enter) -> Html {
    let gates = guarded(enter).map_or_else(Vec::new, |(doing, port)| {
        let condition = Condition {
            doing,
            ..condition(&props.sheet)
        };
        Gate::of(&condition, &[port], &props.visit, clock::now_ms())
    });
    let is_shut = gates
        .iter()
        .any(|gate| gate.barred.is_some() || gate.is_gated() && !(gate.is_ticked() && gate.fresh));
    let on_change = {
        let edits = props.edits.clone();
        Callback::from(move |change| edits.change(&change))
    };
    html! {
        <div class="stack neutral-entry" key={format!("{enter:?}")}>
            { for gates.iter().filter(|gate| gate.barred.is_some() || gate.is_gated()).map(|gate| html! {
                <GatePanel
                    gate={gate.clone()}
                    told={false}
                    unit={props.unit.clone()}
                    prefs={props.prefs.clone()}
                    hold={None::<(f64, f64)>}
                    on_change={on_change.clone()}
                />
            }) }
            if enter == Enter::Difference { { before_locking(props) } }
            if is_shut && !has_values(&props.sheet, enter) {
                <p class="field-hint" data-testid={format!("shut-{}", step.id)}>{ "The fields open once the precautions above are ticked." }</p>
            } else {
                { fields(props, enter) }
            }
            { told(props, enter) }
        </div>
    }
}

/// Fields of an entry.
fn list(enter: Enter) -> &'static [(Field, &'static str)] {
    match enter {
        Enter::Creep => &[(Field::CreepTurns, "")],
        Enter::CreepBridged => &[(Field::BridgedTurns, "")],
        Enter::Servo => &[
            (Field::ServoForward, "Servo port for forward"),
            (Field::ServoReverse, "Servo port for reverse"),
        ],
        Enter::PilotRest => &[
            (Field::PilotForward, "Forward line at rest"),
            (Field::PilotReverse, "Reverse line at rest"),
        ],
        Enter::PilotStart => &[
            (Field::PilotStartForward, "Starts forward at"),
            (Field::PilotStartReverse, "Starts in reverse at"),
        ],
        Enter::Currents => &[
            (Field::ThresholdForward, "Threshold forward"),
            (Field::ThresholdReverse, "Threshold reverse"),
            (Field::EndForward, "End forward"),
            (Field::EndReverse, "End reverse"),
        ],
        Enter::Difference => &[(Field::Difference, "Loop difference A − B")],
        Enter::Series => &[],
    }
}

/// What was typed stays in sight, whatever the ticks do.
fn has_values(sheet: &NeutralSheet, enter: Enter) -> bool {
    enter == Enter::Series && !sheet.series.is_empty()
        || list(enter)
            .iter()
            .any(|(field, _)| sheet.fields.contains_key(field))
}

fn fields(props: &StepPartProps, enter: Enter) -> Html {
    match enter {
        Enter::Creep | Enter::CreepBridged => {
            let bridged = enter == Enter::CreepBridged;
            html! {
                <Creep
                    {bridged}
                    id={if bridged { "bridged" } else { "creep" }}
                    sheet={props.sheet.clone()}
                    prefs={props.prefs.clone()}
                    edits={props.edits.clone()}
                />
            }
        }
        Enter::Series => html! {
            <Series sheet={props.sheet.clone()} report={props.report.clone()} prefs={props.prefs.clone()} edits={props.edits.clone()} />
        },
        _ => html! { <>
            if enter == Enter::Difference { { gauging(props) } }
            <div class="neutral-pair">
                { for list(enter).iter().map(|(field, label)| html! {
                    <SheetField
                        key={*label}
                        field={*field}
                        label={AttrValue::Static(label)}
                        hint={if enter == Enter::Difference { "B higher: minus" } else { "" }}
                        sheet={props.sheet.clone()}
                        prefs={props.prefs.clone()}
                        edits={props.edits.clone()}
                    />
                }) }
            </div>
        </> },
    }
}

fn gauging(props: &StepPartProps) -> Html {
    let edits = props.edits.clone();
    html! {
        <Choice<Gauging>
            name="neutral-gauging"
            label="Read with"
            lay={Lay::List}
            options={vec![
                Opt::new(Gauging::Paired, "Two transducers zeroed together", "paired"),
                Opt::new(Gauging::Switched, "One gauge, switched from side to side", "switched"),
                Opt::new(Gauging::TwoGauges, "A gauge on each side: cannot see a small difference", "two"),
            ]}
            value={Some(props.sheet.gauging)}
            on_change={Callback::from(move |gauging: Gauging| edits.make(|sheet| sheet.gauging = gauging))}
        />
    }
}

/// Before the motor is blocked: where to stop, and what the offset known so far would build.
fn before_locking(props: &StepPartProps) -> Html {
    let writer = Writer::new(&props.prefs);
    let mut lines: Vec<Line> = props
        .report
        .risk
        .as_ref()
        .map(|risk| writer.risk(risk))
        .into_iter()
        .collect();
    if lines.is_empty() {
        lines.push(Line {
            tone: Tone::Open,
            text: "What it would build is not known: count the creep first, wheels free."
                .to_owned(),
        });
    }
    lines.extend(
        props
            .report
            .stop
            .as_ref()
            .map(|stop| writer.stop(stop))
            .unwrap_or_default(),
    );
    html! { <Lines {lines} testid="brake-told" /> }
}

/// What an entry comes to.
fn told(props: &StepPartProps, enter: Enter) -> Html {
    let (report, sheet) = (&props.report, &props.sheet);
    let writer = Writer::new(&props.prefs);
    let is_creep = matches!(enter, Enter::Creep | Enter::Difference);
    let lines: Vec<Line> = match enter {
        Enter::Creep | Enter::Difference => {
            let mut lines = writer.missing(report);
            lines.extend(report.offset.as_ref().map(|offset| writer.offset(offset)));
            lines
        }
        Enter::CreepBridged => report.nulls.as_ref().map(|n| writer.nulls(n)).unwrap_or_else(|| {
            if report.bridged.is_some() && report.creep.is_none() {
                vec![Line {
                    tone: Tone::Open,
                    text: "The creep without the bridge is missing: both are needed to tell control from servo.".to_owned(),
                }]
            } else {
                Vec::new()
            }
        }),
        Enter::Servo => match (sheet.value(Field::ServoForward), sheet.value(Field::ServoReverse), &report.servo) {
            (Some(f), Some(r), Some(push)) => vec![writer.servo(f - r, push)],
            _ => Vec::new(),
        },
        Enter::PilotRest => writer.pilot_rest(sheet),
        Enter::PilotStart => writer.pilot_start(sheet),
        Enter::Currents => report.currents.as_ref().map(|c| writer.currents(c)).unwrap_or_default(),
        Enter::Series => Vec::new(),
    };
    html! { <>
        if let Some(offset) = report.offset.as_ref().filter(|_| is_creep) {
            <OffsetScale offset={offset.clone()} prefs={props.prefs.clone()} />
        }
        <Lines {lines} testid="entry-told" />
    </> }
}
