//! Outcomes that are so or not, or stand in a table: what they leave of the causes, and the information they carry.

use crate::math;

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
}
