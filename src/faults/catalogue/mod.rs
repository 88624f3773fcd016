//! The catalogue table: one file a group, put together in the order of the ids.
//!
//! Base rates, ranges and minutes are *common practice* from memory of the trade: starting values that a shop's own closed
//! visits move. Ranges of additive orifices (L/min per √bar) and leaks belong to the reference machine of
//! [`crate::circuit::healthy`]: 75 cm³/rev pump, 15 cm³/rev charge pump.

mod charge;
mod control;
mod drive;
mod flushing;
mod heat;
mod loop_side;
mod people;
mod possible;
#[cfg(test)]
mod signs;
#[cfg(test)]
mod tests;
mod two_paths;

use super::{Column, Fault, FaultId, SeverityShape};

/// Alternative ways in which a fault shows: a list of bends for each.
macro_rules! ways {
    ($([$($param:ident: $bend:expr),+ $(,)?]),+ $(,)?) => {
        &[$($crate::faults::Effect { bends: &[$((Param::$param, $bend)),+] }),+]
    };
}
use ways;

/// What most entries share; each table entry overwrites what is its own.
const BASE: Fault = Fault {
    id: FaultId::NotListed,
    title: "",
    per_hundred: 0.0,
    column: Column::Healthy,
    severity: SeverityShape::Even,
    effects: &[],
    explains: "",
    proof: "",
    repair: "",
    minutes: 0.0,
    destroys_evidence: false,
    needs_manual: false,
    stop_work: false,
    caution: "",
    possible: possible::always,
};

const COUNT: usize = FaultId::ALL.len();

/// The groups, in any order: the table is sorted by id when it is put together.
const GROUPS: [&[Fault]; 8] = [
    charge::FAULTS,
    flushing::FAULTS,
    loop_side::FAULTS,
    control::FAULTS,
    drive::FAULTS,
    heat::FAULTS,
    people::FAULTS,
    two_paths::FAULTS,
];

/// Every entry at the place of its id. A missing or doubled entry does not compile.
static TABLE: [Fault; COUNT] = gather();

const fn gather() -> [Fault; COUNT] {
    let mut table = [BASE; COUNT];
    let mut seen = [false; COUNT];
    let mut group = 0;
    while group < GROUPS.len() {
        let mut i = 0;
        while i < GROUPS[group].len() {
            let entry = GROUPS[group][i];
            let at = entry.id as usize;
            assert!(!seen[at], "two catalogue entries for one id");
            seen[at] = true;
            table[at] = entry;
            i += 1;
        }
        group += 1;
    }
    let mut at = 0;
    while at < COUNT {
        assert!(seen[at], "an id without a catalogue entry");
        at += 1;
    }
    table
}

/// Every entry in the order of [`FaultId::ALL`].
#[must_use]
pub fn all() -> &'static [Fault] {
    &TABLE
}

/// The entry of an id. Every id has one.
#[must_use]
pub fn find(id: FaultId) -> Option<&'static Fault> {
    TABLE.get(id as usize)
}
