//! Single-precision floating point, over a choice of mathematical functions.
//!
//! A coordinate is the `f32` itself, in mm. Squares are not: coordinates are scaled by a power of two (which
//! loses nothing) to 30-bit integers whose squares and sums are exact in `i64`, because half of the digits of a
//! nearly straight knee would be lost in an `f32` difference of squares.

#[cfg(feature = "float32")]
mod coefficients;
#[cfg(feature = "float32")]
mod hardware_root;
#[cfg(feature = "coarse")]
mod micromath_maths;
#[cfg(feature = "float32")]
mod polynomial_maths;
#[cfg(feature = "float32")]
mod quotient;

use super::{Knee, Number, Placed, seldom};
use crate::const_math::{nearest, power_of_two};
use crate::limits::Range;
use core::f32::consts::{PI, TAU};
use core::marker::PhantomData;
use core::ops::{Add, Sub};

/// Single precision with functions of our own, made for legs: for chips with an FPU.
///
/// | | |
/// | --- | --- |
/// | length | `f32`, mm |
/// | angle | `f32`, radians in (−π, π] |
/// | its primitives | a turn within 4.6e-7 rad, a knee within 6.8e-7, sine and cosine within 1.3e-7 |
/// | largest joint error | 6.4e-7 rad on the demo legs, with knee from 0.1 to 2.6 rad and the foot clear of the hip's axis; nearer to an end see [`leg`](crate::leg) |
/// | largest foot error | 6.2e-7 of thigh and shank together on the demo legs, straight and folded ones included |
/// | legs | reach from 1 mm to 16 383 mm |
#[cfg(feature = "float32")]
pub type Float32 = Float<polynomial_maths::Polynomials>;

/// Single precision with micromath's functions: a yardstick, and for machines whose millimetres do not matter.
///
/// Joint errors of some hundredths of a radian; see the survey of your own leg.
#[cfg(feature = "coarse")]
pub type Coarse = Float<micromath_maths::Micromath>;

/// The functions that a floating-point number system takes from a library.
pub trait FloatMaths: Copy + core::fmt::Debug + PartialEq + 'static {
    /// The number system's name.
    const NAME: &'static str;
    /// How many bits the difference between a square below 2^61 and that of its root, as whole number, has above 31.
    const REST_BITS: u32;
    /// √v for v ≥ 0.
    fn root(v: f32) -> f32;
    /// √(upper + lower/2^32) for upper ≥ 0, within a unit in the last place of what is under the root.
    #[inline(always)]
    fn root_of_words(upper: i32, lower: u32) -> f32 {
        Self::root(upper as f32 + lower as f32 * (1.0 / 4_294_967_296.0))
    }
    /// 2·arctan t for |t| ≤ 1.
    fn double_arc_tangent(t: f32) -> f32;
    /// 2·arcsin s for 0 ≤ s ≤ √½ and a hair; its square and cosine are known.
    fn double_arc_sine(sine: f32, square: f32, cosine: f32) -> f32;
    /// (sin, cos) for |angle| ≤ 2π.
    fn sin_cos(angle: f32) -> (f32, f32);
}

/// Single precision over the functions `M`.
#[derive(Debug, Clone, Copy, PartialEq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Float<M>(PhantomData<M>);

/// Powers of two between millimetres and the integers whose squares are exact.
#[derive(Debug, Clone, Copy, PartialEq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct FloatScale {
    /// Steps in a millimetre.
    steps_per_mm: f32,
    /// Its reciprocal times [`STEPS_PER_ROOT`].
    mm_per_root: f32,
    /// Feet of the working range are nearer than the root of this, mm².
    limit_square: f32,
}

/// A sum or difference of squares of steps: exact within the working range, and wrapping far beyond it.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct Steps2(i64);

impl Add for Steps2 {
    type Output = Self;
    #[inline(always)]
    fn add(self, other: Self) -> Self {
        Self(self.0.wrapping_add(other.0))
    }
}

impl Sub for Steps2 {
    type Output = Self;
    #[inline(always)]
    fn sub(self, other: Self) -> Self {
        Self(self.0.wrapping_sub(other.0))
    }
}

/// A straight line from an angle to a whole number.
#[derive(Debug, Clone, Copy, PartialEq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct FloatLine {
    /// Per radian.
    slope: f32,
    /// At no angle, and ½ more.
    start: f32,
}

