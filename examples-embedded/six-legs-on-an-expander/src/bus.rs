//! A bus that logs what is written to it, for the emulated chip has no expander. On a board: your HAL's I2C.

use core::convert::Infallible;

use embedded_hal::i2c::{ErrorType, I2c, Operation, SevenBitAddress};

/// The bus.
pub struct LoggedBus;

impl ErrorType for LoggedBus {
    type Error = Infallible;
}

impl I2c<SevenBitAddress> for LoggedBus {
    fn transaction(&mut self, address: u8, operations: &mut [Operation<'_>]) -> Result<(), Infallible> {
        for operation in operations {
            match operation {
                Operation::Write(bytes) => defmt::println!("to {=u8:#04x}: {=[u8]:02x}", address, *bytes),
                Operation::Read(bytes) => bytes.fill(0),
            }
        }
        Ok(())
    }
}
