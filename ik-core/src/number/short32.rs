//! 32-bit fixed point for chips that multiply 32 bits by 32 into 32 and have neither a divider nor a count of leading
//! zeros (Cortex-M0 and M0+).
//!
//! Lengths and angles are those of [`Fixed32`](super::Fixed32): `fixed`'s `I16F16` mm and `I0F32` fractions of a turn.
//! Within the solver a length is an `i32` scaled by a power of two, so that the leg's radius comes to 2.2·10^8 to
//! 4.4·10^8; a square keeps the upper bits of it, down to 2^-27 of the radius's or less, and a product is put together
//! from its halves ([`halves`]). Nothing here divides, multiplies into 64 bits or shifts by more than 31 on the way of a
//! foot in reach.
//!
//! A square rounded to 2^-28 of the radius's takes a straight knee 2e-4 rad off; the foot does not feel it.

mod bow;
mod half_angle;
mod halves;
mod knee;
mod root;

use super::line::FixedLine;
use super::narrow::normal;
use super::{Knee, Number, Placed, series};
use crate::const_math::{inward, nearest, nearest_i32, power_of_two};
use crate::limits::Range;
use fixed::types::{I0F32, I16F16};
use halves::{Halves, difference_of_products, product, square, sum_of_products, times, upper};

/// 32-bit fixed point without long multiplication or division.
///
/// | | |
/// | --- | --- |
/// | length | `fixed::types::I16F16`, mm |
/// | angle | `fixed::types::I0F32`, turns; ±180° saturates just inside |
/// | largest joint error | see the survey of your own leg; below 1.5e-6 rad on the demo legs, with knee from 0.1 to 2.6 rad and the foot clear of the hip's axis; up to 9e-6 rad on legs whose offset is longer than their links |
/// | largest foot error | below 9e-7 of thigh and shank together on the demo legs; up to 1.7e-6 where the offset is longer |
/// | legs | reach from 1 mm to 6 683 mm |
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Short32;

/// What turns lengths into coordinates, and how fine the ratios of the triangle are.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct ShortScale {
    /// Coordinates are `I16F16` bits shifted left.
    shift: u32,
    /// 2^shift.
    factor: i32,
    /// `I16F16` bits of the working range lie within ± this.
    limit: u32,
    /// 30 less the fraction bits of the ratios of the triangle.
    drop: u32,
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
/// Bits of a ratio of the triangle at the most.
const LEAN_BITS: i32 = 29;
/// What a square lacks of the product of a coordinate with itself.
const SQUARE_DROP: i32 = 28;
/// What a product of a coordinate and another or a ratio lacks.
const PRODUCT_DROP: i32 = 30;
/// Fraction bits of a sine or cosine.
const RATIO_BITS: u32 = 29;
/// Fraction bits of the angle per pulse.
const SWING_BITS: u32 = 20;

impl Short32 {
    /// For links of 8:1.
    pub(crate) const fn scale_for(radius_mm: f64) -> Option<ShortScale> {
        Self::scale_for_links(radius_mm, 4.5 * radius_mm, 4.5)
    }

