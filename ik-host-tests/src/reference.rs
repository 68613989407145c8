//! What the solver is judged by: three answers to the same question, none of which shares code
//! with the library that it judges.
//!
//! - [`transforms`]: forward kinematics in f64, a product of 4×4 homogeneous transforms, one per
//!   joint and link. Fast enough for a survey: see `tests/reference_speed.rs`.
//! - [`closed_form`]: the inverse in f64 (right triangle, Kahan's needle triangle), with the
//!   closest point for targets out of reach. Total over every target.
//! - [`multiprecision`]: inverse, closest point and forward kinematics in 256 bits, by the law of
//!   cosines and arccosines, and by trying every point where the closest one can be.
//!
//! The three are held against one another before they judge anything: [`agreement()`] does it at
//! start-up for the leg at hand, and names the target where they differ. Only then is a difference
//! between the solver and a reference the solver's error.
//!
//! Types in [`leg`] are plain f64 numbers in millimetres and radians, in the leg frame described
//! there.

mod agreement;
pub mod closed_form;
mod doubled;
pub mod leg;
pub mod multiprecision;
pub mod transforms;

pub use agreement::{
    ANGLE_TOLERANCE, Agreement, Disagreement, FOOT_TOLERANCE, agreement, agreement_of, spread,
};
pub use closed_form::{ClosedForm, FREE_KNEE, Solution, closest, solve, solve_within};
pub use leg::{Bend, Held, Leg, Pose, Range, Ranges, Shape, Verdict, clamp};
pub use transforms::foot;
