//! Sine and cosine of a fraction of a turn, by the power series within an eighth of a turn of a quarter.

use crate::const_math::{nearest_i32, power_of_two};

/// Fraction bits of the arithmetic here.
pub(super) const BITS: u32 = 30;
/// The coefficients of the sine's series in the square of the angle, from its small end.
const SINE: [i32; 5] = series([362_880.0, -5_040.0, 120.0, -6.0, 1.0]);
/// The cosine's.
const COSINE: [i32; 6] = series([-3_628_800.0, 40_320.0, -720.0, 24.0, -2.0, 1.0]);

/// One over each factorial, with its sign.
const fn series<const N: usize>(factorials: [f64; N]) -> [i32; N] {
    let mut coefficients = [0; N];
    let mut i = 0;
    while i < N {
        coefficients[i] = nearest_i32(power_of_two(BITS as i32) / factorials[i]);
        i += 1;
    }
    coefficients
}

/// (sin, cos) of `turns`/2^32 turn with [`BITS`] fraction bits. `times` multiplies two numbers with so many fraction bits,
/// within ±2; its error counts some four times.
#[inline(always)]
pub(super) fn sin_cos(turns: i32, times: impl Fn(i32, i32) -> i32 + Copy) -> (i32, i32) {
    let polynomial = |coefficients: &[i32], u: i32| coefficients.iter().fold(0, |sum, c| times(sum, u) + c);
    // The nearest quarter, and the rest within ±1/8 turn.
    let quarter = (turns as u32).wrapping_add(1 << 29) >> 30;
    let rest = turns.wrapping_sub((quarter << 30) as i32);
    // A quarter of 2π, so that it lies within ±2; the rest is then in quarters of a turn.
    let radians = const { nearest_i32(core::f64::consts::FRAC_PI_2 * power_of_two(BITS as i32)) };
    let angle = times(rest, radians);
    let square = times(angle, angle);
    let sine = times(polynomial(&SINE, square), angle);
    let cosine = polynomial(&COSINE, square);
    match quarter & 3 {
        0 => (sine, cosine),
        1 => (cosine, -sine),
        2 => (-sine, -cosine),
        _ => (-cosine, sine),
    }
}
