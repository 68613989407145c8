//! Number systems: what the solver is written over.
//!
//! [`Number`] is the seam between the one solver and the ways of doing arithmetic. Its primitives are
//! geometric, so that each system can do each of them the best way it knows; none of them is a second copy of
//! the solver. The algebra that they serve stands in [`leg`](crate::leg).
//!
//! What each primitive is worth in each number system is stated in one table of the host harness, which its tests hold to what
//! they find: `toehold bounds` prints both.
//!
//! Anyone can add a number system: the host harness adds `f64` to tell the method's error from rounding.

#[cfg(feature = "fixed16")]
mod fixed16;
#[cfg(feature = "fixed32")]
mod fixed32;
#[cfg(any(feature = "float32", feature = "coarse"))]
pub mod float;
#[cfg(any(feature = "fixed16", feature = "fixed32", feature = "short32"))]
mod line;
#[cfg(any(feature = "fixed16", feature = "short32"))]
mod narrow;
#[cfg(any(feature = "fixed16", feature = "fixed32", feature = "short32"))]
mod rhombus;
#[cfg(any(feature = "fixed32", feature = "short32"))]
mod series;
#[cfg(feature = "short32")]
mod short32;

#[cfg(feature = "fixed16")]
pub use fixed16::{Fixed16, Fixed16Scale, Fixed16Unit};
#[cfg(feature = "fixed32")]
pub use fixed32::{Fixed32, FixedScale};
#[cfg(feature = "coarse")]
pub use float::Coarse;
#[cfg(feature = "float32")]
pub use float::Float32;
#[cfg(any(feature = "fixed16", feature = "fixed32"))]
pub use line::FixedLine;
#[cfg(feature = "short32")]
pub use short32::{Short32, ShortScale, ShortUnit};

use crate::limits::Range;
use core::fmt::Debug;
use core::ops::{Add, Neg, Sub};

