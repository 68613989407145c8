//! √v by the chip's own instruction, where there is one that stable Rust does not reach by itself.
//!
//! IEEE 754 wants a root correctly rounded, so the chip's, libm's and the PC's have the same bits.

/// √v for v ≥ 0, correctly rounded.
#[cfg(all(target_arch = "arm", target_abi = "eabihf"))]
#[expect(unsafe_code, reason = "core offers no square root instruction on stable; this is its only use")]
#[inline(always)]
pub(super) fn root(v: f32) -> f32 {
    let mut bits = v.to_bits();
    // SAFETY: a hard-float Arm target has VSQRT.F32. It touches s15, which is declared, and nothing else: no memory, no
    // stack. s15 is named because the register class is not open to stable code.
    unsafe {
        core::arch::asm!(
            "vmov s15, {bits}",
            "vsqrt.f32 s15, s15",
            "vmov {bits}, s15",
            bits = inout(reg) bits,
            out("s15") _,
            options(pure, nomem, nostack, preserves_flags),
        );
    }
    f32::from_bits(bits)
}

/// √(upper + lower/2^32) for upper ≥ 0; both words are converted, added and the root taken, each correctly rounded.
///
/// Words come from the core's registers: here two of them travel at once.
#[cfg(all(target_arch = "arm", target_abi = "eabihf"))]
#[expect(unsafe_code, reason = "as above")]
#[inline(always)]
pub(super) fn root_of_words(upper: i32, lower: u32) -> f32 {
    let bits: u32;
    // SAFETY: as above; and s14.
    unsafe {
        core::arch::asm!(
            "vmov s14, s15, {lower}, {upper}",
            "vcvt.f32.u32 s14, s14, #32",
            "vcvt.f32.s32 s15, s15",
            "vadd.f32 s15, s15, s14",
            "vsqrt.f32 s15, s15",
            "vmov {bits}, s15",
            upper = in(reg) upper,
            lower = in(reg) lower,
            bits = lateout(reg) bits,
            out("s14") _,
            out("s15") _,
            options(pure, nomem, nostack, preserves_flags),
        );
    }
    f32::from_bits(bits)
}

/// As above.
#[cfg(not(all(target_arch = "arm", target_abi = "eabihf")))]
#[inline(always)]
pub(super) fn root_of_words(upper: i32, lower: u32) -> f32 {
    root(upper as f32 + lower as f32 * (1.0 / 4_294_967_296.0))
}

/// √v for v ≥ 0, correctly rounded.
#[cfg(not(all(target_arch = "arm", target_abi = "eabihf")))]
#[inline(always)]
pub(super) fn root(v: f32) -> f32 {
    libm::sqrtf(v)
}
