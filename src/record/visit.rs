//! A visit: one call to one unit, as it is kept.

use crate::readings::{Reading, Rigging};
use serde::{Deserialize, Serialize};
use std::collections::BTreeMap;

/// Answer to an observation without a gauge. "Not looked" is the absence of an answer and never a no.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Answer {
    /// Seen by the mechanic.
    Seen,
    /// Looked for and not there.
    NotSeen,
    /// The operator says so; counts about half.
    OperatorSays,
    /// The operator says not.
    OperatorSaysNot,
}

/// A visit.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Visit {
    /// Stable id.
    pub id: String,
    /// Unit id.
    pub unit: String,
    /// Day and time it was opened, as the device had it (ISO 8601 text).
    pub opened: String,
    /// Complaint in the operator's words.
    pub complaint: String,
    /// Alone on site; none: not asked yet.
    pub alone: Option<bool>,
    /// A repair was made just before the trouble began.
    pub after_repair: Option<bool>,
    /// Observations, by stable observation id.
    pub observations: BTreeMap<String, Answer>,
    /// Riggings.
    pub riggings: Vec<Rigging>,
    /// Readings in the order taken.
    pub readings: Vec<Reading>,
    /// Precautions ticked for a hazardous check: check id to the facts ticked.
    pub precautions: BTreeMap<String, Vec<String>>,
    /// Closed, with the cause found (fault id) and what proved it.
    pub closed: Option<Closing>,
    /// Free note.
    pub note: String,
    /// Fields written by a newer version: kept as they are.
    #[serde(flatten)]
    pub extra: BTreeMap<String, serde_json::Value>,
}

/// How a visit ended.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Closing {
    /// Cause, as a fault id code; empty where none was found.
    pub cause: String,
    /// What proved it.
    pub proof: String,
    /// When (ISO 8601 text).
    pub when: String,
}
