//! One solved target as text.

use super::number::{foot, millimetres};
use super::text::align_right;
use crate::solve::{Answer, PoseAnswer, Solved};
use comfy_table::Table;
use std::fmt::Write as _;

/// One solved target as text for a terminal.
pub fn solved_text(solved: &Solved, source: &str) -> String {
    let mut out = String::new();
    let _ = writeln!(out, "{}, leg \"{}\" ({source})", solved.robot, solved.leg);
    let _ = writeln!(
        out,
        "foot {} mm in the leg's frame{}",
        foot(solved.foot_mm),
        if solved.asked_on_body { ", asked in the body's" } else { "" }
    );
    match solved.reference {
        Some(reference) => {
            let joints = named(solved, reference.joints_deg.map(|deg| format!("{deg:.5}")));
            let reach = if reference.reached {
                "reached".to_owned()
            } else {
                format!("{} mm off, with reach and joint ranges kept", millimetres(reference.off_by_mm))
            };
            let _ = writeln!(out, "reference: {joints} deg; {reach}");
        }
        None => {
            let _ = writeln!(out, "reference: none, for the foot is nowhere");
        }
    }
    let _ = writeln!(out, "{}", table(solved));
    if solved.parallelogram {
        let _ = writeln!(
            out,
            "the knee is driven through a parallelogram: the pulse of its servo is the shank's"
        );
    }
    for answer in &solved.answers {
        let used = if answer.firmware { " (the firmware's)" } else { "" };
        let _ = writeln!(out, "{}{used}: {}", answer.number, answer.outcome);
    }
    out
}

fn named(solved: &Solved, values: [String; 3]) -> String {
    solved
        .joints
        .iter()
        .zip(values)
        .map(|(joint, value)| format!("{joint} {value}"))
        .collect::<Vec<_>>()
        .join(", ")
}

type Row = (&'static str, fn(&PoseAnswer, usize) -> String);

/// A row per quantity and joint, a column per number system.
fn table(solved: &Solved) -> Table {
    let mut table = super::text::plain_table();
    let mut header = vec![String::new()];
    header.extend(solved.answers.iter().map(|answer| answer.number.to_owned()));
    table.set_header(header);
    let joint_rows: [Row; 3] = [
        ("deg", |pose, joint| format!("{:.5}", pose.joints_deg[joint])),
        ("us", |pose, joint| format!("{:.4}", pose.pulses_us[joint])),
        (solved.unit, |pose, joint| pose.counts[joint].to_string()),
    ];
    for (unit, value) in joint_rows {
        for (joint, name) in solved.joints.iter().enumerate() {
            row(&mut table, solved, format!("{name}, {unit}"), |pose| value(pose, joint));
        }
    }
    row(&mut table, solved, "arithmetic error, mm".into(), |pose| millimetres(pose.arithmetic_mm));
    row(&mut table, solved, "pulse error, mm".into(), |pose| pose.pulse_mm.map_or("-".into(), millimetres));
    row(&mut table, solved, "off by, as it says, mm".into(), |pose| millimetres(pose.off_by_mm));
    row(&mut table, solved, "foot off as commanded, mm".into(), |pose| millimetres(pose.foot_off_mm));
    align_right(&mut table, 1..);
    table
}

fn row(table: &mut Table, solved: &Solved, name: String, value: impl Fn(&PoseAnswer) -> String) {
    let cell = |answer: &Answer| answer.pose.as_ref().map_or_else(|| "-".into(), &value);
    let mut cells = vec![name];
    cells.extend(solved.answers.iter().map(cell));
    table.add_row(cells);
}
