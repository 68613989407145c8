//! ik-core's legs as constants, one line per number system.

use ik_core::{
    Bend, Channel, Coarse, Dimensions, Fixed16, Fixed32, Float32, Foot, Hip, Leg, Limb, Limits, Mounting,
    Number, RollHip, ServoSpec, Short32, Side, Timer, Turns, YawHip,
};
use targets::{PublishedLeg, ROLL_HIP, STEPS_PER_MM, YAW_HIP};

/// An impossible leg, range or servo does not compile.
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

/// A number system whose legs are constants; nothing is computed at start-up.
pub trait InFlash<H: Hip>: Number {
    /// The published leg without joint ranges.
    const FREE_LEG: Leg<H, Self>;
    /// The published leg with joint ranges and servos on a timer, on a body.
    const LIMB: Limb<H, Self, [Channel<Self>; 3]>;

    /// A length of so many steps of 1/64 mm, exact.
    fn in_steps(steps: i32) -> Self::Length;
    /// An angle as it is stored.
    fn angle_bits(angle: Self::Angle) -> u32;
}

const ROLL: Dimensions<RollHip> =
    possible!(Dimensions::roll_hip(ROLL_HIP.offset_mm, ROLL_HIP.thigh_mm, ROLL_HIP.shank_mm, Bend::Forward));
const YAW: Dimensions<YawHip> =
    possible!(Dimensions::yaw_hip(YAW_HIP.offset_mm, YAW_HIP.thigh_mm, YAW_HIP.shank_mm, Bend::Up));

const fn limits(leg: PublishedLeg) -> Limits {
    let [hip, thigh, knee] = leg.ranges_deg;
    possible!(Limits::degrees(hip, thigh, knee))
}

/// Servos of about 2000 us for 180 degrees, each centred on its joint's range; no target meets an end of a pulse
/// range, so that all take the ordinary way.
const fn servo(leg: PublishedLeg, joint: usize, turns: Turns, trim_us: f64) -> ServoSpec {
    let [least, most] = leg.ranges_deg[joint];
    ServoSpec {
        centre_us: 1500.0,
        joint_at_centre_deg: (least + most) / 2.0,
        us_per_degree: 11.1,
        turns,
        trim_us,
        pulse_us: [600.0, 2400.0],
    }
}

const fn servos(leg: PublishedLeg) -> [ServoSpec; 3] {
    [servo(leg, 0, Turns::With, -3.0), servo(leg, 1, Turns::Against, 12.0), servo(leg, 2, Turns::With, -7.0)]
}

macro_rules! one_hip {
    ($numbers:ty, $hip:ty, $dimensions:expr, $published:expr, $side:expr, $length:expr, $bits:expr) => {
        impl InFlash<$hip> for $numbers {
            const FREE_LEG: Leg<$hip, Self> = possible!(Leg::<$hip, Self>::new($dimensions, Limits::FREE));
            const LIMB: Limb<$hip, Self, [Channel<Self>; 3]> = Limb {
                leg: possible!(Leg::<$hip, Self>::new($dimensions, limits($published))),
                mounting: Mounting::new(
                    Foot::new(
                        $length(120 * STEPS_PER_MM),
                        $length(-52 * STEPS_PER_MM),
                        $length(8 * STEPS_PER_MM),
                    ),
                    $side,
                ),
                servos: [
                    possible!(Channel::<Self>::new(servos($published)[0], TIMER.counting())),
                    possible!(Channel::<Self>::new(servos($published)[1], TIMER.counting())),
                    possible!(Channel::<Self>::new(servos($published)[2], TIMER.counting())),
                ],
            };

            fn in_steps(steps: i32) -> Self::Length {
                $length(steps)
            }

            fn angle_bits(angle: Self::Angle) -> u32 {
                $bits(angle)
            }
        }
    };
}

/// A number system, its length of so many 1/64 mm, and its angle as bits.
macro_rules! in_flash {
    ($numbers:ty, $length:expr, $bits:expr) => {
        one_hip!($numbers, RollHip, ROLL, ROLL_HIP, Side::Right, $length, $bits);
        one_hip!($numbers, YawHip, YAW, YAW_HIP, Side::Left, $length, $bits);
    };
}

in_flash!(Float32, float_length, f32::to_bits);
in_flash!(Coarse, float_length, f32::to_bits);
in_flash!(Fixed32, fixed32_length, |angle: fixed::types::I0F32| angle.to_bits() as u32);
in_flash!(Short32, fixed32_length, |angle: fixed::types::I0F32| angle.to_bits() as u32);
in_flash!(Fixed16, fixed16_length, |angle: fixed::types::I0F16| angle.to_bits() as u32);

const fn float_length(steps: i32) -> f32 {
    steps as f32 / STEPS_PER_MM as f32
}

const fn fixed32_length(steps: i32) -> fixed::types::I16F16 {
    fixed::types::I16F16::from_bits(steps * ((1 << 16) / STEPS_PER_MM))
}

const fn fixed16_length(steps: i32) -> fixed::types::I10F6 {
    // A step is the same 1/64 mm; every target lies within ±512 mm.
    fixed::types::I10F6::from_bits((steps * (64 / STEPS_PER_MM)) as i16)
}
