//! The root of 64 bits: a start from a table, Heron's step, and the remainder divided out.

use crate::const_math::{nearest, square_root};
use core::num::{NonZeroU16, NonZeroU32};

/// Roots of the middles of 128 intervals of [0, 2^30); the first quarter is never looked at.
static STARTS: [NonZeroU16; 128] = starts();

const fn starts() -> [NonZeroU16; 128] {
    let mut table = [NonZeroU16::MAX; 128];
    let mut i = 32;
    while i < table.len() {
        let middle = (i as f64 + 0.5) * (1 << 23) as f64;
        table[i] = match NonZeroU16::new(nearest(square_root(middle)) as u16) {
            Some(start) => start,
            None => NonZeroU16::MAX,
        };
        i += 1;
    }
    table
}

/// √value for value < 2^62, within 2 of it or within 6e-9 of it in proportion, whichever is more.
#[inline(always)]
pub(super) fn root(value: u64) -> u32 {
    let upper = (value >> 32) as u32;
    if upper == 0 { small(value as u32) } else { root_of_words(value, upper) }
}

/// For an upper word that is not 0.
#[inline(always)]
fn root_of_words(value: u64, upper: u32) -> u32 {
    // The upper half in [2^28, 2^30); an even shift leaves a shift of half as much in the root.
    let even = (upper << 2).leading_zeros() & 30;
    let top = ((value << even) >> 32) as u32;
    let start = NonZeroU32::from(STARTS[(top >> 23) as usize & 127]);
    // Fifteen bits of the root; odd, so that it is no zero to divide by.
    let coarse = NonZeroU32::MIN | ((start.get() + top / start) >> 1);
    // top = coarse² + rest with |rest| < 4·coarse: shifted up, so that the quotient is none below zero.
    let square = coarse.get().wrapping_mul(coarse.get());
    let rest = top.wrapping_sub(square).wrapping_add(4 * coarse.get());
    let fine = ((rest << 13) / coarse) << 2;
    ((coarse.get() << 16) + fine - (4 << 15)) >> (even / 2)
}

/// The root of what has no upper half: rare, and a length of a hair.
#[cold]
#[inline(never)]
fn small(value: u32) -> u32 {
    if value < 4 {
        return u32::from(value > 0);
    }
    let wide = u64::from(value) << 30;
    root_of_words(wide, (wide >> 32) as u32) >> 15
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn root_keeps_its_bound() {
        let mut worst = 0.0f64;
        let mut look = |value: u64| {
            let (got, want) = (f64::from(root(value)), (value as f64).sqrt());
            let error = (got - want).abs();
            if error > 2.0 {
                worst = worst.max(error / want);
            }
        };
        for exponent in 0..61 {
            for i in 0..40_000u64 {
                look((1u64 << exponent) + ((1u64 << exponent) / 40_000) * i + i);
            }
        }
        for edge in (0..64).map(|bits| 1u64 << bits) {
            for near in 0..200 {
                look(edge.saturating_sub(near).min((1 << 62) - 1));
                look((edge + near).min((1 << 62) - 1));
            }
        }
        assert!(worst < 6e-9 && worst > 3e-9, "{worst:e}");
    }
}
