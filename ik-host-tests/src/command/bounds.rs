//! `toehold bounds`: what each primitive and each leg is worth, stated and measured.

use super::ending::{Ending, print};
use super::robots;
use crate::bounds::Judged;
use crate::report;
use std::path::PathBuf;

/// Measures every primitive of every number system, and whole legs, against the bounds that are stated of them.
#[derive(Debug, clap::Args)]
#[command(after_help = NOTE)]
pub(super) struct Call {
    /// The robot sheet, or the name of a demo robot, whose legs are measured; without it, all demo robots
    #[arg(value_name = "SHEET")]
    sheet: Option<PathBuf>,
    /// Random arguments per primitive, and poses per leg
    #[arg(long, value_name = "COUNT", default_value_t = 200_000, value_parser = clap::value_parser!(u32).range(50_000..))]
    rounds: u32,
    /// Where the random arguments start
    #[arg(long, default_value_t = 1)]
    seed: u64,
    /// Print JSON instead of tables
    #[arg(long)]
    json: bool,
}

const NOTE: &str = "\
Lengths are counted as parts of the leg's radius, the farthest that its foot gets from the hip. The bounds of whole legs \
are those of the demo legs: other legs may be beyond them. Exit code 1: a bound is exceeded, or that of a primitive more \
than twice what was found.";

impl Call {
    pub(super) fn run(&self) -> Ending {
        self.all().unwrap_or_else(|ending| ending)
    }

    fn all(&self) -> Result<Ending, Ending> {
        let sources = robots::named_or_all_demos(self.sheet.as_ref());
        let robots = sources.iter().map(|source| source.robot()).collect::<Result<Vec<_>, _>>()?;
        let judged = Judged::of(&robots, self.rounds, self.seed)
            .map_err(|error| Ending::WrongInput(format!("toehold: {error}")))?;
        print(&if self.json { report::json(&judged) } else { report::bounds_text(&judged) })?;
        Ok(if judged.all_hold() { Ending::Within } else { Ending::Beyond })
    }
}
