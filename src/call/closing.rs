//! How a call ended, in words.

use crate::faults::{self, Fault, FaultId};
use crate::record::Closing;

/// The cause of a code; none for one that this version does not know.
#[must_use]
pub fn cause(code: &str) -> Option<&'static Fault> {
    let quoted = serde_json::Value::String(code.to_owned());
    serde_json::from_value::<FaultId>(quoted)
        .ok()
        .and_then(faults::find)
}

/// True where the cause was proved on the machine. A call closed before that was asked says so by what proved it.
#[must_use]
pub fn is_proved(closing: &Closing) -> bool {
    !closing.cause.is_empty() && (closing.is_proved || !closing.proof.trim().is_empty())
}

/// The cause or causes found, without whether they were proved; none where none was found.
#[must_use]
pub fn found(closing: &Closing) -> Option<String> {
    let title = |code: &str| cause(code).map_or_else(|| code.to_owned(), |f| f.title.to_owned());
    if closing.cause.is_empty() {
        return None;
    }
    let first = title(&closing.cause);
    Some(if closing.also.is_empty() {
        first
    } else {
        format!("{first} and {}", title(&closing.also))
    })
}

/// The finding in one line.
#[must_use]
pub fn words(closing: &Closing) -> String {
    match found(closing) {
        None => String::from("no cause"),
        Some(found) if is_proved(closing) => format!("{found}, proved"),
        Some(found) => format!("{found}, not proved"),
    }
}
