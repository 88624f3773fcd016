//! Reading records, and completing what a crash cut off.

use super::super::keys::{self, RecordKey};
use super::super::{Store, StoreError};
use super::{Held, Kept, LoadProblem, Loaded, NotSaved, Shelf};
use crate::record::{Envelope, RecordError, Settings, Visit, checksum};
use crate::unit::Unit;
use std::collections::BTreeSet;

impl<S: Store> Shelf<S> {
    /// Reads everything, completes saves that a crash cut off, and moves what cannot be read to the quarantine. From then on
    /// this tab can save. Where the store cannot be listed nothing can be saved, so that an empty book is never written over
    /// a full one.
    pub fn load(&mut self, now: &str) -> Loaded {
        let mut loaded = Loaded::default();
        self.held.clear();
        self.tried.clear();
        self.recovered.clear();
        self.read_only.clear();
        self.loaded = false;
        let slots = match self.store.keys(keys::SLOT) {
            Ok(slots) => slots,
            Err(why) => {
                loaded.problems.push(LoadProblem::Listing(why));
                return loaded;
            }
        };
        for slot in slots {
            self.settle_slot(&slot, now, &mut loaded);
        }
        self.recovered = loaded.recovered.iter().cloned().collect();
        let paths = match self.store.keys(keys::PREFIX) {
            Ok(paths) => paths,
            Err(why) => {
                loaded.problems.push(LoadProblem::Listing(why));
                return loaded;
            }
        };
        // A device without settings starts with the usual ones.
        loaded.book.settings = Settings::start();
        let found: BTreeSet<RecordKey> = paths
            .iter()
            .filter_map(|path| RecordKey::from_path(path))
            .collect();
        for key in &found {
            match key {
                RecordKey::Settings => {
                    if let Some(settings) = self.take_in::<Settings>(key, now, &mut loaded) {
                        loaded.book.settings = settings;
                    }
                }
                RecordKey::Unit(_) => {
                    if let Some(unit) = self.take_in::<Unit>(key, now, &mut loaded) {
                        loaded.book.put_unit(unit);
                    }
                }
                RecordKey::Visit(_) => {
                    if let Some(visit) = self.take_in::<Visit>(key, now, &mut loaded) {
                        loaded.book.put_visit(visit);
                    }
                }
            }
        }
        self.compare_index(&found, &mut loaded);
        self.loaded = true;
        loaded
    }

    /// Reads one unit again, as another tab left it; none where it is gone. This tab goes on from that state.
    ///
    /// # Errors
    /// What is in the way; a text that cannot be read is left where it is.
    pub fn reload_unit(&mut self, id: &str) -> Result<Option<Unit>, LoadProblem> {
        self.reload(&RecordKey::Unit(id.to_owned()))
    }

    /// As [`Shelf::reload_unit`], for a visit.
    ///
    /// # Errors
    /// As [`Shelf::reload_unit`].
    pub fn reload_visit(&mut self, id: &str) -> Result<Option<Visit>, LoadProblem> {
        self.reload(&RecordKey::Visit(id.to_owned()))
    }

    /// As [`Shelf::reload_unit`], for the settings.
    ///
    /// # Errors
    /// As [`Shelf::reload_unit`].
    pub fn reload_settings(&mut self) -> Result<Option<Settings>, LoadProblem> {
        self.reload(&RecordKey::Settings)
    }

    fn reload<T: Kept>(&mut self, key: &RecordKey) -> Result<Option<T>, LoadProblem> {
        let text = self
            .store
            .get(&key.path())
            .map_err(|why| LoadProblem::Unread {
                key: key.clone(),
                why,
            })?;
        let Some(text) = text else {
            self.held.remove(key);
            self.tried.remove(key);
            return Ok(None);
        };
        let record = self.read(key, &text).map_err(|why| LoadProblem::Stuck {
            was: key.path(),
            why,
            store: StoreError::Failed(String::from("not moved while the page is in use")),
        })?;
        self.clear_slots_of(key, &text);
        Ok(Some(record))
    }

