//! Values that the compiler knows nothing of, and an end for results that it must not throw away.

use core::hint::black_box;

/// Any word.
#[inline(never)]
pub fn word() -> u32 {
    black_box(0)
}

/// Any number, NaN and infinity included.
pub fn number() -> f64 {
    f64::from_bits(u64::from(word()) << 32 | u64::from(word()))
}

/// Any three.
pub fn three() -> [f64; 3] {
    [number(), number(), number()]
}

/// Any two.
pub fn two() -> [f64; 2] {
    [number(), number()]
}

/// Whether anything.
pub fn truth() -> bool {
    word() != 0
}

/// Uses a result up.
pub fn use_up<T>(result: T) {
    black_box(&result);
}
