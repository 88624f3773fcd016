//! The neutral sheet of a visit, as it is kept: every text as it was typed beside the figure it was read as.

use crate::neutral::adjust::Sense;
use crate::quantity::{Kind, Typed, Unit};
use crate::readings::{Direction, EngineSpeed};
use serde::{Deserialize, Serialize};
use std::collections::BTreeMap;

/// A figure of the sheet. The codes stand in files that people keep.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Field {
    /// Oil temperature at the drain hose.
    Oil,
    /// Engine speed, where it was measured.
    Engine,
    /// Wheel turns counted in neutral.
    CreepTurns,
    /// Time over which they were counted.
    CreepTime,
    /// Wheel turns counted with the servo ports bridged.
    BridgedTurns,
    /// Time over which they were counted.
    BridgedTime,
    /// Loop difference A − B, motor held.
    Difference,
    /// Servo pressure, port that strokes it forward.
    ServoForward,
    /// Servo pressure, port that strokes it in reverse.
    ServoReverse,
    /// Residual pilot pressure, forward line.
    PilotForward,
    /// Residual pilot pressure, reverse line.
    PilotReverse,
    /// Pilot pressure at which it starts forward.
    PilotStartForward,
    /// Pilot pressure at which it starts in reverse.
    PilotStartReverse,
    /// Coil current at which it starts forward.
    ThresholdForward,
    /// Coil current at which it starts in reverse.
    ThresholdReverse,
    /// Coil current from which it goes no faster forward.
    EndForward,
    /// Coil current from which it goes no faster in reverse.
    EndReverse,
    /// Turns of the adjuster at which the servo pressures are equal.
    Balanced,
}

impl Field {
    /// Kind of quantity. Turns are angles.
    #[must_use]
    pub fn kind(self) -> Kind {
        match self {
            Field::Oil => Kind::Temperature,
            Field::Engine => Kind::RotationalSpeed,
            Field::CreepTurns | Field::BridgedTurns | Field::Balanced => Kind::Angle,
            Field::CreepTime | Field::BridgedTime => Kind::Time,
            Field::Difference
            | Field::ServoForward
            | Field::ServoReverse
            | Field::PilotForward
            | Field::PilotReverse
            | Field::PilotStartForward
            | Field::PilotStartReverse => Kind::Pressure,
            Field::ThresholdForward
            | Field::ThresholdReverse
            | Field::EndForward
            | Field::EndReverse => Kind::Current,
        }
    }

    /// Lowest and highest accepted, in [`Field::unit`].
    #[must_use]
    pub fn range(self) -> (f64, f64) {
        match self {
            Field::Oil => (-40.0, 130.0),
            Field::Engine => (50.0, 6000.0),
            Field::CreepTurns | Field::BridgedTurns => (0.0, 2000.0),
            Field::CreepTime | Field::BridgedTime => (1.0, 3600.0),
            Field::Difference => (-700.0, 700.0),
            Field::Balanced => (-40.0, 40.0),
            Field::ServoForward
            | Field::ServoReverse
            | Field::PilotForward
            | Field::PilotReverse
            | Field::PilotStartForward
            | Field::PilotStartReverse => (0.0, 60.0),
            Field::ThresholdForward
            | Field::ThresholdReverse
            | Field::EndForward
            | Field::EndReverse => (1.0, 4000.0),
        }
    }

    /// The unit of [`Field::range`]: turns for angles, else the base unit of the kind.
    #[must_use]
    pub fn unit(self) -> Unit {
        match self.kind() {
            Kind::Temperature => Unit::DegreeCelsius,
            Kind::RotationalSpeed => Unit::RevolutionPerMinute,
            Kind::Time => Unit::Second,
            Kind::Pressure => Unit::Bar,
            Kind::Current => Unit::Milliampere,
            _ => Unit::Turn,
        }
    }
}

/// Turns of an adjuster from where it was found, at most.
pub const ADJUSTER_TURNS: f64 = 40.0;

/// How a loop difference was read: it decides what can be told from it.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Gauging {
    /// Two transducers zeroed together.
    Paired,
    /// One gauge, switched from side to side.
    #[default]
    Switched,
    /// A gauge on each side.
    TwoGauges,
}

/// What a series of adjuster places was read by; one kind in a series.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum SeriesBy {
    /// Wheel turns counted, wheels free.
    #[default]
    Creep,
    /// Loop difference A − B, motor held.
    Difference,
}

/// One place of the adjuster.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct AdjusterRow {
    /// Stable id within the sheet.
    pub id: String,
    /// Turns in (positive) or out from where it was found.
    pub turns: Typed,
    /// Wheel turns counted, or the loop difference.
    pub shown: Typed,
    /// Time over which turns were counted.
    pub time: Typed,
    /// The way it crept; none where the wheel stood or nobody said.
    pub going: Option<Direction>,
    /// The way the adjuster was last turned.
    pub from: Option<Sense>,
    /// Here it just starts to move this way: then no figure is asked.
    pub starts: Option<Direction>,
}

/// The sheet.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct NeutralSheet {
    /// Figures.
    pub fields: BTreeMap<Field, Typed>,
    /// Engine at the readings.
    pub engine: EngineSpeed,
    /// The way it crept in neutral.
    pub creeps: Option<Direction>,
    /// The way it crept with the servo ports bridged.
    pub creeps_bridged: Option<Direction>,
    /// How the loop difference was read.
    pub gauging: Gauging,
    /// What the series was read by.
    pub by: SeriesBy,
    /// Places of the adjuster in the order in which they were set.
    pub series: Vec<AdjusterRow>,
    /// Steps done, by step id.
    pub done: Vec<String>,
    /// Fields written by a newer version: kept as they are.
    #[serde(flatten)]
    pub extra: BTreeMap<String, serde_json::Value>,
}

impl NeutralSheet {
    /// The value of a figure in [`Field::unit`], where it can be read.
    #[must_use]
    pub fn value(&self, field: Field) -> Option<f64> {
        self.fields.get(&field)?.value_in(field.unit())
    }

    /// Sets a figure as it was typed; an empty one is taken out.
    pub fn set(&mut self, field: Field, typed: Typed) {
        if typed.is_empty() {
            self.fields.remove(&field);
        } else {
            self.fields.insert(field, typed);
        }
    }
}
