//! The hip that rolls about x and carries a sideways offset a.
//!
//! ```text
//! D   = √(y² + z² − a²)
//! hip = angle of (y·a − z·D, z·a + y·D)                 norm y² + z²
//! ```
//!
//! With O and I the lengths of the line from thigh joint to foot with the knee at its least and at its most (L1 + L2
//! and |L1 − L2| if it is free), the reachable set is I² + a² ≤ x² + y² + z² ≤ O² + a² with y² + z² ≥ a². Its point closest to a
//! foot outside: the foot scaled onto the nearer sphere, if that keeps y² + z² ≥ a²; else y and z scaled onto
//! the cylinder y² + z² = a², with |x| held within [I, O].

use super::constants::Constants;
use super::sealed::{Beyond, Stage};
use super::{Hip, Plane, triangle};
use crate::angle::{Angle, Joints};
use crate::geometry::RollHip;
use crate::limits::End;
use crate::number::Number;

impl Hip for RollHip {
    const NAME: &'static str = "roll-hip";
}

impl Stage for RollHip {
    #[inline(always)]
    fn plane<N: Number>(leg: &Constants<N>, [x, y, z]: [N::Coord; 3]) -> Result<Plane<N>, Beyond> {
        let axle_square = N::square(y, leg.scale) + N::square(z, leg.scale);
        let depth_square = axle_square - leg.offset_square;
        let n = || leg.outer_square - (axle_square + N::square(x, leg.scale));
        if depth_square < N::NO_SQUARE {
            return Err(beyond_a_sphere(leg, n()).unwrap_or(Beyond::Cylinder));
        }
        let n = n();
        match beyond_a_sphere(leg, n) {
            Some(beyond) => Err(beyond),
            None => Ok(at_depth(leg, [x, y, z], depth_square, n)),
        }
    }

    #[cold]
    fn closest<N: Number>(
        leg: &Constants<N>,
        foot: [N::Coord; 3],
        beyond: Beyond,
        _: u32,
    ) -> (Plane<N>, Option<End>) {
        let on_a_sphere = match beyond {
            Beyond::Outer => {
                scaled(leg, foot, leg.outer_radius, leg.straightest).map(|plane| (plane, End::Least))
            }
            Beyond::Inner => {
                scaled(leg, foot, leg.inner_radius, leg.most_folded).map(|plane| (plane, End::Most))
            }
            Beyond::Cylinder => None,
        };
        match on_a_sphere {
            Some((plane, end)) => (plane, Some(end)),
            None => on_the_cylinder(leg, foot, beyond),
        }
    }

    fn foot<N: Number>(leg: &Constants<N>, joints: &Joints<N>) -> [N::Coord; 3] {
        let (x, depth) = triangle::foot(leg, joints);
        let (sin, cos) = N::sin_cos(joints.hip.0);
        [
            x,
            N::narrow(N::stretch(leg.offset, cos) + N::stretch(depth, sin)),
            N::narrow(N::stretch(leg.offset, sin) - N::stretch(depth, cos)),
        ]
    }
}

/// Which sphere around the origin a foot lies beyond, if any: the reach ends there.
#[inline(always)]
fn beyond_a_sphere<N: Number>(leg: &Constants<N>, n: N::Square) -> Option<Beyond> {
    if n < leg.straightest {
        Some(Beyond::Outer)
    } else if n > leg.most_folded {
        Some(Beyond::Inner)
    } else {
        None
    }
}

/// The plane through a foot that lies at √`depth_square` below the hip.
#[inline(always)]
fn at_depth<N: Number>(
    leg: &Constants<N>,
    [x, y, z]: [N::Coord; 3],
    depth_square: N::Square,
    n: N::Square,
) -> Plane<N> {
    let depth = N::depth([y, z], leg.offset, depth_square, leg.scale);
    let hip = N::hip_angle([y, z], leg.offset, depth);
    Plane { hip: Angle(hip), across: x, along: depth, n }
}

/// The foot scaled onto a sphere around the origin, if that keeps it clear of the cylinder.
fn scaled<N: Number>(
    leg: &Constants<N>,
    foot: [N::Coord; 3],
    radius: N::Coord,
    n: N::Square,
) -> Option<Plane<N>> {
    let [x, y, z] = N::enlarged(foot);
    let square = N::square(x, leg.scale) + N::square(y, leg.scale) + N::square(z, leg.scale);
    let norm = N::root(square, leg.scale);
    if !(norm > N::NO_COORD) {
        // At the very origin: without an offset every direction is as near, and down is where feet go.
        let down = Plane { hip: Angle::ZERO, across: N::NO_COORD, along: radius, n };
        return if leg.offset_square > N::NO_SQUARE { None } else { Some(down) };
    }
    let [x, y, z] = [x, y, z].map(|v| N::rescale(v, radius, norm));
    let (across_square, axle_square) =
        (N::square(x, leg.scale), N::square(y, leg.scale) + N::square(z, leg.scale));
    // The sphere's own square is known exactly: D² comes of whichever was rounded by less, because near the cylinder
    // rounding is seen in its root.
    let axle_square =
        if across_square < axle_square { leg.outer_square - n - across_square } else { axle_square };
    let depth_square = axle_square - leg.offset_square;
    if depth_square < N::NO_SQUARE {
        return None;
    }
    Some(at_depth(leg, [x, y, z], depth_square, n))
}

/// The foot on the cylinder that the thigh joint's plane sweeps around the roll axis.
fn on_the_cylinder<N: Number>(
    leg: &Constants<N>,
    [x, y, z]: [N::Coord; 3],
    beyond: Beyond,
) -> (Plane<N>, Option<End>) {
    let ahead = if x < N::NO_COORD { -x } else { x };
    let (ahead, n, end) = if beyond == Beyond::Outer || ahead > leg.outer {
        (leg.outer, leg.straightest, Some(End::Least))
    } else if ahead < leg.inner {
        (leg.inner, leg.most_folded, Some(End::Most))
    } else {
        (ahead, within(leg, leg.reach_square - N::square(ahead, leg.scale)), None)
    };
    let [y, z, _] = N::enlarged([y, z, N::NO_COORD]);
    let radial = N::root(N::square(y, leg.scale) + N::square(z, leg.scale), leg.scale);
    let plane = Plane {
        hip: Angle(N::turn([N::widen(radial), N::widen(N::NO_COORD)], [y, z])),
        across: if x < N::NO_COORD { -ahead } else { ahead },
        along: N::NO_COORD,
        n,
    };
    (plane, end)
}

/// `n` between the ends of the knee's range, which rounding may leave by a hair.
fn within<N: Number>(leg: &Constants<N>, n: N::Square) -> N::Square {
    if n < leg.straightest {
        leg.straightest
    } else if n > leg.most_folded {
        leg.most_folded
    } else {
        n
    }
}
