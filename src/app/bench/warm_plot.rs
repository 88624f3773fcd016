//! Leakage over pressure, one curve a temperature: what was run with a full line and its points, what the fit tells of other
//! temperatures dashed and named so.

use super::codes;
use super::plot::{Curve, Room, Spot, drawing};
use super::screen::Told;
use crate::bench::stand::leakage::{AtTemperature, Leak, over_temperatures};
use crate::bench::stand::{BenchReport, BenchSheet};
use crate::quantity::{Measure, Unit, UnitPrefs};
use yew::{Html, html};

/// The figure; nothing without a fit and an oil.
pub(super) fn figure(told: &Told, sheet: &BenchSheet, prefs: &UnitPrefs) -> Html {
    let report = &*told.0;
    let oil = sheet.oil().map(|(oil, _)| oil);
    let Some((leak, curves)) = over_temperatures(report, oil.as_ref()) else {
        return html! {};
    };
    let pressure = codes::shown(prefs, Unit::Bar);
    let flow = codes::shown(prefs, Unit::LitrePerMinute);
    let factor =
        |base: Unit, unit: Unit| Measure::literal(1.0, base).try_in_unit(unit).unwrap_or(1.0);
    let (bar, litre) = (
        factor(Unit::Bar, pressure),
        factor(Unit::LitrePerMinute, flow),
    );
    let (low, high) = report.losses.covered.difference;
    let mut dashes = 0;
    let lines: Vec<Curve> = curves
        .iter()
        .map(|curve| {
            let is_extrapolated = curve.is_extrapolated();
            dashes += usize::from(is_extrapolated);
            Curve {
                name: name(curve, prefs),
                line: curve
                    .line
                    .iter()
                    .map(|(x, y, u)| (x * bar, y * litre, 2.0 * u * litre))
                    .collect(),
                drawn: if is_extrapolated {
                    (0.0, f64::MAX)
                } else {
                    (low * bar * 0.97, high * bar * 1.03)
                },
                // Full where it was run, so that a dash means one thing here.
                style: if is_extrapolated {
                    format!("is-{dashes}")
                } else {
                    "is-0".to_owned()
                },
                has_mark: !is_extrapolated,
            }
        })
        .collect();
    let spots: Vec<Spot> = curves
        .iter()
        .enumerate()
        .flat_map(|(at, curve)| spots(report, leak, at, curve, (bar, litre)))
        .collect();
    let title = match leak {
        Leak::Case => "Leakage out of the case, by oil temperature",
        Leak::Flow => "Flow lost, by oil temperature, at the speed in the middle of the run",
    };
    let words = (
        format!("Pressure difference, {}", pressure.symbol()),
        flow.symbol(),
    );
    let room = Room {
        ends: Some((0.0, f64::MAX)),
        is_for_curves: true,
    };
    drawing(title, (&words.0, words.1), &lines, &spots, prefs, room)
}

fn name(curve: &AtTemperature, prefs: &UnitPrefs) -> String {
    let unit = codes::shown(prefs, Unit::DegreeCelsius);
    let shown = Measure::literal(curve.celsius, Unit::DegreeCelsius)
        .try_in_unit(unit)
        .unwrap_or(curve.celsius);
    let run = if curve.is_extrapolated() {
        "extrapolated"
    } else {
        "run"
    };
    format!("{shown:.0} {}, {run}", unit.symbol())
}

fn spots(
    report: &BenchReport,
    leak: Leak,
    at: usize,
    curve: &AtTemperature,
    (bar, litre): (f64, f64),
) -> Vec<Spot> {
    curve
        .points
        .iter()
        .filter_map(|index| {
            let figure = report.evaluated.points.get(*index)?.get(&leak.quantity())?;
            Some(Spot {
                x: report.points.get(*index)?.means.difference()? * bar,
                y: figure.value * litre,
                half: figure.expanded() * litre,
                curve: at,
                is_out: false,
            })
        })
        .collect()
}
