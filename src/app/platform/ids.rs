//! Random bytes for the ids of units, visits and instruments.

use crate::record::{IdOf, new_id};
use js_sys::Math;

/// A new id. Without the browser's generator of random bytes, its simple one stands in: good enough for names in one yard.
pub fn fresh(of: IdOf) -> String {
    let mut bytes = [0u8; 10];
    let filled = web_sys::window()
        .and_then(|window| window.crypto().ok())
        .is_some_and(|crypto| crypto.get_random_values_with_u8_array(&mut bytes).is_ok());
    if !filled {
        bytes = bytes.map(|_| (Math::random() * 256.0) as u8);
    }
    new_id(of, bytes)
}
