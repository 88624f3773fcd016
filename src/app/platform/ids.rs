//! Ids of units, visits and instruments.

use js_sys::{Date, Math};

/// A new id: the letter of its kind, then 80 random bits. Without the browser's generator, the clock stands in.
pub fn new_id(letter: char) -> String {
    let mut bytes = [0u8; 10];
    let filled = web_sys::window()
        .and_then(|window| window.crypto().ok())
        .is_some_and(|crypto| crypto.get_random_values_with_u8_array(&mut bytes).is_ok());
    if !filled {
        return format!(
            "{letter}{:x}{:x}",
            Date::now() as u64,
            (Math::random() * 1e9) as u64
        );
    }
    let hex: String = bytes.iter().map(|byte| format!("{byte:02x}")).collect();
    format!("{letter}{hex}")
}
