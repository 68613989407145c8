//! Readings of a servo, the line and the curve through them, and what they leave: a file of its own.

use super::axis::Axis;
use super::canvas::{chart, draw, line, units};
use super::palette::{AXIS, INK, NUMBERS, PAPER, WORST};
use crate::trim::Fit;
use plotters::prelude::*;

const PLOT_HEIGHT: u32 = 300;
const RESIDUALS_HEIGHT: u32 = 190;

/// An SVG file: angles over pulses above, what the line leaves below.
pub fn trim_drawing(fit: &Fit) -> String {
    let rows = &fit.rows;
    let extent = |of: &dyn Fn(usize) -> f64| {
        let values = (0..rows.len()).map(of);
        let (least, most) = values.fold((f64::INFINITY, f64::NEG_INFINITY), |(a, b), v| (a.min(v), b.max(v)));
        let room = ((most - least) * 0.06).max(0.01);
        [least - room, most + room]
    };
    let pulses = extent(&|row| rows[row].pulse_us);
    let angles = extent(&|row| rows[row].angle_deg);
    let off = rows.iter().map(|row| row.off_line_deg.abs()).fold(0.05, f64::max) * 1.15;
    let pulse_axis = |title: &str| Axis::linear(pulses, 5, title);
    let on_line = |us: f64| {
        let slope = if fit.turns_with { 1.0 } else { -1.0 } / fit.us_per_degree[0];
        fit.joint_at_centre_deg[0] + slope * (us - fit.centre_us)
    };
    let colour = |row: usize| if rows[row].misread { WORST } else { INK };
    let drawing = draw(PLOT_HEIGHT + RESIDUALS_HEIGHT, |area| {
        let (above, below) = area.split_vertically(units(PLOT_HEIGHT));
        let upper = chart(&above, &pulse_axis(""), &Axis::linear(angles, 6, "joint, degrees"))?;
        let plot = upper.plotting_area();
        plot.draw(&PathElement::new(pulses.map(|us| (us, on_line(us))).to_vec(), line(NUMBERS[0], 2)))?;
        if fit.points_are_worth_it {
            let through: Vec<_> = fit.points.iter().map(|[us, degrees]| (*us, *degrees)).collect();
            plot.draw(&PathElement::new(through, line(NUMBERS[1], 2)))?;
        }
        for (row, of_it) in rows.iter().enumerate() {
            plot.draw(&Circle::new((of_it.pulse_us, of_it.angle_deg), units(4), colour(row).filled()))?;
        }
        let lower =
            chart(&below, &pulse_axis("pulse, µs"), &Axis::linear([-off, off], 4, "off the line, degrees"))?;
        let plot = lower.plotting_area();
        plot.draw(&PathElement::new(pulses.map(|us| (us, 0.0)).to_vec(), line(AXIS, 1)))?;
        for (row, of_it) in rows.iter().enumerate() {
            let at = (of_it.pulse_us, of_it.off_line_deg);
            plot.draw(&PathElement::new(vec![(of_it.pulse_us, 0.0), at], line(NUMBERS[5], 2)))?;
            plot.draw(&Circle::new(at, units(4), colour(row).filled()))?;
        }
        Ok(())
    });
    let misread: Vec<String> =
        rows.iter().filter(|row| row.misread).map(|row| format!("line {}", row.line)).collect();
    let said = format!(
        "{} readings of a servo, angle over pulse, with the line of {:.4} us per degree through them{}; below, how far each \
         is off the line{}.",
        rows.len(),
        fit.us_per_degree[0],
        if fit.points_are_worth_it { " and the lines between the measured points" } else { "" },
        if misread.is_empty() { String::new() } else { format!("; looks misread: {}", misread.join(", ")) }
    );
    let paper = format!("#{:02x}{:02x}{:02x}", PAPER.0, PAPER.1, PAPER.2);
    format!(
        "<svg xmlns=\"http://www.w3.org/2000/svg\" viewBox=\"0 0 {w} {h}\" role=\"img\" font-family=\"sans-serif\">\n\
         <title>{said}</title>\n<rect width=\"{w}\" height=\"{h}\" fill=\"{paper}\"/>\n{body}</svg>\n",
        w = drawing.width,
        h = drawing.height,
        body = drawing.body
    )
}
