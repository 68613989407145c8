//! Builds the image `leg-by-timer` for each chip class, runs it on an emulated chip and compares
//! every line that it logs with what the same code computes on the PC, bit for bit; then runs the models, whose logs must
//! be those of their golden files.
//!
//! Exit codes: 0 all the same; 1 something differs, or an image did not build or end in good order;
//! 2 wrong call; 3 a tool is missing and could not be installed.

mod arguments;
mod chip;
mod comparison;
mod emulator;
mod expected;
mod image;
mod log;
mod models;
mod self_test;
mod summary;
mod tools;
mod trouble;

use std::process::ExitCode;

use arguments::Arguments;
use chip::Chip;
use summary::Row;
use trouble::Trouble;

fn main() -> ExitCode {
    let arguments = <Arguments as clap::Parser>::parse();
    let result = if arguments.self_test { self_test::run(&arguments) } else { drill_every_chip(&arguments) };
    match result {
        Ok(()) => ExitCode::SUCCESS,
        Err(trouble) => {
            eprintln!("error: {trouble}");
            ExitCode::from(trouble.exit_code())
        }
    }
}

/// Goes through all chips even if one fails, so that the summary shows them side by side.
fn drill_every_chip(arguments: &Arguments) -> Result<(), Trouble> {
    let chips = arguments.chips();
    tools::set_up(arguments.way, &chips)?;
    let mut expected = expected::lines();
    if let Some(target) = arguments.spoil {
        expected::spoil(&mut expected, target)?;
    }
    let rows: Vec<Row> = chips.iter().map(|&chip| drill_one_chip(arguments, chip, &expected)).collect();
    println!("{}", summary::table(&expected, &rows));
    match rows.iter().filter(|row| !row.same).count() {
        // What goes wrong on purpose is the drill.
        0 if arguments.go_wrong.is_some() || arguments.spoil.is_some() => Ok(()),
        0 => match models::run(arguments)? {
            failed if failed.is_empty() => Ok(()),
            models => Err(Trouble::ModelsFailed { models }),
        },
        failed => Err(Trouble::ChipsFailed { failed, of: chips.len() }),
    }
}

fn drill_one_chip(arguments: &Arguments, chip: Chip, expected: &[expected::Line]) -> Row {
    let mut log = Vec::new();
    let result = run_and_compare(arguments, chip, expected, &mut log);
    if let Err(trouble) = &result {
        eprintln!("{}: {trouble}", chip.class());
    }
    Row { chip, log, same: result.is_ok() }
}

fn run_and_compare(
    arguments: &Arguments,
    chip: Chip,
    expected: &[expected::Line],
    log: &mut Vec<String>,
) -> Result<(), Trouble> {
    eprintln!("{}: building the image", chip.class());
    let elf = image::build(arguments.way, chip, image::DRILL, arguments.go_wrong)?;
    eprintln!("{}: running it on {}", chip.class(), chip.machine());
    let run = emulator::run(chip, &elf, emulator::Clock::OfThisPc, arguments.time_limit())?;
    *log = log::decode(&elf, &run.output)?;
    if arguments.log {
        for line in &*log {
            println!("{}: {line}", chip.class());
        }
    }
    run.ending.in_good_order(log.last())?;
    comparison::compare(expected, log)?;
    Ok(())
}
