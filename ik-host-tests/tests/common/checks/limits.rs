//! Joint ranges are never exceeded, and the answer says which one held.

use super::ensure;
use crate::common::legs::reach;
use crate::common::sensitivity::span;
use crate::common::solver::Solver;
use ik_core::{End, Outcome};
use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{Pose, Range, transforms};

/// `limited` is `free` with ranges: the same joints where they lie within, the end of the range where they lie
/// beyond; `Held` exactly then, with the right joint and end; and the distance that is really left.
pub fn check(limited: &dyn Solver, free: &dyn Solver, foot: [f64; 3]) -> Result<(), String> {
    let foot = limited.quantised(foot);
    let (told, wanted) = (limited.solve(foot, Pose::default()), free.solve(foot, Pose::default()));
    let case = format!("{:?}: {}, foot {foot:?}, told {told:?}", limited.number(), limited.leg());
    let ranges = limited.ranges();
    let (hip, hip_held) = held(wanted.pose.hip, ranges.hip);
    let (thigh, thigh_held) = held(wanted.pose.thigh, ranges.thigh);
    let (knee, knee_held) = held(wanted.pose.knee, ranges.knee);
    ensure!(told.pose == (Pose { hip, thigh, knee }), "{case}: from {wanted:?} within {ranges:?}");
    let expected = [hip_held, thigh_held, knee_held];
    match told.outcome {
        Outcome::Held(held) => {
            ensure!(held.any(), "{case}: held, but by nothing");
            ensure!(held.as_array() == expected, "{case}: should be held {expected:?}");
        }
        other => {
            ensure!(expected == [None; 3], "{case}: should be held {expected:?}");
            ensure!(other == wanted.outcome, "{case}: {:?} when free", wanted.outcome);
        }
    }
    let bounds = limited.number().bounds();
    let left = distance(foot, transforms::foot(limited.leg(), &told.pose)).min(limited.number().farthest());
    // Of a leg that was reached and not held, the foot; else the distance to where forward kinematics puts it,
    // to which the number system may add two steps of rounding.
    let reach = reach(limited.leg());
    let growth = bounds.growth(span(limited.leg(), foot) / reach);
    let allowed = bounds.foot * growth * reach + bounds.distance * left + 2.0 * limited.number().step();
    if told.outcome == Outcome::Reached {
        ensure!(told.off_by == 0.0 && left <= allowed, "{case}: reached, but {left} mm off");
    } else {
        ensure!((told.off_by - left).abs() <= allowed, "{case}: {left} mm off");
    }
    Ok(())
}

fn held(angle: f64, range: Range) -> (f64, Option<End>) {
    if angle < range.min {
        (range.min, Some(End::Least))
    } else if angle > range.max {
        (range.max, Some(End::Most))
    } else {
        (angle, None)
    }
}
