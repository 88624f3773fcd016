//! The bench stand: from a table of readings to efficiencies, a loss fit and a judged sheet.
//!
//! Units inside are the gauge's own: rpm, bar, L/min, N·m, °C, mPa·s, kW, cm³/rev.
//!
//! * [`sheet`] is what is kept: every text as typed. [`paste`] reads a table copied from a spreadsheet.
//! * [`layout`] says which lines are metered and where oil goes; without it no leakage is told from charge flow.
//! * [`point`] joins repeated readings to a point with its spread and says whether it was steady; [`flaw`] says which points say
//!   nothing, and why.
//! * [`analysis`] computes all that follows from the points; [`uncertain`] repeats it with every instrument moved in turn.
//! * [`acceptance`] is the limits of the manual at points and along curves; [`accepted`] judges them.
//! * [`leakage`] tells leakage over pressure at temperatures run and not run.
//! * [`grown`] holds leakage and slip against the profile and says what a grown one points to.
//! * [`fit`] is the loss model; [`judge`] decides with a guard band; [`report`] is the whole sheet in one call.

pub mod acceptance;
pub mod accepted;
pub mod analysis;
pub mod balance;
pub mod channel;
pub mod fit;
pub mod flaw;
pub mod grown;
pub mod items;
pub mod judge;
pub mod layout;
pub mod leakage;
pub mod least_squares;
pub mod paper;
pub mod paste;
pub mod point;
pub mod report;
pub mod sheet;
pub mod uncertain;

pub use analysis::{Analysis, PointResult, analyse};
pub use channel::{Channel, MeasuringClass, Subject};
pub use layout::{Charge, Flushing, Layout, LayoutGap, Meter, ReliefDrain, TorqueCovers};
pub use point::{Point, Steadiness, points};
pub use report::{BenchReport, report};
pub use sheet::{BenchSheet, Row};
