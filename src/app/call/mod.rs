//! The call screen: what was seen, the readings with their windows, and the causes that follow, all in one place.

mod change;
mod entry;
mod group;
mod history;
pub mod map;
mod mark;
mod quick;
mod scale;
mod words;
