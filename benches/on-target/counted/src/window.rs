//! A call between two marker instructions.

use core::{arch::naked_asm, mem::MaybeUninit};

/// As a firmware would call a solver: pointers in, the answer written where it is wanted.
pub type Entry<L, F, A> = extern "C" fn(&L, &F, &mut MaybeUninit<A>);

/// Calls `entry`, which must write the answer. What is executed between the marker instructions is the call (one
/// instruction) and `entry` with its return, nothing else. The compiler cannot see through it, so it knows nothing of
/// leg and foot.
///
/// # Safety
/// `entry` must write the answer.
pub unsafe fn call<L, F, A>(entry: Entry<L, F, A>, leg: &L, foot: &F) -> A {
    let mut answer = MaybeUninit::uninit();
    // SAFETY: three references for the three parameters of `entry`, in its order; all live long enough.
    unsafe {
        call_in_window(
            (&raw const *leg).cast(),
            (&raw const *foot).cast(),
            (&raw mut answer).cast(),
            entry as *const (),
        );
    }
    // SAFETY: by this function's contract `entry` wrote it.
    unsafe { answer.assume_init() }
}

/// The chip's own count of instructions executed so far, the low word.
#[cfg(target_arch = "riscv32")]
pub fn retired() -> u32 {
    let count;
    // SAFETY: reading the counter changes nothing.
    unsafe { core::arch::asm!("csrr {}, minstret", out(reg) count, options(nomem, nostack)) }
    count
}

/// Calls `entry` with the first three arguments.
///
/// The markers are Thumb hints 8 and 9, which do nothing on any Cortex-M. The word stored just before the first
/// tells the plugin where the stack stands.
///
/// # Safety
/// `entry` must be an `extern "C"` function that may be called with these three.
#[cfg(target_arch = "arm")]
// SAFETY: the code follows the C ABI: it keeps r4 and lr, and the stack aligned to 8 bytes.
#[unsafe(naked)]
unsafe extern "C" fn call_in_window(_leg: *const (), _foot: *const (), _answer: *mut (), _entry: *const ()) {
    naked_asm!(
        "push {{r4, lr}}",
        "sub sp, #8",
        "str r0, [sp]",
        ".inst.n 0xbf80",
        "blx r3",
        ".inst.n 0xbf90",
        "add sp, #8",
        "pop {{r4, pc}}",
    )
}

/// The same for RISC-V: the markers write to the register that is always 0.
///
/// # Safety
/// As above.
#[cfg(target_arch = "riscv32")]
// SAFETY: the code follows the C ABI: it keeps ra, and the stack aligned to 16 bytes.
#[unsafe(naked)]
unsafe extern "C" fn call_in_window(_leg: *const (), _foot: *const (), _answer: *mut (), _entry: *const ()) {
    naked_asm!(
        "addi sp, sp, -16",
        "sw ra, 12(sp)",
        "sw a0, 0(sp)",
        "slti x0, x0, 8",
        "jalr a3",
        "slti x0, x0, 9",
        "lw ra, 12(sp)",
        "addi sp, sp, 16",
        "ret",
    )
}
