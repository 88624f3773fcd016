//! Readings: conditions, ports, instruments, and what was seen, with its uncertainty.

mod condition;
pub mod help;
pub mod instrument;
pub mod jug;
mod path;
mod port;
mod reading;

pub use condition::{
    Condition, Direction, Doing, EngineSpeed, Lever, OilTemperature, Place, Stroked,
};
pub use help::PortHelp;
pub use jug::JugCatch;
pub use path::Path;
pub use port::Port;
pub use reading::{Reading, Rigging, Seen, SideNaming};
