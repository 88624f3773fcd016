//! Pictures: efficiency and flow lost over pressure with their bands, the measured points, and the map over speed and pressure. Told
//! apart by marks and dashes, so that they can be printed and read without colour.

use super::codes;
use super::screen::Told;
use super::warm_plot;
use crate::app::call::bands::round_step;
use crate::app::parts::Section;
use crate::bench::stand::analysis::Quantity;
use crate::bench::stand::fit::LossFit;
use crate::bench::stand::flaw::Part;
use crate::bench::stand::{BenchSheet, Channel};
use crate::quantity::{Unit, UnitPrefs};
use std::rc::Rc;
use yew::{Html, Properties, component, html};

/// Size of a drawing, in its own units, and the room kept for words.
const WIDE: f64 = 480.0;
const HIGH: f64 = 300.0;
const LEFT: f64 = 56.0;
const BELOW: f64 = 44.0;
const TOP: f64 = 16.0;
const RIGHT: f64 = 16.0;
/// Steps of a curve.
const STEPS: usize = 32;
/// Speeds within this share are one curve.
const ONE_SPEED: f64 = 0.06;
/// Most curves of a drawing: marks and dashes are that many.
const CURVES: usize = 4;

/// Properties of [`Pictures`].
#[derive(Clone, PartialEq, Properties)]
pub struct PicturesProps {
    /// What the sheet comes to.
    pub told: Told,
    /// The sheet.
    pub sheet: Rc<BenchSheet>,
    /// Units of measure.
    pub prefs: UnitPrefs,
}

/// From figures to the drawing.
#[derive(Clone, Copy)]
struct Axes {
    x: (f64, f64),
    y: (f64, f64),
}

impl Axes {
    fn at(&self, x: f64, y: f64) -> (f64, f64) {
        let share = |v: f64, (low, high): (f64, f64)| (v - low) / (high - low);
        (
            LEFT + share(x, self.x) * (WIDE - LEFT - RIGHT),
            HIGH - BELOW - share(y, self.y).clamp(-0.02, 1.02) * (HIGH - BELOW - TOP),
        )
    }

    fn path(&self, points: &[(f64, f64)]) -> String {
        let text: Vec<String> = points
            .iter()
            .map(|(x, y)| {
                let (x, y) = self.at(*x, *y);
                format!("{x:.1},{y:.1}")
            })
            .collect();
        text.join(" ")
    }
}

/// Figures along an axis: about five.
fn marks((low, high): (f64, f64)) -> Vec<f64> {
    let step = round_step((high - low) / 5.0);
    let first = (low / step).ceil();
    (0..12)
        .map(|i| (first + f64::from(i)) * step)
        .take_while(|v| *v <= high * (1.0 + 1e-9))
        .collect()
}

/// A measured point with the half height of its doubt.
pub(super) struct Spot {
    pub(super) x: f64,
    pub(super) y: f64,
    pub(super) half: f64,
    pub(super) curve: usize,
    /// Left out of fit and verdict: drawn as a cross.
    pub(super) is_out: bool,
}

/// A curve with its band; the line is drawn from one x to another, beyond it the band alone stands.
pub(super) struct Curve {
    pub(super) name: String,
    /// x, y, half height of the band.
    pub(super) line: Vec<(f64, f64, f64)>,
    pub(super) drawn: (f64, f64),
    /// Class of the line, which gives the dashes.
    pub(super) style: String,
    /// True where points carry it, so that it has a mark.
    pub(super) has_mark: bool,
}

/// What the frame holds.
#[derive(Clone, Copy, Default)]
pub(super) struct Room {
    /// Lowest and highest that can be.
    pub(super) ends: Option<(f64, f64)>,
    /// True where curves without points are to be seen whole, with their names at their ends.
    pub(super) is_for_curves: bool,
}

