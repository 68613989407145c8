//! Knee and half of its sine from the sine of half of it, by chords.

use super::super::narrow::chord::Chord;
use crate::const_math::{arc_tangent, power_of_two, square_root};

/// Intervals of a sine of 1.
const INTERVALS: u32 = 128;
/// The sine's bits below the interval's number.
const FRACTION_BITS: u32 = 9;
/// What ratios lack of 32 fraction bits.
const DROP: u32 = 32 - super::RATIO_BITS;
/// √½ with 16 fraction bits, or just below.
pub(super) const MOST_SINE: u32 = 46_340;
/// The largest error of the angle, radians; half of a step of the result makes 4.8e-5 of it.
#[cfg(test)]
const KNEE_BOUND: f64 = 7.8e-5;
/// The largest error of half of the knee's sine.
#[cfg(test)]
const HALF_SINE_BOUND: f64 = 3e-5;
/// The largest error of the square of the sine.
#[cfg(test)]
const FROM_END_BOUND: f64 = 1.6e-5;

#[derive(Clone, Copy)]
struct Bow {
    /// 2·arcsin s in 2^-33 turn, and half of what is shifted out.
    angle: Chord,
    /// s·√(1 − s²) with 32 fraction bits, and half of what is shifted out.
    half_sine: Chord,
}

static BOWS: [Bow; (MOST_SINE >> FRACTION_BITS) as usize + 1] = bows();

const fn bows() -> [Bow; (MOST_SINE >> FRACTION_BITS) as usize + 1] {
    let mut table =
        [Bow { angle: Chord::FLAT, half_sine: Chord::FLAT }; (MOST_SINE >> FRACTION_BITS) as usize + 1];
    let mut i = 0;
    while i < table.len() {
        let (a, b, c) = (sine_at(i as f64), sine_at(i as f64 + 0.5), sine_at(i as f64 + 1.0));
        table[i] = Bow {
            angle: Chord::through(angle(a), angle(b), angle(c), FRACTION_BITS),
            half_sine: Chord::through(half_sine(a), half_sine(b), half_sine(c), FRACTION_BITS),
        };
        i += 1;
    }
    table
}

/// The sine at the start of an interval: half a step more, as the sine comes with its rest cut off.
const fn sine_at(interval: f64) -> f64 {
    (interval + 0.5 / (1 << FRACTION_BITS) as f64) / INTERVALS as f64
}

const fn angle(sine: f64) -> f64 {
    // arcsin s = 2·arctan(s / (1 + √(1 − s²)))
    let arcsine = 2.0 * arc_tangent(sine / (1.0 + square_root(1.0 - sine * sine)));
    2.0 * arcsine * power_of_two(33) / core::f64::consts::TAU + power_of_two(16)
}

const fn half_sine(sine: f64) -> f64 {
    sine * square_root(1.0 - sine * sine) * power_of_two(32) + power_of_two(DROP as i32 - 1)
}

/// (angle in 2^-16 turn, half of its sine) of the knee whose half has this sine; a sine above
/// [`MOST_SINE`] counts as that. And the square of the sine; both ratios with [`RATIO_BITS`](super::RATIO_BITS).
///
/// For every sine there is: the angle within 7.8e-5 rad, half of its sine within 3e-5, the square within 1.6e-5.
#[inline(always)]
pub(super) fn of_half_sine(sine: u32) -> (u32, i32, i32) {
    let sine = sine.min(MOST_SINE);
    let bow = &BOWS[(sine >> FRACTION_BITS) as usize];
    let steps = sine % (1 << FRACTION_BITS);
    (
        bow.angle.after(steps) >> 17,
        (bow.half_sine.after(steps) >> DROP) as i32,
        (sine.wrapping_mul(sine + 1) >> DROP) as i32,
    )
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_knee_keeps_its_bounds_for_every_sine_there_is() {
        let unit = power_of_two(super::super::RATIO_BITS as i32);
        let (mut worst_angle, mut worst_half_sine, mut worst_from_end) = (0.0f64, 0.0f64, 0.0f64);
        for bits in 0..=MOST_SINE {
            // What was cut off makes half a step on average.
            let sine = (f64::from(bits) + 0.5) / 65_536.0;
            let (angle, half_sine, from_end) = of_half_sine(bits);
            let angle = f64::from(angle) / 65_536.0 * core::f64::consts::TAU;
            worst_angle = worst_angle.max((angle - 2.0 * sine.asin()).abs());
            worst_half_sine =
                worst_half_sine.max((f64::from(half_sine) / unit - sine * (1.0 - sine * sine).sqrt()).abs());
            worst_from_end = worst_from_end.max((f64::from(from_end) / unit - sine * sine).abs());
        }
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
    fn a_larger_sine_counts_as_the_largest() {
        assert_eq!(of_half_sine(u32::MAX), of_half_sine(MOST_SINE));
        assert_eq!(of_half_sine(0).0, 0);
        assert_eq!(of_half_sine(MOST_SINE).0, 1 << 14);
    }
}
