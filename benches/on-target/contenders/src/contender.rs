//! What a contender is: one way to solve one leg.

use ik_core::{RollHip, YawHip};
use targets::{PublishedLeg, Target};

use crate::forward::Forward;
use crate::inverse::Inverse;

/// One way to get from a foot to what it is asked for.
///
/// Only [`solve`](Contender::solve) is counted. Leg and foot reach it by reference, as in a robot with several
/// legs, so that no contender has its leg folded into the code.
pub trait Contender: Named + 'static {
    /// The leg it is asked to solve.
    type Hip: PublishedHip;
    /// What it keeps of the leg in flash.
    type Leg: 'static;
    /// A foot as it takes it.
    type Foot;
    /// What it answers.
    type Answer;

    /// What it is, for the table.
    const WHAT: &'static str;
    /// Whether it is ik-core's.
    const OURS: bool = false;
    /// Where the way ends.
    const TO: To;
    /// The leg.
    const LEG: Self::Leg;

    /// A target as a foot.
    fn foot(target: Target) -> Self::Foot;
    /// What is counted.
    fn solve(leg: &Self::Leg, foot: &Self::Foot) -> Self::Answer;
    /// The answer, down to the last bit: joints or ticks, and a word that is 0 if the foot was reached.
    fn bits(answer: &Self::Answer) -> [u32; 4];
    /// The joint angles of the answer, radians, for judging it on the PC.
    fn joints(answer: &Self::Answer) -> [f64; 3];
}

/// The list in `lib.rs` gives every contender its name.
pub trait Named {
    /// The name of its image, and so of its file in `image/src/bin`.
    const NAME: &'static str;
}

/// Where the way of a foot ends.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum To {
    /// Nowhere: the call alone, and an image without a solver. It is subtracted from all others.
    Nothing,
    /// Three joint angles and an outcome.
    Joints,
    /// Joint angles within their ranges, pulses within theirs, and three timer ticks.
    Ticks,
}

/// A hip with published targets.
pub trait PublishedHip: Forward + Inverse + 'static {
    /// Its name in the table.
    const NAME: &'static str;
    /// Its leg and targets.
    const PUBLISHED: PublishedLeg;
}

impl PublishedHip for RollHip {
    const NAME: &'static str = "roll";
    const PUBLISHED: PublishedLeg = targets::ROLL_HIP;
}

impl PublishedHip for YawHip {
    const NAME: &'static str = "yaw";
    const PUBLISHED: PublishedLeg = targets::YAW_HIP;
}