/// A number system: how lengths, squares, ratios and angles are stored, and the primitives of the solver.
///
/// # Quantities
///
/// | type | what | unit |
/// | --- | --- | --- |
/// | [`Length`](Number::Length) | a length as users give and get it | mm |
/// | [`Coord`](Number::Coord) | a length within the solver | mm times a power of two fixed per leg |
/// | [`Square`](Number::Square) | sums and differences of squares of `Coord`s, **exact** or nearly so | `Coord`² |
/// | [`Ratio`](Number::Ratio) | a pure number in [−1, 1] | 1 |
/// | [`Product`](Number::Product) | `Coord`·`Ratio`, rounded as the system likes | |
/// | [`Angle`](Number::Angle) | an angle in (−½, ½] turn | the system's own |
///
/// # Contract
///
/// Every method is total: no panic and no NaN for any value that the methods before it can produce. `<` on the
/// associated types is how the solver decides; a system that carries intervals may decide both ways in turn.
pub trait Number: Copy + Debug + PartialEq + 'static {
    /// A length in mm, as users give and get it.
    type Length: Copy + Debug + PartialEq + PartialOrd;
    /// A length within the solver.
    type Coord: Copy
        + Debug
        + PartialEq
        + PartialOrd
        + Add<Output = Self::Coord>
        + Sub<Output = Self::Coord>
        + Neg<Output = Self::Coord>;
    /// A sum or difference of squares of coordinates.
    type Square: Copy
        + Debug
        + PartialEq
        + PartialOrd
        + Add<Output = Self::Square>
        + Sub<Output = Self::Square>;
    /// A pure number in [−1, 1].
    type Ratio: Copy
        + Debug
        + PartialEq
        + Add<Output = Self::Ratio>
        + Sub<Output = Self::Ratio>
        + Neg<Output = Self::Ratio>;
    /// A product of a coordinate and a ratio.
    type Product: Copy
        + Debug
        + PartialEq
        + Add<Output = Self::Product>
        + Sub<Output = Self::Product>
        + Neg<Output = Self::Product>;
    /// An angle in (−½, ½] turn, in the system's own unit.
    type Angle: Copy + Debug + PartialEq + PartialOrd;
    /// What turns `Length` into `Coord` and back, fixed per leg.
    type Scale: Copy + Debug + PartialEq;
    /// The reciprocal of the length unit 2·√(L1·L2), for [`knee`](Number::knee).
    type Unit: Copy + Debug + PartialEq;
    /// A servo's gain: pulse per angle.
    type Gain: Copy + Debug + PartialEq;
    /// Its reciprocal: angle per pulse.
    type Swing: Copy + Debug + PartialEq;

    /// A straight line from an angle to a whole number.
    type Line: Copy + Debug + PartialEq;

    /// The name that reports and sheets use.
    const NAME: &'static str;
    /// No length.
    const NO_LENGTH: Self::Length;
    /// The largest length; what a distance saturates at.
    const FARTHEST: Self::Length;
    /// No coordinate.
    const NO_COORD: Self::Coord;
    /// No square.
    const NO_SQUARE: Self::Square;
    /// No angle.
    const NO_ANGLE: Self::Angle;
    /// The least angle there is: −½ turn, or just inside.
    const LEAST_ANGLE: Self::Angle;
    /// The largest angle there is: ½ turn, or just inside.
    const MOST_ANGLE: Self::Angle;

    // --- constants, from f64: on a PC, or while compiling through the const twins of these -------------

    /// The scale for a leg that reaches `radius_mm` from its origin; `None` if it is too long or too short.
    fn scale_for(radius_mm: f64) -> Option<Self::Scale>;
    /// mm, rounded.
    fn length_from_mm(mm: f64) -> Self::Length;
    /// mm, rounded.
    fn coord_from_mm(mm: f64, scale: Self::Scale) -> Self::Coord;
    /// mm², rounded.
    fn square_from_mm2(mm2: f64, scale: Self::Scale) -> Self::Square;
    /// A pure number in [−1, 1], rounded.
    fn ratio_from(value: f64) -> Self::Ratio;
    /// mm², rounded; or a hair less, for number systems that want a root of what is left with it taken off to be no
    /// less than a hair.
    fn cylinder_from_mm2(mm2: f64, scale: Self::Scale) -> Self::Square {
        Self::square_from_mm2(mm2, scale)
    }
    /// mm, as a product of a coordinate and a ratio.
    fn product_from_mm(mm: f64, scale: Self::Scale) -> Self::Product;
    /// The reciprocal of `unit_mm` = 2·√(L1·L2).
    fn unit_from_mm(unit_mm: f64, scale: Self::Scale) -> Self::Unit;
    /// Turns, rounded; saturates just inside ±½.
    fn angle_from_turns(turns: f64) -> Self::Angle;
    /// The ends of a range of turns, rounded inward, so that no joint goes a hair farther than was allowed; ±½ turn is
    /// the largest angle there is. A range too narrow for that is the angle nearest to it.
    fn range_from_turns(range: [f64; 2]) -> [Self::Angle; 2] {
        range.map(Self::angle_from_turns)
    }
    /// How far a range extends, which is given as its ends and in turns: what [`is_well_within`](Number::is_well_within)
    /// wants to know of it, if anything.
    fn extent(_ends: [Self::Angle; 2], _turns: [f64; 2]) -> u32 {
        0
    }
    /// µs per turn, rounded.
    fn gain_from(us_per_turn: f64) -> Self::Gain;
    /// Turns per µs, rounded.
    fn swing_from(turns_per_us: f64) -> Self::Swing;
    /// The line `per_turn`·angle + `at_zero`; both below 2^26 in size.
    fn line_from(per_turn: f64, at_zero: f64) -> Self::Line;

    // --- the way in and out ----------------------------------------------------------------------------

    /// A foot as coordinates, if it may be within reach: a quick look, which may let a foot pass that is far beyond
    /// reach or not finite only if [`Number::square`] of it is sure to end outside the reach, or an angle of it in NaN.
    #[inline(always)]
    fn near(foot: [Self::Length; 3], scale: Self::Scale) -> Option<[Self::Coord; 3]> {
        match Self::place(foot, scale) {
            Placed::Near(point) => Some(point),
            Placed::Far(..) | Placed::NotFinite => None,
        }
    }
    /// Brings a foot into the leg's working range, whatever it is.
    fn place(foot: [Self::Length; 3], scale: Self::Scale) -> Placed<Self>;
    /// A coordinate as a length, rounded; saturates.
    fn length(coord: Self::Coord, scale: Self::Scale) -> Self::Length;
    /// A length in mm.
    fn mm(length: Self::Length) -> f64;
    /// An angle in turns.
    fn turns(angle: Self::Angle) -> f64;
    /// An angle in thousandths of a degree, rounded: for logs on a chip without an FPU.
    fn millidegrees(angle: Self::Angle) -> i32;
    /// A length in thousandths of a millimetre, rounded, saturating: for logs on a chip without an FPU.
    fn micrometres(length: Self::Length) -> i32;
    /// a − b; saturates.
    fn length_difference(a: Self::Length, b: Self::Length) -> Self::Length;
    /// a − b, or b − a if it is to be mirrored.
    #[inline(always)]
    fn length_difference_or_mirrored(a: Self::Length, b: Self::Length, mirrored: bool) -> Self::Length {
        if mirrored { Self::length_difference(b, a) } else { Self::length_difference(a, b) }
    }

    // --- hip and triangle ------------------------------------------------------------------------------

    /// The square of a coordinate.
    fn square(coord: Self::Coord, scale: Self::Scale) -> Self::Square;
    /// The root of a square ≥ 0.
    fn root(square: Self::Square, scale: Self::Scale) -> Self::Coord;
    /// R = √`radial_square`, no less than a hair if that is what [`yaw_angle`](Number::yaw_angle) wants, and
    /// (R − offset)², kept as exact as squares are, or the knee of a leg near straight would be limited to the root of
    /// the rounding error.
    fn radial(
        radial_square: Self::Square,
        offset: Self::Coord,
        scale: Self::Scale,
    ) -> (Self::Coord, Self::Square);
    /// √`depth_square`, which is y² + z² − offset²; for number systems whose squares are too coarse for a small one.
    #[inline(always)]
    fn depth(
        _foot: [Self::Coord; 2],
        _offset: Self::Coord,
        depth_square: Self::Square,
        scale: Self::Scale,
    ) -> Self::Coord {
        Self::root(depth_square, scale)
    }
    /// [`radial`](Number::radial) of x² + y²; for number systems whose squares are too coarse for a small one.
    #[inline(always)]
    fn radial_of(
        _foot: [Self::Coord; 2],
        radial_square: Self::Square,
        offset: Self::Coord,
        scale: Self::Scale,
    ) -> (Self::Coord, Self::Square) {
        Self::radial(radial_square, offset, scale)
    }
    /// coord·ratio.
    fn stretch(coord: Self::Coord, ratio: Self::Ratio) -> Self::Product;
    /// coord·1.
    fn widen(coord: Self::Coord) -> Self::Product;
    /// The angle by which the vector `from` is to be turned to come to `to`, which is as long, in (−½, ½] turn; 0 for zero
    /// vectors.
    ///
    /// If rounding left the two lengths apart by d, `from` so turned misses `to` by d along it, and by no more than d across.
    fn turn(from: [Self::Product; 2], to: [Self::Coord; 2]) -> Self::Angle;
    /// The hip of a roll-hip leg: what turns (offset, −depth) to (y, z), which is as long.
    #[inline(always)]
    fn hip_angle(foot: [Self::Coord; 2], offset: Self::Coord, depth: Self::Coord) -> Self::Angle {
        Self::turn([Self::widen(offset), -Self::widen(depth)], foot)
    }
    /// The hip of a yaw-hip leg: the angle of (y, x), whose norm is `radial`.
    #[inline(always)]
    fn yaw_angle([x, y]: [Self::Coord; 2], radial: Self::Coord) -> Self::Angle {
        Self::turn([Self::widen(radial), Self::widen(Self::NO_COORD)], [y, x])
    }
    /// The knee's flexion: `acute`, or with the leg nearer to folded `end` less `acute`; `end` is the flexion at the nearer
    /// end of the reach, and `sign` is 1 if that is folded and else −1.
    #[inline(always)]
    fn knee_angle(acute: Self::Angle, end: Self::Angle, _sign: Self::Ratio, folded: bool) -> Self::Angle {
        if folded { Self::angle_difference(end, acute) } else { acute }
    }
    /// Knee flexion of the triangle with n = (L1+L2)² − G² ≥ 0 and m = 4·L1·L2 − n ≥ 0, both of them exact.
    fn knee(n: Self::Square, m: Self::Square, unit: Self::Unit, scale: Self::Scale) -> Knee<Self>;

    /// Whether two angles are none of NaN: what a foot that [`near`](Number::near) let pass would come to.
    #[inline(always)]
    fn are_sound(_: Self::Angle, _: Self::Angle) -> bool {
        true
    }

    /// Whether an angle lies within a range. A quick look, which may say no where an angle lies within 2e-7 turns of an end;
    /// NaN does not lie within.
    #[inline(always)]
    fn is_well_within(angle: Self::Angle, range: &Range<Self>) -> bool {
        range.contains(angle)
    }

    // --- forward ---------------------------------------------------------------------------------------

    /// (sin, cos).
    fn sin_cos(angle: Self::Angle) -> (Self::Ratio, Self::Ratio);
    /// a + b, wrapped into (−½, ½] turn.
    fn angle_sum(a: Self::Angle, b: Self::Angle) -> Self::Angle;
    /// a − b, wrapped into (−½, ½] turn.
    fn angle_difference(a: Self::Angle, b: Self::Angle) -> Self::Angle;
    /// A product of a coordinate and ratios as a coordinate.
    fn narrow(product: Self::Product) -> Self::Coord;

    // --- out of reach: rare, so these may be slow ------------------------------------------------------

    /// A vector of the same direction, larger if its own length would be rounded too much.
    fn enlarged(vector: [Self::Coord; 3]) -> [Self::Coord; 3] {
        vector
    }
    /// v·to/from, for |v| ≤ from (nearly) and from > 0.
    fn rescale(v: Self::Coord, to: Self::Coord, from: Self::Coord) -> Self::Coord;
    /// A coordinate halved so many times.
    fn halve(coord: Self::Coord, times: u32) -> Self::Coord;
    /// The distance between two points; saturates at [`FARTHEST`](Number::FARTHEST).
    fn distance(a: [Self::Length; 3], b: [Self::Length; 3]) -> Self::Length;

    // --- servo -----------------------------------------------------------------------------------------

    /// gain·(angle − from), without wrapping, in 1/65536 µs; saturates.
    fn travel(angle: Self::Angle, from: Self::Angle, gain: Self::Gain) -> i32;
    /// from + swing·travel, travel in 1/65536 µs; saturates just inside ±½ turn.
    fn swing_to(travel: i32, from: Self::Angle, swing: Self::Swing) -> Self::Angle;
    /// The whole number nearest to the line at an angle; any below 1 where the line is below ½.
    fn on_line(line: Self::Line, angle: Self::Angle) -> i32;
}

