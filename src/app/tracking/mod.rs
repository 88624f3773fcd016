//! The tracking screen: the order of the work, runs with big keys and counters, what they come to, the path before and after.
//!
//! Nothing is calculated here but in `crate::tracking`.

mod counters;
mod head;
mod line;
mod plan_view;
mod results;
mod screen;
mod steps;
mod words;

pub use screen::{TrackingScreen, TrackingScreenProps};
