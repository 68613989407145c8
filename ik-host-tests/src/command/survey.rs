//! `toehold survey`: the main job.

use super::ending::{Ending, print};
use super::robots::{self, Source};
use crate::certify::Effort;
use crate::chips::Chips;
use crate::report;
use crate::sheet::Robot;
use crate::survey::{Plan, Survey, SurveyError, Verdict, survey};
use indicatif::{ProgressBar, ProgressStyle};
use serde::Serialize;
use std::io::Write as _;
use std::path::PathBuf;
use std::time::Duration;

/// Surveys the work volume of a robot's legs in every number system: arithmetic error, pulse error, both.
#[derive(Debug, clap::Args)]
pub(super) struct Call {
    /// The robot sheet, or the name of a demo robot; without it, every demo robot is surveyed
    #[arg(value_name = "SHEET")]
    sheet: Option<PathBuf>,
    /// Targets per kind of leg
    #[arg(long, value_name = "COUNT", default_value_t = Plan::default().targets,
          value_parser = clap::value_parser!(u64).range(1000..=1_000_000_000))]
    targets: u64,
    /// Seed of the random targets
    #[arg(long, value_name = "NUMBER", default_value_t = Plan::default().seed)]
    seed: u64,
    /// Certify, too: bounds on the foot's error that no target of the work volume exceeds, by which the sheet's allowances are
    /// then judged
    #[arg(long)]
    certify: bool,
    /// How long to narrow what is certified of a robot, at the most
    #[arg(long, value_name = "SECONDS", default_value_t = 50, requires = "certify",
          value_parser = clap::value_parser!(u64).range(1..=86_400))]
    certify_seconds: u64,
    /// Folder for the reports, one .json and one .html per robot
    #[arg(long, value_name = "FOLDER", default_value = "toehold-survey")]
    report: PathBuf,
    /// What `toehold chips` found of this sheet, to go into the report; without it, what lies in the reports' folder
    #[arg(long, value_name = "FILE", requires = "sheet", conflicts_with = "no_report")]
    chips: Option<PathBuf>,
    /// Write no reports
    #[arg(long, conflicts_with = "report")]
    no_report: bool,
    /// Print JSON instead of tables
    #[arg(long)]
    json: bool,
}

#[derive(Serialize)]
struct Printed<'a> {
    surveys: &'a [Survey],
}

impl Call {
    pub(super) fn run(&self) -> Ending {
        self.all().unwrap_or_else(|ending| ending)
    }

    fn all(&self) -> Result<Ending, Ending> {
        let sources = robots::named_or_all_demos(self.sheet.as_ref());
        let mut surveys = Vec::new();
        for source in &sources {
            let robot = source.robot()?;
            // Before the long work, for a file that was named may be the wrong one.
            let chips = if self.no_report { None } else { self.chips(source, &robot)? };
            let survey = self.one(source, &robot)?;
            if !self.json {
                print(&report::text(&survey, &source.shown()))?;
            }
            if !self.no_report {
                self.write(source, &survey, chips.as_ref())?;
            }
            surveys.push(survey);
        }
        if self.json {
            let json = report::json(&Printed { surveys: &surveys });
            print(&json)?;
        }
        let beyond = surveys.iter().any(|survey| survey.verdict == Verdict::Beyond);
        Ok(if beyond { Ending::Beyond } else { Ending::Within })
    }

    fn one(&self, source: &Source, robot: &Robot) -> Result<Survey, Ending> {
        let plan = Plan { targets: self.targets, seed: self.seed };
        let effort = Effort { time: Duration::from_secs(self.certify_seconds), ..Effort::default() };
        surveyed(source, robot, plan, self.certify.then_some(effort))
    }

    fn write(&self, source: &Source, survey: &Survey, chips: Option<&Chips>) -> Result<(), Ending> {
        let repeat = format!(
            "toehold survey{} --targets {} --seed {}{}",
            match source {
                Source::File(path) => format!(" {}", quoted(&path.display().to_string())),
                Source::Demo(_) => String::new(),
            },
            self.targets,
            self.seed,
            if self.certify { " --certify" } else { "" }
        );
        let paths = report::write(&self.report, &source.stem(), survey, chips, &repeat)
            .map_err(|error| Ending::Failed(format!("toehold: {error}")))?;
        if !self.json {
            let paths = paths.map(|path| path.display().to_string()).join(" and ");
            print(&format!("report: {paths}\n\n"))?;
        }
        Ok(())
    }
}

impl Call {
    /// What the legs cost on the chips: from the file that was named, which must be of this sheet; else from the one in
    /// the reports' folder, if there is one and it is.
    fn chips(&self, source: &Source, robot: &Robot) -> Result<Option<Chips>, Ending> {
        let beside = report::chips_place(&self.report, &source.stem());
        let path = match &self.chips {
            Some(named) => named,
            None if beside.is_file() => &beside,
            None => return Ok(None),
        };
        let why = match Chips::read(path) {
            Ok(chips) if chips.are_of(robot) => return Ok(Some(chips)),
            Ok(_) => {
                format!("{}: is of another sheet or version; `toehold chips` makes it anew", path.display())
            }
            Err(why) => why,
        };
        if self.chips.is_some() {
            return Err(Ending::WrongInput(format!("toehold: {why}")));
        }
        let _ = writeln!(std::io::stderr(), "toehold: left out of the report: {why}");
        Ok(None)
    }
}

/// A word of a command line: in quotes if it has more than letters, digits and what paths are made of.
pub(super) fn quoted(word: &str) -> String {
    let plain = |c: char| c.is_alphanumeric() || "-_./\\:".contains(c);
    if word.chars().all(plain) { word.to_owned() } else { format!("\"{}\"", word.replace('"', "\\\"")) }
}

/// Surveys a robot, and certifies it with that effort if there is one, behind a progress bar.
pub(super) fn surveyed(
    source: &Source,
    robot: &Robot,
    plan: Plan,
    certify: Option<Effort>,
) -> Result<Survey, Ending> {
    let progress = bar(&source.stem(), plan.targets * robot.kinds.len() as u64);
    let survey = survey(robot, plan, &progress).and_then(|mut survey| {
        if let Some(effort) = certify {
            progress.set_message(format!("{}: certifying", source.stem()));
            survey.certify(effort)?;
        }
        Ok(survey)
    });
    progress.finish_and_clear();
    survey.map_err(|error| match error {
        SurveyError::Exceeded(_) => Ending::Failed(format!("{}: {error}", source.shown())),
        _ => Ending::WrongInput(format!("{}: {error}", source.shown())),
    })
}

/// A progress bar on a terminal; nothing elsewhere.
fn bar(what: &str, length: u64) -> ProgressBar {
    let style =
        ProgressStyle::with_template("{msg} {wide_bar} {human_pos} of {human_len} targets, {eta} left")
            .expect("a constant template");
    ProgressBar::new(length).with_style(style).with_message(what.to_owned())
}
