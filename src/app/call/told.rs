//! What stands further up on the screen already, so that it is told once.

use super::cautions;
use super::entry;
use super::gate::place;
use super::group::Group;
use crate::caution::Stands;
use crate::checks;
use crate::readings::{Port, Reading};
use crate::record::Visit;

/// Checks whose precautions are told in full, and places whose cautions are.
#[derive(Clone, Debug, Default)]
pub struct Told {
    /// Rounds of ticks.
    pub checks: Vec<(&'static str, String)>,
    /// Places of cautions.
    pub places: Vec<Stands>,
}

/// For each group, what is told in the groups before it.
pub fn told_before(groups: &[Group], visit: &Visit) -> Vec<Told> {
    let mut told = Told::default();
    let before = groups.iter().map(|group| {
        let before = told.clone();
        let readings: Vec<&Reading> = group
            .at
            .iter()
            .filter_map(|place| visit.readings.get(*place))
            .collect();
        let checks = readings
            .iter()
            .filter_map(|reading| checks::for_reading(&group.condition, reading.port));
        let condition = &group.condition;
        told.checks
            .extend(checks.map(|check| place(check, condition.doing, condition.direction)));
        let open: Vec<Port> = readings
            .iter()
            .filter(|r| entry::is_open(r))
            .map(|r| r.port)
            .collect();
        told.places
            .extend(cautions::places(&group.condition, open.iter()));
        before
    });
    before.collect()
}
