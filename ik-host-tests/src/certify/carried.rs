//! Which table of bounds a number system carries.

use crate::promises::{self, Bounds};

/// A table of bounds.
pub trait Table: Copy + std::fmt::Debug + PartialEq + Send + Sync + 'static {
    /// The bounds of the primitives.
    const BOUNDS: &'static Bounds;
}

macro_rules! tables {
    ($($name:ident = $bounds:ident;)*) => {$(
        /// The bounds of the number system of this name.
        #[derive(Debug, Clone, Copy, PartialEq)]
        pub struct $name;

        impl Table for $name {
            const BOUNDS: &'static Bounds = &promises::$bounds;
        }
    )*};
}

tables! {
    Float32 = FLOAT32;
    Coarse = COARSE;
    Fixed32 = FIXED32;
    Short32 = SHORT32;
    Fixed16 = FIXED16;
}
