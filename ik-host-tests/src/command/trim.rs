//! `toehold trim`: a servo's centre and gain, or its measured points, from readings.

use super::ending::{Ending, print};
use crate::report;
use crate::trim::{self, Block, Fit, Wanted};
use serde::Serialize;
use std::io::Write as _;
use std::path::PathBuf;

/// Fits centre and gain to measured pulse and angle pairs, and says whether measured points would be worth it.
#[derive(Debug, clap::Args)]
#[command(after_help = NOTE)]
pub(super) struct Call {
    /// A CSV file with columns pulse_us and angle_deg, and if you like uncertainty_deg, approach (up or down) and note
    #[arg(value_name = "READINGS")]
    readings: PathBuf,
    /// The pulse at which the joint's angle is to be told
    #[arg(long, value_name = "US", default_value_t = 1500.0, value_parser = positive)]
    centre: f64,
    /// Count every row, also one that looks misread
    #[arg(long)]
    keep_all: bool,
    /// What the servo is to be in the sheet; without it, points if they are worth it
    #[arg(long = "as", value_name = "FORM", value_parser = ["straight", "measured"])]
    form: Option<String>,
    /// The farthest that a fitted reading may be off what goes into the sheet, degrees; beyond it, exit code 1. Points that
    /// were each read once are not off at all
    #[arg(long, value_name = "DEGREES", value_parser = positive)]
    allow: Option<f64>,
    /// Write the servo's lines into a new file
    #[arg(long, value_name = "FILE")]
    out: Option<PathBuf>,
    /// Write them into this sheet, in place; all else in it stays as it is
    #[arg(long, value_name = "SHEET", requires_all = ["leg_kind", "joint"])]
    write: Option<PathBuf>,
    /// With --write: the kind of leg, NAME in [leg_kind.NAME]
    #[arg(long, value_name = "NAME", requires = "write")]
    leg_kind: Option<String>,
    /// With --write: the joint, as the sheet names it
    #[arg(long, value_name = "JOINT", requires = "write")]
    joint: Option<String>,
    /// Draw readings, line and residuals into a new SVG file
    #[arg(long, value_name = "FILE")]
    drawing: Option<PathBuf>,
    /// Print JSON instead of text
    #[arg(long)]
    json: bool,
}

const NOTE: &str = "\
Exit code 1: the readings make no servo, or are off by more than --allow; 2: the input or the call is wrong.

Take readings with the machine off the ground, the horn free of the leg or the leg free to swing, from a \
current-limited supply with a way to cut power, and stay within the pulses that the servo's mechanics stand.";

fn positive(text: &str) -> Result<f64, String> {
    match text.parse::<f64>() {
        Ok(value) if value > 0.0 && value.is_finite() => Ok(value),
        _ => Err(format!("{text} is no number above 0")),
    }
}

#[derive(Serialize)]
struct Printed<'a> {
    #[serde(flatten)]
    fit: &'a Fit,
    largest_off_deg: f64,
    sheet_lines: String,
}

impl Call {
    pub(super) fn run(&self) -> Ending {
        self.trimmed().unwrap_or_else(|ending| ending)
    }

    fn trimmed(&self) -> Result<Ending, Ending> {
        let readings = trim::read(&self.readings).map_err(|error| Ending::WrongInput(error.to_string()))?;
        let wanted = Wanted { centre_us: self.centre, keep_all: self.keep_all };
        let source = self.readings.display().to_string();
        let fit = match trim::fit(&readings, wanted) {
            Ok(fit) => fit,
            Err(error) => {
                say(&format!("{source}: {error}"));
                return Ok(Ending::Beyond);
            }
        };
        let measured = match self.form.as_deref() {
            Some(form) => form == "measured",
            None => fit.points_are_worth_it,
        };
        let block = if measured { Block::measured(&fit) } else { Block::straight(&fit) };
        let largest_off_deg = largest_off(&fit, &block);
        if self.json {
            print(&report::json(&Printed { fit: &fit, largest_off_deg, sheet_lines: block.lines() }))?;
        } else {
            print(&report::trimmed_text(&fit, &block, &source))?;
        }
        if let Some(allow) = self.allow.filter(|allow| largest_off_deg > *allow) {
            say(&format!(
                "{source}: a reading is {largest_off_deg:.3} degrees off, {allow} are allowed: nothing is written"
            ));
            return Ok(Ending::Beyond);
        }
        // Everything that can be refused is looked at before anything is written.
        for path in [&self.drawing, &self.out].into_iter().flatten() {
            report::must_be_new(path).map_err(cannot)?;
        }
        let edited = match (&self.write, &self.leg_kind, &self.joint) {
            (Some(path), Some(kind), Some(joint)) => {
                let shown = path.display().to_string();
                let text = std::fs::read_to_string(path)
                    .map_err(|error| Ending::WrongInput(format!("{shown}: {error}")))?;
                let edited =
                    trim::edited_sheet(&shown, &text, [kind, joint], &block).map_err(Ending::WrongInput)?;
                Some((path, edited, format!("written: leg_kind.{kind}.servo.{joint} in {shown}")))
            }
            _ => None,
        };
        if let Some(path) = &self.drawing {
            report::write_new(path, &report::trim_drawing(&fit)).map_err(cannot)?;
        }
        if let Some(path) = &self.out {
            report::write_new(path, &block.lines()).map_err(cannot)?;
        }
        if let Some((path, edited, said)) = edited {
            report::replace_file(path, &edited).map_err(cannot)?;
            say(&said);
        }
        Ok(Ending::Within)
    }
}

/// What is said beside the text or the JSON: on standard error, so that the JSON stays JSON.
fn say(text: &str) {
    let _ = writeln!(std::io::stderr(), "{text}");
}

fn cannot(error: report::WriteError) -> Ending {
    Ending::WrongInput(format!("toehold: {error}"))
}

/// The farthest that a fitted reading is off what goes into the sheet.
fn largest_off(fit: &Fit, block: &Block) -> f64 {
    let off = |row: &trim::Row| (row.angle_deg - block.angle_deg(row.pulse_us)).abs();
    fit.rows.iter().filter(|row| !row.left_out).map(off).fold(0.0, f64::max)
}
