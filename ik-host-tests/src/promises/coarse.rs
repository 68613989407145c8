//! Single precision with micromath's functions.

use super::float32::{ROUNDED, STEPS};
use super::{AngleRounding, Bounds, KneeBounds, RadialSquare, Rounding, Turning, single, step_of_floats};

/// `Coarse`.
pub const COARSE: Bounds = Bounds {
    number: "coarse",
    unit_mm: step_of_floats,
    most_radius_mm: 16_383.0,
    length: [super::float32::ULP, 0.0],
    coord_of: single,
    product_of: single,
    sum: ROUNDED,
    square: STEPS,
    square_constant: 0.5,
    cylinder: 16.5,
    root: Rounding { relative: 2.2e-3, units: 0.0 },
    radial: Rounding { relative: 2.2e-3, units: 4.0 },
    // The root is off by so much that the second order counts.
    radial_square: RadialSquare { product: 1e-5, linear: 2.0, units2: 33_554_432.0 },
    stretch: ROUNDED,
    widen: ROUNDED,
    product_sum: ROUNDED,
    turn: Turning {
        rad: 6e-3,
        obtuse_rad: 6e-3,
        units: 0.0,
        units2: [0.0; 2],
        most_rad: 0.0,
        by_products_from: 0.0,
    },
    hip: Turning {
        rad: 6e-3,
        obtuse_rad: 6e-3,
        units: 0.0,
        units2: [0.0; 2],
        most_rad: 0.0,
        by_products_from: 0.0,
    },
    yaw: Turning {
        rad: 6e-3,
        obtuse_rad: 6e-3,
        units: 0.0,
        units2: [0.0; 2],
        most_rad: 0.0,
        by_products_from: f64::INFINITY,
    },
    knee: KneeBounds {
        sine: Rounding { relative: 2.3e-3, units: 0.0 },
        sine_rest: 0.0,
        angle_rad: 1.3e-2,
        folded_rad: 2.1e-7,
        half_sine: 1.2e-3,
        from_end: 1e-7,
    },
    rescale: Rounding { relative: 1.05 * super::float32::ULP, units: 0.0 },
    rescale_common: 1.05 * super::float32::ULP,
    angle: AngleRounding { relative: 2.05 * super::float32::ULP, rad: 0.0 },
    line: super::float32::ULP * 2.0,
};
