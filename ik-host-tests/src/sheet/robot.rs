//! What a sheet says, once it has been checked: plain data in f64, units in the names.

use serde::Serialize;

/// A robot as its sheet describes it. Everything in it has passed the checks of the sheet reader.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Robot {
    /// What the robot is called.
    pub name: String,
    /// One line about it.
    pub about: Option<String>,
    /// What the firmware computes with, and how often.
    pub firmware: Firmware,
    /// What turns pulses into counts.
    pub output: Output,
    /// The kinds of leg, in the order of the sheet. At least one, and every one is used by a leg.
    pub kinds: Vec<LegKind>,
    /// The legs, in the order of the sheet: 1 to 16.
    pub legs: Vec<LegMount>,
    /// What the gate allows.
    pub allowed: Allowed,
}

/// What the firmware computes with, and how often.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Firmware {
    /// The number systems that the gate judges, in the order of the sheet: at least one, none twice.
    pub numbers: Vec<NumberSystem>,
    /// How often a new foot target is solved, in hertz.
    pub frame_hz: f64,
}

/// A number system that firmware can compute in.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum NumberSystem {
    /// 32-bit floating point, accurate functions.
    Float32,
    /// 32-bit floating point, coarse functions.
    Coarse,
    /// 32-bit fixed point.
    Fixed32,
    /// 32-bit fixed point without long multiplication or division.
    Short32,
    /// 16-bit fixed point, for legs of up to 453 mm.
    Fixed16,
}

impl NumberSystem {
    /// Every number system, in the order in which help lists them.
    pub const ALL: [Self; 5] = [Self::Float32, Self::Coarse, Self::Fixed32, Self::Short32, Self::Fixed16];

    /// Its name in a sheet.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Float32 => "float32",
            Self::Coarse => "coarse",
            Self::Fixed32 => "fixed32",
            Self::Short32 => "short32",
            Self::Fixed16 => "fixed16",
        }
    }
}

/// What turns a pulse into whole counts.
#[derive(Debug, Clone, PartialEq, Serialize)]
#[serde(tag = "kind", rename_all = "lowercase")]
pub enum Output {
    /// A timer of the microcontroller.
    Timer {
        /// Clock that enters the prescaler, in hertz: 1 kHz to 1 GHz.
        clock_hz: u32,
        /// Width of the counter: 8 to 32 bits.
        counter_bits: u8,
        /// Servo frames a second: 20 to 500.
        frame_hz: f64,
        /// What the clock is divided by, 1 to 65536; `None`: the finest with which a frame fits the
        /// counter.
        prescaler: Option<u32>,
    },
    /// A PWM expander with one prescaler for all channels; one frame is 2^bits counts.
    Expander {
        /// Its oscillator, in hertz: 1 kHz to 1 GHz.
        oscillator_hz: u32,
        /// Counts in a frame, as a power of two: 8 to 16 bits.
        resolution_bits: u8,
        /// Servo frames a second as asked for, 20 to 500. What the whole-number prescaler makes of it
        /// lies within a tenth.
        frame_hz: f64,
    },
}

impl Output {
    /// Servo frames a second as the sheet asks for them.
    pub const fn frame_hz(&self) -> f64 {
        match self {
            Self::Timer { frame_hz, .. } | Self::Expander { frame_hz, .. } => *frame_hz,
        }
    }
}

/// A kind of leg: its shape, its servos and where its foot works.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct LegKind {
    /// Its name in the sheet, `[leg_kind.NAME]`.
    pub name: String,
    /// What the first joint does.
    pub hip: HipShape,
    /// Roll-hip: sideways offset from the roll axis to the plane of the leg. Yaw-hip: length of the
    /// coxa, from the yaw axis to the femur's joint. Millimetres, at least 0.
    pub offset_mm: f64,
    /// Thigh or femur, joint to joint, in millimetres.
    pub thigh_mm: f64,
    /// Shank or tibia, knee joint to foot, in millimetres.
    pub shank_mm: f64,
    /// The side to which the knee bends.
    pub bend: Bend,
    /// Joint ranges, `[least, most]` in degrees: hip, thigh or femur, knee.
    pub range_deg: [[f64; 2]; 3],
    /// What the knee's servo turns.
    pub knee_drive: KneeDrive,
    /// Servos: hip, thigh or femur, knee. With a parallelogram, the angles of the knee's servo are the shank's.
    pub servos: [Servo; 3],
    /// Where the foot works.
    pub work: WorkBox,
}

impl LegKind {
    /// What this kind of leg calls its joints, in the order of `range_deg`, `servos` and `trim_us`.
    pub const fn joint_names(&self) -> [&'static str; 3] {
        self.hip.joint_names()
    }
}

/// What the first joint of a leg does.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum HipShape {
    /// It rolls about x and carries a sideways offset.
    Roll,
    /// It yaws about z and carries a coxa.
    Yaw,
}

impl HipShape {
    /// What a leg of this shape calls its joints.
    pub const fn joint_names(self) -> [&'static str; 3] {
        match self {
            Self::Roll => ["hip", "thigh", "knee"],
            Self::Yaw => ["hip", "femur", "knee"],
        }
    }
}

