//! Outputs: a pulse as ticks of a timer or counts of a PWM expander, and the pulse that really comes of them.
//!
//! Prescalers divide by whole numbers, so the true period of a tick is rarely the nominal one; everything here
//! works with the true one. Rounding is to the nearest tick, exactly: the quotient is formed in 64-bit integers.
//!
#![doc = include_str!("../docs/wiring-an-output.md")]

mod counting;
mod expander;
#[cfg(feature = "hal")]
pub mod hal;
mod ratio;
mod timer;

pub use counting::Counting;
pub use expander::Expander;
pub use timer::Timer;

use crate::servo::Pulse;
use core::fmt;
use ratio::Ratio;

/// What turns pulses into whole counts of a clock.
pub trait Output {
    /// The count nearest to a pulse, halves upwards; held at what the output can count to within a frame.
    fn counts(&self, pulse: Pulse) -> u32;
    /// The pulse of so many counts, to the nearest 1/65536 µs; saturates.
    fn pulse(&self, counts: u32) -> Pulse;
    /// The largest count within a frame.
    fn most_counts(&self) -> u32;
    /// One count, µs.
    fn count_us(&self) -> f64;
    /// The true length of a frame, µs.
    fn frame_us(&self) -> f64;
}

/// Why an output cannot be.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
#[non_exhaustive]
pub enum OutputError {
    /// The clock must run at 1 kHz to 1 GHz.
    Clock,
    /// A prescaler divides by 1 to 65 536.
    Divider,
    /// A counter has 8 to 32 bits, an expander a resolution of 8 to 16.
    Bits,
    /// A frame must last at least 256 counts, and no longer than the counter and its prescaler allow.
    Frame,
    /// The registers of an expander's channels must lie within 256.
    Registers,
}

impl OutputError {
    /// What is wrong, and what would be right.
    pub const fn message(&self) -> &'static str {
        match self {
            Self::Clock => "the clock must run at 1 kHz to 1 GHz",
            Self::Divider => "a prescaler must divide by 1 to 65536",
            Self::Bits => "a counter must have 8 to 32 bits, an expander a resolution of 8 to 16",
            Self::Frame => {
                "a frame must last at least 256 counts and no longer than counter and prescaler allow"
            }
            Self::Registers => "the registers of an expander's channels must lie within 256",
        }
    }
}

impl fmt::Display for OutputError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.message())
    }
}

impl core::error::Error for OutputError {}

/// A divided clock.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
struct Clock {
    hz: u32,
    divider: u32,
}

/// Steps of a pulse in a second.
const PULSE_STEPS_PER_S: u64 = 65_536 * 1_000_000;

impl Clock {
    const fn new(hz: u32, divider: u32) -> Result<Self, OutputError> {
        if hz < 1_000 || hz > 1_000_000_000 {
            Err(OutputError::Clock)
        } else if divider < 1 || divider > 65_536 {
            Err(OutputError::Divider)
        } else {
            Ok(Self { hz, divider })
        }
    }

    const fn ratio(&self) -> Ratio {
        // The divider is not 0, nor is this more than 2^36·2^16.
        Ratio::new(self.hz, PULSE_STEPS_PER_S * self.divider as u64)
    }

    const fn count_us(&self) -> f64 {
        self.divider as f64 * 1e6 / self.hz as f64
    }
}
