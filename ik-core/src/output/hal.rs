//! Sending pulses through embedded-hal 1.0: one servo on a PWM channel of the microcontroller, or a frame of servos on an
//! expander behind an I²C bus.
//!
//! Errors of the hardware are passed through as they are. What was last accepted is kept: [`PwmServo::sent`] and
//! [`ExpanderWriter::sent`] tell what the hardware still sends after an error, and sending it again is the way to go on.

mod expander_writer;
mod pwm_servo;

pub use expander_writer::{ExpanderWriter, Layout, WordOrder};
pub use pwm_servo::PwmServo;
