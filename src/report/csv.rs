//! Readings for a spreadsheet: comma-separated values after RFC 4180, the unit of every figure in the header, a point as the
//! decimal mark whatever the screen shows.
//!
//! Each unit has four columns of its own (read, swings to, expected from, expected to), so that no column mixes units.

use super::bench;
use super::groups::{instrument, read, window};
use super::{Subject, one_line};
use crate::assessment::{Assessment, Standing, WindowSource};
use crate::bench::stand::paper::significant;
use crate::call::words;
use crate::quantity::{Kind, Measure, Unit, UnitPrefs};
use crate::readings::instrument::Instrument;
use crate::readings::{EngineSpeed, Reading, Seen};
use crate::record::Visit;

/// One call of a table: what it is made from.
#[derive(Clone, Copy, Debug)]
pub struct Sheet<'a> {
    /// The unit.
    pub unit: &'a crate::unit::Unit,
    /// The call.
    pub visit: &'a Visit,
    /// Its assessment, for the windows; an empty one leaves them blank.
    pub assessment: &'a Assessment,
}

/// Columns before the figures, with their units.
const HEAD: [&str; 16] = [
    "Unit",
    "Call opened (UTC)",
    "No.",
    "Reading",
    "Side",
    "Doing",
    "Direction",
    "Lever (share of full travel)",
    "Path stroked",
    "Engine speed set",
    "Engine speed (rpm)",
    "Oil (°C)",
    "Oil taken at",
    "Flushing blocked",
    "Consumers capped",
    "Seen as",
];
/// Columns after the figures.
const TAIL: [&str; 5] = ["Standing", "Window from", "Instrument", "Typed", "Note"];

/// Every reading of these calls, and under a call's readings the points of its bench sheet. Lines end in CRLF, the header comes
/// first.
#[must_use]
pub fn csv(sheets: &[Sheet], instruments: &[Instrument], prefs: &UnitPrefs) -> String {
    let subjects: Vec<Subject> = sheets
        .iter()
        .map(|sheet| Subject {
            unit: sheet.unit,
            visit: sheet.visit,
            instruments,
            assessment: sheet.assessment,
            prefs,
            made_at: "",
        })
        .collect();
    let on_bench: Vec<Vec<bench::Cell>> = subjects.iter().map(bench::cells).collect();
    let readings = || sheets.iter().flat_map(|sheet| &sheet.visit.readings);
    let read = readings().map(|reading| words::unit_of(reading.port, prefs));
    let mut units: Vec<Unit> = read
        .chain(on_bench.iter().flatten().map(|cell| cell.unit))
        .collect();
    units.sort_by_key(|unit| (unit.kind(), unit.code()));
    units.dedup();
    let mut header: Vec<String> = HEAD.iter().map(|name| (*name).to_owned()).collect();
    for unit in &units {
        for what in ["Read", "Swings to", "Expected from", "Expected to"] {
            header.push(format!("{what} ({})", name_of(*unit)));
        }
    }
    header.extend(TAIL.iter().map(|name| (*name).to_owned()));
    let mut out = row(header);
    for (subject, points) in subjects.iter().zip(&on_bench) {
        for (at, reading) in subject.visit.readings.iter().enumerate() {
            out.push_str(&row(cells(subject, at, reading, &units)));
        }
        for point in points {
            out.push_str(&row(bench_cells(subject, point, &units)));
        }
    }
    out
}

/// A figure of the bench, under the same heads. What the machine did does not hang on it.
fn bench_cells(subject: &Subject, point: &bench::Cell, units: &[Unit]) -> Vec<String> {
    let mut cells = vec![String::new(); HEAD.len()];
    let named = [
        ("Unit", text(&one_line(&subject.unit.name))),
        ("Call opened (UTC)", text(&subject.visit.opened)),
        ("Reading", text(&point.name)),
        ("Side", text(point.side)),
        ("Doing", text("on the bench stand")),
        ("Oil (°C)", point.oil.map(rounded).unwrap_or_default()),
        ("Oil taken at", text(point.oil.map_or("", |_| "inlet"))),
        ("Seen as", text(&point.seen)),
    ];
    for (name, words) in named {
        if let Some(cell) = HEAD
            .iter()
            .position(|head| *head == name)
            .and_then(|at| cells.get_mut(at))
        {
            *cell = words;
        }
    }
    for unit in units {
        let is_own = *unit == point.unit;
        cells.extend(point.figures.iter().map(|value| {
            let own = value.filter(|_| is_own);
            own.map(significant).unwrap_or_default()
        }));
    }
    cells.extend([
        text(&point.standing),
        text(&point.from),
        text(&point.instrument),
        String::new(),
        text(&point.note),
    ]);
    cells
}

/// A unit as a header names it: a vacuum says that it runs the other way.
fn name_of(unit: Unit) -> String {
    match unit.symbol() {
        "" => String::from("fraction"),
        symbol => symbol.to_owned(),
    }
}

