//! Counts what a leg costs on emulated chips, for every contender, and prints one table per chip.
//!
//! Exit codes: 0 counted; 1 an answer differs from the PC's, or an image did not build or end in good order; 2 wrong
//! call; 3 a tool is missing and could not be installed.

mod arguments;
mod count;
mod expected;
mod goals;
mod guard;
mod own_counter;
mod report;
mod system_timer;
mod table;
mod trouble;

use std::{path::Path, process::ExitCode};

use arguments::Arguments;
use contenders::To;
use count::Cost;
use emulation::{Chip, Run, Setting};
use expected::Expected;
use goals::Goals;
use report::Report;
use trouble::Trouble;

fn main() -> ExitCode {
    match run(&<Arguments as clap::Parser>::parse()) {
        Ok(()) => ExitCode::SUCCESS,
        Err(trouble) => {
            eprintln!("error: {trouble}");
            ExitCode::from(trouble.exit_code())
        }
    }
}

fn run(arguments: &Arguments) -> Result<(), Trouble> {
    let wanted = wanted(arguments)?;
    if arguments.list {
        for expected in wanted.iter().filter(|expected| expected.to != To::Nothing) {
            println!("{}", expected.name);
        }
        return Ok(());
    }
    let chips = arguments.chips();
    emulation::set_up(arguments.way, &chips)?;
    eprintln!("building the plugin");
    let plugin = emulation::plugin()?;
    let mut reports = Vec::new();
    for &chip in &chips {
        let report = Report { chip, costs: count_on(arguments, chip, &plugin, &wanted)? };
        if !arguments.json {
            println!("{report}");
        }
        reports.push(report);
    }
    if arguments.json {
        println!("{}", report::json(&reports));
    } else {
        println!("{}", Goals::of(&reports));
    }
    if arguments.rewrite_guard {
        println!("written: {}", guard::rewrite(&reports)?.display());
    }
    if arguments.guard { compare_with_guard(&mut reports, arguments.pretend_more) } else { Ok(()) }
}

fn compare_with_guard(reports: &mut [Report], pretend_more: u64) -> Result<(), Trouble> {
    for cost in reports.iter_mut().flat_map(|report| &mut report.costs) {
        cost.instructions.mean *= 1.0 + pretend_more as f64 / 100.0;
    }
    let excesses = guard::excesses(reports)?;
    for excess in &excesses {
        eprintln!("{excess}");
    }
    if excesses.is_empty() {
        println!("the guard: nothing costs more than 3 % beyond guard.toml");
        return Ok(());
    }
    Err(Trouble::Beyond { excesses: excesses.len() })
}

/// What is asked for, and the call alone, which is always needed.
fn wanted(arguments: &Arguments) -> Result<Vec<Expected>, Trouble> {
    let all = expected::all();
    for only in arguments.only() {
        if !all.iter().any(|expected| expected.name.contains(only.as_str())) {
            let names: Vec<_> = all.iter().map(|expected| expected.name).collect();
            return Err(Trouble::NoSuchContender { only: only.clone(), names: names.join(", ") });
        }
    }
    Ok(all
        .into_iter()
        .filter(|expected| expected.to == To::Nothing || arguments.wants(expected.name, expected.ours))
        .collect())
}

fn count_on(
    arguments: &Arguments,
    chip: Chip,
    plugin: &Path,
    wanted: &[Expected],
) -> Result<Vec<Cost>, Trouble> {
    eprintln!("{}: building {} images", chip.class(), wanted.len());
    let names: Vec<&str> = wanted.iter().map(|expected| expected.name).collect();
    let images = emulation::images(arguments.way, chip, "image", &names)?;
    let time_limit = arguments.time_limit();
    let setting = Setting { chip, plugin: Some(plugin), data: None, by_instructions: false, time_limit };
    let (mut costs, mut call) = (Vec::new(), None);
    for expected in wanted {
        let image = images.get(expected.name).ok_or_else(|| not_named(expected.name))?;
        let run = emulation::run(expected.name, image, setting)?;
        count::check(expected, &run)?;
        if arguments.count_twice {
            let again = emulation::count_again(chip, expected.name, image, arguments.time_limit())?;
            count::compare(expected, &run.windows, &again)?;
            eprintln!("{}: {}: counted twice, {} windows alike", chip.class(), expected.name, again.len());
            by_the_chip_itself(arguments, expected, Setting { by_instructions: true, ..setting }, &run)?;
        }
        if arguments.against_disassembler {
            let agreed = emulation::disassembler_agrees(chip, expected.name, image)?;
            eprintln!("{}: {}: decoded as disassembled, {agreed} instructions", chip.class(), expected.name);
        }
        let flash = emulation::flash_bytes(image)?;
        match (expected.to, call) {
            (To::Nothing, _) => call = Some(count::call_alone(&run.windows, flash)),
            (_, Some(call)) => {
                let mut cost = count::cost(expected, &run.windows, flash, call);
                cost.stack_bound = bound(chip, expected, image, cost.stack)?;
                costs.push(cost);
            }
            (_, None) => return Err(not_named("image of the call alone")),
        }
    }
    Ok(costs)
}

/// Compares what was counted with what the chip says of itself.
fn by_the_chip_itself(
    arguments: &Arguments,
    expected: &Expected,
    setting: Setting<'_>,
    run: &Run,
) -> Result<(), Trouble> {
    let (name, chip) = (expected.name, setting.chip);
    let images = emulation::images_with(arguments.way, chip, "image", &[name], &["own-counter"], None)?;
    let image = images.get(name).ok_or_else(|| not_named(name))?;
    match chip.instructions_per_tick() {
        None => {
            let own = emulation::run(name, image, setting)?;
            let more = own_counter::compare(expected, &own)?;
            eprintln!(
                "{}: {name}: by the chip's own counter as well, always {more} more around the window",
                chip.class()
            );
        }
        Some(per_tick) => {
            let own = emulation::run(name, image, Setting { plugin: None, ..setting })?;
            let [least, most] = system_timer::compare(expected, &run.windows, &own, per_tick)?;
            eprintln!(
                "{}: {name}: by the system timer as well, always {least:.1} to {most:.1} more around the window",
                chip.class()
            );
        }
    }
    Ok(())
}

fn not_named(what: &str) -> Trouble {
    emulation::Trouble::NotNamed(what.into()).into()
}

/// The bound of the stack, if there is one; what was measured must lie within.
fn bound(chip: Chip, expected: &Expected, image: &Path, measured: u64) -> Result<Option<u64>, Trouble> {
    match emulation::stack_bound(image) {
        Ok(bound) if measured > bound => {
            Err(Trouble::BeyondTheBound { name: expected.name.into(), measured, bound })
        }
        Ok(bound) => Ok(Some(bound)),
        Err(why) => {
            eprintln!("{}: {}: no bound for the stack: {why}", chip.class(), expected.name);
            Ok(None)
        }
    }
}
