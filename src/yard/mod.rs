//! The yard check: what a unit is looked at for on its way out and back in, its wear over the hours, and what the shop's own
//! closed cases teach.
//!
//! * [`YardSheet`] is the sheet as it is kept, within a [`crate::record::Visit`]; [`steps`] is its order as data.
//! * [`wear`] turns readings into coefficients that neither oil temperature nor engine speed moves: laminar leakage goes with
//!   pressure over viscosity (Wilson; Schlösser), so that March and July lie on one line.
//! * [`History`] puts the coefficients of a unit in order and breaks them at a repair or another instrument; [`trend`] fits them
//!   robustly and says when to look again; a projection stands only where the points carry one.
//! * [`report`] is the whole sheet in one pure call: every step judged, the change since it went out, what was not checked.
//! * [`learn`] updates the base rates of causes from closed visits.

mod baseline;
pub mod calendar;
mod change;
mod field;
mod history;
mod judge;
pub mod labels;
pub mod law;
pub mod learn;
mod limits;
mod look;
mod outlook;
mod report;
mod robust;
mod sheet;
mod steps;
mod taken;
pub mod trend;
pub mod wear;
mod words;

pub use baseline::Baseline;
pub use change::{Change, OutCheck, out_of, value_words};
pub use field::Field;
pub use history::{Break, Grouped, History, Point};
pub use look::{LOOKS, Look, LookOption};
pub use outlook::{HOT, Outlook, Series, outlook};
pub use report::{Grade, Judged, NEVER_CHECKED, Report, Verdict, report};
pub use robust::{Robust, robust, student_quantile};
pub use sheet::{Leg, YardSheet};
pub use steps::{MINUTES, Step, steps};
pub use words::{ABOUT_COUPLINGS, ABOUT_LIMITS, number, percent};
