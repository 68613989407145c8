//! The digest by which a sheet is known.

use sha2::{Digest as _, Sha256};
use std::fmt::Write as _;

/// The SHA-256 (FIPS 180-4) of bytes, in hexadecimal.
pub fn sha256(bytes: &[u8]) -> String {
    Sha256::digest(bytes).iter().fold(String::new(), |mut text, byte| {
        let _ = write!(text, "{byte:02x}"); // a String takes everything
        text
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The one-block message "abc" of the examples that are published with FIPS 180; the value is from memory.
    #[test]
    fn it_is_the_published_digest() {
        assert_eq!(sha256(b"abc"), "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
    }
}