fn frame(axes: Axes, x_words: &str, y_words: &str, prefs: &UnitPrefs) -> Html {
    let text = |value: f64| {
        let text = if value.abs() >= 10.0 || value.fract() == 0.0 {
            format!("{value:.0}")
        } else {
            format!("{value:.1}")
        };
        match prefs.mark() {
            crate::quantity::DecimalMark::Comma => text.replace('.', ","),
            crate::quantity::DecimalMark::Point => text,
        }
    };
    html! { <>
        { for marks(axes.x).into_iter().map(|value| {
            let (x, bottom) = axes.at(value, axes.y.0);
            html! { <>
                <line class="bench-grid" x1={format!("{x:.1}")} y1={format!("{TOP}")} x2={format!("{x:.1}")} y2={format!("{bottom:.1}")} />
                <text class="bench-mark" x={format!("{x:.1}")} y={format!("{:.1}", bottom + 16.0)} text-anchor="middle">{ text(value) }</text>
            </> }
        }) }
        { for marks(axes.y).into_iter().map(|value| {
            let (left, y) = axes.at(axes.x.0, value);
            html! { <>
                <line class="bench-grid" x1={format!("{left:.1}")} y1={format!("{y:.1}")} x2={format!("{:.1}", WIDE - RIGHT)} y2={format!("{y:.1}")} />
                <text class="bench-mark" x={format!("{:.1}", left - 6.0)} y={format!("{:.1}", y + 4.0)} text-anchor="end">{ text(value) }</text>
            </> }
        }) }
        <text class="bench-axis" x={format!("{:.1}", 0.5 * (WIDE + LEFT))} y={format!("{:.1}", HIGH - 6.0)} text-anchor="middle">{ x_words }</text>
        <text class="bench-axis" x="12" y={format!("{:.1}", 0.5 * (HIGH - BELOW))} text-anchor="middle"
            transform={format!("rotate(-90 12 {:.1})", 0.5 * (HIGH - BELOW))}>{ y_words }</text>
    </> }
}

/// A mark of its own for each curve: round, square, diamond, triangle.
fn mark(curve: usize, x: f64, y: f64) -> Html {
    let class = format!("bench-spot is-{curve}");
    match curve {
        0 => html! { <circle {class} cx={format!("{x:.1}")} cy={format!("{y:.1}")} r="4.5" /> },
        1 => {
            html! { <rect {class} x={format!("{:.1}", x - 4.5)} y={format!("{:.1}", y - 4.5)} width="9" height="9" /> }
        }
        2 => {
            html! { <polygon {class} points={format!("{x:.1},{:.1} {:.1},{y:.1} {x:.1},{:.1} {:.1},{y:.1}", y - 6.0, x + 6.0, y + 6.0, x - 6.0)} /> }
        }
        _ => {
            html! { <polygon {class} points={format!("{x:.1},{:.1} {:.1},{:.1} {:.1},{:.1}", y - 6.0, x + 5.5, y + 4.5, x - 5.5, y + 4.5)} /> }
        }
    }
}

/// A cross where a point was left out.
fn cross(x: f64, y: f64) -> Html {
    let (left, right, top, bottom) = (x - 5.0, x + 5.0, y - 5.0, y + 5.0);
    let d = format!(
        "M{left:.1} {top:.1}L{right:.1} {bottom:.1}M{left:.1} {bottom:.1}L{right:.1} {top:.1}"
    );
    html! { <path class="bench-doubt" {d} /> }
}

