//! Promise: the foot that the computed angles give is the foot that was asked for, within the number system's
//! bound, by the solver's own forward kinematics and by the reference's; and the joints are the reference's.

mod common;

use common::checks::round_trip;
use common::effort::{cases, rounds};
use common::legs::{CULVERT, ORCHARD, Sweep, leg_and_target};
use common::solver::{NumberSystem, core};
use ik_host_tests::reference::{Bend, Leg, Shape};
use proptest::prelude::*;

proptest! {
    #![proptest_config(cases(2_000))]

    #[test]
    fn the_foot_comes_to_where_it_was_asked_to_be((leg, target) in leg_and_target()) {
        for number in NumberSystem::ALL {
            let solver = core(number, &leg, None).expect("a leg");
            prop_assert_eq!(round_trip::check(&*solver, target), Ok(()));
        }
    }
}

/// Where a long run found the largest error of a joint in `Short32`: a leg whose coxa is longer than its links, reaching
/// back over its own axis, nearly straight.
const BACK_OVER_THE_AXIS: (Leg, [f64; 3]) = (
    Leg {
        shape: Shape::Yaw,
        offset: 75.749_237_060_546_88,
        thigh: 34.668_083_190_917_97,
        shank: 20.0,
        bend: Bend::Up,
    },
    [-20.367_369_298_069_743, -15.288_307_534_874_882, 21.211_427_066_815_304],
);

/// The largest errors of a number system over a fixed sweep of random legs and the two demo legs: own forward
/// kinematics, reference's, joint angles.
fn largest(number: NumberSystem) -> [(f64, Leg, [f64; 3]); 3] {
    let mut largest = [(0.0, ORCHARD, [0.0; 3]); 3];
    let mut sweep = Sweep::from_seed(1);
    let legs = rounds(600);
    for round in 0..=legs {
        let leg = match round % 20 {
            _ if round == legs => BACK_OVER_THE_AXIS.0,
            0 => ORCHARD,
            1 => CULVERT,
            _ => sweep.leg(),
        };
        let solver = core(number, &leg, None).expect("a leg");
        for at in 0..100 {
            let known = round == legs && at == 0;
            let target = if known { BACK_OVER_THE_AXIS.1 } else { sweep.target(&leg) };
            let Some(found) = round_trip::found(&*solver, target).expect("an answer") else { continue };
            for (i, error) in [found.own_foot, found.foot, found.angle.unwrap_or(0.0)].into_iter().enumerate()
            {
                if error > largest[i].0 {
                    largest[i] = (error, leg, target);
                }
            }
        }
    }
    largest
}

#[test]
fn the_bounds_hold_over_a_dense_sweep_and_are_no_larger_than_they_need_be() {
    for number in NumberSystem::ALL {
        let bounds = number.bounds();
        let [own_foot, foot, angle] = largest(number);
        println!("{number:?}: own foot {:.2e}, foot {:.2e}, angle {:.2e}", own_foot.0, foot.0, angle.0);
        for (what, (found, leg, target), bound) in [
            ("own foot", own_foot, bounds.own_foot),
            ("foot", foot, bounds.foot),
            ("angle", angle, bounds.angle),
        ] {
            let case = format!("{number:?}: {what}: {found:e} of {bound:e} at {leg}, {target:?}");
            assert!(found <= bound, "{case}");
            // `f64` shows the method's own error, which need only be far below the others'.
            let yardstick = number == NumberSystem::Float64;
            assert!(found > 0.5 * bound || yardstick, "{case}: the bound is too wide");
        }
    }
}
