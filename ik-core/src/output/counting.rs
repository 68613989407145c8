//! How an output counts, for what is worked out while compiling.

use super::Clock;

/// How an output counts: what a [`Channel`](crate::Channel) is made for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Counting {
    pub(super) clock: Clock,
    pub(super) most_counts: u32,
}

/// Steps of a pulse in a microsecond.
const STEPS_PER_US: f64 = 65_536.0;

impl Counting {
    /// Counts in a microsecond.
    pub const fn counts_per_us(&self) -> f64 {
        self.clock.hz as f64 / (self.clock.divider as f64 * 1e6)
    }

    /// The largest count within a frame.
    pub const fn most_counts(&self) -> u32 {
        self.most_counts
    }

    /// [least, most] whole counts that lie within [shortest, longest] µs, exactly: neither is rounded outward. No count
    /// is below 1, for 0 counts are no pulse. `None` if there are none.
    pub(crate) const fn within(&self, [shortest_us, longest_us]: [f64; 2]) -> Option<[u32; 2]> {
        let per_hertz = self.clock.steps_per_hertz().get();
        let hz = self.clock.hz as u64;
        // Multiplied by a power of two, nothing is lost; a pulse has less than 2^31 steps.
        let (shortest, longest) = (shortest_us * STEPS_PER_US, (longest_us * STEPS_PER_US) as u64);
        let down = shortest as u64;
        let shortest = if (down as f64) < shortest { down + 1 } else { down };
        let least = (shortest * hz).div_ceil(per_hertz);
        let most = longest * hz / per_hertz;
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
