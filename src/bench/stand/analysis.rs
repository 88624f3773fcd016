//! All that follows from the points: derived displacement, efficiencies, losses, powers. Pure and repeatable, so that
//! [`super::uncertain`] can run it again with each instrument moved.

use super::channel::{Channel, Subject};
use super::flaw::Part;
use super::layout::{Layout, LayoutGap};
use super::least_squares::{Observation, solve};
use super::point::{Means, Point};
use crate::fluid::OilProperties;
use core::f64::consts::TAU;
use std::collections::BTreeMap;

/// Standard uncertainty of a flow by chance where it was read once, as a share. Common practice.
pub const FLOW_CHANCE: f64 = 0.003;
/// Least range of speeds, highest over lowest, from which a slope is taken.
const SPEED_RANGE: f64 = 1.3;
/// Pressure differences within this share, or this many bar, are one.
const ONE_PRESSURE: (f64, f64) = (0.06, 8.0);
/// Thousandths: cm³/rev × rpm to L/min.
const LITRE: f64 = 1e-3;
/// bar·cm³/rev to N·m, before 2π: 1e5 Pa × 1e-6 m³.
const BAR_CM3: f64 = 0.1;

/// What holds for all points.
#[derive(Clone, Debug, PartialEq)]
pub struct Setup {
    /// Subject.
    pub subject: Subject,
    /// Layout.
    pub layout: Layout,
    /// Displacement on the plate at the stroke of the run, cm³/rev.
    pub plate: Option<f64>,
    /// Displacement of the charge pump, cm³/rev.
    pub charge_displacement: Option<f64>,
    /// The oil.
    pub oil: Option<OilProperties>,
    /// Factor on its viscosity: 1, or moved to learn what the viscosity's doubt does.
    pub viscosity_factor: f64,
}

/// What is computed of a point.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Quantity {
    /// Volumetric efficiency (ISO 4391), 1 for 100 %.
    Volumetric,
    /// Hydro-mechanical efficiency (ISO 4391).
    HydroMechanical,
    /// Overall efficiency (ISO 4391).
    Overall,
    /// Flow lost at the high port against the derived displacement, L/min.
    FlowLost,
    /// Leakage out of the case, L/min.
    CaseLeakage,
    /// Torque lost, N·m.
    TorqueLost,
    /// Power at the shaft (input shaft of a whole drive), kW.
    ShaftPower,
    /// Hydraulic power of the high port over the low one; output shaft power of a whole drive, kW.
    OutPower,
    /// Flow at the high port, L/min.
    Flow,
}

impl Quantity {
    /// Every quantity.
    pub const ALL: [Quantity; 9] = [
        Quantity::Volumetric,
        Quantity::HydroMechanical,
        Quantity::Overall,
        Quantity::FlowLost,
        Quantity::CaseLeakage,
        Quantity::TorqueLost,
        Quantity::ShaftPower,
        Quantity::OutPower,
        Quantity::Flow,
    ];
}

/// Derived displacement (ISO 8426 manner): flow over speed at each pressure, the slopes followed to no pressure.
#[derive(Clone, Debug, PartialEq)]
pub struct Derived {
    /// cm³/rev.
    pub value: f64,
    /// Standard uncertainty by chance, cm³/rev.
    pub chance: f64,
    /// Pressure differences (bar) at which a slope was taken, with the slope (cm³/rev).
    pub slopes: Vec<(f64, f64)>,
}

/// Results of a point: each figure, or why there is none.
#[derive(Clone, Debug, PartialEq)]
pub struct PointResult {
    /// Figures.
    pub values: BTreeMap<Quantity, Result<f64, LayoutGap>>,
    /// Dynamic viscosity where it leaks, mPa·s.
    pub viscosity: Option<f64>,
}

impl PointResult {
    /// A figure, where there is one.
    #[must_use]
    pub fn get(&self, quantity: Quantity) -> Option<f64> {
        self.values.get(&quantity)?.ok()
    }
}

/// The analysis.
#[derive(Clone, Debug, PartialEq)]
pub struct Analysis {
    /// Derived displacement, where the table carries it.
    pub derived: Option<Derived>,
    /// Displacement that efficiencies use: derived, else that of the plate.
    pub displacement: Option<f64>,
    /// Results, point by point.
    pub points: Vec<PointResult>,
}

