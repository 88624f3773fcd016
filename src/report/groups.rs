//! Readings by condition, each with what was expected, where that comes from, and the instrument.

use super::{Subject, one_line};
use crate::assessment::{Standing, Window, WindowSource};
use crate::call::words;
use crate::quantity::Typed;
use crate::readings::{Condition, JugCatch, Reading, Seen};

/// Readings of one condition.
#[derive(Clone, Debug, PartialEq)]
pub struct Group {
    /// What the machine did, in words.
    pub condition: String,
    /// Oil, in words.
    pub oil: String,
    /// Its readings.
    pub rows: Vec<Row>,
}

/// One reading.
#[derive(Clone, Debug, PartialEq)]
pub struct Row {
    /// Its number in the call, from 1: reasons and the spreadsheet name it by that.
    pub number: usize,
    /// What was read, with its side.
    pub what: String,
    /// What was seen.
    pub read: String,
    /// What was seen before it was taken again, oldest first.
    pub before: Vec<String>,
    /// Expected window; none where nothing can be said.
    pub expected: Option<String>,
    /// Where the window comes from.
    pub source: Option<WindowSource>,
    /// Where the reading stands against it.
    pub standing: Standing,
    /// Instrument, and its standard uncertainty there.
    pub instrument: String,
    /// Remarks: what the engine says of it, and what was noted.
    pub remarks: Vec<String>,
}

/// Readings by condition, in the order in which they were first taken.
pub(super) fn groups(subject: &Subject) -> Vec<Group> {
    let mut groups: Vec<(Condition, Group)> = Vec::new();
    for (at, reading) in subject.visit.readings.iter().enumerate() {
        let row = row(subject, at + 1, reading);
        let same = |(condition, _): &&mut (Condition, Group)| *condition == reading.condition;
        match groups.iter_mut().find(same) {
            Some((_, group)) => group.rows.push(row),
            None => groups.push((
                reading.condition,
                Group {
                    condition: words::condition(&reading.condition, subject.prefs),
                    oil: words::oil(&reading.condition, subject.prefs),
                    rows: vec![row],
                },
            )),
        }
    }
    groups.into_iter().map(|(_, group)| group).collect()
}

/// The window of a reading.
pub(super) fn window<'a>(subject: &Subject<'a>, reading: &Reading) -> Option<&'a Window> {
    let windows = &subject.assessment.windows;
    windows.iter().find(|window| window.reading == reading.id)
}

/// The instrument that a reading was taken with, as the shop calls it.
pub(super) fn instrument(subject: &Subject, reading: &Reading) -> Option<String> {
    if let Some(caught) = subject.visit.caught_for(reading) {
        return Some(jug(caught, subject));
    }
    let rigging = subject
        .visit
        .riggings
        .iter()
        .find(|rigging| !reading.rigging.is_empty() && rigging.id == reading.rigging)?;
    let instrument = subject
        .instruments
        .iter()
        .find(|instrument| instrument.id == rigging.instrument)?;
    Some(one_line(&instrument.name))
}

/// A jug, with what was caught and how long it took.
fn jug(caught: &JugCatch, subject: &Subject) -> String {
    let told = |typed: &Typed| typed.value.map(|value| subject.prefs.print(value));
    match (told(&caught.volume), told(&caught.time)) {
        (Some(volume), Some(time)) => format!("jug and watch: {volume} in {time}"),
        _ => String::from("jug and watch"),
    }
}

/// What was seen, in words; the text as typed where it is no reading.
pub(super) fn read(subject: &Subject, reading: &Reading) -> String {
    match &reading.seen {
        Some(Seen::NotPossible { why }) if !why.trim().is_empty() => {
            format!("not possible: {}", one_line(why))
        }
        Some(Seen::ShareOf { share, other }) => format!(
            "{} of what it read in {}",
            words::times(*share),
            words::condition(other, subject.prefs)
        ),
        Some(seen) => words::seen(reading.port, seen, subject.prefs),
        None if reading.typed.trim().is_empty() => String::from("not read"),
        None => format!("not readable as a figure: {}", one_line(&reading.typed)),
    }
}

fn row(subject: &Subject, number: usize, reading: &Reading) -> Row {
    let window = window(subject, reading);
    let prefs = subject.prefs;
    let expected = window
        .filter(|w| w.low.is_finite() && w.high.is_finite())
        .map(|w| {
            let (low, high) = words::ends(reading.port, w.low, w.high, prefs);
            format!("{low} to {high}")
        });
    let earlier = subject.visit.earlier.get(&reading.id).into_iter().flatten();
    let mut remarks = Vec::new();
    if let Some(window) = window {
        remarks.extend(window.remark.iter().map(|remark| one_line(remark)));
        remarks.extend(
            window
                .since_bench
                .as_ref()
                .map(|since| one_line(&words::since_bench(since, prefs))),
        );
        if window.swings {
            remarks.push(String::from("a healthy machine's needle swings here too"));
        }
        // A manual's window says where it stands; the others hang on the condition, which is the heading.
        if window.source == WindowSource::Manual && !window.basis.is_empty() {
            remarks.push(one_line(&window.basis));
        }
    }
    let retake = &subject.assessment.trust.retake;
    remarks.extend(
        retake
            .iter()
            .filter(|(id, _)| *id == reading.id)
            .map(|(_, why)| format!("does not fit: {why}")),
    );
    if !reading.note.trim().is_empty() {
        remarks.push(one_line(&reading.note));
    }
    Row {
        number,
        what: subject.sides().name(reading),
        read: read(subject, reading),
        before: earlier
            .filter_map(|earlier| earlier.seen.as_ref())
            .map(|seen| words::seen(reading.port, seen, prefs))
            .collect(),
        source: expected.as_ref().and(window).map(|w| w.source),
        expected,
        standing: match &reading.seen {
            None => Standing::Open,
            Some(_) => window.map_or(Standing::CannotTell, |w| w.standing),
        },
        instrument: with_uncertainty(subject, reading, window),
        remarks,
    }
}

/// The instrument with its standard uncertainty at this reading.
fn with_uncertainty(subject: &Subject, reading: &Reading, window: Option<&Window>) -> String {
    let name = instrument(subject, reading).unwrap_or_else(|| String::from("instrument not named"));
    let is_figure = matches!(
        reading.seen,
        Some(Seen::Value { .. } | Seen::Swing { .. } | Seen::ShareOf { .. })
    );
    match window.filter(|w| is_figure && w.instrument.is_finite() && w.instrument > 0.0) {
        Some(w) => format!(
            "{name}, {}",
            words::spread(reading.port, w.instrument, subject.prefs)
        ),
        None => name,
    }
}
