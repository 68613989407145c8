//! How errors spread: the share of the targets that stays within an error.

use super::axis::Axis;
use super::canvas::{chart, draw, height_around, line};
use super::palette::{self, NUMBERS, hex};
use super::{KeyEntry, Mark, Picture, Subject};
use crate::machine;
use crate::report::number::millimetres;
use crate::survey::{Errors, NumberFindings};
use plotters::prelude::*;

/// What a survey's histograms tell apart, as a power of ten of a mm; what is less is drawn there.
const LEAST_EXPONENT: i32 = -12;
/// The axis begins where this share of the targets is, in percent: a few tiny errors would squeeze the rest.
const LEAST_SHARE: f64 = 1.0;
const PLOT_HEIGHT: u32 = 240;
/// In this order, so that thin dashes come over broad lines where curves coincide.
const ORDER: [usize; 6] = [5, 2, 3, 0, 1, 4];
/// Nominal pixels, in the order of [`crate::machine::NUMBERS`].
const LINE_WIDTHS: [u32; 6] = [2, 2, 3, 2, 2, 7];
/// The number system that is drawn as a bar.
const YARDSTICK: usize = 5;

/// One of the arithmetic error, one of the error with the pulse.
pub(super) fn pictures(subject: &Subject<'_>) -> [Picture; 2] {
    let allowed = &subject.survey.robot.allowed;
    [
        picture(subject, "arithmetic and pulse together", |number| &number.together, allowed.with_pulse_mm),
        picture(subject, "arithmetic alone", |number| &number.arithmetic, allowed.arithmetic_mm),
    ]
}

/// The place of a number system in [`machine::NUMBERS`], which says how it is drawn: a leg may be too long for some.
fn place(number: &NumberFindings) -> usize {
    machine::NUMBERS.iter().position(|name| *name == number.number).unwrap_or(YARDSTICK)
}

fn picture(
    subject: &Subject<'_>,
    what: &str,
    errors: impl Fn(&NumberFindings) -> &Errors,
    allowed_mm: f64,
) -> Picture {
    let numbers = &subject.findings.numbers;
    let curves: Vec<_> = numbers.iter().map(|number| curve(errors(number))).collect();
    let shown = curves.iter().flatten().filter(|(_, share)| *share >= LEAST_SHARE);
    let exponents = exponents(shown.map(|(exponent, _)| *exponent), allowed_mm);
    let x = Axis::powers(exponents, 6, "foot error, mm");
    let y = Axis {
        range: [0.0, 100.0],
        ticks: [0, 25, 50, 75, 100].map(|share| (f64::from(share), share.to_string())).into(),
        title: "targets within it, %".into(),
    };
    let drawing = draw(height_around(PLOT_HEIGHT), |area| {
        let chart = chart(area, &x, &y)?;
        let plot = chart.plotting_area();
        for style in ORDER {
            let Some(index) = numbers.iter().position(|number| place(number) == style) else { continue };
            let style = line(NUMBERS[style], LINE_WIDTHS[style]);
            let within = |exponent: f64| exponent.clamp(x.range[0], x.range[1]);
            let points = curves[index].iter().map(|(exponent, share)| (within(*exponent), *share));
            plot.draw(&PathElement::new(points.collect::<Vec<_>>(), style))?;
        }
        let allowed = allowed_mm.log10().clamp(x.range[0], x.range[1]);
        plot.draw(&PathElement::new(vec![(allowed, 0.0), (allowed, 100.0)], line(palette::ALLOWED, 1)))
    });
    let entry = |mark, colour, means: String| KeyEntry { mark, colour: hex(colour), means };
    let largest = |number: &NumberFindings| {
        let firmware = if number.firmware { " (firmware)" } else { "" };
        format!("{}{firmware}: at most {} mm", number.number, millimetres(errors(number).largest.mm))
    };
    let mut key: Vec<_> = numbers
        .iter()
        .map(|number| {
            let style = place(number);
            entry(if style == YARDSTICK { Mark::Bar } else { Mark::Line }, NUMBERS[style], largest(number))
        })
        .collect();
    key.push(entry(Mark::Line, palette::ALLOWED, format!("the sheet allows {} mm", millimetres(allowed_mm))));
    let off_the_left =
        curves.iter().flatten().any(|(exponent, share)| *share >= LEAST_SHARE && *exponent < x.range[0]);
    Picture {
        title: format!("Spread of the foot error, {what}"),
        alternative: format!(
            "Curves of the share of targets within a foot error, {what}, on a logarithmic scale; {}.",
            numbers.iter().map(largest).collect::<Vec<_>>().join("; ")
        ),
        caption: format!(
            "A curve farther left is better. Where number systems differ by less than a line’s width, their lines \
             lie on one another.{}",
            if off_the_left {
                format!(" What is below 1e{} mm is drawn at the left edge.", exponents[0])
            } else {
                String::new()
            }
        ),
        key,
        width: drawing.width,
        height: drawing.height,
        body: drawing.body,
    }
}

/// (decimal logarithm of the error in mm, share in percent), the largest error last.
fn curve(errors: &Errors) -> Vec<(f64, f64)> {
    let least = 10_f64.powi(LEAST_EXPONENT);
    errors
        .shares
        .iter()
        .copied()
        .chain([(errors.largest.mm, 1.0)])
        .map(|(mm, share)| {
            // Infinite errors are drawn at the right edge, none at the left.
            let exponent = if mm < least { f64::from(LEAST_EXPONENT) - 1.0 } else { mm.log10().min(99.0) };
            (exponent, share * 100.0)
        })
        .collect()
}

/// Whole powers of ten around the curves and what is allowed.
fn exponents(curves: impl Iterator<Item = f64>, allowed_mm: f64) -> [i32; 2] {
    let (least, most) = curves
        .chain([allowed_mm.log10()])
        .fold((f64::INFINITY, f64::NEG_INFINITY), |(least, most), at| (least.min(at), most.max(at)));
    let first = (least.floor() as i32).clamp(LEAST_EXPONENT, 8);
    [first, (most.ceil() as i32).clamp(first + 1, 9)]
}
