//! Where counts really put the joints, in plain f64.

use super::{Counter, Refused, trims};
use crate::reference::Pose;
use crate::sheet::{Bend, KneeDrive, LegKind, Robot};
use ik_core::output::Output as _;

/// The servos of a kind's legs and the output, in plain f64: where counts really put the joints.
#[derive(Debug, Clone)]
pub struct Commanded {
    kind: LegKind,
    /// By leg of the kind, by joint, µs.
    trims_us: Vec<[f64; 3]>,
    count_us: f64,
}

impl Commanded {
    /// For a kind of leg.
    ///
    /// # Errors
    /// What the output refuses.
    pub fn of(robot: &Robot, kind: usize) -> Result<Self, Refused> {
        let sheet = &robot.kinds[kind];
        let counter = Counter::of_kind(robot, kind)?;
        Ok(Self { kind: sheet.clone(), trims_us: trims(robot, kind).collect(), count_us: counter.count_us() })
    }

    /// The pose in which ideal servos of the `leg`th leg of the kind stand at the given counts.
    pub fn pose(&self, leg: usize, counts: [u32; 3]) -> Pose {
        let trims = &self.trims_us[leg % self.trims_us.len()];
        let [hip, thigh, last] = [0, 1, 2].map(|joint| {
            let pulse_us = f64::from(counts[joint]) * self.count_us;
            self.kind.servos[joint].degrees_at(trims[joint], pulse_us).to_radians()
        });
        let knee = match (self.kind.knee_drive, self.kind.bend) {
            (KneeDrive::Direct, _) => last,
            // The shank's angle is counted as the knee is.
            (KneeDrive::Parallelogram, Bend::Backward | Bend::Down) => last - thigh,
            (KneeDrive::Parallelogram, Bend::Forward | Bend::Up) => last + thigh,
        };
        Pose { hip, thigh, knee }
    }
}
