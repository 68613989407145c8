//! The legs of a robot, without allocation.

use crate::angle::Joints;
use crate::drive::Drive;
use crate::foot::Foot;
use crate::leg::Hip;
use crate::limb::{Limb, LimbCommand};
use crate::number::Number;
use crate::servo::Servo;
use heapless::Vec;

/// Up to `LEGS` limbs of one shape, and the pose that each was last commanded.
///
/// ```
/// # #[cfg(not(feature = "fixed32"))]
/// # fn main() {}
/// # #[cfg(feature = "fixed32")]
/// # fn main() -> Result<(), Box<dyn core::error::Error>> {
/// use ik_core::robot::Robot;
/// use ik_core::{Bend, Dimensions, Fixed32, Foot, Leg, Limb, Limits, Mounting, Outcome, Servo, ServoSpec, Side};
///
/// let leg = Leg::<_, Fixed32>::new(Dimensions::yaw_hip(42.0, 71.0, 118.0, Bend::Up)?, Limits::FREE)?;
/// let servos = [Servo::<Fixed32>::new(ServoSpec::COMMON)?; 3];
/// let mut robot = Robot::<_, Fixed32, 6>::new();
/// for side in [Side::Left, Side::Right] {
///     let y = if side == Side::Left { 60.0 } else { -60.0 };
///     let mounting = Mounting::new(Foot::from_mm(0.0, y, 0.0), side);
///     robot.add(Limb { leg, mounting, servos }).map_err(|_| "no room for that leg")?;
/// }
/// // Mirrored feet come to the same joint angles.
/// let feet = [Foot::from_mm(30.0, 190.0, -60.0), Foot::from_mm(30.0, -190.0, -60.0)];
/// let frame = robot.frame(&feet);
/// assert_eq!(frame[0].answer.outcome, Outcome::Reached);
/// assert_eq!(frame[0].answer.joints, frame[1].answer.joints);
/// # Ok(())
/// # }
/// ```
#[derive(Debug, Clone)]
pub struct Robot<H: Hip, N: Number, const LEGS: usize, D: Drive<N> = [Servo<N>; 3]> {
    limbs: Vec<(Limb<H, N, D>, Joints<N>), LEGS>,
}

impl<H: Hip, N: Number, const LEGS: usize, D: Drive<N>> Robot<H, N, LEGS, D> {
    /// A robot without legs yet.
    pub const fn new() -> Self {
        Self { limbs: Vec::new() }
    }

    /// A robot of these limbs, as [`add`](Robot::add) adds them.
    pub fn of(limbs: [Limb<H, N, D>; LEGS]) -> Self {
        let mut robot = Self::new();
        for limb in limbs {
            // There is room for as many.
            let _ = robot.add(limb);
        }
        robot
    }

    /// Adds a limb, whose pose is taken to be the zero pose until it is commanded.
    ///
    /// # Errors
    /// Gives the limb back if there are `LEGS` already.
    pub fn add(&mut self, limb: Limb<H, N, D>) -> Result<(), Limb<H, N, D>> {
        self.limbs.push((limb, Joints::ZERO)).map_err(|(limb, _)| limb)
    }

    /// How many legs there are.
    pub fn legs(&self) -> usize {
        self.limbs.len()
    }

    /// One frame: a foot per leg (body frame), in the order in which they were added, to pulses. A leg without a
    /// foot, or with one that is not finite, keeps its pose; feet without a leg are passed over.
    pub fn frame(&mut self, feet: &[Foot<N>]) -> Vec<LimbCommand<N, D::Sent>, LEGS> {
        let mut commands = Vec::new();
        for ((limb, pose), foot) in self.limbs.iter_mut().zip(feet) {
            let command = limb.command(*foot, *pose);
            *pose = command.answer.joints;
            // There is room for as many as there are limbs; to collect would leave a panic for want of it.
            let _ = commands.push(command);
        }
        commands
    }
}

impl<H: Hip, N: Number, const LEGS: usize, D: Drive<N>> Default for Robot<H, N, LEGS, D> {
    fn default() -> Self {
        Self::new()
    }
}
