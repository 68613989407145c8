//! A right leg is a left leg mirrored.

use super::ensure;
use crate::common::solver::Solver;
use ik_core::Side;
use ik_host_tests::reference::Pose;

fn mirrored([x, y, z]: [f64; 3]) -> [f64; 3] {
    [x, -y, z]
}

/// Mirrored feet of mirrored legs come to identical joints, and identical joints to mirrored feet; `at` is the
/// left leg's place on the body and `foot` its foot, in the body's frame.
pub fn check(solver: &dyn Solver, at: [f64; 3], foot: [f64; 3]) -> Result<(), String> {
    let (at, foot) = (solver.quantised(at), solver.quantised(foot));
    let left = solver.seen_from_body(at, Side::Left, foot);
    let right = solver.seen_from_body(mirrored(at), Side::Right, mirrored(foot));
    let case = format!("{:?}: {}, at {at:?}, foot {foot:?}", solver.number(), solver.leg());
    ensure!(left == right, "{case}: left {left:?}, right {right:?}");
    // Outboard is +y for a left leg: what the leg sees is plain subtraction there.
    let expected = solver.quantised([foot[0] - at[0], foot[1] - at[1], foot[2] - at[2]]);
    ensure!(left == expected, "{case}: {left:?}, not {expected:?}");
    let (of_left, of_right) = (solver.solve(left, Pose::default()), solver.solve(right, Pose::default()));
    ensure!(of_left == of_right, "{case}: left {of_left:?}, right {of_right:?}");
    let reached = solver.forward(&of_left.pose);
    let left = solver.seen_by_body(at, Side::Left, reached);
    let right = solver.seen_by_body(mirrored(at), Side::Right, reached);
    ensure!(mirrored(left) == right, "{case}: foot back at left {left:?}, right {right:?}");
    let expected = solver.quantised([reached[0] + at[0], reached[1] + at[1], reached[2] + at[2]]);
    ensure!(left == expected, "{case}: foot back at {left:?}, not {expected:?}");
    Ok(())
}
