//! Promise: a foot out of reach is moved to the closest point that can be reached, and the answer says so and by
//! how much.

mod common;

use common::checks::reach;
use common::effort::cases;
use common::legs::{CULVERT, ORCHARD, any_leg, leg_and_point, leg_and_target};
use common::solver::{NumberSystem, core};
use ik_host_tests::reference::{Leg, Shape};
use proptest::prelude::*;

fn every_number(leg: &Leg, target: [f64; 3]) -> Result<(), String> {
    NumberSystem::ALL.into_iter().try_for_each(|number| {
        let farthest = number.farthest();
        let target = target.map(|v| v.clamp(-farthest, farthest));
        reach::check(&*core(number, leg, None).expect("a leg"), target)
    })
}

proptest! {
    #![proptest_config(cases(1_500))]

    #[test]
    fn any_foot_goes_to_the_closest_point((leg, target) in leg_and_point()) {
        prop_assert_eq!(every_number(&leg, target), Ok(()));
    }

    #[test]
    fn a_foot_in_reach_is_reached_near_straight_and_folded_too((leg, target) in leg_and_target()) {
        prop_assert_eq!(every_number(&leg, target), Ok(()));
    }

    #[test]
    fn a_foot_far_away_keeps_its_direction(
        leg in any_leg(),
        unit in prop::array::uniform3(-1.0..1.0),
        exponent in 0.0..37.0,
    ) {
        let target = unit.map(|u: f64| u * leg.size() * 10f64.powf(exponent));
        prop_assert_eq!(every_number(&leg, target), Ok(()));
    }

    #[test]
    fn a_foot_near_the_hip_axis_goes_to_the_closest_point(
        leg in any_leg(),
        along in -1.2..1.2,
        round in -3.2f64..3.2,
        away in prop_oneof![Just(0.0), -8.0..-1.0, 0.0..1.1],
    ) {
        // Within the cylinder of a roll hip, or around the axis of a yaw hip, where the ring is cut off.
        let away = leg.size() * if away < 0.0 { 10f64.powf(away) } else { away };
        let (sin, cos) = round.sin_cos();
        let along = along * leg.size();
        let target = match leg.shape {
            Shape::Roll => [along, away * cos, away * sin],
            Shape::Yaw => [away * sin, away * cos, along],
        };
        prop_assert_eq!(every_number(&leg, target), Ok(()));
    }
}

#[test]
fn feet_at_special_places_go_to_the_closest_point() {
    let equal = |leg: Leg| Leg { shank: leg.thigh, ..leg };
    let bare = |leg: Leg| Leg { offset: 0.0, ..leg };
    let legs = [ORCHARD, CULVERT].into_iter().flat_map(|l| [l, equal(l), bare(l), bare(equal(l))]);
    for leg in legs {
        let spots = [0.0, leg.offset, leg.thigh, leg.shank, leg.size(), leg.thigh + leg.shank];
        for x in spots {
            for y in spots {
                for z in spots {
                    for sign in 0..8 {
                        let signed = |v: f64, bit: i32| if sign & bit == 0 { v } else { -v };
                        let target = [signed(x, 1), signed(y, 2), signed(z, 4)];
                        assert_eq!(every_number(&leg, target), Ok(()));
                    }
                }
            }
        }
    }
}
