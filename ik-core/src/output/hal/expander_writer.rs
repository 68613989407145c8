//! A frame of servos on an expander behind an I²C bus.

use crate::output::{Expander, OutputError};
use embedded_hal::i2c::{I2c, Operation};

/// Which byte of a 16-bit register comes first.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum WordOrder {
    /// The low one.
    LowFirst,
    /// The high one.
    HighFirst,
}

/// How an expander's registers are laid out: for each channel in turn a 16-bit word with the count at which its pulse ends,
/// perhaps after one with the count at which it begins. Writing must go on from register to register; on many expanders
/// that is a bit in a mode register. The data sheet tells all of it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Layout {
    /// The register at which the first channel begins.
    pub first_register: u8,
    /// Which byte of a word comes first.
    pub order: WordOrder,
    /// Whether each channel has a word for the beginning of its pulse before that for its end. All pulses begin at 0.
    pub has_beginnings: bool,
}

impl Layout {
    /// Bytes of a channel.
    const fn bytes(self) -> usize {
        if self.has_beginnings { 4 } else { 2 }
    }

    const fn word(self, counts: u16) -> [u8; 2] {
        match self.order {
            WordOrder::LowFirst => counts.to_le_bytes(),
            WordOrder::HighFirst => counts.to_be_bytes(),
        }
    }
}

/// Writes frames of counts to an expander, all channels in one transaction: either every servo gets its pulse or, by the
/// bus's own error, it is known that the frame was not taken.
///
/// Setting the prescaler is not its business: [`Expander::divider`] tells what belongs there (registers often hold one
/// less).
///
/// ```
/// # use core::convert::Infallible;
/// # use embedded_hal::i2c::{ErrorType, I2c, Operation};
/// use ik_core::Expander;
/// use ik_core::output::hal::{ExpanderWriter, Layout, WordOrder};
/// # struct Bus;
/// # impl ErrorType for Bus { type Error = Infallible; }
/// # impl I2c for Bus {
/// #     fn transaction(&mut self, _: u8, _: &mut [Operation<'_>]) -> Result<(), Infallible> { Ok(()) }
/// # }
///
/// # fn main() -> Result<(), Box<dyn core::error::Error>> {
/// # let bus = Bus;
/// const EXPANDER: Expander = match Expander::nearest(25_000_000, 12, 50.0) {
///     Ok(expander) => expander,
///     Err(error) => panic!("{}", error.message()),
/// };
/// // Six channels from register 8 on, the low byte of each word first.
/// const LAYOUT: Layout = Layout { first_register: 8, order: WordOrder::LowFirst, has_beginnings: false };
/// let mut writer = ExpanderWriter::<_, 6>::new(bus, 0x41, LAYOUT, EXPANDER)?;
/// writer.send(&[307; 6])?;
/// assert_eq!(writer.sent(), Some([307; 6]));
/// # Ok(())
/// # }
/// ```
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct ExpanderWriter<I, const CHANNELS: usize> {
    bus: I,
    address: u8,
    layout: Layout,
    most_counts: u16,
    sent: Option<[u16; CHANNELS]>,
}

impl<I: I2c, const CHANNELS: usize> ExpanderWriter<I, CHANNELS> {
    /// A writer to the expander at a 7-bit address. Nothing is sent yet.
    ///
    /// # Errors
    /// If the channels' registers do not lie within 256.
    pub fn new(bus: I, address: u8, layout: Layout, expander: Expander) -> Result<Self, OutputError> {
        let fits = CHANNELS
            .checked_mul(layout.bytes())
            .is_some_and(|bytes| bytes <= 256 - usize::from(layout.first_register));
        if !fits {
            return Err(OutputError::Registers);
        }
        let most_counts = (expander.frame_counts() - 1) as u16;
        Ok(Self { bus, address, layout, most_counts, sent: None })
    }

    /// Sends a frame: the counts of every channel, 0 for no pulse, each held at the largest that the expander counts to.
    ///
    /// # Errors
    /// What the bus says. The expander may then have taken all of the frame, a part or nothing; what was sent before is
    /// still what [`sent`](Self::sent) tells, and may be sent again.
    pub fn send(&mut self, counts: &[u32; CHANNELS]) -> Result<(), I::Error> {
        let counts = counts.map(|counts| counts.min(u32::from(self.most_counts)) as u16);
        let layout = self.layout;
        if layout.has_beginnings {
            let words = counts.map(|counts| [layout.word(0), layout.word(counts)]);
            self.write(words.as_flattened().as_flattened())?;
        } else {
            self.write(counts.map(|counts| layout.word(counts)).as_flattened())?;
        }
        self.sent = Some(counts);
        Ok(())
    }

    /// Sends the frame again that was last taken; does nothing if there is none.
    ///
    /// # Errors
    /// What the bus says.
    pub fn send_again(&mut self) -> Result<(), I::Error> {
        match self.sent {
            Some(counts) => self.send(&counts.map(u32::from)),
            None => Ok(()),
        }
    }

    /// Sends no pulses any more; most servos then let go of their joints, and the legs may fall.
    ///
    /// # Errors
    /// What the bus says.
    pub fn release(&mut self) -> Result<(), I::Error> {
        self.send(&[0; CHANNELS])
    }

    /// The last frame that the bus took, in counts.
    pub const fn sent(&self) -> Option<[u16; CHANNELS]> {
        self.sent
    }

    /// The bus.
    pub fn into_inner(self) -> I {
        self.bus
    }

    /// The register and all that follows, in one transaction: writes one after another are one write on the bus.
    fn write(&mut self, bytes: &[u8]) -> Result<(), I::Error> {
        let register = [self.layout.first_register];
        self.bus.transaction(self.address, &mut [Operation::Write(&register), Operation::Write(bytes)])
    }
}
