//! The certificate: a bound on the foot's error that no target of the work volume exceeds.
//!
//! The solver of ik-core runs, unchanged, over boxes of targets in a number system that carries bounds
//! ([`bounded`]); boxes are split, the worst first, until splitting gains no more. `docs/certificate.md` has the theory,
//! the assumptions, and what is not covered.

pub mod bounded;
pub mod carried;
mod decisions;
pub mod interval;
mod leg;
mod pulse;
mod quantities;
mod search;

use crate::machine::Refused;
use crate::sheet::Robot;
use rayon::prelude::*;
use serde::Serialize;
use std::time::{Duration, Instant};

pub use leg::{Enclosed, Subject};

/// What a certificate is not about, in plain words.
pub const NOT_COVERED: &str = "link lengths, offsets and servos that differ from the sheet, dead band, backlash, bending, and feet whose \
                               pulse is held by its servo's range";

/// How long to look for a narrower bound.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Effort {
    /// Boxes that are looked at for each bound.
    pub boxes: u64,
    /// And how long at the most, for all of them together.
    pub time: Duration,
}

impl Default for Effort {
    fn default() -> Self {
        Self { boxes: 60_000, time: Duration::from_secs(50) }
    }
}

/// What is certified of a kind of leg in one number system, or why nothing is.
#[derive(Debug, Clone, PartialEq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Certified {
    /// No target of the work volume exceeds these.
    Bound(Certificate),
    /// Nothing is certified, and why.
    Nothing {
        /// In plain words.
        why: String,
    },
}

impl Certified {
    /// The bounds, if there are some.
    pub const fn bound(&self) -> Option<&Certificate> {
        match self {
            Self::Bound(certificate) => Some(certificate),
            Self::Nothing { .. } => None,
        }
    }
}

/// Bounds that no target of the work volume exceeds.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Certificate {
    /// On the foot's error by arithmetic.
    pub arithmetic: Proved,
    /// With pulses rounded to counts as well.
    pub together: Proved,
}

/// A bound, and how it was come by.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Proved {
    /// mm.
    pub mm: f64,
    /// Where in the work volume it is so large: the middle of the worst box, leg frame, mm.
    pub worst_mm: [f64; 3],
    /// The worst box's sides, mm.
    pub box_mm: [f64; 3],
    /// Boxes that were looked at.
    pub boxes: u64,
    /// Why no more were.
    pub ended: Ended,
}

/// Why a search for a narrower bound ended.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Ended {
    /// The same bound holds, within a few percent, at a single point of the worst box: splitting gains no more.
    Narrow,
    /// All the boxes were used that the effort allows.
    Boxes,
    /// The time was up.
    Time,
}

impl Ended {
    /// In plain words.
    pub const fn words(self) -> &'static str {
        match self {
            Self::Narrow => "as narrow as its boxes make it",
            Self::Boxes => "the limit on boxes was reached: more would narrow it",
            Self::Time => "the time limit was reached: more would narrow it",
        }
    }
}

/// Certifies a kind of leg in the number systems of these names.
///
/// # Errors
/// What ik-core refuses.
pub fn certify(
    robot: &Robot,
    kind: usize,
    numbers: &[&str],
    effort: Effort,
) -> Result<Vec<Certified>, Refused> {
    let until = Instant::now() + effort.time;
    let subjects =
        numbers.iter().map(|number| Subject::of(robot, kind, number)).collect::<Result<Vec<_>, _>>()?;
    let searches: Vec<_> = subjects
        .iter()
        .enumerate()
        .filter_map(|(place, subject)| subject.as_ref().ok().map(|subject| (place, subject)))
        .flat_map(|(place, subject)| [(place, subject, false), (place, subject, true)])
        .collect();
    let proved: Vec<_> = searches
        .into_par_iter()
        .map(|(place, subject, together)| {
            (place, together, search::search(subject, together, effort.boxes, until))
        })
        .collect();
    let of = |place: usize, together: bool| {
        proved.iter().find(|(at, with, _)| *at == place && *with == together).map(|(.., proved)| *proved)
    };
    Ok(subjects
        .into_iter()
        .enumerate()
        .map(|(place, subject)| match (subject, of(place, false), of(place, true)) {
            (Ok(_), Some(arithmetic), Some(together))
                if arithmetic.mm.is_finite() && together.mm.is_finite() =>
            {
                Certified::Bound(Certificate { arithmetic, together })
            }
            (Err(why), ..) => Certified::Nothing { why },
            _ => Certified::Nothing { why: "no bound was found within the effort".into() },
        })
        .collect())
}
