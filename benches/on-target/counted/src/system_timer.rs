//! SysTick, the Cortex-M's own timer: it counts the processor's clock down, which in an emulator that runs by instructions
//! goes so many instructions a tick.

use core::ptr;

/// Control, reload value, current value.
const CONTROL: *mut u32 = 0xE000_E010 as *mut u32;
const RELOAD: *mut u32 = 0xE000_E014 as *mut u32;
const CURRENT: *mut u32 = 0xE000_E018 as *mut u32;
/// It has 24 bits.
const MOST: u32 = 0x00FF_FFFF;

/// Starts it, by the processor's clock, without interrupts.
pub fn start() {
    // SAFETY: every Cortex-M that images are for has SysTick at these addresses (Armv6-M and Armv7-M ARM, B3.3), and nothing
    // else in an image uses it.
    unsafe {
        ptr::write_volatile(RELOAD, MOST);
        ptr::write_volatile(CURRENT, 0);
        ptr::write_volatile(CONTROL, 0b101);
    }
}

/// Ticks since an earlier reading; fewer than 2^24 are told apart.
pub fn ticks_since(earlier: u32) -> u32 {
    earlier.wrapping_sub(reading()) & MOST
}

/// What it reads.
pub fn reading() -> u32 {
    // SAFETY: as above; reading changes nothing that is used.
    unsafe { ptr::read_volatile(CURRENT) }
}