pub(super) fn drawing(
    title: &str,
    (x_words, y_words): (&str, &str),
    curves: &[Curve],
    spots: &[Spot],
    prefs: &UnitPrefs,
    room: Room,
) -> Html {
    let xs = spots
        .iter()
        .map(|spot| spot.x)
        .chain(curves.iter().flat_map(|c| c.line.iter().map(|p| p.0)));
    let high_x = xs.fold(1.0_f64, f64::max);
    let ys = spots
        .iter()
        .flat_map(|spot| [spot.y - spot.half, spot.y + spot.half])
        .chain(
            curves
                .iter()
                .filter(|_| room.is_for_curves)
                .flat_map(|curve| {
                    curve
                        .line
                        .iter()
                        .flat_map(|(_, y, half)| [y - half, y + half])
                }),
        );
    let (mut low, mut high) = ys.fold((f64::MAX, f64::MIN), |(low, high), y| {
        (low.min(y), high.max(y))
    });
    if low > high {
        return html! {};
    }
    let margin = 0.1 * (high - low).max(0.05 * high.abs().max(0.1));
    low -= margin;
    high += margin;
    if let Some((least, most)) = room.ends {
        low = low.max(least);
        high = high.min(most).max(low + 0.01);
    }
    let axes = Axes {
        x: (0.0, high_x * 1.05),
        y: (low, high),
    };
    html! {
        <figure class="bench-figure">
            <figcaption>{ title }</figcaption>
            <svg viewBox={format!("0 0 {WIDE} {HIGH}")} role="img" aria-label={title.to_owned()}>
                { frame(axes, x_words, y_words, prefs) }
                { for curves.iter().enumerate().map(|(at, curve)| {
                    let upper = curve.line.iter().map(|(x, y, half)| (*x, y + half));
                    let lower = curve.line.iter().rev().map(|(x, y, half)| (*x, y - half));
                    let band: Vec<(f64, f64)> = upper.chain(lower).collect();
                    let middle = |is_in: bool| -> Vec<(f64, f64)> {
                        let (from, to) = curve.drawn;
                        curve.line.iter().filter(|(x, ..)| (*x >= from && *x <= to) == is_in).map(|(x, y, _)| (*x, *y)).collect()
                    };
                    html! { <>
                        <polygon class={format!("bench-band is-{at}")} points={axes.path(&band)} />
                        <polyline class={format!("bench-curve {}", curve.style)} points={axes.path(&middle(true))} />
                        if room.is_for_curves { { end_name(axes, curve) } }
                    </> }
                }) }
                { for spots.iter().map(|spot| {
                    let (x, y) = axes.at(spot.x, spot.y);
                    let (_, top) = axes.at(spot.x, spot.y + spot.half);
                    let (_, bottom) = axes.at(spot.x, spot.y - spot.half);
                    html! { <>
                        <line class="bench-doubt" x1={format!("{x:.1}")} x2={format!("{x:.1}")} y1={format!("{top:.1}")} y2={format!("{bottom:.1}")} />
                        if spot.is_out { { cross(x, y) } } else { { mark(spot.curve, x, y) } }
                    </> }
                }) }
            </svg>
            <ul class="bench-key">
                { for curves.iter().enumerate().map(|(at, curve)| html! {
                    <li>
                        <svg viewBox="0 0 40 14" aria-hidden="true">
                            <line class={format!("bench-curve {}", curve.style)} x1="0" x2="40" y1="7" y2="7" />
                            if curve.has_mark { { mark(at, 20.0, 7.0) } }
                        </svg>
                        { &curve.name }
                    </li>
                }) }
            </ul>
        </figure>
    }
}

/// A curve's name over its upper end.
fn end_name(axes: Axes, curve: &Curve) -> Html {
    let Some((x, y, _)) = curve.line.last() else {
        return html! {};
    };
    let (x, y) = axes.at(*x, *y);
    html! {
        <text class="bench-mark bench-name-of" x={format!("{x:.1}")} y={format!("{:.1}", (y - 6.0).max(TOP))} text-anchor="end">{ &curve.name }</text>
    }
}

/// Speeds of the run, each once.
fn speeds(told: &Told) -> Vec<f64> {
    let mut speeds: Vec<f64> = Vec::new();
    for point in &told.0.points {
        if let Some(n) = point.means.get(Channel::Speed).filter(|n| *n > 0.0)
            && !speeds.iter().any(|s| (s - n).abs() <= ONE_SPEED * s)
        {
            speeds.push(n);
        }
    }
    speeds.sort_by(f64::total_cmp);
    speeds.truncate(CURVES);
    speeds
}

fn spots(told: &Told, speeds: &[f64], quantity: Quantity, factor: f64, bar: f64) -> Vec<Spot> {
    let report = &*told.0;
    report
        .points
        .iter()
        .enumerate()
        .filter_map(|(at, point)| {
            let figure = report.evaluated.points[at].get(&quantity)?;
            let n = point.means.get(Channel::Speed)?;
            let curve = speeds.iter().position(|s| (s - n).abs() <= ONE_SPEED * s)?;
            Some(Spot {
                x: point.means.difference()? * bar,
                y: figure.value * factor,
                half: figure.expanded() * factor,
                curve,
                is_out: !point.counts_for(Part::of(quantity)),
            })
        })
        .collect()
}