    /// Reads one record into the book; what cannot be read goes to the quarantine.
    fn take_in<T: Kept>(&mut self, key: &RecordKey, now: &str, loaded: &mut Loaded) -> Option<T> {
        let text = match self.store.get(&key.path()) {
            Ok(text) => text?,
            Err(why) => {
                loaded.problems.push(LoadProblem::Unread {
                    key: key.clone(),
                    why,
                });
                return None;
            }
        };
        match self.read::<T>(key, &text) {
            Ok(record) => {
                if let Some(schema) = self.read_only.get(key) {
                    loaded.read_only.push(key.clone());
                    loaded.problems.push(LoadProblem::Newer {
                        key: key.clone(),
                        schema: *schema,
                    });
                }
                Some(record)
            }
            Err(RecordError::Newer { found, .. }) => {
                loaded.read_only.push(key.clone());
                loaded.problems.push(LoadProblem::Newer {
                    key: key.clone(),
                    schema: found,
                });
                None
            }
            Err(why) => {
                self.quarantine(&key.path(), &text, why, now, loaded);
                None
            }
        }
    }

    /// Reads a record and holds its state. A newer one is read as far as it can be, and marked as read-only.
    fn read<T: Kept>(&mut self, key: &RecordKey, text: &str) -> Result<T, RecordError> {
        let there = Envelope::open(text)?;
        if there.kind != key.kind() {
            return Err(RecordError::NotOurs {
                why: format!(
                    "a {} stands under the key of a {}",
                    there.kind.code(),
                    key.kind().code()
                ),
            });
        }
        let mut record: T = match there.record(&self.ladder) {
            Ok(record) => record,
            Err(RecordError::Newer { found, known }) => {
                self.read_only.insert(key.clone(), found);
                there.glimpse().ok_or(RecordError::Newer { found, known })?
            }
            Err(other) => return Err(other),
        };
        record.take_id(key);
        let content = serde_json::to_string(&record)
            .map(|body| checksum(&body))
            .unwrap_or_default();
        self.tried.remove(key);
        self.held.insert(
            key.clone(),
            Held {
                stamp: there.stamp,
                content,
            },
        );
        Ok(record)
    }

    /// Moves a text that cannot be read to the quarantine. False where it could not be moved, and stays where it is.
    pub(super) fn quarantine(
        &self,
        path: &str,
        text: &str,
        why: RecordError,
        now: &str,
        loaded: &mut Loaded,
    ) -> bool {
        let moved = self
            .put_aside(|moment| keys::quarantine(moment, path), now, text)
            .and_then(|()| self.store.remove(path).map_err(NotSaved::from));
        let was = path.to_owned();
        let is_moved = moved.is_ok();
        loaded.problems.push(match moved {
            Ok(()) => LoadProblem::Quarantined { was, why },
            Err(NotSaved::Store(store)) => LoadProblem::Stuck { was, why, store },
            Err(other) => LoadProblem::Stuck {
                was,
                why,
                store: StoreError::Failed(other.to_string()),
            },
        });
        is_moved
    }

    /// What the index names and the store has not was taken out from outside.
    fn compare_index(&self, found: &BTreeSet<RecordKey>, loaded: &mut Loaded) {
        let named: Vec<String> = self
            .store
            .get(keys::INDEX)
            .ok()
            .flatten()
            .and_then(|text| serde_json::from_str(&text).ok())
            .unwrap_or_default();
        let gone: Vec<RecordKey> = named
            .iter()
            .filter_map(|tail| RecordKey::from_tail(tail))
            .filter(|key| !found.contains(key))
            .collect();

        let told: BTreeSet<String> = loaded
            .problems
            .iter()
            .filter_map(|problem| match problem {
                LoadProblem::Quarantined { was, .. } => Some(was.clone()),
                _ => None,
            })
            .collect();
        let is_stale = !gone.is_empty() || !told.is_empty() || found.len() != named.len();
        for key in gone.into_iter().filter(|key| !told.contains(&key.path())) {
            loaded.problems.push(LoadProblem::Missing { key });
        }
        if is_stale {
            self.write_index();
        }
    }
}
