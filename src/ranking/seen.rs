//! Observations without a gauge as likelihoods, and what the story of the call does to the base rates.

use super::pairs::DIRT;
use crate::assessment::At;
use crate::faults::{self, Column, FaultId};
use crate::math;
use crate::observations;
use crate::readings::Path;
use crate::record::{Answer, Visit};

/// One observation's log likelihood under every cause of the catalogue, in the order of [`FaultId::ALL`].
#[derive(Clone, Debug)]
pub struct Seen {
    /// Observation id.
    pub id: String,
    /// What was seen, in words.
    pub words: String,
    /// It was seen, and not looked for in vain.
    pub positive: bool,
    /// Log likelihood a cause.
    pub logs: Vec<f64>,
    /// The side that it says drags behind, and how much of the evidence is kept.
    pub pulls: Option<(Path, f64)>,
}

/// Chance that a machine pulls to the side on which a part is weak and not to the other. Common practice.
const TO_ITS_OWN_SIDE: f64 = 0.85;

impl Seen {
    /// Log likelihood under a cause, or under two at once: either may bring what was seen, both must fail to bring what was not.
    pub fn log(&self, at: At, with: Option<At>) -> f64 {
        let of = |at: At| {
            let log = self.logs.get(at.id as usize).copied().unwrap_or(0.0);
            log + self.turn(at)
        };
        let first = of(at);
        match with.map(of) {
            None => first,
            Some(second) if self.positive => {
                let miss = (1.0 - math::exp(first)) * (1.0 - math::exp(second));
                math::ln((1.0 - miss).clamp(1e-6, 1.0))
            }
            Some(second) => first + second,
        }
    }
}

impl Seen {
    /// What the side says that a machine pulls to. A neutral out of set pulls to one side forward and to the other in reverse, and
    /// says nothing by itself.
    fn turn(&self, at: At) -> f64 {
        let (Some((to, kept)), Some(own), true) = (self.pulls, at.path, self.positive) else {
            return 0.0;
        };
        if faults::find(at.id).is_none_or(|f| f.column == Column::Null) {
            return 0.0;
        }
        let chance = if to == own {
            TO_ITS_OWN_SIDE
        } else {
            1.0 - TO_ITS_OWN_SIDE
        };
        kept * math::ln(2.0 * chance)
    }
}

/// A stuck stroke does not let a machine stand quietly in neutral while gauges are read: factor on its base rate once one was.
/// Common practice.
const QUIET_IN_NEUTRAL: f64 = 0.15;

/// The observations of a visit.
pub fn observed(visit: &Visit) -> Vec<Seen> {
    observations::detail(&visit.observations)
        .into_iter()
        .map(|d| Seen {
            id: d.id.to_string(),
            words: d.words,
            positive: matches!(
                visit.observations.get(d.id),
                Some(Answer::Seen | Answer::OperatorSays)
            ),
            logs: d.logs,
            pulls: observations::find(d.id)
                .and_then(|o| o.pulls)
                .map(|side| (side, trust(visit.observations.get(d.id)))),
        })
        .collect()
}

/// Share of the evidence that is kept of an answer.
fn trust(answer: Option<&Answer>) -> f64 {
    match answer {
        Some(Answer::OperatorSays | Answer::OperatorSaysNot) => observations::OPERATOR,
        _ => 1.0,
    }
}

/// Factor on the base rate of two worn parts at once where metal was seen: dirt links them. Common practice: 0.1 of the worn
/// machines become 0.3.
const METAL_SEEN: f64 = 3.0;

/// Factor on a base rate from the story: trouble that began straight after a repair, a machine that stood quietly, metal in the
/// oil where two parts are worn.
pub fn prior_factor(visit: &Visit, id: FaultId, with: Option<FaultId>) -> f64 {
    let Some(second) = with else {
        return factor(visit, id);
    };
    let linked = DIRT.contains(&id) && DIRT.contains(&second);
    if linked && visit.observations.get("metal") == Some(&Answer::Seen) {
        METAL_SEEN
    } else if linked {
        1.0
    } else {
        // One trouble began with the story; the other is not known to.
        factor(visit, id).max(factor(visit, second))
    }
}

fn factor(visit: &Visit, id: FaultId) -> f64 {
    let story = observations::prior_factor(visit.after_repair, id);
    let quiet = visit
        .readings
        .iter()
        .any(|r| r.seen.is_some() && r.condition.doing.is_neutral());
    if id == FaultId::StrokeStuck && quiet && !observations::stop_work(&visit.observations) {
        story * QUIET_IN_NEUTRAL
    } else {
        story
    }
}
