//! 32-bit fixed point: for chips without an FPU.
//!
//! Lengths are `fixed`'s `I16F16` mm (±32 768 mm in steps of 15 nm), angles `I0F32` fractions of a turn, which
//! wrap for free. Within the solver a length is an `i32` scaled by a power of two so that the leg's reach fills
//! 30 bits; scaling is a shift, so nothing is lost, and squares and their sums are exact in `i64`.

mod arctangent;
mod expansion;
mod knee;
mod root;
mod sine;

use super::line::FixedLine;
use super::{Knee, Number, Placed, rhombus, seldom};
use crate::const_math::{inward, nearest, nearest_i32, power_of_two};
use crate::limits::Range;
use fixed::types::{I0F32, I16F16};

/// 32-bit fixed point.
///
/// | | |
/// | --- | --- |
/// | length | `fixed::types::I16F16`, mm |
/// | angle | `fixed::types::I0F32`, turns; ±180° saturates just inside |
/// | its primitives | a turn within 9.8e-7 rad (half of that times the vectors' length beside the leg's radius), a knee within 4e-7, sine and cosine within 1.2e-8 |
/// | largest joint error | 1.2e-6 rad on the demo legs, with knee from 0.1 to 2.6 rad and the foot clear of the hip's axis; nearer to an end see [`leg`](crate::leg) |
/// | largest foot error | 5.8e-7 of thigh and shank together on the demo legs, straight and folded ones included |
/// | legs | reach from 1 mm to 16 383 mm |
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Fixed32;

/// Coordinates are `I16F16` bits shifted left.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct FixedScale {
    shift: u32,
    /// 2^shift.
    factor: i32,
    /// `I16F16` bits of the working range lie below this.
    limit: i32,
}

impl FixedScale {
    /// Units of a coordinate in a millimetre.
    const fn units_per_mm(self) -> f64 {
        power_of_two(LENGTH_BITS + self.shift as i32)
    }
}

/// Coordinates of a leg's working range lie below this; those of a foot in reach so far below it that two of them add up,
/// whatever rounding does.
const COORD_LIMIT: i32 = 1 << 30;
/// What they lie below it, or more.
const COORD_ROOM: i32 = 1 << 6;
/// Fraction bits of `I16F16`.
const LENGTH_BITS: i32 = 16;
/// Sums of upper words of products that are below this have too few bits.
const LEAST_RUN: u32 = 1 << 22;
/// Fraction bits of a ratio.
const RATIO_BITS: u32 = 30;
/// What a product of a coordinate and a ratio lacks: it is the upper word.
const PRODUCT_DROP: i32 = 32 - RATIO_BITS as i32;
/// Fraction bits of the sine of half the knee.
const SINE_BITS: u32 = 27;
/// Fraction bits of the unit's reciprocal times a coordinate, above [`SINE_BITS`].
const UNIT_BITS: u32 = 32;
/// Fraction bits of the angle per pulse.
const SWING_BITS: u32 = 20;

impl Fixed32 {
    pub(crate) const fn scale_for(radius_mm: f64) -> Option<FixedScale> {
        // Negated so that NaN is refused.
        if !(radius_mm >= 1.0 && radius_mm <= 16_383.0) {
            return None;
        }
        let mut shift = 0;
        while shift < 13
            && radius_mm * power_of_two(LENGTH_BITS + shift as i32 + 1) < (COORD_LIMIT - COORD_ROOM) as f64
        {
            shift += 1;
        }
        Some(FixedScale { shift, factor: 1 << shift, limit: COORD_LIMIT >> shift })
    }

    pub(crate) const fn coord_from_mm(mm: f64, scale: FixedScale) -> i32 {
        nearest_i32(mm * scale.units_per_mm())
    }

    pub(crate) const fn square_from_mm2(mm2: f64, scale: FixedScale) -> i64 {
        nearest(mm2 * scale.units_per_mm() * scale.units_per_mm())
    }

    pub(crate) const fn cylinder_from_mm2(mm2: f64, scale: FixedScale) -> i64 {
        Self::square_from_mm2(mm2, scale)
    }

    pub(crate) const fn ratio_from(value: f64) -> i32 {
        nearest_i32(value * power_of_two(RATIO_BITS as i32))
    }

    pub(crate) const fn product_from_mm(mm: f64, scale: FixedScale) -> i32 {
        nearest_i32(mm * scale.units_per_mm() * power_of_two(-PRODUCT_DROP))
    }

    pub(crate) const fn unit_from_mm(unit_mm: f64, scale: FixedScale) -> u32 {
        // A leg within proportion has its unit in [2^27.3, 2^30], so this stays within 32 bits.
        nearest(power_of_two((SINE_BITS + UNIT_BITS) as i32) / (unit_mm * scale.units_per_mm())) as u32
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
        FixedLine::from(per_turn, at_zero)
    }
}

