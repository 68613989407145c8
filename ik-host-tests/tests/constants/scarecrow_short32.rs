//! "scarecrow \"3\"": its legs as constants in `short32`.
//!
//! A program wrote this file. Change the sheet, not the file, and write it anew with
//!
//! ```console
//! $ toehold constants scarecrow.toml --rust --number short32 --targets 20000 --seed 1
//! ```
//!
//! | | |
//! | --- | --- |
//! | sheet | scarecrow.toml |
//! | its SHA-256 | 8773df702c7f2c1ffebd61d90aa4fda559d1914a606d823ffc395f327263ef34 |
//! | toehold | 0.1.0 |
//! | needs | ik-core with the feature `short32`; fixed |
//!
//! Largest foot errors that a survey found; none worse was found, which does not say that there is none. 20000 targets
//! of each kind of leg, seed 1, the servos taken to be ideal.
//!
//! | leg kind | | found | the sheet allows | |
//! | --- | --- | --- | --- | --- |
//! | "left & right" | arithmetic | 1.1e-4 mm | 0.1 mm | within |
//! | "left & right" | with the pulse | 0.0250 mm | 0.5 mm | within |
//! | "left & right" | work volume unreached | 0.34 % | 100 % | within |
//! | "arm" | arithmetic | 6.1e-5 mm | 0.1 mm | within |
//! | "arm" | with the pulse | 0.0231 mm | 0.5 mm | within |
//! | "arm" | work volume unreached | 38.93 % | 100 % | within |
//!
//! Before a machine moves: lift it off the ground, feed it from a current-limited supply, and keep a way to cut power within
//! reach. Local rules and qualified practice come before anything written here.
#![allow(dead_code, unreachable_pub)] // a firmware need not use everything

use fixed::types::I16F16;
use ik_core::{Bend, Channel, Curve, Dimensions, Foot, Leg, Limb, Limits, MeasuredServo, Mounting, Parallelogram, RollHip, ServoBounds, ServoSpec, Short32, Side, Timer, Turns, YawHip};

/// An impossible leg, servo or output does not compile.
macro_rules! possible {
    ($checked:expr) => {
        match $checked {
            Ok(possible) => possible,
            Err(error) => panic!("{}", error.message()),
        }
    };
}

/// What the legs compute in.
pub type Number = Short32;

/// timer: clock divided by 11, 0.1528 µs a tick, frames of 10.000 ms (99.999 Hz)
pub const OUTPUT: Timer = possible!(Timer::new(72000000, 11, 16, 100.0));

/// A length in its own steps.
const fn mm(steps: i32) -> I16F16 {
    I16F16::from_bits(steps)
}

/// The legs of the kind "left & right".
pub mod left_right_legs {
    use super::*;

    /// What drives a leg: hip, thigh, knee, the last one through a parallelogram.
    pub type Drive = Parallelogram<Channel<Number, 3>>;

    /// The joint ranges that are kept.
    pub const LIMITS: Limits = {
        let mut limits = possible!(Limits::degrees([-30.0, 30.0], [-80.0, 20.0], [15.0, 130.0]));
        limits = possible!(limits.through_parallelogram(Bend::Backward, LEFT_LEG_CURVES[1].joint_deg(), LEFT_LEG_CURVES[2].joint_deg()));
        limits = possible!(limits.through_parallelogram(Bend::Backward, LEFT_LEG_2_CURVES[1].joint_deg(), LEFT_LEG_2_CURVES[2].joint_deg()));
        limits
    };

    /// Any of these legs, without its place and its servos.
    pub const LEG: Leg<RollHip, Number> = possible!(Leg::<RollHip, Number>::new(possible!(Dimensions::roll_hip(20.0, 80.25, 90.1, Bend::Backward)), LIMITS));

    const LEFT_LEG_CURVES: [Curve; 3] = [
        possible!(MeasuredServo { points: &[[800.0, -62.5], [1100.0, -36.2], [1500.0, 0.0], [1900.0, 35.4], [2200.0, 61.1]], trim_us: 3.0, pulse_us: [800.0, 2200.0] }.curve()),
        possible!(ServoSpec { centre_us: 1480.0, joint_at_centre_deg: -30.0, us_per_degree: 10.3, turns: Turns::Against, trim_us: -20.5, pulse_us: [700.0, 2300.0] }.curve()),
        possible!(MeasuredServo { points: &[[650.0, 106.0], [1200.0, 62.5], [1700.0, 11.0], [2300.0, -41.0]], trim_us: 7.0, pulse_us: [650.0, 2300.0] }.curve()),
    ];
    /// "left leg", at [0.1, 40.0, -3.3] mm on the body.
    pub const LEFT_LEG: Limb<RollHip, Number, Drive> = limb(Foot::new(mm(6554), mm(2621440), mm(-216269)), Side::Left, &LEFT_LEG_CURVES);

