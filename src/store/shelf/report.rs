//! What the shelf says: how a save went, what a load met, what is in the way.

use super::super::{RecordKey, StoreError};
use crate::record::{Book, RecordError};
use thiserror::Error;

/// How a save went.
#[derive(Clone, Debug, PartialEq)]
pub enum SaveOutcome {
    /// Written and read back.
    Saved {
        /// Counts the saves of this record.
        rev: u64,
        /// When (the moment that was handed in).
        at: String,
    },
    /// Nothing to do: it stands there as it is.
    Unchanged,
    /// Somebody else changed the record since this tab read it. Nothing was written; what this tab holds is still only here.
    Conflict(Foreign),
    /// Nothing was written.
    NotSaved {
        /// Which record.
        key: RecordKey,
        /// Why.
        why: NotSaved,
    },
}

impl SaveOutcome {
    /// True where the record stands in the store as it was handed in.
    #[must_use]
    pub fn is_safe(&self) -> bool {
        matches!(self, SaveOutcome::Saved { .. } | SaveOutcome::Unchanged)
    }
}

/// Why a record was not saved.
#[derive(Clone, Debug, PartialEq, Error)]
pub enum NotSaved {
    /// The store refused.
    #[error("{0}. {next}", next = what_next(.0))]
    Store(StoreError),
    /// A newer version wrote it.
    #[error(
        "a newer version of Lowside wrote it (format {0}): here it can only be read. Update this app"
    )]
    Newer(u64),
    /// The store was not read yet, or could not be read.
    #[error(
        "what is stored could not be read yet, so nothing is written over it. Load the page again; export first if you typed anything"
    )]
    NotLoaded,
    /// What was read back differs from what was written.
    #[error(
        "the storage gave back another text than was written. Export now; then load the page again"
    )]
    Garbled,
    /// The record cannot be written.
    #[error("the record cannot be written: {0}")]
    Unwritable(String),
    /// There is another record under this name.
    #[error("there is a record of this id already")]
    Taken,
    /// There is no such record.
    #[error("it is not there any more")]
    Gone,
}

impl From<StoreError> for NotSaved {
    fn from(error: StoreError) -> Self {
        NotSaved::Store(error)
    }
}

fn what_next(error: &StoreError) -> &'static str {
    match error {
        StoreError::Full => "Export now, then empty the trash or delete old visits",
        StoreError::Denied | StoreError::Missing => {
            "Nothing is being saved: export before you close the page, and allow this site to store data"
        }
        StoreError::Failed(_) => "It is tried again; export now to be safe",
    }
}

/// A change that another tab made.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Foreign {
    /// Which record.
    pub key: RecordKey,
    /// When theirs was saved (ISO 8601 text); none where they took it out.
    pub saved_at: Option<String>,
}

impl Foreign {
    /// In words.
    #[must_use]
    pub fn words(&self) -> &'static str {
        match self.saved_at {
            Some(_) => {
                "Another tab or window changed this record. Load theirs, or keep yours as a copy."
            }
            None => {
                "Another tab or window removed this record. Yours is still here: keep it as a copy, or let it go."
            }
        }
    }
}

/// What the status line shows for one record or for all.
#[derive(Clone, Debug, Default, PartialEq)]
pub enum SaveState {
    /// Nothing was typed since the last save, or ever.
    #[default]
    Clean,
    /// Typed and not written yet.
    Waiting,
    /// Written and read back.
    Saved {
        /// When (ISO 8601 text).
        at: String,
    },
    /// Not written, with the reason in words.
    NotSaved {
        /// Reason and what to do.
        why: String,
    },
    /// Another tab is in the way.
    Conflict(Foreign),
}

impl SaveState {
    /// The state after a save.
    #[must_use]
    pub fn after(&self, outcome: &SaveOutcome) -> SaveState {
        match outcome {
            SaveOutcome::Saved { at, .. } => SaveState::Saved { at: at.clone() },
            SaveOutcome::Unchanged => match self {
                SaveState::Saved { at } => SaveState::Saved { at: at.clone() },
                _ => SaveState::Clean,
            },
            SaveOutcome::Conflict(foreign) => SaveState::Conflict(foreign.clone()),
            SaveOutcome::NotSaved { why, .. } => SaveState::NotSaved {
                why: why.to_string(),
            },
        }
    }

