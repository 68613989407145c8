//! 32-bit fixed point for chips that multiply 32 bits by 32 into 32 and have neither a divider nor a count of leading
//! zeros (Cortex-M0 and M0+).
//!
//! Lengths and angles are those of [`Fixed32`](super::Fixed32): `fixed`'s `I16F16` mm and `I0F32` fractions of a turn.
//! Within the solver a length is an `i32` scaled by a power of two, so that the leg's radius comes to 2.2·10^8 to
//! 4.4·10^8; a square keeps the upper bits of it, down to 2^-27 of the radius's or less, and a product is put together
//! from its halves ([`halves`]). Nothing here divides, multiplies into 64 bits or shifts by more than 31 on the way of a
//! foot in reach.
//!
//! A square rounded to 2^-28 of the radius's takes a straight knee up to 4e-4 rad off, a folded one 9e-4; the foot does not feel it.

mod bow;
mod half_angle;
mod halves;
mod knee;
mod root;

use super::line::FixedLine;
use super::narrow::normal;
use super::{Knee, Number, Placed, rhombus, series};
use crate::const_math::{inward, nearest, nearest_i32, power_of_two};
use crate::limits::Range;
use fixed::types::{I0F32, I16F16};
use halves::{Halves, product, square, times, upper};

/// 32-bit fixed point without long multiplication or division.
///
/// | | |
/// | --- | --- |
/// | length | `fixed::types::I16F16`, mm |
/// | angle | `fixed::types::I0F32`, turns; ±180° saturates just inside |
/// | its primitives | a turn within 1.1e-6 rad, a knee within 4.8e-7, sine and cosine within 1.1e-8 |
/// | largest joint error | 1.2e-6 rad on the demo legs, with knee from 0.1 to 2.6 rad and the foot clear of the hip's axis; nearer to an end see [`leg`](crate::leg); up to 9e-6 rad on legs whose offset is longer than their links |
/// | largest foot error | 1e-6 of thigh and shank together on the demo legs, straight and folded ones included; up to 1.7e-6 where the offset is longer |
/// | legs | reach from 1 mm to 6 683 mm |
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Short32;

/// What turns lengths into coordinates.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct ShortScale {
    /// Coordinates are `I16F16` bits shifted left.
    shift: u32,
    /// 2^shift.
    factor: i32,
    /// `I16F16` bits of the working range lie within ± this.
    limit: u32,
}

/// The reciprocal of a length unit: 2^(57 + shift) over it, from 2^31 to 2^32.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct ShortUnit {
    reciprocal: u32,
    shift: u32,
}

impl ShortScale {
    /// Units of a coordinate in a millimetre.
    const fn units_per_mm(self) -> f64 {
        power_of_two(LENGTH_BITS + self.shift as i32)
    }
}

/// Fraction bits of `I16F16`.
const LENGTH_BITS: i32 = 16;
/// Coordinates of the working range lie within this: three squares of it, of which each lacks 2^28, stay below 2^31, so
/// that no difference of them overflows.
const COORD_LIMIT: f64 = 438_000_000.0;
/// What a square lacks of the product of a coordinate with itself.
const SQUARE_DROP: i32 = 28;
/// Sums of two coordinates below this may be nothing but rounding.
const LEAST_SUM: u32 = 1 << 20;
/// Fraction bits of a ratio.
const RATIO_BITS: u32 = 30;
/// Fraction bits of the angle per pulse.
const SWING_BITS: u32 = 20;

impl Short32 {
    pub(crate) const fn scale_for(radius_mm: f64) -> Option<ShortScale> {
        // Negated so that NaN is refused.
        if !(radius_mm >= 1.0 && radius_mm <= 6_683.0) {
            return None;
        }
        let mut shift = 0;
        while radius_mm * power_of_two(LENGTH_BITS + shift + 1) < COORD_LIMIT {
            shift += 1;
        }
        Some(ShortScale { shift: shift as u32, factor: 1 << shift, limit: (COORD_LIMIT as u32) >> shift })
    }

    pub(crate) const fn coord_from_mm(mm: f64, scale: ShortScale) -> i32 {
        nearest_i32(mm * scale.units_per_mm())
    }

