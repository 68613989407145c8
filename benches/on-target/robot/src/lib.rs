//! A leg of a robot's sheet with its servos, its output and its foot targets, as words that lie in a chip's memory: what
//! an image goes through, and the PC as well, by the same code.
//!
//! | module | what |
//! | --- | --- |
//! | `words` | how the words are laid out, written and read |
//! | `build` | from words to a limb of ik-core |
//! | `numbers` | a number system's lengths and angles as bits |
//! | `answers` | from a target to its answer, and the digest of many |
#![cfg_attr(not(test), no_std)]
#![forbid(unsafe_code)]

mod answers;
mod build;
mod numbers;
mod words;

pub use answers::{Answer, Ask, BLOCK, Blocks, WORDS, answer, ask};
pub use build::{BuildDrive, BuildHip};
pub use numbers::Bits;
pub use words::{Header, LegWords, MAGIC, MOST_TARGETS, POINTS, Reader, ServoWords, TARGETS_AT, Writer};