/// More than any leg's reach, and not so much that what is taken off it would wrap.
const BEYOND_ANY_LEG: Steps2 = Steps2(1 << (2 * STEP_BITS + 1));

/// Bits of the integers whose squares are exact.
const STEP_BITS: i32 = 30;

/// How far inside a range an angle must lie to be sure to be within whatever rounding does, turns.
const SURE: f64 = 2e-7;

impl<M: FloatMaths> Float<M> {
    pub(crate) const fn scale_for(radius_mm: f64) -> Option<FloatScale> {
        if !(radius_mm >= 1.0 && radius_mm <= 16_383.0) {
            return None;
        }
        // The least power of two above the reach.
        let mut exponent = 0;
        while power_of_two(exponent) <= radius_mm {
            exponent += 1;
        }
        Some(FloatScale {
            steps_per_mm: power_of_two(STEP_BITS - exponent) as f32,
            mm_per_root: power_of_two(exponent - STEP_BITS + 16) as f32,
            limit_square: power_of_two(2 * exponent) as f32,
        })
    }

    pub(crate) const fn coord_from_mm(mm: f64, _: FloatScale) -> f32 {
        mm as f32
    }

    pub(crate) const fn square_from_mm2(mm2: f64, scale: FloatScale) -> Steps2 {
        Steps2(nearest(mm2 * scale.steps_per_mm as f64 * scale.steps_per_mm as f64))
    }

    /// What is left of a square with this taken off it, and is not negative, has a root of [`HAIR`] or more.
    pub(crate) const fn cylinder_from_mm2(mm2: f64, scale: FloatScale) -> Steps2 {
        Steps2(Self::square_from_mm2(mm2, scale).0 - (HAIR * HAIR) as i64)
    }

    pub(crate) const fn ratio_from(value: f64) -> f32 {
        value as f32
    }

    pub(crate) const fn product_from_mm(mm: f64, _: FloatScale) -> f32 {
        mm as f32
    }

    /// Per unit of [`root`].
    pub(crate) const fn unit_from_mm(unit_mm: f64, scale: FloatScale) -> f32 {
        (scale.mm_per_root as f64 / unit_mm) as f32
    }

    pub(crate) const fn length_from_mm(mm: f64) -> f32 {
        mm as f32
    }

    pub(crate) const fn angle_from_turns(turns: f64) -> f32 {
        // Not wrapped: −½ turn is an end of the free range.
        (turns * core::f64::consts::TAU) as f32
    }

    pub(crate) const fn range_from_turns([least, most]: [f64; 2]) -> [f32; 2] {
        let tau = core::f64::consts::TAU;
        let (mut low, mut high) = (Self::angle_from_turns(least), Self::angle_from_turns(most));
        // The f32 nearest to π lies above it, and stands for it.
        if least > -0.5 && (low as f64) < least * tau {
            low = low.next_up();
        }
        if most < 0.5 && high as f64 > most * tau {
            high = high.next_down();
        }
        if low <= high { [low, high] } else { [Self::angle_from_turns(least); 2] }
    }

    /// How near to its middle an angle is sure to lie within: twice the bits of an `f32` in radians, 0 for never.
    pub(crate) const fn extent(_: [f32; 2], [least, most]: [f64; 2]) -> u32 {
        let near = (most - least) / 2.0 - SURE;
        if near > 0.0 { ((near * core::f64::consts::TAU) as f32).to_bits() << 1 } else { 0 }
    }

    pub(crate) const fn gain_from(us_per_turn: f64) -> f32 {
        (us_per_turn / core::f64::consts::TAU) as f32
    }

    pub(crate) const fn swing_from(turns_per_us: f64) -> f32 {
        (turns_per_us * core::f64::consts::TAU) as f32
    }

    pub(crate) const fn line_from(per_turn: f64, at_zero: f64) -> FloatLine {
        FloatLine { slope: (per_turn / core::f64::consts::TAU) as f32, start: (at_zero + 0.5) as f32 }
    }
}

