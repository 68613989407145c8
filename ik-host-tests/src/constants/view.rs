//! What the template sees: everything already written out as Rust.

use super::names::{Names, one_line};
use super::{Origin, lengths};
use crate::certify::{Certificate, Certified, NOT_COVERED};
use crate::machine::{self, Counter, Refused, legs_of};
use crate::report::millimetres;
use crate::sheet::{
    Bend, HipShape, KneeDrive, LegKind, LegMount, NumberSystem, Output, Robot, Servo, ServoCurve, Side, Turns,
};
use crate::survey::{KindFindings, Survey, Verdict};
use serde::Serialize;

#[derive(Debug, Serialize)]
pub(super) struct View {
    robot: String,
    sheet: String,
    sha256: String,
    command: String,
    toehold: &'static str,
    number: &'static str,
    number_type: &'static str,
    fixed_type: Option<&'static str>,
    fixed_bits: &'static str,
    targets: u64,
    seed: u64,
    found: Vec<Found>,
    certified: bool,
    not_covered: &'static str,
    beyond: bool,
    imports: String,
    output_type: &'static str,
    output: String,
    output_summary: String,
    kinds: Vec<Kind>,
}

/// A row of the header's table.
#[derive(Debug, Serialize)]
struct Found {
    kind: String,
    what: &'static str,
    found: String,
    /// None unless the survey certified.
    certified: Option<String>,
    allowed: String,
    verdict: &'static str,
}

#[derive(Debug, Serialize)]
struct Kind {
    /// Its name in the sheet, in quotes.
    name: String,
    module: String,
    hip_type: &'static str,
    measures: String,
    bend: &'static str,
    range_deg: String,
    parallelogram: bool,
    joints: String,
    bends: usize,
    legs: Vec<Leg>,
    names: String,
    /// In counts: range, start, slew; none unless every servo has them.
    bounds: Option<Vec<String>>,
}

#[derive(Debug, Serialize)]
struct Leg {
    name: String,
    constant: String,
    at_mm: String,
    at: String,
    side: &'static str,
    curves: Vec<String>,
}

pub(super) fn of(
    robot: &Robot,
    number: NumberSystem,
    survey: &Survey,
    origin: &Origin,
) -> Result<View, Refused> {
    let mut modules = Names::default();
    let kinds = (0..robot.kinds.len())
        .map(|kind| {
            let module = modules.constant(&robot.kinds[kind].name, "").to_lowercase();
            kind_view(robot, kind, number, format!("{module}_legs"))
        })
        .collect::<Result<Vec<_>, _>>()?;
    let (output_type, output) = output(robot)?;
    let number_type = match number {
        NumberSystem::Float32 => "Float32",
        NumberSystem::Coarse => "Coarse",
        NumberSystem::Fixed32 => "Fixed32",
        NumberSystem::Short32 => "Short32",
        NumberSystem::Fixed16 => "Fixed16",
    };
    Ok(View {
        robot: format!("{:?}", robot.name),
        sheet: one_line(&origin.sheet),
        sha256: one_line(&origin.sha256),
        command: one_line(&origin.command),
        toehold: survey.toehold,
        number: number.name(),
        number_type,
        fixed_type: lengths::fixed_type(number),
        fixed_bits: if number == NumberSystem::Fixed16 { "i16" } else { "i32" },
        targets: survey.targets,
        seed: survey.seed,
        found: survey.kinds.iter().flat_map(|kind| found(robot, number, kind)).collect(),
        certified: survey.kinds.iter().flat_map(|kind| &kind.numbers).any(|found| found.certified.is_some()),
        not_covered: NOT_COVERED,
        beyond: survey.verdict == Verdict::Beyond,
        imports: imports(robot, number_type, output_type, &kinds),
        output_type,
        output,
        output_summary: survey.output.summary.clone(),
        kinds,
    })
}

