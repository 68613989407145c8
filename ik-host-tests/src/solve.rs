//! One target in every number system.

use crate::machine::{self, Counter, Refused, legs_of};
use crate::reference::{Pose, leg::distance};
use crate::sheet::{KneeDrive, Robot, Side};
use crate::survey::Judge;
use ik_core::Outcome;
use ik_core::limits::End;
use serde::Serialize;

/// What one leg answers to one foot, in every number system.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Solved {
    /// The robot's name.
    pub robot: String,
    /// The leg's.
    pub leg: String,
    /// The names of its joints.
    pub joints: [&'static str; 3],
    /// The foot as asked, in the leg's frame, mm; null where it is not finite.
    pub foot_mm: [f64; 3],
    /// Whether it was given in the body's frame.
    pub asked_on_body: bool,
    /// Whether the last pulse turns the shank through a parallelogram, not the knee.
    pub parallelogram: bool,
    /// `ticks` or `counts`.
    pub unit: &'static str,
    /// What the reference says, in f64.
    pub reference: Option<ReferenceAnswer>,
    /// By number system.
    pub answers: Vec<Answer>,
}

/// What the reference says.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct ReferenceAnswer {
    /// Joint angles within their ranges, degrees.
    pub joints_deg: [f64; 3],
    /// Whether the foot is reached as asked.
    pub reached: bool,
    /// How far off it is, mm.
    pub off_by_mm: f64,
}

/// What a number system says.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Answer {
    /// Its name.
    pub number: &'static str,
    /// Whether the sheet says that the firmware uses it.
    pub firmware: bool,
    /// What was done, in words.
    pub outcome: String,
    /// The rest; `None` if there is no pose because the foot is not finite.
    pub pose: Option<PoseAnswer>,
}

/// Joint angles and what comes of them.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct PoseAnswer {
    /// The foot as the number system holds it, mm.
    pub foot_mm: [f64; 3],
    /// Degrees.
    pub joints_deg: [f64; 3],
    /// µs.
    pub pulses_us: [f64; 3],
    /// Ticks or counts.
    pub counts: [u32; 3],
    /// How far off the number system itself says that the foot is, mm.
    pub off_by_mm: f64,
    /// Foot error of the angles, beyond what clamping costs, mm.
    pub arithmetic_mm: f64,
    /// Foot error of the counts against the angles, mm; `None` if a pulse was held.
    pub pulse_mm: Option<f64>,
    /// The distance of the foot at the true counts from the foot as asked, clamping included, mm.
    pub foot_off_mm: f64,
}

/// A foot in the body's frame as a leg sees it, mm.
pub fn leg_frame(robot: &Robot, leg: usize, foot: [f64; 3]) -> [f64; 3] {
    let mount = &robot.legs[leg];
    let [x, y, z] = [0, 1, 2].map(|axis| foot[axis] - mount.at_mm[axis]);
    [x, if mount.side == Side::Right { -y } else { y }, z]
}

/// Solves one foot (leg frame, mm) for a leg of a robot.
///
/// # Errors
/// What ik-core refuses.
pub fn solve(robot: &Robot, leg: usize, foot_mm: [f64; 3], asked_on_body: bool) -> Result<Solved, Refused> {
    let mount = &robot.legs[leg];
    let kind = mount.kind;
    let sheet = &robot.kinds[kind];
    let joints = sheet.joint_names();
    // Which of the legs of its kind it is: trims differ.
    let among = legs_of(robot, kind).position(|other| other == leg).unwrap_or(0);
    let judge = Judge::of(robot, kind)?;
    let finite = foot_mm.iter().all(|v| v.is_finite());
    let counter = Counter::of_kind(robot, kind)?;
    let answers = machine::in_every_number(robot, kind)?
        .iter()
        .map(|machine| {
            let number = machine.number();
            let answered = finite.then(|| machine.answer(among, foot_mm)).flatten();
            let pose = answered.map(|answered| {
                let measured = judge.measure(among, &answered);
                PoseAnswer {
                    foot_mm: answered.foot_mm,
                    joints_deg: degrees(&answered.pose),
                    pulses_us: answered.pulses_us,
                    counts: answered.counts,
                    off_by_mm: answered.off_by_mm,
                    arithmetic_mm: measured.arithmetic_mm,
                    pulse_mm: measured.pulse_mm,
                    foot_off_mm: distance(judge.foot_at_counts(among, answered.counts), foot_mm),
                }
            });
            let mut outcome = match answered {
                None => "not finite: the pose is kept, nothing is commanded".to_owned(),
                Some(answered) => words(answered.outcome, joints),
            };
            for (joint, held) in answered.iter().flat_map(|answered| joints.iter().zip(answered.pulses_held))
            {
                if let Some(end) = held {
                    outcome += &format!("; {joint} pulse held at its {}", end_word(end));
                }
            }
            Answer {
                number,
                firmware: robot.firmware.numbers.iter().any(|used| used.name() == number),
                outcome,
                pose,
            }
        })
        .collect();
    let reference = finite.then(|| {
        let judged = judge.judge(foot_mm);
        ReferenceAnswer {
            joints_deg: degrees(&judged.pose),
            reached: judged.reached,
            off_by_mm: judged.off_by_mm,
        }
    });
    Ok(Solved {
        robot: robot.name.clone(),
        leg: mount.name.clone(),
        joints,
        foot_mm,
        asked_on_body,
        parallelogram: sheet.knee_drive == KneeDrive::Parallelogram,
        unit: counter.unit(),
        reference,
        answers,
    })
}

fn degrees(pose: &Pose) -> [f64; 3] {
    [pose.hip, pose.thigh, pose.knee].map(f64::to_degrees)
}

fn end_word(end: End) -> &'static str {
    match end {
        End::Least => "least",
        End::Most => "most",
    }
}

fn words(outcome: Outcome, joints: [&'static str; 3]) -> String {
    match outcome {
        Outcome::Reached => "reached".into(),
        Outcome::Moved => "moved into reach".into(),
        Outcome::NotFinite => "not finite: the pose is kept".into(),
        Outcome::Held(held) => joints
            .iter()
            .zip(held.as_array())
            .filter_map(|(joint, end)| end.map(|end| format!("{joint} held at its {}", end_word(end))))
            .collect::<Vec<_>>()
            .join(", "),
    }
}
