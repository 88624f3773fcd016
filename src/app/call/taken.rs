//! A reading without what is typed in it: what most parts of the screen need to know, and what stays the same while a value
//! is being typed.

use crate::readings::{Condition, Port, Reading};

/// Where, what the machine did, and whether there is an answer.
#[derive(Clone, Debug, PartialEq)]
pub struct Taken {
    /// Reading id.
    pub id: String,
    /// Port.
    pub port: Port,
    /// Condition.
    pub condition: Condition,
    /// There is an answer.
    pub is_read: bool,
}

impl Taken {
    /// Of a reading.
    pub fn of(reading: &Reading) -> Taken {
        Taken {
            id: reading.id.clone(),
            port: reading.port,
            condition: reading.condition,
            is_read: reading.seen.is_some(),
        }
    }
}
