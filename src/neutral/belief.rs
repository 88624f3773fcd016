//! What is believed of a swash offset: weights on a grid that is fine round null.

use super::response::LARGEST;
use crate::math;

/// Places of the grid on each side of null.
const HALF: usize = 260;
/// Offset below which the places lie evenly, share of stroke.
const FINE: f64 = 0.002;
/// Offset within which most nulls lie that somebody asks about, share of stroke: half of them. Common practice; the tails are wide.
const USUAL: f64 = 0.015;

/// Weights on offsets; they sum to 1.
#[derive(Clone, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Belief {
    at: Vec<f64>,
    weight: Vec<f64>,
}

/// The places of the grid, share of full stroke, ascending.
#[must_use]
pub fn places() -> Vec<f64> {
    let top = asinh(LARGEST / FINE);
    (0..=2 * HALF)
        .map(|i| {
            let t = (i as f64 - HALF as f64) / HALF as f64;
            FINE * sinh(t * top)
        })
        .collect()
}

fn sinh(x: f64) -> f64 {
    0.5 * (math::exp(x) - math::exp(-x))
}

fn asinh(x: f64) -> f64 {
    math::ln(x + (x * x + 1.0).sqrt())
}

/// Log density of an offset before anything was read: a wide peak round null (Cauchy).
#[must_use]
pub fn before(offset: f64) -> f64 {
    -math::ln_1p((offset / USUAL) * (offset / USUAL))
}

/// The stretch of the axis that each place stands for.
fn stretches(at: &[f64]) -> Vec<f64> {
    let of = |i: usize| at.get(i).copied().unwrap_or_default();
    let last = at.len().saturating_sub(1);
    (0..at.len())
        .map(|i| 0.5 * (of((i + 1).min(last)) - of(i.saturating_sub(1))))
        .collect()
}

impl Belief {
    /// From log densities at the places of [`places`]. None where no place has weight.
    #[must_use]
    pub fn from_logs(logs: &[f64]) -> Option<Belief> {
        let at = places();
        let top = logs.iter().copied().fold(f64::NEG_INFINITY, f64::max);
        if at.len() != logs.len() || !top.is_finite() {
            return None;
        }
        let weight = logs
            .iter()
            .zip(stretches(&at))
            .map(|(log, stretch)| math::exp(log - top) * stretch)
            .collect();
        Belief { at, weight }.normal()
    }

    /// Integral of the densities whose logs stand at the places of [`places`].
    #[must_use]
    pub fn total(logs: &[f64]) -> f64 {
        logs.iter()
            .zip(stretches(&places()))
            .map(|(log, stretch)| math::exp(*log) * stretch)
            .sum()
    }

    /// From weighted values anywhere: sorted, as they are. None where they have no weight.
    #[must_use]
    pub fn from_points(mut points: Vec<(f64, f64)>) -> Option<Belief> {
        points.retain(|(at, weight)| at.is_finite() && *weight > 0.0);
        points.sort_by(|one, other| one.0.total_cmp(&other.0));
        let (at, weight) = points.into_iter().unzip();
        Belief { at, weight }.normal()
    }

    /// As [`Belief::from_points`], with equal values drawn together; zero for certain where there is no weight.
    #[must_use]
    pub fn pooled(points: Vec<(f64, f64)>) -> Belief {
        let Some(whole) = Belief::from_points(points) else {
            return Belief {
                at: vec![0.0],
                weight: vec![1.0],
            };
        };
        let (mut at, mut weight): (Vec<f64>, Vec<f64>) = (Vec::new(), Vec::new());
        for (x, w) in whole.points() {
            match (at.last(), weight.last_mut()) {
                (Some(last), Some(sum)) if (x - last).abs() < 1e-12 => *sum += w,
                _ => {
                    at.push(x);
                    weight.push(w);
                }
            }
        }
        Belief { at, weight }
    }

    fn normal(mut self) -> Option<Belief> {
        let sum: f64 = self.weight.iter().sum();
        if !(sum > 0.0 && sum.is_finite()) {
            return None;
        }
        for weight in &mut self.weight {
            *weight /= sum;
        }
        Some(self)
    }

    /// Places and weights.
    pub fn points(&self) -> impl Iterator<Item = (f64, f64)> {
        self.at.iter().copied().zip(self.weight.iter().copied())
    }

    /// Mean.
    #[must_use]
    pub fn mean(&self) -> f64 {
        self.points().map(|(at, weight)| at * weight).sum()
    }

    /// Standard deviation.
    #[must_use]
    pub fn spread(&self) -> f64 {
        let mean = self.mean();
        let square = |at: f64| (at - mean) * (at - mean);
        self.points()
            .map(|(at, weight)| square(at) * weight)
            .sum::<f64>()
            .sqrt()
    }

    /// The value under which a share of the weight lies, between places in proportion.
    #[must_use]
    pub fn quantile(&self, share: f64) -> f64 {
        let mut below = 0.0;
        let mut last = self.at.first().copied().unwrap_or_default();
        let mut half_before = 0.0;
        for (at, weight) in self.points() {
            let middle = below + 0.5 * weight;
            if middle >= share {
                let gap = middle - half_before;
                let part = if gap > 0.0 {
                    ((share - half_before) / gap).clamp(0.0, 1.0)
                } else {
                    1.0
                };
                return last + part * (at - last);
            }
            below += weight;
            half_before = middle;
            last = at;
        }
        last
    }

    /// Weight above a value.
    #[must_use]
    pub fn above(&self, value: f64) -> f64 {
        self.points()
            .filter(|(at, _)| *at > value)
            .map(|(_, weight)| weight)
            .sum()
    }

    /// The size (either way) under which a share of the weight lies.
    #[must_use]
    pub fn size_quantile(&self, share: f64) -> f64 {
        let sizes = self
            .points()
            .map(|(at, weight)| (at.abs(), weight))
            .collect();
        Belief::from_points(sizes).map_or(0.0, |sizes| sizes.quantile(share))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_normal_density_gives_its_own_quantiles() {
        let logs: Vec<f64> = places()
            .iter()
            .map(|s| -0.5 * ((s - 0.01) / 0.002) * ((s - 0.01) / 0.002))
            .collect();
        let belief = Belief::from_logs(&logs).expect("weight");
        assert!((belief.mean() - 0.01).abs() < 2e-5);
        assert!((belief.spread() - 0.002).abs() < 2e-5);
        assert!((belief.quantile(0.975) - 0.01392).abs() < 3e-5);
        assert!((belief.quantile(0.025) - 0.00608).abs() < 3e-5);
        assert!(belief.above(0.0) > 0.999);
    }

    #[test]
    fn nothing_is_believed_without_weight() {
        let logs = vec![f64::NEG_INFINITY; places().len()];
        assert_eq!(Belief::from_logs(&logs), None);
        assert_eq!(Belief::from_points(vec![(f64::NAN, 1.0), (1.0, 0.0)]), None);
    }
}
