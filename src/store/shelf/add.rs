//! New records, all or none: for an import.

use super::super::{RecordKey, Store};
use super::{Kept, NotSaved, SaveOutcome, Shelf};
use crate::record::Visit;
use crate::unit::Unit;

impl<S: Store> Shelf<S> {
    /// Adds new records, all or none: where one cannot be written, those written before it are taken out again.
    ///
    /// # Errors
    /// The first record that could not be written, and why. Nothing is left behind.
    pub fn add(
        &mut self,
        units: &[Unit],
        visits: &[Visit],
        now: &str,
    ) -> Result<(), (RecordKey, NotSaved)> {
        self.many(|shelf| shelf.add_all(units, visits, now))
    }

    fn add_all(
        &mut self,
        units: &[Unit],
        visits: &[Visit],
        now: &str,
    ) -> Result<(), (RecordKey, NotSaved)> {
        let mut tried = Vec::new();
        let result = units
            .iter()
            .try_for_each(|unit| self.add_one(unit, now, &mut tried))
            .and_then(|()| {
                visits
                    .iter()
                    .try_for_each(|visit| self.add_one(visit, now, &mut tried))
            });
        if result.is_err() {
            for key in tried {
                // They are new and still in the caller's hands. One that cannot be taken out again is a spare copy, no loss.
                let _ = self.drop_slot(&key);
                let _ = self.delete(&key);
            }
        }
        result
    }

    fn add_one<T: Kept>(
        &mut self,
        record: &T,
        now: &str,
        tried: &mut Vec<RecordKey>,
    ) -> Result<(), (RecordKey, NotSaved)> {
        let key = record.key();
        if self.held.contains_key(&key) {
            return Err((key, NotSaved::Taken));
        }
        tried.push(key.clone());
        match self.save(record, now) {
            SaveOutcome::Saved { .. } => Ok(()),
            SaveOutcome::Unchanged => {
                // Another tab has just added the very same: it is theirs.
                tried.pop();
                Ok(())
            }
            SaveOutcome::Conflict(_) => Err((key, NotSaved::Taken)),
            SaveOutcome::NotSaved { key, why } => Err((key, why)),
        }
    }
}