    pub(crate) const fn square_from_mm2(mm2: f64, scale: ShortScale) -> i32 {
        nearest_i32(mm2 * scale.units_per_mm() * scale.units_per_mm() * power_of_two(-SQUARE_DROP))
    }

    pub(crate) const fn cylinder_from_mm2(mm2: f64, scale: ShortScale) -> i32 {
        // Squares of halves are up to two too small each: a foot on the cylinder is none within.
        Self::square_from_mm2(mm2, scale) - 4
    }

    pub(crate) const fn ratio_from(value: f64) -> i32 {
        nearest_i32(value * power_of_two(RATIO_BITS as i32))
    }

    pub(crate) const fn product_from_mm(mm: f64, scale: ShortScale) -> i32 {
        Self::coord_from_mm(mm, scale)
    }

    pub(crate) const fn unit_from_mm(unit_mm: f64, scale: ShortScale) -> ShortUnit {
        // A leg within proportion has its unit between 2^25 and 2^29.
        let unit = unit_mm * scale.units_per_mm();
        let mut shift = 0;
        while shift < 15 && power_of_two(58 + shift) <= (u32::MAX as f64) * unit {
            shift += 1;
        }
        ShortUnit { reciprocal: nearest(power_of_two(57 + shift) / unit) as u32, shift: shift as u32 }
    }

    pub(crate) const fn length_from_mm(mm: f64) -> I16F16 {
        I16F16::from_bits(nearest_i32(mm * power_of_two(LENGTH_BITS)))
    }

    pub(crate) const fn angle_from_turns(turns: f64) -> I0F32 {
        I0F32::from_bits(nearest_i32(turns * power_of_two(32)))
    }

    pub(crate) const fn range_from_turns([least, most]: [f64; 2]) -> [I0F32; 2] {
        let [low, high] = inward(least * power_of_two(32), most * power_of_two(32));
        [I0F32::from_bits(low), I0F32::from_bits(high)]
    }

    /// In steps of an angle.
    pub(crate) const fn extent([least, most]: [I0F32; 2], _: [f64; 2]) -> u32 {
        most.to_bits().wrapping_sub(least.to_bits()) as u32
    }

    pub(crate) const fn gain_from(us_per_turn: f64) -> i32 {
        nearest_i32(us_per_turn * power_of_two(LENGTH_BITS))
    }

    pub(crate) const fn swing_from(turns_per_us: f64) -> i32 {
        nearest_i32(turns_per_us * power_of_two(32 - LENGTH_BITS + SWING_BITS as i32))
    }

    pub(crate) const fn line_from(per_turn: f64, at_zero: f64) -> FixedLine {
        FixedLine::from(per_turn, at_zero).for_halves()
    }
}

/// The integer nearest to `value` that an `i32` holds.
const fn saturated(value: i64) -> i32 {
    if value > i32::MAX as i64 {
        i32::MAX
    } else if value < i32::MIN as i64 {
        i32::MIN
    } else {
        value as i32
    }
}

/// Squares of a radius or depth that are less than this are worked out anew from what they came of.
const LEAST_SQUARE: i32 = 1 << 16;

/// 2·arctan(rise / run) in 2^-32 turn, for rise ≤ run.
#[inline(always)]
fn double_angle(rise: u32, run: u32) -> i32 {
    half_angle::double_angle(rise, run) as i32
}

/// An angle as seen from the opposite direction.
#[cold]
#[inline(never)]
fn from_behind(size: i32) -> i32 {
    i32::MAX - size
}

/// √(y² + z² − offset²) of a square that is too coarse.
#[cold]
#[inline(never)]
fn little_depth([y, z]: [i32; 2], offset: i32) -> i32 {
    let exact = |v: i32| i64::from(v) * i64::from(v);
    root_of_exact(exact(y) + exact(z) - exact(offset))
}

/// The root of a sum of squares of coordinates; 0 below 0.
fn root_of_exact(square: i64) -> i32 {
    let square = square.max(0) as u64;
    let up = square.leading_zeros() & 62;
    if square == 0 { 0 } else { (root::root(((square << up) >> 32) as u32) >> (up / 2)) as i32 }
}

