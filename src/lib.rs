//! Lowside: the fault-finding calculator for closed-loop hydrostatic drives.
//!
//! The house has two storeys. Below: a pure core that knows no browser and runs natively and in wasm alike. Above: the app.
//! Imports point down only.
//!
//! | room | what it holds |
//! | --- | --- |
//! | [`math`] | elementary functions that give the same bits on every target |
//! | [`quantity`] | units of measure: parsing what a person types, printing what they want to read |
//! | [`fluid`] | oil: viscosity and density at temperature, grades, cleanliness |
//! | [`unit`] | the unit profile: what is known of one machine, and where each figure comes from |
//! | [`count`] | turns counted by tapping, and their time |
//! | [`readings`] | conditions, ports, instruments, readings |
//! | [`circuit`] | parameters, elements, solver: a condition in, pressures and flows out |
//! | [`faults`] | the catalogue of causes |
//! | [`observations`] | what can be seen, heard and felt without a gauge |
//! | [`checks`] | the checks a mechanic can make, with minutes, hazards and precautions |
//! | [`windows`] | what a healthy unit should show |
//! | [`ranking`] | from readings to causes |
//! | [`neutral`] | where the swash stands when nothing is asked, and how to set it |
//! | [`next`] | the next check, the next repair, when to stop |
//! | [`tracking`] | straight tracking of a machine with two sides: which side is faster, why, what to turn |
//! | [`yard`] | the yard check, wear over the hours, what closed cases teach |
//! | [`assessment`] | what an assessment hands out |
//! | [`call`] | what the record of one call says: words, sides, how it ended, what to put back |
//! | [`report`] | the hand-over report: one page, plain text, readings for a spreadsheet |
//! | [`record`] | visits and units as they are kept; import, export, migration |
//! | [`pack`] | records made small: a dictionary, digits, wide characters |
//! | [`tag`] | the tag of a unit: its profile in a QR code |
//! | [`store`] | where the record is kept |
// `forbid` would not let the build's own cut through the app be marked: see `app::later`, the only place that allows it.
#![deny(unsafe_code)]
#![warn(missing_docs)]

#[cfg(target_arch = "wasm32")]
pub mod app;
pub mod assessment;
pub mod bench;
pub mod call;
pub mod caution;
pub mod checks;
pub mod circuit;
pub mod count;
pub mod demo;
pub mod faults;
pub mod fluid;
pub mod heat;
pub mod kinematics;
pub mod machine;
pub mod math;
pub mod neutral;
pub mod next;
pub mod observations;
pub mod pack;
pub mod quantity;
pub mod ranking;
pub mod readings;
pub mod record;
pub mod report;
pub mod store;
pub mod tag;
pub mod tracking;
pub mod unit;
pub mod windows;
pub mod yard;
