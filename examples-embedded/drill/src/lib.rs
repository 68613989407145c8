//! What a chip is put through, and the PC as well, by the same code: two legs, in three number systems
//! each, solved for one stream of foot targets.
//!
//! | file | what |
//! | --- | --- |
//! | `limbs` | the two legs with their servos and the timer, as constants for flash |
//! | `targets` | the stream of foot targets |
//! | `numbers` | a number system's lengths and angles as bits |
//! | this one | from target to ticks |
#![no_std]
#![forbid(unsafe_code)]

mod limbs;
mod numbers;
mod targets;

use ik_core::drive::Drive;
use ik_core::{Coarse, Counts, End, Fixed16, Fixed32, Float32, Hip, Joints, Limb, Outcome, Short32};

use limbs::InFlash;
use numbers::Bits;
pub use targets::{TARGETS, Target};

/// What became of one foot target, down to the last bit.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Answer {
    /// Hip, thigh (femur), knee: the angles as the number system stores them.
    pub joints: [u32; 3],
    /// How far the foot is off, as the number system stores a length.
    pub off_by: u32,
    /// What was done with the foot.
    pub outcome: Outcome,
    /// The ends of their pulse ranges at which servos were held.
    pub pulses_held: [Option<End>; 3],
    /// Hip, thigh (femur), knee: pulse lengths in timer ticks.
    pub ticks: [u32; 3],
}

/// What [`go_through`] tells as it goes.
#[derive(Debug, Clone, Copy)]
pub enum Event {
    /// The next leg and number system begin.
    Run {
        /// The leg.
        leg: &'static str,
        /// The number system's name.
        numbers: &'static str,
    },
    /// One target is answered.
    Answered {
        /// Its number within the run, from 0.
        number: u32,
        /// Where the foot was asked to be.
        target: Target,
        /// What became of it.
        answer: Answer,
    },
}

/// Solves the whole stream of targets for each leg in each number system.
pub fn go_through(tell: &mut dyn FnMut(Event)) {
    both_legs::<Float32>(tell);
    both_legs::<Fixed32>(tell);
    both_legs::<Short32>(tell);
    both_legs::<Fixed16>(tell);
    both_legs::<Coarse>(tell);
}

fn both_legs<N: InFlash + Bits>(tell: &mut dyn FnMut(Event)) {
    one_leg("orchard walker's right front leg", &N::ORCHARD, tell);
    one_leg("orchard walker's right front leg with bent servos and a parallelogram", &N::ORCHARD_BENT, tell);
    one_leg("culvert walker's left front leg", &N::CULVERT, tell);
    // Without joint ranges more of the solver's angles are seen.
    let orchard = Limb { leg: N::ORCHARD_FREE, ..N::ORCHARD };
    let culvert = Limb { leg: N::CULVERT_FREE, ..N::CULVERT };
    one_leg("orchard walker's right front leg with free joints", &orchard, tell);
    one_leg("culvert walker's left front leg with free joints", &culvert, tell);
}

fn one_leg<H: Hip, N: Bits, D: Drive<N, Sent = Counts>>(
    leg: &'static str,
    limb: &Limb<H, N, D>,
    tell: &mut dyn FnMut(Event),
) {
    tell(Event::Run { leg, numbers: N::NAME });
    let mut pose = Joints::ZERO;
    for (number, target) in (0..).zip(targets::stream()) {
        let answer = solve(limb, target, &mut pose);
        tell(Event::Answered { number, target, answer });
    }
}

/// From a foot target to three pulse lengths in ticks: what a firmware does every frame.
fn solve<H: Hip, N: Bits, D: Drive<N, Sent = Counts>>(
    limb: &Limb<H, N, D>,
    target: Target,
    pose: &mut Joints<N>,
) -> Answer {
    // Targets are given as the leg sees them; a gait would give them on the body's frame.
    let foot = limb.mounting.body_frame(target.foot());
    let command = limb.command(foot, *pose);
    // A foot that is no number later on holds this pose.
    *pose = command.answer.joints;
    Answer {
        joints: command.answer.joints.as_array().map(|joint| N::angle_bits(joint.raw())),
        off_by: N::length_bits(command.answer.off_by),
        outcome: command.answer.outcome,
        pulses_held: command.commands.held.as_array(),
        ticks: command.counts(),
    }
}

