//! Calls every public function of ik-core with values that the compiler knows nothing of. The panic handler calls a
//! function that does not exist: the image links only if the optimiser removed every way to it. It never runs.
//!
//! `.ci/no-panic` builds it for every number system and compiler target, sees to it that no public function of ik-core
//! is forgotten here, and that the image with the feature `deliberate` does not link.
#![no_std]
#![no_main]

mod calls;
mod frame;
#[cfg(feature = "hal")]
mod hal;
mod numbers;
mod opaque;

#[panic_handler]
fn panicked(panic: &core::panic::PanicInfo<'_>) -> ! {
    unsafe extern "C" {
        fn a_panic_is_left() -> !;
    }
    if cfg!(feature = "let-them-be") {
        opaque::use_up(panic.location());
        loop {
            core::hint::spin_loop();
        }
    }
    // SAFETY: there is no such function: this does not link.
    unsafe { a_panic_is_left() }
}

/// Where the linker begins.
// SAFETY: no other symbol has this name.
#[unsafe(no_mangle)]
pub extern "C" fn _start() -> ! {
    #[cfg(feature = "float32")]
    calls::all::<ik_core::Float32>();
    #[cfg(feature = "coarse")]
    calls::all::<ik_core::Coarse>();
    #[cfg(feature = "fixed32")]
    calls::all::<ik_core::Fixed32>();
    #[cfg(feature = "short32")]
    calls::all::<ik_core::Short32>();
    #[cfg(feature = "fixed16")]
    calls::all::<ik_core::Fixed16>();
    #[cfg(feature = "hal")]
    hal::all();
    #[cfg(feature = "deliberate")]
    opaque::use_up(deliberate(opaque::word()));
    loop {
        core::hint::spin_loop();
    }
}

/// Panics for some numbers.
#[cfg(feature = "deliberate")]
#[inline(never)]
fn deliberate(number: u32) -> u32 {
    if number == 17 {
        panic!("on purpose");
    }
    number + 1
}
