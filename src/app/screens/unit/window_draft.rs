//! A window from the manual while it is typed. What is not complete yet is kept with the unit, so that nothing typed is lost.

use serde::{Deserialize, Serialize};

use crate::app::parts::Entry;
use crate::quantity::{Measure, UnitPrefs};
use crate::readings::{Condition, Direction, Doing, EngineSpeed, Port};
use crate::unit::{ManualWindow, Unit};

/// Under this name a window that is not complete yet is kept with the unit.
const DRAFT: &str = "draft_window";

/// Which engine speed, before its figure.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum EngineAsk {
    /// Low idle.
    LowIdle,
    /// High idle.
    #[default]
    HighIdle,
    /// A speed of its own.
    Measured,
}

/// A window while it is typed.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Draft {
    /// Port.
    pub port: Option<Port>,
    /// What the machine is doing.
    pub doing: Option<Doing>,
    /// Direction.
    pub direction: Direction,
    /// Engine speed.
    pub engine: EngineAsk,
    /// Engine speed, where it is given.
    pub rpm: Entry,
    /// Lowest.
    pub low: Entry,
    /// Highest.
    pub high: Entry,
    /// Page or table.
    pub reference: String,
}

impl Draft {
    /// The draft that is kept with the unit; an empty one where none is.
    pub fn of(unit: &Unit) -> Draft {
        unit.extra
            .get(DRAFT)
            .and_then(|value| serde_json::from_value(value.clone()).ok())
            .unwrap_or_default()
    }

    /// Keeps it with the unit.
    pub fn keep(self, unit: &mut Unit) {
        match serde_json::to_value(&self) {
            Ok(value) if self != Draft::default() => unit.extra.insert(DRAFT.to_owned(), value),
            _ => unit.extra.remove(DRAFT),
        };
    }

    /// A draft that starts from a window of the list.
    pub fn from_window(window: &ManualWindow, prefs: &UnitPrefs) -> Draft {
        let entry = |measure: Measure| Entry {
            typed: prefs.edit_text(measure),
            value: Some(measure),
        };
        let (engine, rpm) = match window.condition.engine {
            EngineSpeed::LowIdle => (EngineAsk::LowIdle, Entry::default()),
            EngineSpeed::HighIdle => (EngineAsk::HighIdle, Entry::default()),
            EngineSpeed::Measured(speed) => (EngineAsk::Measured, entry(speed)),
        };
        Draft {
            port: Some(window.port),
            doing: Some(window.condition.doing),
            direction: window.condition.direction,
            engine,
            rpm,
            low: entry(window.low),
            high: entry(window.high),
            reference: window.reference.clone(),
        }
    }

    /// The window.
    ///
    /// # Errors
    /// What is missing or wrong, in words.
    pub fn window(&self) -> Result<ManualWindow, &'static str> {
        let port = self.port.ok_or("Choose the port.")?;
        let doing = self.doing.ok_or("Choose what the machine is doing.")?;
        let engine = match (self.engine, self.rpm.value) {
            (EngineAsk::LowIdle, _) => EngineSpeed::LowIdle,
            (EngineAsk::HighIdle, _) => EngineSpeed::HighIdle,
            (EngineAsk::Measured, Some(speed)) => EngineSpeed::Measured(speed),
            (EngineAsk::Measured, None) => return Err("Type the engine speed of the window."),
        };
        let low = self.low.value.ok_or("Type the lowest value.")?;
        let high = self.high.value.ok_or("Type the highest value.")?;
        if low.kind() != port.kind() || high.kind() != port.kind() {
            return Err("Type lowest and highest again: they were typed for another port.");
        }
        if low.base() > high.base() {
            return Err("The lowest value is above the highest.");
        }
        Ok(ManualWindow {
            port,
            condition: Condition {
                doing,
                direction: self.direction,
                engine,
                ..Condition::start()
            },
            low,
            high,
            reference: self.reference.trim().to_owned(),
        })
    }
}
