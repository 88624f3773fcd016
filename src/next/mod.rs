//! What to do next: the check that tells most for its minutes, the repair that is quicker than any check, and when to stop.
//!
//! Checks rank by expected information (mutual information between cause and outcome, over the same nodes and scatter as the
//! ranking) per minute. Hazard is a gate and never a price. Repairs are weighed against checks by expected minutes to the
//! end of the trouble (decision-theoretic troubleshooting: Heckerman, Breese and Rommelse, 1995).

mod advise;
mod answers;
mod foretell;
mod gate;
mod limits;
mod mixture;
mod probe;
mod repair;
mod rig;
mod words;
mod worth;

pub use advise::advise;
pub use answers::{Outcome, by_table, entropy, yes_or_no};
pub use gate::{hazard, held_back};
pub use mixture::{Forecast, outcomes};
pub use repair::expected_minutes;
pub use rig::{minutes, open_answers, open_readings, possible};

use crate::faults::FaultId;
use crate::readings::{Condition, Path, Port};
use serde::{Deserialize, Serialize};

/// What a reading would be under a cause. Base unit of the port's kind.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Would {
    /// Cause.
    pub id: FaultId,
    /// Its title.
    pub title: String,
    /// Most likely value.
    pub value: f64,
    /// Lower end of the central 80 %, instrument included.
    pub low: f64,
    /// Upper end of the central 80 %.
    pub high: f64,
}

/// One reading of an offered check, with what it would say.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Foretold {
    /// Path; left where there is one.
    #[serde(default, skip_serializing_if = "Path::is_left")]
    pub path: Path,
    /// Port.
    pub port: Port,
    /// Condition.
    pub condition: Condition,
    /// Under each leading cause.
    pub would: Vec<Would>,
}

/// A check that is offered.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Offer {
    /// Check id.
    pub id: String,
    /// Title.
    pub title: String,
    /// Expected information, bits.
    pub bits: f64,
    /// Minutes, rigging and access on this unit included.
    pub minutes: f64,
    /// Hazard, 0 to 3.
    pub hazard: u8,
    /// One sentence: what it tells from what.
    pub why: String,
    /// For a check that holds the machine: how long and up to where.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub hold: Option<Hold>,
    /// What its readings would say.
    pub foretold: Vec<Foretold>,
}

/// Limits of a held check, from the unit's figures.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
pub struct Hold {
    /// Longest time at full stroke, s.
    pub seconds: f64,
    /// Rise of the oil at full stroke, K/s.
    pub rise: f64,
    /// Pressure to stop at, bar.
    pub stop_at: f64,
}

/// A repair that is offered.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct RepairOffer {
    /// Cause that it ends; of a set that one action serves, the likeliest member.
    pub id: FaultId,
    /// The side it is on, on a machine with two paths.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub path: Option<Path>,
    /// The repair, in words.
    pub repair: String,
    /// Minutes.
    pub minutes: f64,
    /// Probability that it ends the trouble.
    pub probability: f64,
    /// What proves the cause before parts are ordered.
    pub proof: String,
    /// True where the expected minutes to the end are fewer by repairing now than by the best check first.
    pub now: bool,
    /// What it waits for although it may be the right one, in words; empty where it may be made now.
    #[serde(default, skip_serializing_if = "String::is_empty")]
    pub waits: String,
    /// The unit's manual is needed.
    pub needs_manual: bool,
    /// Caution where the hand goes.
    pub caution: String,
    /// Ids of the readings that are off now, that this cause explains, and that must come back after the repair.
    pub proved_by: Vec<String>,
}

/// What to do next.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
pub struct Advice {
    /// Checks, best first.
    pub checks: Vec<Offer>,
    /// Best repair, where one may be offered.
    pub repair: Option<RepairOffer>,
    /// Set where no check that is left is likely to change what leads: time to prove it and mend it.
    pub stop: Option<String>,
    /// Held back by the gates, with the reason.
    pub held_back: Vec<(String, String)>,
}