/// An angle of less than three half-turns, in (−π, π].
const fn wrapped(angle: f32) -> f32 {
    if angle > PI {
        angle - TAU
    } else if angle <= -PI {
        // −π itself becomes π; what is left of rounding below −π is held there.
        let up = angle + TAU;
        if up > PI { PI } else { up }
    } else {
        angle
    }
}

/// An angle of more than a quarter turn, which legs seldom reach; 0 for zero vectors, and NaN for NaN.
#[cold]
#[inline(never)]
fn obtuse<M: FloatMaths>(across: f32, along: f32, square: f32) -> f32 {
    // No step, not even the square of one, is so small.
    let half = across / (square + along.abs() + f32::MIN_POSITIVE);
    if along < 0.0 { PI.copysign(across) - M::double_arc_tangent(half) } else { M::double_arc_tangent(half) }
}

/// No radius is less than so many steps: lengths are rounded to whole steps, towards zero, before their squares are formed,
/// which might make the norm of a vector of a few steps too small by half.
const HAIR: f32 = 4.0;

/// The root of a square, in [`STEPS_PER_ROOT`].
#[inline(always)]
fn root<M: FloatMaths>(square: Steps2) -> f32 {
    M::root_of_words((square.0 >> 32) as i32, square.0 as u32)
}

/// The root of the upper word alone, if the lower is 0, has this unit.
const STEPS_PER_ROOT: f32 = 65_536.0;

/// A coordinate as an integer of the exact squares.
#[inline(always)]
fn steps(coord: f32, scale: FloatScale) -> i64 {
    i64::from((coord * scale.steps_per_mm) as i32)
}

impl<M: FloatMaths> Number for Float<M> {
    type Length = f32;
    type Coord = f32;
    type Square = Steps2;
    type Ratio = f32;
    type Product = f32;
    type Angle = f32;
    type Scale = FloatScale;
    type Unit = f32;
    type Gain = f32;
    type Swing = f32;
    type Line = FloatLine;

    const NAME: &'static str = M::NAME;
    const NO_LENGTH: f32 = 0.0;
    const FARTHEST: f32 = f32::MAX;
    const NO_COORD: f32 = 0.0;
    const NO_SQUARE: Steps2 = Steps2(0);
    const NO_ANGLE: f32 = 0.0;
    const LEAST_ANGLE: f32 = -PI;
    const MOST_ANGLE: f32 = PI;

    fn scale_for(radius_mm: f64) -> Option<FloatScale> {
        Self::scale_for(radius_mm)
    }
    fn length_from_mm(mm: f64) -> f32 {
        Self::length_from_mm(mm)
    }
    fn coord_from_mm(mm: f64, scale: FloatScale) -> f32 {
        Self::coord_from_mm(mm, scale)
    }
    fn square_from_mm2(mm2: f64, scale: FloatScale) -> Steps2 {
        Self::square_from_mm2(mm2, scale)
    }
    fn cylinder_from_mm2(mm2: f64, scale: FloatScale) -> Steps2 {
        Self::cylinder_from_mm2(mm2, scale)
    }
    fn ratio_from(value: f64) -> f32 {
        Self::ratio_from(value)
    }
    fn product_from_mm(mm: f64, scale: FloatScale) -> f32 {
        Self::product_from_mm(mm, scale)
    }
    fn unit_from_mm(unit_mm: f64, scale: FloatScale) -> f32 {
        Self::unit_from_mm(unit_mm, scale)
    }
    fn angle_from_turns(turns: f64) -> f32 {
        Self::angle_from_turns(turns)
    }
    fn range_from_turns(range: [f64; 2]) -> [f32; 2] {
        Self::range_from_turns(range)
    }
    fn extent(ends: [f32; 2], turns: [f64; 2]) -> u32 {
        Self::extent(ends, turns)
    }
    fn gain_from(us_per_turn: f64) -> f32 {
        Self::gain_from(us_per_turn)
    }
    fn swing_from(turns_per_us: f64) -> f32 {
        Self::swing_from(turns_per_us)
    }
    fn line_from(per_turn: f64, at_zero: f64) -> FloatLine {
        Self::line_from(per_turn, at_zero)
    }

    /// Every foot passes: steps saturate and NaN gives none, sums of squares wrap, and no sum of three squares below
    /// 2^62 each that is not a square of the reach looks like one; NaN comes out as an angle.
    #[inline(always)]
    fn near(foot: [f32; 3], _: FloatScale) -> Option<[f32; 3]> {
        Some(foot)
    }

