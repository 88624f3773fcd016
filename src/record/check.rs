//! Checks of what came from outside, field by field, and cleaning of its texts. The fields that a screen would refuse are
//! refused here too, with the path and what is accepted.

use super::error::{Problem, RecordError, content};
use super::limits::{self, ENTRIES, LINE_CHARACTERS, TEXT_CHARACTERS};
use super::{Closing, NeutralSheet, PutBack, Settings, Visit, is_id};
use crate::quantity::{Kind, Measure, Typed};
use crate::readings::instrument::Instrument;
use crate::readings::{Condition, EngineSpeed, Lever, Port, Reading, Rigging, Seen};
use crate::unit::{FIGURES, FigureId, ManualWindow, OnBench, Unit};
use serde_json::Value;
use std::collections::{BTreeMap, BTreeSet};

pub(super) type Checked = Result<(), RecordError>;

/// Takes control characters out of a text of one line: line ends and tabs become spaces. Marks that turn the direction of
/// writing go too: they can make a text read as another.
pub(super) fn clean_line(text: &mut String) {
    clean(text, |_| ' ');
}

/// As [`clean_line`], for a text of several lines: line ends and tabs stay.
pub(super) fn clean_text(text: &mut String) {
    if text.contains("\r\n") {
        *text = text.replace("\r\n", "\n");
    }
    clean(text, |c| if c == '\r' { '\n' } else { c });
}

fn clean(text: &mut String, spacing: impl Fn(char) -> char) {
    let is_foreign = |c: char| {
        c.is_control()
            || matches!(c, '\u{202a}'..='\u{202e}' | '\u{2066}'..='\u{2069}' | '\u{feff}')
    };
    if text.chars().any(is_foreign) {
        *text = text
            .chars()
            .filter_map(|c| match c {
                '\n' | '\r' | '\t' => Some(spacing(c)),
                c => (!is_foreign(c)).then_some(c),
            })
            .collect();
    }
}

pub(super) fn line(path: &str, field: &str, text: &mut String) -> Checked {
    clean_line(text);
    fits(path, field, text, LINE_CHARACTERS)
}

pub(super) fn prose(path: &str, field: &str, text: &mut String) -> Checked {
    clean_text(text);
    fits(path, field, text, TEXT_CHARACTERS)
}

fn fits(path: &str, field: &str, text: &str, limit: usize) -> Checked {
    // Bytes are never fewer than characters, so most texts need no counting.
    if text.len() <= limit {
        return Ok(());
    }
    let length = text.chars().count();
    if length <= limit {
        Ok(())
    } else {
        Err(content(
            format!("{path}.{field}"),
            Problem::TooLong { length, limit },
        ))
    }
}

/// Not more entries than are taken.
pub(super) fn count(path: &str, count: usize, limit: usize) -> Checked {
    if count <= limit {
        Ok(())
    } else {
        Err(content(path, Problem::TooMany { count, limit }))
    }
}

/// An id that stands once.
pub(super) fn id_once(path: &str, id: &str, met: &mut BTreeSet<String>) -> Checked {
    let problem = if !is_id(id) {
        Problem::BadId(shortened(id))
    } else if !met.insert(id.to_owned()) {
        Problem::Twice(id.to_owned())
    } else {
        return Ok(());
    };
    Err(content(format!("{path}.id"), problem))
}

/// An id of something else, or nothing.
fn reference(path: &str, field: &str, id: &str) -> Checked {
    if id.is_empty() || is_id(id) {
        Ok(())
    } else {
        Err(content(
            format!("{path}.{field}"),
            Problem::BadId(shortened(id)),
        ))
    }
}

fn shortened(text: &str) -> String {
    text.chars().filter(|c| !c.is_control()).take(80).collect()
}

pub(super) fn key_text(path: &str, key: &str) -> Checked {
    if key.is_empty() || key.chars().any(char::is_control) {
        return Err(content(path, Problem::BadId(shortened(key))));
    }
    fits(path, &shortened(key), key, LINE_CHARACTERS)
}

