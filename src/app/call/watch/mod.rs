//! The watch view: while the engine runs, one needle at a time, large enough to be read from two metres. Nothing is typed in it; what was
//! seen is written down afterwards.

mod dial;
mod hold_timer;
mod view;

pub use hold_timer::Kept;
pub use view::{WatchView, Watched};
