//! A 12-bit PWM expander behind an I2C bus, through embedded-hal's traits: any HAL's bus takes it.

use embedded_hal::i2c::I2c;

/// The most channels that one expander has here.
pub const CHANNELS: u8 = 18;

/// An expander at an address.
pub struct Expander<B> {
    bus: B,
    address: u8,
}

/// Where a channel's counts are kept. It is made up, as the emulator has no expander: take yours from its data sheet.
const FIRST_REGISTER: u8 = 0x10;
const REGISTERS_OF_A_CHANNEL: u8 = 2;

impl<B: I2c> Expander<B> {
    /// At an address.
    pub fn new(bus: B, address: u8) -> Self {
        Self { bus, address }
    }

    /// Writes the counts of three channels that lie side by side, in one transfer, so that a leg's servos change in one
    /// frame.
    ///
    /// # Errors
    /// The bus's.
    pub fn write(&mut self, first_channel: u8, counts: [u32; 3]) -> Result<(), B::Error> {
        let mut bytes = [0; 7];
        bytes[0] = FIRST_REGISTER + REGISTERS_OF_A_CHANNEL * first_channel.min(CHANNELS - 3);
        for (counts, pair) in counts.into_iter().zip(bytes[1..].chunks_exact_mut(2)) {
            // 12 bits: a channel's counts never leave its range.
            pair.copy_from_slice(&(counts as u16).to_le_bytes());
        }
        self.bus.write(self.address, &bytes)
    }
}
