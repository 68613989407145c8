//! Sine and cosine of a fraction of a turn.

use super::RATIO_BITS;
use crate::number::series;

const fn times(a: i32, b: i32) -> i32 {
    // Both lie within ±2 of the series' fraction bits, and so does every product formed here.
    ((a as i64 * b as i64 + (1 << (series::BITS - 1))) >> series::BITS) as i32
}

/// (sin, cos) of `turns`/2^32 turn with [`RATIO_BITS`] fraction bits, within 6e-9: every angle there is, the largest 3.259e-9
/// (`TOEHOLD_LONG=1 cargo test --release -p ik-core --all-features --lib -- bound --nocapture`, seven minutes for all kernels).
pub(super) fn sin_cos(turns: i32) -> (i32, i32) {
    let (sine, cosine) = series::sin_cos(turns, times);
    const { assert!(series::BITS == RATIO_BITS) };
    (sine, cosine)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn sine_and_cosine_keep_their_bound_over_the_whole_turn() {
        let mut worst = 0.0f64;
        // A prime step visits the turn densely; the eighths are its edges.
        let eighths = (0..8u32).flat_map(|k| [-2i32, -1, 0, 1, 2].map(|d| (k << 29).wrapping_add_signed(d)));
        for bits in (0..=u32::MAX).step_by(crate::number::sweep(1_009)).chain(eighths) {
            let (sine, cosine) = sin_cos(bits as i32);
            let angle = f64::from(bits as i32) / 4_294_967_296.0 * core::f64::consts::TAU;
            let unit = f64::from(1 << RATIO_BITS);
            worst = worst.max((f64::from(sine) / unit - angle.sin()).abs());
            worst = worst.max((f64::from(cosine) / unit - angle.cos()).abs());
        }
        std::println!("fixed32/sine: {worst:e}");
        assert!(worst < 6e-9 && worst > 3e-9, "{worst:e}");
    }
}