/// Tells the compiler that where this is called is come by less often, so that it branches there instead of working
/// out both ways and choosing. There is nothing left of it in the code.
#[cfg(any(feature = "float32", feature = "coarse", feature = "fixed32"))]
#[cold]
#[inline(never)]
const fn seldom() {}

/// The step of a test's sweep: every argument there is if `TOEHOLD_LONG` is set.
#[cfg(all(test, any(feature = "fixed16", feature = "fixed32", feature = "short32")))]
fn sweep(usual: usize) -> usize {
    if std::env::var_os("TOEHOLD_LONG").is_some() { 1 } else { usual }
}

/// A foot in the leg's working range.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Placed<N: Number> {
    /// Within it.
    Near([N::Coord; 3]),
    /// Beyond it, and so beyond reach: halved so many times, which keeps its direction.
    Far([N::Coord; 3], u32),
    /// A coordinate is NaN or infinite.
    NotFinite,
}

/// What the triangle of thigh and shank gives.
///
/// The smaller of n and m tells how far the leg is from its nearer end, straight or folded; what is worked out from
/// that end loses no digits near it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Knee<N: Number> {
    /// How far the knee is from its nearer end, straight or folded, in [0, ¼] turn.
    pub acute: N::Angle,
    /// ½·sin of it, in [0, ½].
    pub half_sine: N::Ratio,
    /// Whether the leg is nearer to folded than to straight: m < n.
    pub folded: bool,
    /// How far it is from that end: the smaller of n and m over 4·L1·L2, in [0, ½].
    pub from_end: N::Ratio,
}
