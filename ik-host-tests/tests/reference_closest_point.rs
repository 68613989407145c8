//! No pose that the leg can take brings the foot closer than the closest point does.
//!
//! Checked by brute force through forward kinematics, which knows nothing of reach.

use std::f64::consts::PI;

use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{Bend, FOOT_TOLERANCE, Leg, Pose, Shape, Verdict, closest, foot, solve};
use proptest::prelude::*;

const ROLL: Leg = Leg { shape: Shape::Roll, offset: 31.5, thigh: 94.0, shank: 107.0, bend: Bend::Forward };
const YAW: Leg = Leg { shape: Shape::Yaw, offset: 42.0, thigh: 71.0, shank: 118.0, bend: Bend::Up };

fn legs() -> impl Strategy<Value = Leg> {
    let offset = prop_oneof![1 => Just(0.0), 4 => 0.5..120.0f64];
    let link = || prop_oneof![4 => 5.0..300.0f64, 1 => Just(100.0)];
    (any::<bool>(), offset, link(), link()).prop_map(|(roll, offset, thigh, shank)| Leg {
        offset,
        thigh,
        shank,
        ..if roll { ROLL } else { YAW }
    })
}

fn pose() -> impl Strategy<Value = Pose> {
    (-PI..PI, -PI..PI, 0.0..=PI).prop_map(|(hip, thigh, knee)| Pose { hip, thigh, knee })
}

/// Whether the pose is on the branch that the leg keeps to: a yaw-hip leg does not reach across
/// its own yaw axis. (A roll-hip leg that does so takes a point that it reaches from the other
/// side as well: no restriction.)
fn keeps_its_side(leg: &Leg, pose: &Pose) -> bool {
    let second = pose.thigh - leg.bend.sign() * pose.knee;
    leg.shape == Shape::Roll || leg.offset + leg.thigh * pose.thigh.cos() + leg.shank * second.cos() >= 0.0
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::with_cases(150) })]

    #[test]
    fn no_reachable_pose_is_closer_than_the_closest_point(
        leg in legs(),
        at in prop::array::uniform3(-1.2..1.2f64),
        anywhere in prop::collection::vec(pose(), 300),
        nudges in prop::collection::vec((prop::array::uniform3(-1.0..1.0f64), -6.0..0.0f64), 300),
    ) {
        let target = at.map(|c| c * leg.size());
        let found = solve(&leg, target);
        let allowance = FOOT_TOLERANCE * leg.size() * 2.0;
        let nearby = nudges.into_iter().map(|(by, scale)| {
            let by = by.map(|b| b * 10f64.powf(scale));
            Pose {
                hip: found.pose.hip + by[0],
                thigh: found.pose.thigh + by[1],
                knee: (found.pose.knee + by[2]).abs(),
            }
        });
        for pose in anywhere.into_iter().chain(nearby) {
            if keeps_its_side(&leg, &pose) {
                let away = distance(foot(&leg, &pose), target);
                prop_assert!(
                    away >= found.moved_by_mm - allowance,
                    "{leg}, target {target:?}: {pose:?} comes within {away}, {found:?}"
                );
            }
        }
    }

    #[test]
    fn the_closest_point_is_itself_reachable_and_every_reachable_target_stays(
        leg in legs(),
        pose in pose(),
        at in prop::array::uniform3(-1.2..1.2f64),
    ) {
        let allowance = FOOT_TOLERANCE * leg.size() * 2.0;
        let (point, _, _) = closest(&leg, at.map(|c| c * leg.size()));
        prop_assert!(distance(foot(&leg, &solve(&leg, point).pose), point) <= allowance);
        prop_assert!(closest(&leg, point).1 <= allowance);

        if keeps_its_side(&leg, &pose) {
            let reachable = foot(&leg, &pose);
            let (point, moved_by, _) = closest(&leg, reachable);
            prop_assert!(moved_by <= allowance, "{leg}, {pose:?}: {reachable:?} to {point:?}");
        }
    }

    #[test]
    fn every_bit_pattern_of_a_target_gets_an_answer(
        leg in legs(),
        bits in prop::array::uniform3(any::<u64>()),
    ) {
        let target = bits.map(f64::from_bits);
        let found = solve(&leg, target);
        let Pose { hip, thigh, knee } = found.pose;
        prop_assert!((-PI..=PI).contains(&hip) && (-PI..=PI).contains(&thigh));
        prop_assert!((0.0..=PI).contains(&knee));
        prop_assert!(found.reached_foot.iter().all(|c| c.is_finite()));
        prop_assert_eq!(
            found.verdict == Verdict::NotANumber,
            target.iter().any(|c| c.is_nan())
        );
        prop_assert!(
            distance(foot(&leg, &found.pose), found.reached_foot) <= FOOT_TOLERANCE * leg.size()
        );
    }
}

