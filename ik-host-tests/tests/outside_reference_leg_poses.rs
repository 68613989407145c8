//! The references against leg poses computed outside the project.
//!
//! Source: `check-values/leg-poses.csv`, found by mpmath's root finder on products of 4×4
//! homogeneous transforms at 60 digits; scipy's root finder agrees to 6e-15. Its frame is ours
//! for a left roll-hip leg; its signs, and its yaw-hip frame, are mapped here.

use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{
    ANGLE_TOLERANCE, Bend, FOOT_TOLERANCE, Leg, Pose, Shape, Verdict, foot, multiprecision, solve,
};

struct Row {
    name: String,
    leg: Leg,
    target: [f64; 3],
    pose: Pose,
}

fn rows() -> Vec<Row> {
    let path = concat!(env!("CARGO_MANIFEST_DIR"), "/check-values/leg-poses.csv");
    let mut reader = csv::ReaderBuilder::new().comment(Some(b'#')).from_path(path).unwrap();
    let headers = reader.headers().unwrap().clone();
    reader
        .records()
        .map(|record| {
            let record = record.unwrap();
            let text = |column: &str| {
                let at = headers.iter().position(|h| h == column).unwrap();
                record.get(at).unwrap().to_owned()
            };
            let number = |column: &str| text(column).parse::<f64>().unwrap();
            let [x, y, z] = ["x_mm", "y_mm", "z_mm"].map(number);
            let [q1, q2, q3] = ["q1_rad", "q2_rad", "q3_rad"].map(number);
            let bends_with_q3 = number("knee_sign") > 0.0;
            // Theirs turn right-handed about y: a hanging link swings back, an outstretched one
            // sinks. So thigh and femur change sign, and a positive third angle is a knee that
            // points forward, or up.
            let (shape, bend, target, hip) = match text("leg").as_str() {
                "rpp" => {
                    let side = number("side");
                    let bend = if bends_with_q3 { Bend::Forward } else { Bend::Backward };
                    // A right leg is the mirror image of a left one.
                    (Shape::Roll, bend, [x, side * y, z], side * q1)
                }
                "ypp" => {
                    let bend = if bends_with_q3 { Bend::Up } else { Bend::Down };
                    // Their x points outboard, their y back, seen from our left leg.
                    (Shape::Yaw, bend, [-y, x, z], -q1)
                }
                other => panic!("unknown leg {other}"),
            };
            Row {
                name: format!("{} {bend:?}", text("case")),
                leg: Leg {
                    shape,
                    offset: number("l1_mm"),
                    thigh: number("l2_mm"),
                    shank: number("l3_mm"),
                    bend,
                },
                target,
                pose: Pose { hip, thigh: -q2, knee: q3.abs() },
            }
        })
        .collect()
}

/// Some targets of the file are decimals that f64 does not hold: half a unit in the last place of
/// 231 mm, at a millimetre's tenth from a straight knee, where a mm moves the knee by 0.34 rad.
const BY_ROUNDING: f64 = 1.5e-14;

#[test]
fn every_published_pose_is_found_from_its_foot() {
    let rows = rows();
    assert_eq!(rows.len(), 48, "rows of leg-poses.csv");
    for Row { name, leg, target, pose } in rows {
        leg.check().unwrap();
        let exact = target.iter().all(|c| (c * 2.0).fract() == 0.0);
        let allowed = ANGLE_TOLERANCE + if exact { 0.0 } else { BY_ROUNDING };
        let found = solve(&leg, target);
        assert_eq!(found.verdict, Verdict::Reached, "{name}");
        let off = found.pose.largest_difference(&pose);
        assert!(off <= allowed, "{name}: closed form off by {off:e}");
        let found = multiprecision::solve(&leg, target).unwrap();
        let off = found.pose.rounded().largest_difference(&pose);
        assert!(off <= allowed, "{name}: 256 bits off by {off:e}");
    }
}

#[test]
fn every_published_pose_puts_the_foot_where_it_says() {
    for Row { name, leg, target, pose } in rows() {
        let chained = foot(&leg, &pose);
        let away = distance(chained, target);
        assert!(away <= FOOT_TOLERANCE * leg.size(), "{name}: transforms {away:e} mm away");
        let pose = multiprecision::real_pose(&pose).unwrap();
        let summed = multiprecision::foot(&leg, &pose).unwrap();
        let away = distance(summed.map(|c| multiprecision::to_f64(&c)), target);
        assert!(away <= FOOT_TOLERANCE * leg.size(), "{name}: 256 bits {away:e} mm away");
    }
}

#[test]
fn a_published_pose_with_one_sign_wrong_is_told_apart() {
    // Or else the two tests above would prove little.
    for Row { name, leg, target, pose } in rows() {
        let mut wrong = vec![Pose { thigh: -pose.thigh, ..pose }, Pose { knee: -pose.knee, ..pose }];
        if pose.hip != 0.0 {
            wrong.push(Pose { hip: -pose.hip, ..pose });
        }
        for wrong in wrong {
            assert!(distance(foot(&leg, &wrong), target) > 0.1, "{name}: {wrong:?}");
        }
    }
}
