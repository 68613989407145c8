//! What a whole leg is worth in each number system: the two demo legs, by their shape.

use crate::machine::{self, Refused};
use crate::reference::{self, Pose, Shape, leg::distance};
use crate::sheet::{NumberSystem, Robot};
use ik_core::Outcome;
use rand::{RngExt, SeedableRng};
use rand_xoshiro::Xoshiro256PlusPlus;
use serde::Serialize;

/// What is promised of the demo legs in a number system.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct LegBound {
    /// The number system.
    pub number: NumberSystem,
    /// A joint against the reference, rad: knee from 0.1 to 2.6 rad, the foot clear of the hip's axis by a fifth of the
    /// reach.
    pub joint_rad: f64,
    /// A knee nearer to straight or folded than that, but no nearer than a thousandth, rad.
    pub near_an_end_rad: f64,
    /// The foot, of thigh and shank together, wherever it is reached.
    pub foot_of_reach: f64,
}

/// Of either demo leg; each is a tenth above what `toehold bounds --rounds 1000000` found.
#[rustfmt::skip]
pub const LEGS: [LegBound; 5] = [
    LegBound { number: NumberSystem::Float32, joint_rad: 6.4e-7, near_an_end_rad: 6e-7, foot_of_reach: 6.2e-7 },
    LegBound { number: NumberSystem::Coarse, joint_rad: 1.25e-2, near_an_end_rad: 1.25e-2, foot_of_reach: 1.55e-2 },
    LegBound { number: NumberSystem::Fixed32, joint_rad: 1.15e-6, near_an_end_rad: 1.6e-7, foot_of_reach: 5.8e-7 },
    LegBound { number: NumberSystem::Short32, joint_rad: 1.15e-6, near_an_end_rad: 6.8e-5, foot_of_reach: 1e-6 },
    LegBound { number: NumberSystem::Fixed16, joint_rad: 3.6e-4, near_an_end_rad: 2.8e-4, foot_of_reach: 2.2e-4 },
];

/// What was found of a leg in a number system.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct LegFound {
    /// The robot whose leg it is.
    pub robot: String,
    /// Roll-hip or yaw-hip.
    pub shape: &'static str,
    /// The number system.
    pub number: &'static str,
    /// As in [`LegBound`].
    pub joint_rad: f64,
    /// As in [`LegBound`].
    pub near_an_end_rad: f64,
    /// As in [`LegBound`].
    pub foot_of_reach: f64,
}

/// The largest errors of a robot's legs over so many random poses per kind, in every number system; the same at every run
/// with the same seed. Joint ranges are taken off, so that straight and folded legs are looked at.
///
/// # Errors
/// What ik-core refuses.
pub fn of_legs(robot: &Robot, rounds: u32, seed: u64) -> Result<Vec<LegFound>, Refused> {
    let free = with_free_joints(robot);
    let mut all = Vec::new();
    for (number, kind) in free.kinds.iter().enumerate() {
        let leg = machine::judged_leg(kind);
        for machine in machine::in_every_number(&free, number)? {
            let mut found = LegFound {
                robot: robot.name.clone(),
                shape: leg.shape.word(),
                number: machine.number(),
                joint_rad: 0.0,
                near_an_end_rad: 0.0,
                foot_of_reach: 0.0,
            };
            let mut random = Xoshiro256PlusPlus::seed_from_u64(seed);
            for _ in 0..rounds {
                let asked = reference::foot(&leg, &any_pose(&mut random));
                if let Some(answer) = machine.answer(0, asked) {
                    found.see(&leg, &answer);
                }
            }
            all.push(found);
        }
    }
    Ok(all)
}

/// A robot whose joints may go anywhere.
pub(super) fn with_free_joints(robot: &Robot) -> Robot {
    let mut free = robot.clone();
    for kind in &mut free.kinds {
        kind.range_deg = [[-180.0, 180.0], [-180.0, 180.0], [0.0, 180.0]];
    }
    free
}

/// A pose whose knee is somewhere, or near an end.
fn any_pose(random: &mut Xoshiro256PlusPlus) -> Pose {
    use std::f64::consts::PI;
    let near = 10f64.powf(random.random_range(-4.0..-1.0));
    let knee = match random.random_range(0..4) {
        0 => near,
        1 => PI - near,
        _ => random.random_range(0.0..PI),
    };
    Pose { hip: random.random_range(-1.5..1.5), thigh: random.random_range(-PI..PI), knee }
}

impl LegFound {
    /// Whether nothing is beyond what is promised.
    pub fn is_within(&self, bound: &LegBound) -> bool {
        self.joint_rad <= bound.joint_rad
            && self.near_an_end_rad <= bound.near_an_end_rad
            && self.foot_of_reach <= bound.foot_of_reach
    }

    fn see(&mut self, leg: &reference::Leg, answer: &machine::Answered) {
        let wanted = reference::solve(leg, answer.foot_mm);
        if wanted.verdict != reference::Verdict::Reached || answer.outcome != Outcome::Reached {
            return;
        }
        let reach = leg.thigh + leg.shank;
        let off = distance(reference::foot(leg, &answer.pose), answer.foot_mm) / reach;
        self.foot_of_reach = self.foot_of_reach.max(off);
        let [x, y, z] = answer.foot_mm;
        let clear = match leg.shape {
            Shape::Roll => (y * y + z * z - leg.offset * leg.offset).max(0.0).sqrt(),
            Shape::Yaw => x.hypot(y),
        };
        if clear < 0.2 * reach {
            return;
        }
        let from_end = wanted.pose.knee.min(std::f64::consts::PI - wanted.pose.knee);
        if (0.1..2.6).contains(&wanted.pose.knee) {
            self.joint_rad = self.joint_rad.max(answer.pose.largest_difference(&wanted.pose));
        } else if from_end > 1e-3 {
            self.near_an_end_rad = self.near_an_end_rad.max((answer.pose.knee - wanted.pose.knee).abs());
        }
    }
}
