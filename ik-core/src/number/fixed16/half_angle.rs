//! 2·arctan of a ratio: reciprocal of the run by 64 chords, arctangent by 64 chords.

use super::super::narrow::chord::Chord;
use super::super::narrow::normal;
use crate::const_math::{arc_tangent, power_of_two};

/// Intervals of both tables.
const INTERVALS: usize = 64;
/// The run's bits below the interval's number.
const RUN_BITS: u32 = 25;
/// The ratio's.
const RATIO_BITS: u32 = 26;
const FRACTION_BITS: u32 = 11;
/// The largest error, radians; half of a step of the result makes 4.8e-5 of it.
#[cfg(test)]
const ANGLE_BOUND: f64 = 1.4e-4;
/// The ratio is taken this much too small, so that rounding never brings it to 1; its table knows.
const MODESTY: f64 = 1.0 - 1.0 / 1024.0;
/// What cutting an interval into 2^[`FRACTION_BITS`] steps takes on average, as a fraction of the interval.
const CUT_FROM_STEPS: f64 = 0.5 / (1 << FRACTION_BITS) as f64;
/// What cutting off the reciprocal's lower half takes from the ratio on average, as a fraction of it.
const CUT_FROM_RECIPROCAL: f64 = 0.5 * 65_536.0 / 3_000_000_000.0;
/// What cutting off the rise's lower 15 bits takes from it on average.
const CUT_FROM_RISE: f64 = 0.5 * 32_768.0 / 3_000_000_000.0;

/// ½/d for d from ½ to 1.
static RECIPROCALS: [Chord; INTERVALS] = reciprocals();
/// 2·arctan, in 2^-33 turn, and half of what is shifted out.
static ARCS: [Chord; INTERVALS] = arcs();

const fn reciprocals() -> [Chord; INTERVALS] {
    let mut table = [Chord::FLAT; INTERVALS];
    let one = power_of_two(32) * MODESTY;
    let mut i = 0;
    while i < INTERVALS {
        let at = (INTERVALS + i) as f64 + CUT_FROM_STEPS;
        let unit = one * INTERVALS as f64;
        table[i] = Chord::falling_through(unit / at, unit / (at + 0.5), unit / (at + 1.0), FRACTION_BITS);
        i += 1;
    }
    table
}

const fn arcs() -> [Chord; INTERVALS] {
    let mut table = [Chord::FLAT; INTERVALS];
    let unit = power_of_two(33) / core::f64::consts::PI;
    let half = power_of_two(16);
    let mut i = 0;
    while i < INTERVALS {
        let step = 1.0 / (INTERVALS as f64 * MODESTY * (1.0 - CUT_FROM_RECIPROCAL));
        // The first interval begins at 0 itself: no ratio, no angle.
        let at = if i == 0 { 0.0 } else { (i as f64 + CUT_FROM_STEPS) * step + CUT_FROM_RISE };
        table[i] = Chord::through(
            arc_tangent(at) * unit + half,
            arc_tangent(at + step / 2.0) * unit + half,
            arc_tangent(at + step) * unit + half,
            FRACTION_BITS,
        );
        i += 1;
    }
    table
}

/// 2·arctan(rise / run) in 2^-16 turn, at most a quarter, for rise ≤ run; 0/0 counts as 0.
///
/// Within 1.4e-4 rad, rounding to the step included: every pair of 12 bits, densely beyond.
#[inline(never)]
pub(super) fn double_angle(rise: u32, run: u32) -> u32 {
    let (run, rise) = normal::both(run, rise);
    let near = RECIPROCALS[(run >> RUN_BITS) as usize % INTERVALS];
    let reciprocal = near.falling_after((run << (32 - RUN_BITS)) >> (32 - FRACTION_BITS)) >> 16;
    let ratio = (rise >> 15).wrapping_mul(reciprocal);
    let near = ARCS[(ratio >> RATIO_BITS) as usize];
    near.after((ratio << (32 - RATIO_BITS)) >> (32 - FRACTION_BITS)) >> 17
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The error in radians against `f64`.
    fn error(rise: u32, run: u32) -> f64 {
        let got = f64::from(double_angle(rise, run)) / 65_536.0 * core::f64::consts::TAU;
        got - 2.0 * (f64::from(rise) / f64::from(run)).atan()
    }

    #[test]
    fn double_angle_keeps_its_bound() {
        // Every run of 12 bits with every rise; then dense in both, over all sizes of run.
        let mut worst = 0.0f64;
        for run in 1u32..1 << 12 {
            for rise in 0..=run {
                worst = worst.max(error(rise, run).abs());
            }
        }
        for run in (1u32 << 31..=u32::MAX).step_by((1 << 31) / 1_999) {
            let less = run >> 12;
            for rise in (0..=run).step_by(less as usize).chain([run - 1, run]) {
                worst = worst.max(error(rise, run).abs());
            }
            for shift in 1..31 {
                worst = worst.max(error((run >> shift) / 3, run >> shift).abs());
            }
        }
        assert!(worst < ANGLE_BOUND && worst > ANGLE_BOUND / 2.0, "{worst:e}");
    }

    #[test]
    fn double_angle_answers_at_the_edges() {
        assert_eq!(double_angle(0, 0), 0);
        assert_eq!(double_angle(0, 1), 0);
        assert_eq!(double_angle(0, u32::MAX), 0);
        assert_eq!(double_angle(u32::MAX, u32::MAX), 1 << 14);
        assert_eq!(double_angle(1, 1), 1 << 14);
    }
}
