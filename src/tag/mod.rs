//! The tag of a unit: its profile in a QR code, whose link carries the profile itself, so that another phone with the app has it
//! without any network. The same digits serve as a text to paste.
//!
//! `#/tag/` and digits: they hold one byte for the version, the packed profile, and four bytes of checksum. The profile stands in
//! the export format, so that reading a tag is reading a file: migration, spans, limits, and nothing that is there is written
//! over.

mod symbol;

pub use symbol::{QUIET, Symbol, Unfit};

use crate::pack::{from_digits, pack, to_digits, unpack};
use crate::record::{Book, Export, RecordError, checksum};
use crate::unit::Unit;
use thiserror::Error;

/// Version of the tag: what the first byte says.
const VERSION: u8 = 1;
/// Bytes of the checksum.
const SUM: usize = 4;
/// Most digits that are read.
pub const MOST_DIGITS: usize = 40_000;
/// Most bytes that a profile on a tag may have, unpacked.
const MOST_BYTES: usize = 100_000;
/// What stands in front of the digits in a link.
pub const MARK: &str = "#/tag/";
/// Digits in a line of the text to paste.
const LINE: usize = 40;

/// Why a tag cannot be read.
#[derive(Clone, Debug, PartialEq, Error)]
pub enum TagError {
    /// There are no digits of a tag in the text.
    #[error(
        "there is no tag in this text: a link with “{MARK}” and digits, or lines of digits, is wanted"
    )]
    NoTag,
    /// More digits than any tag has.
    #[error("{digits} digits are more than a tag can have ({MOST_DIGITS})")]
    TooLong {
        /// How many there are.
        digits: usize,
    },
    /// Cut short, mistyped or changed on the way.
    #[error("the tag is damaged or incomplete: scan it again, or copy the whole of it")]
    Damaged,
    /// Made by a newer version.
    #[error("the tag is of version {found}, and this app reads up to {VERSION}: update the app")]
    Newer {
        /// Version of the tag.
        found: u8,
    },
    /// It is whole, and the profile in it is not taken.
    #[error("{0}")]
    Refused(#[from] RecordError),
}

/// The digits of a tag that carries this unit as it is.
#[must_use]
pub fn digits(unit: &Unit) -> String {
    let mut book = Book::default();
    book.put_unit(unit.clone());
    let export = Export::of(&book, "");
    // Settings, moment and program concern this device; what is empty is left out.
    let body = serde_json::json!({
        "lowside_export": export.format,
        "units": export.units,
    });
    let text = body.to_string();
    let mut bytes = vec![VERSION];
    bytes.extend(pack(text.as_bytes()));
    bytes.extend(sum(&bytes));
    to_digits(&bytes)
}

/// The first bytes of the checksum over all that stands before it.
fn sum(bytes: &[u8]) -> Vec<u8> {
    let hex: String = bytes.iter().map(|byte| format!("{byte:02x}")).collect();
    let sum = checksum(&hex);
    sum.as_bytes()
        .chunks(2)
        .take(SUM)
        .filter_map(|pair| u8::from_str_radix(core::str::from_utf8(pair).ok()?, 16).ok())
        .collect()
}

/// Reads a tag from whatever was scanned or pasted: the link, the text with its heading, or bare digits. What comes out has
/// been checked as any file is, and holds one unit.
///
/// # Errors
/// [`TagError`].
pub fn read(text: &str) -> Result<Export, TagError> {
    let digits = find(text)?;
    let bytes = from_digits(&digits).ok_or(TagError::Damaged)?;
    let (body, end) = bytes
        .len()
        .checked_sub(SUM)
        .and_then(|at| bytes.split_at_checked(at))
        .ok_or(TagError::Damaged)?;
    if sum(body) != end {
        return Err(TagError::Damaged);
    }
    let (version, packed) = body.split_first().ok_or(TagError::Damaged)?;
    match *version {
        VERSION => {}
        0 => return Err(TagError::Damaged),
        found => return Err(TagError::Newer { found }),
    }
    let text = unpack(packed, MOST_BYTES).map_err(|_| TagError::Damaged)?;
    let mut export = Export::read(&text)?;
    // A tag carries a profile and nothing else.
    export.visits.clear();
    export.instruments.clear();
    export.settings = None;
    if export.units.len() == 1 {
        Ok(export)
    } else {
        Err(TagError::Damaged)
    }
}

