//! Records made small: DEFLATE (RFC 1951) with a dictionary that both sides know, because one record alone is too short to
//! learn from. A profile fits a printed tag that way, and thousands of calls the browser's storage.
//!
//! The dictionary is frozen: what was packed with it is on people's phones and on printed tags. Another dictionary gets another
//! number and stands beside this one.

mod digits;
mod wide;

pub use digits::{from_digits, to_digits};
pub use wide::{from_wide, to_wide};

use miniz_oxide::deflate::core::{
    CompressorOxide, TDEFLFlush, TDEFLStatus, compress, create_comp_flags_from_zip_params,
};
use miniz_oxide::inflate::TINFLStatus;
use miniz_oxide::inflate::core::inflate_flags::TINFL_FLAG_USING_NON_WRAPPING_OUTPUT_BUF;
use miniz_oxide::inflate::core::{DecompressorOxide, decompress};
use thiserror::Error;

/// Dictionary number 1: what stands in units and visits of format 2 over and over, the commonest last.
const WORDS_1: &[u8] = include_bytes!("words_1.txt");
/// Effort: the best that the library has for short texts.
const LEVEL: i32 = 9;
/// Raw DEFLATE, without a head of its own.
const RAW: i32 = 0;
const DEFAULT_STRATEGY: i32 = 0;

/// What stands in front of a packed text.
const MARK: &str = "L1";
/// Most bytes of a stored text: more than a browser can hold, packed or not.
const MOST_STORED: usize = 64_000_000;

/// A text as it is stored: packed into wide characters, or plain where that is no longer.
#[must_use]
pub fn stored(text: &str) -> String {
    let packed = format!("{MARK}{}", to_wide(&pack(text.as_bytes())));
    // A plain text that begins like a packed one would not be known from it.
    if text.starts_with(MARK) || packed.chars().count() < text.encode_utf16().count() {
        packed
    } else {
        text.to_owned()
    }
}

/// The text of what is stored. What is no packed text, or a damaged one, is handed out as it is.
#[must_use]
pub fn text_of(stored: String) -> String {
    let text = stored.strip_prefix(MARK).and_then(|wide| {
        let bytes = unpack(&from_wide(wide)?, MOST_STORED).ok()?;
        String::from_utf8(bytes).ok()
    });
    text.unwrap_or(stored)
}

/// What is wrong with packed bytes.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Error)]
pub enum PackError {
    /// No such packing, or a part of it is missing or changed.
    #[error("it is damaged or incomplete")]
    Damaged,
    /// More comes out than can be.
    #[error("it holds more than {most} bytes")]
    TooLarge {
        /// Most that is taken.
        most: usize,
    },
}

/// Packs bytes with the dictionary.
#[must_use]
pub fn pack(bytes: &[u8]) -> Vec<u8> {
    let flags = create_comp_flags_from_zip_params(LEVEL, RAW, DEFAULT_STRATEGY);
    let mut state = CompressorOxide::new(flags);
    // The words go through first, up to a byte boundary; what they gave is thrown away, what they taught stays.
    let mut scrap = vec![0; WORDS_1.len() + 1024];
    feed(&mut state, WORDS_1, &mut scrap, TDEFLFlush::Sync);
    let mut packed = vec![0; bytes.len() + bytes.len() / 8 + 128];
    let length = feed(&mut state, bytes, &mut packed, TDEFLFlush::Finish);
    packed.truncate(length);
    packed
}

/// Feeds everything; the room is more than what cannot be made smaller takes. Returns how much came out.
fn feed(state: &mut CompressorOxide, mut from: &[u8], into: &mut [u8], flush: TDEFLFlush) -> usize {
    let mut out = 0;
    loop {
        let room = into.get_mut(out..).unwrap_or_default();
        let (status, taken, given) = compress(state, from, room, flush);
        from = from.get(taken..).unwrap_or_default();
        out += given;
        let is_idle = taken == 0 && given == 0;
        if status == TDEFLStatus::Done || is_idle || (from.is_empty() && flush == TDEFLFlush::Sync)
        {
            return out;
        }
    }
}

/// Unpacks bytes, at most so many.
///
/// # Errors
/// [`PackError`].
pub fn unpack(packed: &[u8], most: usize) -> Result<Vec<u8>, PackError> {
    let head = WORDS_1.len();
    let whole = head + most;
    let mut state = DecompressorOxide::new();
    // The words stand in front of the output, so that what refers back finds them.
    let mut out = Vec::with_capacity(head + (packed.len() * 8).min(most));
    out.extend_from_slice(WORDS_1);
    out.resize(out.capacity().max(head + 64).min(whole.max(head)), 0);
    let (mut from, mut at) = (packed, head);
    loop {
        let flags = TINFL_FLAG_USING_NON_WRAPPING_OUTPUT_BUF;
        let (status, taken, given) = decompress(&mut state, from, &mut out, at, flags);
        from = from.get(taken..).unwrap_or_default();
        at += given;
        match status {
            TINFLStatus::Done if from.is_empty() => {
                out.truncate(at);
                out.drain(..head);
                return Ok(out);
            }
            TINFLStatus::HasMoreOutput if out.len() < whole => {
                let longer = (out.len() * 2).min(whole);
                out.resize(longer, 0);
            }
            TINFLStatus::HasMoreOutput => return Err(PackError::TooLarge { most }),
            _ => return Err(PackError::Damaged),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_is_packed_comes_back() {
        let visit = include_str!("../demo/tamarisk.json");
        for text in ["", "x", "neutral", visit, &visit.repeat(30)] {
            let packed = pack(text.as_bytes());
            assert_eq!(unpack(&packed, text.len()).as_deref(), Ok(text.as_bytes()));
        }
        let noise: Vec<u8> = (0..20_000_u32)
            .map(|i| (i.wrapping_mul(2_654_435_761) >> 13) as u8)
            .collect();
        assert_eq!(unpack(&pack(&noise), noise.len()), Ok(noise));
    }

    #[test]
    fn the_dictionary_is_frozen() {
        // Printed tags and stored records hang on it: never change it, add another one.
        let text = String::from_utf8(WORDS_1.to_vec()).expect("text");
        assert_eq!(crate::record::checksum(&text), "a92fa68c12e46011");
    }

    #[test]
    fn a_short_record_becomes_a_fraction() {
        let export: serde_json::Value =
            serde_json::from_str(include_str!("../demo/tamarisk.json")).expect("JSON");
        let unit = export["units"][0].to_string();
        let packed = pack(unit.as_bytes()).len();
        assert!(packed * 3 < unit.len(), "{packed} of {}", unit.len());
    }

    #[test]
    fn no_more_than_asked_for_comes_out() {
        let bomb = pack(&vec![b'x'; 1_000_000]);
        assert!(bomb.len() < 2_000);
        assert_eq!(
            unpack(&bomb, 10_000),
            Err(PackError::TooLarge { most: 10_000 })
        );
    }

    #[test]
    fn damage_is_told_or_harmless() {
        let text = include_str!("../demo/tamarisk.json");
        let packed = pack(text.as_bytes());
        for at in 0..packed.len() {
            assert_eq!(
                unpack(&packed[..at], 100_000),
                Err(PackError::Damaged),
                "cut at {at}"
            );
        }
        for at in (0..packed.len()).step_by(7) {
            let mut other = packed.clone();
            other[at] ^= 0x10;
            // Some changes give another text: that is what checksums above are for. None may give too much, or stop the program.
            assert!(unpack(&other, 100_000).map_or(0, |out| out.len()) <= 100_000);
        }
    }
}
