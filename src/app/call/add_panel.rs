//! Another reading: the last condition is carried over, so that the next value costs two touches.

use super::change::Change;
use super::condition_editor::ConditionEditor;
use super::side::{Sides, Wanted};
use super::words;
use crate::app::parts::{Choice, Icon, Opt, Shape};
use crate::quantity::{Kind, UnitPrefs};
use crate::readings::{Condition, Path, Port};
use crate::unit::Ticks;
use yew::{Callback, Html, MouseEvent, Properties, component, html, use_state};

/// Properties of [`AddPanel`].
#[derive(Clone, PartialEq, Properties)]
pub struct AddPanelProps {
    /// What the unit has: which ports are offered.
    pub ticks: Ticks,
    /// Ports that are there twice.
    pub sides: Sides,
    /// Condition of the last reading.
    pub last: Condition,
    /// Units.
    pub prefs: UnitPrefs,
    /// An edit.
    pub on_change: Callback<Change>,
}

/// Ports under one word.
const GROUPS: [(&str, &[Kind]); 4] = [
    ("Pressure", &[Kind::Pressure]),
    ("Flow", &[Kind::Flow]),
    ("Speed", &[Kind::RotationalSpeed, Kind::GroundSpeed]),
    (
        "Time, current, temperature",
        &[Kind::Time, Kind::Current, Kind::Temperature],
    ),
];

/// The button, and behind it condition and ports.
#[component]
pub fn AddPanel(props: &AddPanelProps) -> Html {
    let is_open = use_state(|| false);
    let own = use_state(|| None::<Condition>);
    let edits = use_state(|| false);
    let side = use_state(|| None::<Path>);
    let condition = own.unwrap_or(props.last);
    let toggle = |state: &yew::UseStateHandle<bool>| {
        let state = state.clone();
        Callback::from(move |_: MouseEvent| state.set(!*state))
    };
    let on_port = {
        let (sides, side) = (props.sides, *side);
        let (is_open, own, edits, on_change) = (
            is_open.clone(),
            own.clone(),
            edits.clone(),
            props.on_change.clone(),
        );
        Callback::from(move |port: Port| {
            is_open.set(false);
            own.set(None);
            edits.set(false);
            on_change.emit(Change::Add(wanted(sides, side, port, condition)));
        })
    };
    let on_condition = {
        let own = own.clone();
        Callback::from(move |condition: Condition| own.set(Some(condition)))
    };
    let on_side = {
        let side = side.clone();
        Callback::from(move |chosen: Option<Path>| side.set(chosen))
    };
    html! {
        <section class="panel add" aria-label="Add a reading" id="add" tabindex="-1">
            <button
                type="button"
                class="button is-main is-wide"
                aria-expanded={if *is_open { "true" } else { "false" }}
                data-testid="add-reading"
                onclick={toggle(&is_open)}
            >
                <Icon shape={if *is_open { Shape::Cross } else { Shape::Plus }} />
                { if *is_open { "Close" } else { "Add a reading" } }
            </button>
            if *is_open {
                <div class="add-condition">
                    <p>
                        <span class="soft">{ "In: " }</span>
                        <strong>{ words::condition(&condition, &props.prefs) }</strong>
                        <span class="soft">{ ", " }{ words::oil(&condition, &props.prefs) }</span>
                    </p>
                    <button
                        type="button"
                        class="button is-quiet"
                        aria-expanded={if *edits { "true" } else { "false" }}
                        data-testid="add-condition"
                        onclick={toggle(&edits)}
                    >
                        { if *edits { "Done" } else { "Other condition" } }
                    </button>
                </div>
                if *edits {
                    <ConditionEditor name="add" {condition} sides={props.sides} prefs={props.prefs.clone()} on_change={on_condition} />
                }
                if props.sides.any() {
                    <Choice<Option<Path>>
                        name="add-side"
                        label="Side"
                        options={side_options()}
                        value={Some(*side)}
                        on_change={on_side}
                    />
                }
                { for GROUPS.iter().map(|(title, kinds)| port_group(title, kinds, &props.ticks, &on_port)) }
            }
        </section>
    }
}

fn side_options() -> Vec<Opt<Option<Path>>> {
    vec![
        Opt::new(None, "Both", "both"),
        Opt::new(Some(Path::Left), "Left", "left"),
        Opt::new(Some(Path::Right), "Right", "right"),
    ]
}

/// The readings of a touch: both sides, or the one asked for; one where the port is there once.
fn wanted(sides: Sides, side: Option<Path>, port: Port, condition: Condition) -> Vec<Wanted> {
    match side.filter(|_| sides.has(port)) {
        Some(path) => vec![Wanted {
            path,
            port,
            condition,
        }],
        None => sides.wanted(port, condition).collect(),
    }
}

fn port_group(title: &str, kinds: &[Kind], ticks: &Ticks, on_port: &Callback<Port>) -> Html {
    let offered: Vec<Port> = ticks
        .ports()
        .filter(|port| kinds.contains(&port.kind()))
        .collect();
    if offered.is_empty() {
        return Html::default();
    }
    html! {
        <div class="add-group">
            <h3>{ title.to_owned() }</h3>
            <ul class="chips">
                { for offered.into_iter().map(|port| {
                    let on_port = on_port.clone();
                    html! {
                        <li key={format!("{port:?}")}>
                            <button
                                type="button"
                                class="chip"
                                aria-label={port.words()}
                                data-testid={format!("add-{port:?}")}
                                onclick={Callback::from(move |_: MouseEvent| on_port.emit(port))}
                            >
                                { words::port_short(port) }
                            </button>
                        </li>
                    }
                }) }
            </ul>
        </div>
    }
}