/// What the module needs of ik-core, in the order of the alphabet.
fn imports(robot: &Robot, number_type: &str, output_type: &str, kinds: &[Kind]) -> String {
    let mut names = vec![
        "Bend",
        "Channel",
        "Curve",
        "Dimensions",
        "Foot",
        "Leg",
        "Limb",
        "Limits",
        "Mounting",
        "Side",
        number_type,
        output_type,
    ];
    names.extend(kinds.iter().map(|kind| kind.hip_type));
    let curves = || robot.kinds.iter().flat_map(|kind| &kind.servos).map(|servo| &servo.curve);
    if curves().any(|curve| matches!(curve, ServoCurve::Straight { .. })) {
        names.extend(["ServoSpec", "Turns"]);
    }
    if curves().any(|curve| matches!(curve, ServoCurve::Measured { .. })) {
        names.push("MeasuredServo");
    }
    if kinds.iter().any(|kind| kind.parallelogram) {
        names.push("Parallelogram");
    }
    if kinds.iter().any(|kind| kind.bounds.is_some()) {
        names.push("ServoBounds");
    }
    names.sort_unstable();
    names.dedup();
    names.join(", ")
}

fn found(robot: &Robot, number: NumberSystem, kind: &KindFindings) -> Vec<Found> {
    let allowed = &robot.allowed;
    kind.numbers
        .iter()
        .filter(|found| found.number == number.name())
        .flat_map(|found| {
            let bound = found.certified.as_ref().map(Certified::bound);
            let certified = |mm: fn(&Certificate) -> f64| {
                bound.map(|bound| bound.map_or_else(|| "nothing".into(), |bound| at_least(mm(bound))))
            };
            let row = |what, found, certified, allowed, verdict: Verdict| Found {
                kind: format!("{:?}", kind.kind),
                what,
                found,
                certified,
                allowed,
                verdict: verdict.word(),
            };
            let mm = |mm: f64| format!("{} mm", millimetres(mm));
            let (arithmetic, together) = (found.arithmetic.largest.mm, found.together.largest.mm);
            [
                row(
                    "arithmetic",
                    mm(arithmetic),
                    certified(|bound| bound.arithmetic.mm),
                    format!("{} mm", allowed.arithmetic_mm),
                    found.arithmetic_verdict,
                ),
                row(
                    "with the pulse",
                    mm(together),
                    certified(|bound| bound.together.mm),
                    format!("{} mm", allowed.with_pulse_mm),
                    found.together_verdict,
                ),
                row(
                    "work volume unreached",
                    format!("{:.2} %", found.outcomes.unreached_percent),
                    None,
                    format!("{} %", allowed.unreached_percent),
                    found.unreached_verdict,
                ),
            ]
        })
        .collect()
}

/// A certified bound in mm, two digits, rounded up: what is written must be certified too.
fn at_least(mm: f64) -> String {
    let rounded = format!("{mm:.1e}");
    match rounded.parse::<f64>() {
        Ok(shown) if shown >= mm => format!("{rounded} mm"),
        _ => format!("{:.1e} mm", mm * 1.05),
    }
}

/// The output with the divider that was found for it.
fn output(robot: &Robot) -> Result<(&'static str, String), Refused> {
    let counter = Counter::of_kind(robot, 0)?;
    Ok(match (counter, &robot.output) {
        (Counter::Timer(timer), Output::Timer { clock_hz, counter_bits, frame_hz, .. }) => {
            ("Timer", format!("Timer::new({clock_hz}, {}, {counter_bits}, {frame_hz:?})", timer.divider()))
        }
        (Counter::Expander(expander), Output::Expander { oscillator_hz, resolution_bits, .. }) => {
            ("Expander", format!("Expander::new({oscillator_hz}, {}, {resolution_bits})", expander.divider()))
        }
        _ => unreachable!("a counter is of its output's kind"),
    })
}

