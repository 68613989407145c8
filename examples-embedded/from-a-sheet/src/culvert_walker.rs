//! "culvert walker": its legs as constants in `fixed32`.
//!
//! A program wrote this file. Change the sheet, not the file, and write it anew with
//!
//! ```console
//! $ toehold constants culvert-walker --rust --number fixed32 --targets 20000 --seed 1
//! ```
//!
//! | | |
//! | --- | --- |
//! | sheet | demo robot culvert-walker |
//! | its SHA-256 | 49a98ddc5cfa15cc18887afb118424106534da4999d7986a31ee5ac6ac83747e |
//! | toehold | 0.1.0 |
//! | needs | ik-core with the feature `fixed32`; fixed |
//!
//! Largest foot errors that a survey found; none worse was found, which does not say that there is none. 20000 targets
//! of each kind of leg, seed 1, the servos taken to be ideal.
//!
//! | leg kind | | found | the sheet allows | |
//! | --- | --- | --- | --- | --- |
//! | "walker" | arithmetic | 7.6e-5 mm | 0.01 mm | within |
//! | "walker" | with the pulse | 1.23 mm | 2.5 mm | within |
//! | "walker" | work volume unreached | 0.84 % | 3 % | within |
//!
//! Before a machine moves: lift it off the ground, feed it from a current-limited supply, and keep a way to cut power within
//! reach. Local rules and qualified practice come before anything written here.
#![allow(dead_code, unreachable_pub)] // a firmware need not use everything

use fixed::types::I16F16;
use ik_core::{Bend, Channel, Curve, Dimensions, Expander, Fixed32, Foot, Leg, Limb, Limits, Mounting, ServoBounds, ServoSpec, Side, Turns, YawHip};

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

/// expander: clock divided by 122, 4.8800 µs a count, frames of 19.988 ms (50.029 Hz)
pub const OUTPUT: Expander = possible!(Expander::new(25000000, 122, 12));

/// A length in its own steps.
const fn mm(steps: i32) -> I16F16 {
    I16F16::from_bits(steps)
}

/// The legs of the kind "walker".
pub mod walker_legs {
    use super::*;

    /// What drives a leg: hip, femur, knee.
    pub type Drive = [Channel<Number, 0>; 3];

    /// The joint ranges that are kept.
    pub const LIMITS: Limits = possible!(Limits::degrees([-50.0, 50.0], [-40.0, 90.0], [15.0, 155.0]));

    /// Any of these legs, without its place and its servos.
    pub const LEG: Leg<YawHip, Number> = possible!(Leg::<YawHip, Number>::new(possible!(Dimensions::yaw_hip(42.5, 71.0, 118.4, Bend::Up)), LIMITS));

    const LEFT_FRONT_CURVES: [Curve; 3] = [
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 0.0, us_per_degree: 11.1, turns: Turns::With, trim_us: 0.0, pulse_us: [600.0, 2400.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 25.0, us_per_degree: 11.1, turns: Turns::Against, trim_us: 5.0, pulse_us: [600.0, 2400.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 85.0, us_per_degree: 11.1, turns: Turns::With, trim_us: -12.0, pulse_us: [600.0, 2400.0] }.curve()),
    ];
    /// "left front", at [95.0, 58.0, 0.0] mm on the body.
    pub const LEFT_FRONT: Limb<YawHip, Number, Drive> = limb(Foot::new(mm(6225920), mm(3801088), mm(0)), Side::Left, &LEFT_FRONT_CURVES);

    const LEFT_MIDDLE_CURVES: [Curve; 3] = [
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 0.0, us_per_degree: 11.1, turns: Turns::With, trim_us: -7.0, pulse_us: [600.0, 2400.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 25.0, us_per_degree: 11.1, turns: Turns::Against, trim_us: 0.0, pulse_us: [600.0, 2400.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 85.0, us_per_degree: 11.1, turns: Turns::With, trim_us: 9.0, pulse_us: [600.0, 2400.0] }.curve()),
    ];
    /// "left middle", at [0.0, 76.0, 0.0] mm on the body.
    pub const LEFT_MIDDLE: Limb<YawHip, Number, Drive> = limb(Foot::new(mm(0), mm(4980736), mm(0)), Side::Left, &LEFT_MIDDLE_CURVES);

    const LEFT_REAR_CURVES: [Curve; 3] = [
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 0.0, us_per_degree: 11.1, turns: Turns::With, trim_us: 3.0, pulse_us: [600.0, 2400.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 25.0, us_per_degree: 11.1, turns: Turns::Against, trim_us: -14.0, pulse_us: [600.0, 2400.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 85.0, us_per_degree: 11.1, turns: Turns::With, trim_us: 6.0, pulse_us: [600.0, 2400.0] }.curve()),
    ];
    /// "left rear", at [-95.0, 58.0, 0.0] mm on the body.
    pub const LEFT_REAR: Limb<YawHip, Number, Drive> = limb(Foot::new(mm(-6225920), mm(3801088), mm(0)), Side::Left, &LEFT_REAR_CURVES);

