//! The leg: from a foot position to three joint angles and back.
//!
//! # The algebra
//!
//! A hip stage finds the plane of the leg; within it thigh L1 and shank L2 form a triangle with the line of
//! length G from thigh joint to foot. The foot in the plane is (D, X): D down from the hip of a roll-hip leg or
//! outward from the femur joint of a yaw-hip leg, X forward or up.
//!
//! ```text
//! n     = (L1+L2)² − G²        m = 4·L1·L2 − n          the smaller of them, over 4·L1·L2: e
//! knee  = 2·arcsin √e, or half a turn less that          ½·sin knee = √(e·(1−e))
//! w     = (L1 + L2 − 2·L2·e, ∓ 2·L2·½·sin knee)         from straight; from folded (L1 − L2 + 2·L2·e, …)
//! thigh = what turns w to (D, X)                        both G long
//! hip   = what turns (a, −D) to (y, z)                  roll-hip; both √(y² + z²) long
//! ```
//!
//! w is where the foot would be if the thigh hung straight down. No arccosine of a difference: it loses half of the digits
//! at an end of its range. n is formed from exact squares, because a knee near straight goes with √n; and e is counted from
//! the nearer end of the reach, straight or folded, so that nothing is lost near either. The angle between two vectors u, v of
//! the same length comes of its half, whose tangent never leaves [−1, 1] where it is usual:
//!
//! ```text
//! tan ½angle = (u × v) / (u² + u·v) = (v_y − u_y) / (v_x + u_x) = (u_x − v_x) / (v_y + u_y)
//! ```
//!
//! A number system takes whichever costs it least ([`Number::turn`]). Knee and thigh share one e, so that what rounding does
//! to the one the other undoes in the foot: with e off, w is as long as the triangle so bent, and the foot only moves along
//! the line from the thigh's joint. (Half-angle forms: Kahan, "Miscalculating Area and Angles of a Needle-like Triangle".)
//!
//! # Where a leg is singular
//!
//! At a straight or fully folded leg the knee goes with the root of what the foot is short of its reach, and on the hip's
//! axis (the yaw axis; or a roll-hip leg's inner cylinder, D = 0) so does the hip, or has no direction at all. There a joint
//! is worth less than elsewhere, and the foot as much as everywhere: what is lost is what the foot does not feel. Largest
//! errors on the demo legs, rad, each between the distance given and three times as far (`toehold bounds --rounds 1000000`;
//! a dash: every such foot is moved):
//!
//! | | `Float32` | `Fixed32` | `Short32` | `Fixed16` |
//! | --- | --- | --- | --- | --- |
//! | knee, 1e-1 rad from straight | 1e-7 | 1e-7 | 9e-7 | 9e-5 |
//! | knee, 1e-2 rad from straight | 5e-9 | 7e-8 | 7e-6 | 2e-4 |
//! | knee, 1e-3 rad from straight | 3e-8 | 4e-8 | 7e-5 | 4e-4 |
//! | knee, 1e-4 rad from straight | 2e-6 | 2e-7 | 3e-4 | 3e-4 |
//! | knee, 1e-5 rad from straight | 1e-6 | 3e-7 | 3e-4 | 3e-4 |
//! | knee, 1e-1 rad from folded | 3e-7 | 1e-7 | 5e-5 | 9e-5 |
//! | knee, 1e-2 rad from folded | 2e-7 | 2e-7 | 4e-5 | 6e-4 |
//! | knee, 1e-3 rad from folded | 1e-6 | 1e-6 | 4e-4 | 6e-4 |
//! | knee, 1e-4 rad from folded | 1e-5 | 3e-5 | 8e-4 | 6e-4 |
//! | knee, 1e-5 rad from folded | 5e-5 | 3e-5 | 9e-4 | 6e-4 |
//! | hip, foot 1e-1 of the reach from its axis | 3e-7 | 7e-7 | 1e-6 | 4e-4 |
//! | hip, foot 1e-2 of the reach from its axis | 2e-7 | 9e-7 | 2e-5 | 4e-3 |
//! | hip, foot 1e-3 of the reach from its axis | 1e-6 | 2e-6 | 4e-6 | 2e-2 |
//! | hip, foot 1e-4 of the reach from its axis | 1e-5 | 2e-5 | 4e-5 | 1e-1 |
//! | hip, foot 1e-5 of the reach from its axis | 1e-4 | 2e-4 | 4e-4 | 3e-4 |
//!
//! The foot, of thigh and shank together, all along: `Float32` 4.5e-7, `Fixed32` 3.7e-7, `Short32` 8.5e-7, `Fixed16` 2.3e-4.
//! A controller that takes speeds from differences of joint angles should keep clear of these places, or limit its slew there.

