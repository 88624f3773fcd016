//! Observations without a gauge as likelihoods, and what the story of the call does to the base rates.

use crate::faults::FaultId;
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

/// The observations of a visit.
pub fn observations(visit: &Visit) -> Vec<Seen> {
    let _ = visit;
    Vec::new()
}

/// Factor on a cause's base rate from the story: trouble that began straight after a repair.
pub fn prior_factor(visit: &Visit, id: FaultId) -> f64 {
    let _ = (visit, id);
    1.0
}
