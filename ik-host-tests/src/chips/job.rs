//! The job of `robot-cost`, from a sheet.

use crate::machine;
use crate::sheet::{Bend, HipShape, KneeDrive, Output, Robot, ServoCurve, Side, Turns};
use crate::survey::{Plan, Targets};
use serde::Serialize;

/// Targets of a kind of leg whose answers are compared: the survey's edges, grid and random ones.
pub(super) const COMPARED: Plan = Plan { targets: 10_000, seed: 1 };
/// Every so many-th of them is counted.
const COUNTED_EVERY: usize = 10;

#[derive(Debug, Serialize)]
pub(super) struct Job {
    pub(super) legs: Vec<Leg>,
    pub(super) numbers: Vec<&'static str>,
}

#[derive(Debug, Serialize)]
pub(super) struct Leg {
    name: String,
    hip: &'static str,
    parallelogram: bool,
    output: &'static str,
    measures_mm: [f64; 3],
    bends_back: bool,
    range_deg: [[f64; 2]; 3],
    at_mm: [f64; 3],
    right: bool,
    servos: [Servo; 3],
    clock_hz: u32,
    divider: u32,
    bits: u8,
    frame_hz: f64,
    compared: Vec<[f64; 3]>,
    /// Those that stand for the work volume come first.
    counted: Vec<[f64; 3]>,
    typical: usize,
}

#[derive(Debug, Serialize)]
struct Servo {
    curve: Curve,
    trim_us: f64,
    pulse_us: [f64; 2],
}

#[derive(Debug, Serialize)]
#[serde(rename_all = "kebab-case")]
enum Curve {
    Straight { centre_us: f64, joint_at_centre_deg: f64, us_per_degree: f64, against: bool },
    Measured(Vec<[f64; 2]>),
}

impl Curve {
    fn of(curve: &ServoCurve) -> Self {
        match curve {
            ServoCurve::Straight { centre_us, joint_at_centre_deg, us_per_degree, turns } => Self::Straight {
                centre_us: *centre_us,
                joint_at_centre_deg: *joint_at_centre_deg,
                us_per_degree: *us_per_degree,
                against: *turns == Turns::Against,
            },
            ServoCurve::Measured { measured } => Self::Measured(measured.clone()),
        }
    }
}

/// The first leg of a kind.
pub(super) fn leg(robot: &Robot, kind: usize) -> Leg {
    let sheet = &robot.kinds[kind];
    let mount = &robot.legs[machine::legs_of(robot, kind).next().expect("every kind has a leg")];
    let targets = Targets::of(sheet, COMPARED);
    let all: Vec<_> = targets.chunk(0, COMPARED.targets).collect();
    let counted = |inner: bool| {
        all.iter().filter(move |target| target.2 == inner).step_by(COUNTED_EVERY).map(|target| target.1)
    };
    let (output, clock_hz, divider, bits) = match robot.output {
        Output::Timer { clock_hz, counter_bits, prescaler, .. } => {
            ("timer", clock_hz, prescaler.unwrap_or(0), counter_bits)
        }
        Output::Expander { oscillator_hz, resolution_bits, .. } => {
            ("expander", oscillator_hz, 0, resolution_bits)
        }
    };
    Leg {
        name: format!("{}, leg {:?}", robot.name, mount.name),
        hip: match sheet.hip {
            HipShape::Roll => "roll",
            HipShape::Yaw => "yaw",
        },
        output,
        parallelogram: sheet.knee_drive == KneeDrive::Parallelogram,
        measures_mm: [sheet.offset_mm, sheet.thigh_mm, sheet.shank_mm],
        bends_back: matches!(sheet.bend, Bend::Backward | Bend::Down),
        range_deg: sheet.range_deg,
        at_mm: mount.at_mm,
        right: mount.side == Side::Right,
        servos: [0, 1, 2].map(|joint| {
            let servo = &sheet.servos[joint];
            Servo { curve: Curve::of(&servo.curve), trim_us: mount.trim_us[joint], pulse_us: servo.pulse_us }
        }),
        clock_hz,
        divider,
        bits,
        frame_hz: robot.output.frame_hz(),
        compared: all.iter().map(|target| target.1).collect(),
        typical: counted(true).count(),
        counted: counted(true).chain(counted(false)).collect(),
    }
}
