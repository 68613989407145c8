//! A call between two marker instructions.

use core::{arch::naked_asm, mem::MaybeUninit};

use contenders::Contender;

type Entry<C> = extern "C" fn(
    &<C as Contender>::Leg,
    &<C as Contender>::Foot,
    &mut MaybeUninit<<C as Contender>::Answer>,
);

/// Solves one foot. What is executed between the marker instructions is the call (one `blx`) and the contender
/// with its return, nothing else.
pub(crate) fn solve<C: Contender>(leg: &C::Leg, foot: &C::Foot) -> C::Answer {
    let mut answer = MaybeUninit::uninit();
    // SAFETY: three references for the three parameters of `entry`, in its order; all live long enough.
    unsafe {
        call_in_window(
            (&raw const *leg).cast(),
            (&raw const *foot).cast(),
            (&raw mut answer).cast(),
            (entry::<C> as Entry<C>) as *const (),
        );
    }
    // SAFETY: `entry` wrote it.
    unsafe { answer.assume_init() }
}

/// As a firmware would call a solver: pointers in, the answer written where it is wanted.
extern "C" fn entry<C: Contender>(leg: &C::Leg, foot: &C::Foot, answer: &mut MaybeUninit<C::Answer>) {
    answer.write(C::solve(leg, foot));
}

/// Calls `entry` with the first three arguments. The compiler cannot see through it, so it knows nothing of leg and
/// foot.
///
/// The markers are Thumb hints 8 and 9, which do nothing on any Cortex-M. The word stored just before the first
/// tells the plugin where the stack stands.
///
/// # Safety
/// `entry` must be an `extern "C"` function that may be called with these three.
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
