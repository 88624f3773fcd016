//! A reading without what is typed in it: what most parts of the screen need to know, and what stays the same while a value
//! is being typed.

use super::side::Sides;
use crate::readings::{Condition, Path, Port, Reading};

/// Where, what the machine did, and whether there is an answer.
#[derive(Clone, Debug, PartialEq)]
pub struct Taken {
    /// Reading id.
    pub id: String,
    /// Port.
    pub port: Port,
    /// Path; left where the port is there once.
    pub path: Path,
    /// Condition.
    pub condition: Condition,
    /// There is an answer.
    pub is_read: bool,
}

impl Taken {
    /// Of a reading.
    pub fn of(reading: &Reading, sides: Sides) -> Taken {
        Taken {
            id: reading.id.clone(),
            port: reading.port,
            path: sides.path(reading.port, reading.path),
            condition: reading.condition,
            is_read: reading.seen.is_some(),
        }
    }
}
