//! Why a typed entry was not taken, in words for the person who typed it.

use std::fmt;

use super::{DecimalMark, Kind, Measure, Unit, edit_text, edited, figure_text, limit_text};

/// Why an entry was not taken. `Display` is the sentence to show under the field (decimal point);
/// [`EntryError::message`] prints its figures with either decimal mark.
#[derive(Debug, Clone, PartialEq)]
pub enum EntryError {
    /// Nothing was typed.
    Empty {
        /// What the field asks for.
        kind: Kind,
        /// The unit shown beside it.
        unit: Unit,
    },
    /// More characters than any figure needs.
    TooLong {
        /// Most characters taken.
        limit: usize,
    },
    /// No digit at the front of the text.
    NoNumber {
        /// The text.
        text: String,
        /// The unit shown beside the field.
        unit: Unit,
    },
    /// Digits and separators in an order that means nothing.
    Unreadable {
        /// The text.
        text: String,
    },
    /// Two figures where one is asked for.
    TwoFigures {
        /// The text.
        text: String,
    },
    /// One separator that can be a decimal mark or a thousands mark.
    AmbiguousSeparator {
        /// The text.
        text: String,
        /// The figure with a decimal mark.
        decimal: f64,
        /// The figure with a thousands mark.
        grouped: f64,
        /// The unit of both.
        unit: Unit,
    },
    /// A unit that is not known.
    UnknownUnit {
        /// What stood behind the figure.
        text: String,
        /// What the field asks for.
        kind: Kind,
        /// The unit shown beside it.
        unit: Unit,
    },
    /// A unit of something else.
    OtherKind {
        /// The unit that was typed.
        typed: Unit,
        /// What the field asks for.
        kind: Kind,
        /// The unit shown beside it.
        unit: Unit,
    },
    /// Absolute pressure where gauge pressure is asked for.
    AbsolutePressure {
        /// The text.
        text: String,
    },
    /// Outside what the field accepts.
    OutOfRange {
        /// What was typed.
        value: Measure,
        /// The unit it was typed in.
        unit: Unit,
        /// Lowest accepted.
        low: Measure,
        /// Highest accepted.
        high: Measure,
    },
    /// Beyond [`LARGEST`](super::LARGEST).
    TooLarge {
        /// The text.
        text: String,
    },
    /// The field's own unit or range is of another kind: a mistake in the program, not in the entry.
    FieldOfOtherKind {
        /// What the field asks for.
        kind: Kind,
        /// The unit given for it.
        unit: Unit,
    },
}

impl EntryError {
    /// The sentence to show, with figures in the decimal mark of choice.
    #[must_use]
    pub fn message(&self, mark: DecimalMark) -> String {
        let number = |value: f64| match mark {
            DecimalMark::Point => figure_text(value),
            DecimalMark::Comma => figure_text(value).replace('.', ","),
        };
        match self {
            EntryError::Empty { kind, unit } => format!("Type a {kind}{}.", in_unit(*unit)),
            EntryError::TooLong { limit } => {
                format!("Too long: a figure and its unit, {limit} characters at most.")
            }
            EntryError::NoNumber { text, unit } => {
                format!(
                    "“{text}” does not start with a figure. Type a number{}.",
                    in_unit(*unit)
                )
            }
            EntryError::Unreadable { text } => {
                format!("“{text}” cannot be read as one number. Use one decimal point or comma.")
            }
            EntryError::TwoFigures { text } => format!("“{text}” reads as two figures. Type one."),
            EntryError::AmbiguousSeparator {
                text,
                decimal,
                grouped,
                unit,
            } => {
                let with_unit = |value| format!("{} {unit}", number(value)).trim_end().to_owned();
                format!(
                    "“{text}” can mean {} or {}. Type {} or {}.",
                    with_unit(*decimal),
                    with_unit(*grouped),
                    edited(*decimal, mark),
                    edited(*grouped, mark)
                )
            }
            EntryError::UnknownUnit { text, kind, unit } => {
                format!(
                    "“{text}” is not a unit known here. For {kind} type {}.",
                    choices(*kind, *unit)
                )
            }
            EntryError::OtherKind { typed, kind, unit } => format!(
                "{typed} measures {}; this field asks for {kind}. Type it in {}.",
                typed.kind(),
                choices(*kind, *unit)
            ),
            EntryError::AbsolutePressure { text } => format!(
                "“{text}” is absolute pressure. Type what a gauge open to the air reads: about 1 bar (14.5 psi) less at sea \
                 level."
            ),
            EntryError::OutOfRange {
                value,
                unit,
                low,
                high,
            } => {
                // A vacuum unit runs the other way: its larger figure is the lower pressure.
                let (from, to) = if unit.reads_vacuum() {
                    (high, low)
                } else {
                    (low, high)
                };
                format!(
                    "{}{} is outside what is accepted here: {} to {}{}. Look at the figure and its unit again.",
                    edit_text(*value, *unit, mark),
                    spaced(*unit),
                    limit_text(*from, *unit, mark, false),
                    limit_text(*to, *unit, mark, true),
                    spaced(*unit)
                )
            }
            EntryError::TooLarge { text } => {
                format!("“{text}” is larger than anything a machine shows. Type it again.")
            }
            EntryError::FieldOfOtherKind { kind, unit } => {
                format!(
                    "This field is set up wrongly: it asks for {kind} in {unit}. Nothing was changed: leave it empty."
                )
            }
        }
    }
}

impl fmt::Display for EntryError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.message(DecimalMark::Point))
    }
}

impl std::error::Error for EntryError {}

fn spaced(unit: Unit) -> String {
    if unit.symbol().is_empty() {
        String::new()
    } else {
        format!(" {unit}")
    }
}

fn in_unit(unit: Unit) -> String {
    if unit.symbol().is_empty() {
        String::new()
    } else {
        format!(" in {unit}")
    }
}

/// The unit shown beside the field and up to three others of the kind.
fn choices(kind: Kind, shown: Unit) -> String {
    let others = kind
        .units()
        .filter(|unit| *unit != shown && !unit.symbol().is_empty())
        .take(3);
    let names: Vec<&str> = std::iter::once(shown)
        .filter(|unit| !unit.symbol().is_empty())
        .chain(others)
        .map(Unit::symbol)
        .collect();
    match names.split_last() {
        Some((last, [])) => (*last).to_owned(),
        Some((last, first)) => format!("{} or {last}", first.join(", ")),
        None => String::from("a plain number"),
    }
}
