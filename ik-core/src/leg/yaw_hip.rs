//! The hip that yaws about z and carries a coxa c.
//!
//! ```text
//! R   = √(x² + y²)             D = R − c
//! hip = angle of (y, x)                                 norm R
//! ```
//!
//! With O and I the lengths of the line from femur joint to foot with the knee at its least and at its most (L1 + L2
//! and |L1 − L2| if it is free), the reachable set is I² ≤ D² + z² ≤ O² with R ≥ 0. Its point closest to a foot outside: (D, z)
//! scaled onto the nearer circle; where the inner one would put R below 0, its corner on the yaw axis.

use super::constants::Constants;
use super::sealed::{Beyond, Stage};
use super::{Hip, Plane, triangle};
use crate::angle::{Angle, Joints};
use crate::geometry::YawHip;
use crate::limits::End;
use crate::number::Number;

impl Hip for YawHip {
    const NAME: &'static str = "yaw-hip";
}

impl Stage for YawHip {
    #[inline(always)]
    fn plane<N: Number>(leg: &Constants<N>, [x, y, z]: [N::Coord; 3]) -> Result<Plane<N>, Beyond> {
        let radial_square = N::square(x, leg.scale) + N::square(y, leg.scale);
        let (radial, along_square) = N::radial_of([x, y], radial_square, leg.offset, leg.scale);
        let n = leg.reach_square - along_square - N::square(z, leg.scale);
        if n < leg.straightest {
            Err(Beyond::Outer)
        } else if n > leg.most_folded {
            Err(Beyond::Inner)
        } else {
            let hip = Angle(N::yaw_angle([x, y], radial));
            Ok(Plane { hip, across: z, along: radial - leg.offset, n })
        }
    }

    #[cold]
    fn closest<N: Number>(
        leg: &Constants<N>,
        [x, y, z]: [N::Coord; 3],
        beyond: Beyond,
        halvings: u32,
    ) -> (Plane<N>, Option<End>) {
        let radial_square = N::square(x, leg.scale) + N::square(y, leg.scale);
        let (radial, _) = N::radial_of([x, y], radial_square, N::NO_COORD, leg.scale);
        let along = radial - N::halve(leg.offset, halvings);
        let [along, z, _] = N::enlarged([along, z, N::NO_COORD]);
        let gap = N::root(N::square(along, leg.scale) + N::square(z, leg.scale), leg.scale);
        let (circle, n, end) = if beyond == Beyond::Outer {
            (leg.outer, leg.straightest, End::Least)
        } else {
            (leg.inner, leg.most_folded, End::Most)
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
        let hip = Angle(N::yaw_angle([x, y], radial));
        (Plane { hip, across, along, n }, Some(end))
    }

    fn foot<N: Number>(leg: &Constants<N>, joints: &Joints<N>) -> [N::Coord; 3] {
        let (z, along) = triangle::foot(leg, joints);
        let radial = leg.offset + along;
        let (sin, cos) = N::sin_cos(joints.hip.0);
        [N::narrow(N::stretch(radial, sin)), N::narrow(N::stretch(radial, cos)), z]
    }
}