/// The side to which a knee bends.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Bend {
    /// Roll-hip: the knee stands before the line from thigh joint to foot.
    Forward,
    /// Roll-hip: the knee stands behind it.
    Backward,
    /// Yaw-hip: the knee stands above the line from femur joint to foot.
    Up,
    /// Yaw-hip: the knee hangs below it.
    Down,
}

/// What the servo of the knee turns.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum KneeDrive {
    /// The knee: it sits on the thigh, or moves with it.
    Direct,
    /// The shank, from the body, through a parallelogram beside the thigh. The servo's angle is the shank's: counted as
    /// the knee is, so that it is knee + thigh for a knee that bends backward or down, knee - thigh for one that bends
    /// forward or up.
    Parallelogram,
}

/// One servo: how joint angle and pulse go together, and what it can bear.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Servo {
    /// How joint angle and pulse go together, before trim.
    #[serde(flatten)]
    pub curve: ServoCurve,
    /// Mechanically safe pulses, `[least, most]` in microseconds; the centre, or every measured pulse, lies within.
    pub pulse_us: [f64; 2],
    /// Change of pulse that the servo does not answer, in microseconds.
    pub dead_band_us: f64,
    /// Seconds for 60 degrees without load.
    pub speed_s_per_60_deg: Option<f64>,
    /// Torque at stall, in newton millimetres.
    pub stall_torque_n_mm: Option<f64>,
    /// The most that the pulse may change from one frame to the next, in microseconds: at least a count of the output.
    pub slew_us_per_frame: Option<f64>,
    /// The first pulse after power comes on, in microseconds, before trim: where the servo stands then. It lies within
    /// `pulse_us`.
    pub start_us: Option<f64>,
}

impl Servo {
    /// The pulse in the middle, before trim: of a straight curve its centre, of a measured one midway between its ends.
    pub fn middle_us(&self) -> f64 {
        match &self.curve {
            ServoCurve::Straight { centre_us, .. } => *centre_us,
            ServoCurve::Measured { measured } => {
                let ends = [measured.first(), measured.last()].map(|point| point.map_or(0.0, |[us, _]| *us));
                (ends[0] + ends[1]) / 2.0
            }
        }
    }

    /// The pulses that are ever sent with a trim, `[least, most]` in microseconds: the safe ones, and of a measured curve
    /// no more than was measured. Empty (the first above the second) if the trim leaves none.
    pub fn sent_us(&self, trim_us: f64) -> [f64; 2] {
        let [least, most] = self.pulse_us;
        match &self.curve {
            ServoCurve::Straight { .. } => [least, most],
            ServoCurve::Measured { measured } => {
                let end = |point: Option<&[f64; 2]>| point.map_or(0.0, |[us, _]| us + trim_us);
                [least.max(end(measured.first())), most.min(end(measured.last()))]
            }
        }
    }
}

/// How joint angle and pulse go together.
#[derive(Debug, Clone, PartialEq, Serialize)]
#[serde(untagged)]
pub enum ServoCurve {
    /// A straight line.
    Straight {
        /// Pulse at which the servo stands in its middle, in microseconds, before trim.
        centre_us: f64,
        /// The joint's angle then, in degrees.
        joint_at_centre_deg: f64,
        /// How much longer or shorter the pulse gets per degree of the joint, in microseconds: above 0.
        us_per_degree: f64,
        /// Whether a longer pulse makes the joint's angle larger.
        turns: Turns,
    },
    /// Straight between measured points.
    Measured {
        /// Pulse in microseconds, before trim, and the joint's angle there in degrees: 2 to 16 points, the pulses rising,
        /// the angles all rising or all falling.
        measured: Vec<[f64; 2]>,
    },
}

/// Whether a longer pulse makes the joint's angle larger.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Turns {
    /// Longer pulse, larger joint angle.
    With,
    /// Longer pulse, smaller joint angle.
    Against,
}

/// A box in the leg's frame (x forward, y outboard, z up), `[least, most]` in millimetres.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct WorkBox {
    /// Forward.
    pub x_mm: [f64; 2],
    /// Outboard.
    pub y_mm: [f64; 2],
    /// Up; a foot below the hip has negative z.
    pub z_mm: [f64; 2],
}

/// One leg as it sits on the body.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct LegMount {
    /// Its name, which no other leg has.
    pub name: String,
    /// Its kind: an index into [`Robot::kinds`].
    pub kind: usize,
    /// The side it is on.
    pub side: Side,
    /// The first joint's axis in the body frame (x forward, y left, z up), in millimetres.
    pub at_mm: [f64; 3],
    /// Added to this leg's pulses, in microseconds: hip, thigh or femur, knee.
    pub trim_us: [f64; 3],
}

/// The side of the body that a leg is on.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Side {
    /// Outboard is the body's +y.
    Left,
    /// Mirrored in y: outboard is the body's -y.
    Right,
}

/// What the gate allows; beyond it the check fails.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Allowed {
    /// Largest foot error from arithmetic alone, in millimetres.
    pub arithmetic_mm: f64,
    /// Largest foot error with the pulse rounded to a whole count, in millimetres.
    pub with_pulse_mm: f64,
    /// Share of the work volume that may be out of reach or held by a limit, in percent.
    pub unreached_percent: f64,
}
