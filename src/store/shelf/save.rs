//! Writing records.

use super::super::Store;
use super::super::keys::{self, RecordKey};
use super::{Foreign, Held, Kept, NotSaved, SaveOutcome, Shelf, Standing};
use crate::record::{Book, Envelope, Settings, Stamp, Visit, checksum, is_id};
use crate::unit::Unit;

impl<S: Store> Shelf<S> {
    /// Saves a unit.
    pub fn save_unit(&mut self, unit: &Unit, now: &str) -> SaveOutcome {
        self.save(unit, now)
    }

    /// Saves a visit.
    pub fn save_visit(&mut self, visit: &Visit, now: &str) -> SaveOutcome {
        self.save(visit, now)
    }

    /// Saves the settings.
    pub fn save_settings(&mut self, settings: &Settings, now: &str) -> SaveOutcome {
        self.save(settings, now)
    }

    /// Saves every record of the book that differs from what this tab last read or wrote, units before visits. Records that
    /// are no longer in the book are left alone: taking one out is [`Shelf::trash`]. Outcomes of what was unchanged are left
    /// out.
    pub fn save_book(&mut self, book: &Book, now: &str) -> Vec<SaveOutcome> {
        let mut outcomes = vec![self.save(&book.settings, now)];
        outcomes.extend(book.units.values().map(|unit| self.save(unit, now)));
        outcomes.extend(book.visits.values().map(|visit| self.save(visit, now)));
        outcomes.retain(|outcome| *outcome != SaveOutcome::Unchanged);
        outcomes
    }

    pub(super) fn save<T: Kept>(&mut self, record: &T, now: &str) -> SaveOutcome {
        let key = record.key();
        self.try_save(&key, record, now, Follows::WhatStands)
            .unwrap_or_else(|why| SaveOutcome::NotSaved { key, why })
    }

    pub(super) fn try_save<T: Kept>(
        &mut self,
        key: &RecordKey,
        record: &T,
        now: &str,
        follows: Follows,
    ) -> Result<SaveOutcome, NotSaved> {
        if !self.loaded {
            return Err(NotSaved::NotLoaded);
        }
        if let Some(schema) = self.read_only.get(key) {
            return Err(NotSaved::Newer(*schema));
        }
        let body = body_of(key, record)?;
        let sum = checksum(&body);
        if self.held.get(key).is_some_and(|held| held.content == sum) {
            return Ok(SaveOutcome::Unchanged);
        }
        let mut completed = None;
        let base = match self.compare(key)? {
            Err(foreign) => return self.same_as_theirs(key, &sum, foreign),
            Ok(Standing::Nothing) => None,
            Ok(Standing::Ours { text, there }) => {
                self.guard_older(key, &text, there.schema)?;
                completed = self.recovered.contains(key).then_some(text);
                Some(there.stamp)
            }
            Ok(Standing::Unreadable { text }) => {
                self.put_aside(|moment| keys::quarantine(moment, &key.path()), now, &text)?;
                self.held.get(key).map(|held| held.stamp.clone())
            }
        };
        let is_new = !self.held.contains_key(key);
        let stamp = Stamp {
            rev: base.as_ref().map_or(0, |base| base.rev).saturating_add(1),
            tab: self.tab.clone(),
            sum,
        };
        let envelope = Envelope {
            kind: key.kind(),
            schema: u64::from(self.ladder.top),
            stamp: stamp.clone(),
            saved_at: now.to_owned(),
            body,
        };
        let text = envelope
            .write()
            .map_err(|error| NotSaved::Unwritable(error.to_string()))?;
        let base_sum = base
            .as_ref()
            .filter(|_| follows == Follows::WhatStands)
            .map(|base| base.sum.as_str());
        self.fill_slot(key, base_sum, &text, now)?;
        if let Some(base) = base {
            // An earlier try may be what stands there.
            let content = base.sum.clone();
            self.held.insert(
                key.clone(),
                Held {
                    stamp: base,
                    content,
                },
            );
        }
        self.tried.insert(key.clone(), stamp.clone());
        self.store.put(&key.path(), &text)?;
        if self.store.get(&key.path())?.as_deref() != Some(text.as_str()) {
            // Another tab's state, where it is one, stays; the slot holds ours until the next load sorts it out.
            return Ok(SaveOutcome::Conflict(
                self.compare(key)?.err().ok_or(NotSaved::Garbled)?,
            ));
        }
        if let Some(before) = completed {
            // What the load completed from a slot is now followed by this state: the slot has done its work.
            self.clear_slots_of(key, &before);
            self.recovered.remove(key);
        }
        let rev = stamp.rev;
        self.tried.remove(key);
        self.held.insert(
            key.clone(),
            Held {
                content: stamp.sum.clone(),
                stamp,
            },
        );
        if is_new && !self.is_many {
            self.write_index();
        }
        Ok(SaveOutcome::Saved {
            rev,
            at: now.to_owned(),
        })
    }

