//! 16-bit fixed point: for chips that multiply 32 bits by 32 into 32 and have neither a divider nor a count of leading
//! zeros (Cortex-M0 and M0+).
//!
//! Lengths are `fixed`'s `I10F6` mm (±512 mm in steps of 1/64 mm), angles `I0F16` fractions of a turn. Within the
//! solver a length is a whole number of up to 16 bits in an `i32`: the length's bits times a power of two, so that the
//! leg's radius comes to 14 500 to 29 000. Nothing is lost on the way, and squares and their sums are exact. The
//! ratios of the triangle have as many fraction bits, 14 to 17, as the leg's links leave room for in 32 bits.
//!
//! Roots, reciprocals, arctangents and the knee are chord-balanced linear interpolation in tables made while compiling;
//! a chord is one word ([`narrow::chord`](super::narrow)). Nothing here divides, multiplies into 64 bits (the angle of a
//! pulse apart), or shifts by more than 31.

mod half_angle;
mod knee;
mod root;
mod sine;

use super::line::FixedLine;
use super::{Knee, Number, Placed, rhombus};
use crate::const_math::{inward, nearest_i32, power_of_two};
use crate::limits::Range;
use fixed::types::{I0F16, I10F6};

/// 16-bit fixed point.
///
/// | | |
/// | --- | --- |
/// | length | `fixed::types::I10F6`, mm |
/// | angle | `fixed::types::I0F16`, turns (a step is 9.6e-5 rad); ±180° saturates just inside |
/// | its primitives | a turn within 1.4e-4 rad, a knee within 2.1e-4, sine and cosine within 1.2e-4 |
/// | largest joint error | 3.6e-4 rad on the demo legs, with knee from 0.1 to 2.6 rad and the foot clear of the hip's axis; nearer to an end see [`leg`](crate::leg) |
/// | largest foot error | 2.2e-4 of thigh and shank together on the demo legs, straight and folded ones included |
/// | legs | offset, thigh and shank together from 1 mm to 453 mm |
///
/// A link counts exactly; the coxa of a yaw-hip leg is rounded to the steps of the solver, half of which is up to 3.4e-5
/// of the leg's radius. The foot is off by so much more; and a knee near straight, which goes with the root of what the
/// foot is short of its reach, by up to 2.4e-2 rad below 0.01 rad. A coxa in whole steps of 1/64 mm is exact on legs up to
/// 453 mm.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Fixed16;

/// What turns lengths into coordinates, and how fine the ratios of the triangle are.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Fixed16Scale {
    /// Coordinates are `I10F6` bits times this, a power of two.
    steps: i32,
}

/// The reciprocal of a length unit: 2^(16 + shift) over it, from 2^15 to 2^16.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Fixed16Unit {
    reciprocal: u32,
    shift: u32,
}

impl Fixed16Scale {
    /// Units of a coordinate in a millimetre.
    const fn units_per_mm(self) -> f64 {
        self.steps as f64 * power_of_two(LENGTH_BITS)
    }
}

/// The farthest that a leg's foot gets is below this. The squares of its coordinates, and twice its links times a ratio of up to
/// ½, then stay within an `i32`.
const RADIUS_LIMIT: f64 = 29_000.0;
/// Fraction bits of `I10F6`.
const LENGTH_BITS: i32 = 6;
/// Fraction bits of a ratio.
const RATIO_BITS: u32 = 16;
/// Bits that a product of a coordinate and a ratio has below those of a coordinate.
const PRODUCT_BITS: u32 = 1;
/// Half a turn; one less is the largest angle there is.
const HALF_TURN: i32 = 1 << 15;
/// Fraction bits of a gain in µs per turn.
const GAIN_BITS: u32 = 15;
/// Fraction bits of a swing in turns per µs.
const SWING_BITS: u32 = 30;

impl Fixed16 {
    pub(crate) const fn scale_for(radius_mm: f64) -> Option<Fixed16Scale> {
        // Negated so that NaN is refused.
        if !(radius_mm >= 1.0 && radius_mm <= 453.0) {
            return None;
        }
        let mut scale = Fixed16Scale { steps: 1 };
        while radius_mm * scale.units_per_mm() * 2.0 < RADIUS_LIMIT {
            scale.steps *= 2;
        }
        Some(scale)
    }

    pub(crate) const fn coord_from_mm(mm: f64, scale: Fixed16Scale) -> i32 {
        nearest_i32(mm * scale.units_per_mm())
    }

