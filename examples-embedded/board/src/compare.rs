//! Three compare registers of one timer, one per joint.
//!
//! The emulated Cortex-M0 machine has a timer with compare registers, and they are used: base
//! address and offsets are those of TIMER1 in the "nRF51 Series Reference Manual", chapter "Timer /
//! counter". The other emulated machines have timers that only reload, so three words of RAM
//! stand in there; the writes are volatile all the same, so the compiler cannot drop them.

/// The compare registers, each holding the length of one joint's pulse in timer ticks.
pub struct CompareRegisters {
    first: *mut u32,
}

/// How many compare registers there are, one per joint of a leg.
pub const CHANNELS: usize = 3;

impl CompareRegisters {
    /// The timer's registers, or `None` if they were taken before: they have one owner.
    #[must_use]
    pub fn take() -> Option<Self> {
        let already_taken = critical_section::with(|_| {
            use core::sync::atomic::{AtomicBool, Ordering::Relaxed};
            static TAKEN: AtomicBool = AtomicBool::new(false);
            let before = TAKEN.load(Relaxed);
            TAKEN.store(true, Relaxed);
            before
        });
        (!already_taken).then(|| Self { first: first_register() })
    }

    /// Writes the three pulse lengths, in timer ticks, hip first. A timer keeps as many bits as it is
    /// wide, 16 where nothing else was set.
    pub fn write(&mut self, ticks: [u32; CHANNELS]) {
        for (channel, ticks) in ticks.into_iter().enumerate() {
            // SAFETY: `first_register` points at CHANNELS consecutive, aligned words that are
            // always there to be written; `take` made this the only owner.
            unsafe { self.first.add(channel).write_volatile(ticks) }
        }
    }

    /// Reads back what the registers hold, in timer ticks, hip first.
    #[must_use]
    pub fn read(&self) -> [u32; CHANNELS] {
        core::array::from_fn(|channel| {
            // SAFETY: as in `write`; reading a compare register changes nothing.
            unsafe { self.first.add(channel).read_volatile() }
        })
    }
}

/// TIMER1 stands at 0x4000_9000 and its registers CC\[0\] .. CC\[3\] at 0x540 from there. After reset
/// it is 16 bits wide and stopped.
#[cfg(board = "timer")]
fn first_register() -> *mut u32 {
    (0x4000_9000 + 0x540) as *mut u32
}

#[cfg(not(board = "timer"))]
fn first_register() -> *mut u32 {
    use core::sync::atomic::AtomicU32;
    static STAND_IN: [AtomicU32; CHANNELS] = [const { AtomicU32::new(0) }; CHANNELS];
    // AtomicU32 has the layout of u32, and interior mutability allows writes through the pointer.
    STAND_IN.as_ptr().cast_mut().cast()
}
