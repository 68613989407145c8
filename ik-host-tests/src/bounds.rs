//! What each primitive of each number system is worth: one table, stated and measured.
//!
//! The [stated](stated()) bounds are what the docs of ik-core's number systems promise, what the tests hold them to, and
//! what a survey prints beside what it found. [`measured`] finds the largest error of every primitive through the very
//! seam that the solver uses, against `f64`; a bound that is exceeded is wrong, and one that is more than twice what is
//! found is no bound worth stating. `toehold bounds` prints both.

mod domain;
mod judged;
mod legs;
mod measured;
mod singular;
mod stated;

pub use judged::{Judged, JudgedLeg, JudgedPrimitive};
pub use legs::{LEGS, LegBound, LegFound, of_legs};
pub use measured::{Found, Primitives, measured, of_any};
pub use singular::{NEARNESS, NearFound, Place, near_singular_places};
pub use stated::{Bound, stated};

use serde::Serialize;
use std::fmt;

/// Something that a primitive of a number system gives, and how its error is counted.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Quantity {
    /// `turn`: rad, between vectors that are a quarter of the radius or longer, beyond what is due to their lengths being
    /// apart.
    Turn,
    /// The same times the vectors' length, of the radius, however short they are: what the foot feels.
    Turned,
    /// `hip_angle` of an offset and a depth: rad, as `turn`.
    HipAngle,
    /// `yaw_angle`: rad, from a quarter of the radius on, as `turn`.
    YawAngle,
    /// The knee's angle from either end of the reach: rad.
    KneeAngle,
    /// Half of the knee's sine, as it stretches a coordinate: of that.
    HalfSine,
    /// How far the knee is from its nearer end, as it stretches a coordinate: of that.
    FromEnd,
    /// `root` of a square: of the radius.
    Root,
    /// `radial`: the radius: of the leg's.
    Radial,
    /// `radial`: the square of the radius less the offset: of the square of the leg's.
    RadialSquare,
    /// `depth`: its square, of the square of the radius.
    Depth,
    /// `sin_cos`, as it stretches a coordinate: of that.
    Sine,
    /// `rescale`: of the radius.
    Rescale,
    /// `distance`: of itself, from a tenth of the radius on.
    Distance,
}

impl Quantity {
    /// All of them, in the order of the table.
    pub const ALL: [Self; 14] = [
        Self::Turn,
        Self::Turned,
        Self::HipAngle,
        Self::YawAngle,
        Self::KneeAngle,
        Self::HalfSine,
        Self::FromEnd,
        Self::Root,
        Self::Radial,
        Self::RadialSquare,
        Self::Depth,
        Self::Sine,
        Self::Rescale,
        Self::Distance,
    ];

    /// What it is, and of what its error is counted.
    pub const fn words(self) -> [&'static str; 2] {
        match self {
            Self::Turn => ["turn between two vectors", "rad, from a quarter of the radius on"],
            Self::Turned => ["turn, as the foot feels it", "of the radius"],
            Self::HipAngle => ["hip of a roll-hip leg", "rad, from a quarter of the radius on"],
            Self::YawAngle => ["hip of a yaw-hip leg", "rad, from a quarter of the radius on"],
            Self::KneeAngle => ["knee", "rad"],
            Self::HalfSine => ["half of the knee's sine", "of what it stretches"],
            Self::FromEnd => ["knee's distance from its end", "of what it stretches"],
            Self::Root => ["root", "of the radius"],
            Self::Radial => ["radius in the ground plane", "of the radius"],
            Self::RadialSquare => ["square of radius less coxa", "of the radius' square"],
            Self::Depth => ["square of the depth", "of the radius' square"],
            Self::Sine => ["sine and cosine", "of what they stretch"],
            Self::Rescale => ["rescale", "of the radius"],
            Self::Distance => ["distance", "of itself"],
        }
    }
}

impl fmt::Display for Quantity {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.pad(self.words()[0])
    }
}

/// Whether a bound holds what was found, and is worth stating.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Verdict {
    /// It holds, and is less than twice as large.
    Holds,
    /// Something larger was found.
    Exceeded,
    /// It is more than twice what was found.
    Slack,
}

impl Verdict {
    /// Of a bound and the largest that was found.
    pub fn of(bound: f64, found: f64) -> Self {
        if found > bound || found.is_nan() {
            Self::Exceeded
        } else if found < 0.5 * bound {
            Self::Slack
        } else {
            Self::Holds
        }
    }

    /// In a word.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Holds => "holds",
            Self::Exceeded => "EXCEEDED",
            Self::Slack => "too wide",
        }
    }
}