    pub(crate) const fn square_from_mm2(mm2: f64, scale: Fixed16Scale) -> i32 {
        nearest_i32(mm2 * scale.units_per_mm() * scale.units_per_mm())
    }

    pub(crate) const fn cylinder_from_mm2(mm2: f64, scale: Fixed16Scale) -> i32 {
        Self::square_from_mm2(mm2, scale)
    }

    pub(crate) const fn ratio_from(value: f64) -> i32 {
        nearest_i32(value * power_of_two(RATIO_BITS as i32))
    }

    pub(crate) const fn product_from_mm(mm: f64, scale: Fixed16Scale) -> i32 {
        nearest_i32(mm * scale.units_per_mm() * power_of_two(PRODUCT_BITS as i32))
    }

    pub(crate) const fn unit_from_mm(unit_mm: f64, scale: Fixed16Scale) -> Fixed16Unit {
        // A leg within proportion has its unit between 3000 and 29 000, so the shift lies between 11 and 14.
        let unit = unit_mm * scale.units_per_mm();
        let mut shift = 0;
        while shift < 15 && power_of_two(17 + shift) < 65_535.0 * unit {
            shift += 1;
        }
        Fixed16Unit { reciprocal: nearest_i32(power_of_two(16 + shift) / unit) as u32, shift: shift as u32 }
    }

    pub(crate) const fn length_from_mm(mm: f64) -> I10F6 {
        I10F6::from_bits(nearest_i16(mm * power_of_two(LENGTH_BITS)))
    }

    pub(crate) const fn angle_from_turns(turns: f64) -> I0F16 {
        I0F16::from_bits(nearest_i16(turns * power_of_two(16)))
    }

    pub(crate) const fn range_from_turns([least, most]: [f64; 2]) -> [I0F16; 2] {
        let [low, high] = inward(least * power_of_two(16), most * power_of_two(16));
        [I0F16::from_bits(nearest_i16(low as f64)), I0F16::from_bits(nearest_i16(high as f64))]
    }

    /// In steps of an angle.
    pub(crate) const fn extent([least, most]: [I0F16; 2], _: [f64; 2]) -> u32 {
        most.to_bits().wrapping_sub(least.to_bits()) as u16 as u32
    }

    pub(crate) const fn gain_from(us_per_turn: f64) -> i32 {
        nearest_i32(us_per_turn * power_of_two(GAIN_BITS as i32))
    }

    pub(crate) const fn swing_from(turns_per_us: f64) -> i32 {
        nearest_i32(turns_per_us * power_of_two(SWING_BITS as i32))
    }

    pub(crate) const fn line_from(per_turn: f64, at_zero: f64) -> FixedLine {
        FixedLine::from(per_turn, at_zero)
    }
}

/// The nearest integer that an `i16` holds.
const fn nearest_i16(v: f64) -> i16 {
    saturated(nearest_i32(v))
}

/// The integer nearest to `value` that an `i16` holds.
const fn saturated(value: i32) -> i16 {
    if value > i16::MAX as i32 {
        i16::MAX
    } else if value < i16::MIN as i32 {
        i16::MIN
    } else {
        value as i16
    }
}

impl Number for Fixed16 {
    type Length = I10F6;
    type Coord = i32;
    type Square = i32;
    type Ratio = i32;
    type Product = i32;
    type Angle = I0F16;
    type Scale = Fixed16Scale;
    type Unit = Fixed16Unit;
    type Gain = i32;
    type Swing = i32;
    type Line = FixedLine;

    const NAME: &'static str = "fixed16";
    const NO_LENGTH: I10F6 = I10F6::ZERO;
    const FARTHEST: I10F6 = I10F6::MAX;
    const NO_COORD: i32 = 0;
    const NO_SQUARE: i32 = 0;
    const NO_ANGLE: I0F16 = I0F16::ZERO;
    const LEAST_ANGLE: I0F16 = I0F16::MIN;
    const MOST_ANGLE: I0F16 = I0F16::MAX;

