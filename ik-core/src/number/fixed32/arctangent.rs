//! 2·arctan of a ratio, by expansions about the middles of 128 intervals.

use super::expansion::Expansion;
use crate::const_math::{arc_tangent, power_of_two};
use core::num::NonZeroU32;

/// Intervals of [0, 1].
const INTERVALS: usize = 128;
/// Fraction bits of the ratio.
const RATIO_BITS: u32 = 24;
/// The ratio's bits below the interval's number.
const WITHIN_BITS: u32 = RATIO_BITS - INTERVALS.ilog2();
/// See [`Expansion`].
const BEND_BITS: u32 = 6;
/// Added to the first value, 2^-32 turn: more than rounding takes away, so that none is negative.
const LIFT: f64 = 12.0;

static EXPANSIONS: [Expansion; INTERVALS] = expansions();

const fn expansions() -> [Expansion; INTERVALS] {
    let turn = power_of_two(32) / core::f64::consts::TAU;
    let half = 0.5 / INTERVALS as f64;
    let mut table = [Expansion::new(0.0, [0.0; 3], BEND_BITS); INTERVALS];
    let mut i = 0;
    while i < table.len() {
        let t = (2 * i + 1) as f64 * half;
        let slope = 2.0 / (1.0 + t * t);
        let second = -slope * slope * t;
        let third = slope * slope * slope * (1.5 * t * t - 0.5);
        let value = 2.0 * arc_tangent(t) * turn;
        table[i] = Expansion::new(
            if i == 0 { value + LIFT } else { value },
            [slope * half * turn, second * half * half * turn, third * half * half * half * turn],
            BEND_BITS,
        );
        i += 1;
    }
    table
}

/// 2·arctan(rise / run) in 2^-32 turn, for run < 2^31 and rise no more than a hair above it; a
/// run of 0 with a rise of 0 gives 0.
///
/// Within 3e-7 rad if run is 2^25 or more, and else by what the last bits of rise and run are worth.
#[inline(always)]
pub(super) fn double_angle(rise: u32, run: u32) -> i32 {
    // The run in [2^30, 2^31); shifting both keeps the ratio.
    let shift = ((run << 1) | 1).leading_zeros();
    let (rise, run) = (rise << shift, run << shift);
    // Twelve bits of the ratio, then twelve more of the remainder; a divisor rounded upwards leaves none below zero.
    let divisor = NonZeroU32::MIN.saturating_add(run >> 12);
    let upper = rise / divisor;
    let rest = (rise << 12).wrapping_sub(upper.wrapping_mul(run));
    let ratio = (upper << 12).wrapping_add(rest / divisor);
    if ratio >= 1 << RATIO_BITS {
        // Ratio 1 itself, and what rounding puts above.
        return 1 << 30;
    }
    let near = &EXPANSIONS[(ratio >> WITHIN_BITS) as usize];
    // From the middle of the interval: its upper bit flipped is the sign.
    let within = (ratio << (32 - WITHIN_BITS)) ^ (1 << 31);
    near.at::<BEND_BITS>(within as i32)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn error(rise: u32, run: u32) -> f64 {
        let got = f64::from(double_angle(rise, run)) / 4_294_967_296.0 * core::f64::consts::TAU;
        got - 2.0 * (f64::from(rise) / f64::from(run)).atan()
    }

    #[test]
    fn double_angle_keeps_its_bound() {
        let mut worst = 0.0f64;
        for run in [(1 << 25) + 1, (1 << 28) + 12_345, (1u32 << 29) - 1, (1 << 30) - 1] {
            for i in 0..=4_000_000u32 {
                worst = worst.max(error((u64::from(run) * u64::from(i) / 4_000_000) as u32, run).abs());
            }
        }
        assert!(worst < 3e-7 && worst > 1.5e-7, "{worst:e}");
    }

    #[test]
    fn double_angle_is_never_negative() {
        let least = (0..1u32 << WITHIN_BITS).map(|rise| double_angle(rise << 6, 1 << 30)).min();
        assert!(least.is_some_and(|least| (0..40).contains(&least)), "{least:?}");
    }

    #[test]
    fn double_angle_answers_at_the_edges() {
        for run in [0, 1, 1 << 28, (1 << 31) - 1] {
            assert!((0..60).contains(&double_angle(0, run)), "{}", double_angle(0, run));
        }
        assert!(error((1 << 31) - 1, (1 << 31) - 1).abs() < 3e-7);
        assert_eq!(double_angle((1 << 30) + 9, 1 << 30), 1 << 30);
        assert!(double_angle(1 << 29, 1 << 29).abs_diff(1 << 30) < 100);
    }
}