    pub(crate) const fn scale_for_links(radius_mm: f64, _: f64, lean: f64) -> Option<ShortScale> {
        // Negated so that NaN is refused.
        if !(radius_mm >= 1.0 && radius_mm <= 6_683.0) {
            return None;
        }
        let mut shift = 0;
        while radius_mm * power_of_two(LENGTH_BITS + shift + 1) < COORD_LIMIT {
            shift += 1;
        }
        // The largest ratio of the triangle has 29 bits, as a coordinate has.
        let mut drop = 1;
        while drop < 4 && lean * power_of_two(30 - drop) > power_of_two(LEAN_BITS) {
            drop += 1;
        }
        Some(ShortScale {
            shift: shift as u32,
            factor: 1 << shift,
            limit: (COORD_LIMIT as u32) >> shift,
            drop: drop as u32,
        })
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

    pub(crate) const fn lean_from(value: f64, scale: ShortScale) -> i32 {
        nearest_i32(value * power_of_two(30 - scale.drop as i32))
    }

    pub(crate) const fn product_from_mm(mm: f64, scale: ShortScale) -> i32 {
        nearest_i32(mm * scale.units_per_mm() * power_of_two(30 - scale.drop as i32 - PRODUCT_DROP))
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

/// Norms, and squares of a radius or depth, that are less than this of 2^30 are worked out anew from what they came of.
const LEAST_NORM_BITS: u32 = 23;
const LEAST_SQUARE: i32 = 1 << 16;

/// Whether a norm is so small that what was cut off from it tells; 0 and below, which the square of next to nothing may come
/// out as, are.
#[inline(always)]
const fn is_little(norm: i32) -> bool {
    norm >> LEAST_NORM_BITS <= 0
}

/// The angle with 2·arctan(|y| / run), in the quadrant of (x, y).
#[inline(always)]
fn quadrant(y: i32, x: i32, run: u32) -> I0F32 {
    let rise = y.unsigned_abs();
    let mut size = half_angle::double_angle(rise, run) as i32;
    if x < 0 {
        size = from_behind(size);
    }
    // By the sign's mask: with a branch, all of the above would be there twice.
    let sign = y >> 31;
    I0F32::from_bits((size ^ sign).wrapping_sub(sign))
}

/// An angle as seen from the opposite direction.
#[cold]
#[inline(never)]
fn from_behind(size: i32) -> i32 {
    i32::MAX - size
}

/// How often a coordinate can be doubled until it has 28 bits; 0 for 0.
fn spare(longest: u32) -> u32 {
    if longest == 0 { 0 } else { longest.leading_zeros().saturating_sub(4) & 31 }
}

/// The angle of a short vector that is known exactly.
#[cold]
#[inline(never)]
fn angle_of_short(y: i32, x: i32) -> I0F32 {
    let spare = spare(y.unsigned_abs().max(x.unsigned_abs()));
    let (y, x) = (y << spare, x << spare);
    let norm = root_of(square(y).wrapping_add(square(x)) as u32);
    quadrant(y, x, (norm as u32).wrapping_add(x.unsigned_abs()))
}

/// The hip of a foot near its axis.
#[cold]
#[inline(never)]
fn hip_angle_near_the_axis([y, z]: [i32; 2], offset: i32, depth: i32) -> I0F32 {
    // Offset and depth are no longer than the vector (y, z), but for rounding.
    let spare = spare(y.unsigned_abs().max(z.unsigned_abs()).max(offset as u32).max(depth as u32));
    let [y, z, offset, depth] = [y, z, offset, depth].map(|v| v << spare);
    let norm = square(y).wrapping_add(square(z)) >> (PRODUCT_DROP - SQUARE_DROP);
    let [hy, hz, offset, depth] = [y, z, offset, depth].map(Halves::of);
    let (rise, along) =
        (sum_of_products(hz, offset, hy, depth), difference_of_products(hy, offset, hz, depth));
    quadrant(rise, along, (norm as u32).wrapping_add(along.unsigned_abs()))
}

/// The thigh of a foot near its joint.
#[cold]
#[inline(never)]
fn thigh_angle_near_its_joint(along: i32, across: i32, [p, q]: [i32; 2], norm: i32) -> I0F32 {
    let spare = spare(along.unsigned_abs().max(across.unsigned_abs()));
    // The norm lies below 2^23: so much room there is at least.
    let norm = (norm as u32) << spare.min(6);
    let [along, across] = [along, across].map(|v| Halves::of(v << spare.min(6)));
    let (p, q) = (Halves::of(p), Halves::of(q));
    let (rise, straight) =
        (sum_of_products(across, p, along, q), difference_of_products(along, p, across, q));
    quadrant(rise, straight, norm.wrapping_add(straight.unsigned_abs()))
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
    fn scale_for_links(radius_mm: f64, norm_mm: f64, lean: f64) -> Option<ShortScale> {
        Short32::scale_for_links(radius_mm, norm_mm, lean)
    }
    fn lean_from(value: f64, scale: ShortScale) -> i32 {
        Short32::lean_from(value, scale)
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
        (radial, radial_square.wrapping_sub(less.wrapping_mul(1 << (PRODUCT_DROP - SQUARE_DROP))))
    }

    #[inline(always)]
    fn area(a: i32, b: i32) -> i32 {
        product(Halves::of(a), Halves::of(b))
    }

    #[inline(always)]
    fn stretch(coord: i32, ratio: i32) -> i32 {
        product(Halves::of(coord), Halves::of(ratio))
    }

    /// Of a coordinate alone, in its own unit: products of one vector are of one sort.
    #[inline(always)]
    fn widen(coord: i32) -> i32 {
        coord
    }

    #[inline(always)]
    fn angle(y: i32, x: i32, norm: i32) -> I0F32 {
        if is_little(norm) {
            return angle_of_short(y, x);
        }
        quadrant(y, x, (norm as u32).wrapping_add(x.unsigned_abs()))
    }

    #[inline(always)]
    fn hip_angle([y, z]: [i32; 2], offset: i32, depth: i32) -> I0F32 {
        let norm = square(y).wrapping_add(square(z)) >> (PRODUCT_DROP - SQUARE_DROP);
        if is_little(norm) {
            return hip_angle_near_the_axis([y, z], offset, depth);
        }
        let [y, z, offset, depth] = [y, z, offset, depth].map(Halves::of);
        let along = difference_of_products(y, offset, z, depth);
        quadrant(
            sum_of_products(z, offset, y, depth),
            along,
            (norm as u32).wrapping_add(along.unsigned_abs()),
        )
    }

    #[inline(always)]
    fn thigh_angle(along: i32, across: i32, [p, q]: [i32; 2], norm: i32) -> I0F32 {
        if is_little(norm) {
            return thigh_angle_near_its_joint(along, across, [p, q], norm);
        }
        let [along, across, p, q] = [along, across, p, q].map(Halves::of);
        let straight = difference_of_products(along, p, across, q);
        quadrant(
            sum_of_products(across, p, along, q),
            straight,
            (norm as u32).wrapping_add(straight.unsigned_abs()),
        )
    }

    #[inline(always)]
    fn knee(n: i32, m: i32, unit: ShortUnit, scale: ShortScale) -> Knee<Self> {
        // The smaller of n and m gives a half-angle of 45° at the most, whose sine is well known.
        let folded = m < n;
        let least = if folded { m } else { n };
        // It is half of a square of the reach at the most, so two bits are free.
        let (value, fours) = normal::by_fours((least as u32) << 2);
        let sine = upper(root::root(value), unit.reciprocal) >> ((unit.shift + fours) & 31);
        let (knee, half_sine, from_end) = knee::of_half_sine(sine, scale.drop & 3);
        Knee { acute: I0F32::from_bits(knee as i32), half_sine, folded, from_end }
    }

    #[inline(always)]
    fn is_well_within(angle: I0F32, range: &Range<Self>) -> bool {
        // Below the least, this wraps far above.
        angle.to_bits().wrapping_sub(range.least.0.to_bits()) as u32 <= range.extent
    }

    #[inline(never)]
    fn sin_cos(angle: I0F32) -> (i32, i32) {
        let (sine, cosine) = series::sin_cos(angle.to_bits(), times);
        (sine >> (series::BITS - RATIO_BITS), cosine >> (series::BITS - RATIO_BITS))
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
        product.wrapping_mul(1 << (PRODUCT_DROP - RATIO_BITS as i32))
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
