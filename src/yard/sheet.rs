//! The sheet as it is kept.

use super::field::Field;
use crate::quantity::Typed;
use crate::quantity::Unit;
use crate::readings::Place;
use serde::{Deserialize, Serialize};
use std::collections::BTreeMap;

/// On the way out, or back in.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum Leg {
    /// Before it goes out.
    #[default]
    Out,
    /// When it comes back.
    In,
    /// In between, in the yard.
    Between,
}

impl Leg {
    /// Every leg, in the order in which screens offer them.
    pub const ALL: [Leg; 3] = [Leg::Out, Leg::In, Leg::Between];

    /// Words for a screen.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Leg::Out => "Going out",
            Leg::In => "Coming in",
            Leg::Between => "In between",
        }
    }

    /// Stable code for test ids.
    #[must_use]
    pub fn code(self) -> &'static str {
        match self {
            Leg::Out => "out",
            Leg::In => "in",
            Leg::Between => "between",
        }
    }
}

/// The sheet of one yard check.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct YardSheet {
    /// Out or in.
    pub leg: Leg,
    /// Figures as typed.
    pub fields: BTreeMap<Field, Typed>,
    /// What was looked at: look id to the code of the answer.
    pub looks: BTreeMap<String, String>,
    /// Where the oil temperature was taken.
    pub place: Place,
    /// Instrument on charge, by its id; empty: not said.
    pub gauge: String,
    /// Tachometer, by its id; empty: not said.
    pub tachometer: String,
    /// What the drain was measured with, by its id; empty: not said.
    pub meter: String,
    /// Which ramp or drag the loaded run was made on, in the yard's words.
    pub course: String,
    /// Fields written by a newer version: kept as they are.
    #[serde(flatten)]
    pub extra: BTreeMap<String, serde_json::Value>,
}

impl YardSheet {
    /// The figure of a field in the unit that [`Field::asks`] names, where it can be read.
    #[must_use]
    pub fn value(&self, field: Field) -> Option<f64> {
        self.value_in(field, field.asks().0)
    }

    /// The figure of a field in a unit.
    #[must_use]
    pub fn value_in(&self, field: Field, unit: Unit) -> Option<f64> {
        self.fields.get(&field)?.value?.try_in_unit(unit).ok()
    }

    /// Sets a figure as it was typed; an empty one is taken out.
    pub fn set(&mut self, field: Field, typed: Typed) {
        if typed.is_empty() {
            self.fields.remove(&field);
        } else {
            self.fields.insert(field, typed);
        }
    }

    /// True where nothing was entered yet.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.fields.is_empty() && self.looks.is_empty()
    }
}