pub(super) fn unknown_fields(path: &str, extra: &BTreeMap<String, Value>) -> Checked {
    count(path, extra.len(), ENTRIES)?;
    for (key, value) in extra {
        if !is_shallow(value, limits::DEPTH) {
            return Err(content(
                format!("{path}.{}", shortened(key)),
                Problem::TooDeep {
                    limit: limits::DEPTH,
                },
            ));
        }
    }
    Ok(())
}

fn is_shallow(value: &Value, levels: usize) -> bool {
    let Some(below) = levels.checked_sub(1) else {
        return false;
    };
    match value {
        Value::Array(items) => items.iter().all(|item| is_shallow(item, below)),
        Value::Object(fields) => fields.values().all(|item| is_shallow(item, below)),
        _ => true,
    }
}

fn figure_within(value: f64, (low, high): (f64, f64), unit: &'static str) -> Result<(), Problem> {
    if !value.is_finite() {
        Err(Problem::NotFinite)
    } else if (low..=high).contains(&value) {
        Ok(())
    } else {
        Err(Problem::OutOfRange {
            value,
            low,
            high,
            unit,
        })
    }
}

/// A measure of this kind within this span (base unit).
pub(super) fn measure(value: Measure, kind: Kind, span: (f64, f64)) -> Result<(), Problem> {
    let base = value.base_of(kind).ok_or(Problem::OtherKind {
        wanted: kind,
        found: value.kind(),
    })?;
    figure_within(base, span, kind.base_unit().symbol())
}

/// A figure of a unit, as the list of figures asks for it.
/// A figure within what its field takes. Screens take a limit as it is shown, so a hair beyond it is the limit.
pub(super) fn within(value: Measure, (low, high): (Measure, Measure)) -> Result<(), Problem> {
    let slack = |limit: f64| 1e-5 * limit.abs();
    let (low_base, high_base) = (low.base(), high.base());
    let span = (low_base - slack(low_base), high_base + slack(high_base));
    measure(value, low.kind(), span)
}

/// A typed figure: its text is cleaned, its value lies within what its field takes.
pub(super) fn typed(path: &str, typed: &mut Typed, asked: (Measure, Measure)) -> Checked {
    line(path, "typed", &mut typed.typed)?;
    match typed.value {
        Some(value) => within(value, asked).map_err(|why| content(format!("{path}.value"), why)),
        None => Ok(()),
    }
}

pub(super) fn figure(id: FigureId, value: Measure) -> Result<(), Problem> {
    match FIGURES.iter().find(|ask| ask.id == id) {
        Some(ask) => measure(value, ask.kind, (ask.low, ask.high)),
        None => Ok(()),
    }
}

/// What a bench found of a figure.
pub(super) fn on_bench(id: FigureId, found: &OnBench) -> Result<(), (&'static str, Problem)> {
    figure(id, found.value).map_err(|p| (".value", p))?;
    figure_within(found.share, (0.0, 1.0), "").map_err(|p| (".share", p))
}

fn at_port(port: Port, value: Measure) -> Result<(), Problem> {
    measure(value, port.kind(), limits::reading_span(port))
}

fn in_order(low: Measure, high: Measure) -> Result<(), Problem> {
    if low.base() <= high.base() {
        return Ok(());
    }
    let unit = low.kind().base_unit().symbol();
    Err(Problem::Crossed {
        low: low.base(),
        high: high.base(),
        unit,
    })
}

