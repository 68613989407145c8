//! Two legs of the demo robots, with their servos, and the timer that the servos hang on.
//!
//! The figures are those of the demo sheets `ik-host-tests/robots/*.toml`; both robots drive their servos
//! by the timer here, though the culvert walker's sheet has an expander.

use ik_core::number::Number;
use ik_core::{
    Bend, Channel, Coarse, Curve, Dimensions, Fixed16, Fixed32, Float32, Foot, Leg, Limb, Limits,
    MeasuredServo, Mounting, Parallelogram, RollHip, ServoSpec, Short32, Side, Timer, Turns, YawHip,
};

/// An impossible leg, range or servo does not compile: the message becomes a compile error.
macro_rules! possible {
    ($checked:expr) => {
        match $checked {
            Ok(possible) => possible,
            Err(error) => panic!("{}", error.message()),
        }
    };
}

/// 16 bits at 48 MHz, frames of 20 ms.
const TIMER: Timer = possible!(Timer::finest(48_000_000, 16, 50.0));

/// The two legs as constants of a number system; nothing is computed at start-up.
pub(crate) trait InFlash: Number {
    /// Right front leg of the orchard walker.
    const ORCHARD: Limb<RollHip, Self, [Channel<Self>; 3]>;
    /// The same leg with free joints.
    const ORCHARD_FREE: Leg<RollHip, Self>;
    /// The same leg with bent servos, the knee's on the body.
    const ORCHARD_BENT: Limb<RollHip, Self, Parallelogram<Channel<Self, 3>>>;
    /// Left front leg of the culvert walker.
    const CULVERT: Limb<YawHip, Self, [Channel<Self>; 3]>;
    /// The same leg with free joints.
    const CULVERT_FREE: Leg<YawHip, Self>;
}

const ORCHARD_DIMENSIONS: Dimensions<RollHip> =
    possible!(Dimensions::roll_hip(31.5, 94.0, 107.0, Bend::Forward));
const CULVERT_DIMENSIONS: Dimensions<YawHip> = possible!(Dimensions::yaw_hip(42.5, 71.0, 118.4, Bend::Up));

const ORCHARD_LIMITS: Limits = possible!(Limits::degrees([-35.0, 35.0], [-25.0, 85.0], [15.0, 130.0]));
const CULVERT_LIMITS: Limits = possible!(Limits::degrees([-50.0, 50.0], [-40.0, 90.0], [15.0, 155.0]));

/// A servo of about 2000 us for 180 degrees.
const fn servo(joint_at_centre_deg: f64, turns: Turns, trim_us: f64, pulse_us: [f64; 2]) -> ServoSpec {
    ServoSpec { centre_us: 1500.0, joint_at_centre_deg, us_per_degree: 11.1, turns, trim_us, pulse_us }
}

const ORCHARD_SERVOS: [ServoSpec; 3] = [
    servo(0.0, Turns::With, -3.0, [1000.0, 2000.0]),
    servo(30.0, Turns::With, 12.0, [800.0, 2200.0]),
    servo(72.5, Turns::Against, -7.0, [800.0, 2200.0]),
];

/// A servo as it might be measured: up to five points, so that three bends are room enough.
const fn bent(points: &[[f64; 2]], trim_us: f64) -> Curve {
    possible!(MeasuredServo { points, trim_us, pulse_us: [650.0, 2350.0] }.curve())
}

/// Hip, thigh and shank, invented; the shank turns against its pulse.
const BENT_SERVOS: [Curve; 3] = [
    bent(&[[1000.0, -44.0], [1500.0, 0.5], [2000.0, 46.0]], -3.0),
    bent(&[[700.0, -42.5], [1200.0, 2.0], [1800.0, 57.0], [2200.0, 94.5]], 12.0),
    bent(&[[700.0, 117.0], [1000.0, 87.0], [1500.0, 42.0], [2000.0, -4.5], [2300.0, -34.0]], -7.0),
];

