//! Nothing is timed that computes nonsense: every contender's angles are those of the law of cosines in `f64`, to
//! within the accuracy that it is documented with, and that is not stated wider than five times what is found.

use benches::contenders::contenders;
use benches::legs::Shape;
use benches::targets;
use std::collections::HashMap;
use std::f64::consts::{PI, TAU};

/// The law of cosines in `f64`, as in `benches::textbook`, with the standard library's functions.
fn in_f64(shape: Shape, [x, y, z]: [f64; 3]) -> [f64; 3] {
    let [offset, thigh, shank] = shape.leg();
    let (hip, across, along) = match shape {
        Shape::RollHip => {
            let depth = (y * y + z * z - offset * offset).sqrt();
            (z.atan2(y) + depth.atan2(offset), x, depth)
        }
        Shape::YawHip => (x.atan2(y), z, x.hypot(y) - offset),
    };
    let span_square = along * along + across * across;
    let interior = ((thigh * thigh + shank * shank - span_square) / (2.0 * thigh * shank)).acos();
    let corner = ((thigh * thigh + span_square - shank * shank) / (2.0 * thigh * span_square.sqrt())).acos();
    [hip, across.atan2(along) + corner, PI - interior]
}

fn apart(a: f64, b: f64) -> f64 {
    let apart = (a - b).abs();
    if apart > PI { TAU - apart } else { apart }
}

#[test]
fn every_contender_solves_every_target() {
    let mut found: HashMap<String, (f64, f64)> = HashMap::new();
    for shape in Shape::ALL {
        let all = contenders(shape);
        let feet = targets::feet(shape);
        for contender in &all {
            let worst = (0..targets::COUNT)
                .flat_map(|i| {
                    let (found, wanted) = (contender.joints(i), in_f64(shape, feet[i]));
                    [0, 1, 2].map(|joint| apart(found[joint], wanted[joint]))
                })
                // NaN is the worst there is.
                .fold(0.0, |worst: f64, off| if off.is_nan() { f64::INFINITY } else { worst.max(off) });
            println!("{}: {}: within {worst:.1e} rad", shape.name(), contender.name());
            let allowed = contender.accuracy();
            assert!(worst <= allowed, "{}: {}: {worst:e} rad off", shape.name(), contender.name());
            let entry = found.entry(contender.name().to_owned()).or_insert((0.0, allowed));
            entry.0 = entry.0.max(worst);
        }
    }
    for (name, (worst, allowed)) in found {
        assert!(worst > 0.2 * allowed, "{name}: {worst:e} is far below {allowed:e}");
    }
}

#[test]
fn targets_are_in_reach_and_differ() {
    for shape in Shape::ALL {
        let feet = targets::feet(shape);
        assert_eq!(feet.len(), targets::COUNT);
        let all = contenders(shape);
        let knees: Vec<f64> = (0..targets::COUNT).map(|i| all[0].joints(i)[2]).collect();
        assert!(knees.iter().all(|knee| (0.29..2.21).contains(knee)));
        assert!(knees.windows(2).all(|pair| pair[0] != pair[1]));
    }
}
