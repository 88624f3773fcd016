//! The browser's own storage. The only place that touches it.

use super::{MemoryStore, PackedStore, Store, StoreError};
use gloo_storage::{LocalStorage, Storage as _};
use wasm_bindgen::{JsCast, JsValue};
use web_sys::{DomException, Storage};

/// Key of the probe. Not under the app's prefix, so that a probe left by a crash is never taken for a record.
const PROBE: &str = "lowside-probe";

/// Texts in the browser's local storage.
#[derive(Clone, Debug)]
pub struct BrowserStore {
    storage: Storage,
}

impl BrowserStore {
    /// Opens the storage after one guarded probe (write, read, delete).
    ///
    /// # Errors
    /// [`StoreError::Missing`] without a window or storage, [`StoreError::Denied`] where the browser forbids it. A full
    /// storage is none: what stands there can be read, and what is in the way deleted.
    pub fn open() -> Result<Self, StoreError> {
        let window = web_sys::window().ok_or(StoreError::Missing)?;
        // The property itself throws where the browser blocks storage. Only after this is the wrapper's own access safe,
        // which would stop the app.
        window
            .local_storage()
            .map_err(|error| why(&error))?
            .ok_or(StoreError::Missing)?;
        let store = BrowserStore {
            storage: LocalStorage::raw(),
        };
        match store.put(PROBE, PROBE) {
            Err(StoreError::Full) => return Ok(store),
            other => other?,
        }
        let back = store.get(PROBE)?;
        store.remove(PROBE)?;
        if back.as_deref() == Some(PROBE) {
            Ok(store)
        } else {
            Err(StoreError::Failed(String::from(
                "it does not give back what was stored",
            )))
        }
    }
}

/// The browser's storage; where there is none, memory with the reason: then nothing is kept beyond this page, and the screen
/// must say so.
#[must_use]
pub fn open_browser() -> (Box<dyn Store>, Option<StoreError>) {
    match BrowserStore::open() {
        Ok(store) => (Box::new(PackedStore::new(store)), None),
        Err(why) => (Box::new(MemoryStore::new()), Some(why)),
    }
}

impl Store for BrowserStore {
    fn get(&self, key: &str) -> Result<Option<String>, StoreError> {
        self.storage.get_item(key).map_err(|error| why(&error))
    }

    fn put(&self, key: &str, text: &str) -> Result<(), StoreError> {
        self.storage
            .set_item(key, text)
            .map_err(|error| why(&error))
    }

    fn remove(&self, key: &str) -> Result<(), StoreError> {
        self.storage.remove_item(key).map_err(|error| why(&error))
    }

    fn keys(&self, prefix: &str) -> Result<Vec<String>, StoreError> {
        let mut keys = Vec::new();
        for index in 0..self.storage.length().map_err(|error| why(&error))? {
            let key = self.storage.key(index).map_err(|error| why(&error))?;
            keys.extend(key.filter(|key| key.starts_with(prefix)));
        }
        keys.sort();
        Ok(keys)
    }
}

/// Browsers tell their reasons apart only by the name of the exception.
fn why(error: &JsValue) -> StoreError {
    let Some(exception) = error.dyn_ref::<DomException>() else {
        return StoreError::Failed(
            error
                .as_string()
                .unwrap_or_else(|| String::from("unknown error")),
        );
    };
    match exception.name().as_str() {
        "QuotaExceededError" | "NS_ERROR_DOM_QUOTA_REACHED" => StoreError::Full,
        "SecurityError" => StoreError::Denied,
        name => StoreError::Failed(format!("{name}: {}", exception.message())),
    }
}
