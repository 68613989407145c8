//! `toehold chips`: what a leg costs on a chip.

use super::ending::{Ending, print};
use super::robots;
use crate::chips::{self, Ask, Chips, Clock, Clocks, ON_ALL};
use crate::report;
use crate::sheet::{NumberSystem, Robot};
use serde::Serialize;
use std::path::PathBuf;

/// Counts what a leg costs on emulated chips: instructions, estimated cycles and time, flash, stack; and compares every
/// answer with this PC's, bit for bit.
#[derive(Debug, clap::Args)]
#[command(after_help = NOTE)]
pub(super) struct Call {
    /// The robot sheet; without it, the demo robots are measured
    #[arg(value_name = "SHEET")]
    sheet: Option<PathBuf>,
    /// Chip class; may be given more than once; without it, all of them
    #[arg(long = "chip", value_name = "CLASS", value_parser = ON_ALL)]
    chips: Vec<String>,
    /// Number system; may be given more than once; without it, all of them
    #[arg(long = "number", value_name = "NAME", value_parser = NumberSystem::ALL.map(NumberSystem::name))]
    numbers: Vec<String>,
    /// The chip's clock, as in 64MHz, or m3=72MHz for one class; without it, one that is usual for the class
    #[arg(long = "clock", value_name = "[CLASS=]CLOCK")]
    clocks: Vec<Clock>,
    /// Folder for the figures, one .chips.json per robot, where a survey finds them
    #[arg(long, value_name = "FOLDER", default_value = "toehold-survey")]
    report: PathBuf,
    /// Write no file
    #[arg(long, conflicts_with = "report")]
    no_report: bool,
    /// Print JSON instead of tables
    #[arg(long)]
    json: bool,
    /// Toehold's source tree, of which images are built; without it, the one around the current folder
    #[arg(long, value_name = "FOLDER")]
    source: Option<PathBuf>,
    /// Where the compiler for the chips comes from; none: install nothing
    #[arg(long, value_name = "WAY", default_value = "auto", value_parser = ["auto", "rustup", "distro", "none"])]
    way: String,
    /// Self-test: an argument for robot-cost
    #[arg(long, hide = true, value_name = "ARGUMENT", allow_hyphen_values = true)]
    pass_on: Vec<String>,
}

const NOTE: &str = "\
It builds images of Toehold's source tree and runs them in the emulator QEMU; compiler targets and emulator are \
installed where that is possible, else it says what to install. Exit code 1: a chip's answer differs from this PC's, or \
a class could not be measured; its row says why.";

#[derive(Serialize)]
struct Printed<'a> {
    chips: &'a [Chips],
}

impl Call {
    pub(super) fn run(&self) -> Ending {
        self.all().unwrap_or_else(|ending| ending)
    }

    fn all(&self) -> Result<Ending, Ending> {
        let wrong = |why: String| Ending::WrongInput(format!("toehold: {why}"));
        let sources = robots::named_or_all_demos(self.sheet.as_ref());
        let robots = sources.iter().map(|source| source.robot()).collect::<Result<Vec<Robot>, _>>()?;
        let is_asked = |name: &str| self.numbers.is_empty() || self.numbers.iter().any(|asked| asked == name);
        let ask = Ask {
            source: chips::source_tree(self.source.as_deref()).map_err(|error| wrong(error.to_string()))?,
            chips: if self.chips.is_empty() { ON_ALL.map(str::to_owned).into() } else { self.chips.clone() },
            numbers: NumberSystem::ALL.into_iter().filter(|number| is_asked(number.name())).collect(),
            clocks: Clocks::of(&self.clocks, &ON_ALL).map_err(wrong)?,
            way: self.way.clone(),
            pass_on: self.pass_on.clone(),
        };
        let found =
            chips::measure(&robots, &ask).map_err(|error| Ending::Failed(format!("toehold: {error}")))?;
        for (source, chips) in sources.iter().zip(&found) {
            if !self.json {
                print(&report::chips_text(chips, &source.shown()))?;
            }
            if !self.no_report {
                let path = report::write_chips(&self.report, &source.stem(), chips)
                    .map_err(|error| Ending::Failed(format!("toehold: {error}")))?;
                if !self.json {
                    print(&format!("figures: {} (a survey takes them up)\n\n", path.display()))?;
                }
            }
        }
        if self.json {
            print(&report::json(&Printed { chips: &found }))?;
        }
        Ok(if found.iter().all(Chips::all_well) { Ending::Within } else { Ending::Beyond })
    }
}
