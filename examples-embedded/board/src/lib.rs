//! What an image needs of its board, one thing per file:
//!
//! - the memory map (`memory/`, chosen by the build script from the compiler target),
//! - [`compare`]: the three timer compare registers that the servos hang on,
//! - [`end`]: how a run ends, in good order, by a panic or by a fault, so that the emulator stops
//!   with an exit code instead of standing still.
//!
//! Reset and vector table come from `cortex-m-rt` (on RISC-V from `riscv-rt`), the log channel from `defmt-semihosting`.
#![no_std]

pub mod compare;
pub mod end;

// Linked for what they provide, not for what they export: the critical section, the log channel.
#[cfg(not(target_arch = "riscv32"))]
use cortex_m as _;
use defmt_semihosting as _;
#[cfg(target_arch = "riscv32")]
use riscv as _;

#[cfg(not(target_arch = "riscv32"))]
pub use cortex_m_rt::entry;
#[cfg(target_arch = "riscv32")]
pub use riscv_rt::entry;
