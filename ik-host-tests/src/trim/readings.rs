//! Readings from a CSV file.
//!
//! | column | what |
//! | --- | --- |
//! | `pulse_us` | the pulse that was sent, µs |
//! | `angle_deg` | the joint's angle that was read, degrees, signed as the joint is |
//! | `uncertainty_deg` | optional: the standard uncertainty of the reading, degrees; 0.5 without |
//! | `approach` | optional: `up` if the pulse came from a shorter one, `down` if from a longer one |
//! | `note` | optional: anything |
//!
//! Lines that begin with `#` are comments.

use std::fmt;
use std::path::{Path, PathBuf};

/// From which side the servo came to rest.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Approach {
    /// From shorter pulses.
    Up,
    /// From longer pulses.
    Down,
}

/// One row.
#[derive(Debug, Clone, PartialEq)]
pub struct Reading {
    /// Its line in the file, from 1.
    pub line: u64,
    /// The pulse, µs.
    pub pulse_us: f64,
    /// The angle, degrees.
    pub angle_deg: f64,
    /// The standard uncertainty of the angle, degrees.
    pub uncertainty_deg: f64,
    /// From which side.
    pub approach: Option<Approach>,
    /// What was noted.
    pub note: String,
}

/// What is wrong with a file of readings.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct ReadingsError {
    /// The file.
    pub path: PathBuf,
    /// Each thing that is wrong: line (0 for the file as a whole), field, value, and what would be right.
    pub complaints: Vec<(u64, String)>,
}

impl fmt::Display for ReadingsError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        for (number, (line, complaint)) in self.complaints.iter().enumerate() {
            let separator = if number == 0 { "" } else { "\n" };
            match line {
                0 => write!(f, "{separator}{}: {complaint}", self.path.display())?,
                line => write!(f, "{separator}{}:{line}: {complaint}", self.path.display())?,
            }
        }
        Ok(())
    }
}

impl std::error::Error for ReadingsError {}

/// The uncertainty of a reading that says none, degrees: half of a protractor's division of a degree.
pub const USUAL_UNCERTAINTY_DEG: f64 = 0.5;
/// Pulses that a servo may be sent, µs.
const PULSES_US: [f64; 2] = [100.0, 10_000.0];
/// Rows at the most: more is another kind of file.
const MOST_ROWS: usize = 10_000;
/// A line and its two errors need as many; a misread one among them one more.
pub const LEAST_ROWS: usize = 4;

/// Reads and checks a file.
///
/// # Errors
/// Everything that is wrong with it, each with its line, field, value and what would be right.
pub fn read(path: &Path) -> Result<Vec<Reading>, ReadingsError> {
    let whole = |complaint: String| ReadingsError { path: path.to_owned(), complaints: vec![(0, complaint)] };
    let mut reader = csv::ReaderBuilder::new()
        .comment(Some(b'#'))
        .trim(csv::Trim::All)
        .from_path(path)
        .map_err(|error| whole(format!("{error}; a CSV file of readings would be right")))?;
    let heads = reader.headers().map_err(|error| whole(error.to_string()))?.clone();
    let known = ["pulse_us", "angle_deg", "uncertainty_deg", "approach", "note"];
    let mut complaints = Vec::new();
    for head in heads.iter().filter(|head| !known.contains(head)) {
        complaints.push((1, format!("column {head:?} is not known; the columns are {}", known.join(", "))));
    }
    for twice in known.iter().filter(|head| heads.iter().filter(|other| other == *head).count() > 1) {
        complaints.push((1, format!("column {twice} is there twice; each column once would be right")));
    }
    for needed in ["pulse_us", "angle_deg"] {
        if !heads.iter().any(|head| head == needed) {
            complaints
                .push((1, format!("there is no column {needed}; the first line must name the columns")));
        }
    }
    if !complaints.is_empty() {
        return Err(ReadingsError { path: path.to_owned(), complaints });
    }
    let mut readings = Vec::new();
    for record in reader.records().take(MOST_ROWS + 1) {
        match record {
            Err(error) => {
                let line = error.position().map_or(0, csv::Position::line);
                complaints.push((line, format!("{error}; every row must have {} fields", heads.len())));
            }
            Ok(record) => {
                let line = record.position().map_or(0, csv::Position::line);
                match reading(&heads, &record, line) {
                    Ok(reading) => readings.push(reading),
                    Err(found) => complaints.extend(found.into_iter().map(|complaint| (line, complaint))),
                }
            }
        }
    }
    if readings.len() > MOST_ROWS {
        complaints.push((0, format!("more than {MOST_ROWS} readings, which no servo needs")));
    }
    let distinct = distinct_pulses(&readings);
    if complaints.is_empty() && (readings.len() < LEAST_ROWS || distinct < 3) {
        complaints.push((
            0,
            format!(
                "{} readings at {distinct} pulses; at least {LEAST_ROWS} at 3 or more are needed, a dozen over the whole \
                 range is better",
                readings.len()
            ),
        ));
    }
    if complaints.is_empty() {
        Ok(readings)
    } else {
        Err(ReadingsError { path: path.to_owned(), complaints })
    }
}

/// How many different pulses there are.
fn distinct_pulses(readings: &[Reading]) -> usize {
    let mut pulses: Vec<f64> = readings.iter().map(|reading| reading.pulse_us).collect();
    pulses.sort_by(f64::total_cmp);
    pulses.dedup();
    pulses.len()
}

fn reading(heads: &csv::StringRecord, record: &csv::StringRecord, line: u64) -> Result<Reading, Vec<String>> {
    let text = |column: &str| {
        heads
            .iter()
            .position(|head| head == column)
            .and_then(|at| record.get(at))
            .filter(|text| !text.is_empty())
    };
    let mut complaints = Vec::new();
    let mut number =
        |column: &str, [least, most]: [f64; 2], otherwise: Option<f64>| match (text(column), otherwise) {
            (None, Some(value)) => value,
            (None, None) => {
                complaints.push(format!("{column} is missing: must be a number from {least} to {most}"));
                f64::NAN
            }
            (Some(text), _) => match text.parse::<f64>() {
                Ok(value) if (least..=most).contains(&value) => value,
                _ => {
                    complaints.push(format!("{column} = {text}: must be a number from {least} to {most}"));
                    f64::NAN
                }
            },
        };
    let pulse_us = number("pulse_us", PULSES_US, None);
    let angle_deg = number("angle_deg", [-360.0, 360.0], None);
    let uncertainty_deg = number("uncertainty_deg", [0.001, 30.0], Some(USUAL_UNCERTAINTY_DEG));
    let approach = match text("approach") {
        None => None,
        Some("up") => Some(Approach::Up),
        Some("down") => Some(Approach::Down),
        Some(other) => {
            complaints.push(format!(
                "approach = {other}: must be up (from a shorter pulse), down (from a longer one), or empty"
            ));
            None
        }
    };
    let note = text("note").unwrap_or_default().to_owned();
    let reading = Reading { line, pulse_us, angle_deg, uncertainty_deg, approach, note };
    if complaints.is_empty() { Ok(reading) } else { Err(complaints) }
}
