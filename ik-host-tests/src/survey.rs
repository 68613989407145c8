//! The main job: how far arithmetic and pulse resolution put the foot from where it was asked to be, over the
//! work volume of a sheet, in every number system.
//!
//! | error | from | to |
//! | --- | --- | --- |
//! | arithmetic | the foot as asked (as the number system holds it) | the foot that the computed angles give |
//! | pulse | the foot that the computed angles give | the foot that the true counts give |
//! | together | the foot as asked | the foot that the true counts give |
//!
//! All by forward kinematics in f64, which shares no code with ik-core. For a foot out of reach or held by a joint
//! range, arithmetic and together are how much *farther* the foot is from where it was asked to be than the
//! reference's answer within reach and ranges would put it: what clamping itself costs is reported apart.
//! A target whose pulse is held by its servo's range counts as held, and not among the pulse errors.
//!
//! Sampling says "none worse was found", not "there is none worse"; [`Survey::certify`] says the latter.

mod certified;
mod edges;
mod findings;
mod measure;
mod tally;
mod targets;

pub use findings::{Edges, Errors, KindFindings, NumberFindings, Outcomes, Survey, Verdict, Worst};
pub use measure::{Judge, Judged, Measured};
pub use targets::Targets;

use crate::machine::{self, Refused};
use crate::reference::{self, Agreement, Disagreement};
use crate::sheet::Robot;
use indicatif::ProgressBar;
use rayon::prelude::*;
use std::fmt;
use tally::Tally;

/// How much to sample.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Plan {
    /// Targets per kind of leg: edges, then a grid, then random ones.
    pub targets: u64,
    /// Seed of the random ones.
    pub seed: u64,
}

impl Default for Plan {
    fn default() -> Self {
        Self { targets: 1_000_000, seed: 1 }
    }
}

/// Targets on which the references are held against one another before they judge.
const AGREEMENT_TARGETS: usize = 200;
/// Targets that one task of the pool takes.
const CHUNK: u64 = 8192;

/// Why a survey could not be made.
#[derive(Debug, Clone, PartialEq)]
pub enum SurveyError {
    /// ik-core refuses what the sheet says.
    Refused(Refused),
    /// The references disagree among themselves: nothing may be judged by them.
    Disagreement(Box<Disagreement>),
    /// A target exceeds what is certified: one of the two is wrong, and neither may be believed.
    Exceeded(String),
}

impl fmt::Display for SurveyError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Refused(refused) => refused.fmt(f),
            Self::Disagreement(disagreement) => disagreement.fmt(f),
            Self::Exceeded(what) => f.write_str(what),
        }
    }
}

impl std::error::Error for SurveyError {}

impl From<Refused> for SurveyError {
    fn from(refused: Refused) -> Self {
        Self::Refused(refused)
    }
}

/// Surveys every kind of leg of a robot in every number system.
///
/// The same robot, plan and version give the same survey, bit for bit, on any number of cores.
///
/// # Errors
/// If ik-core refuses a leg, or if the references disagree.
pub fn survey(robot: &Robot, plan: Plan, progress: &ProgressBar) -> Result<Survey, SurveyError> {
    let kinds = (0..robot.kinds.len())
        .map(|kind| survey_kind(robot, kind, plan, progress))
        .collect::<Result<Vec<_>, _>>()?;
    Ok(Survey::of(robot, plan, kinds))
}

fn survey_kind(
    robot: &Robot,
    kind: usize,
    plan: Plan,
    progress: &ProgressBar,
) -> Result<KindFindings, SurveyError> {
    let machines = machine::in_every_number(robot, kind)?;
    let judge = Judge::of(robot, kind)?;
    let agreement = agreement(&judge)?;
    let targets = Targets::of(&robot.kinds[kind], plan);
    let fresh = || machines.iter().map(|_| Tally::default()).collect::<Vec<_>>();
    let tallies = (0..targets.count().div_ceil(CHUNK))
        .into_par_iter()
        .fold(fresh, |mut tallies, chunk| {
            let first = chunk * CHUNK;
            for (index, target, inner) in targets.chunk(first, CHUNK) {
                for (machine, tally) in machines.iter().zip(&mut tallies) {
                    if let Some(answered) = machine.answer(index as usize, target) {
                        tally.add(index, inner, &judge.measure(index as usize, &answered));
                    }
                }
            }
            progress.inc(CHUNK.min(targets.count() - first));
            tallies
        })
        .reduce(fresh, |mut left, right| {
            for (mine, theirs) in left.iter_mut().zip(right) {
                mine.merge(theirs);
            }
            left
        });
    Ok(KindFindings::of(robot, kind, &targets, &judge, agreement, &machines, &tallies))
}

/// Holds the references against one another for the leg at hand.
fn agreement(judge: &Judge) -> Result<Agreement, SurveyError> {
    let targets = reference::spread(judge.leg(), AGREEMENT_TARGETS);
    reference::agreement(judge.leg(), &targets)
        .map_err(|disagreement| SurveyError::Disagreement(Box::new(disagreement)))
}
