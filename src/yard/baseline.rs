//! A unit's own earlier checks as the yardstick, from the third check on.

use super::robust::median;

/// Earlier checks that it takes.
pub const EARLIER: usize = 2;
/// How many checks the stated uncertainty counts for beside the scatter of the earlier ones.
const STATED: f64 = 3.0;

/// What a unit's own checks have shown so far.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Baseline {
    /// Median of the earlier checks.
    pub middle: f64,
    /// Standard uncertainty of a new reading against it.
    pub uncertainty: f64,
    /// Earlier checks.
    pub checks: usize,
}

impl Baseline {
    /// From the earlier values, oldest first, and the standard uncertainty of one reading. None under [`EARLIER`] values.
    #[must_use]
    pub fn of(earlier: &[f64], one: f64) -> Option<Baseline> {
        if earlier.len() < EARLIER {
            return None;
        }
        let n = earlier.len() as f64;
        let middle = median(earlier);
        let squares: f64 = earlier.iter().map(|v| (v - middle).powi(2)).sum();
        let variance = (STATED * one * one + squares) / (STATED + n - 1.0);
        Some(Baseline {
            middle,
            uncertainty: (variance * (1.0 + 1.0 / n)).sqrt(),
            checks: earlier.len(),
        })
    }

    /// How many uncertainties a value stands off, positive above.
    #[must_use]
    pub fn off(&self, value: f64) -> f64 {
        (value - self.middle) / self.uncertainty.max(1e-12)
    }
}
