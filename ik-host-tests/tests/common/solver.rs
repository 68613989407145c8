//! ik-core behind plain `f64`: millimetres and radians in, millimetres and radians out.
//!
//! `f64` holds every value of every number system here, so nothing is lost on the way; a foot is rounded to the
//! number system first ([`Solver::quantised`]), and it is the rounded one that references are asked about.

use ik_core::{Angle, Coarse, Fixed32, Float32, RollHip, Short32, YawHip};
use ik_core::{Bend, Dimensions, Foot, GeometryError, Hip, Joints, Limits, Mounting, Number, Outcome, Side};
use ik_host_tests::numbers::Float64;
use ik_host_tests::reference::{self, Leg, Pose, Range, Ranges, Shape};
use std::f64::consts::TAU;

/// The number systems under test.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum NumberSystem {
    Float32,
    Coarse,
    Fixed32,
    Short32,
    Float64,
}

impl NumberSystem {
    pub const ALL: [Self; 5] = [Self::Float32, Self::Coarse, Self::Fixed32, Self::Short32, Self::Float64];

    /// The farthest coordinate that a foot can have, mm.
    pub fn farthest(self) -> f64 {
        match self {
            Self::Float32 | Self::Coarse => f64::from(f32::MAX),
            Self::Fixed32 | Self::Short32 => f64::from(i32::MAX) / 65_536.0,
            Self::Float64 => f64::MAX,
        }
    }

    /// The longest leg that it holds, mm.
    pub fn longest(self) -> f64 {
        if self == Self::Short32 { 6_683.0 } else { 16_383.0 }
    }

    /// The step between lengths, mm; 0 if it shrinks with them.
    pub fn step(self) -> f64 {
        if self.floats() { 0.0 } else { 1.0 / 65_536.0 }
    }

    /// Whether it has NaN and infinity.
    pub fn floats(self) -> bool {
        !matches!(self, Self::Fixed32 | Self::Short32)
    }
}

/// What a solver answers.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Told {
    pub pose: Pose,
    pub outcome: Outcome,
    /// mm.
    pub off_by: f64,
}

/// A leg's solver: ik-core's, or a wrong one that must be found out.
pub trait Solver {
    fn number(&self) -> NumberSystem;
    /// The leg's measures.
    fn leg(&self) -> &Leg;
    /// The joint ranges as the solver holds them.
    fn ranges(&self) -> Ranges;
    /// A foot as the number system holds it.
    fn quantised(&self, foot: [f64; 3]) -> [f64; 3];
    /// A pose as the number system holds it.
    fn quantised_pose(&self, pose: &Pose) -> Pose;
    fn solve(&self, foot: [f64; 3], hold: Pose) -> Told;
    fn forward(&self, pose: &Pose) -> [f64; 3];
    /// A foot on the body as a leg at `at` on that side sees it.
    fn seen_from_body(&self, at: [f64; 3], side: Side, foot: [f64; 3]) -> [f64; 3];
    /// And back.
    fn seen_by_body(&self, at: [f64; 3], side: Side, foot: [f64; 3]) -> [f64; 3];
}

/// ik-core's solver for a leg; joint ranges in degrees, free if there are none.
pub fn core(
    number: NumberSystem,
    leg: &Leg,
    ranges: Option<[[f64; 2]; 3]>,
) -> Result<Box<dyn Solver>, GeometryError> {
    match number {
        NumberSystem::Float32 => core_in::<Float32>(number, leg, ranges),
        NumberSystem::Coarse => core_in::<Coarse>(number, leg, ranges),
        NumberSystem::Fixed32 => core_in::<Fixed32>(number, leg, ranges),
        NumberSystem::Short32 => core_in::<Short32>(number, leg, ranges),
        NumberSystem::Float64 => core_in::<Float64>(number, leg, ranges),
    }
}

