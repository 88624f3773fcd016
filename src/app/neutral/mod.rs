//! The neutral screen of a call: the steps of this control kind with their cautions, entries with big keys, results drawn.

mod adjuster;
mod creep;
mod edit;
mod figures;
mod lines;
mod plot;
mod scale;
mod screen;
mod series;
mod step;

pub use screen::{NeutralScreen, NeutralScreenProps};
