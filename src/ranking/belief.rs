//! What the ranking takes for granted beside the circuit: how wide scatter is, how far laws are off, how often a gauge lies,
//! how often each fault is met, and how finely it integrates.

use crate::faults::{Fault, FaultId};
use std::collections::BTreeMap;

/// Assumptions of a ranking.
#[derive(Clone, Debug)]
pub struct Belief {
    /// Factor on the unit's scatter.
    pub wider: f64,
    /// Factor on the stated share by which the circuit's laws are off.
    pub discrepancy: f64,
    /// Chance that a rigging is wrong: gauge lies or stands on another port.
    pub wrong: f64,
    /// Chance that sides, or directions and with them sides, are swapped in the notes.
    pub swapped: f64,
    /// Base rates (per hundred calls) that replace the catalogue's.
    pub rates: BTreeMap<FaultId, f64>,
    /// Nodes a way of showing where one build is possible. More builds share them out.
    pub fineness: usize,
    /// Most rounds of linearising again.
    pub rounds: usize,
    /// Factor on the base rate of two causes at once; 0: none are weighed.
    pub pairs: f64,
    /// Most pairs that are solved, after all were compared by superposing their effects.
    pub pairs_solved: usize,
    /// How much better (natural log) a pair must explain the readings than either of its causes alone to be weighed at all, where
    /// pairs are as rare as usual: that something else is broken too, and shows in nothing, is no news.
    pub pairs_better: f64,
}

impl Default for Belief {
    fn default() -> Belief {
        Belief {
            // A little wider than believed: it costs nothing where the model is right.
            wider: 1.25,
            discrepancy: 1.0,
            // Common practice.
            wrong: 0.03,
            // Common practice: about once in fifteen.
            swapped: 1.0 / 15.0,
            rates: BTreeMap::new(),
            fineness: 14,
            rounds: 2,
            pairs: 1.0,
            pairs_solved: 20,
            pairs_better: 1.0,
        }
    }
}

impl Belief {
    /// Base rate of a fault, per hundred calls.
    pub fn rate(&self, fault: &Fault) -> f64 {
        self.rates
            .get(&fault.id)
            .copied()
            .filter(|r| r.is_finite() && *r >= 0.0)
            .unwrap_or(fault.per_hundred)
    }
}