fn core_in<N: Number>(
    number: NumberSystem,
    leg: &Leg,
    ranges: Option<[[f64; 2]; 3]>,
) -> Result<Box<dyn Solver>, GeometryError> {
    let (offset, thigh, shank, bend) = (leg.offset, leg.thigh, leg.shank, bend(leg.bend));
    Ok(match leg.shape {
        Shape::Roll => {
            let dimensions = Dimensions::roll_hip(offset, thigh, shank, bend)?;
            Box::new(Core::<RollHip, N>::new(number, *leg, dimensions, ranges)?)
        }
        Shape::Yaw => {
            let dimensions = Dimensions::yaw_hip(offset, thigh, shank, bend)?;
            Box::new(Core::<YawHip, N>::new(number, *leg, dimensions, ranges)?)
        }
    })
}

fn bend(bend: reference::Bend) -> Bend {
    match bend {
        reference::Bend::Forward => Bend::Forward,
        reference::Bend::Backward => Bend::Backward,
        reference::Bend::Up => Bend::Up,
        reference::Bend::Down => Bend::Down,
    }
}

struct Core<H: Hip, N: Number> {
    number: NumberSystem,
    leg: Leg,
    core: ik_core::Leg<H, N>,
}

impl<H: Hip, N: Number> Core<H, N> {
    fn new(
        number: NumberSystem,
        leg: Leg,
        dimensions: Dimensions<H>,
        ranges: Option<[[f64; 2]; 3]>,
    ) -> Result<Self, GeometryError> {
        let limits = match ranges {
            Some([hip, thigh, knee]) => Limits::degrees(hip, thigh, knee).expect("ranges that can be"),
            None => Limits::FREE,
        };
        Ok(Self { number, leg, core: ik_core::Leg::from_dimensions(dimensions, limits)? })
    }
}

/// The angle of the number system that is nearest to `radians`.
pub fn angle<N: Number>(radians: f64) -> Angle<N> {
    let turns = (radians / TAU).clamp(-0.5, 0.5);
    // `from_degrees` would do for all of them, but goes through one more rounding in `f64`.
    Angle::from_raw(N::angle_from_turns(turns))
        .or_else(|| Angle::from_degrees(360.0 * turns))
        .expect("an angle within half a turn")
}

fn joints<N: Number>(pose: &Pose) -> Joints<N> {
    Joints { hip: angle(pose.hip), thigh: angle(pose.thigh), knee: angle(pose.knee) }
}

fn pose<N: Number>(joints: &Joints<N>) -> Pose {
    let [hip, thigh, knee] = joints.as_array().map(Angle::radians);
    Pose { hip, thigh, knee }
}

fn foot<N: Number>([x, y, z]: [f64; 3]) -> Foot<N> {
    Foot::from_mm(x, y, z)
}

impl<H: Hip, N: Number> Solver for Core<H, N> {
    fn number(&self) -> NumberSystem {
        self.number
    }
    fn leg(&self) -> &Leg {
        &self.leg
    }
    fn ranges(&self) -> Ranges {
        let ranges = self.core.ranges();
        let [hip, thigh, knee] = [ranges.hip(), ranges.thigh(), ranges.knee()]
            .map(|range| Range { min: range.least().radians(), max: range.most().radians() });
        Ranges { hip, thigh, knee }
    }
    fn quantised(&self, mm: [f64; 3]) -> [f64; 3] {
        foot::<N>(mm).mm()
    }
    fn quantised_pose(&self, rough: &Pose) -> Pose {
        pose(&joints::<N>(rough))
    }
    fn solve(&self, mm: [f64; 3], hold: Pose) -> Told {
        let answer = self.core.solve(foot(mm), joints(&hold));
        Told { pose: pose(&answer.joints), outcome: answer.outcome, off_by: N::mm(answer.off_by) }
    }
    fn forward(&self, pose: &Pose) -> [f64; 3] {
        self.core.forward(&joints(pose)).mm()
    }
    fn seen_from_body(&self, at: [f64; 3], side: Side, mm: [f64; 3]) -> [f64; 3] {
        Mounting::<N>::new(foot(at), side).leg_frame(foot(mm)).mm()
    }
    fn seen_by_body(&self, at: [f64; 3], side: Side, mm: [f64; 3]) -> [f64; 3] {
        Mounting::<N>::new(foot(at), side).body_frame(foot(mm)).mm()
    }
}
