//! The foot error over a slice of the work volume.

use super::axis::{Axis, Bands};
use super::canvas::{
    self, Area, Chart, Drawn, PLOT_WIDTH, UNIT, WIDTH, chart, draw, height_around, text_from, units,
    worst_mark,
};
use super::palette::{self, SCALE, hex};
use super::slice::{self, Slice};
use super::{KeyEntry, Mark, Picture, Subject};
use crate::machine::Machine;
use crate::report::number::millimetres;
use crate::survey::NumberFindings;
use plotters::prelude::*;
use plotters::style::text_anchor::{HPos, Pos, VPos};

/// Which error.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Error {
    Together,
    Arithmetic,
}

const AXIS_NAMES: [&str; 3] = ["x, forward, mm", "y, outboard, mm", "z, up, mm"];
/// The plot's height for its width lies between these; it is to scale between them.
const LEAST_RATIO: f64 = 0.4;
const MOST_RATIO: f64 = 1.1;
/// The scale's height below the plot, nominal pixels.
const SCALE_HEIGHT: u32 = 60;

pub(super) fn picture(
    subject: &Subject<'_>,
    number: &NumberFindings,
    machine: &dyn Machine,
    error: Error,
) -> Picture {
    let sheet = subject.sheet();
    let legs = subject.findings.legs.len();
    let (worst, slice) = match error {
        Error::Together => {
            let worst = number.together.largest;
            let with = (machine, &subject.judge, legs);
            (worst, slice::through(worst.foot_mm, sheet, with, |measured| measured.together_mm))
        }
        // Trims, in which alone the legs of a kind differ, do not touch it.
        Error::Arithmetic => {
            let worst = number.arithmetic.largest;
            let with = (machine, &subject.judge, 1);
            (worst, slice::through(worst.foot_mm, sheet, with, |measured| Some(measured.arithmetic_mm)))
        }
    };
    let bands = Bands::up_to(slice.largest_mm(), SCALE.len());
    let [x, y] = [0, 1].map(|side| Axis::linear(slice.ranges[side], 6, AXIS_NAMES[slice.axes[side]]));
    let [width, height] = slice.ranges.map(|[least, most]| most - least);
    let plot = (height / width).clamp(LEAST_RATIO, MOST_RATIO) * f64::from(PLOT_WIDTH);
    let map_height = height_around(plot.round() as u32);
    let drawing = draw(map_height + SCALE_HEIGHT, |area| {
        let (map, scale) = area.split_vertically(units(map_height));
        let mut chart = chart(&map, &x, &y)?;
        cells(&mut chart, &slice, &bands)?;
        worst_mark(&mut chart, (worst.foot_mm[slice.axes[0]], worst.foot_mm[slice.axes[1]]))?;
        key(&scale, &bands)
    });
    let (what, how) = match error {
        Error::Together => (
            "Foot error, arithmetic and pulse together",
            format!("{} points in each of the {legs} legs", slice::POINTS * slice::POINTS),
        ),
        Error::Arithmetic => {
            ("Foot error, arithmetic alone", format!("{} points", slice::POINTS * slice::POINTS))
        }
    };
    let cut = format!("{} = {:.1} mm", ["x", "y", "z"][slice.cut.0], slice.cut.1);
    let some_unreached = slice.cells.iter().any(|cell| cell.unreached);
    let entry = |mark, colour, means: &str| KeyEntry { mark, colour: hex(colour), means: means.into() };
    let mut entries = vec![entry(Mark::Ring, palette::WORST, "the largest error that the survey found")];
    if some_unreached {
        entries.push(entry(Mark::Area, palette::UNREACHED, "not reached as asked, wholly or in part"));
    }
    Picture {
        title: format!("{what}, {}", number.number),
        alternative: format!(
            "Map of the foot error of {} over the slice {cut} of the work volume: up to {} mm{}.",
            number.number,
            millimetres(slice.largest_mm()),
            if some_unreached { "; part of it is not reached" } else { "" }
        ),
        caption: format!(
            "Slice of the work volume at {cut}, through the largest error that the survey found, {} mm. Each cell \
             shows the largest error of {how}; over the slice it is {} mm.",
            millimetres(worst.mm),
            millimetres(slice.largest_mm())
        ),
        key: entries,
        width: drawing.width,
        height: drawing.height,
        body: drawing.body,
    }
}

/// The cells, one band after another, neighbours in a row as one.
fn cells(chart: &mut Chart<'_, '_>, slice: &Slice, bands: &Bands) -> Drawn {
    let band_of = |index: usize| slice.cells[index].largest_mm.map(|mm| bands.of(mm));
    fill(chart, slice, palette::VOID, |index| band_of(index).is_none())?;
    for band in 0..bands.count {
        fill(chart, slice, colour(band, bands.count), |index| band_of(index) == Some(band))?;
    }
    fill(chart, slice, palette::UNREACHED, |index| slice.cells[index].unreached)
}

fn fill(
    chart: &mut Chart<'_, '_>,
    slice: &Slice,
    colour: RGBColor,
    belongs: impl Fn(usize) -> bool,
) -> Drawn {
    let [across, up] = slice.counts;
    for row in 0..up {
        let mut from = 0;
        while from < across {
            let mut to = from;
            while to < across && belongs(row * across + to) {
                to += 1;
            }
            if to > from {
                let corners =
                    [(slice.edge(0, from), slice.edge(1, row + 1)), (slice.edge(0, to), slice.edge(1, row))];
                chart.plotting_area().draw(&Rectangle::new(corners, colour.filled()))?;
            }
            from = to.max(from + 1);
        }
    }
    Ok(())
}

/// The colour of a band, the whole scale used however few there are.
fn colour(band: usize, count: usize) -> RGBColor {
    if count < 2 { SCALE[0] } else { SCALE[band * (SCALE.len() - 1) / (count - 1)] }
}

/// The scale of colours with its edges.
fn key(area: &Area<'_>, bands: &Bands) -> Drawn {
    let unit = UNIT as i32;
    let (left, right, top, bottom) = (
        (WIDTH - PLOT_WIDTH) as i32 * unit - 14 * unit,
        WIDTH as i32 * unit - 22 * unit,
        4 * unit,
        19 * unit,
    );
    let edge = |band: usize| left + (right - left) * band as i32 / bands.count as i32;
    for band in 0..bands.count {
        let corners = [(edge(band), top), (edge(band + 1), bottom)];
        area.draw(&Rectangle::new(corners, colour(band, bands.count).filled()))?;
    }
    let below = canvas::text(palette::INK).pos(Pos::new(HPos::Center, VPos::Top));
    for band in 0..=bands.count {
        area.draw(&Text::new(bands.edge(band), (edge(band), bottom + 4 * unit), below.clone()))?;
    }
    let title = format!("foot error, {}", bands.unit());
    area.draw(&Text::new(
        title,
        ((left + right) / 2, bottom + 30 * unit),
        text_from(palette::INK, HPos::Center),
    ))
}
