//! One reading: port, condition, instrument, and what was seen. A reading is not a bare number.

use super::{Condition, Path, Port};
use crate::quantity::Measure;
use serde::{Deserialize, Serialize};

/// What was seen on the instrument.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(tag = "seen", rename_all = "snake_case")]
pub enum Seen {
    /// A steady value.
    Value {
        /// The value.
        value: Measure,
    },
    /// The needle swings between two values.
    Swing {
        /// Lowest.
        low: Measure,
        /// Highest.
        high: Measure,
    },
    /// Above the top of the instrument's scale.
    OffScale {
        /// Top of the scale.
        top: Measure,
    },
    /// No pressure, flow, speed or current at all.
    Nothing,
    /// This value is a given share of another reading on the same instrument that was not written down
    /// (low idle against high idle, forward against reverse, now against last time).
    ShareOf {
        /// Share, 1 = equal.
        share: f64,
        /// Condition of the reading that it is compared with.
        other: Box<Condition>,
    },
    /// Could not be taken, and why.
    NotPossible {
        /// Reason, as typed.
        why: String,
    },
}

/// One reading.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Reading {
    /// Stable id within the visit.
    pub id: String,
    /// What was read.
    pub port: Port,
    /// On which path; left where there is one only, or where both share the port.
    #[serde(default, skip_serializing_if = "Path::is_left")]
    pub path: Path,
    /// What the machine was doing.
    pub condition: Condition,
    /// Id of the rigging (which instrument was on which port) that this reading was taken with; empty: not said.
    #[serde(default)]
    pub rigging: String,
    /// What was seen; none while the field is empty or what is typed cannot be read.
    #[serde(default)]
    pub seen: Option<Seen>,
    /// The text as typed: kept even where it cannot be read as a value.
    #[serde(default)]
    pub typed: String,
    /// Free note.
    #[serde(default)]
    pub note: String,
}

/// An instrument on a port since a moment: its bias is shared by all readings taken with it.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize)]
pub struct Rigging {
    /// Stable id within the visit.
    pub id: String,
    /// Instrument id (shop list).
    pub instrument: String,
    /// Port it stands on.
    pub port: Port,
}

/// Which loop port is side A.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum SideNaming {
    /// A is known to be high going forward.
    #[default]
    Known,
    /// Ports are named as marked here; A and B may be swapped, and stay a hypothesis.
    AsMarked,
}