#[cfg(test)]
mod tests {
    extern crate std;

    use ik_core::Number;
    use std::vec::Vec;

    use super::*;

    /// Leg, number system, and each target with its answer.
    type Run = (&'static str, &'static str, Vec<(Target, Answer)>);

    fn runs() -> Vec<Run> {
        let mut runs: Vec<Run> = Vec::new();
        go_through(&mut |event| match event {
            Event::Run { leg, numbers } => runs.push((leg, numbers, Vec::new())),
            Event::Answered { number, target, answer } => {
                let answers = &mut runs.last_mut().expect("a run comes first").2;
                assert_eq!(number as usize, answers.len());
                answers.push((target, answer));
            }
        });
        runs
    }

    #[test]
    fn five_legs_in_five_number_systems() {
        let titles: std::collections::BTreeSet<_> =
            runs().iter().map(|&(leg, numbers, _)| (leg, numbers)).collect();
        assert_eq!(titles.len(), 5 * 5);
    }

    #[test]
    fn every_run_meets_every_outcome_that_it_can() {
        for (leg, numbers, answers) in runs() {
            let count = |wanted: fn(&Outcome) -> bool| {
                answers.iter().filter(|(_, answer)| wanted(&answer.outcome)).count()
            };
            let [reached, moved, held, not_finite] = [
                count(|outcome| matches!(outcome, Outcome::Reached)),
                count(|outcome| matches!(outcome, Outcome::Moved)),
                count(|outcome| matches!(outcome, Outcome::Held(_))),
                count(|outcome| matches!(outcome, Outcome::NotFinite)),
            ];
            assert_eq!(answers.len(), TARGETS as usize);
            assert!(reached >= 80, "{leg}, {numbers}: {reached} reached");
            if leg.ends_with("free joints") {
                assert!(moved >= 80, "{leg}, {numbers}: {moved} moved");
                assert_eq!(held, 0, "{leg}, {numbers}");
            } else {
                assert!(held >= 80, "{leg}, {numbers}: {held} held");
            }
            // Infinity and NaN: five targets; fixed point has neither.
            let fixed = [Fixed32::NAME, Short32::NAME, Fixed16::NAME].contains(&numbers);
            assert_eq!(not_finite, if fixed { 0 } else { 5 }, "{leg}, {numbers}");
        }
    }

    #[test]
    fn no_pulse_leaves_the_range_of_any_servo() {
        // 600 us and 2400 us at 48 MHz / 15.
        for (leg, numbers, answers) in runs() {
            for (target, answer) in answers {
                let safe = answer.ticks.iter().all(|ticks| (1920..=7680).contains(ticks));
                assert!(safe, "{leg}, {numbers}, {target}: {:?}", answer.ticks);
            }
        }
    }

    #[test]
    fn the_zero_pose_of_the_orchard_leg_stands_in_the_stream() {
        let runs = runs();
        let (.., answers) = runs
            .iter()
            .find(|(leg, ..)| *leg == "orchard walker's right front leg with free joints")
            .expect("it runs");
        let (_, answer) = answers
            .iter()
            .find(|(target, _)| std::format!("{target}") == "(0, 31.5, -201) mm")
            .expect("it is among the awkward ones");
        assert_eq!((answer.joints, answer.outcome), ([0; 3], Outcome::Reached));
        // Centre and trim at 3.2 ticks per us: 1497 us; 1512 us less 30 degrees of 11.1 us; the knee's
        // 1493 us and 72.5 degrees of 11.1 us (it turns against) is held at 2200 us.
        assert_eq!(answer.ticks, [4790, 3773, 7040]);
    }
}
