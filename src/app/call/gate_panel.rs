//! The precautions of a check, where the hand goes: what stands in the way, the facts to tick, and for a held machine the
//! seconds and the pressure to stop at.

use super::cautions;
use super::change::Change;
use super::gate::{Barred, Gate, NEVER_ALONE};
use super::words;
use crate::app::parts::{Caution, Choice, Grade, Opt, Retold};
use crate::app::platform::clock;
use crate::call::hold::PLATEAU_S;
use crate::caution::Stands;
use crate::quantity::{self, Decimals, Kind, Measure, UnitPrefs};
use crate::readings::{Doing, Port};
use crate::unit::{FigureId, Unit};
use std::rc::Rc;
use yew::{Callback, Event, Html, MouseEvent, Properties, TargetCast, component, html};

/// Share of the lowest setting at which a build-up is stopped first. Common practice.
const FIRST_STOP: f64 = 0.6;

/// Properties of [`GatePanel`].
#[derive(Clone, PartialEq, Properties)]
pub struct GatePanelProps {
    /// The gate.
    pub gate: Gate,
    /// True where they stand in full further up: only how far they are ticked is told here.
    pub told: bool,
    /// Unit: settings to stop under.
    pub unit: Rc<Unit>,
    /// Units.
    pub prefs: UnitPrefs,
    /// Longest full-stroke hold (s) and temperature rise (K/s), where computed.
    pub hold: Option<(f64, f64)>,
    /// An edit.
    pub on_change: Callback<Change>,
}

/// The panel.
#[component]
pub fn GatePanel(props: &GatePanelProps) -> Html {
    let gate = &props.gate;
    let testid = format!("gate-{}", gate.check.id);
    match gate.barred {
        Some(Barred::RunsOn) => {
            return html! {
                <Caution grade={Grade::Danger} title="stop work" {testid}>
                    <p>{ "It keeps going with the lever in neutral. Nothing is read on it standing on its wheels or tracks." }</p>
                </Caution>
            };
        }
        Some(Barred::Alone) => {
            return html! {
                <Caution grade={Grade::Danger} title="not alone" {testid}>
                    <p>{ format!("{}: high pressure, or a machine that may move with force. Somebody has to stand by to stop the \
                        engine and fetch help. These fields stay closed while you are alone on site.", gate.check.title) }</p>
                </Caution>
            };
        }
        Some(Barred::AloneNotAsked) => {
            return html! {
                <Caution grade={Grade::Danger} title={gate.check.title} {testid}>
                    <Choice<bool>
                        name={format!("alone-{}", gate.check.id)}
                        label="Alone on site?"
                        options={vec![Opt::new(true, "Yes, alone", "yes"), Opt::new(false, "No, somebody is with me", "no")]}
                        value={None::<bool>}
                        on_change={props.on_change.reform(|answer| Change::Alone(Some(answer)))}
                    />
                </Caution>
            };
        }
        None => {}
    }
    let is_done = gate.is_ticked() && gate.fresh;
    if props.told {
        return html! {
            <p class="gate-told">
                { format!("{}: {} of {} precautions ticked, further up.", gate.check.title, ticked_now(gate), gate.facts.len()) }
            </p>
        };
    }
    let grade = if gate.check.hazard >= NEVER_ALONE {
        Grade::Danger
    } else {
        Grade::Caution
    };
    if is_done && props.told {
        return html! { <p class="gate-told">{ gate.check.title }{ ": precautions ticked." }</p> };
    }
    if is_done {
        return html! {
            <div class="gate is-open" data-testid={testid}>
                { held(props) }
                <details class="advice">
                    <summary>{ format!("{}: {} precautions ticked", gate.check.title, gate.facts.len()) }</summary>
                    { facts(props) }
                    { steps(gate) }
                    { restarted(props) }
                </details>
            </div>
        };
    }
    html! {
        <Caution {grade} title={gate.check.title} class="gate" {testid}>
            if gate.is_ticked() {
                <p>{ "The ticks are more than 15 minutes old: look again before the next reading." }</p>
            }
            { held(props) }
            { how(gate) }
            <p class="gate-ask">{ format!("Tick each as you see it is so ({} of {}):", ticked_now(gate), gate.facts.len()) }</p>
            { facts(props) }
        </Caution>
    }
}

fn ticked_now(gate: &Gate) -> usize {
    if gate.fresh { gate.ticked.len() } else { 0 }
}

/// How the check is made, folded.
fn how(gate: &Gate) -> Html {
    if gate.check.how.is_empty() {
        return Html::default();
    }
    html! {
        <details class="advice">
            <summary>{ "How it is done" }</summary>
            { steps(gate) }
        </details>
    }
}

fn steps(gate: &Gate) -> Html {
    html! { <ol class="gate-how">{ for gate.check.how.iter().map(|step| html! { <li><Retold text={*step} /></li> }) }</ol> }
}

/// What holds for the ordinary checks of a group: told once, nothing to tick.
pub fn advice(gates: &[Gate]) -> Html {
    let ordinary: Vec<&Gate> = gates
        .iter()
        .filter(|gate| !gate.is_gated() && gate.barred.is_none())
        .collect();
    let mut facts: Vec<&'static str> = Vec::new();
    for fact in ordinary.iter().flat_map(|gate| gate.facts.iter()) {
        if !facts.contains(fact) {
            facts.push(fact);
        }
    }
    if facts.is_empty() {
        return Html::default();
    }
    html! {
        <details class="advice">
            <summary>{ "Before you start" }</summary>
            <ul>{ for facts.into_iter().map(|fact| html! { <li><Retold text={fact} /></li> }) }</ul>
            { for ordinary.into_iter().filter(|gate| !gate.check.how.is_empty()).map(|gate| html! {
                <div class="advice-how">
                    <strong>{ gate.check.title }</strong>
                    { steps(gate) }
                </div>
            }) }
        </details>
    }
}

