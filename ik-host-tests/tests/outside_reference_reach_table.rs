//! The closest reachable point against a table worked out apart from this code.
//!
//! Source: the reach set of a roll-hip leg, (L1 − L2)² + a² ≤ |p|² ≤ (L1 + L2)² + a² with
//! y² + z² ≥ a², and its nearest points, worked out in the project's preparation by plain geometry
//! and checked there by Monte Carlo. No publication; common practice, no source. Offset 31.5 mm,
//! links 94 and 107 mm; nine decimals.

use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{Bend, Leg, Shape, Verdict, closest, multiprecision};

const LEG: Leg = Leg { shape: Shape::Roll, offset: 31.5, thigh: 94.0, shank: 107.0, bend: Bend::Forward };

/// Target, nearest point, distance; millimetres.
const TABLE: [([f64; 3], [f64; 3], f64); 5] = [
    ([0.0, 31.5, -250.0], [0.0, 25.434_017_058, -201.857_278_235], 48.523_373_832),
    ([300.0, 40.0, -10.0], [201.0, 30.559_488_755, -7.639_872_189], 99.477_100_158),
    ([50.0, 10.0, -10.0], [50.0, 22.273_863_607, -22.273_863_607], 17.357_864_376),
    ([5.0, 2.0, -3.0], [13.0, 17.473_056_181, -26.209_584_272], 29.018_963_966),
    ([120.0, 60.0, -210.0], [97.971_601_919, 48.985_800_960, -171.450_303_359], 45.745_404_290),
];

/// Half a unit of the table's last decimal in each coordinate.
const ROUNDING: f64 = 0.9e-9;

#[test]
fn targets_out_of_reach_go_to_the_tabulated_nearest_point() {
    for (target, nearest, away) in TABLE {
        let (point, moved_by, verdict) = closest(&LEG, target);
        assert_eq!(verdict, Verdict::Moved);
        assert!(distance(point, nearest) <= ROUNDING, "{target:?}: {point:?}");
        assert!((moved_by - away).abs() <= ROUNDING, "{target:?}: {moved_by}");

        let found = multiprecision::solve(&LEG, target).unwrap();
        let point = found.reached_foot.map(|c| multiprecision::to_f64(&c));
        assert_eq!(found.verdict, Verdict::Moved);
        assert!(distance(point, nearest) <= ROUNDING, "{target:?}: {point:?}");
        let moved_by = multiprecision::to_f64(&found.moved_by);
        assert!((moved_by - away).abs() <= ROUNDING, "{target:?}: {moved_by}");
    }
}
