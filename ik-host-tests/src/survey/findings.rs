//! What a survey found, as data: the text, the JSON and the page are made from it.

use super::measure::Judge;
use super::tally::{Spread, Tally};
use super::{Plan, Targets};
use crate::certify::Certified;
use crate::machine::{self, Counter, Machine};
use crate::reference::Agreement;
use crate::sheet::{Allowed, Robot};
use ik_core::output::Output as _;
use serde::Serialize;

/// What a survey of a robot found.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Survey {
    /// Version of the program, and so of the code surveyed.
    pub toehold: &'static str,
    /// The checked sheet.
    pub robot: Robot,
    /// Targets per kind of leg.
    pub targets: u64,
    /// Seed of the random ones.
    pub seed: u64,
    /// What turns pulses into counts, with its true period.
    pub output: OutputFindings,
    /// By kind of leg.
    pub kinds: Vec<KindFindings>,
    /// Whether every number system that the firmware uses is within what the sheet allows.
    pub verdict: Verdict,
}

/// The output as it really is.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct OutputFindings {
    /// One line about it.
    pub summary: String,
    /// `ticks` or `counts`.
    pub unit: &'static str,
    /// One of them, µs.
    pub count_us: f64,
    /// A frame, µs.
    pub frame_us: f64,
}

/// Within what the sheet allows, or not.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Verdict {
    /// Within.
    Within,
    /// Beyond.
    Beyond,
}

impl Verdict {
    /// From whether all is within.
    pub const fn from_within(within: bool) -> Self {
        if within { Self::Within } else { Self::Beyond }
    }

    /// `within` or `beyond`.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Within => "within",
            Self::Beyond => "beyond",
        }
    }
}

/// What was found of a kind of leg.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct KindFindings {
    /// Its name in the sheet.
    pub kind: String,
    /// `roll-hip` or `yaw-hip`.
    pub shape: &'static str,
    /// The names of its joints.
    pub joints: [&'static str; 3],
    /// The names of the legs of this kind, to each of which every so many-th target was put.
    pub legs: Vec<String>,
    /// How the targets are made up.
    pub targets: Edges,
    /// How closely the references agree on this leg.
    pub references: ReferenceFindings,
    /// By number system.
    pub numbers: Vec<NumberFindings>,
}

/// How targets are made up.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub struct Edges {
    /// At full reach, folded, on the hip's axis, at joint limits.
    pub edges: u64,
    /// On a grid, the faces of the work volume included.
    pub grid: u64,
    /// Random.
    pub random: u64,
}

/// How closely the references agree.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct ReferenceFindings {
    /// Targets compared.
    pub targets: usize,
    /// Largest difference of an angle between f64 and 256 bits, radians.
    pub largest_angle_rad: f64,
    /// Largest distance between two answers for where the foot is, mm.
    pub largest_foot_mm: f64,
}

/// What was found in one number system.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct NumberFindings {
    /// Its name.
    pub number: &'static str,
    /// Whether the sheet says that the firmware uses it, so that the gate judges it.
    pub firmware: bool,
    /// What was done with the targets.
    pub outcomes: Outcomes,
    /// Foot error of the computed angles.
    pub arithmetic: Errors,
    /// Foot error of rounding pulses to counts.
    pub pulse: Errors,
    /// Both.
    pub together: Errors,
    /// The largest joint error over the reached targets.
    pub joint: Option<JointError>,
    /// What no target of the work volume exceeds, if it was asked for.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub certified: Option<Certified>,
    /// Whether arithmetic is within what the sheet allows: by what is certified if something is, else by the largest found.
    pub arithmetic_verdict: Verdict,
    /// Whether it is with the pulse.
    pub together_verdict: Verdict,
    /// Whether no more of the work volume is unreached than the sheet allows.
    pub unreached_verdict: Verdict,
}

impl NumberFindings {
    /// Whether everything is within what the sheet allows.
    pub fn within(&self) -> bool {
        [self.arithmetic_verdict, self.together_verdict, self.unreached_verdict]
            .iter()
            .all(|verdict| *verdict == Verdict::Within)
    }
}

/// What was done with the targets.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Outcomes {
    /// Reached as asked.
    pub reached: u64,
    /// Moved to the closest reachable point.
    pub moved: u64,
    /// Held by a joint range.
    pub held: u64,
    /// Not finite; there should be none.
    pub not_finite: u64,
    /// Held by a pulse range, whatever came before.
    pub pulse_held: u64,
    /// The share of the work volume (grid and random targets) that was not reached as asked, per cent.
    pub unreached_percent: f64,
    /// The farthest that clamping itself puts a foot from where it was asked to be.
    pub clamping: Worst,
}

/// One sort of error, mm.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Errors {
    /// The largest found.
    pub largest: Worst,
    /// What 99 of 100 targets stay within.
    pub p99_mm: f64,
    /// The mean.
    pub mean_mm: f64,
    /// (error in mm, share of the targets that stay within it), for drawing.
    pub shares: Vec<(f64, f64)>,
}