/// Computes everything. `chance` gives the standard uncertainty of a point's flow by chance.
#[must_use]
pub fn analyse(points: &[Point], setup: &Setup) -> Analysis {
    let derived = derive(points, setup);
    let displacement = derived.as_ref().map(|d| d.value).or(setup.plate);
    let results = points
        .iter()
        .map(|point| evaluate(&point.means, setup, displacement))
        .collect();
    Analysis {
        derived,
        displacement,
        points: results,
    }
}

/// Flow of a machine that does not leak, L/min, from cm³/rev and rpm.
#[must_use]
pub fn theoretical_flow(displacement: f64, speed: f64) -> f64 {
    displacement * speed * LITRE
}

/// Torque of a machine without friction, N·m, from cm³/rev and bar.
#[must_use]
pub fn theoretical_torque(displacement: f64, difference: f64) -> f64 {
    displacement * difference * BAR_CM3 / TAU
}

/// One point with a displacement.
#[must_use]
pub fn evaluate(means: &Means, setup: &Setup, displacement: Option<f64>) -> PointResult {
    let viscosity = means
        .leak_temperature()
        .zip(setup.oil.as_ref())
        .map(|(celsius, oil)| oil.dynamic_at(celsius) * setup.viscosity_factor);
    let values = if setup.subject == Subject::Transmission {
        whole_drive(means, setup)
    } else {
        machine(means, setup, displacement)
    };
    PointResult { values, viscosity }
}

fn state(means: &Means) -> Result<(f64, f64), LayoutGap> {
    let speed = means.get(Channel::Speed).filter(|speed| *speed > 0.0);
    speed.zip(means.difference()).ok_or(LayoutGap::State)
}

/// A ratio, where what stands below the line is above zero.
fn ratio(above: f64, below: f64) -> Result<f64, LayoutGap> {
    if below > 0.0 {
        Ok(above / below)
    } else {
        Err(LayoutGap::State)
    }
}

fn power(torque: f64, speed: f64) -> f64 {
    TAU * speed / 60.0 * torque * 1e-3
}

fn machine(
    means: &Means,
    setup: &Setup,
    displacement: Option<f64>,
) -> BTreeMap<Quantity, Result<f64, LayoutGap>> {
    let Setup {
        subject, layout, ..
    } = setup;
    let is_motor = *subject == Subject::Motor;
    let state = state(means);
    let volume = displacement.ok_or(LayoutGap::State);
    let flow = layout.high_flow(*subject, means);
    let torque = layout.torque(*subject, means, setup.charge_displacement);
    let case = layout.case_leakage(*subject, means);
    let both = |with_flow: bool, with_torque: bool| {
        let (speed, difference) = state?;
        let flow = if with_flow { flow? } else { 0.0 };
        let torque = if with_torque { torque? } else { 0.0 };
        Ok((speed, difference, flow, torque))
    };
    let volumetric = both(true, false).and_then(|(speed, _, flow, _)| {
        let theory = theoretical_flow(volume?, speed);
        if is_motor {
            ratio(theory, flow)
        } else {
            ratio(flow, theory)
        }
    });
    let hydro_mechanical = both(false, true).and_then(|(_, difference, _, torque)| {
        let theory = theoretical_torque(volume?, difference);
        if is_motor {
            ratio(torque, theory)
        } else {
            ratio(theory, torque)
        }
    });
    let shaft = both(false, true).map(|(speed, _, _, torque)| power(torque, speed));
    // From both ports, as ISO 4391 has it: what leaks is missing at the other port.
    let hydraulic = both(true, false).and_then(|(_, _, flow, _)| {
        let (low, high) = (means.get(Channel::Low), means.get(Channel::High));
        let (low, high) = low.zip(high).ok_or(LayoutGap::State)?;
        let leakage = case.unwrap_or(0.0);
        let other = if is_motor {
            flow - leakage
        } else {
            flow + leakage
        };
        Ok((high * flow - low * other) / 600.0)
    });
    let overall = shaft.and_then(|shaft| {
        if is_motor {
            ratio(shaft, hydraulic?)
        } else {
            ratio(hydraulic?, shaft)
        }
    });
    let flow_lost = both(true, false).and_then(|(speed, _, flow, _)| {
        let theory = theoretical_flow(volume?, speed);
        Ok(if is_motor {
            flow - theory
        } else {
            theory - flow
        })
    });
    let torque_lost = both(false, true).and_then(|(_, difference, _, torque)| {
        let theory = theoretical_torque(volume?, difference);
        Ok(if is_motor {
            theory - torque
        } else {
            torque - theory
        })
    });
    [
        (Quantity::Volumetric, volumetric),
        (Quantity::HydroMechanical, hydro_mechanical),
        (Quantity::Overall, overall),
        (Quantity::FlowLost, flow_lost),
        (Quantity::CaseLeakage, case),
        (Quantity::TorqueLost, torque_lost),
        (Quantity::ShaftPower, shaft),
        (Quantity::OutPower, hydraulic),
        (Quantity::Flow, flow),
    ]
    .into_iter()
    .collect()
}

