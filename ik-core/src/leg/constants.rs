//! What the solver needs to know of a leg, worked out once.

use crate::limits::Ranges;
use crate::number::Number;

/// The constants of a leg in a number system.
///
/// The knee's range is part of the reach: between its ends n runs from `straightest` to `most_folded`, and what
/// lies outside is as far out of reach as it would be for a leg with shorter links.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Constants<N: Number> {
    pub(crate) scale: N::Scale,
    /// Hip offset or coxa.
    pub(crate) offset: N::Coord,
    /// Roll-hip: its square, less a hair in some number systems.
    pub(crate) offset_square: N::Square,
    /// Roll-hip: (L1 + L2)² + offset².
    pub(crate) outer_square: N::Square,
    /// (L1 + L2)².
    pub(crate) reach_square: N::Square,
    /// 4·L1·L2: what n = (L1+L2)² − G² is when the leg is folded.
    pub(crate) fold_square: N::Square,
    /// n with the knee at its least and at its most.
    pub(crate) straightest: N::Square,
    pub(crate) most_folded: N::Square,
    /// G with the knee at its least and at its most.
    pub(crate) outer: N::Coord,
    pub(crate) inner: N::Coord,
    /// Roll-hip: the spheres on which the reachable set ends, √(G² + offset²).
    pub(crate) outer_radius: N::Coord,
    pub(crate) inner_radius: N::Coord,
    /// Yaw-hip: √(max(0, G² − coxa²)) of the inner G, where the inner circle meets the yaw axis.
    pub(crate) axis_corner: N::Coord,
    pub(crate) thigh: N::Coord,
    pub(crate) shank: N::Coord,
    /// What knee and thigh are worked out from, at either end of the reach of free links.
    pub(crate) straight: KneeEnd<N>,
    pub(crate) folded: KneeEnd<N>,
    /// 2·L2, negative if the knee bends forward or up: what the foot moves across by half of the knee's sine.
    pub(crate) sway: N::Coord,
    /// The reciprocal of 2·√(L1·L2).
    pub(crate) unit: N::Unit,
    pub(crate) bends_back: bool,
    /// Whether the knee's range ends before straight, and before folded: else it is the links that end the reach.
    pub(crate) knee_stops: [bool; 2],
    pub(crate) ranges: Ranges<N>,
}

/// An end of the reach of free links.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct KneeEnd<N: Number> {
    /// The knee's angle: 0 or half a turn.
    pub(crate) knee: N::Angle,
    /// −1 if that is straight, 1 if it is folded.
    pub(crate) sign: N::Ratio,
    /// Where the foot is along a thigh that hangs straight down: L1 + L2, or L1 − L2.
    pub(crate) along: N::Product,
    /// By what it moves from there, away from this end: −2·L2, or 2·L2.
    pub(crate) swing: N::Coord,
}

/// The constants of a leg as an expression, so that one text serves `const fn` with a number system's own
/// constant functions and generic code with the trait's. `<$number>::name` finds whichever is in scope.
macro_rules! constants {
    ($number:ty, $dimensions:expr, $limits:expr) => {{
        let (dimensions, limits) = ($dimensions, $limits);
        let (offset, thigh, shank) = (dimensions.offset_mm(), dimensions.thigh_mm(), dimensions.shank_mm());
        let radius = dimensions.radius_mm();
        let reach = thigh + shank;
        match <$number>::scale_for(radius) {
            None => Err(if radius < 1.0 {
                $crate::geometry::GeometryError::TooShort
            } else {
                $crate::geometry::GeometryError::TooLong
            }),
            Some(scale) => {
                let product = thigh * shank;
                let knee = limits.knee_deg();
                let straightest = 4.0 * product * $crate::const_math::half_sine_square(knee[0]);
                let most_folded = 4.0 * product * $crate::const_math::half_sine_square(knee[1]);
                // Not a hair above the fold, where m would be negative.
                let most_folded = if most_folded < 4.0 * product { most_folded } else { 4.0 * product };
                let (outer_square, inner_square) = (reach * reach - straightest, reach * reach - most_folded);
                let corner = inner_square - offset * offset;
                let root = $crate::const_math::square_root;
                Ok($crate::leg::constants::Constants {
                    scale,
                    offset: <$number>::coord_from_mm(offset, scale),
                    offset_square: <$number>::cylinder_from_mm2(offset * offset, scale),
                    outer_square: <$number>::square_from_mm2(reach * reach + offset * offset, scale),
                    reach_square: <$number>::square_from_mm2(reach * reach, scale),
                    fold_square: <$number>::square_from_mm2(4.0 * product, scale),
                    straightest: <$number>::square_from_mm2(straightest, scale),
                    most_folded: <$number>::square_from_mm2(most_folded, scale),
                    outer: <$number>::coord_from_mm(root(outer_square), scale),
                    inner: <$number>::coord_from_mm(root(inner_square), scale),
                    outer_radius: <$number>::coord_from_mm(root(outer_square + offset * offset), scale),
                    inner_radius: <$number>::coord_from_mm(root(inner_square + offset * offset), scale),
                    axis_corner: <$number>::coord_from_mm(root(corner), scale),
                    thigh: <$number>::coord_from_mm(thigh, scale),
                    shank: <$number>::coord_from_mm(shank, scale),
                    straight: $crate::leg::constants::KneeEnd {
                        knee: <$number as $crate::Number>::NO_ANGLE,
                        sign: <$number>::ratio_from(-1.0),
                        along: <$number>::product_from_mm(reach, scale),
                        swing: <$number>::coord_from_mm(-2.0 * shank, scale),
                    },
                    folded: $crate::leg::constants::KneeEnd {
                        knee: <$number as $crate::Number>::MOST_ANGLE,
                        sign: <$number>::ratio_from(1.0),
                        along: <$number>::product_from_mm(thigh - shank, scale),
                        swing: <$number>::coord_from_mm(2.0 * shank, scale),
                    },
                    sway: <$number>::coord_from_mm(
                        if dimensions.bends_back() { 2.0 * shank } else { -2.0 * shank },
                        scale,
                    ),
                    unit: <$number>::unit_from_mm(2.0 * root(product), scale),
                    bends_back: dimensions.bends_back(),
                    knee_stops: [knee[0] > 0.0, knee[1] < 180.0],
                    ranges: $crate::limits::Ranges {
                        free: limits.are_free(),
                        hip: $crate::leg::constants::range!($number, limits.hip_deg()),
                        thigh: $crate::leg::constants::range!($number, limits.thigh_deg()),
                        knee: $crate::leg::constants::range!($number, knee),
                    },
                })
            }
        }
    }};
}
pub(crate) use constants;

macro_rules! range {
    ($number:ty, $degrees:expr) => {{
        let [least, most] = $degrees;
        let turns = [least / 360.0, most / 360.0];
        let [least, most] = <$number>::range_from_turns(turns);
        $crate::limits::Range {
            least: $crate::angle::Angle(least),
            most: $crate::angle::Angle(most),
            middle: <$number>::angle_from_turns((turns[0] + turns[1]) / 2.0),
            extent: <$number>::extent([least, most], turns),
        }
    }};
}
pub(crate) use range;
