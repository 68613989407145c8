//! The hip that rolls about x and carries a sideways offset a.
//!
//! ```text
//! D   = √(y² + z² − a²)
//! hip = angle of (y·a − z·D, z·a + y·D)                 norm y² + z²
//! ```
//!
//! The reachable set is (L1−L2)² + a² ≤ x² + y² + z² ≤ (L1+L2)² + a² with y² + z² ≥ a². Its point closest to a
//! foot outside: the foot scaled onto the nearer sphere, if that keeps y² + z² ≥ a²; else y and z scaled onto
//! the cylinder y² + z² = a², with |x| held within [|L1−L2|, L1+L2].

use super::constants::Constants;
use super::sealed::Stage;
use super::{Hip, Plane, triangle};
use crate::angle::{Angle, Joints};
use crate::geometry::RollHip;
use crate::number::Number;

impl Hip for RollHip {
    const NAME: &'static str = "roll-hip";
}

impl Stage for RollHip {
    #[inline(always)]
    fn plane<N: Number>(leg: &Constants<N>, [x, y, z]: [N::Coord; 3]) -> Option<Plane<N>> {
        let depth_square = N::square(y, leg.scale) + N::square(z, leg.scale) - leg.offset_square;
        let n = leg.reach_square - depth_square - N::square(x, leg.scale);
        if depth_square < N::NO_SQUARE || n < N::NO_SQUARE || n > leg.fold_square {
            return None;
        }
        Some(at_depth(leg, [x, y, z], depth_square, n))
    }

    #[cold]
    fn closest<N: Number>(leg: &Constants<N>, foot: [N::Coord; 3], halvings: Option<u32>) -> Plane<N> {
        on_a_sphere(leg, foot, halvings.is_some())
            .unwrap_or_else(|| on_the_cylinder(leg, foot, halvings.is_some()))
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

/// The plane through a foot that lies at √`depth_square` below the hip.
#[inline(always)]
fn at_depth<N: Number>(
    leg: &Constants<N>,
    [x, y, z]: [N::Coord; 3],
    depth_square: N::Square,
    n: N::Square,
) -> Plane<N> {
    let depth = N::root(depth_square, leg.scale);
    let hip = N::angle(
        N::area(z, leg.offset) + N::area(y, depth),
        N::area(y, leg.offset) - N::area(z, depth),
        N::area(y, y) + N::area(z, z),
    );
    Plane { hip: Angle(hip), across: x, along: depth, n }
}

/// The foot scaled onto the nearer of the two spheres, if it lies beyond the one or within the other and that
/// keeps it clear of the cylinder.
fn on_a_sphere<N: Number>(leg: &Constants<N>, [x, y, z]: [N::Coord; 3], far: bool) -> Option<Plane<N>> {
    let square = N::square(x, leg.scale) + N::square(y, leg.scale) + N::square(z, leg.scale);
    let n = leg.reach_square + leg.offset_square - square;
    let (radius, n) = if far || n < N::NO_SQUARE {
        (leg.outer_radius, N::NO_SQUARE)
    } else if n > leg.fold_square {
        (leg.inner_radius, leg.fold_square)
    } else {
        return None;
    };
    let norm = N::root(square, leg.scale);
    if !(norm > N::NO_COORD) {
        // At the very origin: without an offset every direction is as near, and down is where feet go.
        let down = Plane { hip: Angle::ZERO, across: N::NO_COORD, along: leg.inner, n };
        return if leg.offset_square > N::NO_SQUARE { None } else { Some(down) };
    }
    let [x, y, z] = [x, y, z].map(|v| N::rescale(v, radius, norm));
    let depth_square = N::square(y, leg.scale) + N::square(z, leg.scale) - leg.offset_square;
    if depth_square < N::NO_SQUARE {
        return None;
    }
    Some(at_depth(leg, [x, y, z], depth_square, n))
}

/// The foot on the cylinder that the thigh joint's plane sweeps around the roll axis.
fn on_the_cylinder<N: Number>(leg: &Constants<N>, [x, y, z]: [N::Coord; 3], far: bool) -> Plane<N> {
    let ahead = if x < N::NO_COORD { -x } else { x };
    let (ahead, n) = if far || ahead > leg.reach {
        (leg.reach, N::NO_SQUARE)
    } else if ahead < leg.inner {
        (leg.inner, leg.fold_square)
    } else {
        (ahead, within(leg, leg.reach_square - N::square(ahead, leg.scale)))
    };
    let radial = N::root(N::square(y, leg.scale) + N::square(z, leg.scale), leg.scale);
    Plane {
        hip: Angle(N::angle(N::widen(z), N::widen(y), N::widen(radial))),
        across: if x < N::NO_COORD { -ahead } else { ahead },
        along: N::NO_COORD,
        n,
    }
}

/// `n` within [0, 4·L1·L2], which rounding may leave by a hair.
fn within<N: Number>(leg: &Constants<N>, n: N::Square) -> N::Square {
    if n < N::NO_SQUARE {
        N::NO_SQUARE
    } else if n > leg.fold_square {
        leg.fold_square
    } else {
        n
    }
}
