//! Observations without a gauge as likelihoods, and what the story of the call does to the base rates.

use crate::faults::FaultId;
use crate::observations;
use crate::record::Visit;

/// One observation's log likelihood under every cause of the catalogue, in the order of [`FaultId::ALL`].
#[derive(Clone, Debug)]
pub struct Seen {
    /// Observation id.
    pub id: String,
    /// What was seen, in words.
    pub words: String,
    /// Log likelihood a cause.
    pub logs: Vec<f64>,
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
            logs: d.logs,
        })
        .collect()
}

/// Factor on a cause's base rate from the story: trouble that began straight after a repair, a machine that stood quietly.
pub fn prior_factor(visit: &Visit, id: FaultId) -> f64 {
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
