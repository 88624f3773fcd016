//! The window of a reading, drawn and in words: the healthy band with its ends, the middle, the reading with what its
//! instrument leaves open, where the window comes from and what widens it most.

use super::scale::{self, Scale};
use super::{mark, words};
use crate::assessment::{Standing, Window};
use crate::quantity::UnitPrefs;
use crate::readings::Port;
use yew::{Html, Properties, component, html};

/// Height of the drawing, px. Text keeps its size however wide the row is.
const HEIGHT: &str = "66";
/// Where the band lies, px from the top.
const TRACK: f64 = 33.0;

/// Room that the figure at the low end of the window takes, per cent of the width.
const CLEAR_OF_LABEL: f64 = 20.0;

/// Properties of [`WindowScale`].
#[derive(Clone, PartialEq, Properties)]
pub struct WindowScaleProps {
    /// Port.
    pub port: Port,
    /// Window.
    pub window: Window,
    /// Units.
    pub prefs: UnitPrefs,
    /// True where everything behind the window is to be told.
    pub full: bool,
    /// End of the test ids.
    pub number: usize,
}

/// Width of a figure's character, and of the narrowest row, px.
const CHARACTER: f64 = 8.2;
const NARROW_ROW: f64 = 260.0;

/// The figure at the high end of the window: under its edge where there is room, else against the end of the row, else without
/// its unit, which stands in the sentence below.
fn high_end(layout: &Scale, text: &str, y: &str) -> Html {
    let room = |text: &str| text.chars().count() as f64 * CHARACTER / NARROW_ROW * 100.0;
    if layout.high + room(text) > 100.0 && layout.low + 2.0 < 100.0 - room(text) {
        return html! { <text x="100%" y={y.to_owned()} class="scale-figure is-last">{ text.to_owned() }</text> };
    }
    let text = if layout.high + room(text) > 100.0 {
        text.split(['\u{a0}', '\u{202f}', ' '])
            .next()
            .unwrap_or(text)
    } else {
        text
    };
    html! {
        <svg x={format!("{:.2}%", layout.high)} y={y.to_owned()} class="scale-at">
            <text x="-4" class="scale-figure is-high">{ text.to_owned() }</text>
        </svg>
    }
}

/// The drawing and its words.
#[component]
pub fn WindowScale(props: &WindowScaleProps) -> Html {
    let (window, port, prefs) = (&props.window, props.port, &props.prefs);
    let (low, high) = words::ends(port, window.low, window.high, prefs);
    let layout = scale::lay_out(
        window.low,
        window.middle,
        window.high,
        window.read,
        window.instrument,
    );
    let lead = if window.swings {
        "A healthy needle swings here, about"
    } else {
        "Healthy:"
    };
    html! {
        <div class="window">
            if let Some(layout) = layout {
                { draw(&layout, window, port, prefs, (&low, &high)) }
            }
            <p class="window-words" data-testid={format!("window-{}", props.number)}>
                { lead }{ " " }<strong class="figure">{ format!("{low} to {high}") }</strong>
                { ", " }{ words::source(window.source) }
                if !window.widest.is_empty() {
                    <span class="soft">{ "; widened most by " }{ window.widest.clone() }</span>
                }
                { "." }
                // Seen while a newer answer is being worked out.
                <span class="window-updating">{ " Updating…" }</span>
            </p>
            if let Some(remark) = &window.remark {
                <p class="window-remark">{ remark.clone() }</p>
            }
            if let Some(since) = &window.since_bench {
                <p class="window-remark" data-testid={format!("since-bench-{}", props.number)}>
                    { sentence(&words::since_bench(since, prefs)) }
                </p>
            }
            if props.full {
                { basis(window, port, prefs) }
            }
        </div>
    }
}

/// Words as a sentence of their own.
fn sentence(words: &str) -> String {
    let mut letters = words.chars();
    let first = letters.next().map(char::to_uppercase);
    first
        .into_iter()
        .flatten()
        .chain(letters)
        .chain(['.'])
        .collect()
}

