//! Which table of bounds a number system carries.

use crate::promises::{self, Bounds};
use ik_core::Number;

/// A table of bounds.
pub trait Table: Copy + std::fmt::Debug + PartialEq + Send + Sync + 'static {
    /// The bounds of the primitives.
    const BOUNDS: &'static Bounds;
    /// The number system itself: what its constructors make of a joint's limits is no matter of bounds.
    type System: Number;
}

macro_rules! tables {
    ($($name:ident = $bounds:ident of $system:ty;)*) => {$(
        /// The bounds of the number system of this name.
        #[derive(Debug, Clone, Copy, PartialEq)]
        pub struct $name;

        impl Table for $name {
            const BOUNDS: &'static Bounds = &promises::$bounds;
            type System = $system;
        }
    )*};
}

tables! {
    Float32 = FLOAT32 of ik_core::Float32;
    Coarse = COARSE of ik_core::Coarse;
    Fixed32 = FIXED32 of ik_core::Fixed32;
    Short32 = SHORT32 of ik_core::Short32;
    Fixed16 = FIXED16 of ik_core::Fixed16;
}
