//! The `toehold` program: what it is asked, and how it ends.
//!
//! | exit code | meaning |
//! | --- | --- |
//! | 0 | done, and within what the sheet allows |
//! | 1 | done, and something is beyond what the sheet allows |
//! | 2 | the input or the call is wrong |

mod bounds;
mod chips;
mod constants;
mod ending;
mod robots;
mod sheet;
mod solve;
mod survey;
mod trim;

use clap::{Parser, Subcommand};
use ending::Ending;
use std::io::Write as _;
use std::process::ExitCode;

/// Foot positions to joint angles to servo pulses: what your leg's arithmetic is worth, before you flash it.
#[derive(Debug, Parser)]
#[command(name = "toehold", version, about, long_about = LONG_ABOUT, after_help = AFTER_HELP)]
struct Call {
    #[command(subcommand)]
    task: Task,
}

const LONG_ABOUT: &str = "\
Reads a robot sheet (TOML: leg lengths, joint ranges, servos, timer or expander, work volume) and runs the very \
solver that your firmware links, in every number system, against a reference that shares no code with it.";

const AFTER_HELP: &str = "\
Exit code 0: done, and within what the sheet allows; 1: done, and something is beyond what the sheet allows;
2: the input or the call is wrong.

Before a machine moves: lift it off the ground, feed it from a current-limited supply, and keep a way to cut
power within reach. Local rules and qualified practice come before anything printed here.";

#[derive(Debug, Subcommand)]
enum Task {
    /// Survey how far arithmetic and pulse resolution put the foot from where it was asked to be
    Survey(survey::Call),
    /// Solve one foot position in every number system: joints, pulses, counts, error
    Solve(solve::Call),
    /// Count what a leg costs on emulated chips: instructions, estimated time, flash, stack
    Chips(chips::Call),
    /// Fit a servo's centre and gain, or its points, to readings taken on the bench
    Trim(trim::Call),
    /// Measure what each primitive of each number system is worth, against the bounds that are stated
    Bounds(bounds::Call),
    /// Write a sheet's legs as constants for firmware, after a survey
    Constants(constants::Call),
    /// Print a demo robot's sheet, to start one's own from
    Sheet(sheet::Call),
}

/// Runs the program on its arguments.
pub fn run() -> ExitCode {
    let call = match Call::try_parse() {
        Ok(call) => call,
        Err(error) => {
            // Help and version are no errors; clap knows which stream each belongs to.
            let _ = error.print();
            return ExitCode::from(if error.use_stderr() { 2 } else { 0 });
        }
    };
    let ending = match &call.task {
        Task::Survey(call) => call.run(),
        Task::Solve(call) => call.run(),
        Task::Chips(call) => call.run(),
        Task::Trim(call) => call.run(),
        Task::Bounds(call) => call.run(),
        Task::Constants(call) => call.run(),
        Task::Sheet(call) => call.run(),
    };
    if let Ending::WrongInput(message) | Ending::Failed(message) = &ending {
        let _ = writeln!(std::io::stderr(), "{}", message.trim_end());
    }
    ending.code()
}
