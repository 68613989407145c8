//! A survey as text.

use super::number::{count, foot, millimetres, significant};
use crate::certify::{Certificate, Certified, Ended, NOT_COVERED, Proved};
use crate::survey::{KindFindings, NumberFindings, Survey, Verdict};
use comfy_table::presets::UTF8_HORIZONTAL_ONLY;
use comfy_table::{CellAlignment, ContentArrangement, Table};
use std::fmt::Write as _;
use std::ops::RangeBounds;

/// A survey as text for a terminal.
pub fn text(survey: &Survey, source: &str) -> String {
    let mut out = String::new();
    let _ = writeln!(out, "{} ({source})", survey.robot.name);
    let _ = writeln!(out, "{}", survey.output.summary);
    for kind in &survey.kinds {
        let _ = write!(out, "\n{}", of_kind(survey, kind));
    }
    let allowed = &survey.robot.allowed;
    let firmware: Vec<_> = survey.robot.firmware.numbers.iter().map(|number| number.name()).collect();
    let _ = writeln!(
        out,
        "\nThe sheet allows {} mm from arithmetic, {} mm with the pulse, {} % unreached; \
         its firmware uses {}: {}.",
        millimetres(allowed.arithmetic_mm),
        millimetres(allowed.with_pulse_mm),
        allowed.unreached_percent,
        firmware.join(", "),
        survey.verdict.word()
    );
    out
}

fn of_kind(survey: &Survey, kind: &KindFindings) -> String {
    let mut out = String::new();
    let targets = &kind.targets;
    let _ = writeln!(
        out,
        "{} leg \"{}\" ({}): {} targets, {} on edges, {} on a grid, {} random (seed {})",
        kind.shape,
        kind.kind,
        if kind.legs.len() == 1 { "1 leg".into() } else { format!("{} legs", kind.legs.len()) },
        count(survey.targets),
        count(targets.edges),
        count(targets.grid),
        count(targets.random),
        survey.seed
    );
    let _ = writeln!(out, "{}", errors(kind));
    if kind.numbers.iter().any(|number| number.certified.is_some()) {
        out.push_str(&certified(kind));
    }
    for number in kind.numbers.iter().filter(|number| number.firmware) {
        out.push_str(&places(kind, number));
    }
    let _ = writeln!(
        out,
        "references: f64 and 256 bits agree on {} targets within {} rad, {} mm",
        kind.references.targets,
        significant(kind.references.largest_angle_rad),
        significant(kind.references.largest_foot_mm)
    );
    out
}

/// Numbers stand at the right of their columns.
pub(super) fn align_right(table: &mut Table, columns: impl RangeBounds<usize>) {
    for (number, column) in table.column_iter_mut().enumerate() {
        if columns.contains(&number) {
            column.set_cell_alignment(CellAlignment::Right);
        }
    }
}

/// A table with lines between the rows only, as wide as it wants to be.
pub(super) fn plain_table() -> Table {
    let mut table = Table::new();
    table.load_style(UTF8_HORIZONTAL_ONLY).set_content_arrangement(ContentArrangement::Disabled);
    table
}

/// Foot errors in mm, joint error in degrees.
fn errors(kind: &KindFindings) -> Table {
    let mut table = plain_table();
    table.set_header([
        "foot error, mm",
        "arithmetic\nlargest",
        "\np99",
        "\nmean",
        "pulse\nlargest",
        "\np99",
        "\nmean",
        "together\nlargest",
        "\np99",
        "\nmean",
        "joint, deg\nlargest",
        "the sheet\nallows it",
    ]);
    for number in &kind.numbers {
        let mut row = vec![number.number.to_owned()];
        for errors in [&number.arithmetic, &number.pulse, &number.together] {
            row.extend([errors.largest.mm, errors.p99_mm, errors.mean_mm].map(millimetres));
        }
        row.push(number.joint.map_or_else(|| "-".into(), |joint| significant(joint.deg)));
        row.push(verdict(number));
        table.add_row(row);
    }
    align_right(&mut table, 1..11);
    table
}

/// What no target of the work volume exceeds, mm, and how many times the largest found that is.
fn certified(kind: &KindFindings) -> String {
    let mut table = plain_table();
    table.set_header([
        "certified, mm: no target\nof the work volume exceeds",
        "arithmetic\n",
        "\ntimes found",
        "together\n",
        "\ntimes found",
        "boxes\n",
    ]);
    let mut remarks = String::new();
    for number in &kind.numbers {
        match &number.certified {
            Some(Certified::Bound(Certificate { arithmetic, together })) => {
                let times = |proved: &Proved, found: f64| significant(proved.mm / found);
                table.add_row([
                    number.number.to_owned(),
                    millimetres(arithmetic.mm),
                    times(arithmetic, number.arithmetic.largest.mm),
                    millimetres(together.mm),
                    times(together, number.together.largest.mm),
                    count(arithmetic.boxes + together.boxes),
                ]);
                for (what, proved) in [("arithmetic", arithmetic), ("together", together)] {
                    if proved.ended != Ended::Narrow {
                        let _ = writeln!(remarks, "  {}, {what}: {}", number.number, proved.ended.words());
                    }
                }
            }
            Some(Certified::Nothing { why }) => {
                let _ = writeln!(remarks, "  {} is not certified: {why}", number.number);
            }
            None => {}
        }
    }
    align_right(&mut table, 1..);
    format!("{table}\n{remarks}  not covered: {NOT_COVERED}\n")
}

/// What of a number system is beyond, if anything; in brackets if the firmware does not use it.
fn verdict(number: &NumberFindings) -> String {
    let beyond: Vec<_> = [
        ("arithmetic", number.arithmetic_verdict),
        ("with pulse", number.together_verdict),
        ("unreached", number.unreached_verdict),
    ]
    .into_iter()
    .filter(|(_, verdict)| *verdict == Verdict::Beyond)
    .map(|(what, _)| what)
    .collect();
    let word = if beyond.is_empty() { "yes".into() } else { format!("no: {}", beyond.join(", ")) };
    if number.firmware { word } else { format!("({word})") }
}

/// Where the largest errors of a number system sit, and what was done with the targets.
fn places(kind: &KindFindings, number: &NumberFindings) -> String {
    let mut out = String::new();
    let _ = writeln!(out, "{}, largest errors at foot (x, y, z) in the leg's frame, mm:", number.number);
    for (name, errors) in
        [("arithmetic", &number.arithmetic), ("pulse", &number.pulse), ("together", &number.together)]
    {
        let at = foot(errors.largest.foot_mm);
        let _ = writeln!(out, "  {name:<11}{:>9} mm  {at}", millimetres(errors.largest.mm));
    }
    if let Some(joint) = number.joint {
        let _ =
            writeln!(out, "  {:<11}{:>9} deg {}", joint.joint, significant(joint.deg), foot(joint.foot_mm));
    }
    let outcomes = &number.outcomes;
    let _ = writeln!(
        out,
        "  of the targets {} were reached, {} moved into reach, {} held by a joint range, {} held by a pulse \
         range;\n  {:.2} % of the work volume is unreached; clamping puts a foot up to {} mm off, at {}",
        count(outcomes.reached),
        count(outcomes.moved),
        count(outcomes.held),
        count(outcomes.pulse_held),
        outcomes.unreached_percent,
        millimetres(outcomes.clamping.mm),
        foot(outcomes.clamping.foot_mm)
    );
    if outcomes.pulse_held > 0 {
        let _ = writeln!(
            out,
            "  pulses are held: some joint range of \"{}\" needs pulses beyond its servo's pulse_us",
            kind.kind
        );
    }
    out
}
