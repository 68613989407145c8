//! A robot of a sheet in a number system: the very code that will be flashed, behind one face.

mod output;

pub use output::Counter;

use crate::numbers::Float64;
use crate::reference::leg::{self as judged, Pose, Range, Ranges};
use crate::sheet::{Bend, HipShape, LegKind, NumberSystem, Robot, Servo as ServoSheet, Turns};
use ik_core::limits::End;
use ik_core::output::Output as _;
use ik_core::{
    Coarse, Dimensions, Fixed16, Fixed32, Float32, Foot, Hip, Joints, Leg, Limits, Number, Outcome, RollHip,
    Servo, ServoSpec, YawHip,
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
    /// The pulses, µs.
    pub pulses_us: [f64; 3],
    /// The ends of the pulse ranges at which they were held.
    pub pulses_held: [Option<End>; 3],
    /// The counts that the output makes of them.
    pub counts: [u32; 3],
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
pub const NUMBERS: [&str; 5] = [
    NumberSystem::Float32.name(),
    NumberSystem::Coarse.name(),
    NumberSystem::Fixed32.name(),
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
    let refused = |what: &str, why: String| Refused { kind: sheet.name.clone(), what: what.into(), why };
    let measures = |error: ik_core::GeometryError| refused("measures", error.to_string());
    let (offset, thigh, shank) = (sheet.offset_mm, sheet.thigh_mm, sheet.shank_mm);
    Ok(match sheet.hip {
        HipShape::Roll => Box::new(KindInNumber::<RollHip, N>::new(
            robot,
            kind,
            Dimensions::roll_hip(offset, thigh, shank, bend(sheet.bend)).map_err(measures)?,
        )?),
        HipShape::Yaw => Box::new(KindInNumber::<YawHip, N>::new(
            robot,
            kind,
            Dimensions::yaw_hip(offset, thigh, shank, bend(sheet.bend)).map_err(measures)?,
        )?),
    })
}

struct KindInNumber<H: Hip, N: Number> {
    leg: Leg<H, N>,
    /// By leg of this kind: hip, thigh, knee.
    servos: Vec<[Servo<N>; 3]>,
    counter: Counter,
}

impl<H: Hip, N: Number> KindInNumber<H, N> {
    fn new(robot: &Robot, kind: usize, dimensions: Dimensions<H>) -> Result<Self, Refused> {
        let sheet = &robot.kinds[kind];
        let refused = |what: String, why: String| Refused { kind: sheet.name.clone(), what, why };
        let [hip, thigh, knee] = sheet.range_deg;
        let limits = Limits::degrees(hip, thigh, knee)
            .map_err(|error| refused("range_deg".into(), error.to_string()))?;
        let servos = trims(robot, kind)
            .map(|trims| {
                let servo = |joint: usize| {
                    Servo::from_spec(servo_spec(&sheet.servos[joint], trims[joint])).map_err(|error| {
                        refused(format!("servo.{}", sheet.joint_names()[joint]), error.to_string())
                    })
                };
                Ok([servo(0)?, servo(1)?, servo(2)?])
            })
            .collect::<Result<_, _>>()?;
        Ok(Self {
            leg: Leg::from_dimensions(dimensions, limits)
                .map_err(|error| refused("measures".into(), error.to_string()))?,
            servos,
            counter: Counter::of(&robot.output)
                .map_err(|error| refused("output".into(), error.to_string()))?,
        })
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
        let servos = &self.servos[leg % self.servos.len()];
        let commands = [0, 1, 2].map(|joint| servos[joint].command(joints[joint]));
        Some(Answered {
            foot_mm: foot.mm(),
            pose: Pose { hip: joints[0].radians(), thigh: joints[1].radians(), knee: joints[2].radians() },
            outcome: answer.outcome,
            off_by_mm: N::mm(answer.off_by),
            pulses_us: commands.map(|command| command.pulse.us()),
            pulses_held: commands.map(|command| command.held),
            counts: commands.map(|command| self.counter.counts(command.pulse)),
        })
    }
}

/// The trims of the legs of a kind, in the order of the sheet.
fn trims(robot: &Robot, kind: usize) -> impl Iterator<Item = [f64; 3]> + '_ {
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

fn servo_spec(servo: &ServoSheet, trim_us: f64) -> ServoSpec {
    ServoSpec {
        centre_us: servo.centre_us,
        joint_at_centre_deg: servo.joint_at_centre_deg,
        us_per_degree: servo.us_per_degree,
        turns: match servo.turns {
            Turns::With => ik_core::Turns::With,
            Turns::Against => ik_core::Turns::Against,
        },
        trim_us,
        pulse_us: servo.pulse_us,
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

/// Its joint ranges as the reference sees them.
pub fn judged_ranges(kind: &LegKind) -> Ranges {
    let range = |[least, most]: [f64; 2]| Range { min: least.to_radians(), max: most.to_radians() };
    Ranges { hip: range(kind.range_deg[0]), thigh: range(kind.range_deg[1]), knee: range(kind.range_deg[2]) }
}

/// The servos of a kind's legs and the output, in plain f64: where counts really put the joints.
#[derive(Debug, Clone)]
pub struct Commanded {
    /// By leg of the kind, by joint: the pulse at the joint's angle at the centre, µs.
    centres_us: Vec<[f64; 3]>,
    /// By joint: radians per µs, with its sign.
    radians_per_us: [f64; 3],
    at_centre: [f64; 3],
    count_us: f64,
}

impl Commanded {
    /// For a kind of leg.
    ///
    /// # Errors
    /// What the output refuses.
    pub fn of(robot: &Robot, kind: usize) -> Result<Self, Refused> {
        let sheet = &robot.kinds[kind];
        let counter = Counter::of(&robot.output).map_err(|error| Refused {
            kind: sheet.name.clone(),
            what: "output".into(),
            why: error.to_string(),
        })?;
        let servo = |joint: usize| &sheet.servos[joint];
        Ok(Self {
            centres_us: trims(robot, kind)
                .map(|trims| [0, 1, 2].map(|joint| servo(joint).centre_us + trims[joint]))
                .collect(),
            radians_per_us: [0, 1, 2].map(|joint| {
                let gain = servo(joint).us_per_degree.recip().to_radians();
                if servo(joint).turns == Turns::With { gain } else { -gain }
            }),
            at_centre: [0, 1, 2].map(|joint| servo(joint).joint_at_centre_deg.to_radians()),
            count_us: counter.count_us(),
        })
    }

    /// The pose in which ideal servos of the `leg`th leg of the kind stand at the given counts.
    pub fn pose(&self, leg: usize, counts: [u32; 3]) -> Pose {
        let centres = &self.centres_us[leg % self.centres_us.len()];
        let [hip, thigh, knee] = [0, 1, 2].map(|joint| {
            let pulse = f64::from(counts[joint]) * self.count_us;
            self.at_centre[joint] + (pulse - centres[joint]) * self.radians_per_us[joint]
        });
        Pose { hip, thigh, knee }
    }
}
