//! Coefficients of minimax polynomials and quotients of polynomials, by Remez's exchange algorithm.
//!
//! Made by `cargo run -p ik-host-tests --example float-coefficients`; a test there compares. The errors are those
//! before the coefficients are rounded to `f32`.

use super::quotient::Quotient;

/// 2·arctan t − 2·t on [0, 1], within 2.9e-8; rounded and in `f32`, within 1.4e-7.
#[rustfmt::skip]
pub(super) const ARC_TANGENT: Quotient<3, 2> = Quotient {
    above: [
        -2.4500623,
        -1.3533605,
        -0.020641811,
    ],
    below: [
        3.6751297,
        4.2345433,
    ],
};

/// 2·arcsin t − 2·t on [0, √½], within 2.2e-7; rounded and in `f32`, within 2.8e-7.
#[rustfmt::skip]
pub(super) const ARC_SINE: Quotient<2, 2> = Quotient {
    above: [
        1.5702928,
        -0.95098865,
    ],
    below: [
        4.711326,
        -4.978683,
    ],
};

/// sin t ≈ t·Σ c·t^2k on [0, π/4], within 1.2e-9.
#[rustfmt::skip]
pub(super) const SINE: [f32; 4] = [
    1.0,
    -0.16666637,
    0.008331585,
    -0.00019462117,
];

/// cos t ≈ Σ c·t^2k on [0, π/4], within 4.7e-11.
#[rustfmt::skip]
pub(super) const COSINE: [f32; 5] = [
    1.0,
    -0.5,
    0.041666616,
    -0.0013886619,
    2.437993e-5,
];
