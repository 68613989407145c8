//! What is printed: per chip, for people or as JSON.

use std::fmt;

use emulation::Chip;
use serde::Serialize;

use crate::{count::Cost, table};

/// What was counted on one chip.
#[derive(Debug, Serialize)]
pub struct Report {
    pub chip: Chip,
    pub costs: Vec<Cost>,
}

impl fmt::Display for Report {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        writeln!(
            f,
            "{} ({}, {}): instructions per leg, the call itself subtracted; cycles estimated from published tables \
             ({}), zero wait states, not measured on silicon",
            self.chip.class(),
            self.chip.target(),
            self.chip.machine(),
            self.chip.cycles_from()
        )?;
        writeln!(f, "{}", table::table(&self.costs))
    }
}

pub fn json(reports: &[Report]) -> String {
    serde_json::to_string_pretty(reports).expect("plain figures and names become JSON")
}