mod answer;
pub(crate) mod constants;
mod roll_hip;
mod triangle;
mod yaw_hip;

pub use crate::limits::Held;
pub use answer::{Answer, Outcome};

use crate::angle::{Angle, Joints};
use crate::foot::Foot;
use crate::geometry::{Dimensions, GeometryError};
use crate::limits::{End, Limits, Ranges};
use crate::number::{Number, Placed};
use constants::{Constants, constants};
use core::marker::PhantomData;

use sealed::{Beyond, Plane};

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
        /// (L1+L2)² − G², exact, within [`Constants::straightest`] and [`Constants::most_folded`].
        pub(crate) n: N::Square,
    }

    /// What a foot out of reach lies beyond. It is decided once, from exact squares: a second look at rounded
    /// lengths might decide otherwise.
    #[derive(Debug, Clone, Copy, PartialEq, Eq)]
    pub enum Beyond {
        /// The outer end, with the knee at its least.
        Outer,
        /// The inner end, with the knee at its most.
        Inner,
        /// Roll-hip: the cylinder around the hip's axis.
        Cylinder,
    }

    /// The hip stage.
    pub trait Stage {
        /// The plane of the leg for a foot within the working range, or what it lies beyond.
        fn plane<N: Number>(leg: &Constants<N>, foot: [N::Coord; 3]) -> Result<Plane<N>, Beyond>;
        /// The plane for the reachable point that is closest to a foot out of reach, which may have been halved so
        /// many times; and the end of the knee's range that it comes to, if it does.
        fn closest<N: Number>(
            leg: &Constants<N>,
            foot: [N::Coord; 3],
            beyond: Beyond,
            halvings: u32,
        ) -> (Plane<N>, Option<crate::limits::End>);
        /// The foot (leg frame).
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
    hip: PhantomData<H>,
}

/// `new` as a `const fn` for each number system, which a trait cannot give.
macro_rules! leg_while_compiling {
    ($(#[$feature:meta] [$($generics:tt)*] $number:ty;)*) => {$(
        #[$feature]
        impl<H: Hip, $($generics)*> Leg<H, $number> {
            /// A leg; with free joints if the limits are [`Limits::FREE`].
            ///
            /// # Errors
            /// If the leg is too long or too short for the number system.
            pub const fn new(dimensions: Dimensions<H>, limits: Limits) -> Result<Self, GeometryError> {
                match constants!($number, dimensions, limits) {
                    Ok(constants) => Ok(Self { constants, hip: PhantomData }),
                    Err(error) => Err(error),
                }
            }
        }
    )*};
}

leg_while_compiling! {
    #[cfg(feature = "fixed16")] [] crate::Fixed16;
    #[cfg(feature = "fixed32")] [] crate::Fixed32;
    #[cfg(feature = "short32")] [] crate::Short32;
    #[cfg(any(feature = "float32", feature = "coarse"))]
    [M: crate::number::float::FloatMaths] crate::number::float::Float<M>;
}

impl<H: Hip, N: Number> Leg<H, N> {
    /// Like `new`, for any number system, while running.
    ///
    /// # Errors
    /// If the leg is too long or too short for the number system.
    pub fn from_dimensions(dimensions: Dimensions<H>, limits: Limits) -> Result<Self, GeometryError> {
        constants!(N, dimensions, limits).map(|constants| Self { constants, hip: PhantomData })
    }

    /// Whether the knee bends backward or down: the shank then swings as thigh and knee together, else as their
    /// difference.
    pub(crate) const fn bends_back(&self) -> bool {
        self.constants.bends_back
    }

    /// The joint ranges, as the number system holds them.
    pub const fn ranges(&self) -> Ranges<N> {
        self.constants.ranges
    }

