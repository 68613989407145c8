//! Every input has an answer.

use super::ensure;
use crate::common::solver::Solver;
use ik_core::Outcome;
use ik_host_tests::reference::{Pose, Ranges, clamp};

fn within(pose: &Pose, ranges: &Ranges) -> bool {
    // NaN is in no range.
    (ranges.hip.min..=ranges.hip.max).contains(&pose.hip)
        && (ranges.thigh.min..=ranges.thigh.max).contains(&pose.thigh)
        && (ranges.knee.min..=ranges.knee.max).contains(&pose.knee)
}

/// That any foot whatever, in any bit pattern, has an answer: finite angles within the ranges, a distance that is
/// not negative, and for a foot that is not finite the pose that was to be held.
pub fn check(solver: &dyn Solver, foot: [f64; 3], hold: Pose) -> Result<(), String> {
    let told = solver.solve(foot, hold);
    let case = format!("{:?}: {}, foot {foot:?}, told {told:?}", solver.number(), solver.leg());
    ensure!(within(&told.pose, &solver.ranges()), "{case}: beyond the ranges");
    ensure!(told.off_by >= 0.0 && told.off_by <= solver.number().farthest(), "{case}: no distance");
    let finite = foot.iter().all(|v| v.is_finite());
    ensure!((told.outcome == Outcome::NotFinite) != finite, "{case}: finite or not?");
    if !finite {
        let kept = clamp(&solver.quantised_pose(&hold), &solver.ranges()).0;
        // To the last bit of single precision and fixed point; `f64` loses one on the way through turns.
        ensure!(told.pose.largest_difference(&kept) <= 1e-15, "{case}: did not keep {kept:?}");
        ensure!(told.off_by == solver.number().farthest(), "{case}: a distance from nowhere");
    }
    if told.outcome == Outcome::Reached {
        ensure!(told.off_by == 0.0, "{case}: reached, and yet off");
    }
    check_forward(solver, &told.pose)
}

/// That any pose has a finite foot, no farther from the hip than the leg is long.
pub fn check_forward(solver: &dyn Solver, pose: &Pose) -> Result<(), String> {
    let foot = solver.forward(pose);
    let [x, y, z] = foot;
    let far = x.hypot(y).hypot(z);
    let size = solver.leg().size();
    let most = size * (1.0 + solver.number().bounds().own_foot) + solver.number().step();
    ensure!(far <= most, "{:?}: {}, {pose:?}: foot {foot:?}", solver.number(), solver.leg());
    Ok(())
}
