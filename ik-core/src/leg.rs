//! The leg: from a foot position to three joint angles and back.
//!
//! # The algebra
//!
//! A hip stage finds the plane of the leg; within it thigh L1 and shank L2 form a triangle with the line of
//! length G from thigh joint to foot. The foot in the plane is (D, X): D down from the hip of a roll-hip leg or
//! outward from the femur joint of a yaw-hip leg, X forward or up.
//!
//! ```text
//! n     = (L1+L2)² − G²        m = 4·L1·L2 − n          q = √(n·m) = 2·L1·L2·sin knee
//! P     = 2·L1·(L1+L2) − n
//! knee  = angle of (2·L1·L2 − n, q)                     norm 2·L1·L2
//! thigh = angle of (D·P ∓ X·q, X·P ± D·q)               norm 2·L1·G²
//! ```
//!
//! No arccosine and no arcsine: both lose half of the digits at an end of their range. `n` is formed from exact
//! squares, because a knee near straight goes with √n. Every norm is known before the angle is wanted, so an
//! angle is 2·arctan(y / (norm + |x|)), whose argument never leaves [−1, 1]; and knee and thigh share one q, so
//! that what rounding does to the one the other undoes in the foot. (The half-angle form follows Kahan,
//! "Miscalculating Area and Angles of a Needle-like Triangle".) P, q and n are taken in the unit 4·L1·L2.
//!
//! # Where a leg is singular
//!
//! On a roll-hip leg's inner cylinder (D = 0) and at the yaw axis of a yaw-hip leg the hip angle goes with the
//! root of the rounding error, and at a straight or fully folded leg so do knee and thigh. The foot stays where
//! it should; the survey of the host harness shows by how much.

mod answer;
mod constants;
mod roll_hip;
mod triangle;
mod yaw_hip;

pub use crate::limits::Held;
pub use answer::{Answer, Outcome};

use crate::angle::{Angle, Joints};
use crate::foot::Foot;
use crate::geometry::{Dimensions, GeometryError};
use crate::limits::Limits;
use crate::number::{Number, Placed};
use constants::{Constants, constants};
use core::marker::PhantomData;

use sealed::Plane;

mod sealed {
    use super::{Constants, Joints, Number};
    use crate::angle::Angle;

    /// The plane of a leg and the foot within it.
    #[derive(Debug, Clone, Copy)]
    pub struct Plane<N: Number> {
        pub(crate) hip: Angle<N>,
        /// X: forward (roll-hip) or up (yaw-hip).
        pub(crate) across: N::Coord,
        /// D: down from the hip (roll-hip) or outward from the femur joint (yaw-hip).
        pub(crate) along: N::Coord,
        /// (L1+L2)² − G², exact, within [0, 4·L1·L2].
        pub(crate) n: N::Square,
    }

    /// The hip stage.
    pub trait Stage {
        /// The plane of the leg for a foot within the working range; `None` if it is out of reach.
        fn plane<N: Number>(leg: &Constants<N>, foot: [N::Coord; 3]) -> Option<Plane<N>>;
        /// The plane for the reachable point that is closest to a foot out of reach; the foot may have been
        /// halved so many times.
        fn closest<N: Number>(leg: &Constants<N>, foot: [N::Coord; 3], halvings: Option<u32>) -> Plane<N>;
        /// The foot at (across, along) in the plane at the given hip angle.
        fn foot<N: Number>(leg: &Constants<N>, joints: &Joints<N>) -> [N::Coord; 3];
    }
}

/// What the first joint does: [`RollHip`](crate::RollHip) or [`YawHip`](crate::YawHip).
pub trait Hip: sealed::Stage + Copy + core::fmt::Debug + PartialEq + 'static {
    /// Its name in reports and sheets.
    const NAME: &'static str;
}

/// A leg: its measures, the side its knee bends to, and its joint ranges. A `const` one lives in flash.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Leg<H: Hip, N: Number> {
    constants: Constants<N>,
    limits: Limits<N>,
    hip: PhantomData<H>,
}

#[cfg(feature = "fixed32")]
impl<H: Hip> Leg<H, crate::Fixed32> {
    /// A leg with free joints.
    ///
    /// # Errors
    /// If the leg is too long or too short for the number system.
    pub const fn new(dimensions: Dimensions<H>) -> Result<Self, GeometryError> {
        match constants!(crate::Fixed32, dimensions) {
            Ok(constants) => Ok(Self { constants, limits: Limits::FREE, hip: PhantomData }),
            Err(error) => Err(error),
        }
    }
}

