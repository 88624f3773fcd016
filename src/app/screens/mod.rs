//! One file a screen, and one folder for what belongs to a screen alone.

pub mod settings;
pub mod unit;
pub mod units;
