//! `toehold survey`: the main job.

use super::ending::{Ending, print};
use super::robots::{self, Source};
use crate::report;
use crate::survey::{Plan, Survey, Verdict, survey};
use indicatif::{ProgressBar, ProgressStyle};
use serde::Serialize;
use std::path::PathBuf;

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
    /// Folder for the reports, one .json and one .html per robot
    #[arg(long, value_name = "FOLDER", default_value = "toehold-survey")]
    report: PathBuf,
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
            let survey = self.one(source)?;
            if !self.json {
                print(&report::text(&survey, &source.shown()))?;
            }
            if !self.no_report {
                self.write(source, &survey)?;
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

    fn one(&self, source: &Source) -> Result<Survey, Ending> {
        let robot = source.robot()?;
        let plan = Plan { targets: self.targets, seed: self.seed };
        let progress = bar(&source.stem(), self.targets * robot.kinds.len() as u64);
        let survey = survey(&robot, plan, &progress);
        progress.finish_and_clear();
        survey.map_err(|error| Ending::WrongInput(format!("{}: {error}", source.shown())))
    }

    fn write(&self, source: &Source, survey: &Survey) -> Result<(), Ending> {
        let repeat = format!(
            "toehold survey{} --targets {} --seed {}",
            match source {
                Source::File(path) => format!(" {}", quoted(&path.display().to_string())),
                Source::Demo(_) => String::new(),
            },
            self.targets,
            self.seed
        );
        let paths = report::write(&self.report, &source.stem(), survey, &repeat)
            .map_err(|error| Ending::Failed(format!("toehold: {error}")))?;
        if !self.json {
            let paths = paths.map(|path| path.display().to_string()).join(" and ");
            print(&format!("report: {paths}\n\n"))?;
        }
        Ok(())
    }
}

/// A word of a command line: in quotes if it has more than letters, digits and what paths are made of.
fn quoted(word: &str) -> String {
    let plain = |c: char| c.is_alphanumeric() || "-_./\\:".contains(c);
    if word.chars().all(plain) { word.to_owned() } else { format!("\"{}\"", word.replace('"', "\\\"")) }
}

/// A progress bar on a terminal; nothing elsewhere.
fn bar(what: &str, length: u64) -> ProgressBar {
    let style =
        ProgressStyle::with_template("{msg} {wide_bar} {human_pos} of {human_len} targets, {eta} left")
            .expect("a constant template");
    ProgressBar::new(length).with_style(style).with_message(what.to_owned())
}
