//! Promise: every input has an answer. Any bit pattern whatever, NaN, infinities and subnormals included, comes to
//! finite joint angles within the ranges, without a panic; a foot that is not finite is reported, and the pose
//! given to hold is kept. (Tests are built with overflow checks: nothing overflows either.)

mod common;

use common::checks::totality;
use common::effort::cases;
use common::legs::any_leg;
use common::solver::{NumberSystem, Solver, core};
use ik_core::Outcome;
use ik_host_tests::reference::{Leg, Pose};
use proptest::prelude::*;
use std::f64::consts::PI;

/// The length of the number system that a bit pattern is.
fn length(number: NumberSystem, bits: u64) -> f64 {
    match number {
        NumberSystem::Float32 | NumberSystem::Coarse => f64::from(f32::from_bits((bits >> 32) as u32)),
        NumberSystem::Fixed32 | NumberSystem::Short32 => f64::from((bits >> 32) as i32) / 65_536.0,
        NumberSystem::Float64 => f64::from_bits(bits),
    }
}

/// Any bits, and those of NaN, infinities, zeros, subnormals and the largest numbers more often.
fn bits() -> impl Strategy<Value = u64> {
    let special =
        prop::sample::select(vec![0u64, 1 << 63, 0x7F80_0000, 0xFF80_0000, 0x7FC0_0000, 0x7FF0_0000]);
    prop_oneof![
        6 => any::<u64>(),
        // The exponents of f32 that a leg's targets have: 2^-10 to 2^15.
        6 => (any::<u64>(), 117u64..143).prop_map(|(b, e)| (b & !(0xFF << 55)) | (e << 55)),
        1 => special.prop_map(|high| high << 32),
        1 => any::<u32>().prop_map(u64::from),
        1 => any::<u32>().prop_map(|low| 0x007F_FFFF_0000_0000 & (u64::from(low) << 24)),
        1 => prop::sample::select(vec![f64::NAN, f64::INFINITY, f64::NEG_INFINITY, f64::MAX, f64::MIN_POSITIVE])
            .prop_map(f64::to_bits),
    ]
}

fn any_pose() -> impl Strategy<Value = Pose> {
    (-PI..PI, -PI..PI, -PI..PI).prop_map(|(hip, thigh, knee)| Pose { hip, thigh, knee })
}

fn ranges() -> impl Strategy<Value = Option<[[f64; 2]; 3]>> {
    let range = |least: f64| (least..180.0, least..180.0).prop_map(|(a, b): (f64, f64)| [a.min(b), a.max(b)]);
    prop::option::of((range(-180.0), range(-180.0), range(0.0)).prop_map(|(h, t, k)| [h, t, k]))
}

proptest! {
    #![proptest_config(cases(4_000))]

    #[test]
    fn any_bit_pattern_has_an_answer(
        leg in any_leg(),
        ranges in ranges(),
        bits in prop::array::uniform3(bits()),
        hold in any_pose(),
    ) {
        for number in NumberSystem::ALL {
            let solver = core(number, &leg, ranges).expect("a leg");
            let foot = bits.map(|b| length(number, b));
            prop_assert_eq!(totality::check(&*solver, foot, hold), Ok(()));
        }
    }

    #[test]
    fn any_pose_has_a_foot(leg in any_leg(), pose in any_pose()) {
        for number in NumberSystem::ALL {
            let solver = core(number, &leg, None).expect("a leg");
            prop_assert_eq!(totality::check_forward(&*solver, &pose), Ok(()));
        }
    }

    /// The longest and shortest legs that there are, and those at the edge of proportion.
    #[test]
    fn legs_at_the_edge_of_what_can_be_built_have_answers(
        size in prop::sample::select(vec![1.001, 1.5, 3.9, 1000.0, 8191.9, 8192.1, 16_382.9]),
        ratio in prop::sample::select(vec![0.125, 0.25, 1.0, 7.999, 8.0]),
        offset in prop::sample::select(vec![0.0, 0.5, 1.0, 1.999, 2.0]),
        kind in 0usize..4,
        bits in prop::array::uniform3(bits()),
        unit in prop::array::uniform3(-1.5..1.5),
    ) {
        let (shape, bend) = common::legs::KINDS[kind];
        let links = size / (1.0 + offset);
        let leg = Leg {
            shape,
            bend,
            thigh: links * ratio / (1.0 + ratio),
            shank: links / (1.0 + ratio),
            offset: offset * links,
        };
        for number in NumberSystem::ALL {
            // Rounding may put a leg beyond the edge: then it is refused, which is an answer too.
            let Ok(solver) = core(number, &leg, None) else { continue };
            let near = solver.quantised(unit.map(|u: f64| u * leg.size()));
            prop_assert_eq!(totality::check(&*solver, near, Pose::default()), Ok(()));
            let any = bits.map(|b| length(number, b));
            prop_assert_eq!(totality::check(&*solver, any, Pose::default()), Ok(()));
        }
    }
}

#[test]
fn one_coordinate_that_is_not_finite_is_enough_to_hold() {
    let hold = Pose { hip: 0.25, thigh: -0.5, knee: 1.0 };
    for number in NumberSystem::ALL.into_iter().filter(|n| n.floats()) {
        let solver: Box<dyn Solver> = core(number, &common::legs::ORCHARD, None).expect("a leg");
        for bad in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY] {
            for at in 0..3 {
                let mut foot = [10.0, 31.5, -150.0];
                foot[at] = bad;
                let told = solver.solve(foot, hold);
                assert_eq!(told.outcome, Outcome::NotFinite, "{number:?}: {foot:?}");
                assert!(told.pose.largest_difference(&hold) < 1e-15, "{number:?}: {told:?}");
            }
        }
    }
}
