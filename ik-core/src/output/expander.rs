//! A PWM expander: many channels of few counts a frame, behind a serial bus.

use super::{Clock, Counting, Output, OutputError};
use crate::const_math::nearest;
use crate::servo::Pulse;

/// A PWM expander: an oscillator, an integer prescaler, and 2^bits counts in a frame.
///
/// ```
/// use ik_core::output::Output;
/// use ik_core::{Expander, Pulse};
///
/// // 12 bits at 25 MHz: 50 Hz is really 50.03 Hz, and a count 4.88 us.
/// const EXPANDER: Expander = match Expander::nearest(25_000_000, 12, 50.0) {
///     Ok(expander) => expander,
///     Err(error) => panic!("{}", error.message()),
/// };
/// assert_eq!(EXPANDER.divider(), 122);
/// assert!((1e6 / EXPANDER.frame_us() - 50.0288).abs() < 1e-4);
/// assert_eq!(EXPANDER.count_us(), 4.88);
/// assert_eq!(EXPANDER.counts(Pulse::from_us(1500.0)), 307);
/// ```
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Expander {
    clock: Clock,
    resolution_bits: u8,
}

impl Expander {
    /// An expander with a given divider (the factor by which the prescaler divides; its register often holds
    /// one less).
    ///
    /// # Errors
    /// Says what the hardware cannot do.
    pub const fn new(oscillator_hz: u32, divider: u32, resolution_bits: u8) -> Result<Self, OutputError> {
        if resolution_bits < 8 || resolution_bits > 16 {
            return Err(OutputError::Bits);
        }
        match Clock::new(oscillator_hz, divider) {
            Ok(clock) => Ok(Self { clock, resolution_bits }),
            Err(error) => Err(error),
        }
    }

    /// The expander whose frame rate comes nearest to the one wanted.
    ///
    /// # Errors
    /// Says what the hardware cannot do.
    pub const fn nearest(
        oscillator_hz: u32,
        resolution_bits: u8,
        frame_hz: f64,
    ) -> Result<Self, OutputError> {
        if resolution_bits < 8 || resolution_bits > 16 {
            return Err(OutputError::Bits);
        }
        let counts = (1u32 << resolution_bits) as f64;
        let divider = nearest(oscillator_hz as f64 / (counts * frame_hz));
        if divider < 1 || divider > 65_536 {
            return Err(OutputError::Frame);
        }
        Self::new(oscillator_hz, divider as u32, resolution_bits)
    }

    /// The factor by which the prescaler divides.
    pub const fn divider(&self) -> u32 {
        self.clock.divider
    }

    /// How it counts.
    pub const fn counting(&self) -> Counting {
        Counting { ratio: self.clock.ratio(), most_counts: self.frame_counts() - 1 }
    }

    /// Counts in a frame.
    pub const fn frame_counts(&self) -> u32 {
        1 << self.resolution_bits
    }
}

impl Output for Expander {
    #[inline]
    fn counts(&self, pulse: Pulse) -> u32 {
        self.counting().counts(pulse)
    }

    fn pulse(&self, counts: u32) -> Pulse {
        self.counting().pulse(counts)
    }

    fn most_counts(&self) -> u32 {
        self.frame_counts() - 1
    }

    fn count_us(&self) -> f64 {
        self.clock.count_us()
    }

    fn frame_us(&self) -> f64 {
        self.clock.count_us() * f64::from(self.frame_counts())
    }
}
