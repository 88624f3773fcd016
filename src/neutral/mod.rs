//! Neutral: where the swash stands when nothing is asked, and how to set it.
//!
//! [`offset`] goes from a reading to the swash offset through the solved circuit; [`nulls`] parts control from servo;
//! [`adjust`] finds the null and the dead band on an adjuster's turns; [`electric`] judges currents; [`brake`] says what the
//! parking brake may hold; [`steps`] is the order of work for each control kind.
pub mod adjust;
pub mod belief;
pub mod brake;
pub mod curve;
pub mod electric;
pub mod nulls;
pub mod offset;
pub mod report;
pub mod response;
mod series;
pub mod steps;
pub mod words;