    fn place(foot: [f32; 3], scale: FloatScale) -> Placed<Self> {
        // A sphere about the reach: one comparison, which NaN and infinities fail.
        let [x, y, z] = foot;
        if x * x + (y * y + z * z) < scale.limit_square { Placed::Near(foot) } else { far(foot, scale) }
    }

    #[inline(always)]
    fn length(coord: f32, _: FloatScale) -> f32 {
        coord
    }

    fn mm(length: f32) -> f64 {
        f64::from(length)
    }

    fn turns(angle: f32) -> f64 {
        // The f32 nearest to π lies above it.
        (f64::from(angle) / core::f64::consts::TAU).clamp(-0.5, 0.5)
    }

    fn millidegrees(angle: f32) -> i32 {
        rounded(angle * (180_000.0 / PI))
    }

    fn micrometres(length: f32) -> i32 {
        rounded(length * 1000.0)
    }

    fn length_difference(a: f32, b: f32) -> f32 {
        a - b
    }

    #[inline(always)]
    fn length_difference_or_mirrored(a: f32, b: f32, mirrored: bool) -> f32 {
        let difference = a - b;
        if mirrored { -difference } else { difference }
    }

    #[inline(always)]
    fn square(coord: f32, scale: FloatScale) -> Steps2 {
        let steps = steps(coord, scale);
        Steps2(steps * steps)
    }

    #[inline(always)]
    fn root(square: Steps2, scale: FloatScale) -> f32 {
        root::<M>(square) * scale.mm_per_root
    }

    #[inline(always)]
    fn radial(radial_square: Steps2, offset: f32, scale: FloatScale) -> (f32, Steps2) {
        if radial_square.0 as u64 >= 1 << (2 * STEP_BITS + 1) {
            seldom();
            return (0.0, BEYOND_ANY_LEG);
        }
        // No less than a hair.
        let root = root::<M>(Steps2(radial_square.0 | (HAIR * HAIR) as i64));
        let radial = root * scale.mm_per_root;
        let whole = i64::from((root * STEPS_PER_ROOT) as i32);
        let inner = (offset * scale.steps_per_mm) as i32;
        let rest = radial_square.0 - whole * whole;
        // R = whole + rest / (2·whole) to second order, so (R − c)² = R² + c² − 2·c·whole − c·rest / whole.
        let share = (rest >> M::REST_BITS) as i32 as f32 * offset / radial;
        let correction = i64::from(share as i32) << M::REST_BITS;
        let inner_square = i64::from(inner) * i64::from(inner);
        let square = radial_square.0 + inner_square - correction - i64::from(2 * inner) * whole;
        (radial, Steps2(square))
    }

    #[inline(always)]
    fn stretch(coord: f32, ratio: f32) -> f32 {
        coord * ratio
    }

    #[inline(always)]
    fn widen(coord: f32) -> f32 {
        coord
    }

    /// From products: where a product costs no more than a sum, choosing costs more.
    #[inline(always)]
    fn turn([from_x, from_y]: [f32; 2], [to_x, to_y]: [f32; 2]) -> f32 {
        let across = from_x * to_y - from_y * to_x;
        let along = from_x * to_x + from_y * to_y;
        let square = from_x * from_x + from_y * from_y;
        // Sure to be positive, or else an obtuse angle, or a zero vector, or NaN, is looked at again.
        if along > 0.0 {
            M::double_arc_tangent(across / (square + along))
        } else {
            obtuse::<M>(across, along, square)
        }
    }

    #[inline(always)]
    fn yaw_angle([x, y]: [f32; 2], radial: f32) -> f32 {
        if y < 0.0 {
            seldom();
            PI.copysign(x) - M::double_arc_tangent(x / (radial - y))
        } else {
            M::double_arc_tangent(x / (radial + y))
        }
    }

    #[inline(always)]
    fn knee_angle(acute: f32, end: f32, sign: f32, _: bool) -> f32 {
        end - acute * sign
    }

