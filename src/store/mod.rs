//! Where the record is kept.
//!
//! [`Store`] is the narrow door to whatever keeps texts under keys: the browser's storage, memory, or a faulty one for tests.
//! [`Shelf`] stands on it and knows records: one key each, an envelope with a checksum, conflicts between tabs, a slot that
//! survives a crash in the middle of a write, a trash, and a quarantine for what cannot be read.

#[cfg(target_arch = "wasm32")]
mod browser;
mod faulty;
mod keys;
mod memory;
mod packed;
mod shelf;

#[cfg(target_arch = "wasm32")]
pub use browser::{BrowserStore, open_browser};
pub use faulty::{Fault, FaultyStore};
pub use keys::{PREFIX, RecordKey};
pub use memory::MemoryStore;
pub use packed::PackedStore;
pub use shelf::{
    Foreign, LoadProblem, Loaded, NotSaved, Quarantined, SaveOutcome, SaveState, Shelf, Trashed,
    Usage,
};

use thiserror::Error;

/// Why a store did not do what it was asked.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
pub enum StoreError {
    /// No room left.
    #[error("the browser's storage is full")]
    Full,
    /// The browser does not allow it.
    #[error("the browser does not allow this page to store anything")]
    Denied,
    /// There is no storage here.
    #[error("there is no storage in this browser window")]
    Missing,
    /// Anything else.
    #[error("the storage failed: {0}")]
    Failed(String),
}

/// Texts under keys. Each call is complete when it returns. One `put` replaces the whole text.
pub trait Store {
    /// The text under a key; none where there is none.
    ///
    /// # Errors
    /// [`StoreError`].
    fn get(&self, key: &str) -> Result<Option<String>, StoreError>;

    /// Puts a text under a key. Where this fails the old text is to be still there.
    ///
    /// # Errors
    /// [`StoreError`].
    fn put(&self, key: &str, text: &str) -> Result<(), StoreError>;

    /// Takes a key out; no error where it is not there.
    ///
    /// # Errors
    /// [`StoreError`].
    fn remove(&self, key: &str) -> Result<(), StoreError>;

    /// Every key that begins with `prefix`, sorted.
    ///
    /// # Errors
    /// [`StoreError`].
    fn keys(&self, prefix: &str) -> Result<Vec<String>, StoreError>;

    /// Characters (UTF-16 units, as browsers count) that the text under a key takes in the store; 0 where there is none.
    ///
    /// # Errors
    /// [`StoreError`].
    fn size(&self, key: &str) -> Result<usize, StoreError> {
        Ok(self.get(key)?.map_or(0, |text| text.encode_utf16().count()))
    }
}

impl<S: Store + ?Sized> Store for Box<S> {
    fn get(&self, key: &str) -> Result<Option<String>, StoreError> {
        (**self).get(key)
    }

    fn put(&self, key: &str, text: &str) -> Result<(), StoreError> {
        (**self).put(key, text)
    }

    fn remove(&self, key: &str) -> Result<(), StoreError> {
        (**self).remove(key)
    }

    fn keys(&self, prefix: &str) -> Result<Vec<String>, StoreError> {
        (**self).keys(prefix)
    }

    fn size(&self, key: &str) -> Result<usize, StoreError> {
        (**self).size(key)
    }
}

impl<S: Store + ?Sized> Store for &S {
    fn get(&self, key: &str) -> Result<Option<String>, StoreError> {
        (**self).get(key)
    }

    fn put(&self, key: &str, text: &str) -> Result<(), StoreError> {
        (**self).put(key, text)
    }

    fn remove(&self, key: &str) -> Result<(), StoreError> {
        (**self).remove(key)
    }

    fn keys(&self, prefix: &str) -> Result<Vec<String>, StoreError> {
        (**self).keys(prefix)
    }

    fn size(&self, key: &str) -> Result<usize, StoreError> {
        (**self).size(key)
    }
}

impl<S: Store + ?Sized> Store for std::rc::Rc<S> {
    fn get(&self, key: &str) -> Result<Option<String>, StoreError> {
        (**self).get(key)
    }

    fn put(&self, key: &str, text: &str) -> Result<(), StoreError> {
        (**self).put(key, text)
    }

    fn remove(&self, key: &str) -> Result<(), StoreError> {
        (**self).remove(key)
    }

    fn keys(&self, prefix: &str) -> Result<Vec<String>, StoreError> {
        (**self).keys(prefix)
    }

    fn size(&self, key: &str) -> Result<usize, StoreError> {
        (**self).size(key)
    }
}