/// Curves of the fit, one a speed, at the viscosity in the middle of the run.
fn curves(
    losses: &LossFit,
    speeds: &[f64],
    bar: f64,
    of: impl Fn(&LossFit, f64, f64, f64) -> Option<(f64, f64)>,
) -> Vec<Curve> {
    let covered = losses.covered;
    let mu = 0.5 * (covered.viscosity.0 + covered.viscosity.1);
    speeds
        .iter()
        .enumerate()
        .map(|(at, n)| {
            let (low, high) = covered.difference;
            let (from, to) = (0.3 * low, 1.15 * high);
            let line = (0..=STEPS)
                .filter_map(|i| {
                    let dp = from + (to - from) * i as f64 / STEPS as f64;
                    let (value, u) = of(losses, *n, dp, mu)?;
                    Some((dp * bar, value, 2.0 * u))
                })
                .collect();
            Curve {
                name: format!("{n:.0} rpm"),
                line,
                drawn: (low * bar * 0.97, high * bar * 1.03),
                style: format!("is-{at}"),
                has_mark: true,
            }
        })
        .collect()
}

/// The pictures.
#[component]
pub fn Pictures(props: &PicturesProps) -> Html {
    let report = &*props.told.0;
    let speeds = speeds(&props.told);
    if report.points.len() < 2 || speeds.is_empty() {
        return html! {};
    }
    let pressure = codes::shown(&props.prefs, Unit::Bar);
    let bar = crate::quantity::Measure::literal(1.0, Unit::Bar)
        .try_in_unit(pressure)
        .unwrap_or(1.0);
    let flow = codes::shown(&props.prefs, Unit::LitrePerMinute);
    let litre = crate::quantity::Measure::literal(1.0, Unit::LitrePerMinute)
        .try_in_unit(flow)
        .unwrap_or(1.0);
    let x_words = format!("Pressure difference, {}", pressure.symbol());
    let efficiency = curves(&report.losses, &speeds, bar, |fit, n, dp, mu| {
        fit.foretell(n, dp, mu)
            .volumetric
            .map(|(v, u)| (v * 100.0, u * 100.0))
    });
    let overall = curves(&report.losses, &speeds, bar, |fit, n, dp, mu| {
        let (share, u) = fit.foretell(n, dp, mu).overall()?;
        Some((share * 100.0, u * 100.0))
    });
    let lost = curves(&report.losses, &speeds, bar, |fit, n, dp, mu| {
        fit.foretell(n, dp, mu)
            .flow_lost
            .map(|(v, u)| (v * litre, u * litre))
    });
    let share = Room {
        ends: Some((0.0, 105.0)),
        ..Room::default()
    };
    html! {
        <Section id="bench-pictures" title="Pictures" is_open=true>
            <p class="soft">{ "Points with their doubt; curves of the loss fit with their band at the middle viscosity of the run. Where no line is drawn in a \
                band, the fit goes beyond what was run. A cross is a point that is left out." }</p>
            <div class="bench-figures-grid">
                { drawing("Volumetric efficiency", (&x_words, "%"), &efficiency, &spots(&props.told, &speeds, Quantity::Volumetric, 100.0, bar), &props.prefs, share) }
                { drawing("Overall efficiency", (&x_words, "%"), &overall, &spots(&props.told, &speeds, Quantity::Overall, 100.0, bar), &props.prefs, share) }
                { drawing("Flow lost", (&x_words, flow.symbol()), &lost, &spots(&props.told, &speeds, Quantity::FlowLost, litre, bar), &props.prefs, Room::default()) }
                { warm_plot::figure(&props.told, &props.sheet, &props.prefs) }
                { residuals(&props.told, &props.prefs) }
                { map(&report.losses, &props.prefs, bar) }
            </div>
        </Section>
    }
}

