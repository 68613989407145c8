//! The references against worked examples of textbooks, mapped to Toehold's frame and signs.

use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{Bend, Leg, Pose, Shape, Verdict, foot, multiprecision, solve};

/// Both inverses give this pose (degrees) within `allowed` degrees, and it puts the foot there.
fn solves_to(leg: &Leg, target: [f64; 3], degrees: [f64; 3], allowed: f64) {
    leg.check().unwrap();
    let [hip, thigh, knee] = degrees.map(f64::to_radians);
    let pose = Pose { hip, thigh, knee };
    let by_closed_form = solve(leg, target);
    assert_eq!(by_closed_form.verdict, Verdict::Reached);
    let in_256_bits = multiprecision::solve(leg, target).unwrap();
    for found in [by_closed_form.pose, in_256_bits.pose.rounded()] {
        let off = found.largest_difference(&pose).to_degrees();
        assert!(off <= allowed, "{leg}, {target:?}: {found:?}, not {pose:?}");
    }
    let away = distance(foot(leg, &pose), target);
    assert!(away <= allowed.to_radians() * leg.size() + 1e-14, "{away}");
}

/// Lynch & Park, *Modern Robotics* (2017), §6.2.2: the planar arm with two joints, both links 1;
/// from memory. Its plane is that of a yaw-hip leg without a coxa: x outboard, y up; a second angle
/// above zero lifts the second link, which is a knee that bends down.
#[test]
fn lynch_and_parks_planar_arm() {
    let root3 = 3f64.sqrt();
    let target = [0.0, (root3 - 1.0) / 2.0, (root3 + 1.0) / 2.0];
    let leg = |bend| Leg { shape: Shape::Yaw, offset: 0.0, thigh: 1.0, shank: 1.0, bend };
    solves_to(&leg(Bend::Down), target, [0.0, 30.0, 90.0], 1e-13);
    solves_to(&leg(Bend::Up), target, [0.0, 120.0, 90.0], 1e-13);
}

/// Craig, *Introduction to Robotics*, 3rd ed., ch. 4, the planar arm with links 4, 3 and 2; from
/// memory. Taken at its wrist, the goal less the last link, it is a roll-hip leg without an offset
/// lying on its side: its x is ours, its y our depth, and its angles count from x.
struct CraigsArm {
    wrist: [f64; 3],
}

const CRAIGS_LEG: Leg = Leg { shape: Shape::Roll, offset: 0.0, thigh: 4.0, shank: 3.0, bend: Bend::Forward };

impl CraigsArm {
    fn at(x: f64, y: f64, degrees: f64) -> Self {
        let (sin, cos) = degrees.to_radians().sin_cos();
        Self { wrist: [x - 2.0 * cos, 0.0, -(y - 2.0 * sin)] }
    }
}

#[test]
fn craigs_wrist_from_both_sides() {
    let arm = CraigsArm::at(7.5373, 3.9266, 60.0);
    // Goal to four decimals, angles to four: at a 20° elbow, 5e-5 moves a joint by 0.005°.
    let allowed = 0.005;
    // (10°, 20°, 30°) and (27.1141°, −20°, 52.8859°).
    solves_to(&CRAIGS_LEG, arm.wrist, [0.0, 90.0 - 10.0, 20.0], allowed);
    let backward = Leg { bend: Bend::Backward, ..CRAIGS_LEG };
    solves_to(&backward, arm.wrist, [0.0, 90.0 - 27.1141, 20.0], allowed);
    // The last joint takes up what the first two leave of the 60° asked.
    for (leg, last) in [(CRAIGS_LEG, 30.0), (backward, 52.8859)] {
        let pose = solve(&leg, arm.wrist).pose;
        let first_two = 90.0 - (pose.thigh - leg.bend.sign() * pose.knee).to_degrees();
        assert!((60.0 - first_two - last).abs() <= allowed, "{first_two}");
    }
}

#[test]
fn craigs_goal_out_of_reach_is_said_to_be() {
    let arm = CraigsArm::at(-3.1245, 9.1674, -30.0);
    let found = solve(&CRAIGS_LEG, arm.wrist);
    assert_eq!(found.verdict, Verdict::Moved);
    // Straight towards it, as far as the two links go.
    assert_eq!(found.pose.knee, 0.0);
    let beyond = distance([0.0; 3], arm.wrist) - 7.0;
    assert!((found.moved_by_mm - beyond).abs() < 1e-13);
}

/// The right-triangle and law-of-cosines form of a roll-hip leg, hip offset 40 mm, both links
/// 120 mm: D² = y² + z² − 1600, cos φ = (G² − 28800) / −28800. Common practice, no source. Its
/// arcsine is free of doubt with equal links.
#[test]
fn a_roll_hip_leg_by_right_triangle_and_law_of_cosines() {
    let leg = Leg { shape: Shape::Roll, offset: 40.0, thigh: 120.0, shank: 120.0, bend: Bend::Forward };
    for [x, y, z] in [
        [0.0, 40.0, -180.0],
        [50.0, 40.0, -170.0],
        [-60.0, 75.0, -150.0],
        [35.0, 5.0, -200.0],
        [10.0, 130.0, -90.0],
    ] {
        let depth = f64::sqrt(y * y + z * z - 1600.0);
        let span_squared = depth * depth + x * x;
        let hip = f64::atan2(z, y) + f64::atan2(depth, 40.0);
        let inside = f64::acos((span_squared - 28800.0) / -28800.0);
        let lift = f64::asin(120.0 * inside.sin() / span_squared.sqrt());
        let degrees = [hip, f64::atan2(x, depth) + lift, std::f64::consts::PI - inside];
        solves_to(&leg, [x, y, z], degrees.map(f64::to_degrees), 1e-12);
    }
}