    /// A foreign state with the very same content is no conflict.
    fn same_as_theirs(
        &mut self,
        key: &RecordKey,
        sum: &str,
        foreign: Foreign,
    ) -> Result<SaveOutcome, NotSaved> {
        let there = self
            .store
            .get(&key.path())?
            .and_then(|text| Envelope::open(&text).ok());
        Ok(match there {
            Some(there) if there.schema > u64::from(self.ladder.top) => {
                self.read_only.insert(key.clone(), there.schema);
                return Err(NotSaved::Newer(there.schema));
            }
            Some(there) if there.stamp.sum == sum => {
                self.held.insert(
                    key.clone(),
                    Held {
                        content: sum.to_owned(),
                        stamp: there.stamp,
                    },
                );
                SaveOutcome::Unchanged
            }
            _ => SaveOutcome::Conflict(foreign),
        })
    }

    /// Before a record of an older format is replaced, its text is kept once.
    fn guard_older(&self, key: &RecordKey, text: &str, schema: u64) -> Result<(), NotSaved> {
        if schema >= u64::from(self.ladder.top) {
            return Ok(());
        }
        let backup = keys::backup(schema, key);
        if self.store.get(&backup)?.is_none() {
            self.put_checked(&backup, text)?;
        }
        Ok(())
    }

    /// Writes and reads back.
    pub(super) fn put_checked(&self, path: &str, text: &str) -> Result<(), NotSaved> {
        self.store.put(path, text)?;
        if self.store.get(path)?.as_deref() == Some(text) {
            Ok(())
        } else {
            Err(NotSaved::Garbled)
        }
    }

    /// Writes a text under the first free key of its moment, so that nothing put aside earlier is replaced.
    pub(super) fn put_aside(
        &self,
        key: impl Fn(&str) -> String,
        now: &str,
        text: &str,
    ) -> Result<(), NotSaved> {
        let mut path = key(now);
        let mut count = 1;
        while let Some(there) = self.store.get(&path)? {
            if there == text {
                return Ok(());
            }
            count += 1;
            path = key(&format!("{now}~{count}"));
        }
        self.put_checked(&path, text)
    }

    /// Rebuilds the index from the keys. It only tells a later load what ought to be there: failing here loses nothing.
    pub(super) fn write_index(&self) {
        let Ok(paths) = self.store.keys(keys::PREFIX) else {
            return;
        };
        let tails: Vec<String> = paths
            .iter()
            .filter_map(|p| RecordKey::from_path(p))
            .map(|key| key.tail())
            .collect();
        if let Ok(text) = serde_json::to_string(&tails) {
            let _ = self.store.put(keys::INDEX, &text);
        }
    }
}

/// What a new state was made from.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(super) enum Follows {
    /// From what stands there: completing it after a crash loses nothing.
    WhatStands,
    /// From something else, and it is to stand instead: after a crash both are kept.
    Nothing,
}

/// The record as JSON text that surely reads back.
fn body_of<T: Kept>(key: &RecordKey, record: &T) -> Result<String, NotSaved> {
    if *key != RecordKey::Settings && !is_id(key.id()) {
        return Err(NotSaved::Unwritable(format!("{:?} is no id", key.id())));
    }
    let body =
        serde_json::to_string(record).map_err(|error| NotSaved::Unwritable(error.to_string()))?;
    // A figure that is not finite is written as null and would not be read again.
    serde_json::from_str::<T>(&body).map_err(|error| NotSaved::Unwritable(error.to_string()))?;
    Ok(body)
}
