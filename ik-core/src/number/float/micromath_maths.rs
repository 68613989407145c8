//! micromath's functions.

use super::FloatMaths;
use micromath::F32Ext;

/// micromath's functions: small and coarse.
#[derive(Debug, Clone, Copy, PartialEq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Micromath;

impl FloatMaths for Micromath {
    const NAME: &'static str = "coarse";
    const REST_BITS: u32 = 24;

    #[inline(always)]
    fn root(v: f32) -> f32 {
        // micromath's root is off by up to 6 %; one step of Heron's method makes that 0.2 %, which is what its
        // arctangent is worth.
        let start = F32Ext::sqrt(v);
        if start > 0.0 { 0.5 * (start + v / start) } else { 0.0 }
    }

    #[inline(always)]
    fn double_arc_tangent(t: f32) -> f32 {
        2.0 * F32Ext::atan(t)
    }

    #[inline(always)]
    fn double_arc_sine(sine: f32, _: f32, cosine: f32) -> f32 {
        4.0 * F32Ext::atan(sine / (1.0 + cosine))
    }

    fn sin_cos(angle: f32) -> (f32, f32) {
        F32Ext::sin_cos(angle)
    }
}
