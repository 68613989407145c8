//! "orchard walker": its legs as constants in `fixed32`.
//!
//! A program wrote this file. Change the sheet, not the file, and write it anew with
//!
//! ```console
//! $ toehold constants orchard-walker --rust --number fixed32 --targets 20000 --seed 1
//! ```
//!
//! | | |
//! | --- | --- |
//! | sheet | demo robot orchard-walker |
//! | its SHA-256 | d650dccffc985d60b8441d253f6790bedf0e13f61cee9cf3c10bcb098cb6ad9d |
//! | toehold | 0.1.0 |
//! | needs | ik-core with the feature `fixed32`; fixed |
//!
//! Largest foot errors that a survey found; none worse was found, which does not say that there is none. 20000 targets
//! of each kind of leg, seed 1, the servos taken to be ideal.
//!
//! | leg kind | | found | the sheet allows | |
//! | --- | --- | --- | --- | --- |
//! | "strider" | arithmetic | 8.1e-5 mm | 0.01 mm | within |
//! | "strider" | with the pulse | 0.0830 mm | 0.25 mm | within |
//! | "strider" | work volume unreached | 0.14 % | 1 % | within |
//!
//! Before a machine moves: lift it off the ground, feed it from a current-limited supply, and keep a way to cut power within
//! reach. Local rules and qualified practice come before anything written here.
#![allow(dead_code, unreachable_pub)] // a firmware need not use everything

use fixed::types::I16F16;
use ik_core::{Bend, Channel, Curve, Dimensions, Fixed32, Foot, Leg, Limb, Limits, Mounting, RollHip, ServoBounds, ServoSpec, Side, Timer, Turns};

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
pub type Number = Fixed32;

/// timer: clock divided by 15, 0.3125 µs a tick, frames of 20.000 ms (50.000 Hz)
pub const OUTPUT: Timer = possible!(Timer::new(48000000, 15, 16, 50.0));

/// A length in its own steps.
const fn mm(steps: i32) -> I16F16 {
    I16F16::from_bits(steps)
}

/// The legs of the kind "strider".
pub mod strider_legs {
    use super::*;

    /// What drives a leg: hip, thigh, knee.
    pub type Drive = [Channel<Number, 0>; 3];

    /// The joint ranges that are kept.
    pub const LIMITS: Limits = possible!(Limits::degrees([-35.0, 35.0], [-25.0, 85.0], [15.0, 130.0]));

    /// Any of these legs, without its place and its servos.
    pub const LEG: Leg<RollHip, Number> = possible!(Leg::<RollHip, Number>::new(possible!(Dimensions::roll_hip(31.5, 94.0, 107.0, Bend::Forward)), LIMITS));

    const LEFT_FRONT_CURVES: [Curve; 3] = [
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 0.0, us_per_degree: 11.1, turns: Turns::With, trim_us: 6.0, pulse_us: [1000.0, 2000.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 30.0, us_per_degree: 11.1, turns: Turns::With, trim_us: -9.0, pulse_us: [800.0, 2200.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 72.5, us_per_degree: 11.1, turns: Turns::Against, trim_us: 4.0, pulse_us: [800.0, 2200.0] }.curve()),
    ];
    /// "left front", at [120.0, 52.0, 0.0] mm on the body.
    pub const LEFT_FRONT: Limb<RollHip, Number, Drive> = limb(Foot::new(mm(7864320), mm(3407872), mm(0)), Side::Left, &LEFT_FRONT_CURVES);

    const RIGHT_FRONT_CURVES: [Curve; 3] = [
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 0.0, us_per_degree: 11.1, turns: Turns::With, trim_us: -3.0, pulse_us: [1000.0, 2000.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 30.0, us_per_degree: 11.1, turns: Turns::With, trim_us: 12.0, pulse_us: [800.0, 2200.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 72.5, us_per_degree: 11.1, turns: Turns::Against, trim_us: -7.0, pulse_us: [800.0, 2200.0] }.curve()),
    ];
    /// "right front", at [120.0, -52.0, 0.0] mm on the body.
    pub const RIGHT_FRONT: Limb<RollHip, Number, Drive> = limb(Foot::new(mm(7864320), mm(-3407872), mm(0)), Side::Right, &RIGHT_FRONT_CURVES);

