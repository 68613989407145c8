//! What an answer is worth near the places where a leg is singular.

use super::legs::with_free_joints;
use crate::machine::{self, Refused};
use crate::reference::{self, Leg, Pose, Shape, Verdict, leg::distance};
use crate::sheet::Robot;
use ik_core::Outcome;
use rand::{RngExt, SeedableRng};
use rand_xoshiro::Xoshiro256PlusPlus;
use serde::Serialize;
use std::f64::consts::PI;

/// A place where a joint goes with the root of what the foot is off.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Place {
    /// The knee near straight.
    Straight,
    /// The knee near folded.
    Folded,
    /// The foot near the yaw axis, or a roll-hip leg's foot near the cylinder that its thigh joint sweeps.
    HipAxis,
}

impl Place {
    /// All of them.
    pub const ALL: [Self; 3] = [Self::Straight, Self::Folded, Self::HipAxis];

    /// In words; the joint that suffers.
    pub const fn words(self) -> [&'static str; 2] {
        match self {
            Self::Straight => ["knee from straight, rad", "knee"],
            Self::Folded => ["knee from folded, rad", "knee"],
            Self::HipAxis => ["foot from the hip's axis, of the reach", "hip"],
        }
    }
}

/// How far from the place: each looks at what lies between itself and three times as far.
pub const NEARNESS: [f64; 5] = [1e-1, 1e-2, 1e-3, 1e-4, 1e-5];

/// The largest errors near a place.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct NearFound {
    /// Roll-hip or yaw-hip.
    pub shape: &'static str,
    /// Where.
    pub place: Place,
    /// The number system.
    pub number: &'static str,
    /// The joint that suffers, rad, by [`NEARNESS`]. A foot that is judged to be beyond reach there is left out: it is off by
    /// no more than the foot says.
    pub joint_rad: [f64; NEARNESS.len()],
    /// The foot, of thigh and shank together, by [`NEARNESS`]; feet that were moved into reach included.
    pub foot_of_reach: [f64; NEARNESS.len()],
}

/// The largest errors of a robot's legs near each place, over so many poses at each distance.
///
/// # Errors
/// What ik-core refuses.
pub fn near_singular_places(robot: &Robot, rounds: u32, seed: u64) -> Result<Vec<NearFound>, Refused> {
    let free = with_free_joints(robot);
    let mut all = Vec::new();
    for (number, kind) in free.kinds.iter().enumerate() {
        let leg = machine::judged_leg(kind);
        for machine in machine::in_every_number(&free, number)? {
            for place in Place::ALL {
                let none = [0.0; NEARNESS.len()];
                let mut found = NearFound {
                    shape: leg.shape.word(),
                    place,
                    number: machine.number(),
                    joint_rad: none,
                    foot_of_reach: none,
                };
                let mut random = Xoshiro256PlusPlus::seed_from_u64(seed);
                for (i, nearness) in NEARNESS.into_iter().enumerate() {
                    for _ in 0..rounds {
                        let asked = foot_near(&leg, place, nearness, &mut random);
                        if let Some(answer) = machine.answer(0, asked) {
                            let [joint, foot] = errors(&leg, place, &answer);
                            found.joint_rad[i] = found.joint_rad[i].max(joint);
                            found.foot_of_reach[i] = found.foot_of_reach[i].max(foot);
                        }
                    }
                }
                all.push(found);
            }
        }
    }
    Ok(all)
}

fn foot_near(leg: &Leg, place: Place, nearness: f64, random: &mut Xoshiro256PlusPlus) -> [f64; 3] {
    let near = nearness * random.random_range(1.0..3.0);
    let mut pose = Pose {
        hip: random.random_range(-1.5..1.5),
        thigh: random.random_range(-1.5..1.5),
        knee: random.random_range(0.3..2.3),
    };
    match place {
        Place::Straight => pose.knee = near,
        Place::Folded => pose.knee = PI - near,
        Place::HipAxis => {
            let away = near * (leg.thigh + leg.shank);
            let (sin, cos) = pose.hip.sin_cos();
            // Ahead (roll-hip) or below (yaw-hip) where a leg with a bent knee reaches.
            let along = random.random_range(0.5..0.9) * (leg.thigh + leg.shank);
            return match leg.shape {
                Shape::Roll => [along, leg.offset * cos + away * sin, leg.offset * sin - away * cos],
                Shape::Yaw => [away * sin, away * cos, -along],
            };
        }
    }
    reference::foot(leg, &pose)
}

/// (the joint that suffers, rad; the foot, of the reach).
fn errors(leg: &Leg, place: Place, answer: &machine::Answered) -> [f64; 2] {
    let wanted = reference::solve(leg, answer.foot_mm);
    let reached = wanted.verdict == Verdict::Reached && answer.outcome == Outcome::Reached;
    let (got, want) = match place {
        Place::Straight | Place::Folded => (answer.pose.knee, wanted.pose.knee),
        Place::HipAxis => (answer.pose.hip, wanted.pose.hip),
    };
    let apart = (got - want).abs();
    let joint = if reached { apart.min(2.0 * PI - apart) } else { 0.0 };
    let off = distance(reference::foot(leg, &answer.pose), answer.foot_mm) - wanted.moved_by_mm;
    [joint, off.max(0.0) / (leg.thigh + leg.shank)]
}
