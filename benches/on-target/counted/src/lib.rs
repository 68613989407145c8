//! What every counted image has: a [call between two marker instructions](call), which the plugin counts, and a
//! [digest](Digest) of what it answers, so that nothing is counted that computes nonsense.
#![cfg_attr(not(test), no_std)]

mod digest;
#[cfg(all(target_os = "none", target_arch = "arm"))]
pub mod system_timer;
#[cfg(target_os = "none")]
mod window;

pub use digest::Digest;
#[cfg(target_os = "none")]
pub use window::call;
#[cfg(all(target_os = "none", target_arch = "riscv32"))]
pub use window::retired;
