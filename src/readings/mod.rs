//! Readings: conditions, ports, instruments, and what was seen, with its uncertainty.

mod condition;
pub mod instrument;
mod port;
mod reading;

pub use condition::{Condition, Direction, Doing, EngineSpeed, Lever, OilTemperature, Place};
pub use port::Port;
pub use reading::{Reading, Rigging, Seen, SideNaming};
