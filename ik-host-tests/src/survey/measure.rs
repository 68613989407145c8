//! One target in one number system, judged.

use crate::machine::{Answered, Commanded, Refused, judged_leg, judged_ranges};
use crate::reference::{self, ClosedForm, Leg, Pose, Ranges, leg::distance};
use crate::sheet::Robot;
use ik_core::Outcome;

/// What judges a kind of leg: the reference and ideal servos, from the sheet alone.
#[derive(Debug, Clone)]
pub struct Judge {
    leg: Leg,
    ranges: Ranges,
    inverse: ClosedForm,
    commanded: Commanded,
}

/// What the reference says of a target.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Judged {
    /// The joint angles, within their ranges.
    pub pose: Pose,
    /// Whether the foot is reached as asked.
    pub reached: bool,
    /// How far the foot is from where it was asked to be, mm.
    pub off_by_mm: f64,
}

/// What came of one target.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Measured {
    /// The foot as the number system holds it, mm.
    pub foot_mm: [f64; 3],
    /// What the number system did.
    pub outcome: Outcome,
    /// Whether a pulse was held by its range.
    pub pulse_held: bool,
    /// Foot error of the computed angles, mm.
    pub arithmetic_mm: f64,
    /// Foot error of rounding the pulses to counts, mm; `None` if a pulse was held.
    pub pulse_mm: Option<f64>,
    /// Both, mm; `None` if a pulse was held.
    pub together_mm: Option<f64>,
    /// The largest difference of a joint angle from the reference, radians, and which joint; `None` unless reached.
    pub joint: Option<(f64, usize)>,
    /// How far off clamping itself puts the foot, mm.
    pub clamping_mm: f64,
}

impl Judge {
    /// For a kind of leg.
    ///
    /// # Errors
    /// What the output refuses.
    pub fn of(robot: &Robot, kind: usize) -> Result<Self, Refused> {
        let sheet = &robot.kinds[kind];
        let (leg, ranges) = (judged_leg(sheet), judged_ranges(robot, kind));
        Ok(Self {
            leg,
            ranges,
            inverse: ClosedForm::within(leg, ranges.knee),
            commanded: Commanded::of(robot, kind)?,
        })
    }

    /// The leg as the reference sees it.
    pub const fn leg(&self) -> &Leg {
        &self.leg
    }

    /// What the reference says of a foot (leg frame, mm).
    pub fn judge(&self, foot_mm: [f64; 3]) -> Judged {
        let solution = self.inverse.solve(foot_mm);
        let (pose, held) = reference::clamp(&solution.pose, &self.ranges);
        let reached = solution.verdict == reference::Verdict::Reached && !held.any();
        let off_by_mm = if reached {
            0.0
        } else if held.any() {
            distance(reference::foot(&self.leg, &pose), foot_mm)
        } else {
            solution.moved_by_mm
        };
        Judged { pose, reached, off_by_mm }
    }

    /// Where the foot of the `leg`th leg of the kind is when ideal servos stand at the given counts, mm.
    pub fn foot_at_counts(&self, leg: usize, counts: [u32; 3]) -> [f64; 3] {
        reference::foot(&self.leg, &self.commanded.pose(leg, counts))
    }

    /// Judges what the `leg`th leg of the kind answered.
    pub fn measure(&self, leg: usize, answered: &Answered) -> Measured {
        let judged = self.judge(answered.foot_mm);
        let angles = reference::foot(&self.leg, &answered.pose);
        let counts = self.foot_at_counts(leg, answered.counts);
        // Where clamping decides, only what is worse than the reference's clamping is an error.
        let error = |foot: [f64; 3]| (distance(foot, answered.foot_mm) - judged.off_by_mm).abs();
        let pulse_held = answered.pulses_held.iter().any(Option::is_some);
        let reached = judged.reached && answered.outcome == Outcome::Reached;
        Measured {
            foot_mm: answered.foot_mm,
            outcome: answered.outcome,
            pulse_held,
            arithmetic_mm: error(angles),
            pulse_mm: (!pulse_held).then(|| distance(counts, angles)),
            together_mm: (!pulse_held).then(|| error(counts)),
            joint: reached.then(|| largest_difference(&answered.pose, &judged.pose)),
            clamping_mm: judged.off_by_mm,
        }
    }
}

/// The largest difference of a joint, and which; around the circle.
fn largest_difference(a: &Pose, b: &Pose) -> (f64, usize) {
    let around = |difference: f64| {
        let turned = difference.abs();
        turned.min((std::f64::consts::TAU - turned).abs())
    };
    let joints = [around(a.hip - b.hip), around(a.thigh - b.thigh), around(a.knee - b.knee)];
    let mut largest = (joints[0], 0);
    for (joint, difference) in joints.into_iter().enumerate().skip(1) {
        if difference > largest.0 {
            largest = (difference, joint);
        }
    }
    largest
}
