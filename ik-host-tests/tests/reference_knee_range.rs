//! A knee that cannot be straightened or folded all the way ends the reach: the two inverse references say the same of
//! it, and no pose within the range brings the foot closer.

use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{Bend, Leg, Pose, Range, Shape, Verdict, foot, multiprecision, solve_within};
use proptest::prelude::*;
use std::f64::consts::PI;

/// The ends of the range go through one f64 cosine in one of the references; this much of it shows, as a fraction of the
/// leg's size or in radians.
const TOLERANCE: f64 = 1e-12;

fn legs() -> impl Strategy<Value = Leg> {
    (any::<bool>(), 0.0..120.0f64, 20.0..300.0f64, 20.0..300.0f64).prop_map(|(roll, offset, thigh, shank)| {
        Leg {
            shape: if roll { Shape::Roll } else { Shape::Yaw },
            bend: if roll { Bend::Forward } else { Bend::Up },
            offset,
            thigh,
            shank,
        }
    })
}

fn knees() -> impl Strategy<Value = Range> {
    (0.05..1.5f64, 1.6..3.0f64).prop_map(|(min, max)| Range { min, max })
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::with_cases(60) })]

    #[test]
    fn closed_form_and_multiprecision_agree_on_the_reach(
        leg in legs(),
        knee in knees(),
        at in prop::array::uniform3(-1.2..1.2f64),
    ) {
        let target = at.map(|c| c * leg.size());
        let (f64s, exact) = (solve_within(&leg, knee, target), multiprecision::solve_within(&leg, knee, target).unwrap());
        prop_assert_eq!(f64s.verdict, exact.verdict);
        prop_assert!((f64s.moved_by_mm - multiprecision::to_f64(&exact.moved_by)).abs() < TOLERANCE * leg.size());
        prop_assert!(f64s.pose.largest_difference(&exact.pose.rounded()) < TOLERANCE);
    }

    #[test]
    fn no_pose_within_the_range_is_closer(
        leg in legs(),
        knee in knees(),
        at in prop::array::uniform3(-1.2..1.2f64),
        poses in prop::collection::vec((-PI..PI, -PI..PI, 0.0..=1.0f64), 300),
    ) {
        let target = at.map(|c| c * leg.size());
        let found = solve_within(&leg, knee, target);
        prop_assert!(found.pose.knee > knee.min - TOLERANCE && found.pose.knee < knee.max + TOLERANCE);
        for (hip, thigh, share) in poses {
            let pose = Pose { hip, thigh, knee: knee.min + (knee.max - knee.min) * share };
            let second = pose.thigh - leg.bend.sign() * pose.knee;
            let out = leg.offset + leg.thigh * pose.thigh.cos() + leg.shank * second.cos();
            if leg.shape == Shape::Roll || out >= 0.0 {
                let away = distance(foot(&leg, &pose), target);
                prop_assert!(away >= found.moved_by_mm - TOLERANCE * leg.size(), "{pose:?} is closer");
            }
        }
    }
}

#[test]
fn a_free_foot_that_the_range_forbids_is_moved() {
    let leg = Leg { shape: Shape::Roll, offset: 30.0, thigh: 100.0, shank: 100.0, bend: Bend::Forward };
    let knee = Range { min: 30f64.to_radians(), max: PI };
    let found = solve_within(&leg, knee, [0.0, 30.0, -199.0]);
    assert_eq!(found.verdict, Verdict::Moved);
    // An isosceles triangle: G = 2·100·cos 15°.
    assert!((found.reached_foot[2] + (200.0 * 15f64.to_radians().cos())).abs() < 0.5, "{found:?}");
    assert!((found.pose.knee - knee.min).abs() < 1e-12);
}