    fn scale_for(radius_mm: f64) -> Option<Fixed16Scale> {
        Fixed16::scale_for(radius_mm)
    }
    fn length_from_mm(mm: f64) -> I10F6 {
        Fixed16::length_from_mm(mm)
    }
    fn coord_from_mm(mm: f64, scale: Fixed16Scale) -> i32 {
        Fixed16::coord_from_mm(mm, scale)
    }
    fn square_from_mm2(mm2: f64, scale: Fixed16Scale) -> i32 {
        Fixed16::square_from_mm2(mm2, scale)
    }
    fn ratio_from(value: f64) -> i32 {
        Fixed16::ratio_from(value)
    }
    fn product_from_mm(mm: f64, scale: Fixed16Scale) -> i32 {
        Fixed16::product_from_mm(mm, scale)
    }
    fn unit_from_mm(unit_mm: f64, scale: Fixed16Scale) -> Fixed16Unit {
        Fixed16::unit_from_mm(unit_mm, scale)
    }
    fn angle_from_turns(turns: f64) -> I0F16 {
        Fixed16::angle_from_turns(turns)
    }
    fn range_from_turns(range: [f64; 2]) -> [I0F16; 2] {
        Fixed16::range_from_turns(range)
    }
    fn extent(ends: [I0F16; 2], turns: [f64; 2]) -> u32 {
        Fixed16::extent(ends, turns)
    }
    fn gain_from(us_per_turn: f64) -> i32 {
        Fixed16::gain_from(us_per_turn)
    }
    fn swing_from(turns_per_us: f64) -> i32 {
        Fixed16::swing_from(turns_per_us)
    }
    fn line_from(per_turn: f64, at_zero: f64) -> FixedLine {
        Fixed16::line_from(per_turn, at_zero)
    }

    #[inline(always)]
    fn near(foot: [I10F6; 3], scale: Fixed16Scale) -> Option<[i32; 3]> {
        let point = foot.map(|length| i32::from(length.to_bits()).wrapping_mul(scale.steps));
        is_near(point).then_some(point)
    }

    fn place(foot: [I10F6; 3], scale: Fixed16Scale) -> Placed<Self> {
        match Self::near(foot, scale) {
            Some(point) => Placed::Near(point),
            None => far(foot.map(|length| i32::from(length.to_bits()) * scale.steps)),
        }
    }

    fn length(coord: i32, scale: Fixed16Scale) -> I10F6 {
        // Rounded by half a step, then divided by the power of two; a coordinate stays below 2^17.
        let shift = (scale.steps as u32).trailing_zeros().min(15);
        I10F6::from_bits(saturated((coord + (scale.steps >> 1)) >> shift))
    }

    fn mm(length: I10F6) -> f64 {
        f64::from(length.to_bits()) / 64.0
    }

    fn turns(angle: I0F16) -> f64 {
        f64::from(angle.to_bits()) / 65_536.0
    }

    fn millidegrees(angle: I0F16) -> i32 {
        // 360 000 / 2^16 = 5625 / 2^10.
        (i32::from(angle.to_bits()) * 5625 + (1 << 9)) >> 10
    }

    fn micrometres(length: I10F6) -> i32 {
        // 1000 / 2^6 = 125 / 2^3.
        (i32::from(length.to_bits()) * 125 + 4) >> 3
    }

    fn length_difference(a: I10F6, b: I10F6) -> I10F6 {
        a.saturating_sub(b)
    }

    #[inline(always)]
    fn square(coord: i32, _: Fixed16Scale) -> i32 {
        coord.wrapping_mul(coord)
    }

    #[inline(always)]
    fn root(square: i32, _: Fixed16Scale) -> i32 {
        root::rounded(square.max(0) as u32) as i32
    }

    #[inline(always)]
    fn radial(radial_square: i32, offset: i32, _: Fixed16Scale) -> (i32, i32) {
        let root = root::root(radial_square as u32);
        let whole = (((root.wide >> (15 + root.halvings)) + 1) >> 1) as i32;
        let rest = radial_square.wrapping_sub(whole.wrapping_mul(whole));
        // R = whole + rest / (2·whole) to second order, so (R − c)² = (whole − c)² + rest − c·rest / whole.
        let share = rest.wrapping_mul(root.reciprocal as i32) >> (15 - root.halvings);
        let correction = offset.wrapping_mul(share) >> 14;
        let along = whole - offset;
        (whole, along * along + rest - correction)
    }

    #[inline(always)]
    fn stretch(coord: i32, ratio: i32) -> i32 {
        coord.wrapping_mul(ratio).wrapping_add(1 << (RATIO_BITS - PRODUCT_BITS - 1))
            >> (RATIO_BITS - PRODUCT_BITS)
    }

    #[inline(always)]
    fn widen(coord: i32) -> i32 {
        coord << PRODUCT_BITS
    }

