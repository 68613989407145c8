//! A foot out of reach goes to the closest point of the reachable set.

use super::ensure;
use crate::common::legs::reach;
use crate::common::sensitivity::span;
use crate::common::solver::Solver;
use ik_core::Outcome;
use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{Pose, Verdict, closed_form, transforms};

/// How far beyond the least possible distance the foot was left: fraction of the reach, less what `f64` itself
/// rounds of a far distance and what a folded leg is granted (see `Bounds::growth`).
pub fn excess(solver: &dyn Solver, target: [f64; 3]) -> f64 {
    let target = solver.quantised(target);
    let leg = solver.leg();
    let (closest, least, _) = closed_form::closest(leg, target);
    let told = solver.solve(target, Pose::default());
    let left = distance(target, transforms::foot(leg, &told.pose));
    let reach = reach(leg);
    let granted = reach * solver.number().bounds().growth(span(leg, closest) / reach);
    ((left - least).abs() - 4.0 * f64::EPSILON * least) / granted
}

/// That the foot asked for is reached or moved as it should be, to the closest point, and by how much is said.
pub fn check(solver: &dyn Solver, target: [f64; 3]) -> Result<(), String> {
    let excess = excess(solver, target);
    let target = solver.quantised(target);
    let leg = solver.leg();
    let bounds = solver.number().bounds();
    let told = solver.solve(target, Pose::default());
    let (closest, least, verdict) = closed_form::closest(leg, target);
    let case = format!("{:?}: {leg}, {target:?}: {told:?}, closest {least} mm", solver.number());
    ensure!(excess <= bounds.foot, "{case}: {excess:e} of the reach farther");
    // On the edge of the reachable set, rounding may decide either way.
    let rounding = bounds.foot * reach(leg) * bounds.growth(span(leg, closest) / reach(leg));
    let steps = 2.0 * solver.number().step();
    let on_the_edge = least <= rounding && told.off_by <= 2.0 * rounding + steps;
    match (verdict, told.outcome) {
        (Verdict::Reached, Outcome::Reached) | (Verdict::Moved, Outcome::Moved) => {}
        _ => ensure!(on_the_edge, "{case}: {verdict:?} by the reference"),
    }
    let least = least.min(solver.number().farthest());
    let allowed = rounding + steps + bounds.distance * least;
    ensure!((told.off_by - least).abs() <= allowed, "{case}: a wrong distance");
    Ok(())
}