/// √(4^-14 · `square`): what a coordinate is to a square.
#[inline(always)]
fn root_of(square: u32) -> i32 {
    let (value, fours) = normal::by_fours(square);
    (root::root(value) >> ((2 + fours) & 31)) as i32
}

impl Number for Short32 {
    type Length = I16F16;
    type Coord = i32;
    type Square = i32;
    type Ratio = i32;
    type Product = i32;
    type Angle = I0F32;
    type Scale = ShortScale;
    type Unit = ShortUnit;
    type Gain = i32;
    type Swing = i32;
    type Line = FixedLine;

    const NAME: &'static str = "short32";
    const NO_LENGTH: I16F16 = I16F16::ZERO;
    const FARTHEST: I16F16 = I16F16::MAX;
    const NO_COORD: i32 = 0;
    const NO_SQUARE: i32 = 0;
    const NO_ANGLE: I0F32 = I0F32::ZERO;
    const LEAST_ANGLE: I0F32 = I0F32::MIN;
    const MOST_ANGLE: I0F32 = I0F32::MAX;

    fn scale_for(radius_mm: f64) -> Option<ShortScale> {
        Short32::scale_for(radius_mm)
    }
    fn length_from_mm(mm: f64) -> I16F16 {
        Short32::length_from_mm(mm)
    }
    fn coord_from_mm(mm: f64, scale: ShortScale) -> i32 {
        Short32::coord_from_mm(mm, scale)
    }
    fn square_from_mm2(mm2: f64, scale: ShortScale) -> i32 {
        Short32::square_from_mm2(mm2, scale)
    }
    fn cylinder_from_mm2(mm2: f64, scale: ShortScale) -> i32 {
        Short32::cylinder_from_mm2(mm2, scale)
    }
    fn ratio_from(value: f64) -> i32 {
        Short32::ratio_from(value)
    }
    fn product_from_mm(mm: f64, scale: ShortScale) -> i32 {
        Short32::product_from_mm(mm, scale)
    }
    fn unit_from_mm(unit_mm: f64, scale: ShortScale) -> ShortUnit {
        Short32::unit_from_mm(unit_mm, scale)
    }
    fn angle_from_turns(turns: f64) -> I0F32 {
        Short32::angle_from_turns(turns)
    }
    fn range_from_turns(range: [f64; 2]) -> [I0F32; 2] {
        Short32::range_from_turns(range)
    }
    fn extent(ends: [I0F32; 2], turns: [f64; 2]) -> u32 {
        Short32::extent(ends, turns)
    }
    fn gain_from(us_per_turn: f64) -> i32 {
        Short32::gain_from(us_per_turn)
    }
    fn swing_from(turns_per_us: f64) -> i32 {
        Short32::swing_from(turns_per_us)
    }
    fn line_from(per_turn: f64, at_zero: f64) -> FixedLine {
        Short32::line_from(per_turn, at_zero)
    }

    #[inline(always)]
    fn near(foot: [I16F16; 3], scale: ShortScale) -> Option<[i32; 3]> {
        let [x, y, z] = foot.map(I16F16::to_bits);
        let within = |v: i32| (v as u32).wrapping_add(scale.limit) <= 2 * scale.limit;
        if within(x) && within(y) && within(z) {
            Some([x, y, z].map(|v| v.wrapping_mul(scale.factor)))
        } else {
            None
        }
    }

    fn place(foot: [I16F16; 3], scale: ShortScale) -> Placed<Self> {
        match Self::near(foot, scale) {
            Some(point) => Placed::Near(point),
            None => far(foot.map(I16F16::to_bits), scale),
        }
    }

    fn length(coord: i32, scale: ShortScale) -> I16F16 {
        let rounded = if scale.shift == 0 { coord } else { ((coord >> ((scale.shift - 1) & 31)) + 1) >> 1 };
        I16F16::from_bits(rounded)
    }

    fn mm(length: I16F16) -> f64 {
        f64::from(length.to_bits()) / 65_536.0
    }

    fn turns(angle: I0F32) -> f64 {
        f64::from(angle.to_bits()) / 4_294_967_296.0
    }

