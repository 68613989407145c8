//! Starts `robot-cost` with a job, and makes findings of its rows.

use super::clock::Clocks;
use super::findings::{Chips, Found, KindOnChips, LeftOut, Row, Times};
use super::job::{self, Job};
use super::source::WORKSPACE;
use crate::machine;
use crate::sheet::{NumberSystem, Robot};
use serde::Deserialize;
use std::path::PathBuf;
use std::process::{Command, Stdio};
use std::{fmt, fs, io};

/// The classes, as `robot-cost` knows them.
pub const ON_ALL: [&str; 6] = ["m0", "m0plus", "m3", "m4f", "m7", "rv32imc"];

/// What is asked.
#[derive(Debug, Clone, PartialEq)]
pub struct Ask {
    /// The root of the source tree.
    pub source: PathBuf,
    /// Classes, of [`ON_ALL`].
    pub chips: Vec<String>,
    /// Number systems.
    pub numbers: Vec<NumberSystem>,
    /// The clocks that the user names.
    pub clocks: Clocks,
    /// Where the compiler for the chips comes from: a word of `.ci/tools.sh`, or `none`.
    pub way: String,
    /// More arguments for `robot-cost`.
    pub pass_on: Vec<String>,
}

/// Why nothing could be measured.
#[derive(Debug)]
pub enum ChipsError {
    /// Files or programs.
    Io(String, io::Error),
    /// The runner could not be built, or failed.
    Runner(String),
}

impl fmt::Display for ChipsError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Io(what, cause) => write!(f, "{what}: {cause}"),
            Self::Runner(what) => f.write_str(what),
        }
    }
}

impl std::error::Error for ChipsError {}

/// A row of `robot-cost`.
#[derive(Debug, Deserialize)]
struct Told {
    leg: usize,
    number: String,
    chip: String,
    class: String,
    target: String,
    machine: String,
    cycles_from: String,
    usual_clock_hz: f64,
    #[serde(flatten)]
    found: Found,
}

/// Measures every kind of leg of some robots. Progress goes to standard error.
///
/// # Errors
/// If the runner cannot be started or fails as a whole; a class that cannot be measured is a row that says why.
pub fn measure(robots: &[Robot], ask: &Ask) -> Result<Vec<Chips>, ChipsError> {
    let mut legs = Vec::new();
    for (index, robot) in robots.iter().enumerate() {
        legs.extend((0..robot.kinds.len()).map(|kind| (index, kind)));
    }
    let job = Job {
        legs: legs.iter().map(|&(robot, kind)| job::leg(&robots[robot], kind)).collect(),
        numbers: ask.numbers.iter().map(|number| number.name()).collect(),
    };
    let mut told = run(ask, &job)?;
    Ok(robots
        .iter()
        .enumerate()
        .map(|(index, robot)| {
            let kinds = legs.iter().enumerate().filter(|(_, (of, _))| *of == index);
            let kinds = kinds.map(|(place, &(_, kind))| {
                let rows = told.extract_if(.., |row| row.leg == place).collect();
                of_kind(robot, kind, rows, &ask.clocks)
            });
            Chips {
                toehold: env!("CARGO_PKG_VERSION").to_owned(),
                robot: serde_json::to_value(robot).expect("plain data with string keys"),
                name: robot.name.clone(),
                frame_hz: robot.firmware.frame_hz,
                kinds: kinds.collect(),
                left_out: vec![avr()],
            }
        })
        .collect())
}

/// Why there is no row for AVR.
fn avr() -> LeftOut {
    LeftOut {
        class: "AVR (ATmega328P class)".into(),
        why: "stable Rust has no core for avr-none, and a cycle-accurate simulator is not driven yet; besides, constants lie in \
              RAM there, and the tables of fixed16, the smallest, take 2264 bytes of the ATmega328P's 2048".into(),
    }
}

fn of_kind(robot: &Robot, kind: usize, rows: Vec<Told>, clocks: &Clocks) -> KindOnChips {
    let legs: Vec<_> = machine::legs_of(robot, kind).collect();
    let rows = rows.into_iter().map(|told| {
        let clock_hz = clocks.hz(&told.chip, told.usual_clock_hz);
        let times = match &told.found {
            Found::Measured(measured) => {
                Some(Times::of(measured, clock_hz, legs.len(), robot.firmware.frame_hz))
            }
            _ => None,
        };
        Row {
            firmware: robot.firmware.numbers.iter().any(|number| number.name() == told.number),
            chip: told.chip,
            class: told.class,
            target: told.target,
            machine: told.machine,
            number: told.number,
            cycles_from: told.cycles_from,
            clock_hz,
            found: told.found,
            times,
        }
    });
    KindOnChips {
        kind: robot.kinds[kind].name.clone(),
        leg: robot.legs[legs[0]].name.clone(),
        rows: rows.collect(),
        legs: legs.len(),
    }
}

fn run(ask: &Ask, job: &Job) -> Result<Vec<Told>, ChipsError> {
    let io = |what: &str| {
        let what = what.to_owned();
        move |cause| ChipsError::Io(what, cause)
    };
    let file = tempfile::Builder::new()
        .prefix("toehold-chips-")
        .suffix(".json")
        .tempfile()
        .map_err(io("cannot make a temporary file"))?;
    let text = serde_json::to_string(job).expect("plain data with string keys");
    fs::write(file.path(), text).map_err(io("cannot write the job"))?;
    let mut cargo = Command::new("cargo");
    cargo
        .args(["run", "--release", "--quiet", "--locked", "--package", "robot-cost", "--manifest-path"])
        .arg(ask.source.join(WORKSPACE))
        .arg("--")
        .arg(file.path())
        .args(["--way", &ask.way])
        .stdin(Stdio::null())
        .stderr(Stdio::inherit());
    cargo.args(&ask.pass_on);
    for chip in &ask.chips {
        cargo.args(["--chip", chip]);
    }
    let output =
        cargo.output().map_err(io("cannot start cargo, Rust's build tool, which must be in PATH"))?;
    if !output.status.success() {
        let what = format!("robot-cost ended with {}; what it says stands above", output.status);
        return Err(ChipsError::Runner(what));
    }
    serde_json::from_slice(&output.stdout)
        .map_err(|error| ChipsError::Runner(format!("robot-cost printed what is no list of rows: {error}")))
}