#[test]
fn targets_too_far_for_squares_go_where_their_direction_points() {
    let far = |scale: f64| solve(&ROLL, [3.0 * scale, -4.0 * scale, -12.0 * scale]);
    let near = far(1e10);
    for scale in [1e45, 1e150, 1e200, 1e306] {
        assert!(near.pose.largest_difference(&far(scale).pose) < 1e-9);
        assert_eq!(far(scale).verdict, Verdict::Moved);
    }
    let infinite = solve(&ROLL, [0.0, 5.0, f64::NEG_INFINITY]);
    let straight_down = solve(&ROLL, [0.0, 0.0, -1000.0]);
    assert!(infinite.pose.largest_difference(&straight_down.pose) < 1e-15);
    assert!(infinite.moved_by_mm.is_infinite());
}

#[test]
fn a_nan_target_is_reported_and_gives_the_zero_pose() {
    for target in [[f64::NAN, 0.0, 0.0], [0.0, f64::NAN, 0.0], [0.0, 0.0, f64::NAN]] {
        let found = solve(&YAW, target);
        assert_eq!(found.verdict, Verdict::NotANumber);
        assert_eq!(found.pose, Pose::default());
        assert!(found.moved_by_mm.is_nan());
    }
}

/// The choices made where a direction is undefined, as the module promises them.
#[test]
fn undefined_directions_are_settled_as_promised() {
    let bare = Leg { offset: 0.0, ..ROLL };
    assert_eq!(closest(&bare, [0.0; 3]), ([0.0, 0.0, -13.0], 13.0, Verdict::Moved));
    assert_eq!(solve(&bare, [0.0; 3]).pose.hip, 0.0);
    // On the roll axis.
    assert_eq!(closest(&ROLL, [50.0, 0.0, 0.0]).0, [50.0, 31.5, 0.0]);
    assert_eq!(solve(&ROLL, [50.0, 0.0, 0.0]).pose.hip, 0.0);
    assert_eq!(closest(&ROLL, [0.0; 3]).0, [13.0, 31.5, 0.0]);
    assert_eq!(closest(&ROLL, [-1.0, 0.0, 0.0]).0, [-13.0, 31.5, 0.0]);
    // On the yaw axis, on the femur axis, and level with it but far inboard.
    assert_eq!(solve(&YAW, [0.0, 0.0, -90.0]).pose.hip, 0.0);
    assert_eq!(closest(&YAW, [0.0, 42.0, 0.0]).0, [0.0, 89.0, 0.0]);
    let (inboard, _, _) = closest(&YAW, [0.0, 1.0, 0.0]);
    assert_eq!(inboard, [0.0, 0.0, (47f64.powi(2) - 42f64.powi(2)).sqrt()]);
    assert!(closest(&YAW, [0.0, 1.0, -1e-9]).0[2] < 0.0);
    // Folded onto the thigh's axis.
    let equal = Leg { thigh: 100.0, shank: 100.0, offset: 0.0, ..ROLL };
    let folded = solve(&equal, [0.0; 3]);
    assert_eq!((folded.pose.thigh, folded.pose.knee), (0.0, PI));
    assert_eq!(folded.verdict, Verdict::Reached);
}
