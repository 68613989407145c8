//! No target exceeds what is certified of its box: on the demo robots, and on random ones, in every number system.

mod common;

use common::effort::{cases, long};
use ik_host_tests::certify::interval::Interval;
use ik_host_tests::certify::{Effort, Subject, certify};
use ik_host_tests::machine::{self, NUMBERS};
use ik_host_tests::sheet::{self, Bend, HipShape, KneeDrive, Robot, WorkBox};
use ik_host_tests::survey::{Judge, Plan, Targets, survey};
use proptest::prelude::*;
use proptest::test_runner::TestRunner;

/// What was looked at, and the largest share of a bound that was found.
#[derive(Default)]
struct Looked {
    targets: u64,
    largest_share: f64,
    /// Where that was.
    place: String,
}

/// Holds the targets of a robot against what is certified of small boxes about them.
fn look(robot: &Robot, targets: u64, seed: u64, looked: &mut Looked) -> Result<(), String> {
    // A parallelogram may leave a random thigh no angle.
    let Ok(machines) = machine::in_every_number(robot, 0) else { return Ok(()) };
    let judge = Judge::of(robot, 0).map_err(|refused| refused.to_string())?;
    let plan = Targets::of(&robot.kinds[0], Plan { targets, seed });
    for machine in &machines {
        let Ok(subject) = Subject::of(robot, 0, machine.number()).map_err(|refused| refused.to_string())?
        else {
            continue;
        };
        let work = subject.work();
        for (index, target, _) in plan.chunk(0, targets) {
            let Some(answered) = machine.answer(index as usize, target) else { continue };
            let measured = judge.measure(index as usize, &answered);
            // A point, and boxes of all sizes about it, cut off at the work volume.
            let width = [0.0, 1e-6, 1e-3, 0.1, 3.0][index as usize % 5];
            let feet = [0, 1, 2].map(|axis| {
                let at = answered.foot_mm[axis];
                assert!(work[axis].holds(at), "the work volume holds what its targets are rounded to");
                Interval::new((at - width).max(work[axis].low), (at + width).min(work[axis].high))
            });
            let enclosed = subject.enclose(feet);
            looked.targets += 1;
            let share = measured.arithmetic_mm / enclosed.arithmetic_mm;
            if share > looked.largest_share {
                looked.largest_share = share;
                looked.place =
                    format!("{} at {:?}, {:?}", machine.number(), answered.foot_mm, answered.outcome);
            }
            if measured.arithmetic_mm > enclosed.arithmetic_mm {
                return Err(format!(
                    "{} at {:?} within {width}: found {:e} mm, certified {:e} mm; {:?}",
                    machine.number(),
                    answered.foot_mm,
                    measured.arithmetic_mm,
                    enclosed.arithmetic_mm,
                    answered.outcome
                ));
            }
            if let Some(together) = measured.together_mm.filter(|mm| *mm > enclosed.together_mm) {
                return Err(format!(
                    "{} at {:?} within {width}: together found {together:e} mm, certified {:e} mm; {:?}",
                    machine.number(),
                    answered.foot_mm,
                    enclosed.together_mm,
                    answered.outcome
                ));
            }
        }
    }
    Ok(())
}

#[test]
fn no_target_of_the_demo_robots_exceeds_what_is_certified_of_its_box() {
    let targets = if long() { 1_000_000 } else { 20_000 };
    for demo in sheet::DEMOS {
        let robot = sheet::demo(demo.name).unwrap();
        let mut looked = Looked::default();
        look(&robot, targets, 11, &mut looked).unwrap_or_else(|why| panic!("{}: {why}", demo.name));
        println!(
            "{}: {} targets, up to {:.2} of the bound: {}",
            demo.name, looked.targets, looked.largest_share, looked.place
        );
        // A bound that is never half used would say little.
        assert!(looked.targets >= 5 * targets && looked.largest_share > 0.3, "{}", looked.largest_share);
    }
}

