//! A leg with its servos at its place on the body: a foot on the body's frame to three pulses.

use crate::angle::Joints;
use crate::foot::Foot;
use crate::leg::{Answer, Hip, Leg};
use crate::mounting::Mounting;
use crate::number::Number;
use crate::output::Output;
use crate::servo::{Command, Servo};

/// A leg, its place on the body, and its three servos (hip, thigh, knee). A `const` one lives in flash.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Limb<H: Hip, N: Number> {
    /// The leg.
    pub leg: Leg<H, N>,
    /// Its place on the body.
    pub mounting: Mounting<N>,
    /// Hip, thigh (femur), knee.
    pub servos: [Servo<N>; 3],
}

/// What a limb is commanded.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LimbCommand<N: Number> {
    /// Joint angles, and what was done with the foot.
    pub answer: Answer<N>,
    /// Hip, thigh (femur), knee: the pulses, and whether one was held by its range.
    pub commands: [Command; 3],
}

impl<H: Hip, N: Number> Limb<H, N> {
    /// The pulses that put the foot at `foot` (body frame), or as near as reach, joint ranges and pulse ranges
    /// allow; see [`Leg::solve`] for `hold`.
    #[inline]
    pub fn command(&self, foot: Foot<N>, hold: Joints<N>) -> LimbCommand<N> {
        let answer = self.leg.solve(self.mounting.leg_frame(foot), hold);
        LimbCommand { answer, commands: self.commands(&answer.joints) }
    }

    /// The pulses for joint angles.
    #[inline]
    pub fn commands(&self, joints: &Joints<N>) -> [Command; 3] {
        let [hip, thigh, knee] = &self.servos;
        [hip.command(joints.hip), thigh.command(joints.thigh), knee.command(joints.knee)]
    }
}

impl<N: Number> LimbCommand<N> {
    /// The counts that the pulses come to on an output.
    #[inline]
    pub fn counts(&self, output: &impl Output) -> [u32; 3] {
        self.commands.map(|command| output.counts(command.pulse))
    }

    /// Whether a pulse was held by its servo's range.
    pub fn pulse_held(&self) -> bool {
        self.commands.iter().any(|command| command.held.is_some())
    }
}

#[cfg(feature = "defmt")]
impl<N: Number> defmt::Format for LimbCommand<N> {
    fn format(&self, f: defmt::Formatter<'_>) {
        defmt::write!(f, "{}; {}", self.answer, self.commands);
    }
}
