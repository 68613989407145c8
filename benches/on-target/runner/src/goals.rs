//! What was set out to be reached, and whether it is: per number system on the chip that it is made for.

use std::fmt;

use emulation::Chip;

use crate::{count::Cost, report::Report};

/// A goal for a number system's way to joint angles, both hips.
struct Goal {
    chip: Chip,
    /// What the name begins with; the first that there is.
    numbers: &'static [&'static str],
    /// Mean instructions to joints, roll-hip; the yaw hip may take a quarter more.
    instructions: f64,
    /// So much more to ticks.
    to_ticks: f64,
    joint_rad: f64,
    /// Of thigh and shank together.
    foot: f64,
    flash: f64,
}

const GOALS: [Goal; 4] = [
    Goal {
        chip: Chip::M4f,
        numbers: &["float32"],
        instructions: 150.0,
        to_ticks: 60.0,
        joint_rad: 6e-7,
        foot: 4e-7,
        flash: 1024.0,
    },
    Goal {
        chip: Chip::M3,
        numbers: &["fixed32"],
        instructions: 270.0,
        to_ticks: 90.0,
        joint_rad: 1.5e-6,
        foot: 9e-7,
        flash: 4096.0,
    },
    Goal {
        chip: Chip::M0,
        numbers: &["short32", "fixed32"],
        instructions: 540.0,
        to_ticks: 130.0,
        joint_rad: 1.5e-6,
        foot: 9e-7,
        flash: 4096.0,
    },
    Goal {
        chip: Chip::M0,
        numbers: &["fixed16"],
        instructions: 340.0,
        to_ticks: 130.0,
        joint_rad: 4e-4,
        foot: 1.5e-4,
        flash: 2560.0,
    },
];

/// The yaw hip may take so much more.
const YAW: f64 = 1.25;

/// One goal and what was found.
struct Line {
    what: String,
    found: f64,
    goal: f64,
}

/// The goals of the chips that were counted.
pub struct Goals(Vec<Line>);

impl Goals {
    pub fn of(reports: &[Report]) -> Self {
        let mut lines = Vec::new();
        for goal in &GOALS {
            let Some(report) = reports.iter().find(|report| report.chip == goal.chip) else { continue };
            for (hip, leave) in [("roll", 1.0), ("yaw", YAW)] {
                lines.extend(goal.lines(report, hip, leave));
            }
        }
        Self(lines)
    }
}

impl Goal {
    fn lines(&self, report: &Report, hip: &str, leave: f64) -> Vec<Line> {
        let find = |number: &str, to: &str| {
            let is_it = |cost: &&Cost| cost.what == number && cost.hip == hip && cost.to == to && cost.ours;
            report.costs.iter().find(is_it)
        };
        let joints = self.numbers.iter().find_map(|number| find(number, "joints"));
        let Some(joints) = joints else { return vec![] };
        let line = |what: &str, found: f64, goal: f64| Line {
            what: format!("{} on {}, {hip} hip: {what}", joints.what, report.chip.class()),
            found,
            goal,
        };
        let mut lines = vec![
            line("instructions to joints, mean", joints.instructions.mean, self.instructions * leave),
            line("largest joint error, rad", joints.largest_joint_error_rad, self.joint_rad),
            line("largest foot error, of reach", joints.largest_foot_error, self.foot),
            line("code and tables, bytes", joints.flash as f64, self.flash),
        ];
        if let Some(ticks) = find(joints.what, "ticks") {
            let more = ticks.instructions.mean - joints.instructions.mean;
            lines.push(line("instructions from joints to ticks", more, self.to_ticks));
        }
        lines
    }
}

impl fmt::Display for Goals {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        if self.0.is_empty() {
            return Ok(());
        }
        writeln!(f, "Goals, over the published targets:")?;
        for Line { what, found, goal } in &self.0 {
            let verdict = if found <= goal { "met" } else { "NOT MET" };
            let figure =
                |value: f64| if value < 0.1 { format!("{value:.1e}") } else { format!("{value:.0}") };
            writeln!(f, "  {verdict:8} {what}: {}, wanted at most {}", figure(*found), figure(*goal))?;
        }
        Ok(())
    }
}
