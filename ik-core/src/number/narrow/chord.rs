//! A straight piece of a function in one 32-bit word: its value and its slope.

use crate::const_math::nearest;

/// A chord: the upper 16 bits of the word are those of its value at the start of an interval, the lower 16 bits its
/// slope. The slope's bits are part of the value's word too, and the value is rounded so that they do no harm; so one
/// load, one mask, one multiplication and one addition evaluate it.
#[derive(Debug, Clone, Copy)]
pub(in crate::number) struct Chord(u32);

impl Chord {
    /// Nothing at all.
    pub(in crate::number) const FLAT: Self = Self(0);

    /// The chord through the function's values at the start, the middle and the end of an interval of
    /// 2^`fraction_bits` steps, shifted by half of its greatest distance from the function, so that the error is the
    /// same at the middle as at the ends (chord-balanced linear interpolation).
    #[cfg(feature = "fixed16")]
    pub(in crate::number) const fn through(start: f64, middle: f64, end: f64, fraction_bits: u32) -> Self {
        let balance = (middle - (start + end) / 2.0) / 2.0;
        let slope = clamped(nearest((end - start) / (1u64 << fraction_bits) as f64));
        let head = clamped(nearest((start + balance - slope as f64) / 65_536.0));
        Self((head << 16) | slope)
    }

    /// The slope, per step.
    #[inline(always)]
    pub(in crate::number) const fn slope(self) -> u32 {
        self.0 & 0xFFFF
    }

    /// The value so many steps after the start of the interval.
    #[cfg(feature = "fixed16")]
    #[inline(always)]
    pub(in crate::number) const fn after(self, steps: u32) -> u32 {
        self.0.wrapping_add(self.slope().wrapping_mul(steps))
    }

    /// The value of a falling chord, whose slope is stored without its sign.
    #[inline(always)]
    pub(in crate::number) const fn falling_after(self, steps: u32) -> u32 {
        self.0.wrapping_sub(self.slope().wrapping_mul(steps))
    }

    /// Like [`through`](Chord::through), for a falling function.
    pub(in crate::number) const fn falling_through(
        start: f64,
        middle: f64,
        end: f64,
        fraction_bits: u32,
    ) -> Self {
        let balance = (middle - (start + end) / 2.0) / 2.0;
        let slope = clamped(nearest((start - end) / (1u64 << fraction_bits) as f64));
        let head = clamped(nearest((start + balance - slope as f64) / 65_536.0));
        Self((head << 16) | slope)
    }
}

/// The nearest value that 16 bits hold.
const fn clamped(value: i64) -> u32 {
    if value < 0 {
        0
    } else if value > 0xFFFF {
        0xFFFF
    } else {
        value as u32
    }
}
