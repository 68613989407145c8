//! The hip that yaws about z and carries a coxa c.
//!
//! ```text
//! R   = √(x² + y²)             D = R − c
//! hip = angle of (y, x)                                 norm R
//! ```
//!
//! The reachable set is (L1−L2)² ≤ D² + z² ≤ (L1+L2)² with R ≥ 0. Its point closest to a foot outside: (D, z)
//! scaled onto the nearer circle; where the inner one would put R below 0, its corner on the yaw axis.

use super::constants::Constants;
use super::sealed::Stage;
use super::{Hip, Plane, triangle};
use crate::angle::{Angle, Joints};
use crate::geometry::YawHip;
use crate::number::Number;

impl Hip for YawHip {
    const NAME: &'static str = "yaw-hip";
}

impl Stage for YawHip {
    #[inline(always)]
    fn plane<N: Number>(leg: &Constants<N>, [x, y, z]: [N::Coord; 3]) -> Option<Plane<N>> {
        let radial_square = N::square(x, leg.scale) + N::square(y, leg.scale);
        let (along, along_square) = N::beyond(radial_square, leg.offset, leg.scale);
        let n = leg.reach_square - along_square - N::square(z, leg.scale);
        if n < N::NO_SQUARE || n > leg.fold_square {
            return None;
        }
        Some(Plane { hip: yaw(x, y, along + leg.offset), across: z, along, n })
    }

    #[cold]
    fn closest<N: Number>(leg: &Constants<N>, [x, y, z]: [N::Coord; 3], halvings: Option<u32>) -> Plane<N> {
        let coxa = N::halve(leg.offset, halvings.unwrap_or(0));
        let radial = N::root(N::square(x, leg.scale) + N::square(y, leg.scale), leg.scale);
        let along = radial - coxa;
        let gap_square = N::square(along, leg.scale) + N::square(z, leg.scale);
        let gap = N::root(gap_square, leg.scale);
        let (circle, n) = if halvings.is_some() || gap_square > leg.reach_square {
            (leg.reach, N::NO_SQUARE)
        } else {
            (leg.inner, leg.fold_square)
        };
        let (along, across) = if gap > N::NO_COORD {
            (N::rescale(along, circle, gap), N::rescale(z, circle, gap))
        } else {
            // On the femur joint itself every direction is as near; outward is where feet go.
            (circle, N::NO_COORD)
        };
        let (along, across) = if along + leg.offset < N::NO_COORD {
            let corner = leg.axis_corner;
            (-leg.offset, if across < N::NO_COORD { -corner } else { corner })
        } else {
            (along, across)
        };
        Plane { hip: yaw(x, y, radial), across, along, n }
    }

    fn foot<N: Number>(leg: &Constants<N>, joints: &Joints<N>) -> [N::Coord; 3] {
        let (z, along) = triangle::foot(leg, joints);
        let radial = leg.offset + along;
        let (sin, cos) = N::sin_cos(joints.hip.0);
        [N::narrow(N::stretch(radial, sin)), N::narrow(N::stretch(radial, cos)), z]
    }
}

/// The yaw that points the leg at (x, y).
#[inline(always)]
fn yaw<N: Number>(x: N::Coord, y: N::Coord, radial: N::Coord) -> Angle<N> {
    Angle(N::angle(N::widen(x), N::widen(y), N::widen(radial)))
}
