//! A foot out of reach goes to the closest point of the reachable set, which the knee's range may narrow.

use super::ensure;
use crate::common::knee_reach::{Closest, closest};
use crate::common::legs::reach;
use crate::common::solver::Solver;
use ik_core::{End, Held, Outcome};
use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{Pose, Verdict, transforms};

/// That the foot asked for is reached, or moved to the closest point that links and knee allow; and that the answer
/// says which, by how much, and whether it was the knee's range that ended the reach. Hip and thigh must be free.
pub fn check(solver: &dyn Solver, target: [f64; 3]) -> Result<(), String> {
    let target = solver.quantised(target);
    let (leg, knee_range) = (solver.leg(), solver.ranges().knee);
    let bounds = solver.number().bounds();
    let told = solver.solve(target, Pose::default());
    let closest = closest(leg, knee_range, target);
    let case =
        format!("{:?}: {leg}, knee {knee_range:?}, {target:?}: {told:?}, {closest:?}", solver.number());

    let rounding =
        if told.outcome == Outcome::Reached { bounds.foot * reach(leg) } else { bounds.moved * leg.size() }
            * bounds.growth(closest.span / reach(leg));
    let steps = 2.0 * solver.number().step();
    let left = distance(target, transforms::foot(leg, &told.pose));
    let excess = (left - closest.far).abs() - 4.0 * f64::EPSILON * closest.far;
    ensure!(excess <= rounding, "{case}: {excess:e} mm farther than the closest point, {rounding:e} allowed");

    let knee = match told.outcome {
        Outcome::Reached | Outcome::Moved => None,
        Outcome::Held(Held { hip: None, thigh: None, knee: Some(end) }) => Some(end),
        _ => return Err(format!("{case}: held, but not by the knee")),
    };
    // On the edge of the reachable set, rounding may decide either way.
    let on_the_edge = closest.far <= rounding && told.off_by <= 2.0 * rounding + steps;
    let reached = told.outcome == Outcome::Reached;
    ensure!(reached == (closest.verdict == Verdict::Reached) || on_the_edge, "{case}: in reach or not?");
    check_end(solver, &closest, knee, !on_the_edge && !reached).map_err(|what| format!("{case}: {what}"))?;

    let far = closest.far.min(solver.number().farthest());
    let allowed = rounding + steps + bounds.distance * far;
    ensure!((told.off_by - far).abs() <= allowed, "{case}: a wrong distance");
    Ok(())
}

/// That the knee is said to be held at the end where the closest point lies, if its range is what ends the reach
/// there; `moved` if the foot lies clearly out of reach.
fn check_end(solver: &dyn Solver, closest: &Closest, said: Option<End>, moved: bool) -> Result<(), String> {
    let range = solver.ranges().knee;
    // Single precision's half turn lies a hair above π.
    let stops = |end| match end {
        End::Least => range.min > 0.0,
        End::Most => range.max.to_degrees() < 179.9999,
    };
    // Spans, unlike feet, are uncertain by the root of rounding where the line to the foot stands across.
    let slack = 1e-3 * reach(solver.leg());
    if let Some(end) = said {
        ensure!(stops(end), "held at {end:?}, where the links end the reach");
        ensure!(closest.at(end, slack), "held at {end:?}, where the closest point is not");
    } else if moved {
        for end in [End::Least, End::Most] {
            // Only what lies at an end, and clearly not at the other one too, must be said.
            let clear = closest.ends[1] - closest.ends[0] > 2.0 * slack;
            let surely = closest.at(end, 0.0) && clear;
            ensure!(!(surely && stops(end)), "held at {end:?}, but not said");
        }
    }
    Ok(())
}
