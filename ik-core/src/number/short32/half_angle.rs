//! 2·arctan of a ratio: the ratio's reciprocal by 128 chords, the nearest of 129 nodes, and a parabola about it.

use super::bow::Bow;
use crate::const_math::{arc_tangent, power_of_two};
use crate::number::narrow::chord::Chord;
use crate::number::narrow::normal;

/// Intervals of both tables.
const INTERVALS: usize = 128;
/// The run's bits below the interval's number.
const RUN_BITS: u32 = 23;
/// Those of them that are used.
const FRACTION_BITS: u32 = 11;
/// The ratio's bits below the node's number.
const RATIO_BITS: u32 = 24;
const SLOPE_BITS: u32 = 8;
/// What rounding down takes on average from the place about a node.
const LATE: f64 = 1.2 / 65_536.0;
/// The largest error, radians.
#[cfg(test)]
const BOUND: f64 = 9.6e-7;

/// ½/d for d from ½ to 1, and half of what is shifted out.
static RECIPROCALS: [Chord; INTERVALS] = reciprocals();
/// 2·arctan in 2^-32 turn.
static NODES: [Bow; INTERVALS + 1] = nodes();

const fn reciprocals() -> [Chord; INTERVALS] {
    let mut table = [Chord::FLAT; INTERVALS];
    let (unit, half) = (power_of_two(32) * INTERVALS as f64, power_of_two(15));
    let mut i = 0;
    while i < INTERVALS {
        let at = (INTERVALS + i) as f64;
        let [a, b, c] = [unit / at + half, unit / (at + 0.5) + half, unit / (at + 1.0) + half];
        table[i] = Chord::falling_through(a, b, c, FRACTION_BITS);
        i += 1;
    }
    table
}

const fn nodes() -> [Bow; INTERVALS + 1] {
    let mut table = [Bow::FLAT; INTERVALS + 1];
    let turn = power_of_two(32) / core::f64::consts::TAU;
    let h = 1.0 / INTERVALS as f64;
    let mut i = 0;
    while i < table.len() {
        let t = i as f64 * h;
        let c = 1.0 + t * t;
        let derivatives = [
            2.0 / c * h * turn,
            -4.0 * t / (c * c) * h * h * turn,
            (12.0 * t * t - 4.0) / (c * c * c) * h * h * h * turn,
        ];
        // No ratio, no angle.
        let late = if i == 0 { 0.0 } else { LATE };
        table[i] = Bow::new(2.0 * arc_tangent(t) * turn, derivatives, late, SLOPE_BITS);
        i += 1;
    }
    table
}

/// 2·arctan(rise / run) in 2^-32 turn, at most a quarter and a hair; a rise above the run counts as equal, 0/0 as 0.
///
/// Within 9.6e-7 rad; 5.5e-7 from 0.8° on.
#[inline(never)]
pub(super) fn double_angle(rise: u32, run: u32) -> u32 {
    let (run, rise) = normal::both(run, rise);
    // A bit of room for the sign of what is left.
    let (run, rise) = (run >> 1, rise >> 1);
    let near = RECIPROCALS[(run >> RUN_BITS) as usize % INTERVALS];
    let reciprocal = near.falling_after((run << (32 - RUN_BITS)) >> (32 - FRACTION_BITS)) >> 16;
    let ratio = (rise >> 15).wrapping_mul(reciprocal);
    let number = ratio.wrapping_add(1 << (RATIO_BITS - 1)) >> RATIO_BITS;
    let rest = (rise << 7).wrapping_sub(number.wrapping_mul(run)) as i32;
    // Half an interval's rest times the reciprocal is 2^30.
    let within = (rest >> 15).wrapping_mul(reciprocal as i32) >> 15;
    match NODES.get(number as usize) {
        Some(node) => node.at::<SLOPE_BITS>(within),
        None => quarter(),
    }
}

#[cold]
#[inline(never)]
fn quarter() -> u32 {
    1 << 30
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The error in radians against `f64`.
    fn error(rise: u32, run: u32) -> f64 {
        let got = f64::from(double_angle(rise, run)) / 4_294_967_296.0 * core::f64::consts::TAU;
        got - 2.0 * (f64::from(rise) / f64::from(run)).atan()
    }

    #[test]
    fn double_angle_keeps_its_bound() {
        // Every run of 11 bits with every rise; then dense in both, over all sizes of run.
        let mut worst = 0.0f64;
        for run in 1u32..1 << 11 {
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
        // Where the ratio is small its cut-off part tells most: densely there.
        for run in (1u32 << 29..1 << 30).step_by((1 << 29) / 499) {
            for rise in (run / 1_000..run / 64).step_by(run as usize / 40_000) {
                worst = worst.max(error(rise, run).abs());
            }
        }
        worst = worst.max(error(1_987_069, 541_059_203).abs());
        assert!(worst < BOUND && worst > BOUND / 2.0, "{worst:e}");
    }

    #[test]
    fn double_angle_answers_at_the_edges() {
        for (rise, run, angle) in [(0, 0, 0), (0, 1, 0), (0, u32::MAX, 0)] {
            assert_eq!(double_angle(rise, run), angle, "{rise}/{run}");
        }
        for run in [1, 3, 1 << 20, u32::MAX] {
            assert!(double_angle(run, run).abs_diff(1 << 30) < 200, "{run}");
        }
    }
}