/// What the fit leaves over, each over its doubt by chance: it should lie between −2 and 2 without a pattern.
fn residuals(told: &Told, prefs: &UnitPrefs) -> Html {
    let Ok(fit) = &told.0.losses.flow else {
        return html! {};
    };
    let spots: Vec<Spot> = fit
        .points
        .iter()
        .zip(&fit.sigma)
        .map(|((at, seen, foretold), sigma)| Spot {
            x: *at as f64 + 1.0,
            y: (seen - foretold) / sigma,
            half: 0.0,
            curve: 0,
            is_out: false,
        })
        .collect();
    let high = spots.iter().map(|s| s.y.abs()).fold(2.5_f64, f64::max);
    let axes = Axes {
        x: (0.0, spots.iter().map(|s| s.x).fold(1.0, f64::max) + 1.0),
        y: (-high * 1.1, high * 1.1),
    };
    let (left, zero) = axes.at(0.0, 0.0);
    html! {
        <figure class="bench-figure">
            <figcaption>{ "What the flow fit leaves over" }</figcaption>
            <svg viewBox={format!("0 0 {WIDE} {HIGH}")} role="img" aria-label="What the flow fit leaves over, point by point">
                { frame(axes, "Row of the run, in order", "over its doubt by chance", prefs) }
                <line class="bench-zero" x1={format!("{left:.1}")} x2={format!("{:.1}", WIDE - RIGHT)} y1={format!("{zero:.1}")} y2={format!("{zero:.1}")} />
                { for spots.iter().map(|spot| { let (x, y) = axes.at(spot.x, spot.y); mark(0, x, y) }) }
            </svg>
        </figure>
    }
}

/// Cells of the map each way.
const CELLS: usize = 6;

/// The map: overall efficiency at a grid of speeds and pressures, as figures in fields; in brackets where it was not run.
fn map(losses: &LossFit, prefs: &UnitPrefs, bar: f64) -> Html {
    if losses.flow.is_err() || losses.torque.is_err() {
        return html! {};
    }
    let covered = losses.covered;
    let mu = 0.5 * (covered.viscosity.0 + covered.viscosity.1);
    let pressure = codes::shown(prefs, Unit::Bar);
    let grid = |(low, high): (f64, f64), share: f64| -> Vec<f64> {
        let (from, to) = (low * (1.0 - share), high * (1.0 + share));
        (0..CELLS)
            .map(|i| from + (to - from) * i as f64 / (CELLS - 1) as f64)
            .collect()
    };
    let speeds = grid(covered.speed, 0.15);
    let pressures = grid(covered.difference, 0.15);
    let cell = |n: f64, dp: f64| {
        let told = losses.foretell(n, dp, mu);
        let (share, _) = told.overall()?;
        (0.0..=1.05)
            .contains(&share)
            .then_some((share, told.is_beyond))
    };
    html! {
        <figure class="bench-figure">
            <figcaption>{ "Overall efficiency over speed and pressure, %" }</figcaption>
            <div class="bench-scroll" tabindex="0" role="region" aria-label="Map of overall efficiency">
                <table class="bench-map" data-testid="bench-map">
                    <thead><tr>
                        <th scope="col">{ format!("{} \\ rpm", pressure.symbol()) }</th>
                        { for speeds.iter().map(|n| html! { <th scope="col">{ format!("{n:.0}") }</th> }) }
                    </tr></thead>
                    <tbody>
                        { for pressures.iter().rev().map(|dp| html! {
                            <tr>
                                <th scope="row">{ format!("{:.0}", dp * bar) }</th>
                                { for speeds.iter().map(|n| match cell(*n, *dp) {
                                    // Depth in tenths: darker is better; the figure says it without colour.
                                    Some((share, beyond)) => {
                                        let depth = ((share - 0.6) * 20.0).clamp(0.0, 7.0) as usize;
                                        let text = format!("{:.0}", share * 100.0);
                                        html! { <td class={format!("is-depth-{depth}")}>{ if beyond { format!("({text})") } else { text } }</td> }
                                    }
                                    None => html! { <td>{ "–" }</td> },
                                }) }
                            </tr>
                        }) }
                    </tbody>
                </table>
            </div>
            <p class="soft">{ "By the loss fit, at the middle viscosity of the run. In brackets: beyond what was run." }</p>
        </figure>
    }
}
