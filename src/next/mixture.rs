//! Mutual information between cause and outcome, for readings that are normal under each node, with answers beside them.

use super::answers::{Outcome, Question, entropy};
use crate::math;
use crate::ranking::LN_TWO_PI;
use crate::windows::Normals;

/// A node's forecast of a check's readings.
#[derive(Clone, Debug)]
pub struct Forecast {
    /// Weight of the node, all nodes together 1.
    pub weight: f64,
    /// Index of its cause.
    pub cause: usize,
    /// Mean of each reading on its transformed scale.
    pub mean: Vec<f64>,
    /// Lower Cholesky factor of their covariance, row-major.
    pub factor: Vec<f64>,
}

impl Forecast {
    /// From a covariance; none where it is not positive.
    pub fn new(
        weight: f64,
        cause: usize,
        mean: Vec<f64>,
        mut covariance: Vec<f64>,
    ) -> Option<Forecast> {
        let n = mean.len();
        for j in 0..n {
            let mut d = covariance[j * n + j];
            for k in 0..j {
                d -= covariance[j * n + k] * covariance[j * n + k];
            }
            if !(d > 1e-14 && d.is_finite()) {
                return None;
            }
            let d = d.sqrt();
            covariance[j * n + j] = d;
            for i in j + 1..n {
                let mut s = covariance[i * n + j];
                for k in 0..j {
                    s -= covariance[i * n + k] * covariance[j * n + k];
                }
                covariance[i * n + j] = s / d;
            }
        }
        Some(Forecast {
            weight,
            cause,
            mean,
            factor: covariance,
        })
    }

    fn log_density(&self, y: &[f64]) -> f64 {
        let n = self.mean.len();
        let mut log = -0.5 * n as f64 * LN_TWO_PI;
        let mut w = [0.0; MOST_READINGS];
        for i in 0..n {
            let mut s = y[i] - self.mean[i];
            for (k, done) in w.iter().enumerate().take(i) {
                s -= self.factor[i * n + k] * done;
            }
            w[i] = s / self.factor[i * n + i];
            log -= 0.5 * w[i] * w[i] + math::ln(self.factor[i * n + i]);
        }
        log
    }

    fn draw(&self, normals: &mut Normals) -> Vec<f64> {
        let n = self.mean.len();
        let e = normals.many(n);
        (0..n)
            .map(|i| self.mean[i] + (0..=i).map(|k| self.factor[i * n + k] * e[k]).sum::<f64>())
            .collect()
    }
}

/// Most readings of one check that are forecast together.
pub const MOST_READINGS: usize = 6;
/// Outcomes drawn behind each estimate.
const DRAWS: usize = 120;

/// Outcomes of a check by systematic draws over the nodes, and the information (bits) they carry on the cause.
pub fn outcomes(forecasts: &[Forecast], prior: &[f64], seed: u64) -> (Vec<Outcome>, f64) {
    readings_and_answers(forecasts, &[], prior, seed)
}

