//! What all images share. Each image, in `bin`, has one contender and nothing of the others, so that its size
//! tells what the contender takes.
#![no_std]

use core::mem::MaybeUninit;

use contenders::{Contender, PublishedHip};
use counted::Digest;

#[doc(hidden)]
pub use {board, contenders};

/// The image of one contender.
#[macro_export]
macro_rules! measure {
    ($contender:ty) => {
        /// In flash.
        static LEG: <$contender as $crate::contenders::Contender>::Leg =
            <$contender as $crate::contenders::Contender>::LEG;

        #[$crate::board::entry]
        fn main() -> ! {
            $crate::run::<$contender>(&LEG)
        }
    };
}

/// Solves every target and logs how many there were, and a digest of all answers.
pub fn run<C: Contender>(leg: &C::Leg) -> ! {
    let mut digest = Digest::EMPTY;
    let mut windows = 0u32;
    #[cfg(all(feature = "own-counter", target_arch = "arm"))]
    counted::system_timer::start();
    for &target in C::Hip::PUBLISHED.targets {
        let foot = core::hint::black_box(C::foot(target));
        #[cfg(all(feature = "own-counter", target_arch = "riscv32"))]
        let before = counted::retired();
        // SAFETY: `entry` writes the answer.
        let answer = unsafe { counted::call(entry::<C>, leg, &foot) };
        #[cfg(all(feature = "own-counter", target_arch = "riscv32"))]
        defmt::println!("counter {=u32}", counted::retired().wrapping_sub(before));
        #[cfg(all(feature = "own-counter", target_arch = "arm"))]
        defmt::println!("ticks {=u32} {=u32}", ticks_of_calls::<C>(leg, &foot), CALLS);
        digest = digest.with(C::bits(&answer));
        windows += 1;
    }
    defmt::println!("{=str} {=u32} {=u32}", C::NAME, windows, digest.value());
    board::end::done()
}

/// What is counted.
extern "C" fn entry<C: Contender>(leg: &C::Leg, foot: &C::Foot, answer: &mut MaybeUninit<C::Answer>) {
    answer.write(C::solve(leg, foot));
}

/// A tick of the system timer is some dozens of instructions: so many calls are timed together.
#[cfg(all(feature = "own-counter", target_arch = "arm"))]
const CALLS: u32 = 64;

#[cfg(all(feature = "own-counter", target_arch = "arm"))]
#[inline(never)]
fn ticks_of_calls<C: Contender>(leg: &C::Leg, foot: &C::Foot) -> u32 {
    let before = counted::system_timer::reading();
    for _ in 0..CALLS {
        // SAFETY: `entry` writes the answer.
        let _ = core::hint::black_box(unsafe { counted::call(entry::<C>, leg, foot) });
    }
    counted::system_timer::ticks_since(before)
}
