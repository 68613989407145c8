//! Products of 32-bit numbers from their halves, for chips whose multiplication gives 32 bits.

/// A number as 65536·high + low.
#[derive(Debug, Clone, Copy)]
pub(super) struct Halves {
    high: i32,
    low: i32,
}

impl Halves {
    #[inline(always)]
    pub(super) const fn of(value: i32) -> Self {
        Self { high: value >> 16, low: value & 0xFFFF }
    }
}

/// The square of a coordinate over 2^28, for |value| ≤ 2^29; no more than the exact one, and less by 2 at the most.
#[inline(always)]
pub(super) const fn square(value: i32) -> i32 {
    let Halves { high, low } = Halves::of(value);
    let cross = high.wrapping_mul(low) >> 11;
    let least = ((low as u32).wrapping_mul(low as u32) >> 28) as i32;
    (high.wrapping_mul(high) << 4).wrapping_add(cross).wrapping_add(least)
}

/// What [`product`] lacks of a product.
pub(super) const DROP: i32 = 30;

/// a·b over 2^[`DROP`]; no more than the exact one, and less by 5 at the most. For |a| ≤ 2^29 and |b| ≤ 2^30, and the other way
/// round.
#[inline(always)]
pub(super) const fn product(a: Halves, b: Halves) -> i32 {
    let cross = a.high.wrapping_mul(b.low).wrapping_add(a.low.wrapping_mul(b.high));
    (a.high.wrapping_mul(b.high) << 2).wrapping_add(cross >> 14)
}

/// The upper 32 bits of a product; no more than the exact ones, and less by 3 at the most.
#[inline(always)]
pub(super) const fn upper(a: u32, b: u32) -> u32 {
    let ([a_high, a_low], [b_high, b_low]) = ([a >> 16, a & 0xFFFF], [b >> 16, b & 0xFFFF]);
    a_high
        .wrapping_mul(b_high)
        .wrapping_add(a_high.wrapping_mul(b_low) >> 16)
        .wrapping_add(a_low.wrapping_mul(b_high) >> 16)
}

/// a·b of numbers with 30 fraction bits within ±2, within 3.
pub(super) const fn times(a: i32, b: i32) -> i32 {
    let size = upper(a.unsigned_abs() << 1, b.unsigned_abs() << 1) as i32;
    if (a ^ b) < 0 { -size } else { size }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Numbers below 2^`bits`, densely over all sizes, with their edges.
    fn numbers(bits: u32) -> impl Iterator<Item = i32> + Clone {
        let edge = 1i64 << bits;
        let dense = (0..40_000i64).map(move |i| (i * 0x9E37_79B9 % (2 * edge) - edge) >> (i % 5 * 3));
        let edges = [-edge, 1 - edge, -0x10001, -0x10000, -0xFFFF, -1, 0, 1, 0xFFFF, 0x10000, edge - 1];
        dense.chain(edges).map(|v| v as i32)
    }

    #[test]
    fn a_square_keeps_its_bound() {
        let mut most = 0;
        for v in numbers(29) {
            let short = ((i64::from(v) * i64::from(v)) >> 28) - i64::from(square(v));
            assert!((0..=2).contains(&short), "{v}: {short}");
            most = most.max(short);
        }
        assert!(most >= 1, "{most}");
    }

    #[test]
    fn products_keep_their_bound() {
        let others = numbers(29).skip(17).step_by(3).chain(numbers(29));
        let mut most = 0;
        for (a, b) in numbers(30).zip(others) {
            let exact = i64::from(a) * i64::from(b);
            let short = (exact >> 30) - i64::from(product(Halves::of(a), Halves::of(b)));
            assert!((0..=5).contains(&short), "{a} {b}: {short}");
            most = most.max(short);
        }
        assert!(most >= 3, "{most}");
    }

    #[test]
    fn upper_halves_keep_their_bound() {
        for (a, b) in numbers(31).zip(numbers(31).skip(5)) {
            let (a, b) = (a as u32, b as u32);
            let short = ((u64::from(a) * u64::from(b)) >> 32) as i64 - i64::from(upper(a, b));
            assert!((0..=3).contains(&short), "{a} {b}: {short}");
        }
        for (a, b) in numbers(30).zip(numbers(30).skip(5)) {
            let off = ((i64::from(a) * i64::from(b)) >> 30) - i64::from(times(a, b));
            assert!(off.abs() <= 3, "{a} {b}: {off}");
        }
    }
}
