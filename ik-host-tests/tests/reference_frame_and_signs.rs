//! The references speak Toehold's frame and signs, as its design states them.

use std::f64::consts::FRAC_PI_2;

use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::transforms::{Transform, frames};
use ik_host_tests::reference::{Bend, Leg, Pose, Range, Ranges, Shape, clamp, foot, solve};

const ROLL: Leg = Leg { shape: Shape::Roll, offset: 30.0, thigh: 90.0, shank: 100.0, bend: Bend::Forward };
const YAW: Leg = Leg { shape: Shape::Yaw, offset: 40.0, thigh: 70.0, shank: 110.0, bend: Bend::Up };

fn at(leg: &Leg, hip: f64, thigh: f64, knee: f64, point: [f64; 3]) {
    let found = foot(leg, &Pose { hip, thigh, knee });
    assert!(distance(found, point) < 1e-12, "{found:?}, not {point:?}");
}

#[test]
fn zero_poses_hang_straight_down_and_stretch_straight_outboard() {
    at(&ROLL, 0.0, 0.0, 0.0, [0.0, 30.0, -190.0]);
    at(&YAW, 0.0, 0.0, 0.0, [0.0, 220.0, 0.0]);
}

#[test]
fn positive_angles_swing_the_foot_as_the_design_says() {
    // Roll-hip: outboard, forward.
    at(&ROLL, FRAC_PI_2, 0.0, 0.0, [0.0, 190.0, 30.0]);
    at(&ROLL, 0.0, FRAC_PI_2, 0.0, [190.0, 30.0, 0.0]);
    // Yaw-hip: forward, up.
    at(&YAW, FRAC_PI_2, 0.0, 0.0, [220.0, 0.0, 0.0]);
    at(&YAW, 0.0, FRAC_PI_2, 0.0, [0.0, 40.0, 180.0]);
}

#[test]
fn the_knee_bends_to_the_side_given() {
    // A knee that points forward takes the shank back, and so on.
    at(&ROLL, 0.0, 0.0, FRAC_PI_2, [-100.0, 30.0, -90.0]);
    let backward = Leg { bend: Bend::Backward, ..ROLL };
    at(&backward, 0.0, 0.0, FRAC_PI_2, [100.0, 30.0, -90.0]);
    at(&YAW, 0.0, 0.0, FRAC_PI_2, [0.0, 110.0, -110.0]);
    let down = Leg { bend: Bend::Down, ..YAW };
    at(&down, 0.0, 0.0, FRAC_PI_2, [0.0, 110.0, 110.0]);

    for (leg, target, forward_of_line) in
        [(ROLL, [0.0, 30.0, -150.0], 1.0), (backward, [0.0, 30.0, -150.0], -1.0)]
    {
        let knee_at = frames(&leg, &solve(&leg, target).pose)[1].origin();
        assert!(knee_at[0] * forward_of_line > 10.0, "{knee_at:?}");
    }
    for (leg, above_line) in [(YAW, 1.0), (down, -1.0)] {
        let knee_at = frames(&leg, &solve(&leg, [0.0, 180.0, 0.0]).pose)[1].origin();
        assert!(knee_at[2] * above_line > 10.0, "{knee_at:?}");
    }
}

#[test]
fn a_chain_of_frames_keeps_the_links_lengths() {
    let pose = Pose { hip: 0.7, thigh: -0.4, knee: 1.9 };
    for leg in [ROLL, YAW] {
        let [hip, knee, foot_at] = frames(&leg, &pose).map(|frame| frame.origin());
        assert!((distance([0.0; 3], hip) - leg.offset).abs() < 1e-12);
        assert!((distance(hip, knee) - leg.thigh).abs() < 1e-12);
        assert!((distance(knee, foot_at) - leg.shank).abs() < 1e-12);
        assert_eq!(foot(&leg, &pose), foot_at);
    }
}

#[test]
fn a_rotation_is_right_handed_and_a_product_goes_from_left_to_right() {
    let one = Transform::shift(1.0, 2.0, 3.0);
    let point = |turn: Transform| turn.then(&one).origin();
    let close = |a: [f64; 3], b: [f64; 3]| assert!(distance(a, b) < 1e-15, "{a:?} {b:?}");
    close(point(Transform::about_x(FRAC_PI_2)), [1.0, -3.0, 2.0]);
    close(point(Transform::about_y(FRAC_PI_2)), [3.0, 2.0, -1.0]);
    close(point(Transform::about_z(FRAC_PI_2)), [-2.0, 1.0, 3.0]);
    assert_eq!(Transform::IDENTITY.then(&one), one);
    close(one.then(&Transform::about_x(1.0)).origin(), [1.0, 2.0, 3.0]);
}

#[test]
fn clamping_holds_each_joint_at_its_nearer_end_and_says_which() {
    let range = |min, max| Range { min, max };
    let ranges = Ranges { hip: range(-0.5, 0.5), thigh: range(-1.0, 1.0), knee: range(0.2, 2.0) };
    let inside = Pose { hip: 0.5, thigh: -1.0, knee: 1.0 };
    let (pose, held) = clamp(&inside, &ranges);
    assert_eq!((pose, held.any()), (inside, false));

    let (pose, held) = clamp(&Pose { hip: -0.6, thigh: 0.0, knee: 2.1 }, &ranges);
    assert_eq!(pose, Pose { hip: -0.5, thigh: 0.0, knee: 2.0 });
    assert_eq!((held.hip, held.thigh, held.knee), (true, false, true));

    // No NaN out, no panic on a range upside down.
    assert_eq!(range(-0.5, 0.5).hold(f64::NAN), (-0.5, true));
    assert_eq!(range(0.5, -0.5).hold(0.0), (-0.5, true));
}
