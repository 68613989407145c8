//! The PC's side of Toehold: what checks [`ik_core`] before it is flashed.
//!
//! | module | what it is |
//! | --- | --- |
//! | [`sheet`] | the robot sheet: read, checked, every complaint at once |
//! | [`numbers`] | number systems of the PC's own: the same solver in `f64` |
//! | [`machine`] | a robot of a sheet, in a number system: the very code that will be flashed |
//! | [`promises`] | what each primitive promises of what it was handed: what `certify` is built on |
//! | [`minimax`] | the coefficients of ik-core's polynomials, made and compared |
//! | [`reference`](mod@reference) | legs by other methods, sharing no code with ik-core: what judges |
//! | [`bounds`] | what each primitive of each number system is worth, stated and measured |
//! | [`frame_witness`] | watches any frame-safety stage, and says which promise it breaks |
//! | [`certify`] | a bound on the foot's error that no target exceeds |
//! | [`chips`] | what a leg costs on emulated chips |
//! | [`survey`] | the main job: error bounds over the work volume |
//! | [`trim`] | a servo's lines of a sheet from readings on the bench |
//! | [`solve`] | one target in every number system |
//! | [`constants`] | a sheet's legs as constants for firmware |
//! | [`report`] | text, JSON and an HTML page of a survey |
//! | [`command`] | the `toehold` program |
//!
//! Arrows run one way: command → report → survey → machine, reference → sheet; machine → ik-core.

pub mod bounds;
pub mod certify;
pub mod chips;
pub mod command;
pub mod constants;
pub mod frame_witness;
pub mod machine;
pub mod minimax;
pub mod numbers;
pub mod promises;
pub mod reference;
pub mod report;
pub mod sheet;
pub mod solve;
pub mod survey;
pub mod trim;

/// The firmware in the README compiles and does what it says.
#[cfg(doctest)]
#[doc = include_str!("../../README.md")]
mod readme {}
