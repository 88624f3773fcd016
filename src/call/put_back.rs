//! What was opened, bridged, capped or plugged and has to be put back before the call is closed. A line is asked as long as a
//! check that asks for it was made; what is answered for lapses when the same thing is opened again.

use super::side::Sides;
use crate::checks::{self, Check};
use crate::readings::{Path, Reading, Seen};
use crate::record::{Answer, PutBack, Visit};

/// Checks made on this visit: by a reading taken, by an answer found, or marked.
pub fn made(visit: &Visit) -> Vec<&'static Check> {
    let mut made: Vec<&'static Check> = Vec::new();
    let by_reading = visit
        .readings
        .iter()
        .filter(|reading| is_taken(visit, reading))
        .filter_map(|reading| checks::for_reading(&reading.condition, reading.port));
    let found = |check: &&'static Check| {
        // A check that yields readings is known by those; the operator's word opens nothing, and what can be found in
        // another way tells of no check.
        check.yields.is_empty()
            && check.answers.iter().any(|id| {
                is_only_found_by(check, id)
                    && matches!(
                        visit.observations.get(*id),
                        Some(Answer::Seen | Answer::NotSeen)
                    )
            })
    };
    let marked = visit.made.iter().filter_map(|id| checks::find(id));
    for check in by_reading.chain(checks::all().filter(found)).chain(marked) {
        if !made.iter().any(|other| other.id == check.id) {
            made.push(check);
        }
    }
    made
}

fn is_only_found_by(check: &Check, answer: &str) -> bool {
    checks::all().all(|other| other.id == check.id || !other.answers.contains(&answer))
}

/// True where something was opened for it, whatever came of it.
fn is_taken(visit: &Visit, reading: &Reading) -> bool {
    let is_read = |seen: &Option<Seen>| {
        seen.as_ref()
            .is_some_and(|seen| !matches!(seen, Seen::NotPossible { .. }))
    };
    is_read(&reading.seen)
        || visit
            .earlier
            .get(&reading.id)
            .is_some_and(|earlier| earlier.iter().any(|earlier| is_read(&earlier.seen)))
}

/// The lines to answer for, each once, with the checks that ask for it.
pub fn lines(visit: &Visit) -> Vec<(&'static str, Vec<&'static Check>)> {
    let mut lines: Vec<(&'static str, Vec<&'static Check>)> = Vec::new();
    for check in made(visit) {
        for line in check.put_back {
            match lines.iter_mut().find(|(other, _)| other == line) {
                Some((_, of)) => of.push(check),
                None => lines.push((line, vec![check])),
            }
        }
    }
    lines
}

/// A check with the sides that it was made on, where its ports are there twice: what is put back on one side only is half done.
pub fn with_sides(check: &Check, visit: &Visit, sides: Sides) -> String {
    let on = |path: Path| {
        let mut taken = visit.readings.iter().filter(|r| is_taken(visit, r));
        taken.any(|r| {
            sides.side(r.port, r.path) == Some(path)
                && checks::for_reading(&r.condition, r.port).is_some_and(|of| of.id == check.id)
        })
    };
    let side = match (on(Path::Left), on(Path::Right)) {
        (true, true) => ", left and right",
        (true, false) => ", left",
        (false, true) => ", right",
        (false, false) => "",
    };
    format!("{}{side}", check.title)
}

/// Lines that nobody has answered for yet.
pub fn open(visit: &Visit) -> usize {
    lines(visit)
        .iter()
        .filter(|(line, _)| !visit.put_back.get(*line).is_some_and(PutBack::is_settled))
        .count()
}

/// A value that was not there before: what its check opens is open again.
pub fn lapse(visit: &mut Visit, reading: &str, seen: Option<&Seen>) {
    let Some(reading) = visit.readings.iter().find(|other| other.id == reading) else {
        return;
    };
    if reading.seen.is_none()
        && seen.is_some()
        && let Some(check) = checks::for_reading(&reading.condition, reading.port)
    {
        lapse_check(visit, check.id);
    }
}

/// What this check opens is open again.
pub fn lapse_check(visit: &mut Visit, check: &str) {
    for line in checks::find(check).map_or(&[][..], |check| check.put_back) {
        visit.put_back.remove(*line);
    }
}
