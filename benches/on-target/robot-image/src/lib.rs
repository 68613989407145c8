//! What all images share: each, in `bin`, has one hip, one number system and one output, and nothing of the others. Leg
//! and targets come from memory, where the emulator put them, so that one image serves every robot's sheet.
#![no_std]

use core::mem::MaybeUninit;

use robot::{
    Answer, Ask, Bits, Blocks, BuildHip, BuildOutput, Header, LegWords, Reader, Ready, TARGETS_AT, ask,
};

#[doc(hidden)]
pub use {board, ik_core};

/// The image of a hip, a number system and an output.
#[macro_export]
macro_rules! measure {
    ($hip:ident, $number:ident, $output:ident) => {
        #[$crate::board::entry]
        fn main() -> ! {
            $crate::run::<$crate::ik_core::$hip, $crate::ik_core::$number, $crate::ik_core::$output>()
        }
    };
}

/// Where the words lie: `Chip::data_at` in `emulation/src/chip.rs`.
const WORDS_AT: usize = if cfg!(target_arch = "riscv32") { 0x8002_0000 } else { 0x0002_0000 };
/// 128 KB of them.
const WORDS: usize = 128 * 1024 / 4;

/// Goes through all targets, and tells a digest of the answers at the end of every block.
pub fn run<H: BuildHip, N: Bits, O: BuildOutput>() -> ! {
    // SAFETY: the memory map of every board has so much there, the linker puts nothing there (images are far smaller),
    // and nobody writes to it.
    let words = unsafe { core::slice::from_raw_parts(core::hint::black_box(WORDS_AT) as *const u32, WORDS) };
    let mut reader = Reader::new(words);
    let Some(header) = Header::read(&mut reader) else { panic!("there is no leg in memory") };
    let leg = LegWords::read(&mut reader);
    let ready = match (leg.limb::<H, N>(), O::build(&leg)) {
        (Ok(limb), Ok(output)) => Ready { limb, output },
        (Err(why), _) | (_, Err(why)) => {
            defmt::println!("refused: {=str}", why);
            board::end::done()
        }
    };
    let mut blocks = Blocks::new();
    let mut last = None;
    for (number, target) in (0..header.targets).zip(words[TARGETS_AT..].chunks_exact(3)) {
        let asked = core::hint::black_box(ask::<N>([target[0], target[1], target[2]], last.as_ref()));
        // SAFETY: `entry` writes the answer.
        let answer = unsafe { counted::call(entry::<H, N, O>, &ready, &asked) };
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
extern "C" fn entry<H: BuildHip, N: Bits, O: BuildOutput>(
    ready: &Ready<H, N, O>,
    ask: &Ask<N>,
    answer: &mut MaybeUninit<Answer<N>>,
) {
    answer.write(robot::answer(ready, ask));
}
