//! Minimax polynomials and quotients of them, as short as single precision is worth.
//!
//! Every float is looked at, in a minute, by
//! `TOEHOLD_LONG=1 cargo test --release -p ik-core --lib -- float::polynomial --nocapture`, which prints the largest
//! errors: 1.694e-7, 3.035e-7, 8.931e-8.

use super::FloatMaths;
use super::coefficients::{ARC_SINE, ARC_TANGENT, COSINE, SINE};
use super::hardware_root;
use super::quotient::polynomial;
use core::f32::consts::{FRAC_2_PI, FRAC_PI_2};

/// Functions of our own over minimax polynomials: the same bits on every machine.
#[derive(Debug, Clone, Copy, PartialEq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Polynomials;

/// What the `f32` nearest to π/2 leaves of it.
const FRAC_PI_2_REST: f32 = -4.371_139e-8;

impl FloatMaths for Polynomials {
    const NAME: &'static str = "float32";
    const REST_BITS: u32 = 8;

    #[inline(always)]
    fn root(v: f32) -> f32 {
        hardware_root::root(v)
    }

    #[inline(always)]
    fn root_of_words(upper: i32, lower: u32) -> f32 {
        hardware_root::root_of_words(upper, lower)
    }

    /// Within 1.7e-7 on [−1, 1], found at every float there.
    #[inline(always)]
    fn double_arc_tangent(t: f32) -> f32 {
        ARC_TANGENT.odd_beyond_double(t, t * t)
    }

    /// Within 3.1e-7 on [0, √½], found at every float there.
    #[inline(always)]
    fn double_arc_sine(sine: f32, square: f32, _: f32) -> f32 {
        ARC_SINE.odd_beyond_double(sine, square)
    }

    /// Within 9e-8 on [−π, π], found at every float there.
    fn sin_cos(angle: f32) -> (f32, f32) {
        // The nearest quarter turn, and the rest within ±π/4.
        let turned = angle * FRAC_2_PI;
        let quarter = (if turned < 0.0 { turned - 0.5 } else { turned + 0.5 }) as i32;
        let rest = (angle - quarter as f32 * FRAC_PI_2) - quarter as f32 * FRAC_PI_2_REST;
        let square = rest * rest;
        let (sine, cosine) = (rest * polynomial(&SINE, square), polynomial(&COSINE, square));
        match quarter & 3 {
            0 => (sine, cosine),
            1 => (cosine, -sine),
            2 => (-sine, -cosine),
            _ => (-cosine, sine),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use core::f32::consts::{FRAC_1_SQRT_2, PI};

    /// The largest error over every `step`th float of [0, end] and its negative, or over each if `TOEHOLD_LONG` is set;
    /// and that it is no less than half of the bound, which would be a bound with too much slack.
    fn worst(end: f32, step: usize, error: impl Fn(f32) -> f64, bound: f64) {
        let step = if std::env::var_os("TOEHOLD_LONG").is_some() { 1 } else { step };
        let mut worst = 0.0f64;
        for bits in (0..=end.to_bits()).step_by(step) {
            let t = f32::from_bits(bits);
            worst = worst.max(error(t)).max(error(-t));
        }
        std::println!("{worst:e}");
        assert!(worst <= bound && worst > bound / 2.0, "{worst:e} for {bound:e}");
    }

    #[test]
    fn double_arc_tangent_keeps_its_bound() {
        let error = |t| f64::from(Polynomials::double_arc_tangent(t)) - 2.0 * f64::from(t).atan();
        worst(1.0, 97, |t| error(t).abs(), 1.7e-7);
    }

    #[test]
    fn double_arc_sine_keeps_its_bound() {
        let error = |s: f32| {
            let s = s.abs();
            f64::from(Polynomials::double_arc_sine(s, s * s, 0.0)) - 2.0 * f64::from(s).asin()
        };
        worst(FRAC_1_SQRT_2, 97, |s| error(s).abs(), 3.1e-7);
    }

    #[test]
    fn sine_and_cosine_keep_their_bound() {
        let error = |angle: f32| {
            let (sine, cosine) = Polynomials::sin_cos(angle);
            let (want_sine, want_cosine) = f64::from(angle).sin_cos();
            (f64::from(sine) - want_sine).abs().max((f64::from(cosine) - want_cosine).abs())
        };
        worst(PI, 97, error, 9e-8);
    }
}
