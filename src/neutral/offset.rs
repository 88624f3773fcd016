//! From creep, a loop difference or servo pressures to the swash offset, through the solved circuit.
//!
//! A reading is no constant times the offset: near null both sides of a held loop rest on charge until the offset's flow
//! exceeds what the high side leaks, and free wheels stand until the loop overcomes their breakaway. There the answer is
//! one-sided: how far off the swash can be at most.

use super::belief::{Belief, before, places};
use super::response::{LARGEST, Machine, Shows, machines};
use crate::math;
use crate::readings::Condition;
use crate::unit::Unit;

/// A reading in neutral.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Taken {
    /// What was read.
    pub shows: Shows,
    /// Engine and oil; what the machine does follows from what was read.
    pub condition: Condition,
    /// Value: rpm of the wheel (forward positive) or bar (A over B positive).
    pub value: f64,
    /// Its standard uncertainty, same unit.
    pub uncertainty: f64,
}

/// What an offset comes to.
#[derive(Clone, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Offset {
    /// Mean, share of full stroke, forward positive.
    pub mean: f64,
    /// 95 % interval, low end.
    pub low: f64,
    /// 95 % interval, high end.
    pub high: f64,
    /// How far the statement goes.
    pub says: Says,
    /// All of it.
    pub belief: Belief,
}

/// How far a statement about an offset goes.
#[derive(Clone, Copy, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub enum Says {
    /// Off by the interval given, on a known side.
    Off,
    /// The reading rests in a dead zone: off by no more than `under` (share of stroke) either way, 95 %.
    Within {
        /// Largest offset that still fits, share of stroke.
        under: f64,
    },
    /// The interval holds null, but the reading is no dead zone: more readings would tell.
    Either,
    /// Off by at least the near end of the interval: the reading is at the end of what can show.
    AtLeast,
}

/// Share of the weight inside an interval.
const INSIDE: f64 = 0.95;
/// A reading speaks of a place on its curve when it is this many standard uncertainties from zero.
const SPEAKS: f64 = 2.0;

/// The offset that one or more readings of the same adjustment give. `None` where no machine of the ensemble could show them.
///
/// The interval holds the unit's own scatter, the instruments, and what the circuit does not know of ([`Shows::discrepancy`]).
#[must_use]
pub fn offset(unit: &Unit, taken: &[Taken]) -> Option<Offset> {
    let asked: Vec<(Shows, Condition)> = taken.iter().map(|t| (t.shows, t.condition)).collect();
    let ensemble = machines(unit, &asked);
    offset_of(&ensemble, taken)
}

/// As [`offset`], over an ensemble made for these readings.
#[must_use]
pub fn offset_of(ensemble: &[Machine], taken: &[Taken]) -> Option<Offset> {
    let at = places();
    let mut mass = vec![0.0; at.len()];
    // Each machine of the ensemble is as likely as the next; what it makes of the readings weighs it.
    let logs: Vec<Vec<f64>> = ensemble
        .iter()
        .map(|machine| {
            at.iter()
                .map(|s| log_likelihood(machine, taken, *s))
                .collect()
        })
        .collect();
    let top = logs
        .iter()
        .flatten()
        .copied()
        .fold(f64::NEG_INFINITY, f64::max);
    if !top.is_finite() {
        return None;
    }
    for of_machine in &logs {
        for (sum, log) in mass.iter_mut().zip(of_machine) {
            *sum += math::exp(log - top);
        }
    }
    let with_prior: Vec<f64> = at
        .iter()
        .zip(&mass)
        .map(|(s, sum)| {
            if *sum > 0.0 {
                math::ln(*sum) + before(*s)
            } else {
                f64::NEG_INFINITY
            }
        })
        .collect();
    let belief = Belief::from_logs(&with_prior)?;
    let (low, high) = (
        belief.quantile(0.5 * (1.0 - INSIDE)),
        belief.quantile(0.5 * (1.0 + INSIDE)),
    );
    let says = says(&belief, low, high, taken);
    Some(Offset {
        mean: belief.mean(),
        low,
        high,
        says,
        belief,
    })
}

/// How well an offset of a machine explains the readings, log.
pub(super) fn log_likelihood(machine: &Machine, taken: &[Taken], offset: f64) -> f64 {
    taken
        .iter()
        .zip(&machine.curves)
        .map(|(taken, curve)| {
            let shown = curve.value(offset);
            let wide = together(taken.uncertainty, taken.shows.discrepancy() * shown);
            let z = (taken.value - shown) / wide;
            -0.5 * z * z - math::ln(wide)
        })
        .sum()
}

/// Root of the sum of squares, never zero.
fn together(one: f64, other: f64) -> f64 {
    (one * one + other * other).sqrt().max(1e-9)
}

fn says(belief: &Belief, low: f64, high: f64, taken: &[Taken]) -> Says {
    let speaks = taken
        .iter()
        .any(|taken| taken.value.abs() > SPEAKS * taken.uncertainty);
    if belief.above(0.9 * LARGEST) > 0.025 || 1.0 - belief.above(-0.9 * LARGEST) > 0.025 {
        return Says::AtLeast;
    }
    if low > 0.0 || high < 0.0 {
        return Says::Off;
    }
    if speaks {
        Says::Either
    } else {
        Says::Within {
            under: belief.size_quantile(INSIDE),
        }
    }
}

/// What an offset in `belief` would build or show: 95 % of it lies between the first and the last, the middle is the median.
/// For a reading that is not taken yet, such as the difference that a held motor would let rise.
#[must_use]
pub fn would_show(
    unit: &Unit,
    shows: Shows,
    condition: &Condition,
    belief: &Belief,
) -> Option<Foretold> {
    let ensemble = machines(unit, &[(shows, *condition)]);
    let mut points = Vec::new();
    for curve in ensemble.iter().filter_map(|machine| machine.curves.first()) {
        points.extend(
            belief
                .points()
                .filter(|(_, weight)| *weight > 1e-6)
                .map(|(at, weight)| (curve.value(at), weight)),
        );
    }
    let shown = Belief::from_points(points)?;
    Some(Foretold {
        low: shown.quantile(0.025),
        middle: shown.quantile(0.5),
        high: shown.quantile(0.975),
    })
}

/// A reading foretold, in its own unit (rpm or bar).
#[derive(Clone, Copy, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Foretold {
    /// Low end of 95 %.
    pub low: f64,
    /// Median.
    pub middle: f64,
    /// High end of 95 %.
    pub high: f64,
}

impl Foretold {
    /// The larger end, either way.
    #[must_use]
    pub fn largest(self) -> f64 {
        self.low.abs().max(self.high.abs())
    }
}
