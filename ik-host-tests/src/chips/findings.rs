//! What was found on the chips, as data: the text, the JSON and the survey's page are made from it.

use crate::sheet::Robot;
use serde::{Deserialize, Serialize};
use std::fs;
use std::path::Path;

/// What the legs of a robot cost.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct Chips {
    /// Version of the program.
    pub toehold: String,
    /// The checked sheet.
    pub robot: serde_json::Value,
    /// What the robot is called.
    pub name: String,
    /// How often the firmware solves a foot, Hz.
    pub frame_hz: f64,
    /// By kind of leg.
    pub kinds: Vec<KindOnChips>,
    /// Classes that cannot be measured at all, and why.
    pub left_out: Vec<LeftOut>,
}

/// A class that is left out.
#[derive(Debug, Clone, PartialEq, Eq, Serialize, Deserialize)]
pub struct LeftOut {
    /// The class.
    pub class: String,
    /// Why.
    pub why: String,
}

/// What a kind of leg costs.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct KindOnChips {
    /// Its name in the sheet.
    pub kind: String,
    /// The leg of this kind that was measured, with its place and trims.
    pub leg: String,
    /// How many legs are of this kind.
    pub legs: usize,
    /// By chip and number system.
    pub rows: Vec<Row>,
}

/// A kind of leg in a number system on a chip.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct Row {
    /// The class, as the command line knows it.
    pub chip: String,
    /// Its name for people.
    pub class: String,
    /// The compiler's target.
    pub target: String,
    /// QEMU's machine.
    pub machine: String,
    /// The number system.
    pub number: String,
    /// Whether the sheet's firmware uses it.
    pub firmware: bool,
    /// Where the cycles come from.
    pub cycles_from: String,
    /// The clock, Hz.
    pub clock_hz: f64,
    /// What was found.
    #[serde(flatten)]
    pub found: Found,
    /// What it comes to at that clock.
    pub times: Option<Times>,
}

/// What was found.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(tag = "state", rename_all = "kebab-case")]
pub enum Found {
    /// It was measured, and the chip's answers are the PC's.
    Measured(Measured),
    /// ik-core refuses the leg in this number system.
    Refused {
        /// Its reason.
        why: String,
    },
    /// The chip's answers are not the PC's.
    Differs {
        /// Where.
        why: String,
    },
    /// It could not be measured.
    NotMeasured {
        /// Why.
        why: String,
    },
}

/// From a foot on the body's frame to three counts.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct Measured {
    /// Targets counted.
    pub counted: usize,
    /// Targets whose answers are the PC's, bit for bit.
    pub compared: usize,
    /// Executed per leg: least, mean over the work volume, most.
    pub instructions: [f64; 3],
    /// From, to, on average over the work volume: estimated from published tables, zero wait states, not measured on
    /// silicon.
    pub cycles: [f64; 2],
    /// The same, for the costliest target.
    pub most_cycles: [f64; 2],
    /// Code, constants and tables, bytes.
    pub flash: Option<i64>,
    /// Deepest over the counted targets, bytes.
    pub stack: u64,
    /// The deepest that it can come to, whatever it is given, from the linked code; none if no bound could be worked out.
    pub stack_bound: Option<u64>,
}

/// Cycles at a clock; estimated as they are.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize)]
pub struct Times {
    /// One leg, on average: from, to, us.
    pub leg_us: [f64; 2],
    /// One leg, the costliest target.
    pub most_leg_us: [f64; 2],
    /// All legs of the kind at their costliest: share of a frame, from, to, percent.
    pub frame_percent: [f64; 2],
}

impl Times {
    pub(super) fn of(measured: &Measured, clock_hz: f64, legs: usize, frame_hz: f64) -> Self {
        let us = |cycles: [f64; 2]| cycles.map(|cycles| cycles / clock_hz * 1e6);
        let most_leg_us = us(measured.most_cycles);
        Self {
            leg_us: us(measured.cycles),
            most_leg_us,
            frame_percent: most_leg_us.map(|us| us * legs as f64 * frame_hz / 1e4),
        }
    }
}

impl Chips {
    /// From a file that `toehold chips` wrote.
    ///
    /// # Errors
    /// Names the file, and what is wrong with it.
    pub fn read(path: &Path) -> Result<Self, String> {
        let complaint = |problem: String| format!("{}: {problem}", path.display());
        let text = fs::read_to_string(path).map_err(|error| complaint(error.to_string()))?;
        let advice = "; `toehold chips` makes such a file";
        serde_json::from_str(&text).map_err(|error| complaint(format!("{error}{advice}")))
    }

    /// Whether they are of this very sheet and this version of the program.
    pub fn are_of(&self, robot: &Robot) -> bool {
        self.toehold == env!("CARGO_PKG_VERSION")
            && serde_json::to_value(robot).is_ok_and(|robot| robot == self.robot)
    }

    /// Whether everything was measured and every chip gave the PC's bits. A leg that a number system cannot hold is no
    /// failure.
    pub fn all_well(&self) -> bool {
        let rows = self.kinds.iter().flat_map(|kind| &kind.rows);
        rows.map(|row| &row.found).all(|found| matches!(found, Found::Measured(_) | Found::Refused { .. }))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn cycles_become_microseconds_and_a_share_of_the_frame() {
        let measured = Measured {
            counted: 1,
            compared: 1,
            instructions: [1.0; 3],
            cycles: [480.0, 960.0],
            most_cycles: [960.0, 1920.0],
            flash: None,
            stack: 0,
            stack_bound: None,
        };
        // 20 ms frames: 6 legs of 20 us to 40 us.
        let times = Times::of(&measured, 48e6, 6, 50.0);
        assert_eq!((times.leg_us, times.most_leg_us), ([10.0, 20.0], [20.0, 40.0]));
        assert!((times.frame_percent[0] - 0.6).abs() < 1e-12 && (times.frame_percent[1] - 1.2).abs() < 1e-12);
    }
}
