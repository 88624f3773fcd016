//! Readings under one heading: those taken in the same condition, so that one edit serves all of them.

use crate::readings::{Condition, Direction, Lever, Path, Reading, Stroked};

/// Readings that share a condition.
#[derive(Clone, Debug, PartialEq)]
pub struct Group {
    /// The condition they share.
    pub condition: Condition,
    /// Places in the list of readings, in the order taken.
    pub at: Vec<usize>,
}

/// The condition without what says nothing in it: in neutral neither direction, lever nor the side stroked counts.
pub fn settled(mut condition: Condition) -> Condition {
    if condition.doing.is_neutral() {
        condition.direction = Direction::default();
        condition.lever = Lever::default();
        condition.stroked = Stroked::default();
    }
    condition
}

/// True where two conditions are the same to the machine.
pub fn same(one: &Condition, other: &Condition) -> bool {
    settled(*one) == settled(*other)
}

/// Groups readings by condition, in the order in which each condition first appears. Readings named in `pinned` stay
/// together and apart from all others: their heading is being edited, and must not run into another half-way through. What is
/// read on the right stands under the same port of the left.
pub fn groups(readings: &[Reading], pinned: &[String]) -> Vec<Group> {
    let mut groups: Vec<(Group, bool)> = Vec::new();
    for (place, reading) in readings.iter().enumerate() {
        let pin = pinned.contains(&reading.id);
        let fits = |(group, pinned): &&mut (Group, bool)| {
            *pinned == pin && same(&group.condition, &reading.condition)
        };
        match groups.iter_mut().find(fits) {
            Some((group, _)) => {
                let at = beside(readings, &group.at, reading).unwrap_or(group.at.len());
                group.at.insert(at, place);
            }
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

/// Where a reading of the right goes among those of its group: under the first one of the left that has no right yet; none where it
/// goes to the end.
fn beside(readings: &[Reading], at: &[usize], reading: &Reading) -> Option<usize> {
    if reading.path.is_left() {
        return None;
    }
    let of = |path: Path| {
        at.iter().enumerate().filter(move |(_, place)| {
            readings
                .get(**place)
                .is_some_and(|other| other.port == reading.port && other.path == path)
        })
    };
    let pairs = of(Path::Right).count();
    of(Path::Left).nth(pairs).map(|(row, _)| row + 1)
}

/// Pairs of the same port on left and right within a group, as places in the list of readings: the first of one side with the first
/// of the other.
pub fn pairs(readings: &[Reading], at: &[usize]) -> Vec<(usize, usize)> {
    let mut rights: Vec<usize> = Vec::new();
    let mut lefts: Vec<usize> = Vec::new();
    for place in at {
        match readings.get(*place).map(|reading| reading.path) {
            Some(Path::Left) => lefts.push(*place),
            Some(Path::Right) => rights.push(*place),
            None => {}
        }
    }
    let port = |place: usize| readings.get(place).map(|reading| reading.port);
    let mut pairs = Vec::new();
    for left in lefts {
        if let Some(row) = rights.iter().position(|right| port(*right) == port(left)) {
            pairs.push((left, rights.remove(row)));
        }
    }
    pairs
}
