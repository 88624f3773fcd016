//! A store in memory: for tests, and for a browser that keeps nothing.

use super::{Store, StoreError};
use std::cell::RefCell;
use std::collections::BTreeMap;
use std::rc::Rc;

/// Texts in memory. Clones share them, as two tabs share the browser's storage.
#[derive(Clone, Debug, Default)]
pub struct MemoryStore {
    texts: Rc<RefCell<BTreeMap<String, String>>>,
}

impl MemoryStore {
    /// An empty store.
    #[must_use]
    pub fn new() -> Self {
        Self::default()
    }

    /// Everything in it.
    #[must_use]
    pub fn texts(&self) -> BTreeMap<String, String> {
        self.texts.borrow().clone()
    }
}

impl Store for MemoryStore {
    fn get(&self, key: &str) -> Result<Option<String>, StoreError> {
        Ok(self.texts.borrow().get(key).cloned())
    }

    fn put(&self, key: &str, text: &str) -> Result<(), StoreError> {
        self.texts
            .borrow_mut()
            .insert(key.to_owned(), text.to_owned());
        Ok(())
    }

    fn remove(&self, key: &str) -> Result<(), StoreError> {
        self.texts.borrow_mut().remove(key);
        Ok(())
    }

    fn keys(&self, prefix: &str) -> Result<Vec<String>, StoreError> {
        Ok(self
            .texts
            .borrow()
            .keys()
            .filter(|key| key.starts_with(prefix))
            .cloned()
            .collect())
    }
}
