//! Builds, runs, compares, counts.

use std::{
    collections::{BTreeMap, BTreeSet},
    fs,
    path::Path,
};

use emulation::{Chip, Images, Setting, Trouble};
use reckoning::Window;

use crate::{
    arguments::Arguments,
    expected::{Expected, expected},
    job::Job,
    row::{Found, Measured, Row},
    sizes::{Call, Sizes},
};

/// A leg in a number system, ready for any chip; or why ik-core refuses it.
struct Case {
    leg: usize,
    number: String,
    made: Result<[Expected; 2], String>,
}

/// A row for every leg, number system and chip, in the order of the job.
pub fn all(arguments: &Arguments, job: &Job) -> Vec<Row> {
    let mut cases = Vec::new();
    for (index, leg) in job.legs.iter().enumerate() {
        for number in &job.numbers {
            let made = expected(leg, number, &leg.counted)
                .and_then(|counted| Ok([counted, expected(leg, number, &leg.compared)?]));
            let made = made.map(|mut both| {
                if let Some(target) = arguments.spoil {
                    both.iter_mut().for_each(|expected| expected.spoil(target));
                }
                both
            });
            cases.push(Case { leg: index, number: number.clone(), made });
        }
    }
    let plugin = emulation::set_up(arguments.way, &[]).and_then(|()| emulation::plugin());
    let mut rows: Vec<Row> = Vec::new();
    for chip in arguments.chips() {
        match &plugin {
            Ok(plugin) => rows.extend(on_chip(arguments, job, chip, plugin, &cases)),
            Err(trouble) => rows.extend(none(chip, &cases, trouble)),
        }
    }
    rows.sort_by_key(|row| row.leg);
    rows
}

/// Rows that say why nothing could be measured on a chip.
fn none(chip: Chip, cases: &[Case], trouble: &Trouble) -> Vec<Row> {
    let why = trouble.to_string();
    eprintln!("{}: {why}", chip.class());
    let found = || Found::NotMeasured { why: why.clone() };
    cases.iter().map(|case| Row::new(case.leg, &case.number, chip, found())).collect()
}

fn on_chip(arguments: &Arguments, job: &Job, chip: Chip, plugin: &Path, cases: &[Case]) -> Vec<Row> {
    eprintln!("{}: building images", chip.class());
    let setting = Setting {
        chip,
        plugin: Some(plugin),
        data: None,
        by_instructions: false,
        time_limit: arguments.time_limit(),
    };
    let built = emulation::set_up(arguments.way, &[chip]).and_then(|()| {
        Ok((images(arguments, job, chip, cases)?, Sizes::of(arguments, setting, &job.numbers)?))
    });
    let (images, sizes) = match built {
        Ok(built) => built,
        Err(trouble) => return none(chip, cases, &trouble),
    };
    eprintln!("{}: running them on {}", chip.class(), chip.machine());
    cases
        .iter()
        .map(|case| {
            let found = match &case.made {
                Err(why) => Found::Refused { why: why.clone() },
                Ok(both) => {
                    let leg = &job.legs[case.leg];
                    let flash = sizes.of_leg(leg.hip, &case.number);
                    one(&images[&leg.features()], both, setting, (sizes.call, leg.typical, flash))
                        .unwrap_or_else(|trouble| Found::NotMeasured { why: trouble.to_string() })
                }
            };
            if let Found::NotMeasured { why } | Found::Differs { why } = &found {
                eprintln!("{}: {}, {}: {why}", chip.class(), job.legs[case.leg].name, case.number);
            }
            Row::new(case.leg, &case.number, chip, found)
        })
        .collect()
}

/// Images by the features that drive a leg.
type ByFeatures = BTreeMap<Vec<&'static str>, Images>;

fn images(arguments: &Arguments, job: &Job, chip: Chip, cases: &[Case]) -> Result<ByFeatures, Trouble> {
    let mut names = BTreeMap::<_, BTreeSet<&str>>::new();
    for case in cases {
        let names = names.entry(job.legs[case.leg].features()).or_default();
        names.extend(case.made.as_ref().map(|made| made[0].image.as_str()));
    }
    names
        .into_iter()
        .map(|(features, names)| {
            let names: Vec<&str> = names.into_iter().collect();
            let images = emulation::images_with(
                arguments.way,
                chip,
                "robot-image",
                &names,
                &features,
                arguments.ik_core.as_deref(),
            )?;
            Ok((features, images))
        })
        .collect()
}

