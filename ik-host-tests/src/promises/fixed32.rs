//! 32-bit fixed point.

use super::{
    AngleRounding, Bounds, KneeBounds, RadialSquare, Rounding, Squaring, Turning, nearest, unit_of_fixed,
};

/// 2^34.
const UPPER: f64 = 17_179_869_184.0;

/// `Fixed32`.
pub const FIXED32: Bounds = Bounds {
    number: "fixed32",
    unit_mm: |radius_mm| unit_of_fixed(16, 13, 1_073_741_760.0, radius_mm),
    most_radius_mm: 16_383.0,
    length: [0.0, 0.5 / 65_536.0],
    coord_of: nearest,
    product_of: |mm, unit| nearest(mm, 4.0 * unit),
    sum: Rounding::NONE,
    square: Squaring { linear: 0.0, up_to: 0.0, units2: 0.0 },
    square_constant: 0.5,
    cylinder: 0.5,
    root: Rounding { relative: 6e-9, units: 2.0 },
    radial: Rounding { relative: 6e-9, units: 2.0 },
    // A correction that is left out near the axis, and rounded elsewhere.
    radial_square: RadialSquare { product: 1e-15, linear: 0.03, units2: 4_600_000.0 },
    // The upper word alone: four units.
    stretch: Rounding { relative: 0.0, units: 4.0 },
    widen: Rounding { relative: 0.0, units: 4.0 },
    product_sum: Rounding::NONE,
    // The expansion's 3e-7; upper words alone, which the longer vectors feel less; cut off to products if short.
    turn: Turning {
        rad: 3e-7,
        obtuse_rad: 3e-7,
        units: 8.0,
        units2: [UPPER, 3.25 * UPPER],
        most_rad: 1.05e-6,
        by_products_from: 268_500_000.0,
    },
    hip: Turning {
        rad: 3e-7,
        obtuse_rad: 3e-7,
        units: 2.0,
        units2: [UPPER / 4.0, UPPER],
        most_rad: 1.25e-6,
        by_products_from: 134_250_000.0,
    },
    yaw: Turning {
        rad: 3e-7,
        obtuse_rad: 3e-7,
        units: 4.0,
        units2: [0.0; 2],
        most_rad: 0.0,
        by_products_from: f64::INFINITY,
    },
    knee: KneeBounds {
        sine: Rounding { relative: 7.5e-9, units: 2.0 },
        sine_rest: 7.5e-9,
        angle_rad: 4.02e-7,
        folded_rad: 2e-9,
        half_sine: 2.5e-7,
        from_end: 1e-9,
    },
    rescale: Rounding { relative: 0.0, units: 3.0 },
    rescale_common: 0.0,
    angle: AngleRounding { relative: 0.0, rad: 1.5e-9 },
    line: 0.75 / 1_073_741_824.0,
};
