//! Numbers of about 106 bits as unevaluated sums of two f64, for the few differences that cancel.
//!
//! A foot close to full stretch, or close to the cylinder that the hip offset sweeps, makes
//! D² = y² + z² − a² and (L1 + L2) − G the small difference of large numbers. Formed in plain f64
//! they would leave a knee angle good to √ε only. Formed here they keep a full f64 of good bits.
//!
//! Sources: Knuth, *The Art of Computer Programming* vol. 2, §4.2.2 (the exact sum); Dekker,
//! "A floating-point technique for extending the available precision" (1971) for sums, products
//! and roots of such pairs. Products use the fused multiply-add for their exact remainder; where
//! the machine has none, Rust calls a function that gives the same bits.

use std::ops::{Add, Mul, Neg, Sub};

/// `high + low`, with |low| at most half a unit in the last place of `high`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Doubled {
    high: f64,
    low: f64,
}

impl Doubled {
    /// a + b, exactly.
    #[inline]
    pub(super) fn sum(a: f64, b: f64) -> Self {
        let high = a + b;
        let of_b = high - a;
        let low = (a - (high - of_b)) + (b - of_b);
        Self { high, low }
    }

    /// a², exactly unless it underflows.
    #[inline]
    pub(super) fn square(a: f64) -> Self {
        let high = a * a;
        Self { high, low: a.mul_add(a, -high) }
    }

    /// The nearest f64.
    #[inline]
    pub(super) fn value(self) -> f64 {
        self.high
    }

    #[inline]
    pub(super) fn squared(self) -> Self {
        self * self
    }

    #[inline]
    pub(super) fn abs(self) -> Self {
        if self.is_negative() { -self } else { self }
    }

    #[inline]
    pub(super) fn is_negative(self) -> bool {
        self.high < 0.0
    }

    /// The square root, or zero for anything below zero.
    #[inline]
    pub(super) fn root(self) -> Self {
        if self.high <= 0.0 {
            return Self::from(0.0);
        }
        let root = self.high.sqrt();
        // One Newton step; its remainder fits an f64.
        let rest = (self - Self::square(root)).high;
        Self::sum(root, rest / (2.0 * root))
    }
}

impl From<f64> for Doubled {
    #[inline]
    fn from(high: f64) -> Self {
        Self { high, low: 0.0 }
    }
}

impl Add for Doubled {
    type Output = Self;
    #[inline]
    fn add(self, other: Self) -> Self {
        // Both parts summed exactly first: stays accurate when the high parts cancel.
        let high = Self::sum(self.high, other.high);
        let low = Self::sum(self.low, other.low);
        let partly = Self::sum(high.high, high.low + low.high);
        Self::sum(partly.high, partly.low + low.low)
    }
}

impl Neg for Doubled {
    type Output = Self;
    #[inline]
    fn neg(self) -> Self {
        Self { high: -self.high, low: -self.low }
    }
}

impl Sub for Doubled {
    type Output = Self;
    #[inline]
    fn sub(self, other: Self) -> Self {
        self + -other
    }
}

impl Mul for Doubled {
    type Output = Self;
    #[inline]
    fn mul(self, other: Self) -> Self {
        let high = self.high * other.high;
        let rest = self.high.mul_add(other.high, -high);
        let cross = self.high.mul_add(other.low, self.low * other.high);
        Self::sum(high, rest + cross)
    }
}

#[cfg(test)]
mod tests {
    use super::Doubled;

    #[test]
    fn a_sum_keeps_what_f64_would_drop() {
        let sum = Doubled::sum(1.0, 1e-20);
        assert_eq!((sum - Doubled::from(1.0)).value(), 1e-20);
    }

    #[test]
    fn a_square_keeps_what_f64_would_drop() {
        // (1 + 2^-40)² = 1 + 2^-39 + 2^-80
        let x = 1.0 + 2f64.powi(-40);
        let rest = Doubled::square(x) - Doubled::sum(1.0, 2f64.powi(-39));
        assert_eq!(rest.value(), 2f64.powi(-80));
    }

    #[test]
    fn a_root_squared_gives_back_its_radicand() {
        for radicand in [2.0, 3.0, 0.1, 1e9 + 0.7, 1e-9] {
            let root = Doubled::from(radicand).root();
            let rest = (root.squared() - Doubled::from(radicand)).value();
            assert!(rest.abs() <= radicand * 2f64.powi(-100), "{radicand}: {rest}");
        }
    }

    #[test]
    fn the_root_of_a_negative_is_zero() {
        assert_eq!(Doubled::from(-1.0).root().value(), 0.0);
    }
}