fn one(
    images: &Images,
    [counted, compared]: &[Expected; 2],
    counting: Setting<'_>,
    (call, typical, flash): (Call, usize, Option<i64>),
) -> Result<Found, Trouble> {
    let image = images.get(&counted.image).ok_or_else(|| Trouble::NotNamed(counted.image.clone()))?;
    let comparing = Setting { plugin: None, ..counting };
    if let Some(why) = difference(image, compared, comparing)? {
        return Ok(Found::Differs { why });
    }
    let run = run(image, counted, counting, [0, 0])?;
    if run.log != counted.digests() {
        let why = difference(image, counted, comparing)?;
        let why = why.unwrap_or_else(|| "with the plugin it answers otherwise than without".into());
        return Ok(Found::Differs { why });
    }
    if run.windows.len() != counted.targets() {
        let why = format!("{} windows were counted, not {}", run.windows.len(), counted.targets());
        return Ok(Found::NotMeasured { why });
    }
    if let Some(address) = run.windows.iter().find_map(|window| window.unknown_at) {
        let why = format!("the instruction at {address:#x} is of no kind that the cycle tables have");
        return Ok(Found::NotMeasured { why });
    }
    let mut measured = measured(&run.windows, typical, call);
    (measured.compared, measured.flash) = (compared.targets(), flash);
    match emulation::stack_bound(image) {
        Ok(bound) if measured.stack > bound => {
            let why = format!(
                "the stack went {} bytes deep, beyond its bound of {bound}: the bound is wrong",
                measured.stack
            );
            return Ok(Found::NotMeasured { why });
        }
        Ok(bound) => measured.stack_bound = Some(bound),
        Err(why) => eprintln!("{}: {}: no bound for the stack: {why}", counting.chip.class(), counted.image),
    }
    Ok(Found::Measured(measured))
}

fn measured(windows: &[Window], typical: usize, call: Call) -> Measured {
    let all = |of: fn(&Window) -> u64| windows.iter().map(of);
    let less = |value: f64, call: u64| value - call as f64;
    let mean = |of: fn(&Window) -> u64, call: u64| {
        less(all(of).take(typical).sum::<u64>() as f64 / typical.max(1) as f64, call)
    };
    let most = |of: fn(&Window) -> u64, call: u64| less(all(of).max().unwrap_or(0) as f64, call);
    let instructions: fn(&Window) -> u64 = |window| window.instructions;
    let [from, to]: [fn(&Window) -> u64; 2] = [|window| window.cycles[0], |window| window.cycles[1]];
    Measured {
        counted: windows.len(),
        compared: 0,
        instructions: [
            less(all(instructions).min().unwrap_or(0) as f64, call.instructions),
            mean(instructions, call.instructions),
            most(instructions, call.instructions),
        ],
        cycles: [mean(from, call.cycles[0]), mean(to, call.cycles[1])],
        most_cycles: [most(from, call.cycles[0]), most(to, call.cycles[1])],
        flash: None,
        stack_bound: None,
        stack: all(|window| window.stack).max().unwrap_or(0),
    }
}

fn run(
    image: &Path,
    expected: &Expected,
    setting: Setting<'_>,
    tell: [u32; 2],
) -> Result<emulation::Run, Trouble> {
    let data = image.with_extension("words");
    fs::write(&data, expected.memory(tell)).map_err(Trouble::io(data.display().to_string()))?;
    emulation::run(&expected.image, image, Setting { data: Some(&data), ..setting })
}

/// The first answer that is not this PC's, if there is one.
fn difference(image: &Path, expected: &Expected, setting: Setting<'_>) -> Result<Option<String>, Trouble> {
    let (wanted, logged) = (expected.digests(), run(image, expected, setting, [0, 0])?.log);
    if wanted == logged {
        return Ok(None);
    }
    let place = wanted.iter().zip(&logged).position(|(wanted, logged)| wanted != logged);
    let Some(place) = place else {
        return Ok(Some(format!("it logged {} digests, not {}: {logged:?}", logged.len(), wanted.len())));
    };
    let [first, end] = expected.block(place);
    let told = run(image, expected, setting, [first, end])?.log;
    for number in first..end {
        let pc = expected.told(number);
        if !told.contains(&pc) {
            let start = format!("answer {number}: ");
            let chip = told.iter().find(|line| line.starts_with(&start)).map_or("nothing", String::as_str);
            return Ok(Some(format!(
                "target {number} is the first that differs; the chip: {chip}; this PC: {pc}"
            )));
        }
    }
    Ok(Some(format!(
        "the digest differs in targets {first} to {end}, but no answer does: it logged {told:?}"
    )))
}
