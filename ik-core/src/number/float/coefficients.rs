//! Coefficients of minimax polynomials, by Remez's exchange algorithm.
//!
//! Made by `cargo run -p ik-host-tests --example float-coefficients`; a test there compares. The errors are those of
//! the polynomials before their coefficients are rounded to `f32`.

/// 2·arctan t ≈ t·Σ c·t^2k on [0, 1], within 7.5e-8.
#[rustfmt::skip]
pub(super) const ARC_TANGENT: [f32; 8] = [
    1.9999987,
    -0.6665972,
    0.39893132,
    -0.27817258,
    0.19284394,
    -0.111824654,
    0.043725915,
    -0.008109135,
];

/// 4·arctan t ≈ t·Σ c·t^2k on [0, tan π/8], within 1.4e-8.
#[rustfmt::skip]
pub(super) const KNEE_ARC_TANGENT: [f32; 5] = [
    3.9999995,
    -1.3332878,
    0.79847056,
    -0.5501205,
    0.30917174,
];

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
