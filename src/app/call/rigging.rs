//! Which instrument stands where: one rigging a port, and on a machine with two paths one a side once two instruments are in use.

use super::change::next_id;
use crate::readings::{Path, Port, Reading, Rigging};
use crate::record::Visit;

/// The rigging that stands on a port now: the last one put there. Where left and right are read with instruments of their own,
/// that of the side.
pub fn rigging_on(visit: &Visit, port: Port, path: Path) -> Option<&Rigging> {
    let here = || {
        visit
            .riggings
            .iter()
            .rev()
            .filter(|rigging| rigging.port == port)
    };
    let has_other_side = visit
        .readings
        .iter()
        .any(|reading| reading.port == port && reading.path != path);
    let own = || here().find(|rigging| is_used(visit, rigging, |r| r.path == path));
    has_other_side.then(own).flatten().or_else(|| here().next())
}

fn is_used(visit: &Visit, rigging: &Rigging, by: impl Fn(&Reading) -> bool) -> bool {
    let mut with = visit.readings.iter().filter(|r| r.rigging == rigging.id);
    with.any(|reading| reading.port == rigging.port && by(reading))
}

/// Puts an instrument on a port from one reading on: it was swapped there.
pub fn swap(visit: &mut Visit, port: Port, path: Path, instrument: &str, first: &str) {
    let id = put(visit, port, instrument);
    let later = visit
        .readings
        .iter_mut()
        .skip_while(|reading| reading.id != first);
    for reading in later.filter(|r| r.port == port && r.path == path) {
        reading.rigging.clone_from(&id);
    }
    tidy(visit, port);
}

/// Puts an instrument on a port for all its readings of this side; the other side keeps what it was read with.
pub fn rig(visit: &mut Visit, port: Port, path: Path, instrument: &str) {
    let standing = rigging_on(visit, port, path).cloned();
    let id = match standing {
        Some(shared) if is_used(visit, &shared, |r| r.path != path) => {
            let id = put(visit, port, instrument);
            let own = visit.readings.iter_mut();
            for reading in own.filter(|r| r.path == path && r.rigging == shared.id) {
                reading.rigging.clone_from(&id);
            }
            id
        }
        Some(own) => {
            for rigging in visit.riggings.iter_mut().filter(|r| r.id == own.id) {
                instrument.clone_into(&mut rigging.instrument);
            }
            own.id
        }
        None => put(visit, port, instrument),
    };
    // Said first, it holds for the other side too: one gauge goes from left to right.
    for reading in visit.readings.iter_mut() {
        if reading.port == port && reading.rigging.is_empty() {
            reading.rigging.clone_from(&id);
        }
    }
    tidy(visit, port);
}

/// A new rigging, and its id.
fn put(visit: &mut Visit, port: Port, instrument: &str) -> String {
    let id = next_id(
        'g',
        visit.riggings.iter().map(|rigging| rigging.id.as_str()),
    );
    visit.riggings.push(Rigging {
        id: id.clone(),
        instrument: instrument.to_owned(),
        port,
    });
    id
}

/// Lets go of riggings of the port that no reading was taken with, but for the one that stands there.
fn tidy(visit: &mut Visit, port: Port) {
    let used: Vec<String> = visit
        .readings
        .iter()
        .map(|reading| reading.rigging.clone())
        .collect();
    let newest = visit.riggings.iter().rev().find(|r| r.port == port);
    let newest = newest.map(|rigging| rigging.id.clone());
    visit.riggings.retain(|rigging| {
        used.contains(&rigging.id) || rigging.port != port || Some(&rigging.id) == newest.as_ref()
    });
}