    /// From products, which cost no more than sums, and are exact.
    #[inline(always)]
    fn turn([from_x, from_y]: [i32; 2], [to_x, to_y]: [i32; 2]) -> I0F16 {
        // A product has a bit more than a coordinate: both together have 31.
        let across = from_x.wrapping_mul(to_y).wrapping_sub(from_y.wrapping_mul(to_x));
        let along = from_x.wrapping_mul(to_x).wrapping_add(from_y.wrapping_mul(to_y));
        let square = to_x.wrapping_mul(to_x).wrapping_add(to_y.wrapping_mul(to_y));
        if along < 0 {
            return any_turn([from_x, from_y], [to_x << PRODUCT_BITS, to_y << PRODUCT_BITS]);
        }
        let run = (square << PRODUCT_BITS).wrapping_add(along) as u32;
        // Rounding may leave it a step above.
        let rise = across.unsigned_abs().min(run);
        I0F16::from_bits(rhombus::signed(double_angle(rise, run), across) as i16)
    }

    #[inline(always)]
    fn yaw_angle([x, y]: [i32; 2], radial: i32) -> I0F16 {
        let run = (radial as u32).wrapping_add(y.unsigned_abs());
        // Rounding may leave |x| a step above. Of 16 bits each, lifted to where short ones lie no longer.
        let mut size = double_angle(x.unsigned_abs().min(run) << 15, run << 15);
        if y < 0 {
            size = from_behind(size);
        }
        I0F16::from_bits(rhombus::signed(size, x) as i16)
    }

    #[inline(always)]
    fn knee(n: i32, m: i32, unit: Fixed16Unit, _: Fixed16Scale) -> Knee<Self> {
        // The smaller of n and m gives a half-angle of 45° at the most.
        let folded = m < n;
        let least = if folded { m } else { n };
        let root = root::root(least as u32);
        let sine = (root.wide >> 16).wrapping_mul(unit.reciprocal) >> ((unit.shift + root.halvings) & 31);
        let (knee, half_sine, from_end) = knee::of_half_sine(sine);
        Knee { acute: I0F16::from_bits(knee as i16), half_sine, folded, from_end }
    }

    #[inline(always)]
    fn knee_angle(acute: I0F16, _: I0F16, _: i32, folded: bool) -> I0F16 {
        if !folded {
            return acute;
        }
        let knee = HALF_TURN - i32::from(acute.to_bits());
        // Half a turn itself is one too many.
        I0F16::from_bits((knee - (knee >> 15)) as i16)
    }

    #[inline(always)]
    fn is_well_within(angle: I0F16, range: &Range<Self>) -> bool {
        // Below the least, this wraps far above.
        u32::from(angle.to_bits().wrapping_sub(range.least.0.to_bits()) as u16) <= range.extent
    }

    #[inline(never)]
    fn sin_cos(angle: I0F16) -> (i32, i32) {
        sine::sin_cos(angle.to_bits())
    }

    #[inline(always)]
    fn angle_sum(a: I0F16, b: I0F16) -> I0F16 {
        a.wrapping_add(b)
    }

    #[inline(always)]
    fn angle_difference(a: I0F16, b: I0F16) -> I0F16 {
        a.wrapping_sub(b)
    }

    #[inline(always)]
    fn narrow(product: i32) -> i32 {
        (product + (1 << (PRODUCT_BITS - 1))) >> PRODUCT_BITS
    }

    fn enlarged(vector: [i32; 3]) -> [i32; 3] {
        let sum = vector.iter().fold(0, |sum: u32, v| sum.saturating_add(v.unsigned_abs()));
        let mut vector = vector;
        // From 2^13 on, half a step is 6e-5 of the length.
        let mut left = if sum == 0 { 0 } else { 14 };
        while left > 0 && sum << (14 - left) < 1 << 13 {
            vector = vector.map(|v| v << 1);
            left -= 1;
        }
        vector
    }

    #[inline(never)]
    fn rescale(v: i32, to: i32, from: i32) -> i32 {
        // Each lies below 2^16, their product may need 32 bits; |v| ≤ from but for rounding.
        let size = quotient(v.unsigned_abs().wrapping_mul(to as u32), from as u32) as i32;
        if v < 0 { size.wrapping_neg() } else { size }
    }

    fn halve(coord: i32, times: u32) -> i32 {
        coord >> times.min(31)
    }

