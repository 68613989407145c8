//! What all images share: each, in `bin`, has one hip and one number system, and nothing of the others. Leg and targets
//! come from memory, where the emulator put them, so that one image serves every robot's sheet.
#![no_std]

use core::mem::MaybeUninit;

use ik_core::{Channel, Limb};
use robot::{Answer, Ask, Bits, Blocks, BuildHip, Header, LegWords, Reader, TARGETS_AT, ask};

#[doc(hidden)]
pub use {board, ik_core};

/// The image of a hip and a number system.
#[macro_export]
macro_rules! measure {
    ($hip:ident, $number:ident) => {
        #[$crate::board::entry]
        fn main() -> ! {
            $crate::run::<$crate::ik_core::$hip, $crate::ik_core::$number>()
        }
    };
}

const BENDS: usize = if cfg!(feature = "bends-14") {
    14
} else if cfg!(feature = "bends-6") {
    6
} else if cfg!(feature = "bends-2") {
    2
} else {
    0
};

#[cfg(not(feature = "parallelogram"))]
type Driven<N> = [Channel<N, BENDS>; 3];
#[cfg(feature = "parallelogram")]
type Driven<N> = ik_core::Parallelogram<Channel<N, BENDS>>;

/// Where the words lie: `Chip::data_at` in `emulation/src/chip.rs`.
const WORDS_AT: usize = if cfg!(target_arch = "riscv32") { 0x8002_0000 } else { 0x0002_0000 };
/// 128 KB of them.
const WORDS: usize = 128 * 1024 / 4;

/// Goes through all targets, and tells a digest of the answers at the end of every block.
pub fn run<H: BuildHip, N: Bits>() -> ! {
    // SAFETY: the memory map of every board has so much there, the linker puts nothing there (images are far smaller),
    // and nobody writes to it.
    let words = unsafe { core::slice::from_raw_parts(core::hint::black_box(WORDS_AT) as *const u32, WORDS) };
    let mut reader = Reader::new(words);
    let Some(header) = Header::read(&mut reader) else { panic!("there is no leg in memory") };
    let leg = LegWords::read(&mut reader);
    let limb = match leg.limb::<H, N, Driven<N>>() {
        Ok(limb) => limb,
        Err(why) => {
            defmt::println!("refused: {=str}", why);
            board::end::done()
        }
    };
    let mut blocks = Blocks::new();
    let mut last = None;
    for (number, target) in (0..header.targets).zip(words[TARGETS_AT..].chunks_exact(3)) {
        let asked = core::hint::black_box(ask::<N>([target[0], target[1], target[2]], last.as_ref()));
        // SAFETY: `entry` writes the answer.
        let answer = unsafe { counted::call(entry::<H, N>, &limb, &asked) };
        let words = answer.words();
        if (header.tell[0]..header.tell[1]).contains(&number) {
            defmt::println!("answer {=u32}: {}", number, words);
        }
        if let Some(digest) = blocks.take(words, header.targets) {
            defmt::println!("to {=u32}: {=u32:08x}", number, digest);
        }
        last = Some(answer);
    }
    board::end::done()
}

/// What is counted.
extern "C" fn entry<H: BuildHip, N: Bits>(
    limb: &Limb<H, N, Driven<N>>,
    ask: &Ask<N>,
    answer: &mut MaybeUninit<Answer<N>>,
) {
    answer.write(robot::answer(limb, ask));
}
