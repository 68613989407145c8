//! A digest of everything that a contender answers, so that nothing is counted that computes nonsense.

/// 32-bit FNV-1a over words (Fowler, Noll and Vo's offset basis and prime, from memory): one multiplication each,
/// which even the smallest chip has, so the digest adds no library routine to an image.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Digest(u32);

impl Digest {
    /// Of nothing.
    pub const EMPTY: Self = Self(0x811c_9dc5);

    /// With four more words.
    #[must_use]
    pub fn with(self, words: [u32; 4]) -> Self {
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
