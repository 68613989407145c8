//! The references agree with one another before they judge anything.

use ik_host_tests::reference::leg::LENGTHS;
use ik_host_tests::reference::{ANGLE_TOLERANCE, Bend, FOOT_TOLERANCE, Leg, Shape, agreement, foot, spread};
use proptest::prelude::*;

fn legs() -> impl Strategy<Value = Leg> {
    let offset = prop_oneof![1 => Just(0.0), 4 => 0.5..120.0f64];
    let link = || prop_oneof![4 => 5.0..300.0f64, 1 => Just(100.0)];
    (any::<bool>(), any::<bool>(), offset, link(), link()).prop_map(|(roll, plus, offset, thigh, shank)| {
        Leg {
            shape: if roll { Shape::Roll } else { Shape::Yaw },
            offset,
            thigh,
            shank,
            bend: match (roll, plus) {
                (true, true) => Bend::Forward,
                (true, false) => Bend::Backward,
                (false, true) => Bend::Up,
                (false, false) => Bend::Down,
            },
        }
    })
}

/// Four fixed legs: with and without offset, equal and unequal links, both shapes.
fn fixed_legs() -> [Leg; 4] {
    let leg = |shape, offset, thigh, shank, bend| Leg { shape, offset, thigh, shank, bend };
    [
        leg(Shape::Roll, 31.5, 94.0, 107.0, Bend::Backward),
        leg(Shape::Roll, 0.0, 100.0, 100.0, Bend::Forward),
        leg(Shape::Yaw, 42.0, 71.0, 118.0, Bend::Up),
        leg(Shape::Yaw, 0.0, 60.3, 60.3, Bend::Down),
    ]
}

#[test]
fn the_three_agree_on_thousands_of_targets_near_straight_folded_and_the_hip_axis_included() {
    for leg in fixed_legs() {
        leg.check().unwrap();
        let targets = spread(&leg, 1200);
        let found = agreement(&leg, &targets).unwrap_or_else(|d| panic!("{d}"));
        println!("{leg}: {found}, angle at {:?}, foot at {:?}", found.at_angle, found.at_foot);
        assert_eq!(found.targets, 1200);
        // Both sides of the edge were tried, and two roundings were really compared.
        assert!(found.moved > 100 && found.moved < 1100, "{found}");
        assert!(found.largest_angle_rad > 0.0 && found.largest_angle_rad <= ANGLE_TOLERANCE);
        assert!(found.largest_foot_mm > 0.0);
        assert!(found.largest_foot_mm <= FOOT_TOLERANCE * leg.size());
    }
}

#[test]
fn the_three_agree_where_directions_are_undefined() {
    for leg in fixed_legs() {
        let (a, c) = (leg.offset, leg.offset);
        let (long, short) = (leg.thigh + leg.shank, (leg.thigh - leg.shank).abs());
        let mut targets = vec![
            [0.0, 0.0, 0.0],
            [-0.0, -0.0, -0.0],
            [17.0, 0.0, 0.0],
            [-17.0, 0.0, 0.0],
            [500.0, 0.0, 0.0],
            [-500.0, 0.0, 0.0],
            [short, 0.0, 0.0],
            [0.0, 0.0, 30.0],
            [0.0, 0.0, -30.0],
            [0.0, 0.0, 1000.0],
            [0.0, a, 0.0],
            [0.0, -a, 0.0],
            [long, a, 0.0],
            [short, a, 0.0],
            [-short, -a, 0.0],
            [0.0, a, -long],
            [0.0, a, -short],
            [0.0, c + long, 0.0],
            [0.0, -(c + long), 0.0],
            [0.0, c + short, 0.0],
            [0.0, c * 0.5, 0.0],
            [0.0, 0.0, short],
            [1e-30, 1e-30, -1e-30],
            [1e12, -1e12, 1e11],
        ];
        // Around every special point, a hair to each side.
        for hair in [1e-16, 1e-13, 1e-9, 1e-5] {
            for base in targets.clone().into_iter().take(22) {
                targets.push([base[0] + hair, base[1] - hair, base[2] + hair]);
                targets.push([base[0] - hair, base[1] + hair, base[2] - hair]);
            }
        }
        let found = agreement(&leg, &targets).unwrap_or_else(|d| panic!("{d}"));
        println!("{leg}: {found}");
    }
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::with_cases(400) })]

    #[test]
    fn the_three_agree_on_random_legs_and_targets(
        leg in legs(),
        at in prop::array::uniform3(-1.3..1.3f64),
    ) {
        let target = at.map(|c| c * leg.size());
        agreement(&leg, &[target]).map_err(|d| TestCaseError::fail(d.to_string()))?;
    }

    #[test]
    fn the_three_agree_on_random_legs_from_stretched_to_a_hair_short_of_it(
        leg in legs(),
        hip in -3.0..3.0f64,
        thigh in -1.5..1.5f64,
        nearness in -17.0..0.0f64,
        folded in any::<bool>(),
    ) {
        let off = 10f64.powf(nearness);
        let knee = if folded { std::f64::consts::PI - off } else { off };
        let target = foot(&leg, &ik_host_tests::reference::Pose { hip, thigh, knee });
        agreement(&leg, &[target]).map_err(|d| TestCaseError::fail(d.to_string()))?;
    }

    #[test]
    fn the_three_agree_on_random_legs_near_the_hip_axis(
        leg in legs(),
        azimuth in -3.2..3.2f64,
        along in -1.2..1.2f64,
        nearness in -17.0..0.0f64,
        inside in any::<bool>(),
    ) {
        let off = 10f64.powf(nearness) * if inside { -1.0 } else { 1.0 };
        let (sin, cos) = azimuth.sin_cos();
        let along = along * leg.size();
        let target = match leg.shape {
            Shape::Roll => {
                let from_axis = leg.offset * (1.0 + off);
                [along, from_axis * cos, from_axis * sin]
            }
            Shape::Yaw => [off * leg.size() * sin, off * leg.size() * cos, along],
        };
        agreement(&leg, &[target]).map_err(|d| TestCaseError::fail(d.to_string()))?;
    }
}

#[test]
fn a_target_that_256_bits_cannot_take_is_named_not_skipped() {
    let leg = fixed_legs()[0];
    for bad in [f64::NAN, f64::INFINITY, -1e40] {
        let refused = agreement(&leg, &[[0.0, 31.5, -150.0], [bad, 2.5, 0.0]]).unwrap_err();
        assert_eq!(refused.target[1], 2.5);
        assert!(refused.to_string().contains("2.5"), "{refused}");
    }
}

#[test]
fn a_leg_that_is_none_is_refused_with_field_and_value() {
    let good = fixed_legs()[0];
    let refused = |leg: Leg| leg.check().unwrap_err();
    for bad in [0.0, -1.0, f64::NAN, f64::INFINITY, LENGTHS.end() * 2.0] {
        let why = refused(Leg { thigh: bad, ..good });
        assert!(why.contains("thigh") && why.contains(&bad.to_string()), "{why}");
        let why = refused(Leg { shank: bad, ..good });
        assert!(why.contains("shank"), "{why}");
    }
    let why = refused(Leg { offset: -0.5, ..good });
    assert!(why.contains("offset = -0.5"), "{why}");
    let why = refused(Leg { bend: Bend::Up, ..good });
    assert!(why.contains("Up") && why.contains("Backward"), "{why}");
}
