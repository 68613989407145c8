//! 32-bit fixed point without long multiplication.

use super::{
    AngleRounding, Bounds, KneeBounds, RadialSquare, Rounding, Squaring, Turning, nearest, unit_of_fixed,
};

/// What a square counts in, units².
const SQUARES: f64 = 268_435_456.0;

/// `Short32`.
pub const SHORT32: Bounds = Bounds {
    number: "short32",
    unit_mm: |radius_mm| unit_of_fixed(16, 40, 438_000_000.0, radius_mm),
    most_radius_mm: 6_683.0,
    length: [0.0, 0.5 / 65_536.0],
    coord_of: nearest,
    product_of: nearest,
    sum: Rounding::NONE,
    // Less by two at the most, and cut off.
    square: Squaring { linear: 0.0, up_to: 0.0, units2: 3.0 * SQUARES },
    square_constant: 0.5 * SQUARES,
    // Four are taken off.
    cylinder: 4.5 * SQUARES,
    root: Rounding { relative: 1.6e-8, units: 2.0 },
    radial: Rounding { relative: 1.6e-8, units: 2.0 },
    // The root's error, twice c times; a product that lacks up to six of 2^30 units².
    radial_square: RadialSquare { product: 3.3e-8, linear: 4.0, units2: 24.0 * SQUARES },
    stretch: Rounding { relative: 0.0, units: 6.0 },
    widen: Rounding::NONE,
    product_sum: Rounding::NONE,
    turn: Turning {
        rad: 1.1e-6,
        obtuse_rad: 1.1e-6,
        units: 0.0,
        units2: [0.0; 2],
        most_rad: 0.0,
        by_products_from: f64::INFINITY,
    },
    hip: Turning {
        rad: 1.1e-6,
        obtuse_rad: 1.1e-6,
        units: 0.0,
        units2: [0.0; 2],
        most_rad: 0.0,
        by_products_from: f64::INFINITY,
    },
    yaw: Turning {
        rad: 1.1e-6,
        obtuse_rad: 1.1e-6,
        units: 2.0,
        units2: [0.0; 2],
        most_rad: 0.0,
        by_products_from: f64::INFINITY,
    },
    knee: KneeBounds {
        sine: Rounding { relative: 2.2e-8, units: 0.0 },
        sine_rest: 8e-9,
        angle_rad: 4.55e-7,
        folded_rad: 2e-9,
        half_sine: 2.4e-7,
        from_end: 3e-9,
    },
    // Three squares, each of which lacks up to three of 2^28 units² of a vector of 2^26 units or more.
    rescale: Rounding { relative: 1.6e-8, units: 5.0 },
    rescale_common: 3e-7,
    angle: AngleRounding { relative: 0.0, rad: 1.5e-9 },
    line: 1.75 / 1_073_741_824.0,
};
