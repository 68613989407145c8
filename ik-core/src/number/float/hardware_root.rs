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

/// √v for v ≥ 0, correctly rounded.
#[cfg(not(all(target_arch = "arm", target_abi = "eabihf")))]
#[inline(always)]
pub(super) fn root(v: f32) -> f32 {
    libm::sqrtf(v)
}