    const RIGHT_FRONT_CURVES: [Curve; 3] = [
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 0.0, us_per_degree: 11.1, turns: Turns::With, trim_us: 0.0, pulse_us: [600.0, 2400.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 25.0, us_per_degree: 11.1, turns: Turns::Against, trim_us: 11.0, pulse_us: [600.0, 2400.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 85.0, us_per_degree: 11.1, turns: Turns::With, trim_us: 2.0, pulse_us: [600.0, 2400.0] }.curve()),
    ];
    /// "right front", at [95.0, -58.0, 0.0] mm on the body.
    pub const RIGHT_FRONT: Limb<YawHip, Number, Drive> = limb(Foot::new(mm(6225920), mm(-3801088), mm(0)), Side::Right, &RIGHT_FRONT_CURVES);

    const RIGHT_MIDDLE_CURVES: [Curve; 3] = [
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 0.0, us_per_degree: 11.1, turns: Turns::With, trim_us: 0.0, pulse_us: [600.0, 2400.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 25.0, us_per_degree: 11.1, turns: Turns::Against, trim_us: 0.0, pulse_us: [600.0, 2400.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 85.0, us_per_degree: 11.1, turns: Turns::With, trim_us: 0.0, pulse_us: [600.0, 2400.0] }.curve()),
    ];
    /// "right middle", at [0.0, -76.0, 0.0] mm on the body.
    pub const RIGHT_MIDDLE: Limb<YawHip, Number, Drive> = limb(Foot::new(mm(0), mm(-4980736), mm(0)), Side::Right, &RIGHT_MIDDLE_CURVES);

    const RIGHT_REAR_CURVES: [Curve; 3] = [
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 0.0, us_per_degree: 11.1, turns: Turns::With, trim_us: -4.0, pulse_us: [600.0, 2400.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 25.0, us_per_degree: 11.1, turns: Turns::Against, trim_us: 8.0, pulse_us: [600.0, 2400.0] }.curve()),
        possible!(ServoSpec { centre_us: 1500.0, joint_at_centre_deg: 85.0, us_per_degree: 11.1, turns: Turns::With, trim_us: -15.0, pulse_us: [600.0, 2400.0] }.curve()),
    ];
    /// "right rear", at [-95.0, -58.0, 0.0] mm on the body.
    pub const RIGHT_REAR: Limb<YawHip, Number, Drive> = limb(Foot::new(mm(-6225920), mm(-3801088), mm(0)), Side::Right, &RIGHT_REAR_CURVES);

    /// All of them, in the order of the sheet, in flash.
    pub static ALL: [Limb<YawHip, Number, Drive>; 6] = [LEFT_FRONT, LEFT_MIDDLE, LEFT_REAR, RIGHT_FRONT, RIGHT_MIDDLE, RIGHT_REAR];

    /// Their names.
    pub const NAMES: [&str; 6] = ["left front", "left middle", "left rear", "right front", "right middle", "right rear"];

    /// What frame safety needs to know of their servos, leg by leg (hip, femur, knee), in counts: range, first pulse, slew.
    pub const BOUNDS: [ServoBounds; 18] = [
        possible!(ServoBounds::in_counts([123, 491], 307, 16)),
        possible!(ServoBounds::in_counts([123, 491], 216, 16)),
        possible!(ServoBounds::in_counts([123, 491], 407, 16)),
        possible!(ServoBounds::in_counts([123, 491], 306, 16)),
        possible!(ServoBounds::in_counts([123, 491], 215, 16)),
        possible!(ServoBounds::in_counts([123, 491], 412, 16)),
        possible!(ServoBounds::in_counts([123, 491], 308, 16)),
        possible!(ServoBounds::in_counts([123, 491], 212, 16)),
        possible!(ServoBounds::in_counts([123, 491], 411, 16)),
        possible!(ServoBounds::in_counts([123, 491], 307, 16)),
        possible!(ServoBounds::in_counts([123, 491], 217, 16)),
        possible!(ServoBounds::in_counts([123, 491], 410, 16)),
        possible!(ServoBounds::in_counts([123, 491], 307, 16)),
        possible!(ServoBounds::in_counts([123, 491], 215, 16)),
        possible!(ServoBounds::in_counts([123, 491], 410, 16)),
        possible!(ServoBounds::in_counts([123, 491], 307, 16)),
        possible!(ServoBounds::in_counts([123, 491], 217, 16)),
        possible!(ServoBounds::in_counts([123, 491], 407, 16)),
    ];

    const fn limb(at: Foot<Number>, side: Side, curves: &[Curve; 3]) -> Limb<YawHip, Number, Drive> {
        let servos = [channel(&curves[0]), channel(&curves[1]), channel(&curves[2])];
        Limb { leg: LEG, mounting: Mounting::new(at, side), servos }
    }

    const fn channel(curve: &Curve) -> Channel<Number, 0> {
        possible!(Channel::<Number, 0>::of(curve, OUTPUT.counting()))
    }
}
