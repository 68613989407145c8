//! What drives the joints of a leg: three servos that turn a joint each, or a parallelogram to the shank.
//!
//! A servo on the thigh turns the knee itself: three servos are an array, `[Servo; 3]` or `[Channel; 3]`. A servo on the
//! body, beside that of the thigh, turns the shank through a parallelogram ([`Parallelogram`]): a crank on the servo and a
//! lever on the shank, as long as one another and kept parallel by a rod as long as the thigh. The shank then keeps its
//! direction in the plane of the leg while the thigh swings, and the servo's angle is the **shank's**: counted as the knee
//! is, positive the way the knee bends, and 0 in the zero pose.
//!
//! ```text
//! shank = knee + thigh        knee bends backward or down
//! shank = knee − thigh        knee bends forward or up
//! ```
//!
//! A shank's angle of more than half a turn is held at half a turn. A parallelogram folds flat where crank and thigh are in
//! line, and may leave that place the wrong way: keep the knee's range clear of it.
//!
//! The leg of a parallelogram is made with [`Limits::through_parallelogram`](crate::Limits::through_parallelogram), which
//! keeps limits in both spaces: joint ranges for what the links stand, pulse ranges for what the servos stand.

use crate::angle::{Angle, Joints};
use crate::channel::{Channel, Counts, three, three_within};
use crate::number::Number;
use crate::servo::{Command, Servo};

/// What turns joint angles into something to send: three servos, or three of them on an output, directly at their joints
/// or with a [`Parallelogram`].
pub trait Drive<N: Number>: Copy {
    /// What is sent.
    type Sent: Sent;
    /// What puts the joints at these angles, or as near as the pulse ranges allow. `bends_back` says to which side the
    /// leg's knee bends: backward or down, or else forward or up.
    fn send(&self, joints: &Joints<N>, bends_back: bool) -> Self::Sent;
    /// The same where it is quick and no pulse is held; `None` sends the caller to [`send`](Drive::send).
    #[inline(always)]
    fn send_quickly(&self, joints: &Joints<N>, bends_back: bool) -> Option<Self::Sent> {
        Some(self.send(joints, bends_back))
    }
}

/// What is sent to the servos of a leg.
pub trait Sent: Copy {
    /// Whether a pulse was held by its servo's range.
    fn is_held(&self) -> bool;
}

impl Sent for [Command; 3] {
    fn is_held(&self) -> bool {
        self.iter().any(|command| command.held.is_some())
    }
}

impl Sent for Counts {
    fn is_held(&self) -> bool {
        self.held.any()
    }
}

/// What takes the angles of three servos.
pub trait Servos<N: Number>: Copy {
    /// What is sent.
    type Sent: Sent;
    /// What puts the servos at these angles, or as near as their pulse ranges allow.
    fn turn(&self, angles: [Angle<N>; 3]) -> Self::Sent;
    /// The same where it is quick and no pulse is held; `None` sends the caller to [`turn`](Servos::turn).
    #[inline(always)]
    fn turn_quickly(&self, angles: [Angle<N>; 3]) -> Option<Self::Sent> {
        Some(self.turn(angles))
    }
}

impl<N: Number, const BENDS: usize> Servos<N> for [Servo<N, BENDS>; 3] {
    type Sent = [Command; 3];
    #[inline(always)]
    fn turn(&self, [hip, thigh, knee]: [Angle<N>; 3]) -> [Command; 3] {
        let [hip_servo, thigh_servo, knee_servo] = self;
        [hip_servo.command(hip), thigh_servo.command(thigh), knee_servo.command(knee)]
    }
}

impl<N: Number, const BENDS: usize> Servos<N> for [Channel<N, BENDS>; 3] {
    type Sent = Counts;
    fn turn(&self, angles: [Angle<N>; 3]) -> Counts {
        three(self, angles)
    }
    #[inline(always)]
    fn turn_quickly(&self, angles: [Angle<N>; 3]) -> Option<Counts> {
        three_within(self, angles)
    }
}

impl<N: Number, A: Copy> Drive<N> for [A; 3]
where
    [A; 3]: Servos<N>,
{
    type Sent = <[A; 3] as Servos<N>>::Sent;
    #[inline(always)]
    fn send(&self, joints: &Joints<N>, _: bool) -> Self::Sent {
        self.turn(joints.as_array())
    }
    #[inline(always)]
    fn send_quickly(&self, joints: &Joints<N>, _: bool) -> Option<Self::Sent> {
        self.turn_quickly(joints.as_array())
    }
}

/// Servos of hip, thigh and shank, the last one on the body; see [the module](crate::drive).
///
/// ```
/// # #[cfg(not(feature = "fixed32"))]
/// # fn main() {}
/// # #[cfg(feature = "fixed32")]
/// # fn main() -> Result<(), Box<dyn core::error::Error>> {
/// use ik_core::drive::{Parallelogram, Sent};
/// use ik_core::{
///     Bend, Channel, Dimensions, Fixed32, Foot, Joints, Leg, Limb, Limits, Mounting, RollHip, ServoSpec, Side, Timer,
/// };
///
/// let timer = Timer::finest(48_000_000, 16, 50.0)?;
/// let wide = ServoSpec { pulse_us: [600.0, 2400.0], ..ServoSpec::COMMON };
/// let servos = [wide, wide, ServoSpec { joint_at_centre_deg: 60.0, ..wide }];
/// let dimensions = Dimensions::roll_hip(31.5, 94.0, 107.0, Bend::Backward)?;
/// let limits = Limits::degrees([-35.0, 35.0], [-85.0, 25.0], [15.0, 130.0])?.through_parallelogram(
///     dimensions.bend(),
///     servos[1].curve()?.joint_deg(),
///     servos[2].curve()?.joint_deg(),
/// )?;
/// let channel = |spec| Channel::<Fixed32>::new(spec, timer.counting());
/// let limb = Limb {
///     leg: Leg::<RollHip, Fixed32>::new(dimensions, limits)?,
///     mounting: Mounting::new(Foot::from_mm(0.0, 0.0, 0.0), Side::Left),
///     servos: Parallelogram([channel(servos[0])?, channel(servos[1])?, channel(servos[2])?]),
/// };
/// // The thigh swings back by half of the knee's flexion, so the shank has turned by the other half.
/// let joints = limb.command(Foot::from_mm(0.0, 31.5, -150.0), Joints::ZERO).answer.joints;
/// let shank = Parallelogram::<()>::shank(&joints, true);
/// assert!((shank.degrees() - joints.knee.degrees() - joints.thigh.degrees()).abs() < 1e-6);
/// # Ok(())
/// # }
/// ```
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Parallelogram<A>(
    /// Hip, thigh (femur), shank (tibia).
    pub [A; 3],
);

impl<A> Parallelogram<A> {
    /// The shank's angle; held at half a turn, never wrapped, for a servo does not turn through its stop.
    pub fn shank<N: Number>(joints: &Joints<N>, bends_back: bool) -> Angle<N> {
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
}

impl<N: Number, A: Copy> Drive<N> for Parallelogram<A>
where
    [A; 3]: Servos<N>,
{
    type Sent = <[A; 3] as Servos<N>>::Sent;
    #[inline(always)]
    fn send(&self, joints: &Joints<N>, bends_back: bool) -> Self::Sent {
        self.0.turn([joints.hip, joints.thigh, Self::shank(joints, bends_back)])
    }
    #[inline(always)]
    fn send_quickly(&self, joints: &Joints<N>, bends_back: bool) -> Option<Self::Sent> {
        self.0.turn_quickly([joints.hip, joints.thigh, Self::shank(joints, bends_back)])
    }
}
