//! Builds images, runs them on emulated chips, and counts what they execute: what the runners `leg-cost` and
//! `robot-cost` share.
//!
//! | module | what |
//! | --- | --- |
//! | `chip` | the chip classes: compiler target, emulated machine, cycle table |
//! | `tools` | compiler targets and emulators, provided by `.ci/tools.sh` |
//! | `build` | cargo builds the plugin and the images |
//! | `emulator` | runs an image with the plugin, within a time limit |
//! | `second_count` | counts the same run again, without the plugin |
//! | `disassembly` | the decoder against a disassembler, over whole images |
//! | `flash` | what an image takes of the flash |
//! | `stack_bound` | the deepest that a function can go on the stack |
#![forbid(unsafe_code)]

mod build;
mod chip;
mod disassembly;
mod emulator;
mod flash;
mod second_count;
mod stack_bound;
mod tools;
mod trouble;

pub use build::{Images, images, images_with, plugin};
pub use chip::Chip;
pub use disassembly::agrees as disassembler_agrees;
pub use emulator::{Run, Setting, run};
pub use flash::bytes as flash_bytes;
pub use second_count::instructions as count_again;
pub use stack_bound::stack_bound;
pub use tools::{Way, name_of, set_up, workspace};
pub use trouble::Trouble;