/// What the window was computed for, its middle, and what the instrument leaves open.
fn basis(window: &Window, port: Port, prefs: &UnitPrefs) -> Html {
    html! {
        <ul class="window-basis">
            if !window.basis.is_empty() {
                <li>{ "For: " }{ window.basis.clone() }</li>
            }
            <li>{ "Middle: " }{ words::value(port, window.middle, prefs) }</li>
            if window.instrument > 0.0 && window.read.is_some() {
                <li>
                    { "The instrument alone: " }
                    { words::spread(port, window.instrument * 2.0, prefs) }
                    { " (95 in 100)" }
                </li>
            }
        </ul>
    }
}

/// What a screen reader says of the drawing.
fn spoken(window: &Window, port: Port, prefs: &UnitPrefs, ends: (&str, &str)) -> String {
    let read = window.read.map_or_else(String::new, |read| {
        format!(
            "Read {}: {}. ",
            words::value(port, read, prefs),
            words::standing(window.standing)
        )
    });
    format!("{read}Expected {} to {}.", ends.0, ends.1)
}

fn draw(
    layout: &Scale,
    window: &Window,
    port: Port,
    prefs: &UnitPrefs,
    ends: (&str, &str),
) -> Html {
    let at = |per_cent: f64| format!("{per_cent:.2}%");
    let y = |offset: f64| format!("{}", TRACK + offset);
    // The bare track starts at the quantity's zero where nothing can lie under it.
    let is_signed = matches!(
        port,
        Port::LoopDifference | Port::InletPull | Port::SettledTemperature
    );
    let start = layout
        .zero
        .filter(|_| !is_signed)
        .unwrap_or(0.0)
        .clamp(0.0, layout.low);
    html! {
        <svg class="scale" width="100%" height={HEIGHT} role="img" aria-label={spoken(window, port, prefs, ends)}>
            <rect x={at(start)} y={y(-3.0)} width={at(100.0 - start)} height="6" class="scale-track" />
            if start > 0.0 {
                <line x1={at(start)} x2={at(start)} y1={y(-8.0)} y2={y(8.0)} class="scale-end" />
                if layout.low - start > CLEAR_OF_LABEL {
                    <text x={at(start)} y={y(27.0)} class="scale-figure is-zero">{ "0" }</text>
                }
            }
            <rect x={at(layout.low)} y={y(-10.0)} width={at(layout.high - layout.low)} height="20" class="scale-window" />
            <line x1={at(layout.low)} x2={at(layout.low)} y1={y(-10.0)} y2={y(10.0)} class="scale-edge" />
            <line x1={at(layout.high)} x2={at(layout.high)} y1={y(-10.0)} y2={y(10.0)} class="scale-edge" />
            <line x1={at(layout.middle)} x2={at(layout.middle)} y1={y(-10.0)} y2={y(10.0)} class="scale-middle" />
            <svg x={at(layout.low)} y={y(27.0)} class="scale-at">
                <text x="4" class="scale-figure is-low">{ ends.0.to_owned() }</text>
            </svg>
            { high_end(layout, ends.1, &y(27.0)) }
            if let Some((from, to)) = layout.whisker {
                <line x1={at(from)} x2={at(to)} y1={y(0.0)} y2={y(0.0)} class="scale-whisker" />
                <line x1={at(from)} x2={at(from)} y1={y(-6.0)} y2={y(6.0)} class="scale-whisker" />
                <line x1={at(to)} x2={at(to)} y1={y(-6.0)} y2={y(6.0)} class="scale-whisker" />
            }
            if let Some(read) = layout.read {
                <svg x={at(read)} y={y(0.0)} class="scale-at">
                    { mark::shape(window.standing) }
                    <text y="-18" class={format!("scale-read is-{}", words::standing_class(window.standing))}>
                        { words::value(port, window.read.unwrap_or_default(), prefs) }
                    </text>
                </svg>
            } else if window.standing == Standing::Open {
                <text x="50%" y="16" class="scale-figure is-note">{ "what a healthy unit shows" }</text>
            }
        </svg>
    }
}
