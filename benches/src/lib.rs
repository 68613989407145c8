//! Time per leg on the PC: ik-core in its number systems against the textbook form on general-purpose libraries.
//!
//! | | |
//! | --- | --- |
//! | [`legs`] | the two demo legs, as plain numbers |
//! | [`targets`] | the 1000 feet that everyone is asked for |
//! | [`textbook`] | the contenders: right triangle and law of cosines, over three libraries |
//! | [`contenders`] | everyone behind one face |
//!
//! `cargo bench -p benches` measures with criterion; `cargo run --release -p benches` prints a table with the ratios
//! in some seconds. A PC's time tells contenders apart, not what a chip takes: that is measured on emulated chips.

pub mod contenders;
pub mod legs;
pub mod targets;
pub mod textbook;
