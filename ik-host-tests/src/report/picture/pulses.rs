//! The pulses that the work volume needs, against what each servo bears.

use super::axis::Axis;
use super::canvas::{chart, draw, height_around, line, text_from};
use super::palette::{self, hex};
use super::used_pulses::{TARGETS, UsedPulse};
use super::{KeyEntry, Mark, Picture};
use crate::report::number::count;
use plotters::prelude::*;
use plotters::style::text_anchor::HPos;

/// Nominal pixels.
const ROW_HEIGHT: u32 = 62;

pub(super) fn picture(used: &[UsedPulse]) -> Picture {
    let bounds = used
        .iter()
        .flat_map(|pulse| pulse.safe_us.into_iter().chain(pulse.used_us))
        .fold([f64::INFINITY, f64::NEG_INFINITY], |[least, most], us| [least.min(us), most.max(us)]);
    let margin = (bounds[1] - bounds[0]) * 0.04;
    let x = Axis::linear([bounds[0] - margin, bounds[1] + margin], 6, "pulse, µs");
    let y = Axis { range: [0.0, used.len() as f64], ticks: Vec::new(), title: String::new() };
    let drawing = draw(height_around(ROW_HEIGHT * used.len() as u32), |area| {
        let chart = chart(area, &x, &y)?;
        let plot = chart.plotting_area();
        for (row, pulse) in used.iter().rev().enumerate() {
            let at = row as f64;
            let bar = |[least, most]: [f64; 2], [from, to]: [f64; 2], colour: RGBColor| {
                plot.draw(&Rectangle::new([(least, at + to), (most, at + from)], colour.filled()))
            };
            bar(pulse.safe_us, [0.12, 0.52], palette::SERVO_RANGE)?;
            bar(pulse.used_us, [0.19, 0.45], palette::SERVO_USED)?;
            let centre = vec![(pulse.centre_us, at + 0.08), (pulse.centre_us, at + 0.56)];
            plot.draw(&PathElement::new(centre, line(palette::INK, 2)))?;
            let words = format!("{}: {}", pulse.joint, words(pulse));
            plot.draw(&Text::new(words, (bounds[0], at + 0.74), text_from(palette::LABEL, HPos::Left)))?;
        }
        Ok(())
    });
    let entry = |mark, colour, means: &str| KeyEntry { mark, colour: hex(colour), means: means.into() };
    let held = used.iter().filter(|pulse| pulse.held).map(|pulse| pulse.joint).collect::<Vec<_>>();
    Picture {
        title: "Pulses that the work volume needs".into(),
        alternative: format!(
            "Bars of the pulses used within what each servo bears: {}.",
            used.iter()
                .map(|pulse| format!("{} {}", pulse.joint, words(pulse)))
                .collect::<Vec<_>>()
                .join("; ")
        ),
        caption: format!(
            "From {} targets in the work volume, its corners among them, in every leg of the kind, trims included. {}",
            count(TARGETS).replace(' ', "\u{202f}"),
            if held.is_empty() {
                "No pulse is held by its range.".into()
            } else {
                format!("Held at an end of its range: {}.", held.join(", "))
            }
        ),
        key: vec![
            entry(Mark::Area, palette::SERVO_RANGE, "mechanically safe"),
            entry(Mark::Area, palette::SERVO_USED, "used"),
            entry(Mark::Bar, palette::INK, "centre, before trim"),
        ],
        width: drawing.width,
        height: drawing.height,
        body: drawing.body,
    }
}

fn words(pulse: &UsedPulse) -> String {
    let ([least, most], [safe_least, safe_most]) = (pulse.used_us, pulse.safe_us);
    format!("{least:.0} to {most:.0} of {safe_least:.0} to {safe_most:.0} µs")
}
