//! Two links in the plane of the leg.

use super::Plane;
use super::constants::Constants;
use crate::angle::Joints;
use crate::number::Number;

/// (thigh, knee) for a foot within reach.
#[inline(always)]
pub(super) fn angles<N: Number>(leg: &Constants<N>, plane: &Plane<N>) -> (N::Angle, N::Angle) {
    let knee = N::knee(plane.n, leg.fold_square - plane.n, leg.unit, leg.scale);
    // The foot of a thigh that hangs straight down, from the nearer end of the reach; the thigh turns it to where it is.
    let end = if knee.folded { &leg.folded } else { &leg.straight };
    let along = end.along + N::stretch(end.swing, knee.from_end);
    let across = N::stretch(leg.sway, knee.half_sine);
    let thigh = N::turn([along, across], [plane.along, plane.across]);
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
