//! A timer whose compare registers end the pulses.

use super::{Clock, Counting, Output, OutputError};
use crate::const_math::nearest;
use crate::servo::Pulse;

/// A timer: a clock, a prescaler, and the number of ticks in a frame.
///
/// ```
/// use ik_core::output::Output;
/// use ik_core::{Pulse, Timer};
///
/// // 16 bits at 48 MHz for frames of 20 ms: dividing by 15 is the finest that fits.
/// const TIMER: Timer = match Timer::finest(48_000_000, 16, 50.0) {
///     Ok(timer) => timer,
///     Err(error) => panic!("{}", error.message()),
/// };
/// assert_eq!((TIMER.divider(), TIMER.frame_ticks()), (15, 64_000));
/// assert_eq!(TIMER.count_us(), 0.3125);
/// assert_eq!(TIMER.counts(Pulse::from_us(1500.0)), 4800);
/// ```
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Timer {
    clock: Clock,
    frame_ticks: u32,
    most_ticks: u32,
}

impl Timer {
    /// A timer with a given divider (the factor by which the prescaler divides, not the register's value).
    ///
    /// # Errors
    /// Says what the hardware cannot do.
    pub const fn new(
        clock_hz: u32,
        divider: u32,
        counter_bits: u8,
        frame_hz: f64,
    ) -> Result<Self, OutputError> {
        if counter_bits < 8 || counter_bits > 32 {
            return Err(OutputError::Bits);
        }
        let clock = match Clock::new(clock_hz, divider) {
            Ok(clock) => clock,
            Err(error) => return Err(error),
        };
        let ticks = nearest(clock_hz as f64 / (divider as f64 * frame_hz));
        // A frame of 2^bits ticks counts from 0 to 2^bits − 1. NaN rounds to 0.
        if ticks < 256 || ticks > (1 << counter_bits) || ticks > u32::MAX as i64 {
            return Err(OutputError::Frame);
        }
        // A frame of all of the counter's ticks is one more than a compare register holds.
        let top = ((1u64 << counter_bits) - 1) as u32;
        let frame_ticks = ticks as u32;
        let most_ticks = if frame_ticks < top { frame_ticks } else { top };
        Ok(Self { clock, frame_ticks, most_ticks })
    }

    /// The timer with the least divider, and so the finest tick, whose counter holds a frame.
    ///
    /// # Errors
    /// Says what the hardware cannot do.
    pub const fn finest(clock_hz: u32, counter_bits: u8, frame_hz: f64) -> Result<Self, OutputError> {
        let mut divider = 1;
        loop {
            match Self::new(clock_hz, divider, counter_bits, frame_hz) {
                Err(OutputError::Frame) if divider < 65_536 => divider += 1,
                other => return other,
            }
        }
    }

    /// The finest timer whose prescaler takes only certain dividers, such as powers of two. They may come in any order.
    ///
    /// ```
    /// use ik_core::Timer;
    /// use ik_core::output::Output;
    ///
    /// // 16 bits at 16 MHz: of 1, 8, 64, 256 and 1024, dividing by 8 is the finest that holds 20 ms; a tick is 0.5 us.
    /// let timer = Timer::finest_of(&[1, 8, 64, 256, 1024], 16_000_000, 16, 50.0).map_err(|error| error.message())?;
    /// assert_eq!((timer.divider(), timer.frame_ticks(), timer.count_us()), (8, 40_000, 0.5));
    /// # Ok::<(), &'static str>(())
    /// ```
    ///
    /// # Errors
    /// Says what the hardware cannot do; [`OutputError::Frame`] if none of the dividers suits.
    pub const fn finest_of(
        dividers: &[u32],
        clock_hz: u32,
        counter_bits: u8,
        frame_hz: f64,
    ) -> Result<Self, OutputError> {
        let mut found = Err(OutputError::Frame);
        let mut finest = u32::MAX;
        let mut number = 0;
        while number < dividers.len() {
            let divider = dividers[number];
            match Self::new(clock_hz, divider, counter_bits, frame_hz) {
                Ok(timer) if divider < finest => {
                    found = Ok(timer);
                    finest = divider;
                }
                Ok(_) | Err(OutputError::Frame) => {}
                Err(error) => return Err(error),
            }
            number += 1;
        }
        found
    }

    /// The factor by which the prescaler divides.
    pub const fn divider(&self) -> u32 {
        self.clock.divider
    }

    /// How it counts.
    pub const fn counting(&self) -> Counting {
        Counting { ratio: self.clock.ratio(), most_counts: self.most_ticks }
    }

    /// Ticks in a frame.
    pub const fn frame_ticks(&self) -> u32 {
        self.frame_ticks
    }
}

impl Output for Timer {
    #[inline]
    fn counts(&self, pulse: Pulse) -> u32 {
        self.counting().counts(pulse)
    }

    fn pulse(&self, counts: u32) -> Pulse {
        self.counting().pulse(counts)
    }

    fn most_counts(&self) -> u32 {
        self.most_ticks
    }

    fn count_us(&self) -> f64 {
        self.clock.count_us()
    }

    fn frame_us(&self) -> f64 {
        self.clock.count_us() * f64::from(self.frame_ticks)
    }
}
