//! 32-bit fixed point: for chips without an FPU.
//!
//! Lengths are `fixed`'s `I16F16` mm (±32 768 mm in steps of 15 nm), angles `I0F32` fractions of a turn, which
//! wrap for free. Within the solver a length is an `i32` scaled by a power of two so that the leg's reach fills
//! 30 bits; scaling is a shift, so nothing is lost, and squares and their sums are exact in `i64`.

mod arctangent;
mod sine;

use super::{Knee, Number, Placed};
use crate::const_math::{nearest, nearest_i32, power_of_two};
use fixed::types::{I0F32, I16F16};

/// 32-bit fixed point.
///
/// | | |
/// | --- | --- |
/// | length | `fixed::types::I16F16`, mm |
/// | angle | `fixed::types::I0F32`, turns; ±180° saturates just inside |
/// | largest joint error | see the survey of your own leg; below 1e-6 rad away from the hip axis |
/// | legs | reach from 1 mm to 16 383 mm |
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Fixed32;

/// Coordinates are `I16F16` bits shifted left by this.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct FixedScale {
    shift: u32,
}

impl FixedScale {
    /// Units of a coordinate in a millimetre.
    const fn units_per_mm(self) -> f64 {
        power_of_two(LENGTH_BITS + self.shift as i32)
    }
}

/// Coordinates of a leg's working range lie below this.
const COORD_LIMIT: i32 = 1 << 30;
/// Fraction bits of `I16F16`.
const LENGTH_BITS: i32 = 16;
/// Fraction bits of a ratio: ±8.
const RATIO_BITS: u32 = 28;
/// Fraction bits of a sine or cosine within the knee.
const SINE_BITS: u32 = 31;
/// Fraction bits of the unit's reciprocal times a coordinate, above [`SINE_BITS`].
const UNIT_BITS: u32 = 28;
/// Half a turn; one less is the largest angle there is.
const HALF_TURN: u32 = 1 << 31;
/// Fraction bits of the angle per pulse.
const SWING_BITS: u32 = 20;

impl Fixed32 {
    pub(crate) const fn scale_for(radius_mm: f64) -> Option<FixedScale> {
        // Negated so that NaN is refused.
        if !(radius_mm >= 1.0 && radius_mm <= 16_383.0) {
            return None;
        }
        let mut shift = 0;
        while shift < 13 && radius_mm * power_of_two(LENGTH_BITS + shift as i32 + 1) < COORD_LIMIT as f64 {
            shift += 1;
        }
        Some(FixedScale { shift })
    }

    pub(crate) const fn coord_from_mm(mm: f64, scale: FixedScale) -> i32 {
        nearest_i32(mm * scale.units_per_mm())
    }

    pub(crate) const fn square_from_mm2(mm2: f64, scale: FixedScale) -> i64 {
        nearest(mm2 * scale.units_per_mm() * scale.units_per_mm())
    }

    pub(crate) const fn ratio_from(value: f64) -> i32 {
        nearest_i32(value * power_of_two(RATIO_BITS as i32))
    }

