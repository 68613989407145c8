//! Square root, by 96 chords over two octaves.

use super::super::narrow::chord::Chord;
use super::super::narrow::normal;
use crate::const_math::{power_of_two, square_root};

/// The radicand's bits below the interval's number.
const WITHIN_BITS: u32 = 25;
/// Those of them that are used.
const FRACTION_BITS: u32 = 11;
/// The largest relative error of a root, before it is cut to a coordinate.
#[cfg(test)]
const ROOT_BOUND: f64 = 3.1e-5;

static CHORDS: [Chord; 128] = chords();

const fn chords() -> [Chord; 128] {
    let mut table = [Chord::FLAT; 128];
    // What lies below a quarter never is asked for.
    let mut i = 32;
    while i < 128 {
        table[i] = Chord::through(wide(i as f64), wide(i as f64 + 0.5), wide(i as f64 + 1.0), FRACTION_BITS);
        i += 1;
    }
    table
}

/// The root at the start of an interval: half a step more, as the radicand comes with its rest cut off.
const fn wide(interval: f64) -> f64 {
    square_root((interval + 0.5 / (1 << FRACTION_BITS) as f64) / 128.0) * power_of_two(32)
}

/// A root before its scale is undone.
#[derive(Clone, Copy)]
pub(super) struct Root {
    /// √v·2^(16 + halvings), 32 bits.
    pub(super) wide: u32,
    /// 2^(29 − halvings)/√v, roughly (1 %).
    pub(super) reciprocal: u32,
    /// What is to be shifted out beyond 16 bits.
    pub(super) halvings: u32,
}

/// √value, within 3.1e-5 of itself: every radicand, with TOEHOLD_LONG=1, the largest 2.988e-5; without, those below 2^18
/// and every 1009th.
#[inline(always)]
pub(super) fn root(value: u32) -> Root {
    let (value, halvings) = normal::by_fours(value);
    let chord = CHORDS[(value >> WITHIN_BITS) as usize];
    let steps = (value << (32 - WITHIN_BITS)) >> (32 - FRACTION_BITS);
    Root { wide: chord.after(steps), reciprocal: chord.slope(), halvings }
}

/// √value, rounded: within half a step and 3.1e-5 of itself.
#[inline(never)]
pub(super) fn rounded(value: u32) -> u32 {
    let root = root(value);
    ((root.wide >> (15 + root.halvings)) + 1) >> 1
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Relative error of the wide root against `f64`; and whether the halvings are as promised.
    fn error(value: u32) -> f64 {
        let root = root(value);
        assert!(root.halvings <= 15, "{value}");
        let got = f64::from(root.wide) / power_of_two(16 + root.halvings as i32);
        let want = f64::from(value).sqrt();
        // The reciprocal only has to be rough.
        let reciprocal = f64::from(root.reciprocal) / power_of_two(29 - root.halvings as i32);
        assert!((reciprocal * want - 1.0).abs() < 0.01, "{value}: {reciprocal}");
        (got / want - 1.0).abs()
    }

    #[test]
    fn the_root_keeps_its_bound() {
        // The usual way starts at 2^24 and has a period of four; the smaller radicands are all tried.
        let edges = (0..32).flat_map(|k| [0, 1, 2].map(|d| (1u32 << k).wrapping_add(d).wrapping_sub(1)));
        let step = crate::number::sweep(1_009);
        let mut worst = 0.0f64;
        for value in (1..1 << 18).chain((1 << 18..=u32::MAX).step_by(step)).chain(edges) {
            if value > 0 {
                worst = worst.max(error(value));
            }
        }
        std::println!("fixed16/root: {worst:e}");
        assert!(worst < ROOT_BOUND && worst > ROOT_BOUND / 2.0, "{worst:e}");
    }

    #[test]
    fn small_roots_are_rounded_to_nearest_or_next_to_it() {
        assert_eq!(rounded(0), 0);
        for value in 1..1 << 20 {
            let off = f64::from(rounded(value)) - f64::from(value).sqrt();
            assert!(off.abs() <= 0.5 + ROOT_BOUND * f64::from(value).sqrt(), "{value}: {off}");
        }
    }
}
