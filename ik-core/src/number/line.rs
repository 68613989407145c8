//! Straight lines from angles to whole numbers, for fixed point: one multiplication, one addition, one shift.

use crate::const_math::{magnitude, nearest_i32, power_of_two};

/// A straight line from an angle to a whole number; made by [`Number::line_from`](super::Number::line_from).
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct FixedLine {
    /// Per turn, with `shift` fraction bits.
    slope: i32,
    /// At no angle, and ½ more, with `shift` fraction bits.
    start: i32,
    shift: u32,
}

impl FixedLine {
    /// With as many fraction bits as 31 bits leave room for, up to 24: nothing overflows at any angle. The line is then
    /// within ¾ of its smallest part, 2^-shift, of the exact one before it is rounded down, for the two roundings down are one.
    pub(super) const fn from(per_turn: f64, at_zero: f64) -> Self {
        let most = magnitude(per_turn) + magnitude(at_zero) + 2.0;
        let mut shift = 0;
        while shift < 24 && most * power_of_two(shift + 1) < power_of_two(31) {
            shift += 1;
        }
        let part = power_of_two(shift);
        Self {
            slope: nearest_i32(per_turn * part),
            start: nearest_i32((at_zero + 0.5) * part),
            shift: shift as u32,
        }
    }

    /// Where there is a long multiplication; `angle` is in 2^-32 turns.
    #[cfg(feature = "fixed32")]
    #[inline(always)]
    pub(super) const fn at(self, angle: i32) -> i32 {
        let rise = ((angle as i64 * self.slope as i64) >> 32) as i32;
        rise.wrapping_add(self.start).wrapping_shr(self.shift)
    }

    /// The line for [`at_halves`](Self::at_halves), which loses one of its smallest parts on average.
    #[cfg(feature = "short32")]
    pub(super) const fn for_halves(self) -> Self {
        Self { start: self.start.saturating_add(1), ..self }
    }

    /// Where there is none, from halves; `angle` is in 2^-32 turns. Within one of the line's smallest parts of what the long
    /// multiplication gives.
    #[cfg(feature = "short32")]
    #[inline(always)]
    pub(super) const fn at_halves(self, angle: i32) -> i32 {
        let ([whole, rest], [high, low]) =
            ([self.slope >> 16, self.slope & 0xFFFF], [angle >> 16, angle & 0xFFFF]);
        // Halved, so that they add up.
        let crosses = (high.wrapping_mul(rest) >> 1).wrapping_add(low.wrapping_mul(whole) >> 1) >> 15;
        let rise = high.wrapping_mul(whole).wrapping_add(crosses);
        rise.wrapping_add(self.start).wrapping_shr(self.shift)
    }

    /// Where there is none; `angle` is in 2^-16 turns. The same number as [`at`](Self::at) of it.
    #[cfg(feature = "fixed16")]
    #[inline(always)]
    pub(super) const fn at_short(self, angle: i16) -> i32 {
        let angle = angle as i32;
        let (whole, rest) = (self.slope >> 16, self.slope & 0xFFFF);
        let rise = angle.wrapping_mul(whole).wrapping_add(angle.wrapping_mul(rest) >> 16);
        rise.wrapping_add(self.start).wrapping_shr(self.shift)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Slopes and starts of servos, from the coarsest output to the finest.
    const LINES: [(f64, f64); 7] = [
        (819.0, 307.5),
        (-12_787.2, 4800.0),
        (4000.0 * 21.8, 1500.0 * 21.8),
        (-32_400_000.0, 32_767_000.0),
        (32_400_000.0, -16_200_000.0),
        (36.0, 1.0),
        (0.5, 0.0),
    ];

    #[cfg(feature = "fixed32")]
    #[test]
    fn a_line_is_within_three_quarters_of_its_smallest_part() {
        for (per_turn, at_zero) in LINES {
            let line = FixedLine::from(per_turn, at_zero);
            for step in -32_768..32_768i64 {
                let angle = (step * 65_536 + (step * step) % 65_536) as i32;
                let exact = per_turn * f64::from(angle) / 4_294_967_296.0 + at_zero;
                let off = f64::from(line.at(angle)) - exact;
                let slack = 0.5 + 0.75 / power_of_two(line.shift as i32);
                assert!(off.abs() <= slack, "{per_turn} {at_zero} {angle}: off by {off}");
            }
        }
    }

    #[cfg(feature = "short32")]
    #[test]
    fn a_line_from_halves_is_within_a_part_and_three_quarters() {
        let (mut most, mut state) = (0.0f64, 1u64);
        for (per_turn, at_zero) in LINES {
            let line = FixedLine::from(per_turn, at_zero).for_halves();
            for step in -32_768..32_768i64 {
                state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
                for rest in [(state >> 48) as i64, 0, 65_535] {
                    let angle = (step * 65_536 + rest) as i32;
                    let exact = per_turn * f64::from(angle) / 4_294_967_296.0 + at_zero;
                    let beyond = (f64::from(line.at_halves(angle)) - exact).abs() - 0.5;
                    let parts = beyond * power_of_two(line.shift as i32);
                    assert!(parts <= 1.75, "{per_turn} {at_zero} {angle}: {parts}");
                    most = most.max(parts);
                }
            }
        }
        assert!(most > 0.875, "{most}");
    }

    #[cfg(all(feature = "fixed16", feature = "fixed32"))]
    #[test]
    fn short_multiplications_come_to_the_same() {
        for (per_turn, at_zero) in LINES {
            let line = FixedLine::from(per_turn, at_zero);
            for angle in i16::MIN..=i16::MAX {
                assert_eq!(
                    line.at_short(angle),
                    line.at(i32::from(angle) << 16),
                    "{per_turn} {at_zero} {angle}"
                );
            }
        }
    }
}