/// Outcomes of readings and answers together: what both say of the same is not counted twice.
pub fn readings_and_answers(
    forecasts: &[Forecast],
    questions: &[Question],
    prior: &[f64],
    seed: u64,
) -> (Vec<Outcome>, f64) {
    let mut normals = Normals::new(seed);
    let mut out = Vec::with_capacity(DRAWS);
    let mut sum = 0.0;
    let mut at = 0;
    let base: Vec<f64> = forecasts
        .iter()
        .map(|f| math::ln(f.weight.max(1e-300)))
        .collect();
    let log_chance: Vec<[Vec<f64>; 2]> = questions
        .iter()
        .map(|q| {
            let logs = |yes: bool| -> Vec<f64> {
                q.chance
                    .iter()
                    .map(|p| q.kept * math::ln((if yes { *p } else { 1.0 - p }).max(1e-12)))
                    .collect()
            };
            [logs(false), logs(true)]
        })
        .collect();
    for i in 0..DRAWS {
        let place = (i as f64 + 0.5) / DRAWS as f64;
        while at + 1 < forecasts.len() && sum + forecasts[at].weight < place {
            sum += forecasts[at].weight;
            at += 1;
        }
        let Some(node) = forecasts.get(at) else { break };
        let y = node.draw(&mut normals);
        let answers: Vec<bool> = questions
            .iter()
            .map(|q| normals.unit() < q.chance[node.cause])
            .collect();
        let logs: Vec<f64> = forecasts
            .iter()
            .zip(&base)
            .map(|(f, b)| {
                let told: f64 = answers
                    .iter()
                    .zip(&log_chance)
                    .map(|(yes, l)| l[usize::from(*yes)][f.cause])
                    .sum();
                b + f.log_density(&y) + told
            })
            .collect();
        let total = math::ln_sum_exp(&logs);
        let mut causes = vec![0.0; prior.len()];
        for (f, l) in forecasts.iter().zip(&logs) {
            causes[f.cause] += math::exp(l - total);
        }
        out.push(Outcome {
            weight: 1.0 / DRAWS as f64,
            causes,
        });
    }
    let after: f64 = out.iter().map(|o| o.weight * entropy(&o.causes)).sum();
    (out, (entropy(prior) - after).max(0.0))
}

#[cfg(test)]
mod tests {
    use super::super::answers::answers;
    use super::*;

    fn question(yes: [f64; 2], kept: f64) -> Question {
        Question {
            chance: yes.to_vec(),
            kept,
        }
    }

    #[test]
    fn far_apart_readings_tell_the_cause_and_equal_ones_tell_nothing() {
        let f = |cause, mean| Forecast::new(0.5, cause, vec![mean], vec![0.01]).expect("positive");
        let (_, bits) = outcomes(&[f(0, 0.0), f(1, 5.0)], &[0.5, 0.5], 1);
        assert!((bits - 1.0).abs() < 1e-6, "{bits}");
        let (_, none) = outcomes(&[f(0, 1.0), f(1, 1.0)], &[0.5, 0.5], 1);
        assert!(none < 1e-9, "{none}");
    }

    #[test]
    fn a_half_overlapping_pair_gains_what_quadrature_gives() {
        // Two normals of spread 1, two apart, equal priors: 0.4857 bit by numeric quadrature (200 000 points).
        let quadrature = {
            let n = 200_000;
            let (low, high) = (-8.0, 10.0);
            let h = (high - low) / n as f64;
            let mut bits = 0.0;
            for i in 0..n {
                let x: f64 = low + (i as f64 + 0.5) * h;
                let (a, b) = (math::normal_density(x), math::normal_density(x - 2.0));
                let m = 0.5 * (a + b);
                for p in [a, b] {
                    if p > 1e-300 {
                        bits += 0.5 * p * math::log2(p / m) * h;
                    }
                }
            }
            bits
        };
        let f = |cause, mean| Forecast::new(0.5, cause, vec![mean], vec![1.0]).expect("positive");
        let (_, bits) = outcomes(&[f(0, 0.0), f(1, 2.0)], &[0.5, 0.5], 3);
        assert!((bits - quadrature).abs() < 0.06, "{bits} {quadrature}");
    }

    #[test]
    fn a_reading_that_tells_nothing_leaves_what_the_answer_tells() {
        let f =
            |cause, weight| Forecast::new(weight, cause, vec![1.0], vec![0.04]).expect("positive");
        let prior = [0.5, 0.5];
        let asked = [question([0.9, 0.1], 1.0)];
        let (_, with) = readings_and_answers(&[f(0, 0.5), f(1, 0.5)], &asked, &prior, 5);
        let (_, alone) = answers(&asked, &prior);
        assert!((with - alone).abs() < 0.08, "{with} {alone}");
        // An answer that repeats what the reading tells adds nothing.
        let apart = [
            Forecast::new(0.5, 0, vec![0.0], vec![0.01]).expect("positive"),
            Forecast::new(0.5, 1, vec![5.0], vec![0.01]).expect("positive"),
        ];
        let (_, both) = readings_and_answers(&apart, &asked, &prior, 5);
        assert!((both - 1.0).abs() < 1e-6, "{both}");
    }
}