    const LEFT_REAR_CURVES: [Curve; 3] = [
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 0.0, us_per_degree: 11.1, turns: Turns::With, trim_us: 10.0, pulse_us: [1000.0, 2000.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 30.0, us_per_degree: 11.1, turns: Turns::With, trim_us: 2.5, pulse_us: [800.0, 2200.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 72.5, us_per_degree: 11.1, turns: Turns::Against, trim_us: -16.0, pulse_us: [800.0, 2200.0] }.curve()),
    ];
    /// "left rear", at [-120.0, 52.0, 0.0] mm on the body.
    pub const LEFT_REAR: Limb<RollHip, Number, Drive> = limb(Foot::new(mm(-7864320), mm(3407872), mm(0)), Side::Left, &LEFT_REAR_CURVES);

    const RIGHT_REAR_CURVES: [Curve; 3] = [
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 0.0, us_per_degree: 11.1, turns: Turns::With, trim_us: 0.0, pulse_us: [1000.0, 2000.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 30.0, us_per_degree: 11.1, turns: Turns::With, trim_us: -5.0, pulse_us: [800.0, 2200.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 72.5, us_per_degree: 11.1, turns: Turns::Against, trim_us: 13.0, pulse_us: [800.0, 2200.0] }.curve()),
    ];
    /// "right rear", at [-120.0, -52.0, 0.0] mm on the body.
    pub const RIGHT_REAR: Limb<RollHip, Number, Drive> = limb(Foot::new(mm(-7864320), mm(-3407872), mm(0)), Side::Right, &RIGHT_REAR_CURVES);

    /// All of them, in the order of the sheet, in flash.
    pub static ALL: [Limb<RollHip, Number, Drive>; 4] = [LEFT_FRONT, RIGHT_FRONT, LEFT_REAR, RIGHT_REAR];

    /// Their names.
    pub const NAMES: [&str; 4] = ["left front", "right front", "left rear", "right rear"];

    /// What frame safety needs to know of their servos, leg by leg (hip, thigh, knee), in counts: range, first pulse, slew.
    pub const BOUNDS: [ServoBounds; 12] = [
        possible!(ServoBounds::in_counts([3200, 6400], 4819, 288)),
        possible!(ServoBounds::in_counts([2560, 7040], 5891, 288)),
        possible!(ServoBounds::in_counts([2560, 7040], 3693, 288)),
        possible!(ServoBounds::in_counts([3200, 6400], 4790, 288)),
        possible!(ServoBounds::in_counts([2560, 7040], 5958, 288)),
        possible!(ServoBounds::in_counts([2560, 7040], 3658, 288)),
        possible!(ServoBounds::in_counts([3200, 6400], 4832, 288)),
        possible!(ServoBounds::in_counts([2560, 7040], 5928, 288)),
        possible!(ServoBounds::in_counts([2560, 7040], 3629, 288)),
        possible!(ServoBounds::in_counts([3200, 6400], 4800, 288)),
        possible!(ServoBounds::in_counts([2560, 7040], 5904, 288)),
        possible!(ServoBounds::in_counts([2560, 7040], 3722, 288)),
    ];

    const fn limb(at: Foot<Number>, side: Side, curves: &[Curve; 3]) -> Limb<RollHip, Number, Drive> {
        let servos = [channel(&curves[0]), channel(&curves[1]), channel(&curves[2])];
        Limb { leg: LEG, mounting: Mounting::new(at, side), servos }
    }

    const fn channel(curve: &Curve) -> Channel<Number, 0> {
        possible!(Channel::<Number, 0>::of(curve, OUTPUT.counting()))
    }
}
