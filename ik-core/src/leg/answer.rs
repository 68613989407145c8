//! What comes of asking for a foot position.

use crate::angle::Joints;
use crate::limits::Held;
use crate::number::Number;

/// Joint angles, and whether they put the foot where it was asked to be.
// In whole words, or a 16-bit number system's answer is copied by a call of memcpy, which costs more than an angle.
#[derive(Debug, Clone, Copy, PartialEq)]
#[repr(align(4))]
pub struct Answer<N: Number> {
    /// The joint angles, always within the leg's joint ranges.
    pub joints: Joints<N>,
    /// What was done.
    pub outcome: Outcome,
    /// How far the foot is from where it was asked to be, mm: 0 if it is reached, the largest length there is
    /// if the asked foot was not finite.
    pub off_by: N::Length,
}

impl<N: Number> Answer<N> {
    /// A foot that is where it was asked to be.
    #[inline(always)]
    pub(crate) const fn reached(joints: Joints<N>) -> Self {
        Self { joints, outcome: Outcome::Reached, off_by: N::NO_LENGTH }
    }
}

/// What was done with a foot position.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum Outcome {
    /// Reached as asked, within the number system's rounding.
    Reached,
    /// Out of reach: moved to the closest reachable point.
    Moved,
    /// One joint or more was held by its range (after the foot was moved into reach, if need be).
    Held(Held),
    /// The foot was NaN or infinite: the pose given to hold was kept.
    NotFinite,
}

#[cfg(feature = "defmt")]
impl<N: Number> defmt::Format for Answer<N> {
    fn format(&self, f: defmt::Formatter<'_>) {
        let off = N::micrometres(self.off_by);
        defmt::write!(f, "{}; {}, off by {=i32} um", self.joints, self.outcome, off);
    }
}
