//! `[leg_kind.NAME.servo.JOINT]`: one servo.

use super::limits;
use super::output::frame_us;
use super::robot::{Output, Servo, Turns};
use super::table::{Item, Table};
use super::vocabulary::SERVO;

/// Reads one servo. The output gives the frame in which its pulses must fit.
pub(super) fn read(item: &Item<'_>, output: Option<&Output>) -> Option<Servo> {
    let table = item.table(&SERVO)?;
    let centre = table.needed("centre_us");
    let centre_us = centre.as_ref().and_then(|i| i.within(&limits::PULSE_US));
    let joint_at_centre_deg =
        table.needed("joint_at_centre_deg").and_then(|item| item.within(&limits::JOINT_DEG));
    let us_per_degree = table.needed("us_per_degree").and_then(|item| item.within(&limits::US_PER_DEGREE));
    let turns = table
        .needed("turns")
        .and_then(|item| item.word(&[("with", Turns::With), ("against", Turns::Against)]));
    let pulses = table.needed("pulse_us");
    let pulse_us = pulses.as_ref().and_then(|i| i.range(&limits::PULSE_US));
    let dead_band_us =
        table.optional("dead_band_us").map_or(Some(0.0), |item| item.within(&limits::DEAD_BAND_US));
    let speed_s_per_60_deg = optional(&table, "speed_s_per_60_deg", &limits::SPEED_S);
    let stall_torque_n_mm = optional(&table, "stall_torque_n_mm", &limits::TORQUE_N_MM);

    let fits = match (&pulses, pulse_us, output) {
        (Some(pulses), Some([_, most]), Some(output)) => fits_the_frame(pulses, most, output),
        _ => true,
    };
    let safe = match (&centre, centre_us, pulse_us) {
        (Some(centre), Some(at), Some(safe)) => is_safe(centre, at, safe),
        _ => true,
    };
    if !(fits && safe) {
        return None;
    }
    Some(Servo {
        centre_us: centre_us?,
        joint_at_centre_deg: joint_at_centre_deg?,
        us_per_degree: us_per_degree?,
        turns: turns?,
        pulse_us: pulse_us?,
        dead_band_us: dead_band_us?,
        speed_s_per_60_deg: speed_s_per_60_deg?,
        stall_torque_n_mm: stall_torque_n_mm?,
    })
}

/// An optional number: `None` when it is there and wrong, `Some(None)` when it is absent.
fn optional(table: &Table<'_>, key: &str, bounds: &limits::Bounds) -> Option<Option<f64>> {
    match table.optional(key) {
        Some(item) => item.within(bounds).map(Some),
        None => Some(None),
    }
}

fn fits_the_frame(pulses: &Item<'_>, most: f64, output: &Output) -> bool {
    let frame = frame_us(output);
    let fits = most < frame;
    if !fits {
        pulses.complain(
            format!("a pulse of {most} us does not fit in the output's frame of {frame:.0} us"),
            "lower `output.frame_hz`, or the longest pulse",
        );
    }
    fits
}

fn is_safe(centre: &Item<'_>, at: f64, [least, most]: [f64; 2]) -> bool {
    let safe = (least..=most).contains(&at);
    if !safe {
        centre.complain(
            "must lie within the safe pulses of `pulse_us`",
            format!("from {least} to {most}, or widen `pulse_us` if the servo bears it"),
        );
    }
    safe
}
