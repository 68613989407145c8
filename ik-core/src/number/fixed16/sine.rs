//! Sine and cosine of a fraction of a turn, by their power series within an eighth of a turn of a quarter.

use super::RATIO_BITS;

/// Fraction bits of the arithmetic here.
const BITS: u32 = 15;
/// The largest error; half of a step of the result makes 3.1e-5 of it.
#[cfg(test)]
const SINE_BOUND: f64 = 1.1e-4;

const fn times(a: i32, b: i32) -> i32 {
    (a * b + (1 << (BITS - 1))) >> BITS
}

/// (sin, cos) of `turns`/2^16 turn with [`RATIO_BITS`], within 1.1e-4: every angle there is.
pub(super) fn sin_cos(turns: i16) -> (i32, i32) {
    // The nearest quarter, and the rest within ±1/8 turn.
    let quarter = (i32::from(turns) + (1 << 13)) >> 14;
    let rest = i32::from(turns) - (quarter << 14);
    // τ with 12 fraction bits: |rest| ≤ 2^13.
    let angle = (rest * 25_736 + (1 << 12)) >> 13;
    let square = times(angle, angle);
    // 1/6, 1/120; 1/2, 1/24, 1/720 with 15 bits.
    let sine = times((1 << BITS) - times(square, 5_461 - times(square, 273)), angle);
    let cosine = (1 << BITS) - times(square, (1 << (BITS - 1)) - times(square, 1_365 - times(square, 46)));
    let (sine, cosine) = (sine << (RATIO_BITS - BITS), cosine << (RATIO_BITS - BITS));
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
    fn sine_and_cosine_keep_their_bound_for_every_angle_there_is() {
        let mut worst = 0.0f64;
        for turns in i16::MIN..=i16::MAX {
            let (sine, cosine) = sin_cos(turns);
            let angle = f64::from(turns) / 65_536.0 * core::f64::consts::TAU;
            worst = worst.max((f64::from(sine) / 65_536.0 - angle.sin()).abs());
            worst = worst.max((f64::from(cosine) / 65_536.0 - angle.cos()).abs());
        }
        assert!(worst < SINE_BOUND && worst > SINE_BOUND / 2.0, "{worst:e}");
    }
}
