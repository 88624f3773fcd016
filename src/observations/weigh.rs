//! From answers to log likelihoods.

use super::complaints::RUNS_ON;
use super::{CLIP, Family, Observation, all, probability};
use crate::faults::FaultId;
use crate::math::ln;
use crate::record::Answer;
use std::collections::BTreeMap;

/// Share of the evidence that is kept of the second and third answer of one family. Common practice.
const NEXT_OF_FAMILY: f64 = 0.6;
/// The same for a fourth and later answer.
const LATER_OF_FAMILY: f64 = 0.3;
/// Share of the evidence that is kept of an operator's report: about half of one's own look, the rest flattened to the mean
/// of all causes. Common practice.
pub const OPERATOR: f64 = 0.5;

/// What one answered observation says.
#[derive(Clone, Debug, PartialEq)]
pub struct Detail {
    /// Observation id.
    pub id: &'static str,
    /// What was answered, in words.
    pub words: String,
    /// Log likelihood of the answer under every cause, in the order of [`FaultId::ALL`], the family's share applied. Only
    /// differences between causes mean anything.
    pub logs: Vec<f64>,
}

/// What every answered observation says, in table order. "Not looked" is no answer and says nothing; ids that this version
/// does not know are passed over.
#[must_use]
pub fn detail(answers: &BTreeMap<String, Answer>) -> Vec<Detail> {
    let mut found: Vec<(Family, Detail)> = all()
        .filter_map(|o| {
            answers
                .get(o.id)
                .map(|answer| (o.family, answered(o, *answer)))
        })
        .collect();
    for (i, share) in shares(&found).into_iter().enumerate() {
        if let Some((_, d)) = found.get_mut(i) {
            d.logs.iter_mut().for_each(|l| *l *= share);
        }
    }
    found.into_iter().map(|(_, d)| d).collect()
}

/// Log likelihood of all answers together under each of the causes given, in their order.
#[must_use]
pub fn log_weights(answers: &BTreeMap<String, Answer>, possible: &[FaultId]) -> Vec<f64> {
    let details = detail(answers);
    possible
        .iter()
        .map(|fault| {
            let at = *fault as usize;
            details.iter().filter_map(|d| d.logs.get(at)).sum()
        })
        .collect()
}

fn answered(observation: &Observation, answer: Answer) -> Detail {
    let (seen, trust, remark) = match answer {
        Answer::Seen => (true, 1.0, ""),
        Answer::NotSeen => (false, 1.0, ": looked, not so"),
        Answer::OperatorSays => (true, OPERATOR, ": so the operator says"),
        Answer::OperatorSaysNot => (false, OPERATOR, ": not so, the operator says"),
    };
    let mean = observation.mean().clamp(CLIP.0, CLIP.1);
    let logs = FaultId::ALL
        .iter()
        .map(|fault| {
            let p = probability(observation, *fault);
            let (here, anywhere) = if seen {
                (p, mean)
            } else {
                (1.0 - p, 1.0 - mean)
            };
            ln(anywhere) + trust * (ln(here) - ln(anywhere))
        })
        .collect();
    Detail {
        id: observation.id,
        words: format!("{}{remark}", observation.words),
        logs,
    }
}

/// Share of the evidence that is kept of an answer of a family of which so many have been answered already.
#[must_use]
pub fn kept(family: Family, before: usize) -> f64 {
    match (family, before) {
        (Family::Alone, _) | (_, 0) => 1.0,
        (_, 1 | 2) => NEXT_OF_FAMILY,
        _ => LATER_OF_FAMILY,
    }
}

/// Share kept of each answer: within a family the one that tells most comes first and counts in full.
fn shares(found: &[(Family, Detail)]) -> Vec<f64> {
    let spreads: Vec<f64> = found.iter().map(|(_, d)| spread(&d.logs)).collect();
    let ahead = |i: usize, j: usize| spreads[j] > spreads[i] || (spreads[j] == spreads[i] && j < i);
    found
        .iter()
        .enumerate()
        .map(|(i, (family, _))| {
            let before = (0..found.len())
                .filter(|j| found[*j].0 == *family && ahead(i, *j))
                .count();
            kept(*family, before)
        })
        .collect()
}

/// How much an answer tells: variance of its log likelihood over the causes.
fn spread(logs: &[f64]) -> f64 {
    let n = logs.len().max(1) as f64;
    let mean = logs.iter().sum::<f64>() / n;
    logs.iter().map(|l| (l - mean) * (l - mean)).sum::<f64>() / n
}

/// True where an answer alone forbids any test by driving, whatever the ranking says: the machine keeps going with the lever
/// in neutral, seen or reported.
#[must_use]
pub fn stop_work(answers: &BTreeMap<String, Answer>) -> bool {
    matches!(
        answers.get(RUNS_ON),
        Some(Answer::Seen | Answer::OperatorSays)
    )
}

/// Factor on a cause's base rate from the story of the call: trouble that began straight after a repair or a hose change
/// (`Some(true)`), or surely not (`Some(false)`). Common practice: air, assembly, wrong part and linkage 4 to 8 times.
#[must_use]
pub fn prior_factor(after_repair: Option<bool>, fault: FaultId) -> f64 {
    use FaultId as F;
    match after_repair {
        None => 1.0,
        Some(false) => match fault {
            F::AssemblyError => 0.15,
            F::CaseCouplingShut => 0.5,
            _ => 1.0,
        },
        Some(true) => match fault {
            F::AssemblyError => 8.0,
            F::CaseCouplingShut => 6.0,
            F::InletAir => 5.0,
            F::OilLow
            | F::WrongOrWetOil
            | F::LinkageShortForward
            | F::LinkageShortReverse
            | F::ControlNullOff => 4.0,
            F::BypassOpen | F::ServoNullOff => 3.0,
            F::SignalLostForward
            | F::SignalLostReverse
            | F::FeedbackLinkWorn
            | F::InterlockOrDerate => 2.0,
            _ => 1.0,
        },
    }
}
