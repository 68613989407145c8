//! Leg inverse kinematics for machines whose limbs are moved by position servos.
//!
//! A foot position in millimetres goes in; joint angles, servo pulses and timer ticks come out, every frame,
//! on a chip with or without an FPU. No allocation, no panic, no `unsafe` but the square root instruction, and an answer
//! for every input.
//!
//! ```
//! # #[cfg(feature = "fixed32")] {
//! use ik_core::{Bend, Dimensions, Fixed32, Foot, Joints, Leg, Limits, Outcome, RollHip};
//!
//! type OrchardLeg = Leg<RollHip, Fixed32>;
//!
//! // A leg lives in flash: an impossible one does not compile.
//! const LEG: OrchardLeg = {
//!     let Ok(measures) = Dimensions::roll_hip(31.5, 94.0, 107.0, Bend::Forward) else { panic!("measures") };
//!     let Ok(limits) = Limits::degrees([-45.0, 45.0], [-80.0, 80.0], [5.0, 150.0]) else { panic!("limits") };
//!     let Ok(leg) = OrchardLeg::new(measures, limits) else { panic!("leg") };
//!     leg
//! };
//!
//! let answer = LEG.solve(Foot::from_mm(40.0, 31.5, -160.0), Joints::ZERO);
//! assert_eq!(answer.outcome, Outcome::Reached);
//! assert!((answer.joints.knee.degrees() - 69.894111).abs() < 1e-4);
//! # }
//! ```
//!
//! # The way of a foot
//!
//! | stage | module | what comes out |
//! | --- | --- | --- |
//! | mounting | [`mounting`] | the foot in the leg's own frame, right legs mirrored |
//! | hip, triangle, reach | [`leg`] | joint angles, and whether the foot had to be moved into reach |
//! | limits | [`limits`] | joint angles within their ranges, and which joint was held |
//! | servo | [`servo`] | a pulse in microseconds within its range |
//! | output | [`output`] | timer ticks or expander counts |
//! | both at once | [`channel`], [`drive`] | counts from joint angles, without the pulse in between |
//! | frame safety | [`frame`] | counts no farther from the last ones than a slew, or no pulse |
//!
//! # Frames, units, signs
//!
//! Lengths are millimetres, pulses microseconds. The leg's frame has its origin on the first joint's axis,
//! x forward, **y outboard**, z up; a right leg is a left leg mirrored in y, so one set of angles serves both.
//! (The body's frame is x forward, y left, z up: REP 103, "Standard Units of Measure and Coordinate
//! Conventions".)
//!
//! | | roll-hip | yaw-hip |
//! | --- | --- | --- |
//! | zero pose | hanging straight down | stretched straight outboard |
//! | hip positive | swings the foot outboard | swings the foot forward |
//! | thigh (femur) positive | swings the foot forward | raises the knee |
//! | knee | 0 is a straight leg; positive bends it to the side given by [`Bend`] | the same |
//!
//! # Number systems
//!
//! The solver is written once, over the trait [`Number`]. A number system is a type parameter, never a switch
//! that changes what another type means, so firmware carries only what it names:
//!
//! | type | feature | stored as | meant for |
//! | --- | --- | --- | --- |
//! | `Float32` | `float32` | `f32`, polynomials made for legs | chips with an FPU |
//! | `Coarse` | `coarse` | `f32`, micromath's functions | a yardstick; where millimetres do not matter |
//! | `Fixed32` | `fixed32` | `fixed`'s `I16F16` mm and `I0F32` turns | chips without an FPU |
//! | `Short32` | `short32` | the same | chips without a divider or a long multiplication (Cortex-M0, M0+) |
//! | `Fixed16` | `fixed16` | `fixed`'s `I10F6` mm and `I0F16` turns | the smallest chips, for legs up to 453 mm |
//!
//! Same input, same bits, on every machine: no function of the standard library's maths is used.
//!
//! # Features
//!
//! | feature | what it adds |
//! | --- | --- |
//! | `float32`, `fixed32` (on by default), `short32`, `fixed16`, `coarse` | a number system each |
//! | `heapless` | `robot`: the legs of a robot without allocation |
//! | `queue` | `queue`: foot targets from the main loop to the frame interrupt; needs atomic loads and stores (on RV32IMC switch on one of heapless's `portable-atomic` features) |
//! | `hal` | [`output::hal`]: servos through embedded-hal 1.0, on any PWM channel or an expander behind I²C |
//! | `defmt` | `defmt::Format` on everything that a firmware may want to log |
//!
//! All are additive, and each works alone.
//!
//! # Before a machine moves
//!
//! Servos pinch, motors stall, legs fall. Lift the machine off the ground for first motion, feed it from a
//! current-limited supply, and keep a way to cut power within reach. Local rules and the judgement of
//! qualified people come before anything written here.
#![no_std]
// One file is excepted, for the square root instruction of chips with an FPU: number/float/hardware_root.rs.
#![deny(unsafe_code)]
#![deny(missing_docs)]
#![allow(clippy::neg_cmp_op_on_partial_ord, reason = "comparisons are written so that NaN fails them")]
#![cfg_attr(docsrs, feature(doc_cfg))]

#[cfg(test)]
extern crate std;

pub mod angle;
pub mod channel;
mod const_math;
pub mod drive;
pub mod foot;
pub mod frame;
pub mod geometry;
pub mod leg;
pub mod limb;
pub mod limits;
pub mod mounting;
pub mod number;
pub mod output;
#[cfg(feature = "queue")]
pub mod queue;
#[cfg(feature = "heapless")]
pub mod robot;
pub mod servo;

pub use angle::{Angle, Joints};
pub use channel::{Channel, Counts};
pub use drive::Parallelogram;
pub use foot::Foot;
pub use frame::{FrameError, FrameSafety, FrameState, ServoBounds, StaleRule};
pub use geometry::{Bend, Dimensions, GeometryError, RollHip, YawHip};
pub use leg::{Answer, Held, Hip, Leg, Outcome};
pub use limb::Limb;
pub use limits::{End, Limits, LimitsError};
pub use mounting::{Mounting, Side};
#[cfg(feature = "coarse")]
pub use number::Coarse;
#[cfg(feature = "fixed16")]
pub use number::Fixed16;
#[cfg(feature = "fixed32")]
pub use number::Fixed32;
#[cfg(feature = "float32")]
pub use number::Float32;
pub use number::Number;
#[cfg(feature = "short32")]
pub use number::Short32;
pub use output::{Counting, Expander, OutputError, Timer};
pub use servo::{Command, Curve, MeasuredServo, Pulse, Servo, ServoError, ServoSpec, Turns};
