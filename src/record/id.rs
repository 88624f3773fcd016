//! Ids: short texts that never change once given. The core has no source of chance: the caller brings the random bytes.

use super::limits::ID_CHARACTERS;

/// What an id is for: the first letter of the id, so that a list of stored keys can be read by eye.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum IdOf {
    /// A unit.
    Unit,
    /// A visit.
    Visit,
    /// A reading of a visit.
    Reading,
    /// A rigging of a visit.
    Rigging,
    /// An instrument of the shop.
    Instrument,
}

impl IdOf {
    fn letter(self) -> char {
        match self {
            IdOf::Unit => 'u',
            IdOf::Visit => 'v',
            IdOf::Reading => 'r',
            IdOf::Rigging => 'g',
            IdOf::Instrument => 'i',
        }
    }
}

/// A new id from 80 random bits: the letter of its kind and 20 hexadecimal digits. Two phones that never met will not give
/// the same one.
#[must_use]
pub fn new_id(of: IdOf, random: [u8; 10]) -> String {
    let mut id = String::with_capacity(21);
    id.push(of.letter());
    for byte in random {
        for half in [byte >> 4, byte & 15] {
            id.extend(char::from_digit(u32::from(half), 16));
        }
    }
    id
}

/// True for a text that can be an id: 1 to 64 of `a-z A-Z 0-9 - _ .`, not starting with a point. Ids become parts of storage
/// keys and of file names, so nothing else is taken.
#[must_use]
pub fn is_id(text: &str) -> bool {
    !text.is_empty()
        && text.len() <= ID_CHARACTERS
        && !text.starts_with('.')
        && text
            .bytes()
            .all(|b| b.is_ascii_alphanumeric() || matches!(b, b'-' | b'_' | b'.'))
}

/// `id` with an ending, cut so that the whole is still an id.
pub(super) fn with_ending(id: &str, ending: &str) -> String {
    let room = ID_CHARACTERS.saturating_sub(ending.len());
    let mut new: String = id.chars().take(room).collect();
    new.push_str(ending);
    new
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn an_id_shows_its_kind_and_every_bit() {
        let id = new_id(IdOf::Visit, [0, 1, 2, 0xff, 0x10, 5, 6, 7, 8, 0xa9]);
        assert_eq!(id, "v000102ff1005060708a9");
        assert!(is_id(&id));
    }

    #[test]
    fn what_is_no_id() {
        for text in ["", "a/b", "a b", "ä", ".x", "a\n", &"x".repeat(65)] {
            assert!(!is_id(text), "{text:?}");
        }
        assert!(is_id(&"x".repeat(64)) && is_id("T-14_b.2"));
    }

    #[test]
    fn an_ending_never_makes_an_id_too_long() {
        let id = with_ending(&"x".repeat(64), "-1a2b3c4d");
        assert!(is_id(&id) && id.ends_with("x-1a2b3c4d"));
    }
}
