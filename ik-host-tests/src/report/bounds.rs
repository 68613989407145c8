//! Bounds, stated and found, as text.

use super::number::count;
use super::text::{align_right, plain_table};
use crate::bounds::{Judged, LegBound, NEARNESS, Place, Verdict};
use crate::sheet::NumberSystem;
use comfy_table::Table;
use std::fmt::Write as _;

/// What was found of every primitive and leg, and what is stated, as text for a terminal.
pub fn bounds_text(judged: &Judged) -> String {
    let mut out = format!(
        "Largest errors over {} random arguments per primitive (seed {}), and the bounds that are stated of them:\n",
        count(u64::from(judged.rounds)),
        judged.seed
    );
    for number in NumberSystem::ALL {
        let mut table = table([number.name(), "counted in", "found", "bound", ""]);
        for row in judged.primitives.iter().filter(|row| row.number == number) {
            let [what, counted] = row.found.quantity.words();
            table.add_row([
                what.into(),
                counted.into(),
                format!("{:.2e}", row.found.largest),
                format!("{:.2e}", row.bound),
                row.verdict.word().to_owned(),
            ]);
        }
        let _ = writeln!(out, "{table}\n");
    }
    out += "Whole legs, their joints free, over as many poses each. Joints: with the knee from 0.1 to 2.6 rad and the foot \
            a fifth\nof the reach clear of the hip's axis. Found, of bound:\n";
    let mut legs =
        table(["leg", "number system", "joint, rad", "knee nearer to an end, rad", "foot, of the reach", ""]);
    for leg in &judged.legs {
        let cell = |found: f64, bound: fn(&LegBound) -> f64| match &leg.bound {
            Some(stated) => format!("{found:.1e} of {:.1e}", bound(stated)),
            None => format!("{found:.1e}"),
        };
        legs.add_row([
            format!("{}, {}", leg.found.robot, leg.found.shape),
            leg.found.number.into(),
            cell(leg.found.joint_rad, |bound| bound.joint_rad),
            cell(leg.found.near_an_end_rad, |bound| bound.near_an_end_rad),
            cell(leg.found.foot_of_reach, |bound| bound.foot_of_reach),
            leg.verdict.map_or("the method itself", Verdict::word).into(),
        ]);
    }
    let _ = writeln!(out, "{legs}");
    out += "\nNear the places where a leg is singular (largest over a twentieth as many poses at each distance):\n";
    for place in Place::ALL {
        let [distance, joint] = place.words();
        let heads = ["leg", "number system", distance].into_iter().map(str::to_owned);
        let mut table = plain_table();
        table.set_header(heads.chain(NEARNESS.map(|nearness| format!("{nearness:.0e}"))));
        for found in judged.near_singular_places.iter().filter(|found| found.place == place) {
            for (what, errors) in [
                (format!("{joint}, rad"), found.joint_rad),
                ("foot, of the reach".into(), found.foot_of_reach),
            ] {
                let cells = [found.shape.to_owned(), found.number.to_owned(), what];
                table.add_row(cells.into_iter().chain(errors.map(|error| format!("{error:.1e}"))));
            }
        }
        let _ = writeln!(out, "{table}");
    }
    out
}

fn table<const COLUMNS: usize>(heads: [&str; COLUMNS]) -> Table {
    let mut table = plain_table();
    table.set_header(heads);
    align_right(&mut table, 2..);
    table
}
