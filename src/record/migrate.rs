//! Migration: ordered, pure steps that bring a record of an older format to today's.
//!
//! To change the format of what is kept: raise [`SCHEMA`] by one, add one [`Step`] to [`STEPS`], freeze a fixture of the old
//! format under `tests/fixtures/`, and never change either again. New fields with a default at the top level of a unit, a
//! visit or the settings need no step; everything else (a renamed field, a new variant, a new field deeper down) does, since
//! an older app would drop it in silence.

use super::RecordError;
use serde_json::Value;

/// Format number of everything that this version writes.
pub const SCHEMA: u32 = 2;

/// Kinds of record.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum RecordKind {
    /// A unit.
    Unit,
    /// A visit.
    Visit,
    /// The settings; there is one.
    Settings,
}

impl RecordKind {
    /// Every kind.
    pub const ALL: [RecordKind; 3] = [RecordKind::Settings, RecordKind::Unit, RecordKind::Visit];

    /// Stable code: part of storage keys and envelopes.
    #[must_use]
    pub fn code(self) -> &'static str {
        match self {
            RecordKind::Unit => "unit",
            RecordKind::Visit => "visit",
            RecordKind::Settings => "settings",
        }
    }

    /// The kind of this code.
    #[must_use]
    pub fn from_code(code: &str) -> Option<RecordKind> {
        RecordKind::ALL.into_iter().find(|kind| kind.code() == code)
    }
}

/// What a step changes: a record of a kind, or the head of an export file (whose lists are handed over one by one).
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Subject {
    /// A record.
    Record(RecordKind),
    /// An instrument in an export's own list.
    Instrument,
    /// The export file as a whole, before its lists.
    Export,
}

/// One step up. Pure: the same value in gives the same value out, and nothing else happens.
#[derive(Clone, Copy)]
pub struct Step {
    /// Format that it takes; it gives the next one.
    pub from: u32,
    /// The change. Subjects that it does not concern go through unchanged. The error says why it cannot be done.
    pub apply: fn(Subject, Value) -> Result<Value, String>,
}

/// The steps, oldest first.
pub const STEPS: &[Step] = &[Step {
    // Machines with two paths: a unit says how many it has, a reading its side, a condition the side that is stroked. What says
    // nothing has one path, is on the left, and strokes both, so that an old record stands as it is; an older app would take a
    // right side for a left one.
    from: 1,
    apply: |_, value| Ok(value),
}];

/// The steps with the format that they lead to. [`Ladder::default`] is the app's own; tests bring others.
#[derive(Clone, Copy)]
pub struct Ladder {
    /// Format at the top.
    pub top: u32,
    /// Steps, oldest first, without gap.
    pub steps: &'static [Step],
}

impl Default for Ladder {
    fn default() -> Self {
        Ladder {
            top: SCHEMA,
            steps: STEPS,
        }
    }
}

impl core::fmt::Debug for Ladder {
    fn fmt(&self, f: &mut core::fmt::Formatter<'_>) -> core::fmt::Result {
        f.debug_struct("Ladder")
            .field("top", &self.top)
            .field("steps", &self.steps.len())
            .finish()
    }
}

impl Ladder {
    /// True where the steps follow each other without gap and end at the top.
    #[must_use]
    pub fn is_sound(&self) -> bool {
        let first = self.steps.first().map_or(self.top, |step| step.from);
        first >= 1
            && self
                .steps
                .iter()
                .zip(first..)
                .all(|(step, from)| step.from == from)
            && u32::try_from(self.steps.len()).is_ok_and(|count| first + count == self.top)
    }

    /// Oldest format that can be read.
    #[must_use]
    pub fn bottom(&self) -> u32 {
        self.steps.first().map_or(self.top, |step| step.from)
    }

    /// Brings a record from format `from` to the top.
    ///
    /// # Errors
    /// [`RecordError::Newer`] above the top, [`RecordError::NotOurs`] below the bottom, [`RecordError::Migration`].
    pub fn climb(&self, subject: Subject, from: u64, value: Value) -> Result<Value, RecordError> {
        self.steps_from(from)?
            .iter()
            .try_fold(value, |value, step| step.take(subject, value))
    }

    /// Brings an export file (head and lists) from format `from` to the top.
    ///
    /// # Errors
    /// As [`Ladder::climb`].
    pub fn climb_export(&self, from: u64, value: Value) -> Result<Value, RecordError> {
        self.steps_from(from)?
            .iter()
            .try_fold(value, |value, step| {
                let mut value = step.take(Subject::Export, value)?;
                let Some(head) = value.as_object_mut() else {
                    return Ok(value);
                };
                for (list, subject) in [
                    ("units", Subject::Record(RecordKind::Unit)),
                    ("visits", Subject::Record(RecordKind::Visit)),
                    ("instruments", Subject::Instrument),
                ] {
                    for item in head
                        .get_mut(list)
                        .and_then(Value::as_array_mut)
                        .into_iter()
                        .flatten()
                    {
                        *item = step.take(subject, item.take())?;
                    }
                }
                if let Some(settings) = head.get_mut("settings").filter(|value| !value.is_null()) {
                    *settings =
                        step.take(Subject::Record(RecordKind::Settings), settings.take())?;
                }
                Ok(value)
            })
    }

    fn steps_from(&self, from: u64) -> Result<&'static [Step], RecordError> {
        if from > u64::from(self.top) {
            return Err(RecordError::Newer {
                found: from,
                known: self.top,
            });
        }
        let too_old = || RecordError::NotOurs {
            why: format!(
                "format {from}; the oldest that is read is {}",
                self.bottom()
            ),
        };
        let skip = from
            .checked_sub(u64::from(self.bottom()))
            .ok_or_else(too_old)?;
        usize::try_from(skip)
            .ok()
            .and_then(|skip| self.steps.get(skip..))
            .ok_or_else(too_old)
    }
}

impl Step {
    fn take(&self, subject: Subject, value: Value) -> Result<Value, RecordError> {
        (self.apply)(subject, value).map_err(|why| RecordError::Migration {
            from: self.from,
            why,
        })
    }
}
