//! Knee flexion and its sine from the sine of half of it, by expansions about the middles of intervals.

use super::expansion::Expansion;
use super::{RATIO_BITS, SINE_BITS};
use crate::const_math::{arc_tangent, power_of_two, square_root};

/// Intervals in 1; those up to sin 45° are there, and one more.
const INTERVALS: usize = 128;
const NODES: usize = 92;
/// The sine's bits below the interval's number.
const WITHIN_BITS: u32 = SINE_BITS - INTERVALS.ilog2();
/// See [`Expansion`].
const ANGLE_BEND_BITS: u32 = 7;
const SINE_BEND_BITS: u32 = 8;
/// Added to the first angle, 2^-32 turn: more than rounding takes away, so that none is negative.
const LIFT: f64 = 48.0;

/// 2·arcsin s in 2^-32 turn, and s·√(1 − s²).
#[derive(Clone, Copy)]
struct Node {
    angle: Expansion,
    half_sine: Expansion,
}

static NODES_OF_KNEE: [Node; NODES] = nodes();

const fn nodes() -> [Node; NODES] {
    let turn = power_of_two(32) / core::f64::consts::TAU;
    let unit = power_of_two(RATIO_BITS as i32);
    let half = 0.5 / INTERVALS as f64;
    let none = Expansion::new(0.0, [0.0; 3], 0);
    let mut table = [Node { angle: none, half_sine: none }; NODES];
    let mut i = 0;
    while i < table.len() {
        let s = (2 * i + 1) as f64 * half;
        let cosine = square_root(1.0 - s * s);
        let cube = cosine * cosine * cosine;
        let fifth = cube * cosine * cosine;
        let (h1, h2, h3) = (half, half * half, half * half * half);
        table[i] = Node {
            angle: Expansion::new(
                2.0 * arc_tangent(s / cosine) * turn + if i == 0 { LIFT } else { 0.0 },
                [
                    2.0 / cosine * h1 * turn,
                    2.0 * s / cube * h2 * turn,
                    2.0 * (1.0 + 2.0 * s * s) / fifth * h3 * turn,
                ],
                ANGLE_BEND_BITS,
            ),
            half_sine: Expansion::new(
                s * cosine * unit,
                [
                    (1.0 - 2.0 * s * s) / cosine * h1 * unit,
                    s * (2.0 * s * s - 3.0) / cube * h2 * unit,
                    -3.0 / fifth * h3 * unit,
                ],
                SINE_BEND_BITS,
            ),
        };
        i += 1;
    }
    table
}

/// (2·arcsin s in 2^-32 turn, s·√(1 − s²) with [`RATIO_BITS`] fraction bits) for s with [`SINE_BITS`] fraction bits,
/// s ≤ sin 45° and a hair.
///
/// Within 4e-7 rad and 2.5e-7: every sine there is, with TOEHOLD_LONG=1, the largest 3.480e-7 and 2.221e-7.
#[inline(always)]
pub(super) fn knee(sine: u32) -> (i32, i32) {
    if sine >= (NODES as u32) << WITHIN_BITS {
        // Never: the smaller of n and m gives no larger sine.
        return (1 << 30, 1 << (RATIO_BITS - 1));
    }
    let near = &NODES_OF_KNEE[(sine >> WITHIN_BITS) as usize];
    let within = ((sine << (32 - WITHIN_BITS)) ^ (1 << 31)) as i32;
    let half_sine = near.half_sine.at::<SINE_BEND_BITS>(within);
    (near.angle.at::<ANGLE_BEND_BITS>(within), half_sine)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn knee_is_never_negative() {
        let least = (0..1u32 << WITHIN_BITS).map(|sine| knee(sine).0).min();
        assert!(least.is_some_and(|least| (0..40).contains(&least)), "{least:?}");
    }

    #[test]
    fn knee_and_half_sine_keep_their_bounds() {
        let (mut worst_angle, mut worst_sine) = (0.0f64, 0.0f64);
        let end = (0.5f64.sqrt() * f64::from(1 << SINE_BITS)) as u32 + 8;
        for sine in (0..=end).step_by(crate::number::sweep(7)) {
            let (angle, half_sine) = knee(sine);
            let s = f64::from(sine) / f64::from(1 << SINE_BITS);
            let angle = f64::from(angle) / 4_294_967_296.0 * core::f64::consts::TAU;
            worst_angle = worst_angle.max((angle - 2.0 * s.asin()).abs());
            let half_sine = f64::from(half_sine) / f64::from(1 << RATIO_BITS);
            worst_sine = worst_sine.max((half_sine - s * (1.0 - s * s).sqrt()).abs());
        }
        std::println!("fixed32/knee: {worst_angle:e} {worst_sine:e}");
        assert!(worst_angle < 4e-7 && worst_angle > 2e-7, "{worst_angle:e}");
        assert!(worst_sine < 2.5e-7 && worst_sine > 1.25e-7, "{worst_sine:e}");
    }
}
