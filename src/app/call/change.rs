//! Changes to a visit: every edit of the call screen is one of these, and [`apply`] is the only place that makes them.

use super::gate;
use super::group::settled;
use crate::readings::{Condition, Port, Reading, Rigging, Seen};
use crate::record::{Answer, Visit};

/// One edit.
#[derive(Clone, Debug, PartialEq)]
pub enum Change {
    /// Complaint text.
    Complaint(String),
    /// Alone on site.
    Alone(Option<bool>),
    /// Began straight after a repair.
    AfterRepair(Option<bool>),
    /// An observation; none takes the answer back.
    Observe(String, Option<Answer>),
    /// Readings added, empty, in this order.
    Add(Vec<(Port, Condition)>),
    /// A reading taken out, by id.
    Remove(String),
    /// What was seen, with the text as typed.
    Entry {
        /// Reading id.
        id: String,
        /// Text as typed.
        typed: String,
        /// What it means; none while it cannot be read.
        seen: Option<Seen>,
    },
    /// Note of a reading: id and text.
    Note(String, String),
    /// New condition for these readings.
    Condition(Vec<String>, Condition),
    /// Instrument on a port.
    Rig {
        /// Port.
        port: Port,
        /// Instrument id.
        instrument: String,
        /// First reading taken with it, where the gauge was swapped; none where it corrects the whole port.
        from: Option<String>,
    },
    /// Precaution facts ticked for a key; none left: the entry goes.
    Precautions(String, Vec<String>),
}

impl Change {
    /// What was changed, for "Undo: …".
    pub fn words(&self) -> String {
        match self {
            Change::Complaint(_) => String::from("complaint"),
            Change::Alone(_) => String::from("alone on site"),
            Change::AfterRepair(_) => String::from("after a repair"),
            Change::Observe(..) => String::from("what was seen"),
            Change::Add(added) if added.len() > 1 => format!("{} readings added", added.len()),
            Change::Add(_) => String::from("reading added"),
            Change::Remove(_) => String::from("reading removed"),
            Change::Entry { .. } => String::from("value"),
            Change::Note(..) => String::from("note"),
            Change::Condition(..) => String::from("condition"),
            Change::Rig { .. } => String::from("gauge"),
            Change::Precautions(..) => String::from("precaution"),
        }
    }

    /// True where `next` goes on with what this change began: typing in the same field.
    pub fn goes_on(&self, next: &Change) -> bool {
        match (self, next) {
            (Change::Complaint(_), Change::Complaint(_)) => true,
            (
                Change::Entry { id, seen, .. },
                Change::Entry {
                    id: then,
                    seen: and_then,
                    ..
                },
            ) => {
                // A one-touch answer is a step of its own; letters and digits are not.
                let typing = |seen: &Option<Seen>| {
                    matches!(seen, None | Some(Seen::Value { .. } | Seen::Swing { .. }))
                };
                id == then && typing(seen) && typing(and_then)
            }
            (Change::Note(id, _), Change::Note(then, _)) => id == then,
            (Change::Condition(ids, _), Change::Condition(then, _)) => ids == then,
            _ => false,
        }
    }
}