/// `value / 2^bits`, rounded to nearest.
const fn rounded_shift(value: i64, bits: u32) -> i64 {
    // The sum cannot overflow: every caller's value lies below 2^62.
    if bits == 0 { value } else { ((value >> (bits - 1)) + 1) >> 1 }
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

/// [`Number::turn`] from products, which cost no more than sums: their upper words have up to 28 bits. `None` if the vectors
/// are so short that they are not enough, or the angle obtuse, which is seldom. `from` lacks `drop` bits.
#[inline(always)]
fn usual_turn([from_x, from_y]: [i32; 2], [to_x, to_y]: [i32; 2], drop: u32) -> Option<I0F32> {
    let upper = |a: i32, b: i32| ((i64::from(a) * i64::from(b)) >> 32) as i32;
    let across = upper(from_x, to_y) - upper(from_y, to_x);
    let along = upper(from_x, to_x) + upper(from_y, to_y);
    let run = (((upper(to_x, to_x) + upper(to_y, to_y)) >> drop) + along) as u32;
    if along < 0 || run < LEAST_RUN {
        return None;
    }
    Some(I0F32::from_bits(rhombus::signed(arctangent::double_angle(across.unsigned_abs(), run), across)))
}

#[inline(always)]
fn any_turn(from: [i32; 2], to: [i32; 2]) -> I0F32 {
    let angles = rhombus::Angles { double_angle: arctangent::double_angle, half_turn: [i32::MAX; 2] };
    I0F32::from_bits(rhombus::any_turn(from, to, angles))
}

impl Number for Fixed32 {
    type Length = I16F16;
    type Coord = i32;
    type Square = i64;
    type Ratio = i32;
    type Product = i32;
    type Angle = I0F32;
    type Scale = FixedScale;
    type Unit = u32;
    type Gain = i32;
    type Swing = i32;
    type Line = FixedLine;

    const NAME: &'static str = "fixed32";
    const NO_LENGTH: I16F16 = I16F16::ZERO;
    const FARTHEST: I16F16 = I16F16::MAX;
    const NO_COORD: i32 = 0;
    const NO_SQUARE: i64 = 0;
    const NO_ANGLE: I0F32 = I0F32::ZERO;
    const LEAST_ANGLE: I0F32 = I0F32::MIN;
    const MOST_ANGLE: I0F32 = I0F32::MAX;

    fn scale_for(radius_mm: f64) -> Option<FixedScale> {
        Fixed32::scale_for(radius_mm)
    }
    fn length_from_mm(mm: f64) -> I16F16 {
        Fixed32::length_from_mm(mm)
    }
    fn coord_from_mm(mm: f64, scale: FixedScale) -> i32 {
        Fixed32::coord_from_mm(mm, scale)
    }
    fn square_from_mm2(mm2: f64, scale: FixedScale) -> i64 {
        Fixed32::square_from_mm2(mm2, scale)
    }
    fn ratio_from(value: f64) -> i32 {
        Fixed32::ratio_from(value)
    }
    fn product_from_mm(mm: f64, scale: FixedScale) -> i32 {
        Fixed32::product_from_mm(mm, scale)
    }
    fn unit_from_mm(unit_mm: f64, scale: FixedScale) -> u32 {
        Fixed32::unit_from_mm(unit_mm, scale)
    }
    fn angle_from_turns(turns: f64) -> I0F32 {
        Fixed32::angle_from_turns(turns)
    }
    fn range_from_turns(range: [f64; 2]) -> [I0F32; 2] {
        Fixed32::range_from_turns(range)
    }
    fn extent(ends: [I0F32; 2], turns: [f64; 2]) -> u32 {
        Fixed32::extent(ends, turns)
    }
    fn gain_from(us_per_turn: f64) -> i32 {
        Fixed32::gain_from(us_per_turn)
    }
    fn swing_from(turns_per_us: f64) -> i32 {
        Fixed32::swing_from(turns_per_us)
    }
    fn line_from(per_turn: f64, at_zero: f64) -> FixedLine {
        Fixed32::line_from(per_turn, at_zero)
    }

    #[inline(always)]
    fn near(foot: [I16F16; 3], scale: FixedScale) -> Option<[i32; 3]> {
        let [x, y, z] = foot.map(I16F16::to_bits);
        // The limit is a power of two: together they lie below it if each does.
        let outermost = (x ^ (x >> 31)) | (y ^ (y >> 31)) | (z ^ (z >> 31));
        (outermost < scale.limit).then(|| [x, y, z].map(|v| v * scale.factor))
    }

    fn place(foot: [I16F16; 3], scale: FixedScale) -> Placed<Self> {
        match Self::near(foot, scale) {
            Some(point) => Placed::Near(point),
            None => far(foot.map(I16F16::to_bits), scale),
        }
    }

    fn length(coord: i32, scale: FixedScale) -> I16F16 {
        I16F16::from_bits(saturated(rounded_shift(i64::from(coord), scale.shift)))
    }

    fn mm(length: I16F16) -> f64 {
        f64::from(length.to_bits()) / 65_536.0
    }

    fn turns(angle: I0F32) -> f64 {
        f64::from(angle.to_bits()) / 4_294_967_296.0
    }

    fn millidegrees(angle: I0F32) -> i32 {
        rounded_shift(i64::from(angle.to_bits()) * 360_000, 32) as i32
    }

    fn micrometres(length: I16F16) -> i32 {
        rounded_shift(i64::from(length.to_bits()) * 1000, 16) as i32
    }

    fn length_difference(a: I16F16, b: I16F16) -> I16F16 {
        a.saturating_sub(b)
    }

    #[inline(always)]
    fn square(coord: i32, _: FixedScale) -> i64 {
        i64::from(coord) * i64::from(coord)
    }

    #[inline(always)]
    fn root(square: i64, _: FixedScale) -> i32 {
        root::root(square as u64) as i32
    }

    #[inline(always)]
    fn radial(radial_square: i64, offset: i32, _: FixedScale) -> (i32, i64) {
        let whole = root::root(radial_square as u64) as i32;
        // The root is off by a few at most, so the rest lies within ±2^36.
        let rest = radial_square - i64::from(whole) * i64::from(whole);
        // R = whole + rest / (2·whole) to second order, so (R − c)² = (whole − c)² + rest − c·rest / whole; the quotient
        // in 1/1024, which is a hair of a hair.
        let quotient = ((rest >> 10) as i32).checked_div(whole >> 20).unwrap_or(0);
        let correction = (i64::from(offset) * i64::from(quotient)) >> 10;
        let along = whole - offset;
        (whole, i64::from(along) * i64::from(along) + rest - correction)
    }

    #[inline(always)]
    fn stretch(coord: i32, ratio: i32) -> i32 {
        ((i64::from(coord) * i64::from(ratio)) >> 32) as i32
    }

    #[inline(always)]
    fn widen(coord: i32) -> i32 {
        coord >> PRODUCT_DROP
    }

    #[inline(always)]
    fn turn(from: [i32; 2], to: [i32; 2]) -> I0F32 {
        match usual_turn(from, to, PRODUCT_DROP as u32) {
            Some(angle) => angle,
            None => any_turn(from, to.map(Self::widen)),
        }
    }

    /// From coordinates, for their scale does not count.
    #[inline(always)]
    fn hip_angle(foot: [i32; 2], offset: i32, depth: i32) -> I0F32 {
        let from = [offset, depth.wrapping_neg()];
        match usual_turn(from, foot, 0) {
            Some(angle) => angle,
            None => any_turn(from, foot),
        }
    }

    #[inline(always)]
    fn yaw_angle([x, y]: [i32; 2], radial: i32) -> I0F32 {
        // A foot out of reach may be so far that their sum needs 32 bits.
        let run = (radial as u32).wrapping_add(y.unsigned_abs()) >> 1;
        let half = arctangent::double_angle((x.unsigned_abs() >> 1).min(run), run);
        let size = if y < 0 { i32::MAX - half } else { half };
        I0F32::from_bits(if x < 0 { -size } else { size })
    }

    #[inline(always)]
    fn knee(n: i64, m: i64, unit: u32, _: FixedScale) -> Knee<Self> {
        // The smaller of n and m gives a half-angle of 45° at the most, whose sine is well known.
        let (less, folded) = if m < n {
            seldom();
            (m, true)
        } else {
            (n, false)
        };
        let side = root::root(less as u64);
        let sine = ((u64::from(side) * u64::from(unit)) >> UNIT_BITS) as u32;
        let (knee, half_sine) = knee::knee(sine);
        // sine² with 30 fraction bits is the upper half of the square of the sine with 31, which is below 2^31.
        let from_end = ((u64::from(16 * sine) * u64::from(16 * sine)) >> 32) as i32;
        Knee { acute: I0F32::from_bits(knee), half_sine, folded, from_end }
    }

    #[inline(always)]
    fn is_well_within(angle: I0F32, range: &Range<Self>) -> bool {
        // Below the least, this wraps far above.
        angle.to_bits().wrapping_sub(range.least.0.to_bits()) as u32 <= range.extent
    }

    fn sin_cos(angle: I0F32) -> (i32, i32) {
        sine::sin_cos(angle.to_bits())
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
        product.wrapping_mul(1 << PRODUCT_DROP)
    }

    fn rescale(v: i32, to: i32, from: i32) -> i32 {
        let size =
            (u64::from(fraction(v.unsigned_abs(), from.unsigned_abs())) * u64::from(to.unsigned_abs())) >> 31;
        // |v| ≤ from but for rounding, so the result stays within |to|.
        if v < 0 { -(size as i32) } else { size as i32 }
    }

    fn halve(coord: i32, times: u32) -> i32 {
        coord >> times.min(31)
    }

    fn distance(a: [I16F16; 3], b: [I16F16; 3]) -> I16F16 {
        let apart = |i: usize| u64::from(a[i].to_bits().abs_diff(b[i].to_bits()));
        let [x, y, z] = [apart(0), apart(1), apart(2)];
        // Each lies below 2^32: two bits of headroom keep the sum of squares within 64.
        let spare = if (x | y | z) >> 30 == 0 { 0 } else { 2 };
        let [x, y, z] = [x >> spare, y >> spare, z >> spare];
        // Below 2^31 and a half, shifted by two bits at the most.
        let steps = u64::from(root::root(x * x + y * y + z * z)) << spare;
        I16F16::from_bits(steps.min(i32::MAX as u64) as i32)
    }

    #[inline(always)]
    fn travel(angle: I0F32, from: I0F32, gain: i32) -> i32 {
        let swing = i64::from(angle.to_bits()) - i64::from(from.to_bits());
        saturated(rounded_shift(swing * i64::from(gain), 32))
    }

    #[inline(always)]
    fn swing_to(travel: i32, from: I0F32, swing: i32) -> I0F32 {
        let turned = rounded_shift(i64::from(travel) * i64::from(swing), SWING_BITS);
        I0F32::from_bits(saturated(i64::from(from.to_bits()) + turned))
    }

    #[inline(always)]
    fn on_line(line: FixedLine, angle: I0F32) -> i32 {
        line.at(angle.to_bits())
    }
}

/// A foot beyond the working range, halved until it is within.
#[cold]
fn far(bits: [i32; 3], scale: FixedScale) -> Placed<Fixed32> {
    let [x, y, z] = bits.map(i32::unsigned_abs);
    // Bits beyond those of the working range: one or more, or the foot would be within it.
    let times = (u32::BITS - (x | y | z).leading_zeros()).saturating_sub(COORD_LIMIT.ilog2() - scale.shift);
    let placed = bits
        .map(|v| if times > scale.shift { v >> (times - scale.shift) } else { v << (scale.shift - times) });
    Placed::Far(placed, times)
}

/// rise/run with 31 fraction bits, for run < 2^31; no more than 1, and 0 for a run of 0. By long division, which is short:
/// only for feet out of reach.
fn fraction(rise: u32, run: u32) -> u32 {
    if run == 0 {
        return 0;
    }
    let (mut rest, mut quotient) = (rise.min(run), 0);
    let mut bit = 0;
    while bit < 32 {
        quotient <<= 1;
        if rest >= run {
            rest -= run;
            quotient |= 1;
        }
        rest <<= 1;
        bit += 1;
    }
    quotient
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn radial_keeps_the_square_as_exact_as_squares_are() {
        let scale = Fixed32::scale_for(1000.0).unwrap();
        let (mut worst, mut state) = (0u128, 1u64);
        for _ in 0..200_000 {
            state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
            let (radial, offset) = ((state >> 34) as i32, ((state << 20) >> 36) as i32 & ((1 << 28) - 1));
            // A square that is no square of an integer, of a radius within the reach of a leg with that coxa.
            let radial_square = i64::from(radial) * i64::from(radial) + (state as i64 & 0xFFFF);
            if radial < 1 << 27 {
                continue;
            }
            let (_, square) = Fixed32::radial(radial_square, offset, scale);
            // (R − c)² = R² + c² − 2·c·R, the root with 32 fraction bits.
            let root = ((radial_square as u128) << 64).isqrt();
            let twice = (2 * offset as u128 * root) >> 32;
            let exact = i128::from(radial_square) + i128::from(offset) * i128::from(offset) - twice as i128;
            worst = worst.max((i128::from(square) - exact).unsigned_abs());
        }
        // Of up to 2^60: for a leg of a metre 4e-6 mm², which a straight knee feels as 4 µrad.
        assert!(worst < 5_000_000 && worst > 2_500_000, "{worst}");
    }
}
