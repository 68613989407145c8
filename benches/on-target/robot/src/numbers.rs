//! A number system's lengths and angles as bits, so that "the same" means the same bits.

use fixed::types::{I10F6, I16F16};
use ik_core::number::float::{Float, FloatMaths};
use ik_core::{Fixed16, Fixed32, Number, Short32};

/// A number system whose values can be told bit for bit.
pub trait Bits: Number {
    /// A length from its bits.
    fn length_from(bits: u32) -> Self::Length;
    /// A length as it is stored.
    fn length_bits(length: Self::Length) -> u32;
    /// An angle as it is stored.
    fn angle_bits(angle: Self::Angle) -> u32;
}

impl<M: FloatMaths> Bits for Float<M> {
    fn length_from(bits: u32) -> f32 {
        f32::from_bits(bits)
    }

    fn length_bits(length: f32) -> u32 {
        length.to_bits()
    }

    fn angle_bits(angle: f32) -> u32 {
        angle.to_bits()
    }
}

impl Bits for Fixed32 {
    fn length_from(bits: u32) -> I16F16 {
        I16F16::from_bits(bits as i32)
    }

    fn length_bits(length: I16F16) -> u32 {
        length.to_bits() as u32
    }

    fn angle_bits(angle: Self::Angle) -> u32 {
        angle.to_bits() as u32
    }
}

impl Bits for Short32 {
    fn length_from(bits: u32) -> I16F16 {
        I16F16::from_bits(bits as i32)
    }

    fn length_bits(length: I16F16) -> u32 {
        length.to_bits() as u32
    }

    fn angle_bits(angle: Self::Angle) -> u32 {
        angle.to_bits() as u32
    }
}

impl Bits for Fixed16 {
    fn length_from(bits: u32) -> I10F6 {
        I10F6::from_bits(bits as i16)
    }

    fn length_bits(length: I10F6) -> u32 {
        length.to_bits() as u32
    }

    fn angle_bits(angle: Self::Angle) -> u32 {
        angle.to_bits() as u32
    }
}
