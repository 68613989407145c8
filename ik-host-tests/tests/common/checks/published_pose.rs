//! A pose that was published is found from its foot, and the foot from the pose.

use super::ensure;
use crate::common::legs::reach;
use crate::common::sensitivity::{away_from_singular, joints_per_mm, span};
use crate::common::solver::Solver;
use ik_core::Outcome;
use ik_host_tests::reference::Pose;
use ik_host_tests::reference::leg::distance;

/// A foot and its joint angles, from outside.
#[derive(Debug, Clone)]
pub struct Published {
    pub name: String,
    pub foot: [f64; 3],
    pub pose: Pose,
    /// To how many radians and mm the source gives it, besides what rounding of its decimals does.
    pub given_to: f64,
}

/// The solver has no part in the allowance: it is the number system's angle bound, what the source leaves open,
/// and what rounding the foot to the number system moves each joint by.
pub fn check(solver: &dyn Solver, published: &Published) -> Result<(), String> {
    let Published { name, foot, pose, given_to } = published;
    let bounds = solver.number().bounds();
    let target = solver.quantised(*foot);
    let told = solver.solve(*foot, Pose::default());
    let case = format!("{name}: {:?}: {}, {foot:?}: {told:?}", solver.number(), solver.leg());
    ensure!(told.outcome == Outcome::Reached, "{case}: not reached");
    let per_mm = joints_per_mm(solver.leg(), *foot);
    let regular = away_from_singular(solver.leg(), *foot, pose);
    let reach = reach(solver.leg());
    let foot_bound = bounds.foot * reach * bounds.growth(span(solver.leg(), *foot) / reach);
    let rounded_by = distance(target, *foot) + given_to;
    for (joint, got, wanted, per_mm) in [
        ("hip", told.pose.hip, pose.hip, per_mm.hip),
        ("thigh", told.pose.thigh, pose.thigh, per_mm.thigh),
        ("knee", told.pose.knee, pose.knee, per_mm.knee),
    ] {
        let allowed = bounds.angle + 1.1 * rounded_by * per_mm + given_to;
        // A joint near a singular place may move as far as the foot's bound lets it.
        let allowed = if regular { allowed } else { allowed + foot_bound * per_mm };
        let off = (got - wanted).abs();
        ensure!(off <= allowed, "{case}: {joint} {off:e} rad off, allowed {allowed:e}");
    }
    let forward = solver.forward(pose);
    let allowed = bounds.own_foot * reach + solver.number().step() + given_to * (1.0 + reach);
    let off = distance(forward, *foot);
    ensure!(off <= allowed, "{case}: forward {forward:?}, {off:e} mm off");
    Ok(())
}
