//! The slots: each tab keeps the record that it wrote last in a key of its own. What a crash cuts off is completed from it, and
//! what two tabs write in the same moment is not lost.

use super::super::keys::{self, RecordKey};
use super::super::{Store, StoreError};
use super::{LoadProblem, Loaded, NotSaved, Shelf};
use crate::record::{Envelope, RecordError};

/// Stands for the state before the first one.
const NO_BASE: &str = "-";

/// What a slot holds.
pub(super) struct Slot {
    key: RecordKey,
    /// Checksum of the state that this one was written over.
    base: String,
    text: String,
    envelope: Envelope,
}

impl Slot {
    /// A slot for `text`, which is to replace the state with this checksum.
    pub(super) fn content(key: &RecordKey, base: Option<&str>, text: &str) -> String {
        format!("{} {}\n{text}", key.tail(), base.unwrap_or(NO_BASE))
    }

    fn open(content: &str) -> Option<Slot> {
        let (head, text) = content.split_once('\n')?;
        let (tail, base) = head.split_once(' ')?;
        Some(Slot {
            key: RecordKey::from_tail(tail)?,
            base: base.to_owned(),
            text: text.to_owned(),
            envelope: Envelope::open(text).ok()?,
        })
    }

    /// True where the record still stands as it did when this was to be written over it.
    fn follows_on(&self, there: &Envelope) -> bool {
        self.base == there.stamp.sum
    }
}

impl<S: Store> Shelf<S> {
    /// Puts a record's new text into this tab's slot. A full store goes on without: its own writes are all or nothing.
    pub(super) fn fill_slot(
        &self,
        key: &RecordKey,
        base: Option<&str>,
        text: &str,
        now: &str,
    ) -> Result<(), NotSaved> {
        let slot = keys::slot(&self.tab);
        if let Some(before) = self.store.get(&slot)?
            && !self.is_spent(&before, key)?
        {
            // Another tab wrote over that record in the very moment that this one did: the slot is all that is left of it.
            match self.put_aside(|moment| keys::quarantine(moment, &slot), now, &before) {
                Err(NotSaved::Store(StoreError::Full)) => return Ok(()),
                other => other?,
            }
        }
        match self.put_checked(&slot, &Slot::content(key, base, text)) {
            Err(NotSaved::Store(StoreError::Full)) => {
                // The room of the older text may be what the record needs.
                self.store.remove(&slot)?;
                Ok(())
            }
            other => other,
        }
    }

    /// True where a slot's text is no longer needed once `next` is written.
    fn is_spent(&self, content: &str, next: &RecordKey) -> Result<bool, StoreError> {
        // Half a text is what is left of a write that was reported as failed.
        let Some(slot) = Slot::open(content) else {
            return Ok(true);
        };
        let there = self
            .store
            .get(&slot.key.path())?
            .and_then(|text| Envelope::open(&text).ok());
        // An unfinished write of the same record: what is written now is what the person has typed since.
        let is_own = slot.key == *next;
        Ok(match there {
            Some(there) => there.body == slot.envelope.body || (is_own && slot.follows_on(&there)),
            None => is_own && slot.base == NO_BASE,
        })
    }

    /// Empties this tab's slot where it holds this record, whatever state of it.
    pub(super) fn drop_slot(&self, key: &RecordKey) -> Result<(), NotSaved> {
        match self.own_slot(key)? {
            Some((path, _, _)) => Ok(self.store.remove(&path)?),
            None => Ok(()),
        }
    }

    /// Empties this tab's slot where it holds this record, before the record is taken out: left behind, it would bring the
    /// record back. Another state than `text` goes to the quarantine: a save that did not come through.
    pub(super) fn close_slot(&self, key: &RecordKey, text: &str) -> Result<(), NotSaved> {
        let Some((path, content, slot)) = self.own_slot(key)? else {
            return Ok(());
        };
        if slot.text != text {
            let moment = &slot.envelope.saved_at;
            self.put_aside(|moment| keys::quarantine(moment, &path), moment, &content)?;
        }
        Ok(self.store.remove(&path)?)
    }

    fn own_slot(&self, key: &RecordKey) -> Result<Option<(String, String, Slot)>, StoreError> {
        let path = keys::slot(&self.tab);
        let Some(content) = self.store.get(&path)? else {
            return Ok(None);
        };
        let slot = Slot::open(&content).filter(|slot| slot.key == *key);
        Ok(slot.map(|slot| (path, content, slot)))
    }

    /// Empties every slot that holds just this state of a record, now that this tab goes on from it. One that cannot be
    /// emptied is looked at again at the next load.
    pub(super) fn clear_slots_of(&self, key: &RecordKey, text: &str) {
        for path in self.store.keys(keys::SLOT).unwrap_or_default() {
            let content = self.store.get(&path).ok().flatten();
            let slot = content.as_deref().and_then(Slot::open);
            if slot.is_some_and(|slot| slot.key == *key && slot.text == text) {
                let _ = self.store.remove(&path);
            }
        }
    }

    /// Looks at a slot that some tab left: its last save was cut off, or met another's, or (most often) was complete.
    pub(super) fn settle_slot(&self, path: &str, now: &str, loaded: &mut Loaded) {
        let Ok(Some(content)) = self.store.get(path) else {
            return;
        };
        let Some(slot) = Slot::open(&content) else {
            let why = RecordError::NotOurs {
                why: String::from("half a text, left by a write that failed"),
            };
            self.quarantine(path, &content, why, now, loaded);
            return;
        };
        let Ok(there) = self.store.get(&slot.key.path()) else {
            return;
        };
        match there.as_deref().map(Envelope::open) {
            Some(Ok(there)) if there.body == slot.envelope.body => {
                let _ = self.store.remove(path);
            }
            Some(Ok(there)) if !slot.follows_on(&there) => {
                let moved = self
                    .put_aside(|moment| keys::quarantine(moment, path), now, &content)
                    .and_then(|()| self.store.remove(path).map_err(NotSaved::from));
                // Not moved: it stays in its slot, and is told of at the next load.
                if moved.is_ok() {
                    loaded
                        .problems
                        .push(LoadProblem::Parallel { key: slot.key });
                }
            }
            // Cut off before the record was written (nothing, or the state before) or in the middle of it (unreadable).
            stands => {
                let is_torn = matches!(stands, Some(Err(_)));
                if let (Some(Err(why)), Some(torn)) = (stands, &there)
                    && !self.quarantine(&slot.key.path(), torn, why, now, loaded)
                {
                    return;
                }
                if self.put_checked(&slot.key.path(), &slot.text).is_err() {
                    return;
                }
                // This slot stays until a later look finds its text in the record: this write can meet another's as well.
                // One that holds the state before has done its work.
                if let Some(before) = there.filter(|_| !is_torn) {
                    self.clear_slots_of(&slot.key, &before);
                }
                loaded.recovered.push(slot.key);
            }
        }
    }
}
