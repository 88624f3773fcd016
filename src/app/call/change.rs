//! Changes to a visit: every edit of the call screen is one of these, and [`apply`] is the only place that makes them.

use super::gate;
use super::group::settled;
use super::put_back;
use super::rigging::{rig, rigging_on, swap};
use super::side::Wanted;
use crate::quantity::Typed;
use crate::readings::{Condition, JugCatch, Path, Port, Reading, Seen};
use crate::record::{Answer, Closing, Earlier, PutBack, Visit};

/// One edit.
#[derive(Clone, Debug, PartialEq)]
pub enum Change {
    /// Complaint text.
    Complaint(String),
    /// Hour meter as typed.
    Hours(Typed),
    /// Alone on site.
    Alone(Option<bool>),
    /// Began straight after a repair.
    AfterRepair(Option<bool>),
    /// An observation; none takes the answer back.
    Observe(String, Option<Answer>),
    /// Readings added, empty, in this order.
    Add(Vec<Wanted>),
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
    /// On which side a reading was taken: id and path.
    Side(String, Path),
    /// Note of a reading: id and text.
    Note(String, String),
    /// New condition for these readings.
    Condition(Vec<String>, Condition),
    /// Instrument on a port.
    Rig {
        /// Port.
        port: Port,
        /// Path whose readings it was taken with.
        path: Path,
        /// Instrument id.
        instrument: String,
        /// First reading taken with it, where the gauge was swapped; none where it corrects the whole port.
        from: Option<String>,
    },
    /// Precaution facts ticked for a key; none left: the entry goes.
    Precautions(String, Vec<String>),
    /// The engine was stopped and started again: every tick lapses.
    Restarted,
    /// What was caught in a jug for a reading, with the text and the answer that it makes.
    Caught {
        /// Reading id.
        id: String,
        /// Litres and seconds.
        jug: JugCatch,
        /// Text and answer; none where the catch makes no flow yet, and the reading stays as it is.
        said: Option<(String, Option<Seen>)>,
    },
    /// A reading is taken again: the old value stays beside it.
    Retake {
        /// Reading id.
        id: String,
        /// This moment (ISO 8601).
        when: String,
        /// It was looked at again and reads the same, so the value stands.
        same: bool,
    },
    /// Text in a condition heading that is no figure yet, for the readings under it: ids, field, text. Empty text goes.
    Heading(Vec<String>, &'static str, String),
    /// A check that leaves no reading was made, or not after all.
    Made(String, bool),
    /// Answer to a line of the put-back list; none takes it back.
    PutBack(String, Option<PutBack>),
    /// What is entered for the closing.
    Closing(Closing),
    /// The call is closed with what was entered; `when` in ISO 8601.
    Close(String),
    /// Opened again.
    Reopen,
}

impl Change {
    /// What was changed, for "Undo: …".
    pub fn words(&self) -> String {
        match self {
            Change::Complaint(_) => String::from("complaint"),
            Change::Hours(_) => String::from("hour meter"),
            Change::Alone(_) => String::from("alone on site"),
            Change::AfterRepair(_) => String::from("after a repair"),
            Change::Observe(..) => String::from("what was seen"),
            Change::Add(added) if added.len() > 1 => format!("{} readings added", added.len()),
            Change::Add(_) => String::from("reading added"),
            Change::Remove(_) => String::from("reading removed"),
            Change::Entry { .. } => String::from("value"),
            Change::Side(_, path) => format!("side, now {}", path.words()),
            Change::Note(..) => String::from("note"),
            Change::Condition(..) => String::from("condition"),
            Change::Rig { .. } => String::from("gauge"),
            Change::Precautions(..) => String::from("precaution"),
            Change::Restarted => String::from("engine started again"),
            Change::Caught { .. } => String::from("jug"),
            Change::Retake { .. } => String::from("reading taken again"),
            Change::Heading(..) => String::from("condition"),
            Change::Made(..) => String::from("check made"),
            Change::PutBack(..) => String::from("put back"),
            Change::Closing(_) => String::from("closing"),
            Change::Close(_) => String::from("call closed"),
            Change::Reopen => String::from("call opened again"),
        }
    }

