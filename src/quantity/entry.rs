//! What a person typed, as a measure.

use std::fmt;
use std::ops::RangeInclusive;

use super::number::{self, Figure, NoFigure};
use super::spelling::{self, fold};
use super::{EntryError, Kind, Measure, Unit, figure_text};

/// Longest entry that is looked at, in characters.
pub const LONGEST_ENTRY: usize = 64;

/// How far beyond a limit, as a share of it, still counts as the limit: limits are shown rounded, and typing the shown
/// figure must do.
const LIMIT_SLACK: f64 = 1e-6;

/// A typed entry that was understood.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Parsed {
    /// The figure.
    pub measure: Measure,
    /// The unit it was typed in; the unit shown beside the field where none was typed.
    pub unit: Unit,
    /// True when the person typed the unit.
    pub unit_typed: bool,
    /// How the entry was read, where it could have been meant otherwise. To be shown under the field.
    pub note: Option<EntryNote>,
}

/// A reading of the entry that the person should see, because the text alone left it open.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum EntryNote {
    /// `mPa` was typed; in this trade that is megapascal, not millipascal.
    Megapascal,
    /// The separator was taken as a thousands mark, because only then is the figure in range.
    Thousands {
        /// The figure taken, in the unit of the entry.
        value: f64,
    },
    /// The separator was taken as a decimal mark, because only then is the figure in range.
    Decimal {
        /// The figure taken, in the unit of the entry.
        value: f64,
    },
    /// A minus was typed before a vacuum unit: taken as that much vacuum, not as pressure.
    Vacuum,
}

impl fmt::Display for EntryNote {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            EntryNote::Megapascal => f.write_str("Read as MPa (megapascal)."),
            EntryNote::Thousands { value } | EntryNote::Decimal { value } => {
                write!(f, "Read as {}.", figure_text(*value))
            }
            EntryNote::Vacuum => f.write_str("Read as vacuum: below the pressure of the air."),
        }
    }
}

/// Reads what a person typed: `350 psi`, `24,5`, `2 400 rpm`, `1 1/2 turns`, `0:12.4` on a stopwatch.
///
/// * `default_unit` is the unit shown beside the field; it holds where no unit is typed. Units of the same kind can be
///   typed instead, in the spellings of [`Unit::spellings`], in any case.
/// * `range` is what the field accepts, ends included; nothing is checked without it.
///
/// **Separators.** A single point or comma is a decimal mark. Spaces (also thin and non-breaking) and apostrophes part
/// thousands. Where point and comma both stand, the last is the decimal mark: `1.234,5` and `1,234.5` are both 1234.5. One
/// mark with exactly three digits behind it and one to three before it (`2,400`) can mean either: the reading that lies in
/// `range` is taken and said in [`Parsed::note`]; when both or no range is given it is refused with both readings.
///
/// **Signs.** `-`, `−` and dashes are minus. A vacuum unit takes the size alone: `-10 inHg` is 10 inHg of vacuum.
///
/// # Errors
/// [`EntryError`], each with the figures a sentence needs. Nothing typed is changed; the caller keeps the text.
pub fn parse(
    text: &str,
    kind: Kind,
    default_unit: Unit,
    range: Option<RangeInclusive<Measure>>,
) -> Result<Parsed, EntryError> {
    let limits = range.map(RangeInclusive::into_inner);
    if default_unit.kind() != kind
        || limits.is_some_and(|(low, high)| low.kind() != kind || high.kind() != kind)
    {
        return Err(EntryError::FieldOfOtherKind {
            kind,
            unit: default_unit,
        });
    }
    if text.chars().count() > LONGEST_ENTRY {
        return Err(EntryError::TooLong {
            limit: LONGEST_ENTRY,
        });
    }
    if kind == Kind::Time
        && let Some(seconds) = number::clock(text)
    {
        let (measure, _) = accept(Figure::Plain(seconds), Unit::Second, limits, text)?;
        return Ok(Parsed {
            measure,
            unit: Unit::Second,
            unit_typed: true,
            note: None,
        });
    }

    let read = number::read(text).map_err(|problem| match problem {
        NoFigure::Missing if fold(text).is_empty() => EntryError::Empty {
            kind,
            unit: default_unit,
        },
        NoFigure::Missing => EntryError::NoNumber {
            text: shown(text),
            unit: default_unit,
        },
        NoFigure::Unreadable => EntryError::Unreadable { text: shown(text) },
    })?;
    let (unit, unit_typed) = typed_unit(read.rest, text, kind, default_unit)?;

    let vacuum_minus = read.negative && unit.reads_vacuum();
    let figure = match read.figure {
        Figure::Plain(value) if vacuum_minus => Figure::Plain(-value),
        Figure::Either { decimal, grouped } if vacuum_minus => Figure::Either {
            decimal: -decimal,
            grouped: -grouped,
        },
        figure => figure,
    };
    let (measure, note) = accept(figure, unit, limits, text)?;
    let milli = unit == Unit::Megapascal && unit_typed && read.rest.trim_start().starts_with('m');
    let note = note
        .or(milli.then_some(EntryNote::Megapascal))
        .or(vacuum_minus.then_some(EntryNote::Vacuum));
    Ok(Parsed {
        measure,
        unit,
        unit_typed,
        note,
    })
}

