//! Joint ranges are never exceeded, and the answer says which one held.

use super::ensure;
use crate::common::legs::reach;
use crate::common::sensitivity::span;
use crate::common::solver::Solver;
use ik_core::{End, Outcome};
use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{Pose, Range, transforms};

/// `limited` is `by_knee` with ranges of hip and thigh besides, and `by_knee` keeps what `reach::check` asks of it:
/// its knee, and its hip and thigh where they lie within, the end of the range where they lie beyond; `Held` exactly
/// then, with the right joint and end; and the distance that is really left.
pub fn check(limited: &dyn Solver, by_knee: &dyn Solver, foot: [f64; 3]) -> Result<(), String> {
    super::reach::check(by_knee, foot)?;
    let foot = limited.quantised(foot);
    let (told, wanted) = (limited.solve(foot, Pose::default()), by_knee.solve(foot, Pose::default()));
    let case = format!("{:?}: {}, foot {foot:?}, told {told:?}", limited.number(), limited.leg());
    let ranges = limited.ranges();
    let (hip, hip_held) = held(wanted.pose.hip, ranges.hip);
    let (thigh, thigh_held) = held(wanted.pose.thigh, ranges.thigh);
    // A foot within the knee's reach leaves the knee within its range, to the last bit.
    let (knee, _) = held(wanted.pose.knee, ranges.knee);
    let knee_held = if let Outcome::Held(held) = wanted.outcome { held.knee } else { None };
    ensure!(told.pose == (Pose { hip, thigh, knee }), "{case}: from {wanted:?} within {ranges:?}");
    match knee_held {
        Some(End::Least) => ensure!(knee == ranges.knee.min, "{case}: the knee is not at its least"),
        Some(End::Most) => ensure!(knee == ranges.knee.max, "{case}: the knee is not at its most"),
        None => {}
    }
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