    pub(crate) const fn product_from_mm(mm: f64, scale: FixedScale) -> i64 {
        nearest(mm * scale.units_per_mm() * power_of_two(RATIO_BITS as i32))
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

    pub(crate) const fn gain_from(us_per_turn: f64) -> i32 {
        nearest_i32(us_per_turn * power_of_two(LENGTH_BITS))
    }

    pub(crate) const fn swing_from(turns_per_us: f64) -> i32 {
        nearest_i32(turns_per_us * power_of_two(32 - LENGTH_BITS + SWING_BITS as i32))
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

/// ⌊√value⌋ for value < 2^63; 0 for a negative one.
fn floor_root(value: i64) -> u32 {
    if value <= 0 { 0 } else { value.unsigned_abs().isqrt() as u32 }
}

impl Number for Fixed32 {
    type Length = I16F16;
    type Coord = i32;
    type Square = i64;
    type Ratio = i32;
    type Product = i64;
    type Angle = I0F32;
    type Scale = FixedScale;
    type Unit = u32;
    type Gain = i32;
    type Swing = i32;

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
    fn product_from_mm(mm: f64, scale: FixedScale) -> i64 {
        Fixed32::product_from_mm(mm, scale)
    }
    fn unit_from_mm(unit_mm: f64, scale: FixedScale) -> u32 {
        Fixed32::unit_from_mm(unit_mm, scale)
    }
    fn angle_from_turns(turns: f64) -> I0F32 {
        Fixed32::angle_from_turns(turns)
    }
    fn gain_from(us_per_turn: f64) -> i32 {
        Fixed32::gain_from(us_per_turn)
    }
    fn swing_from(turns_per_us: f64) -> i32 {
        Fixed32::swing_from(turns_per_us)
    }

    #[inline(always)]
    fn place(foot: [I16F16; 3], scale: FixedScale) -> Placed<Self> {
        let bits = foot.map(I16F16::to_bits);
        let limit = COORD_LIMIT >> scale.shift;
        let near = |v: i32| -limit < v && v < limit;
        if near(bits[0]) && near(bits[1]) && near(bits[2]) {
            return Placed::Near(bits.map(|v| v << scale.shift));
        }
        far(bits, scale)
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
        floor_root(square) as i32
    }

    #[inline(always)]
    fn beyond(radial_square: i64, offset: i32, _: FixedScale) -> (i32, i64) {
        let whole = i64::from(floor_root(radial_square));
        let rest = radial_square - whole * whole;
        // R = whole + rest / (2·whole) to second order, so (R − c)² = (whole − c)² + rest − c·rest / whole.
        let correction = (i64::from(offset) * rest).checked_div(whole).unwrap_or(0);
        let along = whole - i64::from(offset);
        (along as i32, along * along + rest - correction)
    }

    #[inline(always)]
    fn area(a: i32, b: i32) -> i64 {
        i64::from(a) * i64::from(b)
    }

    #[inline(always)]
    fn stretch(coord: i32, ratio: i32) -> i64 {
        i64::from(coord) * i64::from(ratio)
    }

    #[inline(always)]
    fn widen(coord: i32) -> i64 {
        i64::from(coord) << RATIO_BITS
    }

    #[inline(always)]
    fn angle(y: i64, x: i64, norm: i64) -> I0F32 {
        let half = arctangent::double_angle(y.unsigned_abs(), norm.unsigned_abs() + x.unsigned_abs());
        let size = if x < 0 { HALF_TURN - half } else { half }.min(HALF_TURN - 1) as i32;
        I0F32::from_bits(if y < 0 { -size } else { size })
    }

    #[inline(always)]
    fn knee(n: i64, m: i64, unit: u32, _: FixedScale) -> Knee<Self> {
        // The smaller of n and m gives a half-angle of 45° at the most, whose sine is well known.
        let folded = m < n;
        let least = if folded { m } else { n };
        let sine = (u64::from(floor_root(least)) * u64::from(unit)) >> UNIT_BITS;
        let sine = sine.min(1 << SINE_BITS);
        let square = sine * sine;
        let cosine = ((1u64 << (2 * SINE_BITS)) - square).isqrt();
        // 2·arctan(s / (1 + c)) is half the knee; twice that, and from the other end when folded.
        let knee = 2 * arctangent::double_angle(sine, (1 << SINE_BITS) + cosine);
        let knee = if folded { HALF_TURN - knee } else { knee };
        Knee {
            angle: I0F32::from_bits(knee.min(HALF_TURN - 1) as i32),
            half_sine: rounded_shift((sine * cosine) as i64, 2 * SINE_BITS - RATIO_BITS) as i32,
            folded,
            from_end: rounded_shift(square as i64, 2 * SINE_BITS - RATIO_BITS) as i32,
        }
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
    fn narrow(product: i64) -> i32 {
        saturated(rounded_shift(product, RATIO_BITS))
    }

    fn rescale(v: i32, to: i32, from: i32) -> i32 {
        // |v| ≤ from but for rounding, so the result stays within |to| and a bit.
        saturated((i64::from(v) * i64::from(to)).checked_div(i64::from(from)).unwrap_or(0))
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
        let steps = (x * x + y * y + z * z).isqrt() << spare;
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
}

/// A foot beyond the working range, halved until it is within.
#[cold]
fn far(bits: [i32; 3], scale: FixedScale) -> Placed<Fixed32> {
    let wide = bits.map(|v| i64::from(v) << scale.shift);
    let mut times = 0;
    while times < 31 && wide.iter().any(|v| (v >> times).unsigned_abs() >= COORD_LIMIT as u64) {
        times += 1;
    }
    Placed::Far(wide.map(|v| (v >> times) as i32), times)
}
