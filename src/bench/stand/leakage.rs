//! Leakage over pressure at each temperature that was run, and at others by the fit: what a technician compares with the manual's
//! curves. What was not run is marked, and its band widens with the distance.

use super::analysis::Quantity;
use super::channel::Channel;
use super::flaw::Part;
use super::report::BenchReport;
use crate::fluid::OilProperties;
use crate::readings::instrument::gum;

/// Points within so many K of the coldest of a group are of one temperature.
const ONE_TEMPERATURE: f64 = 4.0;
/// Temperatures that are told beside those that were run, °C, where none of these lies within [`NEAR`] K.
const OTHERS: [f64; 3] = [80.0, 60.0, 40.0];
/// K.
const NEAR: f64 = 8.0;
/// Most curves together.
const CURVES: usize = 4;
/// What an oil's viscosity index leaves open away from the temperature that was run, relative per K. Common practice: an index
/// that is off by 10 moves the viscosity by about 4 % over 20 K.
const PER_KELVIN: f64 = 0.002;
/// Steps of a curve.
const STEPS: usize = 32;

/// What leaks.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Leak {
    /// Out of the case.
    Case,
    /// All of it, at the high port, at the speed in the middle of the run.
    Flow,
}

impl Leak {
    /// The figure of a point.
    #[must_use]
    pub const fn quantity(self) -> Quantity {
        match self {
            Leak::Case => Quantity::CaseLeakage,
            Leak::Flow => Quantity::FlowLost,
        }
    }
}

/// Leakage over pressure at one temperature.
#[derive(Clone, Debug, PartialEq)]
pub struct AtTemperature {
    /// Oil where it leaks, °C.
    pub celsius: f64,
    /// Its viscosity, mPa·s.
    pub viscosity: f64,
    /// Points that were run there; none where it is extrapolated.
    pub points: Vec<usize>,
    /// Pressure difference (bar), leakage (L/min), its standard uncertainty.
    pub line: Vec<(f64, f64, f64)>,
}

impl AtTemperature {
    /// True where nothing was run at this temperature.
    #[must_use]
    pub fn is_extrapolated(&self) -> bool {
        self.points.is_empty()
    }
}

/// Curves of what leaks, coldest first: out of the case where that was fitted, else all that is lost. None without a fit or oil.
#[must_use]
pub fn over_temperatures(
    report: &BenchReport,
    oil: Option<&OilProperties>,
) -> Option<(Leak, Vec<AtTemperature>)> {
    let oil = oil?;
    let leak = match (&report.losses.case, &report.losses.flow) {
        (Ok(_), _) => Leak::Case,
        (Err(_), Ok(_)) => Leak::Flow,
        _ => return None,
    };
    let mut curves = measured(report, leak);
    let run: Vec<f64> = curves.iter().map(|curve| curve.celsius).collect();
    if run.is_empty() {
        return None;
    }
    let distance = |celsius: f64| {
        let each = run.iter().map(|run| (run - celsius).abs());
        each.fold(f64::MAX, f64::min)
    };
    let mut others: Vec<f64> = OTHERS.into_iter().filter(|c| distance(*c) > NEAR).collect();
    others.sort_by(|a, b| distance(*a).total_cmp(&distance(*b)));
    others.truncate(CURVES.saturating_sub(curves.len()));
    curves.extend(others.into_iter().map(|celsius| AtTemperature {
        celsius,
        viscosity: oil.dynamic_at(celsius),
        points: Vec::new(),
        line: Vec::new(),
    }));
    for curve in &mut curves {
        let open = if curve.is_extrapolated() {
            PER_KELVIN * distance(curve.celsius)
        } else {
            0.0
        };
        curve.line = line(report, leak, curve, open);
    }
    curves.retain(|curve| !curve.line.is_empty());
    curves.sort_by(|a, b| a.celsius.total_cmp(&b.celsius));
    Some((leak, curves))
}

/// Points that count, by temperature; of more groups than can be told apart those with the most points.
fn measured(report: &BenchReport, leak: Leak) -> Vec<AtTemperature> {
    let parts = Part::of(leak.quantity());
    let middle = middle(report.losses.covered.speed);
    let mut at: Vec<(f64, usize)> = report
        .points
        .iter()
        .enumerate()
        .filter(|(index, point)| {
            let has = report.evaluated.points[*index].contains_key(&leak.quantity());
            let speed = point.means.get(Channel::Speed).unwrap_or(0.0);
            // What is lost at the high port grows with speed too, by the oil pressed together.
            let is_near = leak == Leak::Case || (speed / middle - 1.0).abs() <= 0.3;
            has && is_near && point.counts_for(parts)
        })
        .filter_map(|(index, point)| Some((point.means.leak_temperature()?, index)))
        .collect();
    at.sort_by(|a, b| a.0.total_cmp(&b.0));
    let mut groups: Vec<Vec<(f64, usize)>> = Vec::new();
    for one in at {
        match groups.last_mut() {
            Some(group) if one.0 - group[0].0 <= ONE_TEMPERATURE => group.push(one),
            _ => groups.push(vec![one]),
        }
    }
    groups.sort_by_key(|group| core::cmp::Reverse(group.len()));
    groups.truncate(CURVES);
    groups
        .into_iter()
        .map(|group| {
            let count = group.len() as f64;
            let points: Vec<usize> = group.iter().map(|(_, index)| *index).collect();
            let viscosities = points
                .iter()
                .filter_map(|index| report.evaluated.analysis.points[*index].viscosity);
            AtTemperature {
                celsius: group.iter().map(|(celsius, _)| celsius).sum::<f64>() / count,
                viscosity: viscosities.sum::<f64>() / count,
                points,
                line: Vec::new(),
            }
        })
        .collect()
}

fn middle((low, high): (f64, f64)) -> f64 {
    0.5 * (low + high)
}

/// The curve by the fit.
fn line(
    report: &BenchReport,
    leak: Leak,
    curve: &AtTemperature,
    open: f64,
) -> Vec<(f64, f64, f64)> {
    let covered = report.losses.covered;
    let over_case = low_over_case(report, &curve.points);
    let (from, to) = (0.3 * covered.difference.0, 1.1 * covered.difference.1);
    (0..=STEPS)
        .filter_map(|step| {
            let difference = from + (to - from) * step as f64 / STEPS as f64;
            let mu = curve.viscosity;
            let (value, u) = match leak {
                Leak::Case => report.losses.case_leakage(difference, over_case, mu).ok()?,
                Leak::Flow => {
                    let speed = middle(covered.speed);
                    report.losses.foretell(speed, difference, mu).flow_lost?
                }
            };
            Some((difference, value, gum::combined(&[u, open * value])))
        })
        .collect()
}

/// Low line over the case, bar: mean of these points, else of all.
fn low_over_case(report: &BenchReport, points: &[usize]) -> f64 {
    let all: Vec<usize> = (0..report.points.len()).collect();
    let points = if points.is_empty() { &all } else { points };
    let over = |index: &usize| {
        let means = &report.points[*index].means;
        let case = means.get(Channel::CasePressure).unwrap_or(0.0);
        Some(means.get(Channel::Low)? - case)
    };
    let found: Vec<f64> = points.iter().filter_map(over).collect();
    if found.is_empty() {
        return 0.0;
    }
    found.iter().sum::<f64>() / found.len() as f64
}
