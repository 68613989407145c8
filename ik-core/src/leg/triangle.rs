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
    let swing = N::stretch(leg.twice_thigh, knee.from_end);
    let (p, norm) = if knee.folded {
        (leg.folded.lean + knee.from_end, leg.folded.norm + swing)
    } else {
        (leg.straight.lean - knee.from_end, leg.straight.norm - swing)
    };
    let q = if leg.bends_back { -knee.half_sine } else { knee.half_sine };
    let thigh = N::thigh_angle(plane.along, plane.across, [p, q], norm);
    (thigh, knee.angle)
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
