//! Shifting a number until its top bits are used, without a count of leading zeros: by a table of those of a byte.
//!
//! Small numbers are rare (a foot next to an axis, a leg next to straight) and take a longer way, out of line.

/// 2 to the leading zeros of a byte: a multiplication by it is a shift, and no shift of a chip's would have to be held
/// within bounds first.
static POWERS: [u8; 256] = powers();
/// The leading zeros of a byte.
static ZEROS: [u8; 256] = zeros();

const fn zeros() -> [u8; 256] {
    let mut table = [7; 256];
    let mut i = 1;
    while i < 256 {
        table[i] = (i as u8).leading_zeros() as u8;
        i += 1;
    }
    table
}

const fn powers() -> [u8; 256] {
    let mut table = [128; 256];
    let mut i = 1;
    while i < 256 {
        table[i] = 1 << (i as u8).leading_zeros();
        i += 1;
    }
    table
}

/// `value`·4^e in [2^30, 2^32), and e of at most 15; 0 stays 0.
#[inline(always)]
pub(in crate::number) fn by_fours(value: u32) -> (u32, u32) {
    let top = (value >> 24) as u8;
    if top == 0 {
        let (value, e) = by_fours_of_little(value);
        // The compiler is told what it cannot know: that e is a good shift.
        return (value, e & 15);
    }
    let shift = u32::from(ZEROS[usize::from(top)]) & 6;
    (value << shift, shift / 2)
}

#[cold]
#[inline(never)]
fn by_fours_of_little(value: u32) -> (u32, u32) {
    let (mut value, mut e) = (value << 8, 4);
    while value < 1 << 30 && e < 15 {
        value <<= 2;
        e += 1;
    }
    (value, e)
}

/// `run`·2^s in [2^31, 2^32), and `rise`·2^s; 0 stays 0. For rise ≤ run.
#[inline(always)]
pub(in crate::number) fn both(run: u32, rise: u32) -> (u32, u32) {
    let top = (run >> 24) as u8;
    if top == 0 {
        return both_of_little(run, rise);
    }
    let power = u32::from(POWERS[usize::from(top)]);
    (run.wrapping_mul(power), rise.wrapping_mul(power))
}

#[cold]
#[inline(never)]
fn both_of_little(run: u32, rise: u32) -> (u32, u32) {
    let (mut run, mut rise) = (run << 8, rise << 8);
    let mut left = 24;
    while run < 1 << 31 && left > 0 {
        (run, rise) = (run << 1, rise << 1);
        left -= 1;
    }
    (run, rise)
}
