//! How a run ends. Under the emulator every end is an exit code; on a real board, where there is no
//! debugger to answer, replace the calls of `exit` by what makes *your* machine safe: servo power
//! off first, then stand still.

use core::sync::atomic::{AtomicI32, Ordering::Relaxed};

use cortex_m_rt::{ExceptionFrame, exception};
use semihosting::process::exit;

/// Exit code after a panic.
pub const PANICKED: i32 = 101;
/// Exit code after a hard fault.
pub const FAULTED: i32 = 102;

const RUNNING: i32 = 0;

/// Why the run is ending, if it is: logging from a handler can itself panic or fault, and then the
/// first reason is the one to report.
static ENDING: AtomicI32 = AtomicI32::new(RUNNING);

/// Ends the run in good order.
pub fn done() -> ! {
    exit(0)
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

#[exception]
unsafe fn HardFault(frame: &ExceptionFrame) -> ! {
    end(FAULTED, || defmt::println!("hard fault at pc {=u32:08x}", frame.pc()))
}
