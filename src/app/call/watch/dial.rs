//! The dial: three quarters of a circle as on a gauge, with the sector in which a healthy needle stands.

use crate::assessment::Window;
use crate::call::watch::Dial;
use crate::call::words;
use crate::math;
use crate::quantity::UnitPrefs;
use crate::readings::Port;
use crate::readings::instrument::Instrument;
use yew::{Html, html};

/// Middle of the drawing.
const MIDDLE: (f64, f64) = (160.0, 150.0);
/// Radius of the scale.
const SCALE: f64 = 118.0;
/// Where the foot of the scale is, degrees clockwise from the right, and how far it goes.
const FOOT: f64 = 135.0;
const SWEEP: f64 = 270.0;
/// Narrowest sector that is still seen from afar, as a share of the scale.
const NARROWEST: f64 = 0.025;

fn point(place: f64, radius: f64) -> (f64, f64) {
    let angle = (FOOT + SWEEP * place) * std::f64::consts::PI / 180.0;
    (
        MIDDLE.0 + radius * math::cos(angle),
        MIDDLE.1 + radius * math::sin(angle),
    )
}

fn arc(from: f64, to: f64, radius: f64) -> String {
    let ((x1, y1), (x2, y2)) = (point(from, radius), point(to, radius));
    let large = u8::from(SWEEP * (to - from) > 180.0);
    format!("M{x1:.1} {y1:.1}A{radius} {radius} 0 {large} 1 {x2:.1} {y2:.1}")
}

/// The sector from the hub to the scale.
fn sector(from: f64, to: f64) -> String {
    let ((x1, y1), (x2, y2)) = (point(from, SCALE + 14.0), point(to, SCALE + 14.0));
    let large = u8::from(SWEEP * (to - from) > 180.0);
    let radius = SCALE + 14.0;
    format!(
        "M{} {}L{x1:.1} {y1:.1}A{radius} {radius} 0 {large} 1 {x2:.1} {y2:.1}Z",
        MIDDLE.0, MIDDLE.1
    )
}

/// Decimals that a step of the scale needs.
fn decimals(step: f64) -> u8 {
    match step {
        step if step >= 1.0 => 0,
        step if step >= 0.1 => 1,
        step if step >= 0.01 => 2,
        _ => 3,
    }
}

/// The drawing, with the pressure (base unit) to stop at; none where nothing is expected that could be drawn.
pub fn draw(
    window: &Window,
    port: Port,
    instrument: Option<&Instrument>,
    stop: Option<f64>,
    prefs: &UnitPrefs,
) -> Option<Html> {
    let shown = |base: f64| words::shown(port, base, prefs);
    // A pull shown as vacuum runs the other way round.
    let ordered = |(one, other): (f64, f64)| (one.min(other), one.max(other));
    let band = ordered((shown(window.low)?, shown(window.high)?));
    let span = instrument.and_then(|instrument| {
        let ends = (
            shown(instrument.span_low.base_of(port.kind())?)?,
            shown(instrument.span_high.base_of(port.kind())?)?,
        );
        Some(ordered(ends))
    });
    let dial = Dial::of(span, band)?;
    let (mut from, mut to) = (dial.place(band.0), dial.place(band.1));
    if to - from < NARROWEST {
        let middle = f64::midpoint(from, to).clamp(NARROWEST / 2.0, 1.0 - NARROWEST / 2.0);
        (from, to) = (middle - NARROWEST / 2.0, middle + NARROWEST / 2.0);
    }
    let (low, high) = words::ends(port, window.low, window.high, prefs);
    let places = decimals(dial.step);
    let stop = stop
        .and_then(shown)
        .map(|stop| dial.place(stop))
        .filter(|place| *place < 1.0);
    let read = window.read.and_then(shown).map(|read| dial.place(read));
    Some(html! {
        <svg
            class="watch-dial"
            viewBox="0 0 320 262"
            role="img"
            aria-label={format!("Dial. A healthy needle stands from {low} to {high}.")}
            data-testid="watch-dial"
        >
            <path d={arc(0.0, 1.0, SCALE)} class="dial-track" />
            if let Some(stop) = stop {
                <path d={arc(stop, 1.0, SCALE + 16.0)} class="dial-stop" data-testid="watch-stop-mark" />
            }
            <path d={sector(from, to)} class="dial-band" data-testid="watch-band" />
            { for dial.figures().into_iter().map(|figure| {
                let place = dial.place(figure);
                let ((x1, y1), (x2, y2)) = (point(place, SCALE - 10.0), point(place, SCALE + 10.0));
                let (x, y) = point(place, SCALE - 31.0);
                html! { <>
                    <line x1={format!("{x1:.1}")} y1={format!("{y1:.1}")} x2={format!("{x2:.1}")} y2={format!("{y2:.1}")} class="dial-mark" />
                    <text x={format!("{x:.1}")} y={format!("{:.1}", y + 6.0)} class="dial-figure">{ words::tick(figure, places, prefs.mark()) }</text>
                </> }
            }) }
            if let Some(place) = read {
                { needle(place) }
            }
            <circle cx={MIDDLE.0.to_string()} cy={MIDDLE.1.to_string()} r="11" class="dial-hub" />
            <text x={MIDDLE.0.to_string()} y="222" class="dial-unit">{ words::unit_of(port, prefs).symbol() }</text>
        </svg>
    })
}

/// What was written down already.
fn needle(place: f64) -> Html {
    let (x, y) = point(place, SCALE - 4.0);
    html! {
        <line
            x1={MIDDLE.0.to_string()}
            y1={MIDDLE.1.to_string()}
            x2={format!("{x:.1}")}
            y2={format!("{y:.1}")}
            class="dial-needle"
            data-testid="watch-needle"
        />
    }
}