    const LEFT_LEG_2_CURVES: [Curve; 3] = [
        possible!(MeasuredServo { points: &[[800.0, -62.5], [1100.0, -36.2], [1500.0, 0.0], [1900.0, 35.4], [2200.0, 61.1]], trim_us: 0.0, pulse_us: [800.0, 2200.0] }.curve()),
        possible!(ServoSpec { centre_us: 1480.0, joint_at_centre_deg: -30.0, us_per_degree: 10.3, turns: Turns::Against, trim_us: 0.0, pulse_us: [700.0, 2300.0] }.curve()),
        possible!(MeasuredServo { points: &[[650.0, 106.0], [1200.0, 62.5], [1700.0, 11.0], [2300.0, -41.0]], trim_us: -33.0, pulse_us: [650.0, 2300.0] }.curve()),
    ];
    /// "left-leg", at [0.1, -40.0, -3.3] mm on the body.
    pub const LEFT_LEG_2: Limb<RollHip, Number, Drive> = limb(Foot::new(mm(6554), mm(-2621440), mm(-216269)), Side::Right, &LEFT_LEG_2_CURVES);

    /// All of them, in the order of the sheet, in flash.
    pub static ALL: [Limb<RollHip, Number, Drive>; 2] = [LEFT_LEG, LEFT_LEG_2];

    /// Their names.
    pub const NAMES: [&str; 2] = ["left leg", "left-leg"];

    /// What frame safety needs to know of their servos, leg by leg (hip, thigh, knee), in counts: range, first pulse, slew.
    pub const BOUNDS: [ServoBounds; 6] = [
        possible!(ServoBounds::in_counts([5256, 14400], 9838, 392)),
        possible!(ServoBounds::in_counts([4582, 15054], 9684, 392)),
        possible!(ServoBounds::in_counts([4301, 15054], 9209, 297)),
        possible!(ServoBounds::in_counts([5237, 14400], 9818, 392)),
        possible!(ServoBounds::in_counts([4582, 15054], 9818, 392)),
        possible!(ServoBounds::in_counts([4255, 14838], 8948, 297)),
    ];

    const fn limb(at: Foot<Number>, side: Side, curves: &[Curve; 3]) -> Limb<RollHip, Number, Drive> {
        let servos = [channel(&curves[0]), channel(&curves[1]), channel(&curves[2])];
        Limb { leg: LEG, mounting: Mounting::new(at, side), servos: Parallelogram(servos) }
    }

    const fn channel(curve: &Curve) -> Channel<Number, 3> {
        possible!(Channel::<Number, 3>::of(curve, OUTPUT.counting()))
    }
}

/// The legs of the kind "arm".
pub mod arm_legs {
    use super::*;

    /// What drives a leg: hip, femur, knee.
    pub type Drive = [Channel<Number, 0>; 3];

    /// The joint ranges that are kept.
    pub const LIMITS: Limits = possible!(Limits::degrees([-90.0, 90.0], [-60.0, 60.0], [10.0, 140.0]));

    /// Any of these legs, without its place and its servos.
    pub const LEG: Leg<YawHip, Number> = possible!(Leg::<YawHip, Number>::new(possible!(Dimensions::yaw_hip(30.0, 70.0, 60.0, Bend::Down)), LIMITS));

    const LEG_1ST_ARM_CURVES: [Curve; 3] = [
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 0.0, us_per_degree: 10.0, turns: Turns::With, trim_us: 0.0, pulse_us: [600.0, 2400.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 0.0, us_per_degree: 11.0, turns: Turns::Against, trim_us: 0.0, pulse_us: [700.0, 2300.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 75.0, us_per_degree: 11.0, turns: Turns::With, trim_us: 0.0, pulse_us: [700.0, 2300.0] }.curve()),
    ];
    /// "1st arm", at [50.0, 30.0, 80.0] mm on the body.
    pub const LEG_1ST_ARM: Limb<YawHip, Number, Drive> = limb(Foot::new(mm(3276800), mm(1966080), mm(5242880)), Side::Left, &LEG_1ST_ARM_CURVES);

    /// All of them, in the order of the sheet, in flash.
    pub static ALL: [Limb<YawHip, Number, Drive>; 1] = [LEG_1ST_ARM];

    /// Their names.
    pub const NAMES: [&str; 1] = ["1st arm"];

    const fn limb(at: Foot<Number>, side: Side, curves: &[Curve; 3]) -> Limb<YawHip, Number, Drive> {
        let servos = [channel(&curves[0]), channel(&curves[1]), channel(&curves[2])];
        Limb { leg: LEG, mounting: Mounting::new(at, side), servos }
    }

    const fn channel(curve: &Curve) -> Channel<Number, 0> {
        possible!(Channel::<Number, 0>::of(curve, OUTPUT.counting()))
    }
}
