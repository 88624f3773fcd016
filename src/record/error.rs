//! What can be wrong with a file or a kept record: what, where, and what to do about it.

use crate::quantity::Kind;
use thiserror::Error;

/// Why a file or a kept record cannot be taken. Each says where it is wrong (`visits[2].readings[0].seen`) and what would be
/// accepted.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum RecordError {
    /// Larger than any file the app writes.
    #[error(
        "the file has {bytes} bytes; up to {limit} are taken. The app writes more than that as several files: take them one by one"
    )]
    TooLarge {
        /// Size met (at least).
        bytes: usize,
        /// Largest size taken.
        limit: usize,
    },
    /// Not text.
    #[error(
        "the file is no text: byte {at} is not UTF-8. Choose the .json file that Lowside saved"
    )]
    NotText {
        /// Offset of the first bad byte.
        at: usize,
    },
    /// Not JSON.
    #[error(
        "the text cannot be read as JSON: {why}. It is damaged or was cut short: fetch the file again"
    )]
    NotJson {
        /// Reason with line and column.
        why: String,
    },
    /// JSON of something else.
    #[error("this is no Lowside export: {why}. Choose the .json file that Lowside saved")]
    NotOurs {
        /// What is missing.
        why: String,
    },
    /// Written by a newer version.
    #[error(
        "written by a newer version of Lowside (format {found}; this version reads up to {known}). Update this app, then open it again"
    )]
    Newer {
        /// Format number met.
        found: u64,
        /// Newest format number that this version reads.
        known: u32,
    },
    /// A field that cannot be what it is.
    #[error("{path}: {why}")]
    Shape {
        /// Where.
        path: String,
        /// What is wrong.
        why: String,
    },
    /// A field of the right type whose content cannot be taken.
    #[error("{path}: {problem}")]
    Content {
        /// Where.
        path: String,
        /// What is wrong.
        problem: Problem,
    },
    /// A migration step failed.
    #[error("the record could not be brought from format {from} to {to}: {why}. The original is kept as it was", to = from + 1)]
    Migration {
        /// Format it had.
        from: u32,
        /// Reason.
        why: String,
    },
    /// The checksum does not fit the text.
    #[error(
        "the stored text was changed or damaged since it was written (checksum {found}, expected {expected})"
    )]
    Damaged {
        /// Checksum of the text met.
        found: String,
        /// Checksum that stands beside it.
        expected: String,
    },
}

/// What is wrong with the content of one field.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum Problem {
    /// Too many entries.
    #[error("{count} entries; up to {limit} are taken")]
    TooMany {
        /// Entries met.
        count: usize,
        /// Most that are taken.
        limit: usize,
    },
    /// A figure outside its span.
    #[error("{value} {unit} is outside what is accepted: {low} to {high} {unit}")]
    OutOfRange {
        /// Figure met, in `unit`.
        value: f64,
        /// Lowest.
        low: f64,
        /// Highest.
        high: f64,
        /// Unit of the three.
        unit: &'static str,
    },
    /// A figure of another kind.
    #[error("a {found} stands where a {wanted} belongs")]
    OtherKind {
        /// Kind that belongs here.
        wanted: Kind,
        /// Kind met.
        found: Kind,
    },
    /// The low end is above the high end.
    #[error("the low end {low} {unit} is above the high end {high} {unit}")]
    Crossed {
        /// Low end met.
        low: f64,
        /// High end met.
        high: f64,
        /// Unit of both.
        unit: &'static str,
    },
    /// Not an id.
    #[error("{0:?} is no id: 1 to 64 of a-z, A-Z, 0-9, '-', '_', '.', not starting with '.'")]
    BadId(String),
    /// The same id twice.
    #[error("the id {0:?} stands twice")]
    Twice(String),
    /// Refers to nothing.
    #[error("refers to {0:?}, which is not there")]
    Dangling(String),
    /// Too long.
    #[error("{length} characters; up to {limit} are taken")]
    TooLong {
        /// Characters met.
        length: usize,
        /// Most that are taken.
        limit: usize,
    },
    /// Not finite.
    #[error("the figure is not a finite number")]
    NotFinite,
    /// Nested too deep.
    #[error("nested deeper than {limit} levels")]
    TooDeep {
        /// Deepest that is taken.
        limit: usize,
    },
}

impl RecordError {
    /// True where an update of the app would read it.
    #[must_use]
    pub fn is_newer(&self) -> bool {
        matches!(self, RecordError::Newer { .. })
    }
}

/// Shorthand for a [`RecordError::Content`].
pub(super) fn content(path: impl Into<String>, problem: Problem) -> RecordError {
    RecordError::Content {
        path: path.into(),
        problem,
    }
}