/// The facts. A tick is only for this condition.
fn facts(props: &GatePanelProps) -> Html {
    let gate = &props.gate;
    html! {
        <div class="gate-facts">
            { for gate.facts.iter().enumerate().map(|(place, fact)| {
                let is_set = gate.fresh && gate.ticked.iter().any(|ticked| ticked == fact);
                let (gate, on_change, fact) = (gate.clone(), props.on_change.clone(), *fact);
                let on_tick = Callback::from(move |event: Event| {
                    let is_set = event.target_unchecked_into::<web_sys::HtmlInputElement>().checked();
                    let kept = gate.with(fact, is_set, &clock::now());
                    on_change.emit(Change::Precautions(gate.check.id.to_owned(), kept));
                });
                html! {
                    <label class="tick" key={fact}>
                        <input
                            type="checkbox"
                            checked={is_set}
                            onchange={on_tick}
                            data-testid={format!("precaution-{}-{place}", props.gate.check.id)}
                        />
                        <span><Retold text={fact} /></span>
                    </label>
                }
            }) }
        </div>
    }
}

/// A restart makes every tick void: the machine may stand differently now.
fn restarted(props: &GatePanelProps) -> Html {
    let id = props.gate.check.id;
    let on_click = props.on_change.reform(|_: MouseEvent| Change::Restarted);
    html! {
        <button type="button" class="button is-quiet" onclick={on_click} data-testid={format!("untick-{id}")}>
            { RESTARTED }
        </button>
    }
}

/// What the button says that takes every tick back.
pub const RESTARTED: &str = "Engine was stopped and started again";

/// For a held machine: seconds, heat, the pressure to stop at, and what is no stop.
fn held(props: &GatePanelProps) -> Html {
    if props.gate.doing != Doing::Held {
        return Html::default();
    }
    html! {
        <div class="gate-held">
            if let Some((seconds, rise)) = props.hold {
                <p class="gate-hold" data-testid="hold">
                    { "Full stroke: hold " }
                    <strong class="figure">{ full_stroke(seconds, &props.prefs) }</strong>
                    { " at most, then rest 60 s. The oil heats by about " }
                    <strong class="figure">{ rise_words(rise, &props.prefs) }</strong>
                    { " each second." }
                </p>
            } else {
                <p class="gate-hold">{ "Seconds to hold are not computed yet. Do not hold full stroke." }</p>
            }
            <p data-testid="stop-at">{ stop_at(&props.unit, &props.prefs) }</p>
            { cautions::at(Stands::Held) }
        </div>
    }
}

/// Seconds of a hold at full stroke: never more than common practice, whatever the oil would bear.
pub fn full_stroke(computed: f64, prefs: &UnitPrefs) -> String {
    seconds_words(computed.min(PLATEAU_S), prefs)
}

pub fn seconds_words(seconds: f64, prefs: &UnitPrefs) -> String {
    // Down, never up: this protects.
    let (seconds, places) = if seconds >= 10.0 {
        (seconds.floor(), 0)
    } else {
        ((seconds * 10.0).floor() / 10.0, 1)
    };
    Measure::from_base(seconds.max(0.0), Kind::Time).map_or_else(
        |_| String::from("0 s"),
        |time| {
            quantity::format_with_unit(
                time,
                quantity::Unit::Second,
                Decimals::Fixed(places),
                prefs.mark(),
            )
        },
    )
}

pub fn rise_words(rise: f64, prefs: &UnitPrefs) -> String {
    Measure::from_base(rise, Kind::TemperatureDifference)
        .map_or_else(|_| String::from("?"), |rise| prefs.print(rise))
}

/// The lowest setting that is known, bar, and its name.
fn lowest_setting(unit: &Unit) -> Option<(f64, &'static str)> {
    [
        (FigureId::LoopRelief, "loop relief"),
        (FigureId::Limiter, "pressure limiter"),
    ]
    .into_iter()
    .filter_map(|(id, name)| unit.known(id).map(|bar| (bar, name)))
    .min_by(|one, other| one.0.total_cmp(&other.0))
}

/// The pressure to stop at first, bar; none where no setting is known.
pub fn first_stop(unit: &Unit) -> Option<f64> {
    lowest_setting(unit).map(|(bar, _)| FIRST_STOP * bar)
}

/// The pressure to stop at first: a share of the lowest setting that is known.
pub fn stop_at(unit: &Unit, prefs: &UnitPrefs) -> String {
    match lowest_setting(unit) {
        Some((bar, name)) => format!(
            "Stop first at {} (60 % of the {name} setting), then look before going on. Never over {}.",
            words::value(Port::LoopA, FIRST_STOP * bar, prefs),
            words::value(Port::LoopA, bar, prefs),
        ),
        None => String::from(
            "No loop relief setting in the profile: take it from the unit’s manual or the stamp on the cartridge first, and stop \
             at 60 % of it.",
        ),
    }
}
