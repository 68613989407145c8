//! How a run ends. Under the emulator every end is an exit code; on a real board, where there is no
//! debugger to answer, replace the calls of `exit` by what makes *your* machine safe: servo power
//! off first, then stand still.

use core::sync::atomic::{AtomicI32, Ordering::Relaxed};

use semihosting::process::exit;

/// Exit code after a panic.
pub const PANICKED: i32 = 101;
/// Exit code after a hard fault (RISC-V: an exception).
pub const FAULTED: i32 = 102;

const RUNNING: i32 = 0;

/// Why the run is ending, if it is: logging from a handler can itself panic or fault, and then the
/// first reason is the one to report.
static ENDING: AtomicI32 = AtomicI32::new(RUNNING);

/// Ends the run in good order.
pub fn done() -> ! {
    exit(0)
}

/// Executes an instruction that no chip has, on purpose.
pub fn fault() -> ! {
    #[cfg(not(target_arch = "riscv32"))]
    cortex_m::asm::udf();
    #[cfg(target_arch = "riscv32")]
    // SAFETY: it changes nothing and does not return: the exception's handler ends the run.
    unsafe {
        core::arch::asm!("unimp", options(noreturn))
    }
}

/// Ends the run with `code`, after `last_words` if they can still be logged.
fn end(code: i32, last_words: impl FnOnce()) -> ! {
    let reason = ENDING.load(Relaxed);
    if reason != RUNNING {
        exit(reason)
    }
    ENDING.store(code, Relaxed);
    last_words();
    exit(code)
}

#[panic_handler]
fn panicked(info: &core::panic::PanicInfo<'_>) -> ! {
    end(PANICKED, || match info.location() {
        Some(place) => defmt::println!("panicked at {=str}:{=u32}", place.file(), place.line()),
        None => defmt::println!("panicked at an unknown place"),
    })
}

#[cfg(not(target_arch = "riscv32"))]
#[cortex_m_rt::exception]
unsafe fn HardFault(frame: &cortex_m_rt::ExceptionFrame) -> ! {
    faulted(frame.pc())
}

/// What a RISC-V chip does about an illegal instruction, a misaligned or forbidden access and the like.
#[cfg(target_arch = "riscv32")]
// SAFETY: riscv-rt looks for a function of this name and signature.
#[unsafe(export_name = "ExceptionHandler")]
fn exception(_frame: &riscv_rt::TrapFrame) -> ! {
    faulted(riscv::register::mepc::read() as u32)
}

fn faulted(at: u32) -> ! {
    end(FAULTED, || defmt::println!("hard fault at pc {=u32:08x}", at))
}
