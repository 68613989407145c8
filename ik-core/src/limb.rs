//! A leg with its servos at its place on the body: a foot on the body's frame to three pulses, or to three counts.
//!
#![doc = include_str!("../docs/constants-from-a-sheet.md")]

use crate::angle::Joints;
use crate::channel::Counts;
use crate::drive::{Drive, Sent};
use crate::foot::Foot;
use crate::leg::{Answer, Hip, Leg};
use crate::mounting::Mounting;
use crate::number::Number;
use crate::output::Output;
use crate::servo::{Command, Servo};

/// A leg, its place on the body, and what drives it. A `const` one lives in flash.
///
/// | `servos` | what comes out |
/// | --- | --- |
/// | `[Servo<N>; 3]` | pulses |
/// | `[Channel<N>; 3]` | counts of a timer or an expander: the short way |
/// | [`Parallelogram`](crate::drive::Parallelogram) of either | the same, with the knee's servo on the body |
///
/// Servos that were measured need room for the bends of their curves: `[Channel<N, 4>; 3]`.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Limb<H: Hip, N: Number, D: Drive<N> = [Servo<N>; 3]> {
    /// The leg.
    pub leg: Leg<H, N>,
    /// Its place on the body.
    pub mounting: Mounting<N>,
    /// Hip, thigh (femur), knee.
    pub servos: D,
}

/// What a limb is commanded.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LimbCommand<N: Number, S: Sent = [Command; 3]> {
    /// Joint angles, and what was done with the foot.
    pub answer: Answer<N>,
    /// Hip, thigh (femur), knee: pulses or counts, and whether one was held by its range.
    pub commands: S,
}

impl<H: Hip, N: Number, D: Drive<N>> Limb<H, N, D> {
    /// The commands that put the foot at `foot` (body frame), or as near as reach, joint ranges and pulse ranges
    /// allow; see [`Leg::solve`] for `hold`.
    #[inline]
    pub fn command(&self, foot: Foot<N>, hold: Joints<N>) -> LimbCommand<N, D::Sent> {
        if let Some(joints) = self.leg.usual(self.mounting.leg_frame(foot))
            && let Some(commands) = self.servos.send_quickly(&joints, self.leg.bends_back())
        {
            return LimbCommand { answer: Answer::reached(joints), commands };
        }
        self.unusual(&foot, hold)
    }

    /// A foot that is unusual, or a pulse: from the start, for what the usual way had worked out is not handed over, so that
    /// the usual way need not keep it.
    #[cold]
    #[inline(never)]
    fn unusual(&self, foot: &Foot<N>, hold: Joints<N>) -> LimbCommand<N, D::Sent> {
        let answer = self.leg.unusual(self.mounting.leg_frame(*foot), hold);
        LimbCommand { answer, commands: self.commands(&answer.joints) }
    }

    /// The commands for joint angles.
    #[inline]
    pub fn commands(&self, joints: &Joints<N>) -> D::Sent {
        self.servos.send(joints, self.leg.bends_back())
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
    pub const fn counts(&self) -> [u32; 3] {
        self.commands.counts
    }
}

impl<N: Number, S: Sent> LimbCommand<N, S> {
    /// Whether a pulse was held by its servo's range.
    pub fn pulse_held(&self) -> bool {
        self.commands.is_held()
    }
}

#[cfg(feature = "defmt")]
impl<N: Number, S: Sent + defmt::Format> defmt::Format for LimbCommand<N, S> {
    fn format(&self, f: defmt::Formatter<'_>) {
        defmt::write!(f, "{}; {}", self.answer, self.commands);
    }
}