fn whole_drive(means: &Means, setup: &Setup) -> BTreeMap<Quantity, Result<f64, LayoutGap>> {
    let torque = setup
        .layout
        .torque(setup.subject, means, setup.charge_displacement);
    let speed = means.get(Channel::Speed).ok_or(LayoutGap::State);
    let shaft = torque.and_then(|torque| Ok(power(torque, speed?)));
    let out = means
        .get(Channel::OutTorque)
        .zip(means.get(Channel::OutSpeed))
        .map(|(torque, speed)| power(torque, speed))
        .ok_or(LayoutGap::State);
    let overall = shaft.and_then(|shaft| ratio(out?, shaft));
    [
        (Quantity::Overall, overall),
        (Quantity::ShaftPower, shaft),
        (Quantity::OutPower, out),
    ]
    .into_iter()
    .collect()
}

/// Standard uncertainty of a point's flow by chance, L/min: by its scatter, or [`FLOW_CHANCE`] where it was read once.
pub(super) fn flow_chance(point: &Point) -> Option<f64> {
    let flow = point.means.get(Channel::Flow)?;
    let least = FLOW_CHANCE * flow.abs().max(1.0);
    Some(
        point
            .scatter
            .get(&Channel::Flow)
            .map_or(least, |u| u.max(0.3 * least)),
    )
}

fn derive(points: &[Point], setup: &Setup) -> Option<Derived> {
    if setup.subject == Subject::Transmission {
        return None;
    }
    let mut seen: Vec<(f64, f64, f64, f64)> = points
        .iter()
        .filter(|point| point.counts_for(&[Part::Flow]))
        .filter_map(|point| {
            let (speed, difference) = state(&point.means).ok()?;
            let flow = setup.layout.high_flow(setup.subject, &point.means).ok()?;
            Some((difference, speed, flow, flow_chance(point)?))
        })
        .collect();
    seen.sort_by(|a, b| a.0.total_cmp(&b.0));
    let mut slopes: Vec<(f64, f64, f64)> = Vec::new();
    let mut start = 0;
    while start < seen.len() {
        let within = (ONE_PRESSURE.0 * seen[start].0.abs()).max(ONE_PRESSURE.1);
        let end = start
            + seen[start..]
                .iter()
                .take_while(|s| s.0 <= seen[start].0 + within)
                .count();
        slopes.extend(slope(&seen[start..end]));
        start = end;
    }
    let listed: Vec<(f64, f64)> = slopes.iter().map(|s| (s.0, s.1)).collect();
    let line: Vec<Observation> = slopes
        .iter()
        .map(|(difference, slope, sigma)| Observation {
            row: vec![1.0, *difference],
            seen: *slope,
            sigma: *sigma,
        })
        .collect();
    // Followed to no pressure where at least three pressures were run; of one or two the lowest stands as it is.
    let (value, chance) = match slopes.len() {
        0 => return None,
        1 | 2 => (slopes[0].1, slopes[0].2),
        _ => {
            let fit = solve(&line)?;
            (fit.x[0], fit.standard(0) * fit.birge())
        }
    };
    (value > 0.0).then_some(Derived {
        value,
        chance,
        slopes: listed,
    })
}

/// Slope of flow over speed in cm³/rev, with the mean pressure and its uncertainty; none where the speeds lie too close.
fn slope(seen: &[(f64, f64, f64, f64)]) -> Option<(f64, f64, f64)> {
    let low = seen.iter().map(|s| s.1).fold(f64::MAX, f64::min);
    let high = seen.iter().map(|s| s.1).fold(0.0, f64::max);
    if high < SPEED_RANGE * low {
        return None;
    }
    let line: Vec<Observation> = seen
        .iter()
        .map(|(_, speed, flow, sigma)| Observation {
            row: vec![1.0, speed * LITRE],
            seen: *flow,
            sigma: *sigma,
        })
        .collect();
    let fit = solve(&line)?;
    let mean = seen.iter().map(|s| s.0).sum::<f64>() / seen.len() as f64;
    Some((mean, fit.x[1], fit.standard(1) * fit.birge()))
}
