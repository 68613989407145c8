//! libm's functions.

use super::FloatMaths;

/// libm's functions: within 1 ULP or nearly so, the same bits on every machine.
#[derive(Debug, Clone, Copy, PartialEq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Libm;

impl FloatMaths for Libm {
    const NAME: &'static str = "float32";

    #[inline(always)]
    fn root(v: f32) -> f32 {
        libm::sqrtf(v)
    }

    #[inline(always)]
    fn arc_tangent(t: f32) -> f32 {
        libm::atanf(t)
    }

    fn sin_cos(angle: f32) -> (f32, f32) {
        libm::sincosf(angle)
    }
}
