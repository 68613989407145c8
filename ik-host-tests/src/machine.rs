//! A robot of a sheet in a number system: the very code that will be flashed, behind one face.

mod commanded;
mod leg;
mod output;
mod safety;
mod servo;

pub use commanded::Commanded;
pub use leg::{roll_leg, yaw_leg};
pub use output::Counter;
pub use safety::servo_bounds;

use crate::numbers::Float64;
use crate::reference::leg::{self as judged, Pose, Range, Ranges};
use crate::sheet::{Bend, HipShape, KneeDrive, LegKind, NumberSystem, Robot};
use ik_core::drive::Drive as _;
use ik_core::limits::End;
use ik_core::output::Output as _;
use ik_core::servo::MOST_POINTS;
use ik_core::{
    Channel, Coarse, Counts, Curve, Dimensions, Fixed16, Fixed32, Float32, Foot, Hip, Joints, Leg, Limits,
    Number, Outcome, Parallelogram, RollHip, Short32, YawHip,
};
use std::fmt;

/// What a leg answers to a foot.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Answered {
    /// The foot as the number system holds it, mm.
    pub foot_mm: [f64; 3],
    /// The joint angles, radians.
    pub pose: Pose,
    /// What was done with the foot.
    pub outcome: Outcome,
    /// How far off the answer says the foot is, mm.
    pub off_by_mm: f64,
    /// What the output is commanded.
    pub counts: [u32; 3],
    /// The ends of the pulse ranges at which they were held.
    pub pulses_held: [Option<End>; 3],
    /// The pulses that come of the counts, µs.
    pub pulses_us: [f64; 3],
}

/// A kind of leg in one number system, with the servos of every leg of that kind.
pub trait Machine: Send + Sync {
    /// The number system's name.
    fn number(&self) -> &'static str;
    /// What the `leg`th leg of the kind answers to a foot (leg frame, mm); `None` if the foot is not finite and
    /// the number system cannot even hold it.
    fn answer(&self, leg: usize, foot_mm: [f64; 3]) -> Option<Answered>;
}

/// Why ik-core refuses what a sheet says, although the sheet passed its own checks.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Refused {
    /// The kind of leg.
    pub kind: String,
    /// What it concerns.
    pub what: String,
    /// ik-core's reason.
    pub why: String,
}

impl fmt::Display for Refused {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "leg_kind.{}: {}: {}", self.kind, self.what, self.why)
    }
}

impl std::error::Error for Refused {}

/// The number systems, in the order of reports: those of firmware, then the yardstick of the method.
pub const NUMBERS: [&str; 6] = [
    NumberSystem::Float32.name(),
    NumberSystem::Coarse.name(),
    NumberSystem::Fixed32.name(),
    NumberSystem::Short32.name(),
    NumberSystem::Fixed16.name(),
    Float64::NAME,
];

/// A kind of leg in every number system that can hold it, in the order of [`NUMBERS`]. One that cannot is left out,
/// unless the sheet says that the firmware uses it.
///
/// # Errors
/// What ik-core refuses, and why.
pub fn in_every_number(robot: &Robot, kind: usize) -> Result<Vec<Box<dyn Machine>>, Refused> {
    let needed = |name: &str| {
        name == Float64::NAME || robot.firmware.numbers.iter().any(|number| number.name() == name)
    };
    let made = [
        of_kind::<Float32>(robot, kind),
        of_kind::<Coarse>(robot, kind),
        of_kind::<Fixed32>(robot, kind),
        of_kind::<Short32>(robot, kind),
        of_kind::<Fixed16>(robot, kind),
        of_kind::<Float64>(robot, kind),
    ];
    made.into_iter()
        .zip(NUMBERS)
        .filter(|(made, name)| made.is_ok() || needed(name))
        .map(|(made, _)| made)
        .collect()
}

fn of_kind<N: Number + Send + Sync>(robot: &Robot, kind: usize) -> Result<Box<dyn Machine>, Refused>
where
    N::Length: Send + Sync,
    KindInNumber<RollHip, N>: Machine,
    KindInNumber<YawHip, N>: Machine,
{
    let sheet = &robot.kinds[kind];
    Ok(match sheet.hip {
        HipShape::Roll => Box::new(KindInNumber::<RollHip, N>::new(robot, kind, leg::roll_measures(sheet)?)?),
        HipShape::Yaw => Box::new(KindInNumber::<YawHip, N>::new(robot, kind, leg::yaw_measures(sheet)?)?),
    })
}

/// Bends of a servo with as many points as one may have.
const BENDS: usize = MOST_POINTS - 2;

/// What drives a leg's joints, with room for any servo.
enum AnyDrive<N: Number> {
    Direct([Channel<N, BENDS>; 3]),
    Parallelogram(Parallelogram<Channel<N, BENDS>>),
}

struct KindInNumber<H: Hip, N: Number> {
    leg: Leg<H, N>,
    bends_back: bool,
    /// By leg of this kind.
    drives: Vec<AnyDrive<N>>,
    counter: Counter,
}

