//! A record over another tab's, when a person chose so.

use super::super::Store;
use super::super::keys::{self, RecordKey};
use super::save::Follows;
use super::{Held, Kept, NotSaved, SaveOutcome, Shelf};
use crate::record::{Envelope, Settings, Visit};
use crate::unit::Unit;

impl<S: Store> Shelf<S> {
    /// Writes this tab's record over another tab's. Theirs goes to the trash first.
    pub fn overwrite_unit(&mut self, unit: &Unit, now: &str) -> SaveOutcome {
        self.overwrite(unit, now)
    }

    /// As [`Shelf::overwrite_unit`], for a visit.
    pub fn overwrite_visit(&mut self, visit: &Visit, now: &str) -> SaveOutcome {
        self.overwrite(visit, now)
    }

    /// As [`Shelf::overwrite_unit`], for the settings.
    pub fn overwrite_settings(&mut self, settings: &Settings, now: &str) -> SaveOutcome {
        self.overwrite(settings, now)
    }

    fn overwrite<T: Kept>(&mut self, record: &T, now: &str) -> SaveOutcome {
        let key = record.key();
        let before = self.held.get(&key).cloned();
        let outcome = self
            .put_theirs_aside(&key, now)
            .and_then(|()| self.try_save(&key, record, now, Follows::Nothing));
        if !outcome.as_ref().is_ok_and(SaveOutcome::is_safe) {
            // Theirs still stands, and is theirs.
            match before {
                Some(before) => self.held.insert(key.clone(), before),
                None => self.held.remove(&key),
            };
        }
        outcome.unwrap_or_else(|why| SaveOutcome::NotSaved { key, why })
    }

    /// Puts what stands there in the trash and lets this tab write over it.
    fn put_theirs_aside(&mut self, key: &RecordKey, now: &str) -> Result<(), NotSaved> {
        if !self.loaded {
            return Err(NotSaved::NotLoaded);
        }
        let Some(text) = self.store.get(&key.path())? else {
            self.held.remove(key);
            return Ok(());
        };
        // What cannot be read goes to the quarantine with the save itself, and what is newer is refused there.
        let Ok(there) = Envelope::open(&text) else {
            return Ok(());
        };
        if there.schema <= u64::from(self.ladder.top) {
            self.put_aside(|moment| keys::trash(moment, key), now, &text)?;
            self.clear_slots_of(key, &text);
            let content = there.stamp.sum.clone();
            let stamp = there.stamp;
            self.held.insert(key.clone(), Held { stamp, content });
        }
        Ok(())
    }
}
