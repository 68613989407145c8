//! What one servo may be sent: a range, and a slew from frame to frame.

use super::FrameError;
use crate::channel::Channel;
use crate::number::Number;
use crate::output::Counting;
use crate::servo::{LONGEST_PULSE_US, Pulse, Servo};

/// The range, the slew and the first pulse of a servo, in whole counts of an output, or in steps of a pulse (1/65536 µs).
///
/// ```
/// # #[cfg(feature = "fixed32")] {
/// use ik_core::frame::ServoBounds;
/// use ik_core::{Channel, Fixed32, Pulse, ServoSpec, Timer};
///
/// const TIMER: Timer = match Timer::finest(48_000_000, 16, 50.0) {
///     Ok(timer) => timer,
///     Err(error) => panic!("{}", error.message()),
/// };
/// const HIP: Channel<Fixed32> = match Channel::<Fixed32>::new(ServoSpec::COMMON, TIMER.counting()) {
///     Ok(channel) => channel,
///     Err(error) => panic!("{}", error.message()),
/// };
/// // It stands at 1200 us when the machine lies on its belly, and goes 83 us in a frame, no more.
/// const BOUNDS: ServoBounds =
///     match ServoBounds::on_channel(&HIP, TIMER.counting(), Pulse::from_us(1200.0), Pulse::from_us(83.0)) {
///         Ok(bounds) => bounds,
///         Err(error) => panic!("{}", error.message()),
///     };
/// // In ticks of 0.3125 us; 83 us are 265.6 of them.
/// assert_eq!((BOUNDS.range(), BOUNDS.start(), BOUNDS.slew()), ([3200, 6400], 3840, 265));
/// assert_eq!(BOUNDS.step(3840, 9999), 4105);
/// # }
/// ```
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct ServoBounds {
    /// 1 or more.
    least: u32,
    /// No less than `least`.
    most: u32,
    /// Within them.
    start: u32,
    /// 1 or more.
    slew: u32,
}

impl ServoBounds {
    /// Bounds in whole counts, or in steps of a pulse.
    ///
    /// # Errors
    /// If the range is not `[least, most]` from 1 up, `start` not within it, or the slew 0.
    pub const fn in_counts([least, most]: [u32; 2], start: u32, slew: u32) -> Result<Self, FrameError> {
        if least < 1 || least > most {
            Err(FrameError::Range)
        } else if start < least || start > most {
            Err(FrameError::Start)
        } else if slew < 1 {
            Err(FrameError::Slew)
        } else {
            Ok(Self { least, most, start, slew })
        }
    }

    /// Bounds in the counts of a channel: `counting` is what it was made for. The first pulse is rounded to the nearest
    /// count, the slew to the one below.
    ///
    /// # Errors
    /// If the first pulse lies outside the channel's range, or the slew is less than a count, or longer than any pulse (as
    /// infinity is). NaN is no pulse, and so an error for either.
    pub const fn on_channel<N: Number, const BENDS: usize>(
        channel: &Channel<N, BENDS>,
        counting: Counting,
        start: Pulse,
        slew: Pulse,
    ) -> Result<Self, FrameError> {
        if slew.steps() > LONGEST_STEPS {
            return Err(FrameError::Slew);
        }
        let [least, most] = channel.range();
        let start = inward(counting.counts(start), [least, most]);
        Self::in_counts([least, most], start, counting.whole_within(slew))
    }

    /// Bounds in the steps of a servo's pulse, for firmware that sends pulses in microseconds:
    /// [`Pulse::steps`] in, [`Pulse::from_steps`] out.
    ///
    /// # Errors
    /// If the first pulse lies outside the servo's range, or the slew is 0 or longer than any pulse; or if a pulse of 0 µs
    /// is all that the servo's range has.
    pub const fn on_servo<N: Number, const BENDS: usize>(
        servo: &Servo<N, BENDS>,
        start: Pulse,
        slew: Pulse,
    ) -> Result<Self, FrameError> {
        if slew.steps() > LONGEST_STEPS {
            return Err(FrameError::Slew);
        }
        let [shortest, longest] = servo.pulse_range();
        let least = if shortest.steps() < 1 { 1 } else { shortest.steps() };
        Self::in_counts([least, longest.steps()], start.steps(), slew.steps())
    }

    /// The least and the most that is ever sent.
    pub const fn range(&self) -> [u32; 2] {
        [self.least, self.most]
    }

    /// What is sent first, unless the state is started elsewhere.
    pub const fn start(&self) -> u32 {
        self.start
    }

    /// The most that a pulse changes from one frame to the next.
    pub const fn slew(&self) -> u32 {
        self.slew
    }

    /// Held within the range.
    #[inline(always)]
    pub const fn hold(&self, counts: u32) -> u32 {
        if counts < self.least {
            self.least
        } else if counts > self.most {
            self.most
        } else {
            counts
        }
    }

    /// One frame on the way: from what was sent last towards what is wanted, by no more than the slew, and within the range
    /// whatever both are.
    #[inline(always)]
    pub const fn step(&self, from: u32, wanted: u32) -> u32 {
        let (low, high) = (from.saturating_sub(self.slew), from.saturating_add(self.slew));
        let near = if wanted < low {
            low
        } else if wanted > high {
            high
        } else {
            wanted
        };
        // The range comes last, and so has the last word. From within it that makes no step longer.
        self.hold(near)
    }
}

/// The longest pulse of a servo, in steps.
const LONGEST_STEPS: u32 = (LONGEST_PULSE_US as u32) << 16;

/// A count that rounding alone put one beyond the range is the end of the range.
const fn inward(counts: u32, [least, most]: [u32; 2]) -> u32 {
    if counts.saturating_add(1) == least {
        least
    } else if most.saturating_add(1) == counts {
        most
    } else {
        counts
    }
}
