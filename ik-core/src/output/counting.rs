//! How an output counts, for what is worked out while compiling.

use super::{OutputError, Ratio};
use crate::servo::Pulse;

/// How an output counts: what a [`Channel`](crate::Channel) is made for. From [`Timer::counting`](crate::Timer::counting),
/// [`Expander::counting`](crate::Expander::counting), or [`Counting::of_duty`].
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Counting {
    pub(super) ratio: Ratio,
    pub(super) most_counts: u32,
}

/// Steps of a pulse in a microsecond.
const STEPS_PER_US: f64 = 65_536.0;

impl Counting {
    /// A PWM channel of which so much duty is the whole of a period: 2 µs to 1 s, at least 256 counts.
    ///
    /// # Errors
    /// If the period or the duty is not that.
    pub const fn of_duty(whole: u16, period_ns: u32) -> Result<Self, OutputError> {
        if whole < 256 || period_ns < 2_000 || period_ns > 1_000_000_000 {
            return Err(OutputError::Frame);
        }
        // A nanosecond is 8192/125 steps of a pulse.
        let ratio = Ratio::new(whole as u32 * 125, period_ns as u64 * 8192);
        Ok(Self { ratio, most_counts: whole as u32 })
    }

    /// Counts in a microsecond.
    pub const fn counts_per_us(&self) -> f64 {
        self.ratio.per_us()
    }

    /// The largest count within a frame.
    pub const fn most_counts(&self) -> u32 {
        self.most_counts
    }

    /// The count nearest to a pulse, halves upwards; held at the largest within a frame.
    #[inline]
    pub const fn counts(&self, pulse: Pulse) -> u32 {
        let counts = self.ratio.nearest(pulse);
        if counts > self.most_counts as u64 { self.most_counts } else { counts as u32 }
    }

    /// The pulse of so many counts, to the nearest 1/65536 µs; saturates.
    pub const fn pulse(&self, counts: u32) -> Pulse {
        self.ratio.pulse(counts)
    }

    /// The most whole counts that last no longer than a pulse.
    pub(crate) const fn whole_within(&self, pulse: Pulse) -> u32 {
        let counts = self.ratio.within(pulse.steps() as u64);
        // Fewer than 2^30 counts in a step would be needed to get here; it saturates all the same.
        if counts > u32::MAX as u64 { u32::MAX } else { counts as u32 }
    }

    /// [least, most] whole counts that lie within [shortest, longest] µs: neither is rounded outward. No count is below 1,
    /// for 0 counts are no pulse. `None` if there are none.
    pub(crate) const fn within(&self, [shortest_us, longest_us]: [f64; 2]) -> Option<[u32; 2]> {
        // Multiplied by a power of two, nothing is lost; a pulse has less than 2^31 steps.
        let (shortest, longest) = (shortest_us * STEPS_PER_US, (longest_us * STEPS_PER_US) as u64);
        let down = shortest as u64;
        let shortest = if (down as f64) < shortest { down + 1 } else { down };
        let least = self.ratio.covering(shortest);
        let most = self.ratio.within(longest);
        let least = if least < 1 { 1 } else { least };
        let most = if most > self.most_counts as u64 { self.most_counts as u64 } else { most };
        if least > most { None } else { Some([least as u32, most as u32]) }
    }

    /// The counts nearest to the ends of a stretch of pulses, in µs, held within [least, most].
    pub(crate) const fn nearest_between(
        &self,
        [shortest_us, longest_us]: [f64; 2],
        ends: [u32; 2],
    ) -> [u32; 2] {
        [self.nearest(shortest_us, ends), self.nearest(longest_us, ends)]
    }

    const fn nearest(&self, us: f64, [least, most]: [u32; 2]) -> u32 {
        let counts = (us * self.counts_per_us() + 0.5) as u64;
        if counts < least as u64 {
            least
        } else if counts > most as u64 {
            most
        } else {
            counts as u32
        }
    }
}
