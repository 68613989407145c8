//! Functions of `f64` that run while compiling, so that legs and tables can be constants in flash.
//! None of them is linked into firmware unless a leg is built while it runs.

/// √v by Newton's iteration, for finite v ≥ 0; within 1 ULP.
pub(crate) const fn square_root(v: f64) -> f64 {
    if !(v > 0.0) {
        return 0.0;
    }
    // Halving the exponent gives a start within a few per cent; six steps then reach the last bit.
    let mut root = f64::from_bits((v.to_bits() >> 1) + 0x1FF8_0000_0000_0000);
    let mut step = 0;
    while step < 6 {
        root = 0.5 * (root + v / root);
        step += 1;
    }
    root
}

/// |v|.
pub(crate) const fn magnitude(v: f64) -> f64 {
    if v < 0.0 { -v } else { v }
}

/// The nearest integer, halves away from zero; saturates.
pub(crate) const fn nearest(v: f64) -> i64 {
    if v < 0.0 { -((0.5 - v) as i64) } else { (v + 0.5) as i64 }
}

/// The nearest integer that an `i32` holds.
pub(crate) const fn nearest_i32(v: f64) -> i32 {
    let whole = nearest(v);
    if whole > i32::MAX as i64 {
        i32::MAX
    } else if whole < i32::MIN as i64 {
        i32::MIN
    } else {
        whole as i32
    }
}

/// The least and the largest integer within a range; if it holds none, the nearest to its lower end twice.
#[cfg(any(feature = "fixed16", feature = "fixed32", feature = "short32"))]
pub(crate) const fn inward(least: f64, most: f64) -> [i32; 2] {
    let (mut low, mut high) = (nearest_i32(least), nearest_i32(most));
    if (low as f64) < least {
        low = low.saturating_add(1);
    }
    if high as f64 > most {
        high = high.saturating_sub(1);
    }
    if low <= high { [low, high] } else { [nearest_i32(least); 2] }
}

/// 2^exponent.
#[cfg(any(
    feature = "float32",
    feature = "coarse",
    feature = "fixed16",
    feature = "fixed32",
    feature = "short32"
))]
pub(crate) const fn power_of_two(exponent: i32) -> f64 {
    let mut value = 1.0;
    let mut left = exponent;
    while left > 0 {
        value *= 2.0;
        left -= 1;
    }
    while left < 0 {
        value *= 0.5;
        left += 1;
    }
    value
}

/// arctan t for 0 ≤ t ≤ 2, by two halvings of the angle and its power series; within 1e-15.
#[cfg(any(feature = "fixed16", feature = "fixed32", feature = "short32"))]
pub(crate) const fn arc_tangent(t: f64) -> f64 {
    let half = t / (1.0 + square_root(1.0 + t * t));
    let quarter = half / (1.0 + square_root(1.0 + half * half));
    let square = quarter * quarter;
    // Alternating series Σ (-1)^k q^(2k+1)/(2k+1), from its small end; q ≤ 0.28, so 16 terms are plenty.
    let mut sum = 0.0;
    let mut k = 16;
    while k > 0 {
        k -= 1;
        sum = 1.0 / (2 * k + 1) as f64 - square * sum;
    }
    4.0 * quarter * sum
}

/// sin² of half an angle given in degrees, 0 ≤ degrees ≤ 180: (1 − cos)/2 without its cancellation; within 1e-15.
pub(crate) const fn half_sine_square(degrees: f64) -> f64 {
    // Exactly 1 when folded, and as exact near it as near straight.
    if degrees > 90.0 {
        return 1.0 - half_sine_square(180.0 - degrees);
    }
    // The series of the sine for the half angle, ≤ 90°; from its small end, 14 terms are plenty.
    let angle = degrees * (core::f64::consts::PI / 360.0);
    let square = angle * angle;
    let mut sum = 0.0;
    let mut k = 14;
    while k > 0 {
        k -= 1;
        sum = 1.0 - square * sum / ((2 * k + 2) * (2 * k + 3)) as f64;
    }
    let sine = angle * sum;
    sine * sine
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn square_root_agrees_with_the_standard_library() {
        for i in 0..100_000 {
            let v = f64::from(i) * 0.37 + 1e-9;
            let (got, want) = (square_root(v), v.sqrt());
            assert!(((got - want) / want).abs() < 3e-16, "{v}: {got} {want}");
        }
        assert_eq!(square_root(0.0), 0.0);
        assert_eq!(square_root(-1.0), 0.0);
    }

    #[cfg(any(feature = "fixed16", feature = "fixed32", feature = "short32"))]
    #[test]
    fn arc_tangent_agrees_with_the_standard_library() {
        for i in 0..=2000 {
            let t = f64::from(i) / 1000.0;
            assert!((arc_tangent(t) - t.atan()).abs() < 1e-15, "{t}");
        }
    }

    #[test]
    fn half_sine_square_agrees_with_the_standard_library() {
        for i in 0..=1800 {
            let degrees = f64::from(i) / 10.0;
            let want = (degrees / 2.0).to_radians().sin().powi(2);
            assert!((half_sine_square(degrees) - want).abs() < 1e-15, "{degrees}");
        }
        assert_eq!(half_sine_square(0.0), 0.0);
    }

    #[cfg(any(feature = "fixed16", feature = "fixed32", feature = "short32"))]
    #[test]
    fn ends_of_a_range_are_rounded_inward() {
        assert_eq!(inward(-2.6, 2.6), [-2, 2]);
        assert_eq!(inward(-2.4, 2.4), [-2, 2]);
        assert_eq!(inward(-2.0, 2.0), [-2, 2]);
        assert_eq!(inward(2.3, 2.4), [2, 2]);
        assert_eq!(inward(-1e12, 1e12), [i32::MIN, i32::MAX]);
    }

    #[test]
    fn nearest_rounds_halves_away_from_zero() {
        assert_eq!((nearest(2.5), nearest(-2.5), nearest(2.49), nearest(-0.4)), (3, -3, 2, 0));
        assert_eq!((nearest_i32(1e12), nearest_i32(-1e12)), (i32::MAX, i32::MIN));
    }
}
