//! Reasons: how much each reading and each observation, added to all the others, favours a cause over the rest.

use super::datum::Data;
use super::posterior::Weighed;
use super::seen::Seen;
use crate::assessment::Evidence;
use crate::math;
use crate::readings::Reading;

/// Weights under this say nothing worth a line.
const SAYS_NOTHING: f64 = 0.15;

/// Probabilities of the causes.
pub struct Probable {
    /// Log likelihood of readings and observations together.
    pub log_likelihood: Vec<f64>,
    /// Probability.
    pub share: Vec<f64>,
    /// For each observation the log likelihood a cause.
    seen: Vec<Vec<f64>>,
    log_prior: Vec<f64>,
}

impl Probable {
    /// Normalises base rate × readings × observations.
    pub fn new(weighed: &[Weighed], seen: &[Seen]) -> Probable {
        let by_cause: Vec<Vec<f64>> = seen
            .iter()
            .map(|s| weighed.iter().map(|w| s.log(w.at(), w.with)).collect())
            .collect();
        let log_likelihood: Vec<f64> = (0..weighed.len())
            .map(|i| weighed[i].log_likelihood + by_cause.iter().map(|o| o[i]).sum::<f64>())
            .collect();
        let log_prior: Vec<f64> = weighed.iter().map(|w| w.log_prior).collect();
        let share = normalised(&log_prior, &log_likelihood);
        Probable {
            log_likelihood,
            share,
            seen: by_cause,
            log_prior,
        }
    }
}

/// Bayes' rule on logs: probabilities of hypotheses from log base rate and log likelihood, each up to a constant. What is not
/// finite is impossible; all are 0 where every hypothesis is.
pub fn normalised(prior: &[f64], likelihood: &[f64]) -> Vec<f64> {
    let joint: Vec<f64> = prior
        .iter()
        .zip(likelihood)
        .map(|(a, b)| {
            if (a + b).is_finite() {
                a + b
            } else {
                f64::NEG_INFINITY
            }
        })
        .collect();
    let total = math::ln_sum_exp(&joint);
    joint
        .iter()
        .map(|l| {
            if l.is_finite() && total.is_finite() {
                math::exp(l - total)
            } else {
                0.0
            }
        })
        .collect()
}

/// Log odds of a set of causes against the rest.
fn log_odds(members: &[usize], share: &[f64]) -> f64 {
    let own: f64 = members.iter().map(|i| share[*i]).sum();
    let rest: f64 = share
        .iter()
        .enumerate()
        .filter(|(i, _)| !members.contains(i))
        .map(|(_, s)| s)
        .sum();
    math::ln(own.max(1e-15)) - math::ln(rest.max(1e-15))
}

/// Reasons for and against a row, heaviest first.
#[allow(clippy::too_many_arguments)]
pub fn evidence(
    members: &[usize],
    weighed: &[Weighed],
    probable: &Probable,
    data: &Data,
    readings: &[Reading],
    seen: &[Seen],
    words: &[String],
) -> Vec<Evidence> {
    let with = log_odds(members, &probable.share);
    let mut out = Vec::new();
    for (k, d) in data.data.iter().enumerate() {
        let without: Vec<f64> = weighed
            .iter()
            .enumerate()
            .map(|(i, w)| probable.log_likelihood[i] - w.log_likelihood + w.without[k])
            .collect();
        let weight = with - log_odds(members, &normalised(&probable.log_prior, &without));
        if weight.abs() > SAYS_NOTHING
            && let Some(r) = readings.get(d.reading)
        {
            out.push(Evidence {
                of: r.id.clone(),
                words: words.get(d.reading).cloned().unwrap_or_default(),
                weight,
            });
        }
    }
    for (s, logs) in seen.iter().zip(&probable.seen) {
        let without: Vec<f64> = probable
            .log_likelihood
            .iter()
            .zip(logs)
            .map(|(l, o)| l - o)
            .collect();
        let weight = with - log_odds(members, &normalised(&probable.log_prior, &without));
        if weight.abs() > SAYS_NOTHING {
            out.push(Evidence {
                of: s.id.clone(),
                words: s.words.clone(),
                weight,
            });
        }
    }
    out.sort_by(|a, b| {
        b.weight
            .abs()
            .total_cmp(&a.weight.abs())
            .then_with(|| a.of.cmp(&b.of))
    });
    out
}
