//! Square root: the reciprocal of the root from a table and one of Newton's steps, and the remainder's share of it.

use crate::const_math::{nearest, square_root};

/// 2^31 over the root of the middles of 192 intervals of [2^30, 2^32); what lies below a quarter never is asked for.
static RECIPROCALS: [u16; 256] = reciprocals();

const fn reciprocals() -> [u16; 256] {
    let mut table = [u16::MAX; 256];
    let mut i = 64;
    while i < table.len() {
        let middle = (i as f64 + 0.5) * (1 << 24) as f64;
        table[i] = nearest((1u64 << 31) as f64 / square_root(middle)) as u16;
        i += 1;
    }
    table
}

/// 2^16·√value for a value of 2^30 or more, within 1.6e-8 of it in proportion: every value there is, with TOEHOLD_LONG=1,
/// the largest 1.597e-8; 0 for 0.
#[inline(always)]
pub(super) fn root(value: u32) -> u32 {
    let start = u32::from(RECIPROCALS[(value >> 24) as usize]);
    let top = value >> 16;
    // Newton: y·(3 − v·y²)/2, which never comes out too large; so neither does the root.
    let share = top.wrapping_mul(start.wrapping_mul(start) >> 16);
    let reciprocal = start.wrapping_mul((3u32 << 30).wrapping_sub(share) >> 16) >> 15;
    let whole = top.wrapping_mul(reciprocal) >> 15;
    // value = whole² + rest with the rest below some 2^18, so half of it over the root is good to the last bits.
    let rest = value.wrapping_sub(whole.wrapping_mul(whole)) as i32;
    let fine = (rest >> 2).wrapping_mul((reciprocal >> 2) as i32) >> 12;
    (whole << 16).wrapping_add(fine as u32)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn root_keeps_its_bound() {
        let mut worst = 0.0f64;
        let dense = (1u32 << 30..=u32::MAX).step_by(crate::number::sweep(211));
        let edges =
            (64..256u32).flat_map(|i| [i << 24, (i << 24) + 1, (i << 24).wrapping_sub(1).max(1 << 30)]);
        for value in dense.chain(edges).chain([u32::MAX]) {
            let (got, want) = (f64::from(root(value)), f64::from(value).sqrt() * 65_536.0);
            worst = worst.max(((got - want) / want).abs());
        }
        std::println!("short32/root: {worst:e}");
        assert!(worst < 1.6e-8 && worst > 8e-9, "{worst:e}");
        assert_eq!(root(0), 0);
    }
}