    /// True while something that was typed stands nowhere but in this tab.
    #[must_use]
    pub fn is_at_risk(&self) -> bool {
        matches!(
            self,
            SaveState::Waiting | SaveState::NotSaved { .. } | SaveState::Conflict(_)
        )
    }

    /// In words: "saved", "not saved: …". The moment is not part of it.
    #[must_use]
    pub fn words(&self) -> String {
        match self {
            SaveState::Clean => String::new(),
            SaveState::Waiting => String::from("saving …"),
            SaveState::Saved { .. } => String::from("saved"),
            SaveState::NotSaved { why } => format!("not saved: {why}"),
            SaveState::Conflict(foreign) => format!("not saved: {}", foreign.words()),
        }
    }
}

/// What a load found.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Loaded {
    /// Everything that could be read.
    pub book: Book,
    /// Records of a newer version: shown as far as this version understands them, and never written.
    pub read_only: Vec<RecordKey>,
    /// Records whose last save was cut off and has been completed.
    pub recovered: Vec<RecordKey>,
    /// What was in the way.
    pub problems: Vec<LoadProblem>,
}

/// Something in the way of a load. Nothing is deleted over any of these.
#[derive(Clone, Debug, PartialEq, Error)]
pub enum LoadProblem {
    /// The store could not be read at all.
    #[error(
        "what is stored cannot be read: {0}. Nothing will be written over it; load the page again"
    )]
    Listing(StoreError),
    /// One record could not be read from the store.
    #[error("{}: {why}. It is left as it is; load the page again", key.words())]
    Unread {
        /// Which.
        key: RecordKey,
        /// Why.
        why: StoreError,
    },
    /// Unreadable, and moved to the quarantine.
    #[error("{was}: {why}. Its text is kept in quarantine: download it there")]
    Quarantined {
        /// Storage key that it stood under.
        was: String,
        /// Why it could not be read.
        why: RecordError,
    },
    /// Unreadable, and left where it is because the store would not take a copy.
    #[error("{was}: {why}. It is left where it is ({store})")]
    Stuck {
        /// Storage key.
        was: String,
        /// Why it could not be read.
        why: RecordError,
        /// Why it could not be moved.
        store: StoreError,
    },
    /// A newer version wrote it.
    #[error("{}: written by a newer version of Lowside (format {schema}); it can be read here, not changed. Update this app", key.words())]
    Newer {
        /// Which.
        key: RecordKey,
        /// Format number met.
        schema: u64,
    },
    /// The index names it and it is not there.
    #[error("{}: was stored here and is gone; the browser or another program removed it", key.words())]
    Missing {
        /// Which.
        key: RecordKey,
    },
    /// A save that met somebody else's: both are kept, this one in the quarantine.
    #[error("{}: two tabs saved it at the same time. The other text is kept in quarantine", key.words())]
    Parallel {
        /// Which.
        key: RecordKey,
    },
}

/// A record in the trash.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Trashed {
    /// Storage key in the trash.
    pub path: String,
    /// Which record it was.
    pub key: RecordKey,
    /// When it was put there.
    pub when: String,
    /// Name of the unit or complaint of the visit, as far as it can be read.
    pub name: String,
}

/// A text in the quarantine.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Quarantined {
    /// Storage key in the quarantine.
    pub path: String,
    /// Storage key that it stood under.
    pub was: String,
    /// When it was put there.
    pub when: String,
    /// Its length in characters.
    pub characters: usize,
}

/// How much of the storage is used.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Usage {
    /// Characters of keys and texts (UTF-16 units, as browsers count).
    pub characters: usize,
}

impl Usage {
    /// Characters that are surely there: browsers give 2.5 to 5 million to a site; a margin is left.
    pub const BUDGET: usize = 2_300_000;

    /// Share of the budget that is used; may pass 1.
    #[must_use]
    pub fn share(self) -> f64 {
        // Both are far below 2^52.
        self.characters as f64 / Self::BUDGET as f64
    }

    /// True from 90 % of the budget on: time for an archive.
    #[must_use]
    pub fn is_high(self) -> bool {
        self.characters >= Self::BUDGET / 10 * 9
    }
}
