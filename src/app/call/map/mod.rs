//! The loop on one drawing: where each gauge goes, and how what it reads stands. Touching a port opens its readings.

mod circuit;
mod plan;
mod symbols;

use super::mark;
use super::side::Sides;
use super::steady::Answer;
use super::taken::Taken;
use super::words;
use crate::assessment::{Assessment, Standing};
use crate::readings::{Path, Port};
use crate::unit::{Fitted, Ticks};
use plan::{Label, Spot};
use yew::{Callback, Html, KeyboardEvent, MouseEvent, Properties, component, html, use_state};

/// Half the width of the touch area round a port, units of the drawing: 44 px or more on a phone 360 px wide.
const HALF_TOUCH: f64 = 29.0;

/// Properties of [`LoopMap`].
#[derive(Clone, PartialEq, Properties)]
pub struct LoopMapProps {
    /// What the unit has.
    pub ticks: Ticks,
    /// Readings there are.
    pub taken: Vec<Taken>,
    /// Ports that are there twice.
    pub sides: Sides,
    /// Last answer of the engine.
    pub assessment: Option<Answer>,
    /// Port whose readings are open.
    pub chosen: Option<Port>,
    /// A port was touched.
    pub on_port: Callback<Port>,
}

/// How a port stands: no reading asked for, or the gravest standing among its readings, and how many there are.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct PortState {
    /// Gravest standing; none where there is no reading.
    pub standing: Option<Standing>,
    /// Where the port is there twice and only one side is low or high: that side.
    pub side: Option<Path>,
    /// Readings.
    pub count: usize,
}

/// The state of a port.
pub fn state(
    port: Port,
    sides: Sides,
    readings: &[Taken],
    assessment: Option<&Assessment>,
) -> PortState {
    let gravity = |standing: &Standing| match standing {
        Standing::Open => 0,
        Standing::Within => 1,
        Standing::CannotTell => 2,
        Standing::Edge => 3,
        Standing::Low => 4,
        Standing::High => 5,
    };
    let windows = assessment
        .map(|assessment| assessment.windows.as_slice())
        .unwrap_or_default();
    let here = readings.iter().filter(|reading| reading.port == port);
    let standings: Vec<(Path, Standing)> = here
        .map(|reading| {
            let window = windows.iter().find(|window| window.reading == reading.id);
            let standing = window.map_or(Standing::Open, |window| window.standing);
            (reading.path, standing)
        })
        .collect();
    let gravest = standings
        .iter()
        .map(|(_, standing)| *standing)
        .max_by_key(gravity);
    let is_off = |path: Path| {
        let mut own = standings.iter().filter(|(other, _)| *other == path);
        own.any(|(_, standing)| matches!(standing, Standing::Low | Standing::High))
    };
    let side = match (is_off(Path::Left), is_off(Path::Right)) {
        (true, false) => sides.side(port, Path::Left),
        (false, true) => sides.side(port, Path::Right),
        _ => None,
    };
    PortState {
        standing: gravest,
        side,
        count: standings.len(),
    }
}

/// How a port stands, in words: `right low` where only that side is off.
fn standing_words(standing: Standing, side: Option<Path>) -> String {
    match side {
        Some(side) => format!("{} {}", side.words(), words::standing(standing)),
        None => words::standing(standing).to_owned(),
    }
}

/// What a screen reader says of a port. It starts with the words that stand on the screen, so that they can be spoken to it.
fn spoken(port: Port, shown: &str, state: PortState) -> String {
    let name = port.words();
    match (state.standing, state.count) {
        (None, _) => format!("{shown}: {name}, no reading. Add one."),
        (Some(standing), 1) => {
            format!(
                "{shown} {}: {name}, one reading. Open it.",
                standing_words(standing, state.side)
            )
        }
        (Some(standing), count) => {
            format!(
                "{shown} {}: {name}, {count} readings. Open them.",
                standing_words(standing, state.side)
            )
        }
    }
}

/// The drawing, with the ports that have no place on it under it.
#[component]
pub fn LoopMap(props: &LoopMapProps) -> Html {
    let view = format!("0 0 {} {}", plan::WIDTH, plan::HEIGHT);
    let assessment = props.assessment.as_deref();
    let spots = plan::spots(&props.ticks);
    let elsewhere = plan::elsewhere(&props.ticks);
    let is_open = use_state(|| false);
    let on_fold = {
        let is_open = is_open.clone();
        Callback::from(move |_: MouseEvent| is_open.set(!*is_open))
    };
    html! {
        <section class={if *is_open { "panel loop-map is-open" } else { "panel loop-map" }} aria-labelledby="map-title" id="map" tabindex="-1">
            <div class="loop-map-head">
                <h2 id="map-title">{ "Loop and gauge ports" }</h2>
                // Only where there is no room to have it open always.
                <button
                    type="button"
                    class="button is-quiet loop-map-fold"
                    aria-expanded={if *is_open { "true" } else { "false" }}
                    aria-controls="map-body"
                    data-testid="map-fold"
                    onclick={on_fold}
                >
                    { if *is_open { "Fold" } else { "Show" } }
                </button>
            </div>
            <div class="loop-map-body" id="map-body">
                if props.sides.any() {
                    <p class="soft small" data-testid="map-sides">
                        { "One side is drawn: left and right are alike. Readings are marked with their side. Only one pump? Say so in the profile." }
                    </p>
                }
                <svg class="loop-map-drawing" viewBox={view} role="group" aria-label="Closed loop with its gauge ports">
                    { circuit::draw(&props.ticks) }
                    { for spots.iter().map(|spot| {
                        let state = state(spot.port, props.sides, &props.taken, assessment);
                        port(spot, state, props.chosen == Some(spot.port), &props.on_port)
                    }) }
                </svg>
                <ul class="loop-map-others" aria-label="Read elsewhere">
                    { for elsewhere.into_iter().map(|port| other(port, state(port, props.sides, &props.taken, assessment), &props.on_port)) }
                </ul>
            </div>
        </section>
    }
}

