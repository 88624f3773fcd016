//! One file a screen, and one folder for what belongs to a screen alone.

pub mod report;
pub mod settings;
pub mod tag;
pub mod unit;
pub mod units;
