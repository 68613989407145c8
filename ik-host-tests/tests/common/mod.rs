//! What the tests of ik-core share.
//!
//! | module | what it is |
//! | --- | --- |
//! | [`solver`] | ik-core in any number system behind plain `f64`, so that a wrong solver can take its place |
//! | [`servo`] | the same of a servo |
//! | [`channel`] | the same of a servo on an output, in every number system |
//! | [`frame`] | the frame-safety stage, of random bounds |
//! | [`legs`] | legs and targets, drawn by proptest or from a fixed seed |
//! | [`bounds`] | what each number system promises, as it was measured |
//! | [`knee_reach`] | the reachable set of a leg whose knee has a range |
//! | [`sensitivity`] | how fast joints move with the foot |
//! | [`checks`] | one checker per promise; `breaking.rs` shows that each catches what it is for |
//! | [`published`] | the tables in `check-values/`, in our frame and signs |
//! | [`effort`] | how many cases; more with `TOEHOLD_LONG=1` |
#![allow(dead_code, unreachable_pub, reason = "each test file is a crate of its own and uses a part of this")]

pub mod bounds;
pub mod channel;
pub mod checks;
pub mod effort;
pub mod frame;
pub mod knee_reach;
pub mod legs;
pub mod published;
pub mod sensitivity;
pub mod servo;
pub mod solver;