fn cells(subject: &Subject, at: usize, reading: &Reading, units: &[Unit]) -> Vec<String> {
    let (condition, sides) = (&reading.condition, subject.sides());
    let is_neutral = condition.doing.is_neutral();
    let (engine, rpm) = match condition.engine {
        EngineSpeed::LowIdle => ("low idle", None),
        EngineSpeed::HighIdle => ("high idle", None),
        EngineSpeed::Measured(speed) => ("measured", Some(speed.base())),
    };
    let mut cells = vec![
        text(&one_line(&subject.unit.name)),
        text(&subject.visit.opened),
        (at + 1).to_string(),
        text(reading.port.words()),
        text(
            sides
                .side(reading.port, reading.path)
                .map_or("", |path| path.words()),
        ),
        text(condition.doing.words()),
        text(if is_neutral {
            ""
        } else {
            words::direction(condition.direction)
        }),
        if is_neutral {
            String::new()
        } else {
            figure(condition.lever.share().0)
        },
        text(if is_neutral || !sides.any() {
            ""
        } else {
            condition.stroked.words()
        }),
        text(engine),
        rpm.map(figure).unwrap_or_default(),
        condition
            .oil
            .map(|oil| figure(oil.value.base()))
            .unwrap_or_default(),
        text(condition.oil.map_or("", |oil| oil.place.words())),
        yes_no(condition.flushing_blocked),
        yes_no(condition.consumers_capped),
        text(&seen_as(subject, reading)),
    ];
    let figures = figures(subject, reading);
    for unit in units {
        let own = *unit == words::unit_of(reading.port, subject.prefs);
        for (place, base) in figures.iter().enumerate() {
            let value = base
                .filter(|_| own)
                .and_then(|base| shown(*unit, base, reading));
            let print = if place < 2 { figure } else { rounded };
            cells.push(value.map(print).unwrap_or_default());
        }
    }
    let window = window(subject, reading);
    cells.extend([
        text(match (&reading.seen, window) {
            (None, _) => words::standing(Standing::Open),
            (Some(_), Some(window)) => words::standing(window.standing),
            (Some(_), None) => "",
        }),
        text(window.map_or("", |window| match window.source {
            WindowSource::Manual => "unit's manual",
            WindowSource::Computed => "computed",
            WindowSource::Practice => "common practice",
        })),
        text(&instrument(subject, reading).unwrap_or_default()),
        text(&one_line(&reading.typed)),
        text(&one_line(&reading.note)),
    ]);
    cells
}

/// Read, swings to, expected from, expected to; base unit of the port's kind.
fn figures(subject: &Subject, reading: &Reading) -> [Option<f64>; 4] {
    let (read, high) = match &reading.seen {
        Some(Seen::Value { value } | Seen::OffScale { top: value }) => (Some(value.base()), None),
        Some(Seen::Swing { low, high }) => (Some(low.base()), Some(high.base())),
        Some(Seen::Nothing) => (Some(0.0), None),
        _ => (None, None),
    };
    let window = window(subject, reading);
    [read, high, window.map(|w| w.low), window.map(|w| w.high)]
}

/// A base value in a unit; a pull is held as positive below the air and a vacuum unit prints it so.
fn shown(unit: Unit, base: f64, reading: &Reading) -> Option<f64> {
    let is_vacuum = reading.port == crate::readings::Port::InletPull && unit.reads_vacuum();
    let kind: Kind = reading.port.kind();
    let measure = Measure::from_base(if is_vacuum { -base } else { base }, kind).ok()?;
    measure.try_in_unit(unit).ok()
}

fn seen_as(subject: &Subject, reading: &Reading) -> String {
    match &reading.seen {
        Some(Seen::Value { .. }) => String::from("value"),
        Some(Seen::Swing { .. }) => String::from("swings"),
        Some(Seen::OffScale { .. }) => String::from("over the top of the scale"),
        Some(Seen::Nothing) => String::from("nothing"),
        _ => read(subject, reading),
    }
}

fn yes_no(is_so: bool) -> String {
    String::from(if is_so { "yes" } else { "no" })
}

/// A figure without rounding noise: nine significant digits, decimal point, plain minus, no parted thousands.
fn figure(value: f64) -> String {
    if !value.is_finite() {
        return String::new();
    }
    let text = crate::quantity::edit_text(
        Measure::from_base(value, Kind::Ratio).unwrap_or(Measure::literal(0.0, Unit::Fraction)),
        Unit::Fraction,
        crate::quantity::DecimalMark::Point,
    );
    text.replace('\u{2212}', "-")
}

/// The end of a window: four significant digits are more than it is good for.
fn rounded(value: f64) -> String {
    let size = value.abs();
    let places = [1000.0, 100.0, 10.0, 1.0, 0.1]
        .iter()
        .take_while(|bound| size < **bound)
        .count();
    let scale = [1.0, 10.0, 100.0, 1000.0, 1e4, 1e5]
        .get(places)
        .copied()
        .unwrap_or(1e5);
    figure((value * scale).round() / scale)
}

/// A text cell that no spreadsheet takes for a formula: what begins as one gets an apostrophe in front.
pub(crate) fn text(words: &str) -> String {
    let first = words.trim_start().chars().next();
    let is_formula = matches!(
        first,
        Some('=' | '+' | '-' | '@' | '\u{ff1d}' | '\u{ff0b}' | '\u{ff0d}' | '\u{ff20}')
    ) || words.starts_with(['\t', '\r', '\n']);
    if is_formula {
        format!("'{words}")
    } else {
        words.to_owned()
    }
}

/// A cell, quoted where RFC 4180 asks for it.
pub(crate) fn quoted(cell: String) -> String {
    if cell.contains(['"', ',', '\r', '\n']) || cell.starts_with(' ') || cell.ends_with(' ') {
        format!("\"{}\"", cell.replace('"', "\"\""))
    } else {
        cell
    }
}

/// One line.
fn row(cells: Vec<String>) -> String {
    let quoted: Vec<String> = cells.into_iter().map(quoted).collect();
    let mut line = quoted.join(",");
    line.push_str("\r\n");
    line
}
