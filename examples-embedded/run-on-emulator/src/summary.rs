//! The table at the end: the PC first, then one row per chip.

use std::hash::Hasher;

use comfy_table::{Table, presets};

use crate::{chip::Chip, expected::Line};

/// How a chip fared.
pub struct Row {
    pub chip: Chip,
    /// What it logged, if it got that far.
    pub log: Vec<String>,
    pub same: bool,
}

/// Answers are counted by the chip's own log, and the digest (64-bit FNV-1a) is that of the log, line by
/// line: the same digest on another day or another PC means the same bits.
pub fn table(expected: &[Line], rows: &[Row]) -> Table {
    let mut table = Table::new();
    table.load_preset(presets::NOTHING);
    table.set_header(["chip class", "machine", "answers", "digest", "result"]);
    let texts: Vec<&str> = expected.iter().map(|line| line.text.as_str()).collect();
    table.add_row(["this PC", "", &answers(&texts), &digest(&texts), "what is expected"]);
    for row in rows {
        let texts: Vec<&str> = row.log.iter().map(String::as_str).collect();
        table.add_row([
            row.chip.class(),
            row.chip.machine(),
            &answers(&texts),
            &digest(&texts),
            if row.same { "the same bits" } else { "FAILED" },
        ]);
    }
    table
}

fn answers(lines: &[&str]) -> String {
    lines.iter().filter(|line| line.starts_with("target ")).count().to_string()
}

fn digest(lines: &[&str]) -> String {
    let mut hasher = fnv::FnvHasher::default();
    for line in lines {
        hasher.write(line.as_bytes());
        hasher.write(b"\n");
    }
    format!("{:016x}", hasher.finish())
}
