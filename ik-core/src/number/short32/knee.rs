//! Knee and half of its sine from the sine of half of it, by parabolas.

use super::bow::Bow;
use crate::const_math::{arc_tangent, power_of_two, square_root};

/// Intervals of a sine of 1.
const INTERVALS: usize = 128;
/// Those up to sin 45°, which lies within the last.
const NODES: usize = 91;
/// Fraction bits of the sine.
const SINE_BITS: u32 = 28;
/// The sine's bits below the interval's number.
const WITHIN_BITS: u32 = SINE_BITS - INTERVALS.ilog2();
const ANGLE_SLOPE_BITS: u32 = 8;
const SINE_SLOPE_BITS: u32 = 10;
/// What rounding down takes on average from the place within an interval.
const LATE: f64 = 0.5 / 65_536.0;
/// Added to the first angle, 2^-32 turn: more than rounding takes away, so that none is negative.
const LIFT: f64 = 100.0;
/// The largest error of the angle, radians.
#[cfg(test)]
const KNEE_BOUND: f64 = 4.5e-7;
/// The largest error of half of the knee's sine.
#[cfg(test)]
const HALF_SINE_BOUND: f64 = 2.3e-7;
/// The largest error of the square of the sine.
#[cfg(test)]
const FROM_END_BOUND: f64 = 2.5e-9;

#[derive(Clone, Copy)]
struct Node {
    /// 2·arcsin s in 2^-32 turn.
    angle: Bow,
    /// s·√(1 − s²) with 32 fraction bits.
    half_sine: Bow,
}

static NODES_OF_KNEE: [Node; NODES] = nodes();

const fn nodes() -> [Node; NODES] {
    let mut table = [Node { angle: Bow::FLAT, half_sine: Bow::FLAT }; NODES];
    let (turn, unit) = (power_of_two(32) / core::f64::consts::TAU, power_of_two(32));
    let h = 1.0 / INTERVALS as f64;
    let mut i = 0;
    while i < table.len() {
        let s = (i as f64 + 0.5) * h;
        let c = square_root(1.0 - s * s);
        let (cube, fifth) = (c * c * c, c * c * c * c * c);
        let angle = 4.0 * arc_tangent(s / (1.0 + c)) * turn + if i == 0 { LIFT } else { 0.0 };
        table[i] = Node {
            angle: Bow::new(
                angle,
                [
                    2.0 / c * h * turn,
                    2.0 * s / cube * h * h * turn,
                    (2.0 + 4.0 * s * s) / fifth * h * h * h * turn,
                ],
                LATE,
                ANGLE_SLOPE_BITS,
            ),
            half_sine: Bow::new(
                s * c * unit,
                [
                    (1.0 - 2.0 * s * s) / c * h * unit,
                    s * (2.0 * s * s - 3.0) / cube * h * h * unit,
                    -3.0 / fifth * h * h * h * unit,
                ],
                LATE,
                SINE_SLOPE_BITS,
            ),
        };
        i += 1;
    }
    table
}

/// (angle in 2^-32 turn, half of its sine, the square of s) of the knee whose half has the sine s, with 28 fraction bits
/// and at most sin 45° and a hair; ratios with 30 fraction bits.
///
/// The angle within 4.5e-7 rad, half of its sine within 2.3e-7, the square within 2.5e-9: every sine there is, with
/// TOEHOLD_LONG=1, the largest 4.421e-7, 2.208e-7 and 1.862e-9.
#[inline(always)]
pub(super) fn of_half_sine(sine: u32) -> (u32, i32, i32) {
    let Some(near) = NODES_OF_KNEE.get((sine >> WITHIN_BITS) as usize) else {
        // Never: the smaller of n and m gives no larger sine.
        return (1 << 30, 1 << 29, 1 << 29);
    };
    let within = ((sine << (32 - WITHIN_BITS)) ^ (1 << 31)) as i32 >> 16;
    let (high, low) = (sine >> 13, sine & 0x1FFF);
    let square = high.wrapping_mul(high).wrapping_add(high.wrapping_mul(low) >> 12);
    (
        near.angle.at::<ANGLE_SLOPE_BITS>(within),
        (near.half_sine.at::<SINE_SLOPE_BITS>(within) >> 2) as i32,
        square as i32,
    )
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_knee_keeps_its_bounds() {
        let (mut worst_angle, mut worst_half_sine, mut worst_from_end) = (0.0f64, 0.0f64, 0.0f64);
        let end = (0.5f64.sqrt() * power_of_two(SINE_BITS as i32)) as u32 + 8;
        for sine in (0..=end).step_by(crate::number::sweep(7)) {
            let (angle, half_sine, from_end) = of_half_sine(sine);
            let s = f64::from(sine) / power_of_two(SINE_BITS as i32);
            let angle = f64::from(angle) / 4_294_967_296.0 * core::f64::consts::TAU;
            worst_angle = worst_angle.max((angle - 2.0 * s.asin()).abs());
            let unit = power_of_two(30);
            worst_half_sine =
                worst_half_sine.max((f64::from(half_sine) / unit - s * (1.0 - s * s).sqrt()).abs());
            worst_from_end = worst_from_end.max((f64::from(from_end) / unit - s * s).abs());
        }
        std::println!("short32/knee: {worst_angle:e} {worst_half_sine:e} {worst_from_end:e}");
        assert!(worst_angle < KNEE_BOUND && worst_angle > KNEE_BOUND / 2.0, "{worst_angle:e}");
        assert!(
            worst_half_sine < HALF_SINE_BOUND && worst_half_sine > HALF_SINE_BOUND / 2.0,
            "{worst_half_sine:e}"
        );
        assert!(
            worst_from_end < FROM_END_BOUND && worst_from_end > FROM_END_BOUND / 2.0,
            "{worst_from_end:e}"
        );
    }

    #[test]
    fn knee_is_never_negative() {
        let least = (0..1u32 << WITHIN_BITS).map(|sine| of_half_sine(sine).0).min();
        assert!(least.is_some_and(|least| (0..300).contains(&least)), "{least:?}");
    }
}
