//! Functions by tables of second-order Taylor expansions about the middles of equal intervals, in eight bytes each.

use crate::const_math::{nearest, nearest_i32};

/// A function about the middle of an interval: value, slope and bend, the latter two in one word.
#[derive(Debug, Clone, Copy)]
pub(super) struct Expansion {
    value: i32,
    /// Upper 23 bits: the slope, change of the value over half an interval, never negative. Lower 9 bits, signed: the
    /// bend, change of the slope over half an interval, in units of 2^[`BEND_BITS`].
    slope_and_bend: u32,
}

/// Bits of the bend's word.
const BEND_WORD: u32 = 9;

impl Expansion {
    /// Of a function with the given value and derivatives per half interval at the middle. The third is spread over the
    /// interval: r³ is nearest to ¾·r on [−1, 1], and a quarter of it is left.
    pub(super) const fn new(value: f64, [first, second, third]: [f64; 3], bend_bits: u32) -> Self {
        let slope = first + 0.75 * third / 6.0;
        let slope = if slope > 0.0 { slope } else { 0.0 };
        let bend = nearest(0.5 * second / (1u32 << bend_bits) as f64);
        assert!(bend >= -256 && bend < 256, "a bend fits nine bits");
        assert!(slope < (1 << 23) as f64, "a slope fits 23 bits");
        let slope = nearest(slope) as u32;
        Self { value: nearest_i32(value), slope_and_bend: slope << BEND_WORD | (bend as u32 & 0x1FF) }
    }

    /// The function at `within` of 2^31 half intervals from the middle.
    #[inline(always)]
    pub(super) fn at<const BEND_BITS: u32>(&self, within: i32) -> i32 {
        let bend = (self.slope_and_bend << (32 - BEND_WORD)) as i32 >> (32 - BEND_WORD);
        let slope = (self.slope_and_bend >> BEND_WORD) as i32;
        let slope = slope + bend * (within >> (31 - BEND_BITS));
        self.value + (((i64::from(within) * i64::from(slope)) >> 32) as i32) * 2
    }
}
