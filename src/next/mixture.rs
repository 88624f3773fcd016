//! Mutual information between cause and outcome, for outcomes that are normal under each node and for outcomes that are so or not.

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

/// Posterior over the causes at one drawn outcome.
pub struct Outcome {
    /// Weight of the outcome, all together 1.
    pub weight: f64,
    /// Probability of each cause after it.
    pub causes: Vec<f64>,
}

/// Entropy of a distribution, bits.
pub fn entropy(p: &[f64]) -> f64 {
    -p.iter()
        .filter(|v| **v > 0.0)
        .map(|v| v * math::log2(*v))
        .sum::<f64>()
}

/// A question that a check answers with yes or no.
#[derive(Clone, Debug)]
pub struct Question {
    /// Chance of a yes under each cause.
    pub chance: Vec<f64>,
    /// Share of the answer's evidence that is kept: an operator's word, the second of a family.
    pub kept: f64,
}

/// Most questions whose answers are weighed together; of more the weakest are left out.
pub const MOST_QUESTIONS: usize = 8;

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

/// Outcomes of answers alone, every combination of them, and the information (bits) they carry on the cause. Answers are
/// independent of each other under a cause; what is kept of each is what the ranking would keep.
pub fn answers(questions: &[Question], prior: &[f64]) -> (Vec<Outcome>, f64) {
    let questions = &questions[..questions.len().min(MOST_QUESTIONS)];
    let out: Vec<Outcome> = (0..1usize << questions.len())
        .map(|combination| {
            let mut chance = vec![1.0; prior.len()];
            let mut kept = vec![1.0; prior.len()];
            for (k, q) in questions.iter().enumerate() {
                let yes = combination >> k & 1 == 1;
                for (i, p) in q.chance.iter().enumerate() {
                    let p = if yes { *p } else { 1.0 - p };
                    chance[i] *= p;
                    kept[i] *= if q.kept < 1.0 {
                        math::pow(p, q.kept)
                    } else {
                        p
                    };
                }
            }
            let weight = chance.iter().zip(prior).map(|(c, p)| c * p).sum();
            let joint: Vec<f64> = kept.iter().zip(prior).map(|(c, p)| c * p).collect();
            let total: f64 = joint.iter().sum();
            Outcome {
                weight,
                causes: joint.iter().map(|j| j / total.max(1e-300)).collect(),
            }
        })
        .collect();
    let after: f64 = out.iter().map(|o| o.weight * entropy(&o.causes)).sum();
    (out, (entropy(prior) - after).max(0.0))
}

/// Outcomes of something that is so or not, with its probability under each cause.
pub fn yes_or_no(probability: &[f64], prior: &[f64]) -> (Vec<Outcome>, f64) {
    let not: Vec<f64> = probability.iter().map(|p| 1.0 - p).collect();
    by_table(&[probability.to_vec(), not], prior)
}

/// Outcomes by a table of chances, one row an outcome and one column a cause, and the information (bits) they carry on the
/// cause: entropy before less expected entropy after.
pub fn by_table(chances: &[Vec<f64>], prior: &[f64]) -> (Vec<Outcome>, f64) {
    let out: Vec<Outcome> = chances
        .iter()
        .map(|chance| {
            let joint: Vec<f64> = chance.iter().zip(prior).map(|(c, p)| c * p).collect();
            let weight: f64 = joint.iter().sum();
            Outcome {
                weight,
                causes: joint.iter().map(|j| j / weight.max(1e-300)).collect(),
            }
        })
        .collect();
    let after: f64 = out.iter().map(|o| o.weight * entropy(&o.causes)).sum();
    let before = entropy(prior);
    (out, (before - after).max(0.0))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_symmetric_test_carries_one_bit_less_its_noise() {
        // Binary symmetric channel, 0.9/0.1: 1 − H(0.1) = 0.531004 bit (capacity; from memory, checked with scipy).
        let (_, bits) = yes_or_no(&[0.9, 0.1], &[0.5, 0.5]);
        assert!((bits - 0.531_004).abs() < 1e-6, "{bits}");
    }

    #[test]
    fn a_screening_test_gains_what_the_published_row_says() {
        // Prior 0.01, sensitivity 0.80, false positives 0.096: 0.019715 bit; posterior 0.07764 (classic screening problem).
        let (out, bits) = yes_or_no(&[0.80, 0.096], &[0.01, 0.99]);
        assert!((bits - 0.019_715).abs() < 1e-6, "{bits}");
        assert!((out[0].causes[0] - 0.077_64).abs() < 1e-5);
        assert!((out[0].weight - 0.103_04).abs() < 1e-9);
        // Prior 0.06, 0.9/0.1: posterior 0.36486; gain 0.135817 bit.
        let (out, bits) = yes_or_no(&[0.9, 0.1], &[0.06, 0.94]);
        assert!((out[0].causes[0] - 0.364_86).abs() < 1e-5);
        assert!((bits - 0.135_817).abs() < 1e-6, "{bits}");
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

    fn question(yes: [f64; 2], kept: f64) -> Question {
        Question {
            chance: yes.to_vec(),
            kept,
        }
    }

    #[test]
    fn one_question_alone_is_a_yes_or_no() {
        let prior = [0.3, 0.7];
        let (_, one) = answers(&[question([0.8, 0.1], 1.0)], &prior);
        let (_, plain) = yes_or_no(&[0.8, 0.1], &prior);
        assert!((one - plain).abs() < 1e-12);
        // Independent answers tell more together than the best alone, and no more than their sum; half kept tells less.
        let (out, two) = answers(
            &[question([0.8, 0.1], 1.0), question([0.6, 0.2], 1.0)],
            &prior,
        );
        let (_, other) = yes_or_no(&[0.6, 0.2], &prior);
        assert!(two > plain && two < plain + other);
        assert!((out.iter().map(|o| o.weight).sum::<f64>() - 1.0).abs() < 1e-12);
        let (_, half) = answers(&[question([0.8, 0.1], 0.5)], &prior);
        assert!(half > 0.0 && half < plain);
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