    /// True where `next` goes on with what this change began: typing in the same field.
    pub fn goes_on(&self, next: &Change) -> bool {
        match (self, next) {
            (Change::Complaint(_), Change::Complaint(_)) | (Change::Hours(_), Change::Hours(_)) => {
                true
            }
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
            (Change::Caught { id, .. }, Change::Caught { id: then, .. }) => id == then,
            (
                Change::Condition(ids, _) | Change::Heading(ids, ..),
                Change::Condition(then, _) | Change::Heading(then, ..),
            ) => ids == then,
            (Change::Closing(_), Change::Closing(_)) => true,
            (
                Change::PutBack(line, Some(PutBack::Struck(_))),
                Change::PutBack(then, Some(PutBack::Struck(_))),
            ) => line == then,
            _ => false,
        }
    }
}

/// The visit after the change.
pub fn apply(visit: &Visit, change: &Change) -> Visit {
    let mut next = visit.clone();
    match change {
        Change::Complaint(text) => next.complaint.clone_from(text),
        Change::Hours(hours) => next.hours.clone_from(hours),
        Change::Alone(answer) => next.alone = *answer,
        Change::AfterRepair(answer) => next.after_repair = *answer,
        Change::Observe(id, Some(answer)) => {
            next.observations.insert(id.clone(), *answer);
        }
        Change::Observe(id, None) => {
            next.observations.remove(id);
        }
        Change::Add(added) => {
            for wanted in added {
                add(&mut next, *wanted);
            }
        }
        Change::Remove(id) => {
            next.readings.retain(|reading| reading.id != *id);
            next.earlier.remove(id);
            next.caught.remove(id);
            next.headings.remove(id);
        }
        Change::Entry { id, typed, seen } => {
            put_back::lapse(&mut next, id, seen.as_ref());
            if let Some(reading) = find(&mut next, id) {
                reading.typed.clone_from(typed);
                reading.seen.clone_from(seen);
            }
        }
        Change::Side(id, path) => {
            if let Some(reading) = find(&mut next, id) {
                reading.path = *path;
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
            path,
            instrument,
            from: Some(first),
        } => swap(&mut next, *port, *path, instrument, first),
        Change::Rig {
            port,
            path,
            instrument,
            from: None,
        } => rig(&mut next, *port, *path, instrument),
        Change::Precautions(key, facts) if facts.is_empty() => {
            next.precautions.remove(key);
        }
        Change::Precautions(key, facts) => {
            next.precautions.insert(key.clone(), facts.clone());
        }
        Change::Restarted => next.precautions.clear(),
        Change::Caught { id, jug, said } => caught(&mut next, id, jug, said.as_ref()),
        Change::Retake { id, when, same } => retake(&mut next, id, when, *same),
        Change::Heading(ids, field, text) => heading(&mut next, ids, field, text),
        Change::Made(check, is_made) => {
            next.made.retain(|other| other != check);
            if *is_made {
                put_back::lapse_check(&mut next, check);
                next.made.push(check.clone());
            }
        }
        Change::PutBack(line, Some(answer)) => {
            next.put_back.insert(line.clone(), answer.clone());
        }
        Change::PutBack(line, None) => {
            next.put_back.remove(line);
        }
        Change::Closing(closing) => next.closing = Some(closing.clone()),
        Change::Close(when) => {
            let closing = next.closing.take().unwrap_or_default();
            next.closed = Some(Closing {
                when: when.clone(),
                ..closing
            });
        }
        Change::Reopen => {
            next.closing = next.closed.take().or(next.closing.take());
        }
    }
    next
}

/// Keeps the litres and seconds, and the flow that they make.
fn caught(visit: &mut Visit, id: &str, jug: &JugCatch, said: Option<&(String, Option<Seen>)>) {
    if let Some((typed, seen)) = said {
        put_back::lapse(visit, id, seen.as_ref());
        if let Some(reading) = find(visit, id) {
            reading.typed.clone_from(typed);
            reading.seen.clone_from(seen);
        }
    }
    if jug.is_empty() {
        visit.caught.remove(id);
    } else {
        visit.caught.insert(id.to_owned(), jug.clone());
    }
}

/// Keeps the value beside the reading; empties the field where it is read anew.
fn retake(visit: &mut Visit, id: &str, when: &str, same: bool) {
    let Some(reading) = find(visit, id) else {
        return;
    };
    let earlier = Earlier {
        seen: reading.seen.clone(),
        typed: reading.typed.clone(),
        when: when.to_owned(),
    };
    if !same {
        reading.seen = None;
        reading.typed.clear();
    }
    visit
        .earlier
        .entry(id.to_owned())
        .or_default()
        .push(earlier);
}

fn heading(visit: &mut Visit, ids: &[String], field: &str, text: &str) {
    for id in ids {
        let texts = visit.headings.entry(id.clone()).or_default();
        if text.trim().is_empty() {
            texts.remove(field);
        } else {
            texts.insert(field.to_owned(), text.to_owned());
        }
    }
    visit.headings.retain(|_, texts| !texts.is_empty());
}

fn find<'a>(visit: &'a mut Visit, id: &str) -> Option<&'a mut Reading> {
    visit.readings.iter_mut().find(|reading| reading.id == id)
}

/// The next free id with this letter: one above the highest taken, so that an undone id is not met again in a file.
pub fn next_id<'a>(letter: char, taken: impl Iterator<Item = &'a str>) -> String {
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
fn add(visit: &mut Visit, wanted: Wanted) {
    let id = next_id(
        'r',
        visit.readings.iter().map(|reading| reading.id.as_str()),
    );
    let rigging = rigging_on(visit, wanted.port, wanted.path)
        .map(|rigging| rigging.id.clone())
        .unwrap_or_default();
    visit.readings.push(Reading {
        id,
        port: wanted.port,
        path: wanted.path,
        condition: settled(wanted.condition),
        rigging,
        seen: None,
        typed: String::new(),
        note: String::new(),
    });
}
