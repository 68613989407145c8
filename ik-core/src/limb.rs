//! A leg with its servos at its place on the body: a foot on the body's frame to three pulses, or to three counts.

use crate::angle::{Angle, Joints};
use crate::channel::{Channel, Counts};
use crate::foot::Foot;
use crate::leg::{Answer, Hip, Leg};
use crate::limits::End;
use crate::mounting::Mounting;
use crate::number::Number;
use crate::output::Output;
use crate::servo::{Command, Servo};

/// What a joint's angle is handed to: a [`Servo`], which makes a pulse of it, or a [`Channel`], which makes whole counts
/// of it at once.
pub trait Actuator<N: Number>: Copy {
    /// What it is commanded.
    type Command: Sent;
    /// The command that puts the joint at `angle`, or as near as the pulse range allows.
    fn command(&self, angle: Angle<N>) -> Self::Command;
}

/// What an actuator is commanded.
pub trait Sent: Copy {
    /// The end of the pulse range at which it was held, if it was.
    fn held(&self) -> Option<End>;
}

impl<N: Number, const BENDS: usize> Actuator<N> for Servo<N, BENDS> {
    type Command = Command;
    #[inline(always)]
    fn command(&self, angle: Angle<N>) -> Command {
        Servo::command(self, angle)
    }
}

impl<N: Number, const BENDS: usize> Actuator<N> for Channel<N, BENDS> {
    type Command = Counts;
    #[inline(always)]
    fn command(&self, angle: Angle<N>) -> Counts {
        Channel::command(self, angle)
    }
}

impl Sent for Command {
    #[inline(always)]
    fn held(&self) -> Option<End> {
        self.held
    }
}

impl Sent for Counts {
    #[inline(always)]
    fn held(&self) -> Option<End> {
        self.held
    }
}

/// A leg, its place on the body, and its three servos (hip, thigh, knee): bare ones, or ones on an output
/// (`Limb<RollHip, Fixed32, Channel<Fixed32>>`), which is the short way to counts. A `const` one lives in flash.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Limb<H: Hip, N: Number, A: Actuator<N> = Servo<N>> {
    /// The leg.
    pub leg: Leg<H, N>,
    /// Its place on the body.
    pub mounting: Mounting<N>,
    /// Hip, thigh (femur), knee; the last one turns the shank if the leg's [`KneeDrive`](crate::KneeDrive) says so.
    pub servos: [A; 3],
}

/// What a limb is commanded.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LimbCommand<N: Number, C: Sent = Command> {
    /// Joint angles, and what was done with the foot.
    pub answer: Answer<N>,
    /// Hip, thigh (femur), knee: pulses or counts, and whether one was held by its range.
    pub commands: [C; 3],
}

impl<H: Hip, N: Number, A: Actuator<N>> Limb<H, N, A> {
    /// The commands that put the foot at `foot` (body frame), or as near as reach, joint ranges and pulse ranges
    /// allow; see [`Leg::solve`] for `hold`.
    #[inline]
    pub fn command(&self, foot: Foot<N>, hold: Joints<N>) -> LimbCommand<N, A::Command> {
        let answer = self.leg.solve(self.mounting.leg_frame(foot), hold);
        LimbCommand { answer, commands: self.commands(&answer.joints) }
    }

    /// The commands for joint angles.
    #[inline]
    pub fn commands(&self, joints: &Joints<N>) -> [A::Command; 3] {
        let [hip, thigh, knee] = &self.servos;
        let [hip_angle, thigh_angle, knee_angle] = self.leg.servo_angles(joints);
        [hip.command(hip_angle), thigh.command(thigh_angle), knee.command(knee_angle)]
    }
}

impl<N: Number> LimbCommand<N> {
    /// The counts that the pulses come to on an output.
    #[inline]
    pub fn counts(&self, output: &impl Output) -> [u32; 3] {
        self.commands.map(|command| output.counts(command.pulse))
    }
}

impl<N: Number> LimbCommand<N, Counts> {
    /// Hip, thigh (femur), knee: the counts.
    #[inline(always)]
    pub fn counts(&self) -> [u32; 3] {
        self.commands.map(|command| command.counts)
    }
}

impl<N: Number, C: Sent> LimbCommand<N, C> {
    /// Whether a pulse was held by its servo's range.
    pub fn pulse_held(&self) -> bool {
        self.commands.iter().any(|command| command.held().is_some())
    }
}

#[cfg(feature = "defmt")]
impl<N: Number, C: Sent + defmt::Format> defmt::Format for LimbCommand<N, C> {
    fn format(&self, f: defmt::Formatter<'_>) {
        defmt::write!(f, "{}; {}", self.answer, self.commands);
    }
}