/// A demo robot with legs of its own: measures within sense, ranges that may be narrow or free, work volumes that take in what
/// is singular.
fn robots() -> impl Strategy<Value = Robot> {
    let measures = (any::<bool>(), any::<(bool, bool)>(), 0.0..1.2f64, 20.0..150.0f64, 0.3..3.0f64);
    let ranges = (0..3u8, -180.0..60.0f64, 20.0..240.0f64, 0.0..60.0f64, 70.0..180.0f64);
    let work = (prop::array::uniform3(-0.9..0.7f64), prop::array::uniform3(0.02..0.6f64));
    (measures, ranges, work).prop_map(
        |(
            (roll, (other, through_a_parallelogram), offset, thigh, ratio),
            (free, least, width, knee, folded),
            (corner, side),
        )| {
            let demo = if roll { "orchard-walker" } else { "culvert-walker" };
            let mut robot = sheet::demo(demo).unwrap();
            let kind = &mut robot.kinds[0];
            kind.thigh_mm = thigh;
            // Links as long as one another fold to nothing.
            kind.shank_mm = if (0.9..1.1).contains(&ratio) { thigh } else { thigh * ratio };
            kind.offset_mm = if offset < 0.1 { 0.0 } else { offset * (kind.thigh_mm + kind.shank_mm) / 2.0 };
            kind.bend = match (kind.hip, other) {
                (HipShape::Roll, false) => Bend::Forward,
                (HipShape::Roll, true) => Bend::Backward,
                (HipShape::Yaw, false) => Bend::Up,
                (HipShape::Yaw, true) => Bend::Down,
            };
            if through_a_parallelogram {
                kind.knee_drive = KneeDrive::Parallelogram;
            }
            let turn = [least, (least + width).min(180.0)];
            kind.range_deg = match free {
                0 => [[-180.0, 180.0], [-180.0, 180.0], [0.0, 180.0]],
                1 => [[-180.0, 180.0], turn, [knee, folded]],
                _ => [turn, turn, [knee, 180.0]],
            };
            let radius = 0.999 * (kind.offset_mm + kind.thigh_mm + kind.shank_mm);
            let range = |axis: usize| {
                let least = corner[axis] * radius;
                [least, (least + side[axis] * radius).min(radius)]
            };
            kind.work = WorkBox { x_mm: range(0), y_mm: range(1), z_mm: range(2) };
            robot
        },
    )
}

#[test]
fn no_target_of_random_robots_exceeds_what_is_certified_of_its_box() {
    let config = cases(20);
    let least = u64::from(config.cases) * 3_000;
    let mut runner = TestRunner::new(config);
    let looked = std::cell::RefCell::new(Looked::default());
    runner
        .run(&robots(), |robot| look(&robot, 2_000, 5, &mut looked.borrow_mut()).map_err(TestCaseError::fail))
        .unwrap();
    let looked = looked.into_inner();
    println!("{} targets, up to {:.2} of the bound: {}", looked.targets, looked.largest_share, looked.place);
    assert!(looked.targets > least);
}

/// What an engineer is told: over the whole work volume, in a minute, and no more than four times what was found.
#[test]
fn the_demo_robots_are_certified_closely() {
    let plan = Plan { targets: if long() { 5_000_000 } else { 100_000 }, seed: 1 };
    for demo in sheet::DEMOS {
        let robot = sheet::demo(demo.name).unwrap();
        let found = survey(&robot, plan, &indicatif::ProgressBar::hidden()).unwrap();
        let certified = certify(&robot, 0, &NUMBERS, Effort::default()).unwrap();
        for (name, certified) in NUMBERS.iter().zip(certified) {
            let Some(bound) = certified.bound() else {
                assert_eq!(*name, "float64", "{certified:?}");
                continue;
            };
            let found = found.kinds[0].numbers.iter().find(|found| found.number == *name).unwrap();
            let (arithmetic, together) = (found.arithmetic.largest.mm, found.together.largest.mm);
            println!(
                "{} {name}: {:.2} times {arithmetic:.3e} mm, together {:.2} times {together:.3e} mm",
                demo.name,
                bound.arithmetic.mm / arithmetic,
                bound.together.mm / together
            );
            assert!(arithmetic <= bound.arithmetic.mm && together <= bound.together.mm, "{name}");
            assert!(
                bound.arithmetic.mm <= 6.0 * arithmetic,
                "{name}: {:?} for {arithmetic:e}",
                bound.arithmetic
            );
            assert!(bound.together.mm <= 4.0 * together, "{name}: {:?} for {together:e}", bound.together);
        }
    }
}
