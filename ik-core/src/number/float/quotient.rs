//! A quotient of two polynomials: fewer coefficients than one polynomial for as good an approximation, and two short
//! sums side by side where that would have a long one.

/// Σ c·u^k by Horner's rule.
#[inline(always)]
pub(super) fn polynomial<const N: usize>(coefficients: &[f32; N], u: f32) -> f32 {
    // Not from 0: no compiler may leave out a product with 0.
    coefficients.iter().rev().copied().reduce(|sum, c| sum * u + c).unwrap_or(0.0)
}

/// Two polynomials in t².
pub(super) struct Quotient<const ABOVE: usize, const BELOW: usize> {
    /// From the lowest power up.
    pub(super) above: [f32; ABOVE],
    /// From the lowest power up; the highest has the coefficient 1, which is left out.
    pub(super) below: [f32; BELOW],
}

impl<const ABOVE: usize, const BELOW: usize> Quotient<ABOVE, BELOW> {
    /// 2·t and t³ times the quotient: what the quotient is rounded by weighs less. u is t².
    #[inline(always)]
    pub(super) fn odd_beyond_double(&self, t: f32, u: f32) -> f32 {
        t + t + t * (u * polynomial(&self.above, u)) / self.divisor(u)
    }

    #[inline(always)]
    fn divisor(&self, u: f32) -> f32 {
        let below = self.below.iter().rev().copied();
        below.fold(None, |sum, c| Some(sum.map_or(u + c, |sum: f32| sum * u + c))).unwrap_or(1.0)
    }
}
