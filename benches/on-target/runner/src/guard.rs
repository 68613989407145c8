//! The guard: what ik-core's own ways may cost, checked in as `guard.toml`, so that a change shows in the diff and a
//! regression stops CI.

use std::{collections::BTreeMap, fmt, fs, path::PathBuf};

use emulation::Chip;
use serde::{Deserialize, Serialize};

use crate::{count::Cost, report::Report, trouble::Trouble};

/// So much more than the table says is let pass: another compiler's whims.
const HEADROOM: f64 = 0.03;

/// By chip and contender.
type Table = BTreeMap<String, BTreeMap<String, Limits>>;

/// What a contender may cost on a chip.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
struct Limits {
    /// Per leg, mean.
    instructions: f64,
    /// Per leg, most.
    most_instructions: f64,
    flash: f64,
    stack: f64,
}

/// Something that costs too much, or is not in the table.
#[derive(Debug, Clone, PartialEq)]
pub struct Excess(String);

impl fmt::Display for Excess {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.0)
    }
}

impl Limits {
    fn of(cost: &Cost) -> Self {
        Self {
            // Tenths are enough, and a table of them is read more easily.
            instructions: (cost.instructions.mean * 10.0).round() / 10.0,
            most_instructions: cost.instructions.most,
            flash: cost.flash as f64,
            stack: cost.stack as f64,
        }
    }

    fn figures(self) -> [(&'static str, f64); 4] {
        [
            ("instructions", self.instructions),
            ("most instructions", self.most_instructions),
            ("flash", self.flash),
            ("stack", self.stack),
        ]
    }
}

fn path() -> PathBuf {
    emulation::workspace().join("guard.toml")
}

fn bad(problem: impl fmt::Display) -> Trouble {
    Trouble::Guard { path: path(), problem: problem.to_string() }
}

fn read() -> Result<Table, Trouble> {
    toml::from_str(&fs::read_to_string(path()).map_err(bad)?).map_err(bad)
}

fn name(chip: Chip) -> String {
    emulation::name_of(&chip)
}

/// What of these reports is beyond the table.
///
/// # Errors
/// If there is no table, or it cannot be read.
pub fn excesses(reports: &[Report]) -> Result<Vec<Excess>, Trouble> {
    let table = read()?;
    let costs = reports.iter().flat_map(|report| report.costs.iter().map(move |cost| (report.chip, cost)));
    Ok(costs
        .filter(|(_, cost)| cost.ours)
        .flat_map(|(chip, cost)| beyond(&table, &name(chip), cost))
        .collect())
}

fn beyond(table: &Table, chip: &str, cost: &Cost) -> Vec<Excess> {
    let Some(limits) = table.get(chip).and_then(|contenders| contenders.get(cost.name)) else {
        return vec![Excess(format!("{chip}, {}: not in the table", cost.name))];
    };
    let unbounded = cost.stack_bound.is_none();
    let unbounded = unbounded.then(|| Excess(format!("{chip}, {}: no bound for the stack", cost.name)));
    let figures = Limits::of(cost).figures().into_iter().zip(limits.figures());
    figures
        .filter(|((_, found), (_, limit))| *found > limit * (1.0 + HEADROOM))
        .map(|((what, found), (_, limit))| {
            let more = (found / limit - 1.0) * 100.0;
            Excess(format!("{chip}, {}: {what}: {found}, {more:.1} % more than {limit}", cost.name))
        })
        .chain(unbounded)
        .collect()
}

/// Writes the table anew, as far as it is about these reports' chips.
///
/// # Errors
/// If it cannot be written.
pub fn rewrite(reports: &[Report]) -> Result<PathBuf, Trouble> {
    let mut table = if path().exists() { read()? } else { Table::new() };
    for report in reports {
        let ours = report.costs.iter().filter(|cost| cost.ours);
        let limits = ours.map(|cost| (cost.name.to_owned(), Limits::of(cost))).collect();
        table.insert(name(report.chip), limits);
    }
    let text = format!(
        "# What ik-core's own ways cost over the published targets, counted; CI lets pass 3 % more.\n\
         # Written by `cargo leg-cost --rewrite-guard`.\n\n{}",
        toml::to_string_pretty(&table).map_err(bad)?
    );
    fs::write(path(), text).map_err(bad)?;
    Ok(path())
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::count::Spread;

    fn cost(more: f64) -> Cost {
        Cost {
            name: "fixed32-roll",
            what: "fixed32",
            ours: true,
            hip: "roll",
            to: "joints",
            instructions: Spread { least: 190.0, mean: 200.0 * more, most: 210.0 * more },
            cycles: [300.0, 400.0],
            flash: 4000,
            stack: 160,
            stack_bound: Some(200),
            largest_foot_error_mm: 1e-4,
            largest_foot_error: 5e-7,
            largest_joint_error_rad: 1e-6,
            kinds: vec![],
        }
    }

    fn table() -> Table {
        [("m3".to_owned(), [("fixed32-roll".to_owned(), Limits::of(&cost(1.0)))].into())].into()
    }

    #[test]
    fn the_same_and_a_little_more_pass() {
        for more in [0.5, 1.0, 1.029] {
            assert_eq!(beyond(&table(), "m3", &cost(more)), [], "{more}");
        }
    }

    #[test]
    fn five_percent_more_do_not() {
        let excesses = beyond(&table(), "m3", &cost(1.05));
        assert_eq!(excesses.len(), 2);
        assert_eq!(excesses[0].to_string(), "m3, fixed32-roll: instructions: 210, 5.0 % more than 200");
        for spoil in [|cost: &mut Cost| cost.flash += 200, |cost: &mut Cost| cost.stack += 8] {
            let mut spoilt = cost(1.0);
            spoil(&mut spoilt);
            assert_eq!(beyond(&table(), "m3", &spoilt).len(), 1);
        }
    }

    #[test]
    fn what_is_not_in_the_table_does_not_pass() {
        assert_eq!(beyond(&table(), "m0", &cost(1.0)).len(), 1);
        assert_eq!(beyond(&table(), "m3", &Cost { name: "new-roll", ..cost(1.0) }).len(), 1);
        assert_eq!(beyond(&table(), "m3", &Cost { stack_bound: None, ..cost(1.0) }).len(), 1);
    }

    #[test]
    fn the_table_survives_being_written() {
        let text = toml::to_string_pretty(&table()).expect("plain figures");
        assert_eq!(toml::from_str::<Table>(&text).expect("as written"), table());
    }
}
