//! The checks that a mechanic can make: what they yield, minutes, hazard, the facts to tick first, and what to put back.
//!
//! Minutes and spans are *common practice*, from memory of the trade. Hazard is a gate and never a price: 0 none, 1 ordinary
//! running machine, 2 moving wheels or hot oil at hand, 3 high pressure or a machine that may move with force. The unit's own
//! manual, local rules and licensed practice come before every line here.
//!
//! To add a check: one entry in the table of its group. An id stands in files that people keep: never renamed, never reused.

mod apart;
mod charge;
mod drive;
mod electrics;
mod facts;
mod first_look;
mod held;
mod help;
mod lines;
mod lookup;
#[cfg(test)]
mod tests;
mod yields;

pub use facts::{COMMON, facts, hazard};
pub use help::{CheckHelp, help};
pub use lookup::{for_condition, for_reading};
pub use yields::{Idle, Yield};

/// Highest hazard of a check. Nobody alone on site is offered one.
pub const HIGHEST_HAZARD: u8 = 3;

/// A check.
#[derive(Clone, Copy, Debug)]
pub struct Check {
    /// Stable id (kebab case).
    pub id: &'static str,
    /// Title for a screen.
    pub title: &'static str,
    /// How it is done, one step a line.
    pub how: &'static [&'static str],
    /// What it takes.
    pub instruments: &'static str,
    /// Readings that it yields, with what the machine does for each.
    pub yields: &'static [Yield],
    /// Observations that it answers, by observation id.
    pub answers: &'static [&'static str],
    /// Minutes the first time, rigging included. Common practice; access on this unit comes on top.
    pub minutes_first: f64,
    /// Minutes once rigged. Common practice.
    pub minutes_again: f64,
    /// Hazard, 0 to 3, by itself; [`hazard`] adds what the machine does.
    pub hazard: u8,
    /// Facts of its own to tick before it opens, beside [`COMMON`]. A tick lapses when the engine is started again, after
    /// 15 minutes, or when the condition changes.
    pub precautions: &'static [&'static str],
    /// What it tells apart.
    pub separates: &'static str,
    /// What must be put back before the call is closed.
    pub put_back: &'static [&'static str],
    /// For two-path machines only.
    pub two_path: bool,
    /// Id of a check that must have been made, and been found clean, before this one; empty: none.
    pub after: &'static str,
}

/// What most entries share.
const BASE: Check = Check {
    id: "",
    title: "",
    how: &[],
    instruments: "none",
    yields: &[],
    answers: &[],
    minutes_first: 0.0,
    minutes_again: 0.0,
    hazard: 0,
    precautions: &[],
    separates: "",
    put_back: &[],
    two_path: false,
    after: "",
};

const TABLES: [&[Check]; 7] = [
    first_look::TABLE,
    electrics::TABLE,
    charge::TABLE,
    lines::TABLE,
    drive::TABLE,
    held::TABLE,
    apart::TABLE,
];

/// Every check, roughly in the order in which a call goes: look and ask, electrics and linkage, charge, low-pressure lines,
/// speeds and loop, held checks, taking apart.
pub fn all() -> impl Iterator<Item = &'static Check> {
    TABLES.into_iter().flatten()
}

/// The check of an id; none for an id that this version does not know.
#[must_use]
pub fn find(id: &str) -> Option<&'static Check> {
    all().find(|c| c.id == id)
}
