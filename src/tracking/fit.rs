//! Weighted least squares by Gauss–Newton, with a stated width for every unknown.
//!
//! In units of those widths the normal equations are `1 + JᵀJ`: never singular, so a factorisation of 14 rows by the small
//! Cholesky of the ranking does, and a linear-algebra crate would be carried for nothing.

use super::law::{self, Datum, Prior, SIZE, State};
use super::run::{Machine, Run};
use crate::math;
use crate::ranking::{Gauss, LN_TWO_PI};

/// Step for the slopes, in widths: central differences, good to about 1e-10.
const STEP: f64 = 1e-5;
/// Most steps.
const STEPS: usize = 60;
/// A step under this, in widths, is none.
const SETTLED: f64 = 1e-11;
/// Chance below which the scatter of the runs is more than their uncertainties allow.
const UNLIKELY: f64 = 0.05;

/// An estimate of every unknown.
#[derive(Clone, Debug)]
pub struct Fit {
    /// The values.
    pub x: State,
    /// Their covariance, row-major, as the stated uncertainties give it.
    pub covariance: Vec<f64>,
    /// Sum of squared residuals of the runs, each over its uncertainty.
    pub residual: f64,
    /// Degrees of freedom that the runs leave: figures less those that the unknowns took up. Not a whole number.
    pub freedom: f64,
    /// Figures that the runs gave.
    pub figures: usize,
    /// Each run's own residuals over their uncertainties: index of the run, residual.
    pub residuals: Vec<(usize, f64)>,
    /// ln of the chance of the runs under this prior, up to a constant that hangs on the runs alone.
    pub(super) log_evidence: f64,
}

/// One figure with the run that it is of.
pub(super) fn gather(machine: &Machine, runs: &[Run]) -> Vec<(usize, Datum)> {
    runs.iter()
        .enumerate()
        .filter(|(_, run)| run.check(machine).is_ok())
        .flat_map(|(at, run)| law::data(run, machine).into_iter().map(move |d| (at, d)))
        .collect()
}

/// Slopes of a figure in every unknown.
pub(super) fn slopes(x: &State, width: &State, foretold: impl Fn(&State) -> f64) -> State {
    let mut row = [0.0; SIZE];
    for (at, slope) in row.iter_mut().enumerate() {
        let step = STEP * width[at];
        let mut moved = *x;
        moved[at] = x[at] + step;
        let above = foretold(&moved);
        moved[at] = x[at] - step;
        *slope = (above - foretold(&moved)) / (2.0 * step);
    }
    row
}

fn cost(prior: &Prior, data: &[(usize, Datum)], z: &State) -> f64 {
    let x = placed(prior, z);
    let believed: f64 = z.iter().map(|z| z * z).sum();
    let seen: f64 = data
        .iter()
        .map(|(_, d)| (d.value - d.foretold(&x)) / d.uncertainty)
        .map(|r| r * r)
        .sum();
    believed + seen
}

/// From widths to values.
fn placed(prior: &Prior, z: &State) -> State {
    let mut x = prior.centre;
    for (at, x) in x.iter_mut().enumerate() {
        *x += prior.width[at] * z[at];
    }
    x
}

/// The normal equations at a state, in widths: matrix `1 + JᵀJ`, downhill direction, and the rows of J.
fn normal(prior: &Prior, data: &[(usize, Datum)], z: &State) -> (Vec<f64>, Vec<f64>, Vec<State>) {
    let x = placed(prior, z);
    let mut matrix = vec![0.0; SIZE * SIZE];
    let mut down: Vec<f64> = z.iter().map(|z| -z).collect();
    for at in 0..SIZE {
        matrix[at * SIZE + at] = 1.0;
    }
    let mut rows = Vec::with_capacity(data.len());
    for (_, d) in data {
        let mut row = slopes(&x, &prior.width, |x| d.foretold(x));
        for (slope, width) in row.iter_mut().zip(&prior.width) {
            *slope *= width / d.uncertainty;
        }
        let residual = (d.value - d.foretold(&x)) / d.uncertainty;
        for i in 0..SIZE {
            down[i] += row[i] * residual;
            for j in 0..SIZE {
                matrix[i * SIZE + j] += row[i] * row[j];
            }
        }
        rows.push(row);
    }
    (matrix, down, rows)
}

/// Fits the runs that can be used. With none of them it answers with what was believed before.
#[must_use]
pub fn fit(machine: &Machine, runs: &[Run], prior: &Prior) -> Fit {
    solve(&gather(machine, runs), prior)
}

