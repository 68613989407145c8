//! The images that are models for users: each is run on its chip, and what it logs must be the lines of its golden file.

use std::{fs, path::PathBuf};

use crate::{
    arguments::Arguments, chip::Chip, comparison, emulator, expected::Line, image, log, tools,
    trouble::Trouble,
};

/// An image, and the chips that it is for.
struct Model {
    package: &'static str,
    chips: &'static [Chip],
}

const MODELS: [Model; 4] = [
    Model { package: "one-leg-on-a-timer", chips: &[Chip::M0, Chip::Rv32imc] },
    Model { package: "six-legs-on-an-expander", chips: &[Chip::M3] },
    Model { package: "four-legs-in-an-interrupt", chips: &[Chip::M4f, Chip::M7] },
    Model { package: "from-a-sheet", chips: &[Chip::M3] },
];

/// Runs every model on those of its chips that are asked for; the models that failed.
pub fn run(arguments: &Arguments) -> Result<Vec<&'static str>, Trouble> {
    let chips = arguments.chips();
    let mut failed = Vec::new();
    for model in &MODELS {
        for &chip in model.chips.iter().filter(|chip| chips.contains(chip)) {
            match one(arguments, model.package, chip) {
                Ok(lines) => {
                    println!("{} on {}: {lines} lines, as in its golden file", model.package, chip.class())
                }
                Err(trouble) => {
                    eprintln!("{} on {}: {trouble}", model.package, chip.class());
                    failed.push(model.package);
                }
            }
        }
    }
    Ok(failed)
}

fn one(arguments: &Arguments, package: &str, chip: Chip) -> Result<usize, Trouble> {
    let elf = image::build(arguments.way, chip, package, None)?;
    let run = emulator::run(chip, &elf, emulator::Clock::ByInstructions, arguments.time_limit())?;
    let log = log::decode(&elf, &run.output)?;
    if arguments.log {
        for line in &log {
            println!("{}: {line}", chip.class());
        }
    }
    run.ending.in_good_order(log.last())?;
    let golden = golden(package);
    let failed = |source| Trouble::Io { what: golden.display().to_string(), source };
    if arguments.rewrite_golden {
        fs::write(&golden, log.join("\n") + "\n").map_err(failed)?;
    }
    let text = fs::read_to_string(&golden).map_err(failed)?;
    let expected: Vec<Line> = (1..)
        .zip(text.lines())
        .map(|(number, line)| Line {
            text: line.to_owned(),
            about: format!("{package}, line {number} of its golden file"),
            answer: None,
        })
        .collect();
    comparison::compare(&expected, &log)?;
    Ok(log.len())
}

fn golden(package: &str) -> PathBuf {
    tools::workspace().join("run-on-emulator/golden").join(format!("{package}.txt"))
}
