//! Readings: conditions, ports, instruments, and what was seen, with its uncertainty.

mod condition;
pub mod instrument;
mod path;
mod port;
mod reading;

pub use condition::{
    Condition, Direction, Doing, EngineSpeed, Lever, OilTemperature, Place, Stroked,
};
pub use path::Path;
pub use port::Port;
pub use reading::{Reading, Rigging, Seen, SideNaming};