pub(super) fn solve(data: &[(usize, Datum)], prior: &Prior) -> Fit {
    let mut z = [0.0; SIZE];
    let mut at = cost(prior, data, &z);
    for _ in 0..STEPS {
        let (matrix, down, _) = normal(prior, data, &z);
        let Some(solved) = Gauss::new(matrix, &down) else {
            break;
        };
        // The whole step where it helps, else the largest half of it that does.
        let mut share = 1.0;
        let moved = loop {
            let mut tried = z;
            for (t, step) in tried.iter_mut().zip(&solved.z) {
                *t += share * step;
            }
            let there = cost(prior, data, &tried);
            if there <= at || share < 1e-6 {
                break (there <= at).then_some((tried, there));
            }
            share *= 0.5;
        };
        let Some((tried, there)) = moved else {
            break;
        };
        z = tried;
        at = there;
        if share * solved.z.iter().fold(0.0_f64, |m, s| m.max(s.abs())) < SETTLED {
            break;
        }
    }
    finish(data, prior, &z)
}

fn finish(data: &[(usize, Datum)], prior: &Prior, z: &State) -> Fit {
    let x = placed(prior, z);
    let (matrix, _, rows) = normal(prior, data, z);
    let unit: Vec<f64> = (0..SIZE * SIZE)
        .map(|i| f64::from(u8::from(i % (SIZE + 1) == 0)))
        .collect();
    let (inverse, half_log_det) = match Gauss::new(matrix, &[0.0; SIZE]) {
        Some(g) => {
            let log_det = -g.log_density - 0.5 * SIZE as f64 * LN_TWO_PI;
            (g.precision, log_det)
        }
        None => (unit, 0.0),
    };
    let mut covariance = inverse.clone();
    for i in 0..SIZE {
        for j in 0..SIZE {
            covariance[i * SIZE + j] *= prior.width[i] * prior.width[j];
        }
    }
    let taken: f64 = rows.iter().map(|row| quadratic(&inverse, row)).sum();
    let residuals: Vec<(usize, f64)> = data
        .iter()
        .map(|(run, d)| (*run, (d.value - d.foretold(&x)) / d.uncertainty))
        .collect();
    let residual = residuals.iter().map(|(_, r)| r * r).sum();
    Fit {
        x,
        covariance,
        residual,
        freedom: (data.len() as f64 - taken).max(0.0),
        figures: data.len(),
        residuals,
        log_evidence: -0.5 * cost(prior, data, z) - half_log_det,
    }
}

/// `rowᵀ M row`.
pub(super) fn quadratic(matrix: &[f64], row: &State) -> f64 {
    times(matrix, row).iter().zip(row).map(|(a, b)| a * b).sum()
}

/// `M row`.
pub(super) fn times(matrix: &[f64], row: &State) -> State {
    let mut out = [0.0; SIZE];
    for (out, line) in out.iter_mut().zip(matrix.chunks(SIZE)) {
        *out = line.iter().zip(row).map(|(a, b)| a * b).sum();
    }
    out
}

impl Fit {
    /// Chance that runs which differ only by their stated uncertainties scatter as much as these. One where they leave less
    /// than one degree of freedom: then nothing can be said. (Chi-square by Wilson and Hilferty's cube root.)
    #[must_use]
    pub fn chance_of_scatter(&self) -> f64 {
        if self.freedom < 1.0 {
            return 1.0;
        }
        let spread = 2.0 / (9.0 * self.freedom);
        let root = math::pow(self.residual / self.freedom, 1.0 / 3.0);
        math::normal_cdf(-(root - (1.0 - spread)) / spread.sqrt())
    }

    /// Factor on all uncertainties where the runs scatter more than stated (Birge ratio); else one.
    #[must_use]
    pub fn widening(&self) -> f64 {
        if self.chance_of_scatter() < UNLIKELY {
            (self.residual / self.freedom).sqrt().max(1.0)
        } else {
            1.0
        }
    }

    /// Standard uncertainty of a combination of the unknowns, widened where the runs scatter.
    #[must_use]
    pub fn spread(&self, row: &State) -> f64 {
        quadratic(&self.covariance, row).max(0.0).sqrt() * self.widening()
    }

    /// Correlation of two unknowns.
    #[must_use]
    pub fn correlation(&self, one: usize, other: usize) -> f64 {
        let at = |i: usize, j: usize| self.covariance.get(i * SIZE + j).copied().unwrap_or(0.0);
        let both = (at(one, one) * at(other, other)).sqrt();
        if both > 0.0 {
            at(one, other) / both
        } else {
            0.0
        }
    }
}
