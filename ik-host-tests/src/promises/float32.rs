//! Single precision with functions of our own.

use super::{
    AngleRounding, Bounds, KneeBounds, RadialSquare, Rounding, Squaring, Turning, single, step_of_floats,
};

/// Half a unit in the last place.
pub(super) const ULP: f64 = 1.0 / 16_777_216.0;
pub(super) const ROUNDED: Rounding = Rounding { relative: ULP, units: 0.0 };
/// Coordinates are cut off to whole steps before they are squared; those of more than 24 bits are whole.
pub(super) const STEPS: Squaring = Squaring { linear: 2.0, up_to: 16_777_216.0, units2: 1.0 };

/// `Float32`.
pub const FLOAT32: Bounds = Bounds {
    number: "float32",
    unit_mm: step_of_floats,
    most_radius_mm: 16_383.0,
    length: [ULP, 0.0],
    coord_of: single,
    product_of: single,
    sum: ROUNDED,
    square: STEPS,
    square_constant: 0.5,
    // A hair (4 steps) is taken off.
    cylinder: 16.5,
    // What is under the root is off by a unit in the last place, which counts half; and the root is rounded.
    root: Rounding { relative: 2.05 * ULP, units: 0.0 },
    // No less than a hair.
    radial: Rounding { relative: 2.05 * ULP, units: 4.0 },
    radial_square: RadialSquare { product: 4e-13, linear: 2.0, units2: 512.0 },
    stretch: ROUNDED,
    widen: ROUNDED,
    product_sum: ROUNDED,
    // The polynomial's 1.7e-7; two products and their difference, two sums and a quotient.
    turn: Turning {
        rad: 4e-7,
        obtuse_rad: 5.6e-7,
        units: 0.0,
        units2: [0.0; 2],
        most_rad: 0.0,
        by_products_from: 0.0,
    },
    hip: Turning {
        rad: 4e-7,
        obtuse_rad: 5.6e-7,
        units: 0.0,
        units2: [0.0; 2],
        most_rad: 0.0,
        by_products_from: 0.0,
    },
    // The polynomial's 1.7e-7, a sum and a quotient; π less that, behind.
    yaw: Turning {
        rad: 2.9e-7,
        obtuse_rad: 5e-7,
        units: 0.0,
        units2: [0.0; 2],
        most_rad: 0.0,
        by_products_from: f64::INFINITY,
    },
    knee: KneeBounds {
        sine: Rounding { relative: 4.1 * ULP, units: 0.0 },
        sine_rest: 0.0,
        angle_rad: 3.1e-7,
        folded_rad: 2.1e-7,
        half_sine: 8e-8,
        from_end: 0.5 * ULP,
    },
    rescale: Rounding { relative: 1.05 * ULP, units: 0.0 },
    rescale_common: 1.05 * ULP,
    angle: AngleRounding { relative: 2.05 * ULP, rad: 0.0 },
    line: 2.0 * ULP,
};
