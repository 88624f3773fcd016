//! Bytes as text of 15 bits a character: browsers count the characters of what they store, and give each 16 bits. The characters
//! run from U+3400 to U+B3FF: one UTF-16 unit each, no surrogates, nothing that storage would fold or turn.

const BITS: u32 = 15;
const FIRST: u32 = 0x3400;
/// Characters in front of it that tell how many bits of the last character are fill, 0 to 14.
const FILL: u32 = 0xB400;

/// Bytes as wide characters.
#[must_use]
pub fn to_wide(bytes: &[u8]) -> String {
    let mut text = String::with_capacity(bytes.len() * 8 / 5 + 6);
    let used = bytes.len() * 8 % 15;
    let fill = if used == 0 { 0 } else { 15 - used };
    text.extend(char::from_u32(FILL + u32::try_from(fill).unwrap_or(0)));
    let (mut held, mut bits) = (0_u32, 0);
    for byte in bytes {
        held = held << 8 | u32::from(*byte);
        bits += 8;
        if bits >= BITS {
            bits -= BITS;
            text.extend(char::from_u32(FIRST + (held >> bits)));
            held &= (1 << bits) - 1;
        }
    }
    if bits > 0 {
        text.extend(char::from_u32(FIRST + (held << (BITS - bits))));
    }
    text
}

/// Wide characters as bytes; none where they are no such text.
#[must_use]
pub fn from_wide(text: &str) -> Option<Vec<u8>> {
    let mut letters = text.chars();
    let fill = u32::from(letters.next()?)
        .checked_sub(FILL)
        .filter(|fill| *fill < BITS)?;
    let mut bytes = Vec::with_capacity(text.len() * 5 / 8);
    let (mut held, mut bits) = (0_u32, 0);
    for letter in letters {
        let value = u32::from(letter)
            .checked_sub(FIRST)
            .filter(|value| *value < 1 << BITS)?;
        held = held << BITS | value;
        bits += BITS;
        while bits >= 8 {
            bits -= 8;
            bytes.push((held >> bits & 0xff) as u8);
            held &= (1 << bits) - 1;
        }
    }
    // What is left over is fill; a whole byte of it was taken for content where the fill is 8 or more.
    let extra = usize::try_from(fill / 8).ok()?;
    let keep = bytes.len().checked_sub(extra)?;
    let is_fill = bits == fill % 8 && held == 0 && bytes.iter().skip(keep).all(|byte| *byte == 0);
    bytes.truncate(keep);
    is_fill.then_some(bytes)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn bytes_come_back() {
        for length in 0..64_usize {
            let bytes: Vec<u8> = (0..length).map(|i| (i * 89 + length) as u8).collect();
            let text = to_wide(&bytes);
            assert_eq!(from_wide(&text), Some(bytes.clone()));
            assert_eq!(text.chars().count(), 1 + (length * 8).div_ceil(15));
            assert!(text.chars().all(|c| c.len_utf16() == 1));
            for ends in [0_u8, 255] {
                let bytes = vec![ends; length];
                assert_eq!(from_wide(&to_wide(&bytes)), Some(bytes));
            }
        }
    }

    #[test]
    fn other_texts_are_not_taken() {
        let good = to_wide(b"lowside");
        for bad in [
            "",
            "lowside",
            &good[3..],
            &format!("{good}x"),
            "\u{b400}\u{b400}",
        ] {
            assert_eq!(from_wide(bad), None, "{bad:?}");
        }
    }
}
