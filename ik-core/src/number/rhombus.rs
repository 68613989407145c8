//! The angle between two vectors of the same length, for fixed point: see [`Number::turn`](super::Number::turn).
//!
//! The two and their sum make a rhombus: their difference, its other diagonal, is perpendicular to the sum, and what lies
//! between the sum and either of them is half of the angle. So its tangent is a quotient of coordinates, without a
//! product, and no digit of short vectors is lost:
//!
//! ```text
//! tan ½angle = (to.y − from.y) / (to.x + from.x) = (from.x − to.x) / (to.y + from.y)
//! ```
//!
//! of which the one with the larger denominator is taken.

/// How a number system takes angles.
#[derive(Clone, Copy)]
pub(super) struct Angles<F> {
    /// 2·arctan(rise / run) for rise ≤ run, at most a quarter turn.
    pub(super) double_angle: F,
    /// Half a turn, and what it is held at.
    pub(super) half_turn: [i32; 2],
}

/// The angle that turns `from` to `to`; coordinates are such that two of them add up. Sums below `least` may be nothing but
/// rounding: those of vectors that are opposite, or short.
#[cfg(feature = "short32")]
#[inline(always)]
pub(super) fn turn<F: Fn(u32, u32) -> i32>(
    [from_x, from_y]: [i32; 2],
    [to_x, to_y]: [i32; 2],
    angles: Angles<F>,
    least: u32,
) -> i32 {
    let (sum_x, sum_y) = (from_x.wrapping_add(to_x), from_y.wrapping_add(to_y));
    let (top, bottom) = if sum_x.unsigned_abs() >= sum_y.unsigned_abs() {
        (to_y.wrapping_sub(from_y), sum_x)
    } else {
        (from_x.wrapping_sub(to_x), sum_y)
    };
    let (rise, run) = (top.unsigned_abs(), bottom.unsigned_abs());
    if rise > run || run < least {
        return any_turn([from_x, from_y], [to_x, to_y], angles);
    }
    signed((angles.double_angle)(rise, run), top ^ bottom)
}

/// The size, or its negative if `sign` is negative: by the sign's mask, without a branch.
#[inline(always)]
pub(super) const fn signed(size: i32, sign: i32) -> i32 {
    let mask = sign >> 31;
    (size ^ mask).wrapping_sub(mask)
}

/// The same by more than a quarter, or of short vectors, which legs seldom do. Here the differences count as well in
/// choosing, for one of them is as long as the vectors if the sums are next to nothing.
#[cold]
#[inline(never)]
pub(super) fn any_turn<F: Fn(u32, u32) -> i32>(
    [from_x, from_y]: [i32; 2],
    [to_x, to_y]: [i32; 2],
    Angles { double_angle, half_turn: [half_turn, most] }: Angles<F>,
) -> i32 {
    let (sum_x, sum_y) = (from_x.wrapping_add(to_x), from_y.wrapping_add(to_y));
    let (apart_x, apart_y) = (from_x.wrapping_sub(to_x), to_y.wrapping_sub(from_y));
    let size = |a: i32, b: i32| a.unsigned_abs().saturating_add(b.unsigned_abs());
    let (top, bottom) =
        if size(sum_x, apart_y) >= size(sum_y, apart_x) { (apart_y, sum_x) } else { (apart_x, sum_y) };
    let (rise, run) = (top.unsigned_abs(), bottom.unsigned_abs());
    if rise <= run {
        signed(double_angle(rise, run), top ^ bottom)
    } else if run == 0 {
        most
    } else {
        signed((half_turn - double_angle(run, rise)).min(most), top ^ bottom)
    }
}