    fn millidegrees(angle: I0F32) -> i32 {
        ((i64::from(angle.to_bits()) * 360_000 + (1 << 31)) >> 32) as i32
    }

    fn micrometres(length: I16F16) -> i32 {
        ((i64::from(length.to_bits()) * 1000 + (1 << 15)) >> 16) as i32
    }

    fn length_difference(a: I16F16, b: I16F16) -> I16F16 {
        a.saturating_sub(b)
    }

    #[inline(always)]
    fn square(coord: i32, _: ShortScale) -> i32 {
        square(coord)
    }

    #[inline(always)]
    fn root(square: i32, _: ShortScale) -> i32 {
        root_of(square.max(0) as u32)
    }

    #[inline(always)]
    fn depth([y, z]: [i32; 2], offset: i32, depth_square: i32, scale: ShortScale) -> i32 {
        if depth_square < LEAST_SQUARE {
            little_depth([y, z], offset)
        } else {
            Self::root(depth_square, scale)
        }
    }

    #[inline(always)]
    fn radial_of([x, y]: [i32; 2], radial_square: i32, offset: i32, scale: ShortScale) -> (i32, i32) {
        if radial_square < LEAST_SQUARE {
            let radial = little_depth([x, y], 0);
            (radial, square(radial - offset))
        } else {
            Self::radial(radial_square, offset, scale)
        }
    }

    #[inline(always)]
    fn radial(radial_square: i32, offset: i32, _: ShortScale) -> (i32, i32) {
        let radial = root_of(radial_square as u32);
        // (R − c)² = R² − c·(2·R − c): the error of the root counts c/R times.
        let less = product(Halves::of(offset), Halves::of(radial.wrapping_mul(2).wrapping_sub(offset)));
        (radial, radial_square.wrapping_sub(less.wrapping_mul(1 << (halves::DROP - SQUARE_DROP))))
    }

    #[inline(always)]
    fn stretch(coord: i32, ratio: i32) -> i32 {
        product(Halves::of(coord), Halves::of(ratio))
    }

    #[inline(always)]
    fn widen(coord: i32) -> i32 {
        coord
    }

    #[inline(always)]
    fn turn(from: [i32; 2], to: [i32; 2]) -> I0F32 {
        let angles = rhombus::Angles { double_angle, half_turn: [i32::MAX; 2] };
        I0F32::from_bits(rhombus::turn(from, to, angles, LEAST_SUM))
    }

    #[inline(always)]
    fn yaw_angle([x, y]: [i32; 2], radial: i32) -> I0F32 {
        let run = (radial as u32).wrapping_add(y.unsigned_abs());
        // Rounding may leave |x| a step above.
        let mut size = double_angle(x.unsigned_abs().min(run), run);
        if y < 0 {
            size = from_behind(size);
        }
        I0F32::from_bits(rhombus::signed(size, x))
    }

    #[inline(always)]
    fn knee(n: i32, m: i32, unit: ShortUnit, _: ShortScale) -> Knee<Self> {
        // The smaller of n and m gives a half-angle of 45° at the most, whose sine is well known.
        let folded = m < n;
        let least = if folded { m } else { n };
        // It is half of a square of the reach at the most, so two bits are free.
        let (value, fours) = normal::by_fours((least as u32) << 2);
        let sine = upper(root::root(value), unit.reciprocal) >> ((unit.shift + fours) & 31);
        let (knee, half_sine, from_end) = knee::of_half_sine(sine);
        Knee { acute: I0F32::from_bits(knee as i32), half_sine, folded, from_end }
    }

    #[inline(always)]
    fn is_well_within(angle: I0F32, range: &Range<Self>) -> bool {
        // Below the least, this wraps far above.
        angle.to_bits().wrapping_sub(range.least.0.to_bits()) as u32 <= range.extent
    }

    #[inline(never)]
    fn sin_cos(angle: I0F32) -> (i32, i32) {
        const { assert!(series::BITS == RATIO_BITS) };
        series::sin_cos(angle.to_bits(), times)
    }