fn kind_view(robot: &Robot, kind: usize, number: NumberSystem, module: String) -> Result<Kind, Refused> {
    let sheet = &robot.kinds[kind];
    let (hip_type, shape) = match sheet.hip {
        HipShape::Roll => ("RollHip", "roll_hip"),
        HipShape::Yaw => ("YawHip", "yaw_hip"),
    };
    let bend = match sheet.bend {
        Bend::Forward => "Bend::Forward",
        Bend::Backward => "Bend::Backward",
        Bend::Up => "Bend::Up",
        Bend::Down => "Bend::Down",
    };
    let [hip, thigh, knee] = sheet.range_deg;
    // Of the constants themselves, and of what the module above them has.
    let mut constants = Names::without(&["LEG", "LIMITS", "ALL", "NAMES", "BOUNDS", "OUTPUT"]);
    let legs = legs_of(robot, kind)
        .map(|leg| leg_view(sheet, &robot.legs[leg], number, &mut constants))
        .collect::<Result<Vec<_>, _>>()?;
    let names: Vec<_> = legs.iter().map(|leg| leg.name.clone()).collect();
    Ok(Kind {
        name: format!("{:?}", sheet.name),
        module,
        hip_type,
        measures: format!(
            "Dimensions::{shape}({:?}, {:?}, {:?}, {bend})",
            sheet.offset_mm, sheet.thigh_mm, sheet.shank_mm
        ),
        bend,
        range_deg: format!("{hip:?}, {thigh:?}, {knee:?}"),
        parallelogram: sheet.knee_drive == KneeDrive::Parallelogram,
        joints: sheet.joint_names().join(", "),
        bends: sheet.servos.iter().map(|servo| bends(&servo.curve)).max().unwrap_or(0),
        names: names.join(", "),
        bounds: bounds(robot, kind)?,
        legs,
    })
}

const fn bends(curve: &ServoCurve) -> usize {
    match curve {
        ServoCurve::Straight { .. } => 0,
        ServoCurve::Measured { measured } => measured.len().saturating_sub(2),
    }
}

/// The bounds of every servo of a kind, leg by leg, or none.
fn bounds(robot: &Robot, kind: usize) -> Result<Option<Vec<String>>, Refused> {
    let mut written = Vec::new();
    for leg in legs_of(robot, kind) {
        for bounds in machine::servo_bounds(robot, leg)? {
            let Some(bounds) = bounds else { return Ok(None) };
            written.push(format!("{:?}, {}, {}", bounds.range(), bounds.start(), bounds.slew()));
        }
    }
    Ok(Some(written))
}

fn leg_view(
    kind: &LegKind,
    mount: &LegMount,
    number: NumberSystem,
    constants: &mut Names,
) -> Result<Leg, Refused> {
    let at = lengths::expressions(number, mount.at_mm).ok_or_else(|| Refused {
        kind: kind.name.clone(),
        what: format!("leg {:?}: at_mm", mount.name),
        why: format!("{} cannot hold {:?}", number.name(), mount.at_mm),
    })?;
    Ok(Leg {
        name: format!("{:?}", mount.name),
        constant: constants.constant(&mount.name, "_CURVES"),
        at_mm: format!("{:?}", mount.at_mm),
        at: at.join(", "),
        side: match mount.side {
            Side::Left => "Side::Left",
            Side::Right => "Side::Right",
        },
        curves: kind.servos.iter().zip(mount.trim_us).map(|(servo, trim_us)| curve(servo, trim_us)).collect(),
    })
}

fn curve(servo: &Servo, trim_us: f64) -> String {
    let pulse_us = servo.pulse_us;
    match &servo.curve {
        ServoCurve::Straight { centre_us, joint_at_centre_deg, us_per_degree, turns } => {
            let turns = match turns {
                Turns::With => "Turns::With",
                Turns::Against => "Turns::Against",
            };
            format!(
                "ServoSpec {{ centre_us: {centre_us:?}, joint_at_centre_deg: {joint_at_centre_deg:?}, \
                 us_per_degree: {us_per_degree:?}, turns: {turns}, trim_us: {trim_us:?}, pulse_us: {pulse_us:?} }}"
            )
        }
        ServoCurve::Measured { measured } => {
            format!("MeasuredServo {{ points: &{measured:?}, trim_us: {trim_us:?}, pulse_us: {pulse_us:?} }}")
        }
    }
}