/// What was seen at a port, apart from its texts. The field is named for the path.
pub(super) fn seen(port: Port, seen: &Seen) -> Result<(), (&'static str, Problem)> {
    match seen {
        Seen::Value { value } => at_port(port, *value).map_err(|p| (".value", p)),
        Seen::OffScale { top } => at_port(port, *top).map_err(|p| (".top", p)),
        Seen::Swing { low, high } => at_port(port, *low)
            .map_err(|p| (".low", p))
            .and_then(|()| at_port(port, *high).map_err(|p| (".high", p)))
            .and_then(|()| in_order(*low, *high).map_err(|p| ("", p))),
        Seen::ShareOf { share, other } => figure_within(*share, (0.0, limits::SHARE), "")
            .map_err(|p| (".share", p))
            .and_then(|()| condition(other).map_err(|(_, p)| (".other", p))),
        Seen::Nothing | Seen::NotPossible { .. } => Ok(()),
    }
}

/// The figures of a condition. The field is named for the path.
pub(super) fn condition(condition: &Condition) -> Result<(), (&'static str, Problem)> {
    if let Lever::Share(share) = condition.lever {
        figure_within(share, (0.0, 1.0), "").map_err(|p| (".lever.share", p))?;
    }
    if let EngineSpeed::Measured(speed) = condition.engine {
        let kind = Kind::RotationalSpeed;
        measure(speed, kind, limits::kind_span(kind)).map_err(|p| (".engine.measured", p))?;
    }
    if let Some(oil) = condition.oil {
        let kind = Kind::Temperature;
        measure(oil.value, kind, limits::kind_span(kind)).map_err(|p| (".oil.value", p))?;
    }
    Ok(())
}

/// A window from a manual.
pub(super) fn manual(window: &ManualWindow) -> Result<(), (&'static str, Problem)> {
    at_port(window.port, window.low).map_err(|p| (".low", p))?;
    at_port(window.port, window.high).map_err(|p| (".high", p))?;
    in_order(window.low, window.high).map_err(|p| ("", p))?;
    condition(&window.condition).map_err(|(_, p)| (".condition", p))
}

/// Minutes of access to a port.
pub(super) fn access(minutes: f64) -> Result<(), Problem> {
    figure_within(minutes, (0.0, limits::ACCESS_MINUTES), "min")
}

/// Motors on one pump.
pub(super) fn motors(motors: u8) -> Result<(), Problem> {
    figure_within(
        f64::from(motors),
        (1.0, f64::from(limits::MOTORS)),
        "motors",
    )
}

