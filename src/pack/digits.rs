//! Bytes as decimal digits: what a QR code holds most tightly (10 bits for 3 digits, ISO/IEC 18004, 7.4.3), and what no
//! messenger and no address bar changes on the way.

/// Bytes of a block and the digits that hold it: 2^64 < 10^20.
const BLOCK: (usize, usize) = (8, 20);
/// Digits that hold the last bytes, by how many there are.
const TAIL: [usize; 8] = [0, 3, 5, 8, 10, 13, 15, 17];

/// Bytes as digits.
#[must_use]
pub fn to_digits(bytes: &[u8]) -> String {
    let mut digits = String::with_capacity(bytes.len() * 5 / 2 + 4);
    for block in bytes.chunks(BLOCK.0) {
        let number = block
            .iter()
            .fold(0_u64, |number, byte| number << 8 | u64::from(*byte));
        let length = TAIL.get(block.len()).copied().unwrap_or(BLOCK.1);
        digits.push_str(&format!("{number:0length$}"));
    }
    digits
}

/// Digits as bytes; none where they are no such digits.
#[must_use]
pub fn from_digits(digits: &str) -> Option<Vec<u8>> {
    if !digits.bytes().all(|digit| digit.is_ascii_digit()) {
        return None;
    }
    let mut bytes = Vec::with_capacity(digits.len() / 2);
    let mut rest = digits;
    while !rest.is_empty() {
        let (block, after) = rest.split_at(rest.len().min(BLOCK.1));
        let length = if block.len() == BLOCK.1 {
            BLOCK.0
        } else {
            TAIL.iter().position(|tail| *tail == block.len())?
        };
        let number: u64 = block.parse().ok()?;
        let all = number.to_be_bytes();
        let (zeros, own) = all.split_at(all.len() - length);
        if zeros.iter().any(|byte| *byte != 0) {
            return None;
        }
        bytes.extend_from_slice(own);
        rest = after;
    }
    Some(bytes)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn bytes_come_back() {
        for length in 0..40 {
            for fill in [0, 1, 127, 255] {
                let bytes = vec![fill; length];
                let digits = to_digits(&bytes);
                assert_eq!(from_digits(&digits), Some(bytes), "{digits}");
            }
        }
        assert_eq!(to_digits(&[255; 8]), "18446744073709551615");
        assert_eq!(to_digits(&[1, 0]), "00256");
    }

    #[test]
    fn no_other_digits_are_taken() {
        for digits in [
            "1",
            "12",
            "999",
            "99999999999999999999",
            "00x",
            "1234",
            "٣٣٣",
        ] {
            assert_eq!(from_digits(digits), None, "{digits}");
        }
    }
}
