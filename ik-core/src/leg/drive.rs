//! What the servo of the knee turns.
//!
//! A servo on the thigh turns the knee itself. A servo on the body, beside that of the thigh, turns the shank through a
//! parallelogram: a crank on the servo and a lever on the shank, as long as one another and kept parallel by a rod as long
//! as the thigh. The shank then keeps its direction in the plane of the leg while the thigh swings, and the servo's angle
//! is the **shank's**: counted as the knee is, positive the way the knee bends, and 0 in the zero pose.
//!
//! ```text
//! shank = knee + thigh        knee bends backward or down
//! shank = knee − thigh        knee bends forward or up
//! ```
//!
//! A parallelogram folds flat where crank and thigh are in line, and may leave that place the wrong way: keep the knee's
//! range clear of it. A shank's angle of more than half a turn is held at half a turn.

use crate::angle::{Angle, Joints};
use crate::number::Number;

/// What the servo of the knee turns; see [`leg::drive`](crate::leg::drive).
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Default)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum KneeDrive {
    /// The knee.
    #[default]
    Direct,
    /// The shank, from the body through a parallelogram.
    Parallelogram,
}

/// The shank's angle; held at half a turn, never wrapped, for a servo does not turn through its stop.
pub(super) fn shank<N: Number>(joints: &Joints<N>, bends_back: bool) -> Angle<N> {
    let (thigh, knee, none) = (joints.thigh.0, joints.knee.0, N::NO_ANGLE);
    // Two of the same sign come out with the other one where they wrap.
    let (sum, up, down) = if bends_back {
        (N::angle_sum(knee, thigh), knee >= none && thigh >= none, knee < none && thigh < none)
    } else {
        (N::angle_difference(knee, thigh), knee >= none && thigh < none, knee < none && thigh >= none)
    };
    Angle(match (up && sum < none, down && sum >= none) {
        (true, _) => N::MOST_ANGLE,
        (_, true) => N::LEAST_ANGLE,
        _ => sum,
    })
}
