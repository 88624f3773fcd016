//! The shelf: records in a store, without ever losing one.
//!
//! How a save goes, and what each step is for:
//! 1. Read what stands there. Another tab's state: a conflict, nothing is written. Unreadable: moved to the quarantine first.
//! 2. Write the new text into this tab's slot. A crash or a torn write in the next step is then repaired at the next load; and
//!    where another tab writes in the very same moment, the slot still holds the loser's text.
//! 3. Write the record, read it back, compare.
//! 4. Write the index, where a record came or went. It can be rebuilt from the keys at any time.
//!
//! The browser gives no lock across tabs that can be taken without waiting, so two tabs can pass step 1 together; the slot is
//! what makes that harmless.

mod add;
mod bins;
mod load;
mod overwrite;
mod report;
mod save;
mod slot;

pub use report::{
    Foreign, LoadProblem, Loaded, NotSaved, Quarantined, SaveOutcome, SaveState, Trashed, Usage,
};

use super::keys::{PREFIX, RecordKey};
use super::{Store, StoreError};
use crate::record::{APP, Envelope, Ladder, Settings, Stamp, Visit};
use crate::unit::Unit;
use serde::Serialize;
use serde::de::DeserializeOwned;
use std::collections::{BTreeMap, BTreeSet};

/// Records in a store, as one tab sees them.
#[derive(Debug)]
pub struct Shelf<S: Store> {
    store: S,
    tab: String,
    ladder: Ladder,
    /// The state of each record that this tab last read or wrote.
    held: BTreeMap<RecordKey, Held>,
    /// The last state of each record that this tab tried to write without being told that it went well.
    tried: BTreeMap<RecordKey, Stamp>,
    /// Records that the load completed from a slot which still holds them.
    recovered: BTreeSet<RecordKey>,
    read_only: BTreeMap<RecordKey, u64>,
    loaded: bool,
    /// Many records come or go: the index is written once, after the last.
    is_many: bool,
}

/// The state of a record that this tab last read or wrote.
#[derive(Clone, Debug)]
struct Held {
    stamp: Stamp,
    /// Checksum of the record as this version writes it: what was read may have been written by an older one.
    content: String,
}

/// What is kept under a key of its own.
pub(super) trait Kept: Serialize + DeserializeOwned {
    fn key(&self) -> RecordKey;
    /// The key is the truth about the id.
    fn take_id(&mut self, key: &RecordKey);
}

impl Kept for Unit {
    fn key(&self) -> RecordKey {
        RecordKey::Unit(self.id.clone())
    }

    fn take_id(&mut self, key: &RecordKey) {
        key.id().clone_into(&mut self.id);
    }
}

impl Kept for Visit {
    fn key(&self) -> RecordKey {
        RecordKey::Visit(self.id.clone())
    }

    fn take_id(&mut self, key: &RecordKey) {
        key.id().clone_into(&mut self.id);
    }
}

impl Kept for Settings {
    fn key(&self) -> RecordKey {
        RecordKey::Settings
    }

    fn take_id(&mut self, _key: &RecordKey) {}
}

impl<S: Store> Shelf<S> {
    /// A shelf on a store. `tab` names this loading of the page: random, new at every load (a duplicated tab must not share
    /// it). Nothing can be saved before [`Shelf::load`].
    pub fn new(store: S, tab: impl Into<String>) -> Self {
        Self::with_ladder(store, tab, Ladder::default())
    }

    /// As [`Shelf::new`], with other migration steps.
    pub fn with_ladder(store: S, tab: impl Into<String>, ladder: Ladder) -> Self {
        let tab: String = tab.into();
        Shelf {
            store,
            tab: tab.replace(['/', '\n'], "-"),
            ladder,
            held: BTreeMap::new(),
            tried: BTreeMap::new(),
            recovered: BTreeSet::new(),
            read_only: BTreeMap::new(),
            loaded: false,
            is_many: false,
        }
    }

    /// The store below.
    pub fn store(&self) -> &S {
        &self.store
    }

    /// Does something to many records; the index is written once, after the last. Where it is cut off before that, the next load
    /// finds the records by their keys.
    pub fn many<R>(&mut self, act: impl FnOnce(&mut Self) -> R) -> R {
        self.is_many = true;
        let result = act(self);
        self.is_many = false;
        self.write_index();
        result
    }

    /// True where a newer version wrote the record, so that it is never written here.
    #[must_use]
    pub fn is_read_only(&self, key: &RecordKey) -> bool {
        self.read_only.contains_key(key)
    }

    /// How much of the storage is used.
    ///
    /// # Errors
    /// [`StoreError`].
    pub fn usage(&self) -> Result<Usage, StoreError> {
        let mut characters = 0;
        for key in self.store.keys(PREFIX)? {
            characters += key.encode_utf16().count() + self.store.size(&key)?;
        }
        Ok(Usage { characters })
    }

    /// Everything stored, text by text, as a file that can be sent in or read back: no record is left out, readable or not.
    ///
    /// # Errors
    /// [`StoreError`].
    pub fn rescue_file(&self, now: &str) -> Result<String, StoreError> {
        let mut stored = BTreeMap::new();
        for key in self.store.keys(PREFIX)? {
            if let Some(text) = self.store.get(&key)? {
                stored.insert(key, text);
            }
        }
        serde_json::to_string(&serde_json::json!({
            "app": APP, "kind": "rescue", "version": env!("CARGO_PKG_VERSION"), "saved_at": now, "stored": stored,
        }))
        .map_err(|error| StoreError::Failed(error.to_string()))
    }

    /// Looks at a key that another tab says it changed (the browser's `storage` event); an empty key: everything was cleared.
    /// Tells which records of this tab are no longer what this tab holds.
    ///
    /// # Errors
    /// [`StoreError`].
    pub fn foreign_changes(&self, path: &str) -> Result<Vec<Foreign>, StoreError> {
        let keys: BTreeSet<RecordKey> = if path.is_empty() {
            self.held.keys().cloned().collect()
        } else {
            RecordKey::from_path(path).into_iter().collect()
        };
        let mut changes = Vec::new();
        for key in keys {
            changes.extend(self.compare(&key)?.err());
        }
        Ok(changes)
    }

    /// The envelope that stands there now, where it is the state that this tab holds (or nothing where this tab holds none).
    fn compare(&self, key: &RecordKey) -> Result<Result<Standing, Foreign>, StoreError> {
        let held = self.held.get(key);
        let Some(text) = self.store.get(&key.path())? else {
            let gone = Foreign {
                key: key.clone(),
                saved_at: None,
            };
            return Ok(if held.is_some() {
                Err(gone)
            } else {
                Ok(Standing::Nothing)
            });
        };
        Ok(match Envelope::open(&text) {
            Err(_) => Ok(Standing::Unreadable { text }),
            // What this tab tried to write and could not is its own too: another tab may have completed it from the slot.
            Ok(there)
                if held.is_some_and(|held| held.stamp == there.stamp)
                    || self.tried.get(key) == Some(&there.stamp) =>
            {
                Ok(Standing::Ours { text, there })
            }
            Ok(there) => Err(Foreign {
                key: key.clone(),
                saved_at: Some(there.saved_at),
            }),
        })
    }
}

/// What stands under a record's key.
enum Standing {
    Nothing,
    Ours { text: String, there: Envelope },
    Unreadable { text: String },
}
