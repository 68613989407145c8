//! A servo's fit as text.

use super::text::{align_right, plain_table};
use crate::trim::{Block, Fit};
use std::fmt::Write as _;

/// What readings say of a servo, as text for a terminal, with the lines for a sheet.
pub fn trimmed_text(fit: &Fit, block: &Block, source: &str) -> String {
    let mut out = String::new();
    let kept = fit.rows.iter().filter(|row| !row.left_out).count();
    let _ = writeln!(out, "{} readings ({source}), {kept} of them fitted", fit.rows.len());
    let [angle, angle_error] = fit.joint_at_centre_deg;
    let [gain, gain_error] = fit.us_per_degree;
    let _ = writeln!(
        out,
        "joint at {} us: {angle:.3} ± {angle_error:.3} degrees (standard error)\n\
         gain: {gain:.4} ± {gain_error:.4} us per degree; a longer pulse makes the angle {}\n\
         off the line: {:.3} degrees, off a curve: {:.3} degrees (standard deviations)",
        fit.centre_us,
        if fit.turns_with { "larger (turns = \"with\")" } else { "smaller (turns = \"against\")" },
        fit.line_deviation_deg,
        fit.curve_deviation_deg
    );
    let mut table = plain_table();
    table.set_header(["line", "pulse, us", "angle, deg", "off the line", "off the others' curve", ""]);
    align_right(&mut table, ..5);
    for row in &fit.rows {
        let said = match (row.misread, row.left_out) {
            (true, true) => "looks misread: left out",
            (true, false) => "looks misread: kept",
            _ => "",
        };
        table.add_row([
            row.line.to_string(),
            format!("{:.1}", row.pulse_us),
            format!("{:.2}", row.angle_deg),
            format!("{:+.3}", row.off_line_deg),
            format!("{:+.3}", row.off_curve_deg),
            said.into(),
        ]);
    }
    let _ = writeln!(out, "{table}");
    for row in fit.rows.iter().filter(|row| row.misread) {
        let _ = writeln!(
            out,
            "line {} looks misread: {:+.2} degrees off the curve that the others make. Read it again; --keep-all counts it.",
            row.line, row.off_curve_deg
        );
    }
    match &fit.backlash {
        Some(backlash) if backlash.is_real => {
            let _ = writeln!(
                out,
                "backlash: {:.2} ± {:.2} degrees between coming up and coming down: the foot is half of it off; points lie in the middle",
                backlash.gap_deg, backlash.error_deg
            );
        }
        Some(backlash) => {
            let _ = writeln!(
                out,
                "backlash: none that the readings could tell ({:.2} ± {:.2} degrees)",
                backlash.gap_deg, backlash.error_deg
            );
        }
        None => {
            let _ = writeln!(
                out,
                "backlash: not known; two readings from either side, marked up and down in a column approach, would tell"
            );
        }
    }
    let _ = writeln!(
        out,
        "bend: up to {:.2} degrees off the line (by chance: {}); measured points are {}worth it",
        fit.bend_deg,
        if fit.bend_by_chance < 1e-4 {
            "less than 1 in 10 000".into()
        } else {
            format!("{:.4}", fit.bend_by_chance)
        },
        if fit.points_are_worth_it { "" } else { "not " }
    );
    let _ = writeln!(out, "\nFor the servo in a sheet:\n\n{}", block.lines());
    out
}
