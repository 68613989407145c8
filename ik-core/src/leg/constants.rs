//! What the solver needs to know of a leg, worked out once.

use crate::number::Number;

/// The constants that the solver needs of a leg, in a number system.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Constants<N: Number> {
    pub(crate) scale: N::Scale,
    /// Hip offset or coxa.
    pub(crate) offset: N::Coord,
    /// Its square.
    pub(crate) offset_square: N::Square,
    /// L1 + L2.
    pub(crate) reach: N::Coord,
    /// (L1 + L2)².
    pub(crate) reach_square: N::Square,
    /// 4·L1·L2: what n = (L1+L2)² − G² is when the leg is folded.
    pub(crate) fold_square: N::Square,
    /// |L1 − L2|: how near the foot gets to the thigh's joint.
    pub(crate) inner: N::Coord,
    /// Roll-hip: the spheres on which the reachable set ends, √((L1±L2)² + offset²).
    pub(crate) outer_radius: N::Coord,
    pub(crate) inner_radius: N::Coord,
    /// Yaw-hip: √(max(0, (L1−L2)² − coxa²)), where the inner circle meets the yaw axis.
    pub(crate) axis_corner: N::Coord,
    pub(crate) thigh: N::Coord,
    pub(crate) shank: N::Coord,
    /// 2·L1.
    pub(crate) twice_thigh: N::Coord,
    /// P/(4·L1·L2) of a straight leg: (L1+L2)/(2·L2).
    pub(crate) lean: N::Ratio,
    /// The norm of the thigh's vector of a straight leg: (L1+L2)²/(2·L2).
    pub(crate) norm: N::Product,
    /// The reciprocal of 2·√(L1·L2).
    pub(crate) unit: N::Unit,
    pub(crate) bends_back: bool,
}

/// The constants of a leg as an expression, so that one text serves `const fn` with a number system's own
/// constant functions and generic code with the trait's. `$number::name` finds whichever is in scope.
macro_rules! constants {
    ($number:ty, $dimensions:expr) => {{
        let dimensions = $dimensions;
        let (offset, thigh, shank) = (dimensions.offset_mm(), dimensions.thigh_mm(), dimensions.shank_mm());
        let radius = dimensions.radius_mm();
        match <$number>::scale_for(radius) {
            None => Err(if radius < 1.0 { GeometryError::TooShort } else { GeometryError::TooLong }),
            Some(scale) => {
                let reach = thigh + shank;
                let inner = $crate::const_math::magnitude(thigh - shank);
                let corner = inner * inner - offset * offset;
                let product = thigh * shank;
                let root = $crate::const_math::square_root;
                Ok($crate::leg::constants::Constants {
                    scale,
                    offset: <$number>::coord_from_mm(offset, scale),
                    offset_square: <$number>::square_from_mm2(offset * offset, scale),
                    reach: <$number>::coord_from_mm(reach, scale),
                    reach_square: <$number>::square_from_mm2(reach * reach, scale),
                    fold_square: <$number>::square_from_mm2(4.0 * product, scale),
                    inner: <$number>::coord_from_mm(inner, scale),
                    outer_radius: <$number>::coord_from_mm(root(reach * reach + offset * offset), scale),
                    inner_radius: <$number>::coord_from_mm(root(inner * inner + offset * offset), scale),
                    axis_corner: <$number>::coord_from_mm(
                        root(if corner > 0.0 { corner } else { 0.0 }),
                        scale,
                    ),
                    thigh: <$number>::coord_from_mm(thigh, scale),
                    shank: <$number>::coord_from_mm(shank, scale),
                    twice_thigh: <$number>::coord_from_mm(2.0 * thigh, scale),
                    lean: <$number>::ratio_from(reach / (2.0 * shank)),
                    norm: <$number>::product_from_mm(reach * reach / (2.0 * shank), scale),
                    unit: <$number>::unit_from_mm(2.0 * root(product), scale),
                    bends_back: dimensions.bends_back(),
                })
            }
        }
    }};
}
pub(crate) use constants;
