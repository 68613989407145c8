//! Two links in the plane of the leg.

use super::Plane;
use super::constants::Constants;
use crate::angle::Joints;
use crate::number::Number;

/// (thigh, knee) for a foot within reach.
#[inline(always)]
pub(super) fn angles<N: Number>(leg: &Constants<N>, plane: &Plane<N>) -> (N::Angle, N::Angle) {
    let knee = N::knee(plane.n, leg.fold_square - plane.n, leg.unit, leg.scale);
    // In the unit 4·L1·L2: P, q, and the norm 2·L1·G² of the thigh's vector, all from the nearer end of the reach.
    let end = if knee.folded { &leg.folded } else { &leg.straight };
    let p = end.lean + N::signed(knee.from_end, end.sign, !knee.folded);
    let norm = end.norm + N::stretch(end.swing, knee.from_end);
    let q = N::signed(knee.half_sine, leg.side, leg.bends_back);
    let thigh = N::thigh_angle(plane.along, plane.across, [p, q], norm);
    (thigh, N::knee_angle(knee.acute, end.knee, end.sign, knee.folded))
}

/// (across, along) of the foot in the plane of the leg.
pub(super) fn foot<N: Number>(leg: &Constants<N>, joints: &Joints<N>) -> (N::Coord, N::Coord) {
    let (thigh, knee) = (joints.thigh.0, joints.knee.0);
    let shank = if leg.bends_back { N::angle_sum(thigh, knee) } else { N::angle_difference(thigh, knee) };
    let ((thigh_sin, thigh_cos), (shank_sin, shank_cos)) = (N::sin_cos(thigh), N::sin_cos(shank));
    (
        N::narrow(N::stretch(leg.thigh, thigh_sin) + N::stretch(leg.shank, shank_sin)),
        N::narrow(N::stretch(leg.thigh, thigh_cos) + N::stretch(leg.shank, shank_cos)),
    )
}
