//! Large keys of the app's own under the screen, for a glove on a phone: digits, the decimal mark of the settings, the sign where one
//! makes sense, the unit, and the one-touch answers of the reading. They work on the field that has the keyboard, so every field of a
//! figure has them; a keyboard or a screen reader goes on as before.

mod around;
mod pad;

pub use pad::Keypad;
