//! One machine as it is kept.

use super::{Figure, FigureId, MachineClass, OnBench, Ticks};
use crate::quantity::Measure;
use crate::readings::{Condition, Port, SideNaming};
use serde::{Deserialize, Serialize};
use std::collections::BTreeMap;

/// Where a port is on this machine and what it takes to get a gauge on it.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct PortNote {
    /// Where it is on this machine, in the mechanic's words.
    pub place: String,
    /// Thread and size of the adapter.
    pub adapter: String,
    /// Minutes to get at it beyond the ordinary (belly plate off), as typed.
    pub access_minutes: Option<f64>,
    /// The minutes as typed, while they cannot be read as a figure.
    #[serde(skip_serializing_if = "String::is_empty")]
    pub access_typed: String,
}

/// An expected window from the unit's own manual: used as given.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct ManualWindow {
    /// Port.
    pub port: Port,
    /// Condition it holds in; `doing`, direction, engine and flags are compared.
    pub condition: Condition,
    /// Lowest.
    pub low: Measure,
    /// Highest.
    pub high: Measure,
    /// Page or table in the manual, as typed.
    #[serde(default)]
    pub reference: String,
}

/// A unit: class and ticks are enough to start; figures sharpen it.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Unit {
    /// Stable id.
    pub id: String,
    /// Yard number or whatever name the yard knows it by.
    pub name: String,
    /// Class of machine.
    pub class: MachineClass,
    /// What it has.
    pub ticks: Ticks,
    /// Figures, those that are known.
    pub figures: BTreeMap<FigureId, Figure>,
    /// Leakages that a bench found, with their day: later case flows are held against them.
    #[serde(skip_serializing_if = "BTreeMap::is_empty")]
    pub bench: BTreeMap<FigureId, OnBench>,
    /// Ports on this machine.
    pub ports: BTreeMap<Port, PortNote>,
    /// Windows from the unit's manual.
    pub manual: Vec<ManualWindow>,
    /// Which loop port is side A.
    pub sides: SideNaming,
    /// Free note.
    pub note: String,
    /// Fields written by a newer version of the program: kept as they are.
    #[serde(flatten)]
    pub extra: BTreeMap<String, serde_json::Value>,
}

impl Unit {
    /// The value of a figure where it is known and can be read, base unit of its kind.
    pub fn known(&self, id: FigureId) -> Option<f64> {
        self.figures
            .get(&id)
            .and_then(|f| f.value)
            .map(|m| m.base())
    }
}
