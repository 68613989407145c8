//! A digest of everything that is answered.

/// 32-bit FNV-1a over words (Fowler, Noll and Vo's offset basis and prime, from memory): one multiplication each,
/// which even the smallest chip has, so the digest adds no library routine to an image.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Digest(u32);

impl Digest {
    /// Of nothing.
    pub const EMPTY: Self = Self(0x811c_9dc5);

    /// With some more words.
    #[must_use]
    pub fn with<const WORDS: usize>(self, words: [u32; WORDS]) -> Self {
        Self(words.into_iter().fold(self.0, |sum, word| {
            // FNV takes bytes; with whole words the high half would never reach the low one.
            let sum = (sum ^ word).wrapping_mul(0x0100_0193);
            sum ^ (sum >> 15)
        }))
    }

    /// The digest.
    #[must_use]
    pub fn value(self) -> u32 {
        self.0
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn one_bit_changes_the_digest() {
        let digest = Digest::EMPTY.with([1, 2, 3, 0]);
        for word in 0..4 {
            for bit in 0..32 {
                let mut words = [1, 2, 3, 0];
                words[word] ^= 1 << bit;
                assert_ne!(Digest::EMPTY.with(words), digest, "word {word}, bit {bit}");
            }
        }
    }
}
