//! A number system's lengths and angles as bits, so that "the same" means the same bits.

use ik_core::number::float::{Float, FloatMaths};
use ik_core::{Fixed16, Fixed32, Number, Short32};

use crate::targets::Coordinate;

/// A number system whose values can be told bit for bit.
pub(crate) trait Bits: Number {
    /// A coordinate of a target, without rounding.
    fn coordinate(coordinate: Coordinate) -> Self::Length;
    /// A length as it is stored.
    fn length_bits(length: Self::Length) -> u32;
    /// An angle as it is stored.
    fn angle_bits(angle: Self::Angle) -> u32;
}

impl<M: FloatMaths> Bits for Float<M> {
    fn coordinate(coordinate: Coordinate) -> f32 {
        match coordinate {
            // Fewer than 24 bits and a power of two: exact.
            Coordinate::Steps(steps) => steps as f32 / Coordinate::STEPS_PER_MM as f32,
            Coordinate::Greatest => f32::MAX,
            Coordinate::Least => f32::MIN,
            Coordinate::Infinite => f32::INFINITY,
            Coordinate::NotANumber => f32::NAN,
        }
    }

    fn length_bits(length: f32) -> u32 {
        length.to_bits()
    }

    fn angle_bits(angle: f32) -> u32 {
        angle.to_bits()
    }
}

impl Bits for Fixed32 {
    fn coordinate(coordinate: Coordinate) -> Self::Length {
        match coordinate {
            Coordinate::Steps(steps) => {
                Self::Length::from_bits(steps * ((1 << 16) / Coordinate::STEPS_PER_MM))
            }
            Coordinate::Greatest | Coordinate::Infinite => Self::Length::MAX,
            Coordinate::Least | Coordinate::NotANumber => Self::Length::MIN,
        }
    }

    fn length_bits(length: Self::Length) -> u32 {
        length.to_bits() as u32
    }

    fn angle_bits(angle: Self::Angle) -> u32 {
        angle.to_bits() as u32
    }
}

impl Bits for Short32 {
    fn coordinate(coordinate: Coordinate) -> Self::Length {
        match coordinate {
            Coordinate::Steps(steps) => {
                Self::Length::from_bits(steps * ((1 << 16) / Coordinate::STEPS_PER_MM))
            }
            Coordinate::Greatest | Coordinate::Infinite => Self::Length::MAX,
            Coordinate::Least | Coordinate::NotANumber => Self::Length::MIN,
        }
    }

    fn length_bits(length: Self::Length) -> u32 {
        length.to_bits() as u32
    }

    fn angle_bits(angle: Self::Angle) -> u32 {
        angle.to_bits() as u32
    }
}

impl Bits for Fixed16 {
    fn coordinate(coordinate: Coordinate) -> Self::Length {
        match coordinate {
            Coordinate::Steps(steps) => {
                // Its own step; what is beyond ±512 mm is at the end of the range.
                Self::Length::from_bits(steps.clamp(i16::MIN.into(), i16::MAX.into()) as i16)
            }
            Coordinate::Greatest | Coordinate::Infinite => Self::Length::MAX,
            Coordinate::Least | Coordinate::NotANumber => Self::Length::MIN,
        }
    }

    fn length_bits(length: Self::Length) -> u32 {
        length.to_bits() as u32
    }

    fn angle_bits(angle: Self::Angle) -> u32 {
        angle.to_bits() as u32
    }
}
