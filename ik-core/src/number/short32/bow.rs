//! Functions by tables of parabolas about the middles of equal intervals, in eight bytes each.

use crate::const_math::nearest;

/// A function about the middle of an interval.
#[derive(Debug, Clone, Copy)]
pub(super) struct Bow {
    /// Its value there.
    value: u32,
    /// Its change over an interval, in units of 2^[`Bow::at`]'s parameter.
    slope: u16,
    /// What that changes by over an interval, and 32 times as much.
    bend: i16,
}

impl Bow {
    /// Nothing at all.
    pub(super) const FLAT: Self = Self { value: 0, slope: 0, bend: 0 };

    /// A function with this value and these derivatives per interval at the middle. The third is spread over the interval:
    /// r³ is nearest to 3/16·r on [−½, ½]. `late` is added to the place: what rounding takes from it on average.
    pub(super) const fn new(
        value: f64,
        [first, second, third]: [f64; 3],
        late: f64,
        slope_bits: u32,
    ) -> Self {
        let unit = (1u32 << slope_bits) as f64;
        let slope = nearest((first + third / 32.0) / unit);
        let bend = nearest(0.5 * second / unit * 32.0);
        assert!(slope >= 0 && slope < 1 << 16, "a slope fits 16 bits");
        assert!(bend >= -(1 << 15) && bend < 1 << 15, "a bend fits 16 bits, with its sign");
        Self { value: nearest(value + first * late) as u32, slope: slope as u16, bend: bend as i16 }
    }

    /// The function so many 2^-16 of an interval from the middle, −2^15 to 2^15.
    #[inline(always)]
    pub(super) fn at<const SLOPE_BITS: u32>(&self, within: i32) -> u32 {
        let bent = i32::from(self.bend).wrapping_mul(within) >> 21;
        let slope = i32::from(self.slope).wrapping_add(bent);
        self.value.wrapping_add((slope.wrapping_mul(within) >> (16 - SLOPE_BITS)) as u32)
    }
}
