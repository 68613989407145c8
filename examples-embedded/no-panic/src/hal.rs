//! Every function of the feature `hal`, over a bus and a channel that may fail or not.

use embedded_hal::i2c::{self, I2c, NoAcknowledgeSource, Operation};
use embedded_hal::pwm::{self, SetDutyCycle};
use ik_core::output::hal::{ExpanderWriter, Layout, PwmServo, WordOrder};
use ik_core::{Expander, Pulse};

use crate::opaque::{number, truth, use_up, word};

struct Bus;

impl i2c::ErrorType for Bus {
    type Error = i2c::ErrorKind;
}

impl I2c for Bus {
    fn transaction(&mut self, address: u8, operations: &mut [Operation<'_>]) -> Result<(), i2c::ErrorKind> {
        use_up((address, operations));
        if truth() { Ok(()) } else { Err(i2c::ErrorKind::NoAcknowledge(NoAcknowledgeSource::Unknown)) }
    }
}

struct Pwm;

impl pwm::ErrorType for Pwm {
    type Error = pwm::ErrorKind;
}

impl SetDutyCycle for Pwm {
    fn max_duty_cycle(&self) -> u16 {
        word() as u16
    }

    fn set_duty_cycle(&mut self, duty: u16) -> Result<(), pwm::ErrorKind> {
        use_up(duty);
        if truth() { Ok(()) } else { Err(pwm::ErrorKind::Other) }
    }
}

/// Every function.
pub fn all() {
    if let Ok(expander) = Expander::nearest(word(), word() as u8, number()) {
        expanders::<3>(expander);
        expanders::<18>(expander);
    }
    match PwmServo::new(Pwm, word()) {
        Ok(mut servo) => {
            use_up(servo.counting());
            use_up((servo.send(Pulse::from_steps(word())).is_ok(), servo.send_counts(word()).is_ok()));
            use_up((servo.release().is_ok(), servo.sent()));
            use_up(servo.into_inner());
        }
        Err(error) => use_up(error.message()),
    }
}

fn expanders<const CHANNELS: usize>(expander: Expander) {
    let order = if truth() { WordOrder::LowFirst } else { WordOrder::HighFirst };
    let layout = Layout { first_register: word() as u8, order, has_beginnings: truth() };
    match ExpanderWriter::<_, CHANNELS>::new(Bus, word() as u8, layout, expander) {
        Ok(mut writer) => {
            use_up(writer.send(&core::array::from_fn(|_| word())).is_ok());
            use_up((writer.send_again().is_ok(), writer.release().is_ok(), writer.sent()));
            use_up(writer.into_inner());
        }
        Err(error) => use_up(error.message()),
    }
}
