//! Sine and cosine of a fraction of a turn, by the power series within an eighth of a turn of a quarter.

use super::RATIO_BITS;
use crate::const_math::{nearest_i32, power_of_two};

/// Fraction bits of the arithmetic here.
const BITS: u32 = 30;
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

const fn times(a: i32, b: i32) -> i32 {
    // Both lie within ±2 of [`BITS`] fraction bits, and so does every product formed here.
    ((a as i64 * b as i64 + (1 << (BITS - 1))) >> BITS) as i32
}

fn polynomial(coefficients: &[i32], u: i32) -> i32 {
    coefficients.iter().fold(0, |sum, c| times(sum, u) + c)
}

/// (sin, cos) of `turns`/2^32 turn with [`RATIO_BITS`] fraction bits, within 6e-9.
pub(super) fn sin_cos(turns: i32) -> (i32, i32) {
    // The nearest quarter, and the rest within ±1/8 turn.
    let quarter = (turns as u32).wrapping_add(1 << 29) >> 30;
    let rest = turns.wrapping_sub((quarter << 30) as i32);
    // rest/2^32 turn in radians: |rest| ≤ 2^29, so the product stays below 2^62.
    let radians = const { nearest_i32(core::f64::consts::TAU * power_of_two(28)) };
    let angle = ((i64::from(rest) * i64::from(radians)) >> 30) as i32;
    let square = times(angle, angle);
    let sine = times(polynomial(&SINE, square), angle);
    let cosine = polynomial(&COSINE, square);
    let round = |v: i32| ((v >> (BITS - RATIO_BITS - 1)) + 1) >> 1;
    let (sine, cosine) = (round(sine), round(cosine));
    match quarter & 3 {
        0 => (sine, cosine),
        1 => (cosine, -sine),
        2 => (-sine, -cosine),
        _ => (-cosine, sine),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn sine_and_cosine_keep_their_bound_over_the_whole_turn() {
        let mut worst = 0.0f64;
        // A prime step visits the turn densely; the eighths are its edges.
        let eighths = (0..8u32).flat_map(|k| [-2i32, -1, 0, 1, 2].map(|d| (k << 29).wrapping_add_signed(d)));
        for bits in (0..=u32::MAX).step_by(1_009).chain(eighths) {
            let (sine, cosine) = sin_cos(bits as i32);
            let angle = f64::from(bits as i32) / 4_294_967_296.0 * core::f64::consts::TAU;
            let unit = f64::from(1 << RATIO_BITS);
            worst = worst.max((f64::from(sine) / unit - angle.sin()).abs());
            worst = worst.max((f64::from(cosine) / unit - angle.cos()).abs());
        }
        assert!(worst < 6e-9 && worst > 3e-9, "{worst:e}");
    }
}
