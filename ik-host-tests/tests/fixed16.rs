//! 16-bit fixed point against the `f64` references: over legs that it holds, every foot has an answer, and what it
//! promises of joints and foot is what was measured.

use ik_core::{Bend, Dimensions, Fixed16, Foot, Hip, Joints, Leg, Limits, Number, Outcome, RollHip, YawHip};
use ik_host_tests::reference::{self, FREE_KNEE, Pose, Shape, Verdict};
use rand::{RngExt, SeedableRng};
use rand_xoshiro::Xoshiro256PlusPlus;
use std::f64::consts::PI;

/// A joint, rad: knee from 0.1 to 2.6, the foot clear of the hip's axis and of the thigh's by a fifth of the reach.
const JOINT_BOUND: f64 = 3.5e-4;
/// The foot, fraction of thigh and shank.
const FOOT_BOUND: f64 = 2.1e-4;
/// Where the solver's own forward kinematics say that the foot is, against `f64`; fraction of thigh and shank.
const OWN_FOOT_BOUND: f64 = 2.6e-4;

/// The demo legs, with measures in whole steps of the number system or not.
fn demo_legs() -> [reference::Leg; 2] {
    let (forward, up) = (reference::Bend::Forward, reference::Bend::Up);
    [
        reference::Leg { shape: Shape::Roll, offset: 31.5, thigh: 94.0, shank: 107.0, bend: forward },
        reference::Leg { shape: Shape::Yaw, offset: 42.5, thigh: 71.0, shank: 118.4, bend: up },
    ]
}

/// A leg behind plain numbers.
trait Solver {
    fn solve(&self, foot: Foot<Fixed16>) -> (Pose, Outcome, f64);
    fn forward(&self, foot: Foot<Fixed16>) -> [f64; 3];
}

impl<H: Hip> Solver for Leg<H, Fixed16> {
    fn solve(&self, foot: Foot<Fixed16>) -> (Pose, Outcome, f64) {
        let answer = Leg::solve(self, foot, Joints::ZERO);
        let [hip, thigh, knee] = answer.joints.as_array().map(|angle| angle.radians());
        (Pose { hip, thigh, knee }, answer.outcome, Fixed16::mm(answer.off_by))
    }
    fn forward(&self, foot: Foot<Fixed16>) -> [f64; 3] {
        Leg::forward(self, &Leg::solve(self, foot, Joints::ZERO).joints).mm()
    }
}

fn core(leg: &reference::Leg, limits: Limits) -> Box<dyn Solver> {
    let bend = match leg.bend {
        reference::Bend::Forward => Bend::Forward,
        reference::Bend::Backward => Bend::Backward,
        reference::Bend::Up => Bend::Up,
        reference::Bend::Down => Bend::Down,
    };
    let (offset, thigh, shank) = (leg.offset, leg.thigh, leg.shank);
    match leg.shape {
        Shape::Roll => {
            let dimensions = Dimensions::roll_hip(offset, thigh, shank, bend).expect("a leg");
            Box::new(Leg::<RollHip, Fixed16>::from_dimensions(dimensions, limits).expect("a leg"))
        }
        Shape::Yaw => {
            let dimensions = Dimensions::yaw_hip(offset, thigh, shank, bend).expect("a leg");
            Box::new(Leg::<YawHip, Fixed16>::from_dimensions(dimensions, limits).expect("a leg"))
        }
    }
}

fn any_leg(random: &mut Xoshiro256PlusPlus) -> reference::Leg {
    // Links of 1:8 to 8:1, offset up to twice their sum, all of it from 1 mm to 453 mm.
    let ratio = 7.99f64.powf(random.random_range(-1.0..=1.0));
    let offset = if random.random_bool(0.1) { 0.0 } else { random.random_range(0.0..1.99) };
    let reach = 1.01 * 448f64.powf(random.random_range(0.0..=1.0)) / (1.0 + offset);
    let (shape, bend) = [
        (Shape::Roll, reference::Bend::Forward),
        (Shape::Roll, reference::Bend::Backward),
        (Shape::Yaw, reference::Bend::Up),
        (Shape::Yaw, reference::Bend::Down),
    ][random.random_range(0..4)];
    reference::Leg {
        shape,
        offset: offset * reach,
        thigh: reach * ratio / (1.0 + ratio),
        shank: reach / (1.0 + ratio),
        bend,
    }
}

fn from_bits(bits: [i16; 3]) -> Foot<Fixed16> {
    let [x, y, z] = bits.map(<Fixed16 as Number>::Length::from_bits);
    Foot::new(x, y, z)
}

fn rounds(usual: u32) -> u32 {
    if std::env::var_os("TOEHOLD_LONG").is_some() { 20 * usual } else { usual }
}

