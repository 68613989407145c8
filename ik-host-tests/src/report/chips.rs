//! What the legs cost on the chips, as text.

use super::number::{count, significant};
use super::text::align_right;
use crate::chips::{Chips, Found, KindOnChips, Measured, Row, Times};
use comfy_table::presets::NOTHING;
use comfy_table::{ContentArrangement, Table};
use std::fmt::Write as _;

/// What the legs of a robot cost on the chips, as text for a terminal.
pub fn chips_text(chips: &Chips, source: &str) -> String {
    let mut out = String::new();
    let _ = writeln!(out, "{} ({source}): what a leg costs on a chip", chips.name);
    for kind in &chips.kinds {
        let _ = write!(out, "\n{}", of_kind(chips, kind));
    }
    for left_out in &chips.left_out {
        let _ = writeln!(out, "{}: not measured: {}", left_out.class, left_out.why);
    }
    for line in what_it_is_worth() {
        let _ = writeln!(out, "{line}");
    }
    for source in cycle_sources(chips) {
        let _ = writeln!(out, "  {source}");
    }
    out
}

fn of_kind(chips: &Chips, kind: &KindOnChips) -> String {
    let mut out = String::new();
    let compared = kind.rows.iter().find_map(|row| match &row.found {
        Found::Measured(measured) => Some((measured.counted, measured.compared)),
        _ => None,
    });
    let legs = if kind.legs == 1 { "1 leg".to_owned() } else { format!("{} legs", kind.legs) };
    let _ = write!(out, "leg \"{}\" ({legs}), measured with {:?}", kind.kind, kind.leg);
    if let Some((counted, compared)) = compared {
        let (counted, compared) = (count(counted as u64), count(compared as u64));
        let _ = write!(out, ": counted on {counted} targets, answers compared with this PC's on {compared}");
    }
    let _ = writeln!(out, "\n{}", table(chips, kind));
    for (rows, why) in reasons(kind) {
        let _ = writeln!(out, "{}: {why}", rows.join("; "));
    }
    out
}

/// Why rows have no figures, each reason once.
pub(super) fn reasons(kind: &KindOnChips) -> Vec<(Vec<String>, &str)> {
    let mut reasons: Vec<(Vec<String>, &str)> = Vec::new();
    for row in &kind.rows {
        let (Found::Refused { why } | Found::Differs { why } | Found::NotMeasured { why }) = &row.found
        else {
            continue;
        };
        let which = format!("{}, {}", row.class, row.number);
        match reasons.iter_mut().find(|(_, known)| known == why) {
            Some((rows, _)) => rows.push(which),
            None => reasons.push((vec![which], why)),
        }
    }
    reasons
}

fn table(chips: &Chips, kind: &KindOnChips) -> Table {
    let mut table = Table::new();
    table.load_style(NOTHING).set_content_arrangement(ContentArrangement::Disabled);
    table.set_header([
        "chip".to_owned(),
        "number system".to_owned(),
        "instructions\nleast".to_owned(),
        "\nmean".to_owned(),
        "\nmost".to_owned(),
        "cycles, estimated\nmean".to_owned(),
        "clock\nMHz".to_owned(),
        "one leg, us\nmean".to_owned(),
        "\nmost".to_owned(),
        format!("{} legs at most\n% of {} ms", kind.legs, significant(1e3 / chips.frame_hz)),
        "flash\nbytes".to_owned(),
        "stack, bytes\ndeepest".to_owned(),
        "\nbound".to_owned(),
        "bits".to_owned(),
    ]);
    for row in &kind.rows {
        table.add_row(cells(row));
    }
    align_right(&mut table, 2..13);
    table
}

/// The cells of a row; the figures are dashes where there are none.
pub(super) fn cells(row: &Row) -> [String; 14] {
    let clock = significant(row.clock_hz / 1e6);
    let number = if row.firmware { row.number.clone() } else { format!("({})", row.number) };
    let word = match &row.found {
        Found::Measured(measured) => return measured_cells(row, measured, number, clock),
        Found::Refused { .. } => "refused",
        Found::Differs { .. } => "DIFFER",
        Found::NotMeasured { .. } => "not measured",
    };
    let mut cells = std::array::from_fn(|_| "-".to_owned());
    (cells[0], cells[1], cells[6], cells[13]) = (row.class.clone(), number, clock, word.to_owned());
    cells
}

fn measured_cells(row: &Row, measured: &Measured, number: String, clock: String) -> [String; 14] {
    let [least, mean, most] = measured.instructions;
    let range = |[from, to]: [f64; 2], show: fn(f64) -> String| {
        let (from, to) = (show(from), show(to));
        if from == to { from } else { format!("{from}-{to}") }
    };
    let whole = |number: f64| format!("{number:.0}");
    let times =
        |of: fn(&Times) -> [f64; 2]| row.times.as_ref().map_or("-".into(), |t| range(of(t), significant));
    [
        row.class.clone(),
        number,
        whole(least),
        whole(mean),
        whole(most),
        range(measured.cycles, whole),
        clock,
        times(|times| times.leg_us),
        times(|times| times.most_leg_us),
        times(|times| times.frame_percent),
        measured.flash.map_or("-".into(), |flash| flash.to_string()),
        measured.stack.to_string(),
        measured.stack_bound.map_or("-".into(), |bound| bound.to_string()),
        "the PC's".to_owned(),
    ]
}

/// What is counted, what is estimated, and what is not known.
pub(super) fn what_it_is_worth() -> [&'static str; 4] {
    [
        "Counted exactly in the emulator QEMU, from a foot on the body's frame to three counts: instructions and stack \
         (least, most and deepest over edges too, mean over the work volume). The stack's bound is worked out from the linked \
         code and holds for every input. Number systems in brackets are not the firmware's.",
        "Flash: code, constants and tables of a linked image with a timer, less one without a solver; the same compiler \
         settings (opt-level 3, fat LTO).",
        "Estimated: cycles, and so times, from published tables with zero wait states. NO SILICON WAS MEASURED; flash with \
         wait states, caches and interrupts add to them.",
        "Cycles after:",
    ]
}

/// Where the cycles of each class come from.
pub(super) fn cycle_sources(chips: &Chips) -> Vec<String> {
    let mut sources: Vec<String> = Vec::new();
    for row in chips.kinds.iter().flat_map(|kind| &kind.rows) {
        let source = format!("{}: {}", row.class, row.cycles_from);
        if !sources.contains(&source) {
            sources.push(source);
        }
    }
    sources
}
