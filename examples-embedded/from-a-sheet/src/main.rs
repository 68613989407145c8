//! Legs from sheets: `culvert_walker.rs` and `orchard_walker.rs` beside this file were written by `toehold constants`, and
//! nothing of the robots is written here by hand.
//!
//! Every leg of both is asked for the same few feet, in its own frame; the counts that come of them are those of
//! `toehold solve`, which a test on the PC compares.
#![no_std]
#![no_main]

// As it was written: not to be formatted.
#[rustfmt::skip]
mod culvert_walker;
#[rustfmt::skip]
mod orchard_walker;

use board::end;
use fixed::types::I16F16;
use ik_core::drive::Drive;
use ik_core::robot::Robot;
use ik_core::{Counts, Fixed32, Foot, Hip, Limb};

/// A foot in whole mm.
const fn mm(x: i32, y: i32, z: i32) -> Foot<Fixed32> {
    const fn length(mm: i32) -> I16F16 {
        I16F16::from_bits(mm << 16)
    }
    Foot::new(length(x), length(y), length(z))
}

/// In a leg's frame: within reach of both kinds, at their joint limits, and out of reach.
const FEET: [Foot<Fixed32>; 8] = [
    mm(0, 110, -60),
    mm(37, 121, -82),
    mm(-43, 95, -100),
    mm(20, 40, -150),
    mm(-31, 33, -171),
    mm(5, 160, -20),
    mm(0, 60, -20),
    mm(300, 84, -160),
];

#[board::entry]
fn main() -> ! {
    use culvert_walker::walker_legs;
    use orchard_walker::strider_legs;
    around("culvert walker", &walker_legs::ALL, &walker_legs::NAMES);
    around("orchard walker", &strider_legs::ALL, &strider_legs::NAMES);
    end::done()
}

/// Every foot for every leg, a frame for each foot.
fn around<H: Hip, D: Drive<Fixed32, Sent = Counts>, const LEGS: usize>(
    robot_name: &str,
    limbs: &[Limb<H, Fixed32, D>; LEGS],
    names: &[&str; LEGS],
) {
    let mut robot = Robot::of(*limbs);
    for foot in FEET {
        let feet = limbs.each_ref().map(|limb| limb.mounting.body_frame(foot));
        for ((name, foot), command) in names.iter().zip(feet).zip(robot.frame(&feet)) {
            defmt::println!("{=str}: {=str}: {}: counts {}", robot_name, *name, foot, command.counts());
        }
    }
}
