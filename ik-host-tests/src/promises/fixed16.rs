//! 16-bit fixed point.

use super::{
    AngleRounding, Bounds, KneeBounds, RadialSquare, Rounding, Squaring, Turning, nearest, unit_of_fixed,
};

/// `Fixed16`.
pub const FIXED16: Bounds = Bounds {
    number: "fixed16",
    unit_mm: |radius_mm| unit_of_fixed(6, 40, 29_000.0, radius_mm),
    most_radius_mm: 453.0,
    length: [0.0, 0.5 / 64.0],
    coord_of: nearest,
    product_of: |mm, unit| nearest(mm, unit / 2.0),
    sum: Rounding::NONE,
    square: Squaring { linear: 0.0, up_to: 0.0, units2: 0.0 },
    square_constant: 0.5,
    cylinder: 0.5,
    root: Rounding { relative: 3.1e-5, units: 0.5 },
    radial: Rounding { relative: 3.1e-5, units: 0.5 },
    radial_square: RadialSquare { product: 8e-7, linear: 0.015, units2: 6.0 },
    // A product has a bit more than a coordinate, and is rounded.
    stretch: Rounding { relative: 0.0, units: 0.25 },
    widen: Rounding { relative: 0.0, units: 0.25 },
    product_sum: Rounding::NONE,
    turn: Turning {
        rad: 1.4e-4,
        obtuse_rad: 1.4e-4,
        units: 0.0,
        units2: [0.0; 2],
        most_rad: 0.0,
        by_products_from: 0.0,
    },
    hip: Turning {
        rad: 1.4e-4,
        obtuse_rad: 1.4e-4,
        units: 0.0,
        units2: [0.0; 2],
        most_rad: 0.0,
        by_products_from: 0.0,
    },
    yaw: Turning {
        rad: 1.4e-4,
        obtuse_rad: 1.4e-4,
        units: 0.0,
        units2: [0.0; 2],
        most_rad: 0.0,
        by_products_from: f64::INFINITY,
    },
    knee: KneeBounds {
        sine: Rounding { relative: 8e-5, units: 0.0 },
        sine_rest: 1.7e-5,
        angle_rad: 7.9e-5,
        folded_rad: 0.0,
        half_sine: 3.1e-5,
        from_end: 1.65e-5,
    },
    rescale: Rounding { relative: 0.0, units: 1.0 },
    rescale_common: 0.0,
    angle: AngleRounding { relative: 0.0, rad: 9.6e-5 },
    line: 0.75 / 1_073_741_824.0,
};
