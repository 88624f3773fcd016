//! Packs what goes into a store and unpacks what comes out, so that five times as many records fit. A text that was stored plain
//! is read as it is, and packed with its next save.

use super::keys::PREFIX;
use super::{Store, StoreError};
use crate::pack;

/// A store in front of another one, which holds packed texts.
#[derive(Clone, Debug, Default)]
pub struct PackedStore<S> {
    inner: S,
}

impl<S: Store> PackedStore<S> {
    /// Packs for this store.
    pub fn new(inner: S) -> Self {
        PackedStore { inner }
    }

    /// The store behind.
    pub fn inner(&self) -> &S {
        &self.inner
    }
}

impl<S: Store> Store for PackedStore<S> {
    fn get(&self, key: &str) -> Result<Option<String>, StoreError> {
        Ok(self.inner.get(key)?.map(pack::text_of))
    }

    fn put(&self, key: &str, text: &str) -> Result<(), StoreError> {
        if key.starts_with(PREFIX) {
            self.inner.put(key, &pack::stored(text))
        } else {
            self.inner.put(key, text)
        }
    }

    fn remove(&self, key: &str) -> Result<(), StoreError> {
        self.inner.remove(key)
    }

    fn keys(&self, prefix: &str) -> Result<Vec<String>, StoreError> {
        self.inner.keys(prefix)
    }

    fn size(&self, key: &str) -> Result<usize, StoreError> {
        self.inner.size(key)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::store::MemoryStore;

    #[test]
    fn texts_come_back_packed_or_plain() {
        let behind = MemoryStore::new();
        let store = PackedStore::new(behind.clone());
        let long = include_str!("../demo/tamarisk.json");
        for text in [long, "x", "", "L1", "L1\u{b400}", &pack::stored(long)] {
            store.put("lowside/v1/visit/v1", text).expect("room");
            assert_eq!(store.get("lowside/v1/visit/v1"), Ok(Some(text.to_owned())));
        }
        store.put("lowside/v1/visit/v1", long).expect("room");
        let size = store.size("lowside/v1/visit/v1").expect("it is there");
        assert!(size * 8 < long.len(), "{size} of {}", long.len());
        // As an older version left it.
        behind.put("lowside/v1/visit/v2", long).expect("room");
        assert_eq!(store.get("lowside/v1/visit/v2"), Ok(Some(long.to_owned())));
        // A probe is no record.
        store.put("lowside-probe", long).expect("room");
        assert_eq!(behind.get("lowside-probe"), Ok(Some(long.to_owned())));
    }

    #[test]
    fn a_packed_text_that_was_damaged_is_handed_out_as_it_is() {
        let behind = MemoryStore::new();
        let store = PackedStore::new(behind.clone());
        let mut torn = pack::stored(include_str!("../demo/tamarisk.json"));
        torn.pop();
        behind.put("lowside/v1/visit/v1", &torn).expect("room");
        assert_eq!(store.get("lowside/v1/visit/v1"), Ok(Some(torn)));
    }
}
