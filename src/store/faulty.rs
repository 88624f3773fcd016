//! A store that fails as told: for tests of everything that stands on a store.

use super::{Store, StoreError};
use std::cell::RefCell;
use std::collections::BTreeMap;

/// What goes wrong at one call.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Fault {
    /// The call fails and changes nothing.
    Fails(StoreError),
    /// A write stops after this share (per cent) of the text and says that it went well: a crash or a bad disk.
    Torn(u8),
    /// As [`Fault::Torn`], and says that it failed.
    TornAndFails(u8),
    /// Somebody else writes these texts under their keys just before the call; no text: the key is taken out.
    Foreign(Vec<(String, Option<String>)>),
    /// From this call on every write that makes the store larger than this many bytes of keys and texts fails.
    Quota(usize),
}

/// A store with a script of faults in front of another store. Reads, writes, removals and listings are counted together,
/// from 0.
#[derive(Debug, Default)]
pub struct FaultyStore<S> {
    inner: S,
    state: RefCell<State>,
}

#[derive(Debug, Default)]
struct State {
    calls: usize,
    script: BTreeMap<usize, Fault>,
    quota: Option<usize>,
}

/// What the script says about one call.
enum Turn {
    Go,
    Tear(u8, bool),
}

impl<S: Store> FaultyStore<S> {
    /// A store that behaves until told otherwise.
    pub fn new(inner: S) -> Self {
        FaultyStore {
            inner,
            state: RefCell::default(),
        }
    }

    /// The store behind.
    pub fn inner(&self) -> &S {
        &self.inner
    }

    /// Calls made so far.
    #[must_use]
    pub fn calls(&self) -> usize {
        self.state.borrow().calls
    }

    /// Something goes wrong `ahead` calls from now (0: at the next one).
    pub fn arm(&self, ahead: usize, fault: Fault) {
        let mut state = self.state.borrow_mut();
        let at = state.calls.saturating_add(ahead);
        state.script.insert(at, fault);
    }

    /// Nothing goes wrong any more, and there is room again.
    pub fn heal(&self) {
        let mut state = self.state.borrow_mut();
        state.script.clear();
        state.quota = None;
    }

    fn turn(&self) -> Result<Turn, StoreError> {
        let fault = {
            let mut state = self.state.borrow_mut();
            let at = state.calls;
            state.calls += 1;
            state.script.remove(&at)
        };
        match fault {
            None => Ok(Turn::Go),
            Some(Fault::Fails(why)) => Err(why),
            Some(Fault::Torn(share)) => Ok(Turn::Tear(share, false)),
            Some(Fault::TornAndFails(share)) => Ok(Turn::Tear(share, true)),
            Some(Fault::Quota(bytes)) => {
                self.state.borrow_mut().quota = Some(bytes);
                Ok(Turn::Go)
            }
            Some(Fault::Foreign(writes)) => {
                for (key, text) in writes {
                    match text {
                        Some(text) => self.inner.put(&key, &text)?,
                        None => self.inner.remove(&key)?,
                    }
                }
                Ok(Turn::Go)
            }
        }
    }

    fn check_room(&self, key: &str, text: &str) -> Result<(), StoreError> {
        let Some(quota) = self.state.borrow().quota else {
            return Ok(());
        };
        let mut used = key.len() + text.len();
        for other in self
            .inner
            .keys("")?
            .into_iter()
            .filter(|other| other != key)
        {
            used += other.len() + self.inner.get(&other)?.map_or(0, |text| text.len());
        }
        let before = self
            .inner
            .get(key)?
            .map_or(0, |text| key.len() + text.len());
        // As in browsers: a write that makes the store smaller is let through even over the limit.
        if used > quota && key.len() + text.len() > before {
            Err(StoreError::Full)
        } else {
            Ok(())
        }
    }
}

impl<S: Store> Store for FaultyStore<S> {
    fn get(&self, key: &str) -> Result<Option<String>, StoreError> {
        self.turn()?;
        self.inner.get(key)
    }

    fn put(&self, key: &str, text: &str) -> Result<(), StoreError> {
        let turn = self.turn()?;
        self.check_room(key, text)?;
        let Turn::Tear(share, fails) = turn else {
            return self.inner.put(key, text);
        };
        let kept = text.chars().count() * usize::from(share.min(99)) / 100;
        self.inner
            .put(key, &text.chars().take(kept).collect::<String>())?;
        if fails {
            Err(StoreError::Failed(String::from("torn write")))
        } else {
            Ok(())
        }
    }

    fn remove(&self, key: &str) -> Result<(), StoreError> {
        self.turn()?;
        self.inner.remove(key)
    }

    fn keys(&self, prefix: &str) -> Result<Vec<String>, StoreError> {
        self.turn()?;
        self.inner.keys(prefix)
    }
}
