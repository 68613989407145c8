//! What comes of a leg in a number system on a chip.

use emulation::Chip;
use serde::Serialize;

#[derive(Debug, Clone, Serialize)]
pub struct Row {
    /// Which leg of the job.
    pub leg: usize,
    pub number: String,
    pub chip: Chip,
    pub class: &'static str,
    pub target: &'static str,
    pub machine: &'static str,
    /// Where the cycles come from.
    pub cycles_from: &'static str,
    pub usual_clock_hz: f64,
    #[serde(flatten)]
    pub found: Found,
}

#[derive(Debug, Clone, Serialize)]
#[serde(tag = "state", rename_all = "kebab-case")]
pub enum Found {
    Measured(Measured),
    /// ik-core refuses the leg in this number system.
    Refused {
        why: String,
    },
    /// The chip's answers are not this PC's.
    Differs {
        why: String,
    },
    NotMeasured {
        why: String,
    },
}

/// From the foot on the body's frame to three counts.
#[derive(Debug, Clone, Serialize)]
pub struct Measured {
    /// Targets counted.
    pub counted: usize,
    /// Targets whose answers are this PC's, bit for bit.
    pub compared: usize,
    /// Executed per leg, the call subtracted: least, mean over the work volume, most.
    pub instructions: [f64; 3],
    /// From, to, on average over the work volume: estimated from published tables, zero wait states, not measured on silicon.
    pub cycles: [f64; 2],
    /// The same, for the costliest target.
    pub most_cycles: [f64; 2],
    /// Code, constants and tables, bytes; none if there is no image to measure it by.
    pub flash: Option<i64>,
    /// Deepest over the counted targets, bytes.
    pub stack: u64,
    /// The deepest that it can come to, whatever it is given; none if no bound could be worked out.
    pub stack_bound: Option<u64>,
}

impl Row {
    pub fn new(leg: usize, number: &str, chip: Chip, found: Found) -> Self {
        Self {
            leg,
            number: number.into(),
            chip,
            class: chip.class(),
            target: chip.target(),
            machine: chip.machine(),
            cycles_from: chip.cycles_from(),
            usual_clock_hz: chip.usual_clock_hz(),
            found,
        }
    }
}
