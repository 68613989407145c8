//! One table per chip.

use comfy_table::{CellAlignment, Table, presets};

use crate::count::Cost;

/// The way that the first ratio is against.
const TEXTBOOK: &str = "textbook-libm";

pub fn table(costs: &[Cost]) -> Table {
    let mut table = Table::new();
    table.load_preset(presets::NOTHING);
    table.set_header([
        "contender",
        "to",
        "hip",
        "least",
        "mean",
        "most",
        "/textbook",
        "/best",
        "cycles",
        "flash",
        "stack",
        "bound",
        "joint off, rad",
        "foot off, mm",
        "of reach",
    ]);
    for column in table.column_iter_mut().skip(3) {
        column.set_cell_alignment(CellAlignment::Right);
    }
    for cost in costs {
        let ratio = |other: Option<&Cost>| match other {
            Some(other) => format!("{:.2}", cost.instructions.mean / other.instructions.mean),
            None => "-".into(),
        };
        table.add_row([
            cost.what.to_owned(),
            cost.to.to_owned(),
            cost.hip.to_owned(),
            format!("{:.0}", cost.instructions.least),
            format!("{:.1}", cost.instructions.mean),
            format!("{:.0}", cost.instructions.most),
            ratio(textbook(cost, costs)),
            ratio(best(cost, costs)),
            format!("{:.0}-{:.0}", cost.cycles[0], cost.cycles[1]),
            cost.flash.to_string(),
            cost.stack.to_string(),
            cost.stack_bound.map_or("-".into(), |bound| bound.to_string()),
            format!("{:.1e}", cost.largest_joint_error_rad),
            format!("{:.1e}", cost.largest_foot_error_mm),
            format!("{:.1e}", cost.largest_foot_error),
        ]);
    }
    table
}

/// The textbook form on libm, of the same leg.
fn textbook<'c>(cost: &Cost, costs: &'c [Cost]) -> Option<&'c Cost> {
    costs.iter().find(|other| other.hip == cost.hip && other.name.starts_with(TEXTBOOK))
}

/// ik-core's own with the fewest instructions to joint angles, of the same leg.
fn best<'c>(cost: &Cost, costs: &'c [Cost]) -> Option<&'c Cost> {
    costs
        .iter()
        .filter(|other| other.ours && other.hip == cost.hip && other.to == "joints")
        .min_by(|a, b| a.instructions.mean.total_cmp(&b.instructions.mean))
}
