//! Where a leg sits on the body, and on which side.

use crate::foot::Foot;
use crate::number::Number;

/// The side of the body that a leg is on.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum Side {
    /// Left: outboard is the body's +y.
    Left,
    /// Right: outboard is the body's −y; the leg is a left leg mirrored.
    Right,
}

/// A leg's place on the body (x forward, y left, z up): its first joint's axis, and its side.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Mounting<N: Number> {
    at: Foot<N>,
    side: Side,
}

impl<N: Number> Mounting<N> {
    /// A leg's place: `at` in the body's frame.
    pub const fn new(at: Foot<N>, side: Side) -> Self {
        Self { at, side }
    }

    /// The side.
    pub const fn side(&self) -> Side {
        self.side
    }

    /// A foot in the body's frame as the leg sees it (x forward, y outboard, z up); saturates.
    #[inline]
    pub fn leg_frame(&self, foot: Foot<N>) -> Foot<N> {
        let apart = N::length_difference;
        Foot {
            x: apart(foot.x, self.at.x),
            y: N::length_difference_or_mirrored(foot.y, self.at.y, matches!(self.side, Side::Right)),
            z: apart(foot.z, self.at.z),
        }
    }

    /// A foot in the leg's frame as the body sees it; saturates.
    #[inline]
    pub fn body_frame(&self, foot: Foot<N>) -> Foot<N> {
        let apart = N::length_difference;
        let sum = |a: N::Length, b: N::Length| apart(a, apart(N::NO_LENGTH, b));
        Foot {
            x: sum(self.at.x, foot.x),
            y: match self.side {
                Side::Left => sum(self.at.y, foot.y),
                Side::Right => apart(self.at.y, foot.y),
            },
            z: sum(self.at.z, foot.z),
        }
    }
}

#[cfg(feature = "defmt")]
impl<N: Number> defmt::Format for Mounting<N> {
    fn format(&self, f: defmt::Formatter<'_>) {
        defmt::write!(f, "{} at {}", self.side, self.at);
    }
}
