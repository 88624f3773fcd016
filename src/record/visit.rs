//! A visit: one call to one unit, as it is kept.

use crate::bench::stand::BenchSheet;
use crate::readings::{JugCatch, Reading, Rigging, Seen};
use crate::tracking::TrackingSheet;
use crate::yard::YardSheet;
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
    /// Earlier values of readings that were taken again, by reading id, oldest first.
    #[serde(skip_serializing_if = "BTreeMap::is_empty")]
    pub earlier: BTreeMap<String, Vec<Earlier>>,
    /// What was caught in a jug for a flow, by reading id.
    #[serde(skip_serializing_if = "BTreeMap::is_empty")]
    pub caught: BTreeMap<String, JugCatch>,
    /// What is typed in the heading of a reading and cannot be read as a figure, by reading id and field. It comes back after
    /// a reload like any other text.
    #[serde(skip_serializing_if = "BTreeMap::is_empty")]
    pub headings: BTreeMap<String, BTreeMap<String, String>>,
    /// Checks that were made without leaving a reading, by check id.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub made: Vec<String>,
    /// What had to be put back and was answered for, by the line as it was read.
    #[serde(skip_serializing_if = "BTreeMap::is_empty")]
    pub put_back: BTreeMap<String, PutBack>,
    /// The neutral sheet of the left or only path, once something was entered in it.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub neutral: Option<super::NeutralSheet>,
    /// The same for the right path, where there are two.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub neutral_right: Option<super::NeutralSheet>,
    /// The tracking sheet of a machine with two sides; none where nobody began one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub tracking: Option<TrackingSheet>,
    /// The sheet of a yard check: a visit that has one is a yard check, not a call.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub yard: Option<YardSheet>,
    /// Hour meter at the visit.
    #[serde(skip_serializing_if = "crate::quantity::Typed::is_empty")]
    pub hours: crate::quantity::Typed,
    /// The bench sheet of its pump or motor; none where nobody began one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub bench: Option<BenchSheet>,
    /// What is entered for the closing while the call is still open.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub closing: Option<Closing>,
    /// Closed, with the cause found (fault id) and what proved it.
    pub closed: Option<Closing>,
    /// What the next one has to bring, as typed.
    #[serde(skip_serializing_if = "String::is_empty")]
    pub bring: String,
    /// Free note.
    pub note: String,
    /// Fields written by a newer version: kept as they are.
    #[serde(flatten)]
    pub extra: BTreeMap<String, serde_json::Value>,
}

/// The value of a reading before it was taken again.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Earlier {
    /// What was seen.
    pub seen: Option<Seen>,
    /// The text as it was typed.
    pub typed: String,
    /// When it was taken again (ISO 8601 text).
    pub when: String,
}

/// Answer to a line of the put-back list.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum PutBack {
    /// Seen to be so.
    Done,
    /// Does not apply, and why. It is no answer while the reason is empty.
    Struck(String),
}

impl PutBack {
    /// True where it answers the line.
    #[must_use]
    pub fn is_settled(&self) -> bool {
        match self {
            PutBack::Done => true,
            PutBack::Struck(why) => !why.trim().is_empty(),
        }
    }
}

/// Whether the trouble was gone after what was done.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Afterwards {
    /// Nobody said.
    #[default]
    NotSaid,
    /// Tried out, and gone.
    Gone,
    /// Tried out, and still there.
    StillThere,
    /// Not tried out.
    NotTried,
}

impl Afterwards {
    /// What can be said.
    pub const ALL: [Afterwards; 3] = [
        Afterwards::Gone,
        Afterwards::StillThere,
        Afterwards::NotTried,
    ];

    /// True where nobody said.
    #[must_use]
    pub fn is_not_said(&self) -> bool {
        *self == Afterwards::NotSaid
    }

    /// Words for a screen.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Afterwards::NotSaid => "Not said",
            Afterwards::Gone => "Gone",
            Afterwards::StillThere => "Still there",
            Afterwards::NotTried => "Not tried out",
        }
    }

    /// Stable code for test ids.
    #[must_use]
    pub fn code(self) -> &'static str {
        match self {
            Afterwards::NotSaid => "not-said",
            Afterwards::Gone => "gone",
            Afterwards::StillThere => "still",
            Afterwards::NotTried => "not-tried",
        }
    }
}

/// How a visit ended.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Closing {
    /// Cause, as a fault id code; empty where none was found.
    pub cause: String,
    /// A second cause at work at the same time, as a fault id code.
    #[serde(skip_serializing_if = "String::is_empty")]
    pub also: String,
    /// True where the cause was proved on the machine.
    #[serde(skip_serializing_if = "std::ops::Not::not")]
    pub is_proved: bool,
    /// What proved it.
    pub proof: String,
    /// What was done.
    #[serde(skip_serializing_if = "String::is_empty")]
    pub done: String,
    /// Whether the trouble was gone afterwards.
    #[serde(skip_serializing_if = "Afterwards::is_not_said")]
    pub afterwards: Afterwards,
    /// Parts used.
    #[serde(skip_serializing_if = "String::is_empty")]
    pub parts: String,
    /// When (ISO 8601 text).
    pub when: String,
}

impl Visit {
    /// What was caught for a reading, where its figure is still the one that the jug gave.
    #[must_use]
    pub fn caught_for(&self, reading: &Reading) -> Option<&JugCatch> {
        let caught = self.caught.get(&reading.id)?;
        caught.behind(reading).map(|_| caught)
    }

    /// Hour meter, h, where it can be read.
    #[must_use]
    pub fn hour_meter(&self) -> Option<f64> {
        let value = self.hours.value?.try_in_unit(crate::quantity::Unit::Hour);
        value.ok().filter(|h| h.is_finite() && *h >= 0.0)
    }

    /// True for a yard check.
    #[must_use]
    pub fn is_yard_check(&self) -> bool {
        self.yard.is_some()
    }

    /// True where the other says the same about the machine: nothing that bears on a window or on the order of causes differs.
    /// Texts, ticks and the closing may.
    #[must_use]
    pub fn says_the_same(&self, other: &Visit) -> bool {
        let same = |one: &Reading, other: &Reading| {
            (&one.id, one.port, &one.rigging) == (&other.id, other.port, &other.rigging)
                && one.condition == other.condition
                && one.seen == other.seen
        };
        self.id == other.id
            && self.unit == other.unit
            && (self.alone, self.after_repair) == (other.alone, other.after_repair)
            && self.observations == other.observations
            && self.riggings == other.riggings
            && self.caught == other.caught
            && self.readings.len() == other.readings.len()
            && self
                .readings
                .iter()
                .zip(&other.readings)
                .all(|(one, other)| same(one, other))
    }
}