#[test]
fn the_demo_legs_keep_what_is_promised() {
    let mut random = Xoshiro256PlusPlus::seed_from_u64(16);
    let (mut joint, mut off, mut own) = (0.0f64, 0.0f64, 0.0f64);
    for leg in demo_legs() {
        let solver = core(&leg, Limits::FREE);
        let reach = leg.thigh + leg.shank;
        for round in 0..rounds(150_000) {
            let knee = match round % 8 {
                0 => random.random_range(0.0..0.02),
                1 => random.random_range(PI - 0.02..PI),
                _ => random.random_range(0.0..PI),
            };
            let pose =
                Pose { hip: random.random_range(-1.5..1.5), thigh: random.random_range(-PI..PI), knee };
            let [x, y, z] = reference::foot(&leg, &pose);
            let foot = Foot::<Fixed16>::from_mm(x, y, z);
            let asked = foot.mm();
            let wanted = reference::solve(&leg, asked);
            let (got, outcome, off_by) = solver.solve(foot);
            let distance = reference::leg::distance(reference::foot(&leg, &got), asked) / reach;
            if wanted.verdict != Verdict::Reached || outcome != Outcome::Reached {
                // Only a foot within rounding of an end of the reach may be judged otherwise.
                let apart = (wanted.moved_by_mm - off_by).abs() / reach;
                assert!(
                    apart < 2.0 * OWN_FOOT_BOUND,
                    "{leg}: {asked:?}: {wanted:?}, but {outcome:?} {off_by}"
                );
                continue;
            }
            off = off.max(distance);
            own =
                own.max(reference::leg::distance(solver.forward(foot), reference::foot(&leg, &got)) / reach);
            let radial = match leg.shape {
                Shape::Roll => (asked[1].hypot(asked[2]).powi(2) - leg.offset.powi(2)).max(0.0).sqrt(),
                Shape::Yaw => asked[0].hypot(asked[1]),
            };
            if (0.1..2.6).contains(&wanted.pose.knee) && radial > 0.2 * reach {
                joint = joint.max(got.largest_difference(&wanted.pose));
            }
        }
    }
    println!("measured: joint {joint:e} rad, foot {off:e}, own foot {own:e} of the reach");
    assert!(joint < JOINT_BOUND && joint > JOINT_BOUND / 2.0, "joint {joint:e}");
    assert!(off < FOOT_BOUND && off > FOOT_BOUND / 2.0, "foot {off:e}");
    assert!(own < OWN_FOOT_BOUND && own > OWN_FOOT_BOUND / 2.0, "own foot {own:e}");
}

#[test]
fn every_foot_has_an_answer_within_the_ranges_and_the_closest_one_out_of_reach() {
    let mut random = Xoshiro256PlusPlus::seed_from_u64(61);
    for _ in 0..rounds(1_000) {
        let leg = any_leg(&mut random);
        let mut range = |least: f64| {
            let (a, b) = (random.random_range(least..180.0), random.random_range(least..180.0));
            [a.min(b), a.max(b)]
        };
        let ranges = [range(-180.0), range(-180.0), range(0.0)];
        let free = random.random_bool(0.5);
        let limits = if free {
            Limits::FREE
        } else {
            Limits::degrees(ranges[0], ranges[1], ranges[2]).expect("ranges")
        };
        let solver = core(&leg, limits);
        // Half of the feet anywhere at all, half where the leg may reach.
        let near = (64.0 * 1.3 * leg.size()).min(32_767.0) as i16;
        for round in 0..200 {
            let edge = [i16::MIN, i16::MIN + 1, -1, 0, 1, i16::MAX];
            let foot = from_bits([0, 1, 2].map(|_| match round % 4 {
                0 if random.random_bool(0.5) => edge[random.random_range(0..edge.len())],
                0 | 1 => random.random::<i16>(),
                _ => random.random_range(-near..=near),
            }));
            let (pose, outcome, off_by) = solver.solve(foot);
            let case =
                format!("{leg}, {ranges:?} (free: {free}), {:?}: {pose:?} {outcome:?} {off_by}", foot.mm());
            assert!(off_by >= 0.0 && outcome != Outcome::NotFinite, "{case}");
            if !free {
                let step = 360.0 / 65_536.0;
                for (angle, [least, most]) in [pose.hip, pose.thigh, pose.knee].into_iter().zip(ranges) {
                    let angle = angle.to_degrees();
                    assert!(angle > least - step && angle < most + step, "{case}");
                }
            }
            // Where the leg is not held, it goes as near as a leg gets.
            if free && off_by < 511.0 {
                let nearest = reference::solve_within(&leg, FREE_KNEE, foot.mm());
                let got = reference::leg::distance(reference::foot(&leg, &pose), foot.mm());
                let slack = 2e-3 * leg.size() + 0.02 + 1e-4 * got;
                assert!((got - nearest.moved_by_mm).abs() < slack, "{case}: nearest {}", nearest.moved_by_mm);
                assert!((got - off_by).abs() < slack, "{case}: really {got}");
            }
        }
    }
}
