//! What a leg of a sheet costs on a chip: instructions, cycles, flash and stack, before anyone owns the board.
//!
//! The figures come from images that are built and run on emulated chips, by the program `robot-cost` in
//! `benches/on-target`; this module writes its job from a sheet, starts it, and makes findings of its rows. It needs
//! Toehold's source tree, of which images are built.

mod clock;
mod findings;
mod job;
mod runner;
mod source;

pub use clock::{Clock, Clocks};
pub use findings::{Chips, Found, KindOnChips, Measured, Row, Times};
pub use runner::{Ask, ChipsError, ON_ALL, measure};
pub use source::{NoSource, source_tree};
