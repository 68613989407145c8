//! Counts against steps of a pulse, as a ratio of whole numbers: nothing is rounded before the end.

use crate::servo::Pulse;
use core::num::NonZeroU64;

/// So many counts in so many steps of 1/65536 µs.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub(super) struct Ratio {
    /// Below 2^30.
    counts: u32,
    /// Below 2^62.
    steps: NonZeroU64,
}

impl Ratio {
    /// `counts` below 2^30 in `steps`, from 1 to 2^62.
    pub(super) const fn new(counts: u32, steps: u64) -> Self {
        match NonZeroU64::new(steps) {
            Some(steps) => Self { counts, steps },
            None => Self { counts, steps: NonZeroU64::MIN },
        }
    }

    /// Counts in a microsecond.
    pub(super) const fn per_us(&self) -> f64 {
        self.counts as f64 * 65_536.0 / self.steps.get() as f64
    }

    /// The counts nearest to a pulse, halves upwards.
    #[inline]
    pub(super) const fn nearest(&self, pulse: Pulse) -> u64 {
        (pulse.steps() as u64 * self.counts as u64 + self.steps.get() / 2) / self.steps.get()
    }

    /// The most counts that last no longer than so many steps, of which there are fewer than 2^32.
    pub(super) const fn within(&self, steps: u64) -> u64 {
        steps * self.counts as u64 / self.steps.get()
    }

    /// The least counts that last no shorter.
    pub(super) const fn covering(&self, steps: u64) -> u64 {
        (steps * self.counts as u64).div_ceil(self.steps.get())
    }

    /// The pulse of so many counts, to the nearest step; saturates.
    pub(super) const fn pulse(&self, counts: u32) -> Pulse {
        // Counts beyond the longest pulse would overflow; they saturate.
        if counts as u64 > self.within(u32::MAX as u64) + 1 {
            return Pulse::from_steps(u32::MAX);
        }
        // At most 2^32 times the counts and a count's steps: below 2^63.
        let scaled = counts as u64 * self.steps.get() + self.counts as u64 / 2;
        match scaled.checked_div(self.counts as u64) {
            Some(steps) if steps <= u32::MAX as u64 => Pulse::from_steps(steps as u32),
            _ => Pulse::from_steps(u32::MAX),
        }
    }
}
