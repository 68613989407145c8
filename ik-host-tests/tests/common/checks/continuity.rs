//! Away from singular places joints do not jump.

use super::ensure;
use crate::common::sensitivity::{away_from_singular, joints_per_mm};
use crate::common::solver::Solver;
use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{Pose, Verdict, closed_form};
use std::f64::consts::{PI, TAU};

/// From `start` to `end` in so many steps: at each one that lies away from singular places, no joint moves by
/// more than the gradient there allows, with a quarter to spare for its change within the step, and rounding.
/// Tells how many steps were looked at.
pub fn check(solver: &dyn Solver, start: [f64; 3], end: [f64; 3], steps: usize) -> Result<usize, String> {
    let leg = solver.leg();
    // Twice the angle's bound: both ends of a step are rounded.
    let rounding = 2.0 * solver.number().bounds().angle;
    let mut looked_at = 0;
    let mut last: Option<([f64; 3], Pose)> = None;
    for step in 0..=steps {
        let part = step as f64 / steps as f64;
        let target = solver.quantised([0, 1, 2].map(|i| start[i] + (end[i] - start[i]) * part));
        let reference = closed_form::solve(leg, target);
        if reference.verdict != Verdict::Reached || !away_from_singular(leg, target, &reference.pose) {
            last = None;
            continue;
        }
        let pose = solver.solve(target, Pose::default()).pose;
        if let Some((before, pose_before)) = last {
            let (here, there) = (joints_per_mm(leg, before), joints_per_mm(leg, target));
            let far = 1.25 * distance(before, target);
            for (joint, moved, per_mm) in [
                ("hip", around(pose.hip - pose_before.hip), here.hip.max(there.hip)),
                ("thigh", around(pose.thigh - pose_before.thigh), here.thigh.max(there.thigh)),
                ("knee", (pose.knee - pose_before.knee).abs(), here.knee.max(there.knee)),
            ] {
                let most = far * per_mm + rounding;
                ensure!(
                    moved <= most,
                    "{:?}: {leg}, {before:?} to {target:?}: {joint} jumps by {moved} rad, at most {most}",
                    solver.number()
                );
            }
            looked_at += 1;
        }
        last = Some((target, pose));
    }
    Ok(looked_at)
}

/// The size of an angle's change around the circle.
fn around(change: f64) -> f64 {
    let change = change.abs();
    if change > PI { TAU - change } else { change }
}