/// What the links stand, less what the servos of thigh and shank leave the thigh.
const BENT_LIMITS: Limits = possible!(ORCHARD_LIMITS.through_parallelogram(
    Bend::Forward,
    BENT_SERVOS[1].joint_deg(),
    BENT_SERVOS[2].joint_deg(),
));

const CULVERT_SERVOS: [ServoSpec; 3] = [
    servo(0.0, Turns::With, 0.0, [600.0, 2400.0]),
    servo(25.0, Turns::Against, 5.0, [600.0, 2400.0]),
    servo(85.0, Turns::With, -12.0, [600.0, 2400.0]),
];

/// One text for every number system: constants cannot be generic.
macro_rules! in_flash {
    ($numbers:ty, $mm:expr) => {
        impl InFlash for $numbers {
            const ORCHARD: Limb<RollHip, Self, [Channel<Self>; 3]> = Limb {
                leg: possible!(Leg::<RollHip, Self>::new(ORCHARD_DIMENSIONS, ORCHARD_LIMITS)),
                mounting: Mounting::new(Foot::new($mm(120), $mm(-52), $mm(0)), Side::Right),
                servos: [
                    possible!(Channel::<Self>::new(ORCHARD_SERVOS[0], TIMER.counting())),
                    possible!(Channel::<Self>::new(ORCHARD_SERVOS[1], TIMER.counting())),
                    possible!(Channel::<Self>::new(ORCHARD_SERVOS[2], TIMER.counting())),
                ],
            };
            const ORCHARD_FREE: Leg<RollHip, Self> =
                possible!(Leg::<RollHip, Self>::new(ORCHARD_DIMENSIONS, Limits::FREE));
            const ORCHARD_BENT: Limb<RollHip, Self, Parallelogram<Channel<Self, 3>>> = Limb {
                leg: possible!(Leg::<RollHip, Self>::new(ORCHARD_DIMENSIONS, BENT_LIMITS)),
                mounting: Self::ORCHARD.mounting,
                servos: Parallelogram([
                    possible!(Channel::<Self, 3>::of(&BENT_SERVOS[0], TIMER.counting())),
                    possible!(Channel::<Self, 3>::of(&BENT_SERVOS[1], TIMER.counting())),
                    possible!(Channel::<Self, 3>::of(&BENT_SERVOS[2], TIMER.counting())),
                ]),
            };
            const CULVERT: Limb<YawHip, Self, [Channel<Self>; 3]> = Limb {
                leg: possible!(Leg::<YawHip, Self>::new(CULVERT_DIMENSIONS, CULVERT_LIMITS)),
                mounting: Mounting::new(Foot::new($mm(95), $mm(58), $mm(0)), Side::Left),
                servos: [
                    possible!(Channel::<Self>::new(CULVERT_SERVOS[0], TIMER.counting())),
                    possible!(Channel::<Self>::new(CULVERT_SERVOS[1], TIMER.counting())),
                    possible!(Channel::<Self>::new(CULVERT_SERVOS[2], TIMER.counting())),
                ],
            };
            const CULVERT_FREE: Leg<YawHip, Self> =
                possible!(Leg::<YawHip, Self>::new(CULVERT_DIMENSIONS, Limits::FREE));
        }
    };
}

const fn float_mm(mm: i32) -> f32 {
    mm as f32
}

const fn short_mm(mm: i32) -> <Fixed16 as Number>::Length {
    <Fixed16 as Number>::Length::from_bits((mm * 64) as i16)
}

const fn fixed_mm(mm: i32) -> <Fixed32 as Number>::Length {
    <Fixed32 as Number>::Length::from_bits(mm << 16)
}

in_flash!(Float32, float_mm);
in_flash!(Coarse, float_mm);
in_flash!(Fixed32, fixed_mm);
in_flash!(Short32, fixed_mm);
in_flash!(Fixed16, short_mm);