fn at(path: &str, result: Result<(), (&'static str, Problem)>) -> Checked {
    result.map_err(|(field, problem)| content(format!("{path}{field}"), problem))
}

/// Checks a unit and cleans its texts.
pub(super) fn unit(path: &str, unit: &mut Unit) -> Checked {
    line(path, "name", &mut unit.name)?;
    prose(path, "note", &mut unit.note)?;
    motors(unit.ticks.motors).map_err(|p| content(format!("{path}.ticks.motors"), p))?;
    for (id, given) in &mut unit.figures {
        let path = format!("{path}.figures.{}", code_of(id));
        line(&path, "typed", &mut given.typed)?;
        if let Some(value) = given.value {
            figure(*id, value).map_err(|p| content(format!("{path}.value"), p))?;
        }
    }
    for (id, found) in &mut unit.bench {
        let path = format!("{path}.bench.{}", code_of(id));
        line(&path, "on", &mut found.on)?;
        at(&path, on_bench(*id, found))?;
    }
    for (port, note) in &mut unit.ports {
        let path = format!("{path}.ports.{}", code_of(port));
        prose(&path, "place", &mut note.place)?;
        line(&path, "adapter", &mut note.adapter)?;
        line(&path, "access_typed", &mut note.access_typed)?;
        if let Some(minutes) = note.access_minutes {
            access(minutes).map_err(|p| content(format!("{path}.access_minutes"), p))?;
        }
    }
    count(&format!("{path}.manual"), unit.manual.len(), ENTRIES)?;
    for (index, window) in unit.manual.iter_mut().enumerate() {
        let path = format!("{path}.manual[{index}]");
        at(&path, manual(window))?;
        line(&path, "reference", &mut window.reference)?;
    }
    unknown_fields(path, &unit.extra)
}

/// Checks a visit and cleans its texts.
pub(super) fn visit(path: &str, visit: &mut Visit) -> Checked {
    reference(path, "unit", &visit.unit)?;
    line(path, "opened", &mut visit.opened)?;
    prose(path, "complaint", &mut visit.complaint)?;
    prose(path, "note", &mut visit.note)?;
    prose(path, "bring", &mut visit.bring)?;
    count(
        &format!("{path}.observations"),
        visit.observations.len(),
        ENTRIES,
    )?;
    for key in visit.observations.keys() {
        key_text(&format!("{path}.observations"), key)?;
    }
    count(
        &format!("{path}.precautions"),
        visit.precautions.len(),
        ENTRIES,
    )?;
    for (key, facts) in &mut visit.precautions {
        let path = format!("{path}.precautions");
        key_text(&path, key)?;
        count(&path, facts.len(), ENTRIES)?;
        facts
            .iter_mut()
            .try_for_each(|fact| line(&path, &shortened(key), fact))?;
    }
    riggings(path, &visit.riggings)?;
    readings(path, &mut visit.readings)?;
    earlier(path, visit)?;
    super::jug::check(path, visit)?;
    headings(path, visit)?;
    count(&format!("{path}.made"), visit.made.len(), ENTRIES)?;
    for check in &visit.made {
        key_text(&format!("{path}.made"), check)?;
    }
    count(&format!("{path}.put_back"), visit.put_back.len(), ENTRIES)?;
    for (what, answer) in &mut visit.put_back {
        let path = format!("{path}.put_back");
        key_text(&path, what)?;
        if let PutBack::Struck(why) = answer {
            prose(&path, &shortened(what), why)?;
        }
    }
    for (field, sheet) in [
        ("neutral", &mut visit.neutral),
        ("neutral_right", &mut visit.neutral_right),
    ] {
        if let Some(sheet) = sheet {
            neutral(&format!("{path}.{field}"), sheet)?;
        }
    }
    if let Some(sheet) = &mut visit.bench {
        super::bench::check(&format!("{path}.bench"), sheet)?;
    }
    if let Some(sheet) = &mut visit.tracking {
        super::tracking::check(&format!("{path}.tracking"), sheet)?;
    }
    if let Some(sheet) = &mut visit.yard {
        super::yard::check(&format!("{path}.yard"), sheet)?;
    }
    super::yard::hours(&format!("{path}.hours"), &mut visit.hours)?;
    for (field, closing) in [
        ("closing", &mut visit.closing),
        ("closed", &mut visit.closed),
    ] {
        if let Some(closing) = closing {
            self::closing(&format!("{path}.{field}"), closing)?;
        }
    }
    unknown_fields(path, &visit.extra)
}

fn neutral(path: &str, sheet: &mut NeutralSheet) -> Checked {
    for typed in sheet.fields.values_mut() {
        line(path, "typed", &mut typed.typed)?;
    }
    count(&format!("{path}.series"), sheet.series.len(), ENTRIES)?;
    for row in &mut sheet.series {
        line(path, "id", &mut row.id)?;
        for typed in [&mut row.turns, &mut row.shown, &mut row.time] {
            line(path, "typed", &mut typed.typed)?;
        }
    }
    count(&format!("{path}.done"), sheet.done.len(), ENTRIES)?;
    for step in &sheet.done {
        key_text(&format!("{path}.done"), step)?;
    }
    unknown_fields(path, &sheet.extra)
}

fn closing(path: &str, closing: &mut Closing) -> Checked {
    reference(path, "cause", &closing.cause)?;
    reference(path, "also", &closing.also)?;
    prose(path, "proof", &mut closing.proof)?;
    prose(path, "done", &mut closing.done)?;
    prose(path, "parts", &mut closing.parts)?;
    line(path, "when", &mut closing.when)
}

fn earlier(path: &str, visit: &mut Visit) -> Checked {
    let path = format!("{path}.earlier");
    count(&path, visit.earlier.len(), limits::READINGS)?;
    for (id, values) in &mut visit.earlier {
        key_text(&path, id)?;
        let path = format!("{path}.{}", shortened(id));
        count(&path, values.len(), ENTRIES)?;
        let port = visit.readings.iter().find(|reading| reading.id == *id);
        for value in values {
            prose(&path, "typed", &mut value.typed)?;
            line(&path, "when", &mut value.when)?;
            // Of a reading that is gone nobody can say what its port could show.
            if let (Some(reading), Some(what)) = (port, &value.seen) {
                at(&format!("{path}.seen"), seen(reading.port, what))?;
            }
            if let Some(Seen::NotPossible { why }) = &mut value.seen {
                prose(&path, "why", why)?;
            }
        }
    }
    Ok(())
}

fn headings(path: &str, visit: &mut Visit) -> Checked {
    let path = format!("{path}.headings");
    count(&path, visit.headings.len(), limits::READINGS)?;
    for (id, texts) in &mut visit.headings {
        key_text(&path, id)?;
        count(&path, texts.len(), ENTRIES)?;
        for (field, text) in texts {
            key_text(&path, field)?;
            line(&path, &shortened(field), text)?;
        }
    }
    Ok(())
}

fn riggings(path: &str, riggings: &[Rigging]) -> Checked {
    count(
        &format!("{path}.riggings"),
        riggings.len(),
        limits::RIGGINGS,
    )?;
    let mut met = BTreeSet::new();
    for (index, rigging) in riggings.iter().enumerate() {
        let path = format!("{path}.riggings[{index}]");
        id_once(&path, &rigging.id, &mut met)?;
        reference(&path, "instrument", &rigging.instrument)?;
    }
    Ok(())
}

fn readings(path: &str, readings: &mut [Reading]) -> Checked {
    count(
        &format!("{path}.readings"),
        readings.len(),
        limits::READINGS,
    )?;
    let mut met = BTreeSet::new();
    for (index, reading) in readings.iter_mut().enumerate() {
        let path = format!("{path}.readings[{index}]");
        id_once(&path, &reading.id, &mut met)?;
        reference(&path, "rigging", &reading.rigging)?;
        prose(&path, "typed", &mut reading.typed)?;
        prose(&path, "note", &mut reading.note)?;
        at(&format!("{path}.condition"), condition(&reading.condition))?;
        if let Some(what) = &mut reading.seen {
            let path = format!("{path}.seen");
            at(&path, seen(reading.port, what))?;
            if let Seen::NotPossible { why } = what {
                prose(&path, "why", why)?;
            }
        }
    }
    Ok(())
}

/// Checks an instrument and cleans its texts.
pub(super) fn instrument(path: &str, instrument: &mut Instrument) -> Checked {
    line(path, "name", &mut instrument.name)?;
    instrument.check().map_err(|error| RecordError::Shape {
        path: path.to_owned(),
        why: error.to_string(),
    })
}

/// Checks settings and cleans their texts. Their instruments are checked with the file's own list.
pub(super) fn settings(path: &str, settings: &mut Settings) -> Checked {
    line(path, "last_export", &mut settings.last_export)?;
    let left_out = format!("{path}.learning.left_out");
    count(&left_out, settings.learning.left_out.len(), limits::VISITS)?;
    for id in &settings.learning.left_out {
        reference(path, "learning.left_out", id)?;
    }
    count(
        &format!("{path}.first_run.hints_done"),
        settings.first_run.hints_done.len(),
        ENTRIES,
    )?;
    for hint in &mut settings.first_run.hints_done {
        line(path, "first_run.hints_done", hint)?;
    }
    unknown_fields(path, &settings.extra)
}

/// The code under which a value stands in a file.
fn code_of(value: &impl serde::Serialize) -> String {
    serde_json::to_value(value)
        .ok()
        .and_then(|code| code.as_str().map(str::to_owned))
        .unwrap_or_default()
}