/// The visit after the change.
pub fn apply(visit: &Visit, change: &Change) -> Visit {
    let mut next = visit.clone();
    match change {
        Change::Complaint(text) => next.complaint.clone_from(text),
        Change::Alone(answer) => next.alone = *answer,
        Change::AfterRepair(answer) => next.after_repair = *answer,
        Change::Observe(id, Some(answer)) => {
            next.observations.insert(id.clone(), *answer);
        }
        Change::Observe(id, None) => {
            next.observations.remove(id);
        }
        Change::Add(added) => {
            for (port, condition) in added {
                add(&mut next, *port, *condition);
            }
        }
        Change::Remove(id) => next.readings.retain(|reading| reading.id != *id),
        Change::Entry { id, typed, seen } => {
            if let Some(reading) = find(&mut next, id) {
                reading.typed.clone_from(typed);
                reading.seen.clone_from(seen);
            }
        }
        Change::Note(id, text) => {
            if let Some(reading) = find(&mut next, id) {
                reading.note.clone_from(text);
            }
        }
        Change::Condition(ids, condition) => {
            for check in gate::lapsing(visit, ids, condition) {
                next.precautions.remove(check);
            }
            for reading in next
                .readings
                .iter_mut()
                .filter(|reading| ids.contains(&reading.id))
            {
                reading.condition = settled(*condition);
            }
        }
        Change::Rig {
            port,
            instrument,
            from,
        } => rig(&mut next, *port, instrument, from.as_deref()),
        Change::Precautions(key, facts) if facts.is_empty() => {
            next.precautions.remove(key);
        }
        Change::Precautions(key, facts) => {
            next.precautions.insert(key.clone(), facts.clone());
        }
    }
    next
}

fn find<'a>(visit: &'a mut Visit, id: &str) -> Option<&'a mut Reading> {
    visit.readings.iter_mut().find(|reading| reading.id == id)
}

/// The next free id with this letter: one above the highest taken, so that an undone id is not met again in a file.
fn next_id<'a>(letter: char, taken: impl Iterator<Item = &'a str>) -> String {
    let highest = taken
        .filter_map(|id| {
            id.strip_prefix(letter)
                .and_then(|number| number.parse::<u32>().ok())
        })
        .max()
        .unwrap_or(0);
    format!("{letter}{}", highest.saturating_add(1))
}

/// Adds an empty reading, on the instrument that stands on its port already.
fn add(visit: &mut Visit, port: Port, condition: Condition) {
    let id = next_id(
        'r',
        visit.readings.iter().map(|reading| reading.id.as_str()),
    );
    let rigging = rigging_on(visit, port)
        .map(|rigging| rigging.id.clone())
        .unwrap_or_default();
    visit.readings.push(Reading {
        id,
        port,
        condition: settled(condition),
        rigging,
        seen: None,
        typed: String::new(),
        note: String::new(),
    });
}

/// The rigging that stands on a port now: the last one put there.
pub fn rigging_on(visit: &Visit, port: Port) -> Option<&Rigging> {
    visit
        .riggings
        .iter()
        .rev()
        .find(|rigging| rigging.port == port)
}

/// Puts an instrument on a port: for all its readings, or from one reading on where the gauge was swapped.
fn rig(visit: &mut Visit, port: Port, instrument: &str, from: Option<&str>) {
    if let Some(first) = from {
        let id = next_id(
            'g',
            visit.riggings.iter().map(|rigging| rigging.id.as_str()),
        );
        visit.riggings.push(Rigging {
            id: id.clone(),
            instrument: instrument.to_owned(),
            port,
        });
        let later = visit
            .readings
            .iter_mut()
            .skip_while(|reading| reading.id != first);
        for reading in later.filter(|reading| reading.port == port) {
            reading.rigging.clone_from(&id);
        }
    } else {
        let id = match visit
            .riggings
            .iter_mut()
            .rev()
            .find(|rigging| rigging.port == port)
        {
            Some(standing) => {
                instrument.clone_into(&mut standing.instrument);
                standing.id.clone()
            }
            None => {
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
        };
        let unsaid = visit
            .readings
            .iter_mut()
            .filter(|r| r.port == port && r.rigging.is_empty());
        for reading in unsaid {
            reading.rigging.clone_from(&id);
        }
    }
    let used: Vec<String> = visit
        .readings
        .iter()
        .map(|reading| reading.rigging.clone())
        .collect();
    let newest = rigging_on(visit, port).map(|rigging| rigging.id.clone());
    visit.riggings.retain(|rigging| {
        used.contains(&rigging.id) || rigging.port != port || Some(&rigging.id) == newest.as_ref()
    });
}