impl<H: Hip, N: Number> KindInNumber<H, N> {
    fn new(robot: &Robot, kind: usize, dimensions: Dimensions<H>) -> Result<Self, Refused> {
        let sheet = &robot.kinds[kind];
        let counter = Counter::of_kind(robot, kind)?;
        let curves = curves(robot, kind)?;
        let drives = curves
            .iter()
            .map(|curves| {
                let channel = |joint: usize| {
                    Channel::from_curve(&curves[joint], counter.counting())
                        .map_err(|error| of_servo(sheet, joint, error))
                };
                let channels = [channel(0)?, channel(1)?, channel(2)?];
                Ok(match sheet.knee_drive {
                    KneeDrive::Direct => AnyDrive::Direct(channels),
                    KneeDrive::Parallelogram => AnyDrive::Parallelogram(Parallelogram(channels)),
                })
            })
            .collect::<Result<_, _>>()?;
        let bends_back = matches!(sheet.bend, Bend::Backward | Bend::Down);
        let leg = leg::limited(sheet, dimensions, &curves)?;
        Ok(Self { leg, bends_back, drives, counter })
    }
}

/// What is refused of a joint's servo.
fn of_servo(sheet: &LegKind, joint: usize, why: impl fmt::Display) -> Refused {
    Refused {
        kind: sheet.name.clone(),
        what: format!("servo.{}", sheet.joint_names()[joint]),
        why: why.to_string(),
    }
}

/// The curves of the servos of every leg of a kind.
fn curves(robot: &Robot, kind: usize) -> Result<Vec<[Curve; 3]>, Refused> {
    let sheet = &robot.kinds[kind];
    trims(robot, kind)
        .map(|trims| {
            let curve = |joint: usize| {
                servo::curve(&sheet.servos[joint], trims[joint])
                    .map_err(|error| of_servo(sheet, joint, error))
            };
            Ok([curve(0)?, curve(1)?, curve(2)?])
        })
        .collect()
}

/// The joint ranges that suit the servos of every leg of the kind.
fn limits(
    sheet: &LegKind,
    bend: ik_core::Bend,
    curves: &[[Curve; 3]],
) -> Result<Limits, ik_core::limits::LimitsError> {
    let [hip, thigh, knee] = sheet.range_deg;
    let limits = Limits::degrees(hip, thigh, knee)?;
    match sheet.knee_drive {
        KneeDrive::Direct => Ok(limits),
        KneeDrive::Parallelogram => curves.iter().try_fold(limits, |limits, [_, thigh, shank]| {
            limits.through_parallelogram(bend, thigh.joint_deg(), shank.joint_deg())
        }),
    }
}

impl<H: Hip, N: Number> Machine for KindInNumber<H, N>
where
    Self: Send + Sync,
{
    fn number(&self) -> &'static str {
        N::NAME
    }

    fn answer(&self, leg: usize, [x, y, z]: [f64; 3]) -> Option<Answered> {
        let foot = Foot::<N>::try_from_mm(x, y, z)?;
        let answer = self.leg.solve(foot, Joints::ZERO);
        let joints = answer.joints.as_array();
        let Counts { counts, held } = match &self.drives[leg % self.drives.len()] {
            AnyDrive::Direct(channels) => channels.send(&answer.joints, self.bends_back),
            AnyDrive::Parallelogram(channels) => channels.send(&answer.joints, self.bends_back),
        };
        Some(Answered {
            foot_mm: foot.mm(),
            pose: Pose { hip: joints[0].radians(), thigh: joints[1].radians(), knee: joints[2].radians() },
            outcome: answer.outcome,
            off_by_mm: N::mm(answer.off_by),
            counts,
            pulses_held: held.as_array(),
            pulses_us: counts.map(|counts| f64::from(counts) * self.counter.count_us()),
        })
    }
}

/// The trims of the legs of a kind, in the order of the sheet.
pub(crate) fn trims(robot: &Robot, kind: usize) -> impl Iterator<Item = [f64; 3]> + '_ {
    legs_of(robot, kind).map(|leg| robot.legs[leg].trim_us)
}

/// The legs of a kind, by their place in the sheet.
pub fn legs_of(robot: &Robot, kind: usize) -> impl Iterator<Item = usize> + '_ {
    (0..robot.legs.len()).filter(move |leg| robot.legs[*leg].kind == kind)
}

fn bend(bend: Bend) -> ik_core::Bend {
    match bend {
        Bend::Forward => ik_core::Bend::Forward,
        Bend::Backward => ik_core::Bend::Backward,
        Bend::Up => ik_core::Bend::Up,
        Bend::Down => ik_core::Bend::Down,
    }
}

/// A kind of leg as the reference sees it: from the sheet, not from ik-core.
pub fn judged_leg(kind: &LegKind) -> judged::Leg {
    judged::Leg {
        shape: match kind.hip {
            HipShape::Roll => judged::Shape::Roll,
            HipShape::Yaw => judged::Shape::Yaw,
        },
        offset: kind.offset_mm,
        thigh: kind.thigh_mm,
        shank: kind.shank_mm,
        bend: match kind.bend {
            Bend::Forward => judged::Bend::Forward,
            Bend::Backward => judged::Bend::Backward,
            Bend::Up => judged::Bend::Up,
            Bend::Down => judged::Bend::Down,
        },
    }
}

/// The joint ranges of a kind's legs as the reference sees them.
pub fn judged_ranges(robot: &Robot, kind: usize) -> Ranges {
    let [hip, thigh, knee] = robot.kinds[kind].kept_range_deg(trims(robot, kind));
    let range = |[least, most]: [f64; 2]| Range { min: least.to_radians(), max: most.to_radians() };
    Ranges { hip: range(hip), thigh: range(thigh), knee: range(knee) }
}
