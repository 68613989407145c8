//! What a window of executed instructions comes to: how many of which kind, how deep the stack went, and a range of
//! cycles by published tables.
//!
//! Instructions are exact. Cycles are **estimated from published tables, zero wait states, not measured on
//! silicon**.
//!
//! | module | what |
//! | --- | --- |
//! | `kind` | the kinds of instruction that the tables tell apart |
//! | `decode` | from an instruction's bytes to its kind; the decoding is capstone's |
//! | `core` | the processors, and the tables |
//! | `window` | adds up what is executed between two markers |
#![forbid(unsafe_code)]

mod core;
mod decode;
mod kind;
mod window;

pub use core::Core;
pub use decode::{Decoded, Decoder};
pub use kind::Kind;
pub use window::{Step, Window, Windows};
