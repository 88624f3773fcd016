//! Readings under one heading: those taken in the same condition, so that one edit serves all of them.

use crate::readings::{Condition, Direction, Lever, Reading};

/// Readings that share a condition.
#[derive(Clone, Debug, PartialEq)]
pub struct Group {
    /// The condition they share.
    pub condition: Condition,
    /// Places in the list of readings, in the order taken.
    pub at: Vec<usize>,
}

/// The condition without what says nothing in it: in neutral neither direction nor lever counts.
pub fn settled(mut condition: Condition) -> Condition {
    if condition.doing.is_neutral() {
        condition.direction = Direction::default();
        condition.lever = Lever::default();
    }
    condition
}

/// True where two conditions are the same to the machine.
pub fn same(one: &Condition, other: &Condition) -> bool {
    settled(*one) == settled(*other)
}

/// Groups readings by condition, in the order in which each condition first appears. Readings named in `pinned` stay
/// together and apart from all others: their heading is being edited, and must not run into another half-way through.
pub fn groups(readings: &[Reading], pinned: &[String]) -> Vec<Group> {
    let mut groups: Vec<(Group, bool)> = Vec::new();
    for (place, reading) in readings.iter().enumerate() {
        let pin = pinned.contains(&reading.id);
        let fits = |(group, pinned): &&mut (Group, bool)| {
            *pinned == pin && same(&group.condition, &reading.condition)
        };
        match groups.iter_mut().find(fits) {
            Some((group, _)) => group.at.push(place),
            None => groups.push((
                Group {
                    condition: reading.condition,
                    at: vec![place],
                },
                pin,
            )),
        }
    }
    groups.into_iter().map(|(group, _)| group).collect()
}
