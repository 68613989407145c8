//! ik-core's closest points against a table checked outside the project, in every number system.
//!
//! Source: the reach set of a roll-hip leg, (L1−L2)² + a² ≤ |p|² ≤ (L1+L2)² + a² with y² + z² ≥ a², and five closest
//! points worked out by hand from it and checked by Monte Carlo, for a = 31.5, links 94 and 107.

mod common;

use common::checks::reach;
use common::legs::ORCHARD;
use common::solver::{NumberSystem, core};
use ik_core::Outcome;
use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{Pose, transforms};

/// Target, closest point, distance: mm.
const TABLE: [([f64; 3], [f64; 3], f64); 5] = [
    ([0.0, 31.5, -250.0], [0.0, 25.434017058, -201.857278235], 48.523373832),
    ([300.0, 40.0, -10.0], [201.0, 30.559488755, -7.639872189], 99.477100158),
    ([50.0, 10.0, -10.0], [50.0, 22.273863607, -22.273863607], 17.357864376),
    ([5.0, 2.0, -3.0], [13.0, 17.473056181, -26.209584272], 29.018963966),
    ([120.0, 60.0, -210.0], [97.971601919, 48.985800960, -171.450303359], 45.745404290),
];

#[test]
fn every_closest_point_of_the_table_is_found() {
    let reach_mm = ORCHARD.thigh + ORCHARD.shank;
    for number in NumberSystem::ALL {
        let solver = core(number, &ORCHARD, None).expect("a leg");
        let bounds = number.bounds();
        for (target, closest, far) in TABLE {
            let told = solver.solve(target, Pose::default());
            let case = format!("{number:?}: {target:?}: {told:?}");
            assert_eq!(told.outcome, Outcome::Moved, "{case}");
            // The table has nine decimals. On the cylinder D = 0, where joints go with the root of rounding, it is
            // the foot that counts: seen from without, then by the solver's own forward kinematics.
            let allowed = bounds.foot * reach_mm + 1e-9;
            let foot = transforms::foot(&ORCHARD, &told.pose);
            assert!(distance(foot, closest) <= allowed, "{case}: {foot:?}, not {closest:?}");
            let own = solver.forward(&told.pose);
            let allowed = bounds.own_foot * reach_mm + number.step() + 1e-9;
            assert!(distance(own, closest) <= allowed, "{case}: {own:?}, not {closest:?}");
            let allowed = allowed + bounds.distance * far + number.step();
            assert!((told.off_by - far).abs() <= allowed, "{case}: off by {far}");
            assert_eq!(reach::check(&*solver, target), Ok(()));
        }
    }
}
