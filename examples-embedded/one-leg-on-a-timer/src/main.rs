//! One leg in 16-bit fixed point, its three servos on the compare registers of a timer: all that the smallest chip needs.
//!
//! The leg is the orchard walker's left front one. Its foot goes once around a step; every frame is solved, written to the
//! registers and logged. A real firmware waits for the timer between frames.
#![no_std]
#![no_main]

use board::{compare::CompareRegisters, end};
use fixed::types::I10F6;
use ik_core::{
    Bend, Channel, Dimensions, Fixed16, Foot, Joints, Leg, Limb, Limits, Mounting, Outcome, RollHip,
    ServoSpec, Side, Timer, Turns,
};

/// An impossible leg, servo or timer does not compile.
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

/// In flash, worked out while compiling.
static LEG: Limb<RollHip, Fixed16, [Channel<Fixed16>; 3]> = Limb {
    leg: possible!(Leg::<RollHip, Fixed16>::new(
        possible!(Dimensions::roll_hip(31.5, 94.0, 107.0, Bend::Forward)),
        possible!(Limits::degrees([-35.0, 35.0], [-25.0, 85.0], [15.0, 130.0])),
    )),
    mounting: Mounting::new(mm(120, 52, 0), Side::Left),
    servos: [
        channel(0.0, Turns::With, 6.0, [1000.0, 2000.0]),
        channel(30.0, Turns::With, -9.0, [800.0, 2200.0]),
        channel(72.5, Turns::Against, 4.0, [800.0, 2200.0]),
    ],
};

const fn channel(at_centre: f64, turns: Turns, trim_us: f64, pulse_us: [f64; 2]) -> Channel<Fixed16> {
    let spec = ServoSpec {
        centre_us: 1500.0,
        joint_at_centre_deg: at_centre,
        us_per_degree: 11.1,
        turns,
        trim_us,
        pulse_us,
    };
    possible!(Channel::<Fixed16>::new(spec, TIMER.counting()))
}

/// A foot in whole mm.
const fn mm(x: i16, y: i16, z: i16) -> Foot<Fixed16> {
    const fn length(mm: i16) -> I10F6 {
        I10F6::from_bits(mm * 64)
    }
    Foot::new(length(x), length(y), length(z))
}

/// Once around a step, on the body's frame: back on the ground, forward in the air; and at last a foot that is out of
/// reach, to show what then comes.
const STEP: [Foot<Fixed16>; 9] = [
    mm(160, 84, -160),
    mm(140, 84, -160),
    mm(120, 84, -160),
    mm(100, 84, -160),
    mm(80, 84, -160),
    mm(100, 84, -130),
    mm(120, 84, -120),
    mm(140, 84, -130),
    mm(300, 84, -160),
];

#[board::entry]
fn main() -> ! {
    let Some(mut compare) = CompareRegisters::take() else { panic!("the timer is taken") };
    let mut pose = Joints::ZERO;
    for foot in STEP {
        let command = LEG.command(foot, pose);
        pose = command.answer.joints;
        compare.write(command.counts());
        if command.answer.outcome == Outcome::Reached {
            defmt::println!("{}: ticks {}", foot, compare.read());
        } else {
            defmt::println!("{}: ticks {}, {}", foot, compare.read(), command.answer);
        }
    }
    end::done()
}
