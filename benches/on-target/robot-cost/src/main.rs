//! Counts what the legs of a robot's sheet cost on emulated chips, and compares every answer with this PC's, bit for bit.
//!
//! `toehold chips` writes the job and reads the rows; by hand: `robot-cost JOB.json`. What could not be measured is a row
//! that says why. Exit codes: 0 there is a row for everything; 2 wrong call or job.

mod arguments;
mod expected;
mod job;
mod measure;
mod row;
mod sizes;

use std::process::ExitCode;

use arguments::Arguments;
use job::Job;

fn main() -> ExitCode {
    let arguments = <Arguments as clap::Parser>::parse();
    match Job::read(&arguments.job) {
        Ok(job) => {
            let rows = measure::all(&arguments, &job);
            println!("{}", serde_json::to_string(&rows).expect("plain figures and names become JSON"));
            ExitCode::SUCCESS
        }
        Err(complaint) => {
            eprintln!("error: {complaint}");
            ExitCode::from(2)
        }
    }
}