/// A port without a place on the drawing.
fn other(port: Port, state: PortState, on_port: &Callback<Port>) -> Html {
    let on_port = on_port.clone();
    html! {
        <li key={format!("{port:?}")}>
            <button
                type="button"
                class="chip"
                aria-label={spoken(port, words::port_short(port), state)}
                data-testid={format!("map-{port:?}")}
                onclick={Callback::from(move |_: MouseEvent| on_port.emit(port))}
            >
                { small_mark(state) }
                { words::port_short(port) }
            </button>
        </li>
    }
}

fn small_mark(state: PortState) -> Html {
    html! {
        <svg class="badge-mark" viewBox="-13 -13 26 26" width="20" height="20" aria-hidden="true" focusable="false">
            { port_mark(state) }
        </svg>
    }
}

/// A plus where nothing is read yet, else the mark of the standing.
fn port_mark(state: PortState) -> Html {
    match state.standing {
        Some(standing) => mark::shape(standing),
        None => html! {
            <g class="mark is-none"><circle r="9.5" class="mark-body" /><path d="M-5 0H5M0 -5V5" class="mark-sign" /></g>
        },
    }
}

fn port(spot: &Spot, state: PortState, is_chosen: bool, on_port: &Callback<Port>) -> Html {
    let port = spot.port;
    let on_click = {
        let on_port = on_port.clone();
        Callback::from(move |_: MouseEvent| on_port.emit(port))
    };
    let on_key = {
        let on_port = on_port.clone();
        Callback::from(move |event: KeyboardEvent| {
            if event.key() == "Enter" || event.key() == " " {
                event.prevent_default();
                on_port.emit(port);
            }
        })
    };
    let (x, y, anchor) = match spot.label {
        Label::Below if spot.port == Port::Wheel => (0.0, 38.0, "is-middle"),
        Label::Below if spot.port == Port::Servo => (-10.0, 28.0, "is-middle"),
        Label::Below => (0.0, 28.0, "is-middle"),
        Label::Above if spot.port == Port::EngineSpeed => (
            6.0,
            if state.standing.is_some() {
                -38.0
            } else {
                -25.0
            },
            "is-middle",
        ),
        Label::Above => (
            0.0,
            if state.standing.is_some() {
                -33.0
            } else {
                -18.0
            },
            "is-middle",
        ),
        Label::Left => (
            -18.0,
            if state.standing.is_some() { -2.0 } else { 5.0 },
            "is-end",
        ),
        Label::Right => (
            18.0,
            if state.standing.is_some() { -2.0 } else { 5.0 },
            "is-start",
        ),
    };
    let word = state.standing.map(|standing| {
        html! {
            <text
                x={x.to_string()}
                y={(y + 15.0).to_string()}
                class={format!("port-word {anchor} is-{}", words::standing_class(standing))}
            >
                { standing_words(standing, state.side) }
            </text>
        }
    });
    let name = if spot.fitted == Fitted::Maybe {
        format!("{} ?", spot.name)
    } else {
        spot.name.to_owned()
    };
    let half = HALF_TOUCH.to_string();
    html! {
        <g
            key={format!("{port:?}")}
            class={format!("port {}{}", plan::class(spot.fitted), if is_chosen { " is-chosen" } else { "" })}
            transform={format!("translate({} {})", spot.x, spot.y)}
            role="button"
            tabindex="0"
            aria-label={spoken(port, &name, state)}
            data-testid={format!("map-{port:?}")}
            onclick={on_click}
            onkeydown={on_key}
        >
            <rect
                x={format!("-{half}")} y={format!("-{half}")}
                width={(2.0 * HALF_TOUCH).to_string()} height={(2.0 * HALF_TOUCH).to_string()}
                rx="8" class="port-touch"
            />
            <circle r="15" class="port-ground" />
            { port_mark(state) }
            <text x={x.to_string()} y={y.to_string()} class={format!("port-name {anchor}")}>{ name }</text>
            // Not drawn: parts the two for whoever reads the text of it.
            { " " }
            { word }
        </g>
    }
}
