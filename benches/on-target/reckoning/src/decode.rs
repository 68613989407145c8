//! From an instruction's bytes to its kind.

mod risc_v;
mod thumb;

use crate::{core::Core, kind::Kind};

/// What the reckoning needs to know of an instruction.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Decoded {
    /// Its kind.
    pub kind: Kind,
    /// How many words it moves from or to memory; 0 if it does not, or only one.
    pub words: u8,
    /// Its length in bytes.
    pub length: u8,
}

/// Decodes the instructions of a processor.
pub struct Decoder(By);

enum By {
    Thumb(thumb::Decoder),
    RiscV(risc_v::Decoder),
}

impl Decoder {
    /// A decoder.
    ///
    /// # Errors
    /// If capstone cannot be set up.
    pub fn new(core: Core) -> Result<Self, capstone::Error> {
        Ok(Self(match core {
            Core::M0 | Core::M0Plus | Core::M3 | Core::M4f | Core::M7 => By::Thumb(thumb::Decoder::new()?),
            Core::Rv32imc => By::RiscV(risc_v::Decoder::new()?),
        }))
    }

    /// The kind of the instruction that `bytes` begin with; of one that cannot be decoded, [`Kind::Unknown`].
    ///
    /// More bytes may follow: at the end of a block, QEMU 7.2 hands over what it looked at beyond the instruction.
    pub fn decode(&self, bytes: &[u8]) -> Decoded {
        let decoded = match &self.0 {
            By::Thumb(thumb) => thumb.decode(bytes),
            By::RiscV(risc_v) => risc_v.decode(bytes),
        };
        decoded.unwrap_or_else(|| {
            let length = u8::try_from(bytes.len()).unwrap_or(u8::MAX);
            Decoded { kind: Kind::Unknown, words: 0, length }
        })
    }
}
