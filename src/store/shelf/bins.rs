//! The trash and the quarantine.

use super::super::keys::{self, RecordKey};
use super::super::{Store, StoreError};
use super::{NotSaved, Quarantined, Shelf, Standing, Trashed};
use crate::record::Envelope;
use serde_json::Value;

impl<S: Store> Shelf<S> {
    /// Puts a record in the trash, as it stands in the store. What another tab changed since is not touched.
    ///
    /// # Errors
    /// [`NotSaved::Gone`] where it is not there (in this state); otherwise as a save.
    pub fn trash(&mut self, key: &RecordKey, now: &str) -> Result<(), NotSaved> {
        self.take_out(key, |shelf, text| {
            shelf.put_aside(|moment| keys::trash(moment, key), now, text)
        })
    }

    /// Deletes a record for good, without the trash: for demo data, and where the store is too full for the trash.
    ///
    /// # Errors
    /// As [`Shelf::trash`].
    pub fn delete(&mut self, key: &RecordKey) -> Result<(), NotSaved> {
        self.take_out(key, |_, _| Ok(()))
    }

    fn take_out(
        &mut self,
        key: &RecordKey,
        keep: impl Fn(&Self, &str) -> Result<(), NotSaved>,
    ) -> Result<(), NotSaved> {
        if !self.loaded {
            return Err(NotSaved::NotLoaded);
        }
        if let Some(schema) = self.read_only.get(key) {
            return Err(NotSaved::Newer(*schema));
        }
        let Ok(Standing::Ours { text, .. }) = self.compare(key)? else {
            return Err(NotSaved::Gone);
        };
        keep(self, &text)?;
        self.close_slot(key, &text)?;
        if self.recovered.remove(key) {
            self.clear_slots_of(key, &text);
        }
        if self.store.get(&key.path())?.as_deref() != Some(text.as_str()) {
            return Err(NotSaved::Gone);
        }
        self.store.remove(&key.path())?;
        self.held.remove(key);
        self.tried.remove(key);
        if !self.is_many {
            self.write_index();
        }
        Ok(())
    }

    /// What is in the trash, newest first.
    ///
    /// # Errors
    /// [`StoreError`].
    pub fn trashed(&self) -> Result<Vec<Trashed>, StoreError> {
        let mut all = Vec::new();
        for path in self.store.keys(keys::TRASH)? {
            let Some((when, key)) = keys::from_trash(&path) else {
                continue;
            };
            let name = self
                .store
                .get(&path)?
                .map(|text| name_in(&text))
                .unwrap_or_default();
            all.push(Trashed {
                path,
                key,
                when,
                name,
            });
        }
        all.reverse();
        Ok(all)
    }

    /// Puts a record back from the trash, as it was. Read it with [`Shelf::reload_unit`] or [`Shelf::reload_visit`] then.
    ///
    /// # Errors
    /// [`NotSaved::Taken`] where a record of this id stands there again; [`NotSaved::Gone`]; otherwise as a save.
    pub fn restore(&mut self, trashed: &Trashed) -> Result<(), NotSaved> {
        if !self.loaded {
            return Err(NotSaved::NotLoaded);
        }
        let text = self.store.get(&trashed.path)?.ok_or(NotSaved::Gone)?;
        if self.store.get(&trashed.key.path())?.is_some() {
            return Err(NotSaved::Taken);
        }
        self.put_checked(&trashed.key.path(), &text)?;
        self.held.remove(&trashed.key);
        self.tried.remove(&trashed.key);
        self.write_index();
        self.store.remove(&trashed.path)?;
        Ok(())
    }

    /// Empties the trash for good.
    ///
    /// # Errors
    /// [`StoreError`]; what was not removed is still there.
    pub fn empty_trash(&mut self) -> Result<usize, StoreError> {
        let paths = self.store.keys(keys::TRASH)?;
        for path in &paths {
            self.store.remove(path)?;
        }
        Ok(paths.len())
    }

    /// What is in the quarantine, newest first.
    ///
    /// # Errors
    /// [`StoreError`].
    pub fn quarantined(&self) -> Result<Vec<Quarantined>, StoreError> {
        let mut all = Vec::new();
        for path in self.store.keys(keys::QUARANTINE)? {
            let Some((when, was)) = keys::from_quarantine(&path) else {
                continue;
            };
            let characters = self
                .store
                .get(&path)?
                .map_or(0, |text| text.chars().count());
            all.push(Quarantined {
                path,
                was,
                when,
                characters,
            });
        }
        all.reverse();
        Ok(all)
    }

    /// The text of an entry of the quarantine, as it was found: for a download.
    ///
    /// # Errors
    /// [`StoreError`].
    pub fn quarantined_text(&self, entry: &Quarantined) -> Result<Option<String>, StoreError> {
        self.store.get(&entry.path)
    }

    /// Throws an entry of the quarantine away: only when a person asks for it.
    ///
    /// # Errors
    /// [`StoreError`].
    pub fn discard_quarantined(&mut self, entry: &Quarantined) -> Result<(), StoreError> {
        self.store.remove(&entry.path)
    }
}

/// Name of the unit or complaint of the visit in a stored text; empty where it cannot be read.
fn name_in(text: &str) -> String {
    let record: Option<Value> = Envelope::open(text).ok().and_then(|there| there.glimpse());
    let field = |name| {
        record
            .as_ref()
            .and_then(|record| record.get(name))
            .and_then(Value::as_str)
    };
    field("name")
        .or_else(|| field("complaint"))
        .unwrap_or_default()
        .to_owned()
}
