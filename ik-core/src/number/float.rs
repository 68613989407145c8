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

use super::{Knee, Number, Placed};
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
/// | largest joint error | see the survey of your own leg; below 1e-6 rad away from the hip axis |
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
    /// √v for v ≥ 0.
    fn root(v: f32) -> f32;
    /// 2·arctan t for |t| ≤ 1.
    fn double_arc_tangent(t: f32) -> f32;
    /// 4·arctan t for 0 ≤ t ≤ tan 22.5°.
    fn quadruple_arc_tangent(t: f32) -> f32;
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
    /// Its reciprocal.
    mm_per_step: f32,
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

/// Bits of the integers whose squares are exact.
const STEP_BITS: i32 = 30;

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
            mm_per_step: power_of_two(exponent - STEP_BITS) as f32,
            limit_square: power_of_two(2 * exponent) as f32,
        })
    }

    pub(crate) const fn scale_for_links(radius_mm: f64, _: f64) -> Option<FloatScale> {
        Self::scale_for(radius_mm)
    }

    pub(crate) const fn coord_from_mm(mm: f64, _: FloatScale) -> f32 {
        mm as f32
    }

    pub(crate) const fn square_from_mm2(mm2: f64, scale: FloatScale) -> Steps2 {
        Steps2(nearest(mm2 * scale.steps_per_mm as f64 * scale.steps_per_mm as f64))
    }

    pub(crate) const fn ratio_from(value: f64) -> f32 {
        value as f32
    }

    pub(crate) const fn lean_from(value: f64, _: FloatScale) -> f32 {
        Self::ratio_from(value)
    }

    pub(crate) const fn product_from_mm(mm: f64, _: FloatScale) -> f32 {
        mm as f32
    }

    pub(crate) const fn unit_from_mm(unit_mm: f64, _: FloatScale) -> f32 {
        (1.0 / unit_mm) as f32
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

/// The angle whose cosine is the negative of another's, on the same side: ±π − angle. Legs seldom reach that way.
#[cold]
#[inline(never)]
fn obtuse(acute: f32) -> f32 {
    PI.copysign(acute) - acute
}

/// An integer as a float, within one unit in the last place; without the library call that exact rounding would take.
#[inline(always)]
fn nearly(square: Steps2) -> f32 {
    ((square.0 >> 32) as i32) as f32 * 4_294_967_296.0 + (square.0 as u32) as f32
}

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
        M::root(nearly(square)) * scale.mm_per_step
    }

    #[inline(always)]
    fn beyond(radial_square: Steps2, offset: f32, scale: FloatScale) -> (f32, Steps2) {
        let radial = M::root(nearly(radial_square));
        let (whole, inner) = (radial as i64, (offset * scale.steps_per_mm) as i64);
        let rest = radial_square.0.wrapping_sub(whole.wrapping_mul(whole));
        // R = whole + rest / (2·whole) to second order, so (R − c)² = (whole − c)² + rest − c·rest / whole.
        let correction = if whole > 0 { inner as f32 * rest as f32 / radial } else { 0.0 };
        let along = whole - inner;
        let square = along.wrapping_mul(along).wrapping_add(rest).wrapping_sub(correction as i64);
        (radial * scale.mm_per_step - offset, Steps2(square))
    }

    #[inline(always)]
    fn area(a: f32, b: f32) -> f32 {
        a * b
    }

    #[inline(always)]
    fn stretch(coord: f32, ratio: f32) -> f32 {
        coord * ratio
    }

    #[inline(always)]
    fn widen(coord: f32) -> f32 {
        coord
    }

    #[inline(always)]
    fn angle(y: f32, x: f32, norm: f32) -> f32 {
        // A hair, so that the zero vector has an angle: 0. Rounding may leave |y| a last bit above the norm, which costs
        // no more than that bit.
        let acute = M::double_arc_tangent((y / (norm + x.abs() + f32::MIN_POSITIVE)).clamp(-1.0, 1.0));
        if x < 0.0 { obtuse(acute) } else { acute }
    }

    #[inline(always)]
    fn knee(n: Steps2, m: Steps2, unit: f32, scale: FloatScale) -> Knee<Self> {
        // The smaller of n and m gives a half-angle of 45° at the most, whose sine is well known.
        let folded = m < n;
        let sine = Self::root(if folded { m } else { n }, scale) * unit;
        let square = sine * sine;
        let cosine = M::root(1.0 - square);
        // 2·arctan(s / (1 + c)) is half the knee.
        let knee = M::quadruple_arc_tangent(sine / (1.0 + cosine));
        Knee {
            angle: if folded { PI - knee } else { knee },
            half_sine: sine * cosine,
            folded,
            from_end: square,
        }
    }

    #[inline(always)]
    fn are_sound(a: f32, b: f32) -> bool {
        !(a + b).is_nan()
    }

    /// One comparison of integers: comparing floats twice takes the FPU's flags across twice.
    #[inline(always)]
    fn is_well_within(angle: f32, range: &Range<Self>) -> bool {
        // Shifted left, the bits are those of the size; NaN has more than any number.
        (angle - range.middle).to_bits() << 1 < range.near
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