    fn distance(a: [I10F6; 3], b: [I10F6; 3]) -> I10F6 {
        let apart = |i: usize| u32::from(a[i].to_bits().abs_diff(b[i].to_bits()));
        let [x, y, z] = [apart(0), apart(1), apart(2)];
        // Each lies below 2^16; below 2^15 the sum of three squares stays within 32 bits.
        let spare = (x | y | z) >> 15;
        let [x, y, z] = [x >> spare, y >> spare, z >> spare];
        let steps = root::rounded(x * x + y * y + z * z) << spare;
        I10F6::from_bits(steps.min(i16::MAX as u32) as i16)
    }

    #[inline(always)]
    fn travel(angle: I0F16, from: I0F16, gain: i32) -> i32 {
        // Within ±65535, so that with either half of the gain it stays within an `i32`.
        let swing = i32::from(angle.to_bits()) - i32::from(from.to_bits());
        let (whole, rest) = (gain >> GAIN_BITS, gain & ((1 << GAIN_BITS) - 1));
        (swing * whole).saturating_add((swing * rest) >> GAIN_BITS)
    }

    #[inline(always)]
    fn swing_to(travel: i32, from: I0F16, swing: i32) -> I0F16 {
        let turned = ((i64::from(travel) * i64::from(swing)) >> (SWING_BITS - 1)) as i32;
        I0F16::from_bits(saturated(i32::from(from.to_bits()).saturating_add((turned + 1) >> 1)))
    }

    #[inline(always)]
    fn on_line(line: FixedLine, angle: I0F16) -> i32 {
        line.at_short(angle.to_bits())
    }
}

/// Whether each coordinate and the sum of the squares stay within bounds: 2^15 and 2^30, which is beyond any reach.
#[inline(always)]
fn is_near([x, y, z]: [i32; 3]) -> bool {
    let beyond = |v: i32| (v.wrapping_add(1 << 15) as u32) >> 16;
    let squares = x.wrapping_mul(x).wrapping_add(y.wrapping_mul(y)).wrapping_add(z.wrapping_mul(z));
    (beyond(x) | beyond(y) | beyond(z)) == 0 && squares as u32 >> 30 == 0
}

/// 2·arctan(rise / run) in 2^-16 turn, for rise ≤ run.
#[inline(always)]
fn double_angle(rise: u32, run: u32) -> i32 {
    half_angle::double_angle(rise, run) as i32
}

fn any_turn(from: [i32; 2], to: [i32; 2]) -> I0F16 {
    let angles = rhombus::Angles { double_angle, half_turn: [HALF_TURN, HALF_TURN - 1] };
    I0F16::from_bits(rhombus::any_turn(from, to, angles) as i16)
}

/// An angle as seen from the opposite direction.
#[cold]
#[inline(never)]
fn from_behind(size: i32) -> i32 {
    (HALF_TURN - size).min(HALF_TURN - 1)
}

/// a/b by long division, rounded down; all ones for b = 0. Only for feet out of reach.
fn quotient(a: u32, b: u32) -> u32 {
    let (mut rest, mut quotient) = (0u32, a);
    let mut bit = 0;
    while bit < 32 {
        rest = (rest << 1) | (quotient >> 31);
        quotient <<= 1;
        if rest >= b {
            rest = rest.wrapping_sub(b);
            quotient |= 1;
        }
        bit += 1;
    }
    quotient
}

