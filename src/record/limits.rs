//! How much one record may hold, and within which span a reading can be. Fields on a screen keep to the same limits, so that
//! whatever the app keeps it also takes back from a file.

use crate::quantity::Kind;
use crate::readings::Port;

/// Largest file that is read, in bytes. An export of more is written as several files.
pub const FILE_BYTES: usize = 2_000_000;
/// Largest rescue file that is read, in bytes: everything that a browser can hold for one site, with room for its quoting.
pub const RESCUE_BYTES: usize = 24_000_000;
/// Longest id, in characters.
pub const ID_CHARACTERS: usize = 64;
/// Longest text of one line (a name, what was typed in a figure's field), in characters.
pub const LINE_CHARACTERS: usize = 400;
/// Longest free text (a note, the complaint), in characters.
pub const TEXT_CHARACTERS: usize = 20_000;
/// Most units in one file.
pub const UNITS: usize = 2_000;
/// Most visits in one file.
pub const VISITS: usize = 10_000;
/// Most instruments in one file.
pub const INSTRUMENTS: usize = 500;
/// Most readings in one visit.
pub const READINGS: usize = 1_000;
/// Most riggings in one visit.
pub const RIGGINGS: usize = 1_000;
/// Most entries of any other list or table of one record.
pub const ENTRIES: usize = 500;
/// Deepest nesting of fields that this version does not know.
pub const DEPTH: usize = 24;
/// Most minutes of access to a port.
pub const ACCESS_MINUTES: f64 = 1_440.0;
/// Largest share of another reading.
pub const SHARE: f64 = 1_000.0;
/// Most motors on one pump.
pub const MOTORS: u8 = 4;

/// Span, lowest to highest, that a reading at this port can have: wide enough for any machine and any blunder of the hand
/// that is still a reading. Base unit of the port's kind. Common practice.
#[must_use]
pub fn reading_span(port: Port) -> (f64, f64) {
    match port {
        Port::LoopDifference => (-1_500.0, 1_500.0),
        _ => kind_span(port.kind()),
    }
}

/// Span of a reading by its kind, base unit of the kind. Common practice.
#[must_use]
pub fn kind_span(kind: Kind) -> (f64, f64) {
    match kind {
        Kind::Pressure => (-1.1, 1_500.0),
        Kind::Flow => (0.0, 2_000.0),
        Kind::RotationalSpeed => (0.0, 20_000.0),
        Kind::Temperature => (-60.0, 250.0),
        Kind::GroundSpeed => (0.0, 200.0),
        Kind::Time => (0.0, 3_600.0),
        Kind::Current => (0.0, 20_000.0),
        _ => (-1e6, 1e6),
    }
}

/// Largest hour meter, h.
pub const MOST_HOURS: f64 = 200_000.0;
