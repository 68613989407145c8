//! The checks can fail: every way of getting a leg wrong that has a name is caught.

use ik_host_tests::reference::{
    Bend, Leg, Pose, Shape, Solution, Verdict, agreement_of, foot, solve, spread,
};

const LEGS: [Leg; 2] = [
    Leg { shape: Shape::Roll, offset: 31.5, thigh: 94.0, shank: 107.0, bend: Bend::Backward },
    Leg { shape: Shape::Yaw, offset: 42.0, thigh: 71.0, shank: 118.0, bend: Bend::Up },
];

/// Panics unless the agreement check refuses this inverse, on both legs, and blames `blamed`.
fn inverse_is_caught(blamed: &str, wrong: impl Fn(&Leg, [f64; 3]) -> Solution) {
    for leg in LEGS {
        let refused = agreement_of(&leg, &spread(&leg, 40), &wrong, foot).unwrap_err();
        let message = refused.to_string();
        assert!(message.contains(blamed), "blamed for something else: {message}");
        assert!(refused.found > refused.allowed || refused.found.is_nan());
    }
}

/// Panics unless the agreement check refuses this forward kinematics, on both legs.
fn forward_is_caught(wrong: impl Fn(&Leg, &Pose) -> [f64; 3]) {
    for leg in LEGS {
        let refused = agreement_of(&leg, &spread(&leg, 40), solve, &wrong).unwrap_err();
        assert!(refused.to_string().contains("two forward kinematics"), "{refused}");
    }
}

fn with_pose(solution: Solution, change: impl Fn(&mut Pose)) -> Solution {
    let mut changed = solution;
    change(&mut changed.pose);
    changed
}

#[test]
fn the_right_answers_pass_the_check_that_the_wrong_ones_fail() {
    for leg in LEGS {
        agreement_of(&leg, &spread(&leg, 40), solve, foot).unwrap();
    }
}

#[test]
fn an_inverse_with_a_flipped_sign_is_caught() {
    inverse_is_caught("joint angle", |leg, at| with_pose(solve(leg, at), |p| p.hip = -p.hip));
    inverse_is_caught("joint angle", |leg, at| with_pose(solve(leg, at), |p| p.thigh = -p.thigh));
    inverse_is_caught("joint angle", |leg, at| with_pose(solve(leg, at), |p| p.knee = -p.knee));
}

#[test]
fn an_inverse_with_links_swapped_or_a_length_a_millionth_off_is_caught() {
    let solved_as = |changed: Leg, at| solve(&changed, at);
    // Blamed on whatever shows it first.
    inverse_is_caught("", |leg, at| solved_as(Leg { thigh: leg.shank, shank: leg.thigh, ..*leg }, at));
    inverse_is_caught("", |leg, at| solved_as(Leg { thigh: leg.thigh * 1.000_001, ..*leg }, at));
    inverse_is_caught("", |leg, at| solved_as(Leg { offset: leg.offset * 1.000_001, ..*leg }, at));
}

#[test]
fn an_inverse_that_bends_the_knee_the_other_way_is_caught() {
    inverse_is_caught("joint angle", |leg, at| {
        let bend = match leg.bend {
            Bend::Forward => Bend::Backward,
            Bend::Backward => Bend::Forward,
            Bend::Up => Bend::Down,
            Bend::Down => Bend::Up,
        };
        solve(&Leg { bend, ..*leg }, at)
    });
}

#[test]
fn an_inverse_in_single_precision_is_caught() {
    inverse_is_caught("joint angle", |leg, at| {
        with_pose(solve(leg, at), |p| p.thigh = f64::from(p.thigh as f32))
    });
}

#[test]
fn an_inverse_that_gives_nan_is_caught() {
    inverse_is_caught("joint angle", |leg, at| with_pose(solve(leg, at), |p| p.knee = f64::NAN));
    inverse_is_caught("target was moved", |leg, at| Solution { moved_by_mm: f64::NAN, ..solve(leg, at) });
}

#[test]
fn an_inverse_that_misjudges_reach_is_caught() {
    // Everything called reached; everything said to be moved by nothing; the wrong point.
    inverse_is_caught("verdicts", |leg, at| Solution { verdict: Verdict::Reached, ..solve(leg, at) });
    inverse_is_caught("target was moved", |leg, at| Solution { moved_by_mm: 0.0, ..solve(leg, at) });
    inverse_is_caught("points that can be reached", |leg, at| Solution {
        reached_foot: at,
        ..solve(leg, at)
    });
}

#[test]
fn a_forward_kinematics_that_is_wrong_in_sign_link_or_unit_is_caught() {
    let mirrored = |leg: &Leg, pose: &Pose| {
        let [x, y, z] = foot(leg, pose);
        [-x, y, z]
    };
    forward_is_caught(mirrored);
    forward_is_caught(|leg, pose| foot(&Leg { thigh: leg.shank, shank: leg.thigh, ..*leg }, pose));
    forward_is_caught(|leg, pose| foot(leg, &Pose { hip: -pose.hip, ..*pose }));
    forward_is_caught(|leg, pose| foot(leg, &Pose { knee: pose.knee.to_degrees(), ..*pose }));
    forward_is_caught(|leg, pose| foot(&Leg { offset: 0.0, ..*leg }, pose));
}
