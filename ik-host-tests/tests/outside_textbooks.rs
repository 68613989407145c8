//! ik-core against worked examples of textbooks, mapped to its frame and signs, in every number system.

mod common;

use common::checks::published_pose::{self, Published};
use common::solver::{NumberSystem, core};
use ik_core::Outcome;
use ik_host_tests::reference::{Bend, Leg, Pose, Shape};

/// The example in every number system; its angles in degrees.
fn solves_to(name: &str, leg: Leg, foot: [f64; 3], degrees: [f64; 3], given_to: f64) {
    let [hip, thigh, knee] = degrees.map(f64::to_radians);
    let published = Published { name: name.to_owned(), foot, pose: Pose { hip, thigh, knee }, given_to };
    for number in NumberSystem::ALL {
        let solver = core(number, &leg, None).expect("a leg");
        assert_eq!(published_pose::check(&*solver, &published), Ok(()));
    }
}

/// Lynch & Park, *Modern Robotics* (2017), §6.2.2, from memory: the planar arm of two joints with L1 = L2 = 1 and the
/// foot at ((√3−1)/2, (√3+1)/2) has (30°, 90°) and (120°, −90°).
///
/// Once as a yaw-hip leg without a coxa (x outboard, y up: a second angle above zero is a knee that bends down), once
/// as a roll-hip leg lying so that x points down and y forward (the second angle above zero bends backward); 100 mm
/// for its unit.
#[test]
fn lynch_and_parks_planar_arm() {
    let [x, y] = [-1.0, 1.0].map(|sign| 100.0 * (3f64.sqrt() + sign) / 2.0);
    let leg = |shape, bend| Leg { shape, offset: 0.0, thigh: 100.0, shank: 100.0, bend };
    for (shape, foot, bends) in [
        (Shape::Yaw, [0.0, x, y], [Bend::Down, Bend::Up]),
        (Shape::Roll, [y, 0.0, -x], [Bend::Backward, Bend::Forward]),
    ] {
        solves_to("Lynch & Park", leg(shape, bends[0]), foot, [0.0, 30.0, 90.0], 0.0);
        solves_to("Lynch & Park, other branch", leg(shape, bends[1]), foot, [0.0, 120.0, 90.0], 0.0);
    }
}

/// Craig, *Introduction to Robotics*, 3rd ed., ch. 4, the planar arm with links 4, 3 and 2, from memory: the goal
/// (7.5373, 3.9266, 60°) has (10°, 20°, 30°) and (27.1141°, −20°, 52.8859°); (−3.1245, 9.1674, −30°) cannot be reached.
///
/// Taken at the wrist, the goal less the last link, and as a yaw-hip leg without a coxa: x outboard, y up. Ten mm for
/// its unit; goal and angles have four decimals, which is 1e-3 mm.
#[test]
fn craigs_wrist_from_both_sides_and_out_of_reach() {
    let wrist = |x: f64, y: f64, degrees: f64| {
        let (sin, cos) = degrees.to_radians().sin_cos();
        [0.0, 10.0 * (x - 2.0 * cos), 10.0 * (y - 2.0 * sin)]
    };
    let leg = |bend| Leg { shape: Shape::Yaw, offset: 0.0, thigh: 40.0, shank: 30.0, bend };
    let goal = wrist(7.5373, 3.9266, 60.0);
    solves_to("Craig", leg(Bend::Down), goal, [0.0, 10.0, 20.0], 1e-3);
    solves_to("Craig, other branch", leg(Bend::Up), goal, [0.0, 27.1141, 20.0], 1e-3);
    for number in NumberSystem::ALL {
        let solver = core(number, &leg(Bend::Up), None).expect("a leg");
        let told = solver.solve(wrist(-3.1245, 9.1674, -30.0), Pose::default());
        assert_eq!(told.outcome, Outcome::Moved, "{number:?}: {told:?}");
        // 11.2678 of its units away, where 7 is all there is.
        assert!((told.off_by - 42.68).abs() < 0.2, "{number:?}: {told:?}");
    }
}

/// The right triangle and the law of cosines of a roll-hip leg that bends forward; common practice, no source. Hip
/// offset 40, both links 120: D² = y² + z² − 1600, hip = atan2(z, y) + atan2(D, 40), G² = D² + x²,
/// cos φ = (G² − 28800)/(−28800), thigh = atan2(x, D) + asin(120·sin φ/G), knee = π − φ.
#[test]
fn the_law_of_cosines_with_an_offset_of_40_and_links_of_120() {
    let leg = Leg { shape: Shape::Roll, offset: 40.0, thigh: 120.0, shank: 120.0, bend: Bend::Forward };
    for foot in [
        [0.0, 40.0, -160.0],
        [50.0, 40.0, -180.0],
        [-60.0, 10.0, -150.0],
        [30.0, 90.0, -170.0],
        [-20.0, -50.0, -140.0],
        [100.0, 60.0, -110.0],
    ] {
        let [x, y, z] = foot;
        let depth = f64::sqrt(y * y + z * z - 1600.0);
        let hip = f64::atan2(z, y) + f64::atan2(depth, 40.0);
        let far = f64::sqrt(depth * depth + x * x);
        let interior = f64::acos((far * far - 28_800.0) / -28_800.0);
        let thigh = f64::atan2(x, depth) + f64::asin(120.0 * interior.sin() / far);
        let knee = std::f64::consts::PI - interior;
        let degrees = [hip, thigh, knee].map(f64::to_degrees);
        // The arcsine is of the ambiguous sort, but not while the links are as long as one another.
        solves_to("law of cosines", leg, foot, degrees, 1e-12);
    }
}
