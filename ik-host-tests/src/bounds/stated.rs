//! The bounds that are stated.

use super::Quantity;
use crate::sheet::NumberSystem;
use serde::Serialize;

/// A bound of a quantity.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Bound {
    /// Of what.
    pub quantity: Quantity,
    /// No error is larger, as the quantity counts it.
    pub bound: f64,
}

/// The bounds of a number system, in the order of [`Quantity::ALL`].
pub fn stated(number: NumberSystem) -> [Bound; Quantity::ALL.len()] {
    let column = match number {
        NumberSystem::Float32 => 0,
        NumberSystem::Coarse => 1,
        NumberSystem::Fixed32 => 2,
        NumberSystem::Short32 => 3,
        NumberSystem::Fixed16 => 4,
    };
    TABLE.map(|(quantity, bounds)| Bound { quantity, bound: bounds[column] })
}

/// By number system: float32, coarse, fixed32, short32, fixed16. Each is a tenth above what
/// `toehold bounds --rounds 4000000` found; turns of short32 are as its arctangent's own test finds them where they are worst.
#[rustfmt::skip]
const TABLE: [(Quantity, [f64; 5]); Quantity::ALL.len()] = [
    (Quantity::Turn,         [ 4.6e-7, 6.20e-3,  9.8e-7, 1.05e-6, 1.33e-4]),
    (Quantity::Turned,       [ 4.1e-7, 6.20e-3,  4.7e-7,  9.6e-7, 1.60e-4]),
    (Quantity::HipAngle,     [ 4.7e-7, 6.20e-3,  9.5e-7, 1.05e-6, 1.33e-4]),
    (Quantity::YawAngle,     [   4e-7, 6.20e-3,  3.1e-7, 1.05e-6, 1.33e-4]),
    (Quantity::KneeAngle,    [6.8e-7, 1.25e-2,   4e-7, 4.8e-7, 2.10e-4]),
    (Quantity::HalfSine,     [1.05e-7, 9.50e-4, 2.5e-7, 2.4e-7, 8.4e-5]),
    (Quantity::FromEnd,      [2.5e-7, 1.90e-3, 2.6e-8, 2.8e-8, 1.15e-4]),
    (Quantity::Root,         [6.7e-8, 1.35e-3,   3e-9, 1.8e-8, 5.6e-5]),
    (Quantity::Radial,       [6.7e-8, 1.35e-3,   3e-9, 5.7e-7, 5.6e-5]),
    (Quantity::RadialSquare, [3.6e-9, 1.4e-6,   2e-9, 5.4e-7, 4.6e-6]),
    (Quantity::Depth,        [1.13e-7, 1.90e-3,   5e-9, 4.7e-8, 9.6e-5]),
    (Quantity::Sine,         [1.28e-7, 1.20e-3, 1.13e-8, 1.02e-8, 1.20e-4]),
    (Quantity::Rescale,      [  9e-8,   9e-8, 2.6e-9,   5e-9, 7.5e-5]),
    (Quantity::Distance,     [2.4e-7, 1.90e-3, 2.1e-8, 6.2e-8, 3.80e-4]),
];