#[cfg(any(feature = "float32", feature = "coarse"))]
impl<H: Hip, M: crate::number::float::FloatMaths> Leg<H, crate::number::float::Float<M>> {
    /// A leg with free joints.
    ///
    /// # Errors
    /// If the leg is too long or too short for the number system.
    pub const fn new(dimensions: Dimensions<H>) -> Result<Self, GeometryError> {
        match constants!(crate::number::float::Float<M>, dimensions) {
            Ok(constants) => Ok(Self { constants, limits: Limits::FREE, hip: PhantomData }),
            Err(error) => Err(error),
        }
    }
}

impl<H: Hip, N: Number> Leg<H, N> {
    /// Like `new`, for any number system, while running.
    ///
    /// # Errors
    /// If the leg is too long or too short for the number system.
    pub fn from_dimensions(dimensions: Dimensions<H>) -> Result<Self, GeometryError> {
        constants!(N, dimensions).map(|constants| Self { constants, limits: Limits::FREE, hip: PhantomData })
    }

    /// The same leg with joint ranges.
    #[must_use]
    pub const fn with_limits(self, limits: Limits<N>) -> Self {
        Self { constants: self.constants, limits, hip: PhantomData }
    }

    /// The joint ranges; [`Limits::FREE`] unless they were given.
    pub const fn limits(&self) -> Limits<N> {
        self.limits
    }

    /// The joint angles that put the foot at `foot` (leg frame), or as near as reach and ranges allow.
    ///
    /// Every input has an answer, and the answer says what was done: a foot out of reach is moved to the closest
    /// reachable point; then each joint is held within its range; `off_by` is how far the foot is then from
    /// where it was asked to be, by this number system's own forward kinematics. A foot that is NaN or infinite
    /// is reported, and the answer is the pose `hold`, within the joint ranges: give it the last pose.
    ///
    /// Where a direction is undefined, one is chosen: with the foot on the hip's own axis the hip is at 0; a
    /// foot on a roll-hip leg's origin without offset hangs straight down; one on a yaw-hip leg's femur joint is
    /// moved outward.
    #[inline]
    pub fn solve(&self, foot: Foot<N>, hold: Joints<N>) -> Answer<N> {
        let (plane, moved) = match N::place(foot.lengths(), self.constants.scale) {
            Placed::Near(point) => match H::plane(&self.constants, point) {
                Some(plane) => (plane, false),
                None => (H::closest(&self.constants, point, None), true),
            },
            Placed::Far(point, halvings) => (H::closest(&self.constants, point, Some(halvings)), true),
            Placed::NotFinite => return self.kept(hold),
        };
        let (thigh, knee) = triangle::angles(&self.constants, &plane);
        let wanted = Joints { hip: plane.hip, thigh: Angle(thigh), knee: Angle(knee) };
        let (joints, held) = self.limits.hold(wanted);
        if !moved && !held.any() {
            return Answer { joints, outcome: Outcome::Reached, off_by: N::NO_LENGTH };
        }
        self.explained(foot, joints, held)
    }

    /// Where the foot is (leg frame) with the joints at the given angles; total, ranges are not looked at.
    pub fn forward(&self, joints: &Joints<N>) -> Foot<N> {
        let [x, y, z] = H::foot(&self.constants, joints).map(|coord| N::length(coord, self.constants.scale));
        Foot { x, y, z }
    }

    /// The answer for a foot that is not where it was asked to be.
    #[cold]
    fn explained(&self, foot: Foot<N>, joints: Joints<N>, held: Held) -> Answer<N> {
        let off_by = N::distance(foot.lengths(), self.forward(&joints).lengths());
        let outcome = if held.any() { Outcome::Held(held) } else { Outcome::Moved };
        Answer { joints, outcome, off_by }
    }

    /// The answer for a foot that is nowhere.
    #[cold]
    fn kept(&self, pose: Joints<N>) -> Answer<N> {
        Answer { joints: self.limits.hold(pose).0, outcome: Outcome::NotFinite, off_by: N::FARTHEST }
    }
}