/// A foot beyond the working range, halved until it is within.
#[cold]
fn far(foot: [i32; 3]) -> Placed<Fixed16> {
    // The square of the sum of the sizes is above the sum of the squares.
    let sum = foot.iter().fold(0, |sum, v| sum + v.unsigned_abs());
    let mut times = 1;
    // A length has 16 bits, a scale at most 8 more.
    while times < 16 && sum >> times >= 1 << 15 {
        times += 1;
    }
    Placed::Far(foot.map(|v| v >> times), times)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::{Bend, Dimensions, GeometryError, Leg, Limits, RollHip, YawHip};

    fn scale() -> Fixed16Scale {
        Fixed16::scale_for(232.5).expect("a scale")
    }

    #[test]
    fn an_angle_has_the_quadrant_of_its_vector() {
        for (y, x) in [(3, 4), (3, -4), (-3, 4), (-3, -4), (1, 1), (-1, -1), (0, 1), (1, 0), (-1, 0)] {
            let (y, x) = (y * 4_000, x * 4_000);
            let norm = f64::from(y).hypot(f64::from(x)).round() as i32;
            let got = Fixed16::turns(Fixed16::turn([2 * norm, 0], [x, y])) * core::f64::consts::TAU;
            assert!((got - f64::from(y).atan2(f64::from(x))).abs() < 2e-4, "{y} {x}: {got}");
        }
        assert_eq!(Fixed16::turn([0, 0], [0, 0]), I0F16::ZERO);
        // Half a turn saturates just inside, on either side.
        assert_eq!(Fixed16::turn([14_000, 0], [-7_000, 0]), I0F16::MAX);
    }

    #[test]
    fn every_primitive_answers_to_every_sort_of_argument() {
        let sorts = [i32::MIN, i32::MIN + 1, -46_341, -1, 0, 1, 2, 46_341, 1 << 24, i32::MAX - 1, i32::MAX];
        for a in sorts {
            let _ = (Fixed16::square(a, scale()), Fixed16::root(a, scale()));
            for b in sorts {
                let _ = (Fixed16::stretch(a, b), Fixed16::rescale(a, b, b));
                for c in sorts {
                    let _ = (
                        Fixed16::turn([a, b], [c, a]),
                        Fixed16::yaw_angle([a, b], c),
                        Fixed16::hip_angle([a, b], c, a),
                    );
                }
            }
        }
        for angle in [I0F16::MIN, I0F16::ZERO, I0F16::MAX] {
            for from in [I0F16::MIN, I0F16::ZERO, I0F16::MAX] {
                for per_turn in [-32_400.0, -36.0, 36.0, 32_400.0] {
                    let _ = Fixed16::travel(angle, from, Fixed16::gain_from(per_turn));
                    for travel in sorts {
                        let _ = Fixed16::swing_to(travel, from, Fixed16::swing_from(1.0 / per_turn));
                    }
                }
            }
        }
    }

    #[test]
    fn lengths_go_in_and_out_unchanged() {
        for radius in [1.0, 2.5, 10.0, 113.2, 113.4, 232.5, 453.0] {
            let scale = Fixed16::scale_for(radius).expect("a scale");
            assert!(radius * scale.units_per_mm() <= RADIUS_LIMIT);
            for bits in (i16::MIN..=i16::MAX).step_by(7) {
                let length = I10F6::from_bits(bits);
                if f64::from(length).abs() < radius {
                    let Some([coord, ..]) = Fixed16::near([length, I10F6::ZERO, I10F6::ZERO], scale) else {
                        panic!("{length} is within {radius}")
                    };
                    assert_eq!(Fixed16::length(coord, scale), length);
                }
            }
        }
    }

    #[test]
    fn a_foot_far_away_keeps_its_direction() {
        let scale = Fixed16::scale_for(1.0).expect("a scale");
        let foot = [I10F6::MIN, I10F6::from_num(100), I10F6::from_num(-3)];
        let Placed::Far([x, y, z], times) = Fixed16::place(foot, scale) else { panic!("far") };
        assert!(is_near([x, y, z]) && (6..=16).contains(&times), "{x} {y} {z} {times}");
        assert!((f64::from(y) / f64::from(x) + 100.0 / 512.0).abs() < 1e-4, "{x} {y}");
    }

    #[test]
    fn a_quotient_is_the_whole_part() {
        for (a, b) in [(0, 1), (7, 2), (u32::MAX, 1), (u32::MAX, u32::MAX), (1 << 30, 12_345), (5, 9)] {
            assert_eq!(quotient(a, b), a / b);
        }
        assert_eq!(quotient(5, 0), u32::MAX);
    }

    #[test]
    fn a_leg_too_long_or_too_short_is_refused() {
        let roll = |links: f64| {
            let measures =
                Dimensions::<RollHip>::roll_hip(0.0, links, links, Bend::Forward).expect("measures");
            Leg::<RollHip, Fixed16>::new(measures, Limits::FREE).err()
        };
        assert_eq!(roll(226.0), None);
        assert_eq!(roll(227.0), Some(GeometryError::TooLong));
        assert_eq!(roll(0.4), Some(GeometryError::TooShort));
        let measures = Dimensions::<YawHip>::yaw_hip(300.0, 100.0, 100.0, Bend::Up).expect("measures");
        assert_eq!(Leg::<YawHip, Fixed16>::new(measures, Limits::FREE).err(), Some(GeometryError::TooLong));
    }
}
