//! 2·arctan of a ratio, by a table of second-order Taylor expansions about the middles of 128 intervals.
//!
//! The remainder is below max|f‴|/6·(1/256)³ = 4e-8 rad for f = 2·arctan; the table is made while compiling.

use crate::const_math::{arc_tangent, nearest_i32, power_of_two};

/// Intervals of [0, 1].
const INTERVALS: usize = 128;
/// Fraction bits of the ratio.
const RATIO_BITS: u32 = 31;
/// The ratio's bits below the interval's number.
const WITHIN_BITS: u32 = RATIO_BITS - 7;

/// f, f′ and f″/2 at the middle of an interval; all in 2^-32 turn.
#[derive(Clone, Copy)]
struct Expansion {
    value: i32,
    slope: i32,
    bend: i32,
}

/// One more than there are intervals, for the ratio 1 itself.
static EXPANSIONS: [Expansion; INTERVALS + 1] = expansions();

const fn expansions() -> [Expansion; INTERVALS + 1] {
    let turn = power_of_two(32) / core::f64::consts::TAU;
    let mut table = [Expansion { value: 0, slope: 0, bend: 0 }; INTERVALS + 1];
    let mut i = 0;
    while i < table.len() {
        let t = (i as f64 + 0.5) / INTERVALS as f64;
        let slope = 2.0 / (1.0 + t * t);
        table[i] = Expansion {
            value: nearest_i32(2.0 * arc_tangent(t) * turn),
            slope: nearest_i32(slope * turn),
            bend: nearest_i32(-0.5 * slope * slope * t * turn),
        };
        i += 1;
    }
    table
}

/// 2·arctan(rise / run) in 2^-32 turn, for rise ≤ run (a larger one counts as equal); 0 if run is 0.
///
/// Within 5e-8 rad: exhaustively at the ends and middles of the intervals, densely between.
#[inline(always)]
pub(super) fn double_angle(rise: u64, run: u64) -> u32 {
    // Thirty-two significant bits of the run are enough; shifting both keeps the ratio.
    let shift = run.leading_zeros();
    if shift == 64 {
        return 0;
    }
    let run = (run << shift) >> 32;
    let rise = ((rise << shift) >> 32).min(run);
    let ratio = ((rise << RATIO_BITS).checked_div(run)).unwrap_or(0) as u32;
    let Some(near) = EXPANSIONS.get((ratio >> WITHIN_BITS) as usize) else {
        return 0;
    };
    let middle = 1i64 << (WITHIN_BITS - 1);
    let within = i64::from(ratio & ((1 << WITHIN_BITS) - 1)) - middle;
    let slope = i64::from(near.slope) + ((within * i64::from(near.bend)) >> RATIO_BITS);
    // Near 0 the expansion's rounding may dip below it.
    (i64::from(near.value) + ((within * slope) >> RATIO_BITS)).max(0) as u32
}

#[cfg(test)]
mod tests {
    use super::*;

    fn error(rise: u64, run: u64) -> f64 {
        let got = f64::from(double_angle(rise, run)) / 4_294_967_296.0 * core::f64::consts::TAU;
        got - 2.0 * (rise as f64 / run as f64).atan()
    }

    #[test]
    fn double_angle_keeps_its_bound() {
        let mut worst = 0.0f64;
        let run = (1u64 << 60) + 12_345;
        for i in 0..=4_000_000u64 {
            worst = worst.max(error(run / 4_000_000 * i, run).abs());
        }
        for i in 0..INTERVALS as u64 {
            for step in [0, 1, 2, (1 << 23) - 1, 1 << 23, (1 << 24) - 2, (1 << 24) - 1] {
                worst = worst.max(error((i << 24) + step, 1 << 31).abs());
            }
        }
        // The bound that the docs state, with less than twice the slack.
        assert!(worst < 5e-8 && worst > 2.5e-8, "{worst:e}");
    }

    #[test]
    fn double_angle_answers_at_the_edges() {
        assert_eq!(double_angle(0, 0), 0);
        assert_eq!(double_angle(u64::MAX, 1), double_angle(1, 1));
        assert!(error(1, 1).abs() < 5e-8);
        assert!(error(u64::MAX, u64::MAX).abs() < 5e-8);
        assert!(double_angle(0, 1) < 40, "{}", double_angle(0, 1));
    }
}