    /// The joint angles that put the foot at `foot` (leg frame), or as near as reach and ranges allow.
    ///
    /// Every input has an answer, and the answer says what was done:
    /// - The reach ends where the links end it, or the knee's range if that is narrower. A foot out of reach is
    ///   moved to the closest reachable point.
    /// - Then hip and thigh are held within their ranges, each on its own.
    /// - `off_by` is how far the foot is then from where it was asked to be, by this number system's own forward
    ///   kinematics.
    /// - A foot that is NaN or infinite is reported, and the answer is the pose `hold`, within the joint ranges:
    ///   give it the last pose.
    ///
    /// Where a direction is undefined, one is chosen: with the foot on the hip's own axis the hip is at 0; a
    /// foot on a roll-hip leg's origin without offset hangs straight down; one on a yaw-hip leg's femur joint is
    /// moved outward.
    #[inline]
    pub fn solve(&self, foot: Foot<N>, hold: Joints<N>) -> Answer<N> {
        match self.usual(foot) {
            Some(joints) => Answer::reached(joints),
            None => self.unusual(foot, hold),
        }
    }

    /// The way of nearly every foot, which is within reach and asks for nothing beyond the joint ranges; whatever is
    /// unusual about one sends it to [`unusual`](Leg::unusual), which decides anew.
    #[inline(always)]
    pub(crate) fn usual(&self, foot: Foot<N>) -> Option<Joints<N>> {
        let leg = &self.constants;
        let point = N::near(foot.lengths(), leg.scale)?;
        let plane = H::plane(leg, point).ok()?;
        let (thigh, knee) = triangle::angles(leg, &plane);
        leg.ranges.contain(plane.hip.0, thigh, knee).then_some(Joints {
            hip: plane.hip,
            thigh: Angle(thigh),
            knee: Angle(knee),
        })
    }

    /// The answer for a foot that is out of reach, held by a joint range, or nowhere.
    #[cold]
    #[inline(never)]
    pub(crate) fn unusual(&self, foot: Foot<N>, hold: Joints<N>) -> Answer<N> {
        let leg = &self.constants;
        let plane = match N::place(foot.lengths(), leg.scale) {
            Placed::Near(point) => match H::plane(leg, point) {
                Ok(plane) => plane,
                Err(beyond) => return self.moved(foot, H::closest(leg, point, beyond, 0)),
            },
            Placed::Far(point, halvings) => {
                return self.moved(foot, H::closest(leg, point, Beyond::Outer, halvings));
            }
            Placed::NotFinite => return self.kept(hold),
        };
        let (joints, mut held) = self.held(&plane);
        // The knee is within its range but for rounding, or the foot would be out of reach.
        held.knee = None;
        if held.any() {
            return self.explained(foot, joints, held);
        }
        Answer::reached(joints)
    }

    /// Where the foot is (leg frame) with the joints at the given angles; total, ranges are not looked at.
    pub fn forward(&self, joints: &Joints<N>) -> Foot<N> {
        let [x, y, z] = H::foot(&self.constants, joints).map(|coord| N::length(coord, self.constants.scale));
        Foot { x, y, z }
    }

    /// The joint angles for a foot in the plane, within their ranges.
    fn held(&self, plane: &Plane<N>) -> (Joints<N>, Held) {
        let (thigh, knee) = triangle::angles(&self.constants, plane);
        self.constants.ranges.hold(Joints { hip: plane.hip, thigh: Angle(thigh), knee: Angle(knee) })
    }

    /// The answer for a foot that was moved into reach, perhaps to an end of the knee's range.
    fn moved(&self, foot: Foot<N>, (plane, end): (Plane<N>, Option<End>)) -> Answer<N> {
        let (mut joints, mut held) = self.held(&plane);
        let ([least_stops, most_stops], knee) = (self.constants.knee_stops, self.constants.ranges.knee);
        // The knee's end is known exactly, whatever rounding made of it.
        (joints.knee, held.knee) = match end {
            Some(End::Least) => (knee.least, least_stops.then_some(End::Least)),
            Some(End::Most) => (knee.most, most_stops.then_some(End::Most)),
            None => (joints.knee, None),
        };
        self.explained(foot, joints, held)
    }

    /// The answer for a foot that is not where it was asked to be.
    fn explained(&self, foot: Foot<N>, joints: Joints<N>, held: Held) -> Answer<N> {
        let off_by = N::distance(foot.lengths(), self.forward(&joints).lengths());
        let outcome = if held.any() { Outcome::Held(held) } else { Outcome::Moved };
        Answer { joints, outcome, off_by }
    }

    /// The answer for a foot that is nowhere.
    fn kept(&self, pose: Joints<N>) -> Answer<N> {
        let (joints, _) = self.constants.ranges.hold(pose);
        Answer { joints, outcome: Outcome::NotFinite, off_by: N::FARTHEST }
    }
}