/// A largest error and where it sits.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Worst {
    /// mm.
    pub mm: f64,
    /// The foot, leg frame, as the number system holds it, mm.
    pub foot_mm: [f64; 3],
}

/// A largest joint error and where it sits.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct JointError {
    /// Degrees.
    pub deg: f64,
    /// Radians.
    pub rad: f64,
    /// Which joint.
    pub joint: &'static str,
    /// The foot, leg frame, mm.
    pub foot_mm: [f64; 3],
}

/// Shares at which the spread of an error is drawn.
const SHARES: [f64; 15] = [0.0, 0.01, 0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 0.95, 0.99, 0.999];

impl Survey {
    pub(super) fn of(robot: &Robot, plan: Plan, kinds: Vec<KindFindings>) -> Self {
        let counter = Counter::of(&robot.output).expect("the judge was made with it");
        let verdict = verdict(&kinds);
        Self {
            toehold: env!("CARGO_PKG_VERSION"),
            robot: robot.clone(),
            targets: plan.targets,
            seed: plan.seed,
            output: OutputFindings {
                summary: counter.summary(),
                unit: counter.unit(),
                count_us: counter.count_us(),
                frame_us: counter.frame_us(),
            },
            kinds,
            verdict,
        }
    }
}

/// Whether every number system that the firmware uses is within what the sheet allows.
pub(super) fn verdict(kinds: &[KindFindings]) -> Verdict {
    let mut judged = kinds.iter().flat_map(|kind| &kind.numbers).filter(|number| number.firmware);
    Verdict::from_within(judged.all(NumberFindings::within))
}

impl KindFindings {
    pub(super) fn of(
        robot: &Robot,
        kind: usize,
        targets: &Targets,
        judge: &Judge,
        agreement: Agreement,
        machines: &[Box<dyn Machine>],
        tallies: &[Tally],
    ) -> Self {
        let sheet = &robot.kinds[kind];
        Self {
            kind: sheet.name.clone(),
            shape: judge.leg().shape.word(),
            joints: sheet.joint_names(),
            legs: machine::legs_of(robot, kind).map(|leg| robot.legs[leg].name.clone()).collect(),
            targets: Edges {
                edges: targets.edges(),
                grid: targets.grid(),
                random: targets.count() - targets.edges() - targets.grid(),
            },
            references: ReferenceFindings {
                targets: agreement.targets,
                largest_angle_rad: agreement.largest_angle_rad,
                largest_foot_mm: agreement.largest_foot_mm,
            },
            numbers: machines
                .iter()
                .zip(tallies)
                .map(|(machine, tally)| {
                    let name = machine.number();
                    let firmware = robot.firmware.numbers.iter().any(|number| number.name() == name);
                    NumberFindings::of(name, firmware, sheet.joint_names(), &robot.allowed, tally)
                })
                .collect(),
        }
    }
}

impl NumberFindings {
    fn of(
        number: &'static str,
        firmware: bool,
        joints: [&'static str; 3],
        allowed: &Allowed,
        tally: &Tally,
    ) -> Self {
        let (arithmetic, together) = (Errors::of(&tally.arithmetic), Errors::of(&tally.together));
        let outcomes = Outcomes::of(tally);
        Self {
            number,
            firmware,
            joint: tally.joint.map(|largest| JointError {
                deg: largest.value.to_degrees(),
                rad: largest.value,
                joint: joints[largest.at.0],
                foot_mm: largest.at.1,
            }),
            certified: None,
            arithmetic_verdict: Verdict::from_within(arithmetic.largest.mm <= allowed.arithmetic_mm),
            together_verdict: Verdict::from_within(together.largest.mm <= allowed.with_pulse_mm),
            unreached_verdict: Verdict::from_within(outcomes.unreached_percent <= allowed.unreached_percent),
            outcomes,
            arithmetic,
            pulse: Errors::of(&tally.pulse),
            together,
        }
    }
}

impl Outcomes {
    fn of(tally: &Tally) -> Self {
        Self {
            reached: tally.reached,
            moved: tally.moved,
            held: tally.held,
            not_finite: tally.not_finite,
            pulse_held: tally.pulse_held,
            unreached_percent: 100.0 * tally.inner_unreached as f64 / tally.inner.max(1) as f64,
            clamping: tally.clamping.map_or(Worst { mm: 0.0, foot_mm: [0.0; 3] }, |largest| Worst {
                mm: largest.value,
                foot_mm: largest.at,
            }),
        }
    }
}

impl Errors {
    fn of(spread: &Spread) -> Self {
        Self {
            largest: spread.largest.map_or(Worst { mm: 0.0, foot_mm: [0.0; 3] }, |largest| Worst {
                mm: largest.value,
                foot_mm: largest.at,
            }),
            p99_mm: spread.quantile_mm(0.99),
            mean_mm: spread.mean_mm(),
            shares: SHARES.iter().map(|share| (spread.quantile_mm(*share), *share)).collect(),
        }
    }
}
