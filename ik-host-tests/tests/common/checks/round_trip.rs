//! What is asked for is what forward kinematics gives.

use super::ensure;
use crate::common::legs::reach;
use crate::common::sensitivity::{away_from_singular, span};
use crate::common::solver::Solver;
use ik_core::Outcome;
use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{Pose, Verdict, closed_form, transforms};

/// What was found at one target.
#[derive(Debug, Clone, Copy)]
pub struct Found {
    /// From the target to the solver's own forward kinematics of its answer, fraction of the reach; less a step of
    /// the number system's lengths and what a folded leg is granted (see `Bounds::growth`).
    pub own_foot: f64,
    /// From the target to the foot of the answer by the reference, fraction of the reach, likewise.
    pub foot: f64,
    /// The worst joint against the reference, rad, away from singular places.
    pub angle: Option<f64>,
}

/// The errors at a target that the leg can reach; `None` if rounding to the number system put it out of reach.
pub fn found(solver: &dyn Solver, target: [f64; 3]) -> Result<Option<Found>, String> {
    let target = solver.quantised(target);
    let leg = solver.leg();
    let reference = closed_form::solve(leg, target);
    if reference.verdict != Verdict::Reached {
        return Ok(None);
    }
    let told = solver.solve(target, Pose::default());
    ensure!(
        matches!(told.outcome, Outcome::Reached | Outcome::Moved),
        "{:?}: {leg}, {target:?} is within reach and free of ranges, yet {told:?}",
        solver.number()
    );
    let Pose { hip, thigh, knee } = told.pose;
    ensure!((hip + thigh + knee).is_finite(), "{:?}: {leg}, {target:?}: {told:?}", solver.number());
    let reach = reach(leg);
    let granted = reach * solver.number().bounds().growth(span(leg, target) / reach);
    let step = solver.number().step();
    let angle = away_from_singular(leg, target, &reference.pose)
        .then(|| told.pose.largest_difference(&reference.pose));
    Ok(Some(Found {
        own_foot: (distance(solver.forward(&told.pose), target) - step) / granted,
        foot: distance(transforms::foot(leg, &told.pose), target) / granted,
        angle,
    }))
}

/// That the errors at a target keep the number system's bounds.
pub fn check(solver: &dyn Solver, target: [f64; 3]) -> Result<(), String> {
    let bounds = solver.number().bounds();
    let Some(found) = found(solver, target)? else { return Ok(()) };
    let (number, leg) = (solver.number(), solver.leg());
    ensure!(found.own_foot <= bounds.own_foot, "{number:?}: {leg}, {target:?}: own foot off, {found:?}");
    ensure!(found.foot <= bounds.foot, "{number:?}: {leg}, {target:?}: foot off, {found:?}");
    ensure!(
        found.angle.unwrap_or(0.0) <= bounds.angle,
        "{number:?}: {leg}, {target:?}: angle off, {found:?}"
    );
    Ok(())
}