/// The digits in a text.
fn find(text: &str) -> Result<String, TagError> {
    let digits: String = match text.split_once(MARK) {
        Some((_, after)) => after
            .chars()
            .take_while(char::is_ascii_digit)
            .take(MOST_DIGITS + 1)
            .collect(),
        None => {
            let lines = text.lines().filter(|line| {
                line.chars()
                    .all(|c| c.is_ascii_digit() || c.is_whitespace())
            });
            let digits = lines.flat_map(str::chars).filter(char::is_ascii_digit);
            digits.take(MOST_DIGITS + 1).collect()
        }
    };
    match digits.len() {
        0 => Err(TagError::NoTag),
        length if length > MOST_DIGITS => Err(TagError::TooLong { digits: length }),
        _ => Ok(digits),
    }
}

/// The text to paste: a heading, and the digits in lines.
#[must_use]
pub fn block(unit: &Unit, digits: &str) -> String {
    let mut text = format!("Lowside tag of unit {}. Paste all of it.\n", heading(unit));
    let all: Vec<char> = digits.chars().collect();
    for line in all.chunks(LINE) {
        text.extend(line);
        text.push('\n');
    }
    text
}

/// The name of a unit in one line.
fn heading(unit: &Unit) -> String {
    unit.name.split_whitespace().collect::<Vec<_>>().join(" ")
}

/// A unit made shorter where its tag would be too dense to be read: what goes first is what can be read elsewhere.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Shortened {
    /// Everything is on it.
    Whole,
    /// Fields of a newer version and the note are left out.
    WithoutNote,
    /// Also places, adapters and when a bench measured a leakage.
    WithoutPlaces,
    /// Also the manual's windows.
    WithoutManual,
}

impl Shortened {
    /// Every step, the least first.
    pub const ALL: [Shortened; 4] = [
        Shortened::Whole,
        Shortened::WithoutNote,
        Shortened::WithoutPlaces,
        Shortened::WithoutManual,
    ];

    /// What is left out, in words; empty where nothing is.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Shortened::Whole => "",
            Shortened::WithoutNote => "The note is too long for a tag and left out.",
            Shortened::WithoutPlaces => {
                "Note, places, adapters and the days of the bench are too long for a tag and left out."
            }
            Shortened::WithoutManual => {
                "Note, places, adapters, the days of the bench and the manual's windows are too long for a tag and left out."
            }
        }
    }

    /// The unit without what is left out.
    #[must_use]
    pub fn of(self, unit: &Unit) -> Unit {
        let mut unit = unit.clone();
        if self != Shortened::Whole {
            unit.note.clear();
            unit.extra.clear();
        }
        if matches!(self, Shortened::WithoutPlaces | Shortened::WithoutManual) {
            unit.ports.clear();
            unit.bench.clear();
        }
        if self == Shortened::WithoutManual {
            unit.manual.clear();
        }
        unit
    }
}

/// A tag that can be printed.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Tag {
    /// What the code says.
    pub link: String,
    /// The code.
    pub symbol: Symbol,
    /// What is left out.
    pub shortened: Shortened,
}

/// The tag of a unit for the app at `address` (up to `#`). Where the profile is too long it goes without what can be read
/// elsewhere.
///
/// # Errors
/// [`Unfit`] where even the shortest is too long.
pub fn tag(unit: &Unit, address: &str) -> Result<Tag, Unfit> {
    let mut unfit = Unfit;
    for shortened in Shortened::ALL {
        let digits = digits(&shortened.of(unit));
        match Symbol::of(&format!("{address}{MARK}"), &digits) {
            Ok(symbol) => {
                return Ok(Tag {
                    link: format!("{address}{MARK}{digits}"),
                    symbol,
                    shortened,
                });
            }
            Err(why) => unfit = why,
        }
    }
    Err(unfit)
}