    #[inline(always)]
    fn knee(n: Steps2, m: Steps2, unit: f32, _: FloatScale) -> Knee<Self> {
        // The smaller of n and m gives a half-angle of 45° at the most, whose sine is well known.
        let (less, folded) = if m < n {
            seldom();
            (m, true)
        } else {
            (n, false)
        };
        let sine = root::<M>(less) * unit;
        let square = sine * sine;
        let cosine = M::root(1.0 - square);
        let knee = M::double_arc_sine(sine, square, cosine);
        Knee { acute: knee, half_sine: sine * cosine, folded, from_end: square }
    }

    #[inline(always)]
    fn are_sound(a: f32, b: f32) -> bool {
        !(a + b).is_nan()
    }

    /// One comparison of integers: comparing floats twice takes the FPU's flags across twice.
    #[inline(always)]
    fn is_well_within(angle: f32, range: &Range<Self>) -> bool {
        // Shifted left, the bits are those of the size; NaN has more than any number.
        (angle - range.middle).to_bits() << 1 < range.extent
    }

    fn sin_cos(angle: f32) -> (f32, f32) {
        M::sin_cos(angle)
    }

    #[inline(always)]
    fn angle_sum(a: f32, b: f32) -> f32 {
        wrapped(a + b)
    }

    #[inline(always)]
    fn angle_difference(a: f32, b: f32) -> f32 {
        wrapped(a - b)
    }

    #[inline(always)]
    fn narrow(product: f32) -> f32 {
        product
    }

    fn rescale(v: f32, to: f32, from: f32) -> f32 {
        if from > 0.0 { v * (to / from) } else { 0.0 }
    }

    fn halve(coord: f32, times: u32) -> f32 {
        let mut half = coord;
        for _ in 0..times.min(256) {
            half *= 0.5;
        }
        half
    }

    fn distance(a: [f32; 3], b: [f32; 3]) -> f32 {
        let apart = |i: usize| (a[i] - b[i]).abs();
        let [x, y, z] = [apart(0), apart(1), apart(2)];
        // Scaled by the longest, so that no square overflows.
        let longest = x.max(y).max(z);
        if longest > 0.0 && longest <= f32::MAX {
            let [x, y, z] = [x / longest, y / longest, z / longest];
            (M::root(x * x + y * y + z * z) * longest).min(f32::MAX)
        } else if longest > 0.0 {
            f32::MAX
        } else {
            0.0
        }
    }

    #[inline(always)]
    fn travel(angle: f32, from: f32, gain: f32) -> i32 {
        ((angle - from) * gain * 65_536.0) as i32
    }

    #[inline(always)]
    fn swing_to(travel: i32, from: f32, swing: f32) -> f32 {
        (from + travel as f32 * (1.0 / 65_536.0) * swing).clamp(-PI, PI)
    }

    #[inline(always)]
    fn on_line(line: FloatLine, angle: f32) -> i32 {
        // Towards zero, so that what is below zero comes out below 1 as well.
        (line.slope * angle + line.start) as i32
    }
}

/// A foot beyond the working range, halved until it is within; or one that is not finite.
#[cold]
fn far<M: FloatMaths>(foot: [f32; 3], scale: FloatScale) -> Placed<Float<M>> {
    if !foot.iter().all(|v| v.is_finite()) {
        return Placed::NotFinite;
    }
    let mut point = foot;
    let mut times = 0;
    // By the longest coordinate: its square might overflow.
    while point.iter().any(|v| v.abs() * scale.steps_per_mm >= (1 << STEP_BITS) as f32) {
        point = point.map(|v| v * 0.5);
        times += 1;
    }
    Placed::Far(point, times)
}

/// The nearest integer; saturates.
fn rounded(v: f32) -> i32 {
    (if v < 0.0 { v - 0.5 } else { v + 0.5 }) as i32
}

#[cfg(all(test, feature = "float32"))]
mod tests {
    use super::*;

    #[test]
    fn the_ends_of_the_free_range_are_apart() {
        let ends = [-0.5, 0.5].map(Float::<polynomial_maths::Polynomials>::angle_from_turns);
        assert_eq!(ends, [-PI, PI]);
    }

    #[test]
    fn angles_wrap_into_one_turn() {
        for (angle, want) in [(PI, PI), (-PI, PI), (3.5, 3.5 - TAU), (-3.5, TAU - 3.5), (1.0, 1.0)] {
            assert_eq!(wrapped(angle), want);
        }
    }
}