    #[inline(always)]
    fn angle_sum(a: I0F32, b: I0F32) -> I0F32 {
        a.wrapping_add(b)
    }

    #[inline(always)]
    fn angle_difference(a: I0F32, b: I0F32) -> I0F32 {
        a.wrapping_sub(b)
    }

    #[inline(always)]
    fn narrow(product: i32) -> i32 {
        product
    }

    fn enlarged(vector: [i32; 3]) -> [i32; 3] {
        let [x, y, z] = vector;
        let longest = x.unsigned_abs().max(y.unsigned_abs()).max(z.unsigned_abs());
        if longest >= 1 << 28 {
            // So that three squares add up, whatever they are.
            return vector.map(|v| v >> 2);
        }
        let (mut vector, mut left) = (vector, if longest == 0 { 0 } else { 28 });
        while left > 0 && longest << (28 - left) < 1 << 27 {
            vector = vector.map(|v| v << 1);
            left -= 1;
        }
        vector
    }

    #[inline(never)]
    fn rescale(v: i32, to: i32, from: i32) -> i32 {
        let size = quotient(u64::from(v.unsigned_abs()) * u64::from(to.unsigned_abs()), from.unsigned_abs());
        let size = size.min(i32::MAX as u32) as i32;
        if v < 0 { -size } else { size }
    }

    fn halve(coord: i32, times: u32) -> i32 {
        coord >> times.min(31)
    }

    fn distance(a: [I16F16; 3], b: [I16F16; 3]) -> I16F16 {
        let mut apart = [0u32; 3];
        for ((apart, a), b) in apart.iter_mut().zip(a).zip(b) {
            *apart = a.to_bits().abs_diff(b.to_bits());
        }
        let all = apart.iter().fold(0, |all, v| all | v);
        // The longest has 29 bits: its square has 30, and three of them 32.
        let (up, down) =
            (all.leading_zeros().saturating_sub(3) & 31, 3u32.saturating_sub(all.leading_zeros()));
        let sum =
            apart.iter().fold(0u32, |sum, v| sum.wrapping_add(square(((v << up) >> down) as i32) as u32));
        let steps = (root_of(sum) >> up) as u32;
        // Cut off at the largest length before it is shifted up again.
        I16F16::from_bits(if steps > i32::MAX as u32 >> down { i32::MAX } else { (steps << down) as i32 })
    }

    #[inline(always)]
    fn travel(angle: I0F32, from: I0F32, gain: i32) -> i32 {
        let swing = i64::from(angle.to_bits()) - i64::from(from.to_bits());
        saturated((swing * i64::from(gain) + (1 << 31)) >> 32)
    }

    #[inline(always)]
    fn swing_to(travel: i32, from: I0F32, swing: i32) -> I0F32 {
        let turned = (i64::from(travel) * i64::from(swing) + (1 << (SWING_BITS - 1))) >> SWING_BITS;
        I0F32::from_bits(saturated(i64::from(from.to_bits()) + turned))
    }

    #[inline(always)]
    fn on_line(line: FixedLine, angle: I0F32) -> i32 {
        line.at_halves(angle.to_bits())
    }
}

/// a/b by long division, rounded down; all ones if it is too large. Only for feet out of reach.
fn quotient(a: u64, b: u32) -> u32 {
    let (mut rest, mut low) = (a >> 32, a as u32);
    if rest >= u64::from(b) {
        return u32::MAX;
    }
    let mut quotient = 0;
    for _ in 0..32 {
        rest = (rest << 1) | u64::from(low >> 31);
        low <<= 1;
        quotient <<= 1;
        if rest >= u64::from(b) {
            rest -= u64::from(b);
            quotient |= 1;
        }
    }
    quotient
}

/// A foot beyond the working range, halved until it is within.
#[cold]
fn far(bits: [i32; 3], scale: ShortScale) -> Placed<Short32> {
    let mut point = bits;
    let mut times = 0;
    while times < 31 && point.iter().any(|v| v.unsigned_abs() > scale.limit) {
        point = point.map(|v| v >> 1);
        times += 1;
    }
    Placed::Far(point.map(|v| v.wrapping_mul(scale.factor)), times)
}
