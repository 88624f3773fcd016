//! Checksum of a stored text.

/// FNV-1a, 64 bits, over the UTF-8 bytes, as 16 hexadecimal digits.
///
/// It guards against accident (a text cut short, edited by hand or overwritten), not against intent, so no cryptographic hash
/// is needed. FNV-1a is taken over a CRC because 64 bits make a chance match negligible, it needs no table, and it is short
/// enough to be read at a glance. Source of the constants and the order of operations: Fowler, Noll and Vo (from memory).
#[must_use]
pub fn checksum(text: &str) -> String {
    const OFFSET: u64 = 0xcbf2_9ce4_8422_2325;
    const PRIME: u64 = 0x0000_0100_0000_01b3;
    let hash = text.bytes().fold(OFFSET, |hash, byte| {
        (hash ^ u64::from(byte)).wrapping_mul(PRIME)
    });
    format!("{hash:016x}")
}

#[cfg(test)]
mod tests {
    use super::checksum;

    /// Published test vectors of FNV-1a, 64 bits (from memory).
    #[test]
    fn known_vectors() {
        for (text, sum) in [
            ("", "cbf29ce484222325"),
            ("a", "af63dc4c8601ec8c"),
            ("foobar", "85944171f73967e8"),
        ] {
            assert_eq!(checksum(text), sum, "{text:?}");
        }
    }
}
