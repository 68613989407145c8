//! `toehold constants`: the checked robot as constants for firmware.

use super::ending::{Ending, print};
use super::robots::{self, Source};
use super::survey::{quoted, surveyed};
use crate::certify::{Certified, Effort};
use crate::constants::{self, Origin, sha256};
use crate::report;
use crate::sheet::{NumberSystem, Robot};
use crate::survey::{Plan, Survey, Verdict};
use std::io::Write as _;
use std::path::PathBuf;

/// Writes the legs of a sheet as constants for firmware, after a survey: places, joint ranges, servos on the output, drives,
/// bounds for frame safety, in one number system.
#[derive(Debug, clap::Args)]
#[command(after_help = NOTE)]
pub(super) struct Call {
    /// The robot sheet, or the name of a demo robot; without it, the first demo robot
    #[arg(value_name = "SHEET")]
    sheet: Option<PathBuf>,
    /// As a Rust module
    #[arg(long, required = true)]
    rust: bool,
    /// Number system; without it, the first one that the sheet's firmware uses
    #[arg(long, value_name = "NAME", value_parser = NumberSystem::ALL.map(NumberSystem::name))]
    number: Option<String>,
    /// File to write; one that is there is replaced by a complete one; without it, standard output
    #[arg(long, value_name = "FILE")]
    out: Option<PathBuf>,
    /// Write constants even if the survey finds them beyond what the sheet allows; their header says so
    #[arg(long)]
    although_beyond: bool,
    /// Targets of the survey per kind of leg
    #[arg(long, value_name = "COUNT", default_value_t = Plan::default().targets,
          value_parser = clap::value_parser!(u64).range(1000..=1_000_000_000))]
    targets: u64,
    /// Seed of the survey's random targets
    #[arg(long, value_name = "NUMBER", default_value_t = Plan::default().seed)]
    seed: u64,
    /// Certify bounds as well, which are then judged and go into the header
    #[arg(long)]
    certify: bool,
}

const NOTE: &str = "\
Exit code 1: the survey found the robot beyond what its sheet allows in this number system, and nothing was written.";

impl Call {
    pub(super) fn run(&self) -> Ending {
        self.written().unwrap_or_else(|ending| ending)
    }

    fn written(&self) -> Result<Ending, Ending> {
        let source = robots::named_or_first_demo(self.sheet.as_ref());
        let (mut robot, sheet_text) = source.robot_and_text()?;
        let number = self.number_of(&robot);
        // The survey judges the number system that is written, whatever else the sheet's firmware uses.
        robot.firmware.numbers = vec![number];
        let plan = Plan { targets: self.targets, seed: self.seed };
        let survey = surveyed(&source, &robot, plan, self.certify.then(Effort::default))?;
        if survey.verdict == Verdict::Beyond && !self.although_beyond {
            let message = format!(
                "toehold: {}: beyond what the sheet allows in {}, so nothing was written: {}; `toehold survey` tells \
                 more, and --although-beyond writes the constants all the same",
                source.shown(),
                number.name(),
                beyond(&survey, number)
            );
            let _ = writeln!(std::io::stderr(), "{message}");
            return Ok(Ending::Beyond);
        }
        let origin = Origin {
            sheet: source.shown(),
            sha256: sha256(sheet_text.as_bytes()),
            command: self.command(&source, number),
        };
        let text = constants::rust(&robot, number, &survey, &origin)
            .map_err(|refused| Ending::WrongInput(format!("{}: {refused}", source.shown())))?;
        match &self.out {
            None => print(&text)?,
            Some(path) => report::replace_file(path, &text)
                .map_err(|error| Ending::Failed(format!("toehold: {error}")))?,
        }
        if survey.verdict == Verdict::Beyond {
            let _ = writeln!(
                std::io::stderr(),
                "toehold: {}: written although beyond what the sheet allows: {}",
                source.shown(),
                beyond(&survey, number)
            );
        }
        Ok(Ending::Within)
    }

    fn number_of(&self, robot: &Robot) -> NumberSystem {
        let named = |name: &String| NumberSystem::ALL.into_iter().find(|number| number.name() == name);
        self.number.as_ref().and_then(named).unwrap_or(robot.firmware.numbers[0])
    }

    /// The call that makes the same text, wherever it goes to.
    fn command(&self, source: &Source, number: NumberSystem) -> String {
        let sheet = match source {
            Source::File(path) => quoted(&path.display().to_string()),
            Source::Demo(name) => (*name).to_owned(),
        };
        let certify = if self.certify { " --certify" } else { "" };
        let although = if self.although_beyond { " --although-beyond" } else { "" };
        format!(
            "toehold constants {sheet} --rust --number {} --targets {} --seed {}{certify}{although}",
            number.name(),
            self.targets,
            self.seed
        )
    }
}

/// What of the legs is beyond, in words.
fn beyond(survey: &Survey, number: NumberSystem) -> String {
    let allowed = &survey.robot.allowed;
    let mut words = Vec::new();
    for kind in &survey.kinds {
        for found in kind.numbers.iter().filter(|found| found.number == number.name()) {
            let mut add = |verdict: Verdict, what: &str, found: String, allowed: f64, unit: &str| {
                if verdict == Verdict::Beyond {
                    words.push(format!("{:?}: {what} {found} {unit} of {allowed} {unit}", kind.kind));
                }
            };
            // What was judged: what is certified, if something is.
            let mm = report::millimetres;
            let (arithmetic, together) = match found.certified.as_ref().and_then(Certified::bound) {
                Some(bound) => (bound.arithmetic.mm, bound.together.mm),
                None => (found.arithmetic.largest.mm, found.together.largest.mm),
            };
            add(found.arithmetic_verdict, "arithmetic", mm(arithmetic), allowed.arithmetic_mm, "mm");
            add(found.together_verdict, "with the pulse", mm(together), allowed.with_pulse_mm, "mm");
            let unreached = format!("{:.2}", found.outcomes.unreached_percent);
            add(found.unreached_verdict, "work volume unreached", unreached, allowed.unreached_percent, "%");
        }
    }
    words.join("; ")
}
