//! A catalogue entry: what the fault does to the circuit, how often it is met, how it is proved and put right.

use super::FaultId;
use crate::circuit::Param;
use crate::unit::Unit;

/// Column of the observation table that a fault's likelihoods are taken from.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[allow(missing_docs)] // the names are the column heads of the table in `observations`
pub enum Column {
    Air,
    Inlet,
    Charge,
    Dead,
    Flushing,
    OneSide,
    TwoSides,
    Worn,
    Null,
    Control,
    Signal,
    Motor,
    Drag,
    Slip,
    Engine,
    Heat,
    Healthy,
}

/// How a fault bends one parameter over its severity s (0: just noticeable, 1: total).
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Bend {
    /// Multiplied by a factor that runs from the first to the second value geometrically (both > 0).
    Times(f64, f64),
    /// Multiplied by a factor that runs in a straight line (may reach 0).
    TimesLinear(f64, f64),
    /// Added: from the first to the second value in a straight line.
    Plus(f64, f64),
    /// Added geometrically: from the first to the second value (both > 0): leak orifices over decades.
    PlusGeometric(f64, f64),
    /// As `Plus`, of either sign with equal chance (null offsets).
    PlusEitherSign(f64, f64),
}

/// Distribution of severity over 0 to 1, given by its quantile function.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum SeverityShape {
    /// All alike.
    Even,
    /// Mild ones are commoner: quantile u².
    MostlyMild,
    /// Bad ones are commoner (people call late): quantile √u.
    MostlyBad,
    /// All or nothing: always total.
    Total,
}

/// One way in which a fault shows. Most faults have one; a fault with several ways (air in, or level low) mixes them.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Effect {
    /// Parameters that are bent together.
    pub bends: &'static [(Param, Bend)],
}

/// A catalogue entry.
#[derive(Clone, Copy)]
pub struct Fault {
    /// Stable id.
    pub id: FaultId,
    /// Title for a screen: what is wrong, in the mechanic's words.
    pub title: &'static str,
    /// Starter base rate per 100 road calls (common practice, from memory).
    pub per_hundred: f64,
    /// Observation column.
    pub column: Column,
    /// Distribution of severity.
    pub severity: SeverityShape,
    /// Alternative ways in which it shows, equally likely.
    pub effects: &'static [Effect],
    /// What it does and why the readings move, two sentences at most.
    pub explains: &'static str,
    /// What proves it on the spot.
    pub proof: &'static str,
    /// The repair.
    pub repair: &'static str,
    /// Rough minutes of the repair (common practice).
    pub minutes: f64,
    /// The repair destroys evidence that other causes would need (new oil and filter before debris was seen).
    pub destroys_evidence: bool,
    /// The repair or setting must follow the unit's manual.
    pub needs_manual: bool,
    /// Stop work: this machine must not be moved or tested by driving.
    pub stop_work: bool,
    /// Caution that stands where the hand goes; empty where the general ones suffice.
    pub caution: &'static str,
    /// Chance (0 to 1) that a unit can have this fault at all: 0 masks it.
    pub possible: fn(&Unit) -> f64,
}

impl core::fmt::Debug for Fault {
    fn fmt(&self, f: &mut core::fmt::Formatter<'_>) -> core::fmt::Result {
        f.debug_struct("Fault")
            .field("id", &self.id)
            .finish_non_exhaustive()
    }
}
