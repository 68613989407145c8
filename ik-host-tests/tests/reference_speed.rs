//! How long the references take. A measurement, not a promise: run it with
//! `cargo test --release -p ik-host-tests --test reference_speed -- --ignored --nocapture`.

use std::hint::black_box;
use std::time::Instant;

use ik_host_tests::reference::{Bend, Leg, Shape, agreement, foot, solve, spread};

#[test]
#[ignore = "a measurement; asks for a release build"]
fn time_per_target() {
    for (shape, bend) in [(Shape::Roll, Bend::Backward), (Shape::Yaw, Bend::Up)] {
        let leg = Leg { shape, offset: 31.5, thigh: 94.0, shank: 107.0, bend };
        let targets = spread(&leg, 200_000);
        let started = Instant::now();
        let poses: Vec<_> = targets.iter().map(|&t| solve(&leg, t).pose).collect();
        let inverse = started.elapsed();

        let started = Instant::now();
        for _ in 0..10 {
            for pose in &poses {
                black_box(foot(&leg, black_box(pose)));
            }
        }
        let forward = started.elapsed() / 10;

        let few = &targets[..400];
        let started = Instant::now();
        agreement(&leg, few).unwrap();
        let three = started.elapsed();

        let each = |time: std::time::Duration, count: usize| time.as_secs_f64() * 1e9 / count as f64;
        println!(
            "{leg}: forward {:.0} ns, inverse {:.0} ns, agreement of the three {:.0} ns a target",
            each(forward, poses.len()),
            each(inverse, targets.len()),
            each(three, few.len())
        );
    }
}
