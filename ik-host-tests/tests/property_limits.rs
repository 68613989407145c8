//! Promise: a joint is never commanded beyond its range, whatever is asked; the answer names the joint and the end
//! that held it, exactly when one did, and how far the foot is off.

mod common;

use common::checks::limits;
use common::effort::cases;
use common::legs::{ORCHARD, leg_and_point, leg_and_target};
use common::solver::{NumberSystem, core};
use ik_core::{Limits, LimitsError};
use ik_host_tests::reference::Leg;
use proptest::prelude::*;

const WHOLE_TURN: [f64; 2] = [-180.0, 180.0];

/// Ranges narrow enough to hold joints often, and wide enough to let them go often.
fn ranges() -> impl Strategy<Value = [[f64; 2]; 3]> {
    let around = || {
        (-120.0..120.0, 0.0..120.0)
            .prop_map(|(middle, half): (f64, f64)| [(middle - half).max(-180.0), (middle + half).min(180.0)])
    };
    let knee = (0.0..180.0, 0.0..180.0).prop_map(|(a, b): (f64, f64)| [a.min(b), a.max(b)]);
    (around(), around(), knee).prop_map(|(hip, thigh, knee)| [hip, thigh, knee])
}

fn every_number(leg: &Leg, ranges: [[f64; 2]; 3], target: [f64; 3]) -> Result<(), String> {
    NumberSystem::ALL.into_iter().try_for_each(|number| {
        let limited = core(number, leg, Some(ranges)).expect("a leg");
        let by_knee = core(number, leg, Some([WHOLE_TURN, WHOLE_TURN, ranges[2]])).expect("a leg");
        limits::check(&*limited, &*by_knee, target)
    })
}

proptest! {
    #![proptest_config(cases(2_000))]

    #[test]
    fn ranges_hold_for_feet_in_reach((leg, target) in leg_and_target(), ranges in ranges()) {
        prop_assert_eq!(every_number(&leg, ranges, target), Ok(()));
    }

    #[test]
    fn ranges_hold_for_any_foot((leg, target) in leg_and_point(), ranges in ranges()) {
        prop_assert_eq!(every_number(&leg, ranges, target), Ok(()));
    }

    /// Not a hair farther than was asked for: what the number system cannot hold exactly is rounded inward.
    #[test]
    fn ends_of_ranges_are_rounded_inward(ranges in ranges()) {
        for number in NumberSystem::ALL {
            let held = core(number, &ORCHARD, Some(ranges)).expect("a leg").ranges();
            for (held, [least, most]) in [held.hip, held.thigh, held.knee].into_iter().zip(ranges) {
                let (min, max) = (held.min.to_degrees(), held.max.to_degrees());
                // A few last bits of f64 are lost on the way through radians; a range may be too narrow for any angle.
                let hair = 1e-12;
                prop_assert!(least - hair <= min && min <= max, "{:?}: {} for {}", number, min, least);
                prop_assert!(max <= most + hair || min == max, "{:?}: {} for {}", number, max, most);
            }
        }
    }
}

/// The whole turn and its ends included, the ranges that were asked for are the ones that hold.
#[test]
fn ranges_are_those_that_were_asked_for() {
    for number in NumberSystem::ALL {
        for [hip, thigh, knee] in [
            [[-180.0, 180.0], [-180.0, 180.0], [0.0, 180.0]],
            [[-180.0, -90.0], [90.0, 180.0], [180.0, 180.0]],
            [[-45.0, 45.0], [-80.0, 80.0], [5.0, 150.0]],
        ] {
            let held = core(number, &ORCHARD, Some([hip, thigh, knee])).expect("a leg").ranges();
            for (held, asked) in [(held.hip, hip), (held.thigh, thigh), (held.knee, knee)] {
                let off =
                    (held.min.to_degrees() - asked[0]).abs().max((held.max.to_degrees() - asked[1]).abs());
                assert!(off < 1e-5, "{number:?}: {held:?} for {asked:?} degrees");
            }
        }
    }
}

/// Ranges that cannot be are refused, each joint by its own name.
#[test]
fn ranges_that_cannot_be_are_refused() {
    let good = [-10.0, 10.0];
    let bad = [
        [10.0, -10.0],
        [-181.0, 0.0],
        [0.0, 180.1],
        [f64::NAN, 0.0],
        [0.0, f64::NAN],
        [f64::NEG_INFINITY, 0.0],
    ];
    for bad in bad {
        assert_eq!(Limits::degrees(bad, good, [0.0, 90.0]), Err(LimitsError::Hip));
        assert_eq!(Limits::degrees(good, bad, [0.0, 90.0]), Err(LimitsError::Thigh));
        assert_eq!(Limits::degrees(good, good, bad), Err(LimitsError::Knee));
    }
    // A knee does not bend backwards.
    assert_eq!(Limits::degrees(good, good, good), Err(LimitsError::Knee));
    assert!(Limits::degrees([-180.0, 180.0], [0.0, 0.0], [0.0, 180.0]).is_ok());
}
