//! ik-core's knee against triangles from outside the project, in every number system that can hold them.
//!
//! A leg without an offset and its foot straight below the hip is a triangle: with thigh a, shank b and the foot at
//! distance c, the angle C between a and b is π less the knee's flexion.
//!
//! Sources: `check-values/integer-triangles.csv`, exact arithmetic; `check-values/needle-triangles.csv`, the table of
//! Kahan, "Miscalculating Area and Angles of a Needle-like Triangle" (1999), recomputed to 20 digits.

mod common;

use common::published::Table;
use common::solver::{NumberSystem, Solver, core};
use ik_core::{GeometryError, Outcome};
use ik_host_tests::reference::{Bend, Leg, Pose, Shape};
use std::f64::consts::PI;

fn leg_of([a, b]: [f64; 2], shape: Shape, bend: Bend) -> Leg {
    Leg { shape, offset: 0.0, thigh: a, shank: b, bend }
}

/// Both hips, both bends, with the foot at a distance straight below (roll) or straight outboard (yaw).
const WAYS: [(Shape, Bend, [f64; 3]); 4] = [
    (Shape::Roll, Bend::Forward, [0.0, 0.0, -1.0]),
    (Shape::Roll, Bend::Backward, [0.0, 0.0, -1.0]),
    (Shape::Yaw, Bend::Up, [0.0, 1.0, 0.0]),
    (Shape::Yaw, Bend::Down, [0.0, 1.0, 0.0]),
];

fn told(solver: &dyn Solver, way: [f64; 3], c: f64) -> (Outcome, f64) {
    let told = solver.solve(way.map(|v| v * c), Pose::default());
    (told.outcome, told.pose.knee)
}

#[test]
fn integer_triangles_have_their_knees() {
    let table = Table::read("integer-triangles.csv");
    assert_eq!(table.rows().count(), 21, "rows of integer-triangles.csv");
    for row in table.rows() {
        let [a, b, c] = ["a", "b", "c"].map(|side| row.number(side));
        let knee = PI - row.number("C_rad");
        for (shape, bend, way) in WAYS {
            for number in NumberSystem::ALL {
                let case = format!("{number:?}: {shape:?} {bend:?}: {a}, {b}, {c}");
                let solver = core(number, &leg_of([a, b], shape, bend), None);
                if a.max(b) > 8.0 * a.min(b) {
                    assert_eq!(solver.err(), Some(GeometryError::LinksOutOfProportion), "{case}");
                    continue;
                }
                let (outcome, found) = told(&*solver.expect("a leg"), way, c);
                assert_eq!(outcome, Outcome::Reached, "{case}");
                let off = (found - knee).abs();
                assert!(off <= number.bounds().angle, "{case}: knee {found}, not {knee}");
            }
        }
    }
}

/// Kahan's needles, their sides shrunk by a power of two until the leg is not too long; a side that the number
/// system rounds moves the angle C by no more than the law of sines allows.
#[test]
fn needle_triangles_have_their_knees() {
    let table = Table::read("needle-triangles.csv");
    assert_eq!(table.rows().count(), 12, "rows of needle-triangles.csv");
    let mut seen = [0; 4];
    for row in table.rows() {
        let [a, b, c] = ["a", "b", "c"].map(|side| row.number(side));
        let status = row.text("status");
        for (shape, bend, way) in WAYS {
            for number in NumberSystem::ALL {
                let case = format!("{number:?}: row {}: {a}, {b}, {c}", row.text("no"));
                let mut shrink = 1.0;
                while (a + b) / shrink > number.longest() {
                    shrink *= 2.0;
                }
                let [a, b, c] = [a, b, c].map(|side| side / shrink);
                let solver = core(number, &leg_of([a, b], shape, bend), None);
                if a <= 0.0 {
                    assert_eq!(solver.err(), Some(GeometryError::ThighNotPositive), "{case}");
                    seen[0] += 1;
                    continue;
                }
                if a.max(b) > 8.0 * a.min(b) {
                    assert_eq!(solver.err(), Some(GeometryError::LinksOutOfProportion), "{case}");
                    seen[1] += 1;
                    continue;
                }
                let solver = solver.expect("a leg");
                let (outcome, found) = told(&*solver, way, c);
                let knee = match status {
                    "ok" => PI - row.number("angleC_rad"),
                    // A foot farther than both links, or just as far: straight.
                    "not a triangle" | "degenerate" => 0.0,
                    other => panic!("{other} is no status"),
                };
                seen[2] += 1;
                // Decimals are not binary: what rounding sides does to a knee near straight goes with its root.
                let [x, y, z] = solver.quantised(way.map(|v| v * c));
                let rounded_by = (x.hypot(y).hypot(z) - c).abs() + 2e-16 * (a + b);
                let by_rounding =
                    (rounded_by / a.min(b)).sqrt().min(rounded_by / (a.min(b) * knee.sin().abs()));
                let near_an_end = !(0.1..=2.6).contains(&knee);
                let bound = if near_an_end { number.bounds().straight } else { number.bounds().angle };
                let allowed = bound + 2.0 * by_rounding;
                let off = (found - knee).abs();
                assert!(
                    off <= allowed,
                    "{case}: {outcome:?}, knee {found}, not {knee}: {off:e} of {allowed:e}"
                );
                if status == "ok" && allowed < 1e-4 && number != NumberSystem::Coarse {
                    seen[3] += 1;
                }
            }
        }
    }
    // Row 2; rows 6, 9, 11 and 12; all others; and most of those to better than 1e-4 rad.
    assert_eq!(seen[..3], [4, 16, 28].map(|rows| rows * NumberSystem::ALL.len()));
    assert!(seen[3] >= 40, "{seen:?}");
}
