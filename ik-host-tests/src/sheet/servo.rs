//! `[leg_kind.NAME.servo.JOINT]`: one servo.

use super::limits;
use super::output::{count_us, frame_us};
use super::robot::{Output, Servo, ServoCurve, Turns};
use super::table::{Item, Table};
use super::vocabulary::{MEASURED_SERVO, STRAIGHT_SERVO};

/// Reads one servo. The output gives the frame in which its pulses must fit.
pub(super) fn read(item: &Item<'_>, output: Option<&Output>) -> Option<Servo> {
    // Whether it is measured decides which keys are right.
    let is_measured = item.peek().is_some_and(|entries| entries.contains_key("measured"));
    let table = item.table(if is_measured { &MEASURED_SERVO } else { &STRAIGHT_SERVO })?;
    let pulses = table.needed("pulse_us");
    let pulse_us = pulses.as_ref().and_then(|i| i.range(&limits::PULSE_US));
    let curve = if is_measured { measured(&table, pulse_us) } else { straight(&table, pulse_us) };
    let dead_band_us =
        table.optional("dead_band_us").map_or(Some(0.0), |item| item.within(&limits::DEAD_BAND_US));
    let speed_s_per_60_deg = optional(&table, "speed_s_per_60_deg", &limits::SPEED_S);
    let stall_torque_n_mm = optional(&table, "stall_torque_n_mm", &limits::TORQUE_N_MM);

    let slew_us_per_frame = slew(&table, output);
    let start_us = start(&table, pulse_us);

    let fits = match (&pulses, pulse_us, output) {
        (Some(pulses), Some([_, most]), Some(output)) => fits_the_frame(pulses, most, output),
        _ => true,
    };
    if !fits {
        return None;
    }
    Some(Servo {
        curve: curve?,
        pulse_us: pulse_us?,
        dead_band_us: dead_band_us?,
        speed_s_per_60_deg: speed_s_per_60_deg?,
        stall_torque_n_mm: stall_torque_n_mm?,
        slew_us_per_frame: slew_us_per_frame?,
        start_us: start_us?,
    })
}

/// Centre and gain.
fn straight(table: &Table<'_>, pulse_us: Option<[f64; 2]>) -> Option<ServoCurve> {
    let centre = table.needed("centre_us");
    let centre_us = centre.as_ref().and_then(|i| i.within(&limits::PULSE_US));
    let joint_at_centre_deg =
        table.needed("joint_at_centre_deg").and_then(|item| item.within(&limits::JOINT_DEG));
    let us_per_degree = table.needed("us_per_degree").and_then(|item| item.within(&limits::US_PER_DEGREE));
    let turns = table
        .needed("turns")
        .and_then(|item| item.word(&[("with", Turns::With), ("against", Turns::Against)]));
    let safe = match (&centre, centre_us, pulse_us) {
        (Some(centre), Some(at), Some(safe)) => is_safe(centre, at, safe),
        _ => true,
    };
    let curve = ServoCurve::Straight {
        centre_us: centre_us?,
        joint_at_centre_deg: joint_at_centre_deg?,
        us_per_degree: us_per_degree?,
        turns: turns?,
    };
    safe.then_some(curve)
}

/// Measured points.
fn measured(table: &Table<'_>, pulse_us: Option<[f64; 2]>) -> Option<ServoCurve> {
    let list = table.needed("measured")?;
    let items = list.numbered_list()?;
    if !limits::MEASURED_POINTS.hold(items.len() as f64) {
        let (bounds, because) = (&limits::MEASURED_POINTS, limits::MEASURED_POINTS.because);
        list.complain(format!("must hold {bounds}, not {}", items.len()), because);
        return None;
    }
    // Every point is looked at, so that each wrong one is named.
    let points: Vec<_> = items.iter().map(|item| point(item, pulse_us)).collect();
    let measured: Vec<[f64; 2]> = points.into_iter().collect::<Option<_>>()?;
    follows(&items, &measured).then_some(ServoCurve::Measured { measured })
}

fn point(item: &Item<'_>, pulse_us: Option<[f64; 2]>) -> Option<[f64; 2]> {
    let [us, degrees] = item.pair([&limits::PULSE_US, &limits::JOINT_DEG])?;
    match pulse_us {
        Some([least, most]) if !(least..=most).contains(&us) => {
            item.complain(
                "its pulse must lie within the safe pulses of `pulse_us`",
                format!("from {least} to {most}, or widen `pulse_us` if the servo bears it"),
            );
            None
        }
        _ => Some([us, degrees]),
    }
}

/// Whether pulses rise, angles rise or fall throughout, and no step between points is out of all proportion.
fn follows(items: &[Item<'_>], points: &[[f64; 2]]) -> bool {
    let falls = matches!(points, [[_, first], .., [_, last]] if last < first);
    let mut good = true;
    for (item, pair) in items.iter().skip(1).zip(points.windows(2)) {
        let &[[us, degrees], [next_us, next_degrees]] = pair else { continue };
        let turned = if falls { degrees - next_degrees } else { next_degrees - degrees };
        if next_us <= us {
            item.complain(
                format!("its pulse must be longer than the one before it, {us} us"),
                "sort the points by pulse, each pulse once",
            );
            good = false;
        } else if turned <= 0.0 {
            let way = if falls { "smaller" } else { "larger" };
            item.complain(
                format!("its angle must be {way} than the one before it, {degrees} degrees"),
                "a servo turns one way as its pulse grows: leave out a misread point, or one within the dead band",
            );
            good = false;
        } else if !limits::MEASURED_US_PER_DEGREE.hold((next_us - us) / turned) {
            let bounds = &limits::MEASURED_US_PER_DEGREE;
            item.complain(
                format!(
                    "from the point before it the servo would take {:.3} us per degree; it must be {bounds}",
                    (next_us - us) / turned
                ),
                bounds.because,
            );
            good = false;
        }
    }
    good
}

/// An optional number: `None` when it is there and wrong, `Some(None)` when it is absent.
fn optional(table: &Table<'_>, key: &str, bounds: &limits::Bounds) -> Option<Option<f64>> {
    match table.optional(key) {
        Some(item) => item.within(bounds).map(Some),
        None => Some(None),
    }
}

/// The slew: less than a count would never get anywhere.
fn slew(table: &Table<'_>, output: Option<&Output>) -> Option<Option<f64>> {
    let Some(item) = table.optional("slew_us_per_frame") else { return Some(None) };
    let slew_us = item.within(&limits::SLEW_US)?;
    match output.map(count_us) {
        Some(count_us) if slew_us < count_us => {
            item.complain(
                format!(
                    "a servo with a slew of less than a count of the output, {count_us:.4} us, never moves"
                ),
                "at least that, or an output of finer counts",
            );
            None
        }
        _ => Some(Some(slew_us)),
    }
}

/// The first pulse.
fn start(table: &Table<'_>, pulse_us: Option<[f64; 2]>) -> Option<Option<f64>> {
    let Some(item) = table.optional("start_us") else { return Some(None) };
    let at = item.within(&limits::PULSE_US)?;
    match pulse_us {
        Some(safe) if !is_safe(&item, at, safe) => None,
        _ => Some(Some(at)),
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