/// The text as an error quotes it.
fn shown(text: &str) -> String {
    text.trim().to_owned()
}

/// The unit behind the figure, and whether it was typed.
fn typed_unit(
    rest: &str,
    text: &str,
    kind: Kind,
    default_unit: Unit,
) -> Result<(Unit, bool), EntryError> {
    let folded = fold(rest);
    if folded.is_empty() {
        return Ok((default_unit, false));
    }
    if let Some(unit) = spelling::find(&folded, kind, default_unit) {
        return Ok((unit, true));
    }
    Err(if number::second_figure(rest) {
        EntryError::TwoFigures { text: shown(text) }
    } else if kind == Kind::Pressure && spelling::is_absolute_pressure(&folded) {
        EntryError::AbsolutePressure { text: shown(text) }
    } else if let Some(typed) = spelling::find_any(&folded) {
        EntryError::OtherKind {
            typed,
            kind,
            unit: default_unit,
        }
    } else {
        EntryError::UnknownUnit {
            text: shown(rest),
            kind,
            unit: default_unit,
        }
    })
}

/// Settles the meaning of the separator and checks the range.
fn accept(
    figure: Figure,
    unit: Unit,
    limits: Option<(Measure, Measure)>,
    text: &str,
) -> Result<(Measure, Option<EntryNote>), EntryError> {
    let measure = |value: f64| {
        Measure::new(value, unit).map_err(|_| EntryError::TooLarge { text: shown(text) })
    };
    match figure {
        Figure::Plain(value) => {
            within(measure(value)?, unit, limits).map(|measure| (measure, None))
        }
        Figure::Either { decimal, grouped } => {
            let as_decimal = within(measure(decimal)?, unit, limits);
            let as_grouped = within(measure(grouped)?, unit, limits);
            match (as_decimal, as_grouped) {
                (Ok(_), Ok(_)) => Err(EntryError::AmbiguousSeparator {
                    text: shown(text),
                    decimal,
                    grouped,
                    unit,
                }),
                (Ok(taken), Err(_)) => Ok((taken, Some(EntryNote::Decimal { value: decimal }))),
                (Err(_), Ok(taken)) => Ok((taken, Some(EntryNote::Thousands { value: grouped }))),
                (Err(out), Err(_)) => Err(out),
            }
        }
    }
}

/// The measure if it lies within the limits (a hair beyond counts as the limit itself).
fn within(
    measure: Measure,
    unit: Unit,
    limits: Option<(Measure, Measure)>,
) -> Result<Measure, EntryError> {
    let Some((low, high)) = limits else {
        return Ok(measure);
    };
    let base = measure.base();
    if base < low.base() - LIMIT_SLACK * low.base().abs()
        || base > high.base() + LIMIT_SLACK * high.base().abs()
    {
        return Err(EntryError::OutOfRange {
            value: measure,
            unit,
            low,
            high,
        });
    }
    Ok(if base < low.base() {
        low
    } else if base > high.base() {
        high
    } else {
        measure
    })
}
