//! What every picture is drawn on: plotters' SVG, made small and ready to stand in a page.

use super::axis::Axis;
use super::palette::{AXIS, GRID, INK};
use plotters::coord::Shift;
use plotters::prelude::*;
use plotters::style::text_anchor::{HPos, Pos, VPos};
use std::fmt::Write as _;

/// Drawing units to one nominal pixel: plotters places on whole units, which alone would be too coarse for curves.
pub(super) const UNIT: u32 = 4;
/// Width of every picture, nominal pixels: text of [`TEXT`] is then readable on a phone's width and not
/// overlarge on two columns of a wide page.
pub(super) const WIDTH: u32 = 440;
/// Size of text, nominal pixels.
const TEXT: f64 = 14.5;
/// What an axis takes besides the plot, nominal pixels: left, below, and the margins around it all.
const LEFT: u32 = 64;
const BELOW: u32 = 44;
const MARGIN: u32 = 14;
const LEFT_MARGIN: u32 = 6;

pub(super) type Area<'a> = DrawingArea<SVGBackend<'a>, Shift>;
pub(super) type Chart<'a, 'b> = ChartContext<'a, SVGBackend<'b>, Cartesian2d<Axis, Axis>>;
pub(super) type Drawn<T = ()> = Result<T, DrawingAreaErrorKind<std::io::Error>>;

/// A drawing: the inside of an `svg` element, and its size in drawing units.
pub(super) struct Drawing {
    pub(super) width: u32,
    pub(super) height: u32,
    pub(super) body: String,
}

/// The width of a plot that has axes, nominal pixels.
pub(super) const PLOT_WIDTH: u32 = WIDTH - LEFT_MARGIN - LEFT - MARGIN;

/// The height of a picture whose plot has this height, nominal pixels.
pub(super) const fn height_around(plot: u32) -> u32 {
    plot + BELOW + MARGIN
}

/// Nominal pixels as drawing units.
pub(super) const fn units(pixels: u32) -> u32 {
    pixels * UNIT
}

/// Draws a picture of a height in nominal pixels.
pub(super) fn draw(height: u32, paint: impl FnOnce(&Area<'_>) -> Drawn) -> Drawing {
    let (width, height) = (units(WIDTH), units(height));
    let mut svg = String::new();
    {
        let area = SVGBackend::with_string(&mut svg, (width, height)).into_drawing_area();
        paint(&area).and_then(|()| area.present()).expect("nothing can go wrong while drawing into a string");
    }
    Drawing { width, height, body: compact(&svg) }
}

/// A chart with its axes, grid and titles on it.
pub(super) fn chart<'a, 'b>(area: &'a Area<'b>, x: &Axis, y: &Axis) -> Drawn<Chart<'a, 'b>> {
    let mut chart = ChartBuilder::on(area)
        .margin_top(units(MARGIN))
        .margin_right(units(MARGIN))
        .margin_left(units(LEFT_MARGIN))
        .x_label_area_size(units(BELOW))
        .y_label_area_size(units(LEFT))
        .build_cartesian_2d(x.clone(), y.clone())?;
    let mut mesh = chart.configure_mesh();
    mesh.bold_line_style(line(GRID, 1))
        .light_line_style(TRANSPARENT)
        .axis_style(line(AXIS, 1))
        .set_all_tick_mark_size(units(4))
        .label_style(text(INK))
        .axis_desc_style(text(INK))
        .x_desc(x.title.as_str());
    if !y.title.is_empty() {
        mesh.y_desc(y.title.as_str());
    }
    mesh.draw()?;
    Ok(chart)
}

/// A line of a width in nominal pixels.
pub(super) fn line(colour: RGBColor, width: u32) -> ShapeStyle {
    colour.stroke_width(units(width))
}

/// Text of the common size.
pub(super) fn text(colour: RGBColor) -> TextStyle<'static> {
    // plotters writes 1/1.24 of a font's size.
    ("sans-serif", TEXT * f64::from(UNIT) * 1.24).into_font().color(&colour)
}

/// Text of the common size, placed by the middle of its height and by this end of its width.
pub(super) fn text_from(colour: RGBColor, end: HPos) -> TextStyle<'static> {
    text(colour).pos(Pos::new(end, VPos::Center))
}

/// A ring around the place where an error is largest.
pub(super) fn worst_mark(chart: &mut Chart<'_, '_>, at: (f64, f64)) -> Drawn {
    let ring = |radius: u32, colour, width| Circle::new(at, units(radius), line(colour, width));
    chart.plotting_area().draw(&ring(8, super::palette::PAPER, 5))?;
    chart.plotting_area().draw(&ring(8, super::palette::WORST, 3))
}

/// The inside of the `svg` element, with rectangles of one colour that follow one another as one path, and without
/// what says nothing.
fn compact(svg: &str) -> String {
    let mut body = String::with_capacity(svg.len() / 2);
    let mut path = Path::default();
    for element in svg.lines().filter(|line| !line.starts_with("<svg") && *line != "</svg>") {
        if let Some((fill, step)) = filled_rectangle(element) {
            path.add(fill, &step, &mut body);
            continue;
        }
        path.end(&mut body);
        body.push_str(&element.replace(" opacity=\"1\"", "").replace(" font-family=\"sans-serif\"", ""));
        body.push('\n');
    }
    path.end(&mut body);
    body
}

/// Rectangles of one colour, gathered.
#[derive(Default)]
struct Path {
    fill: String,
    steps: String,
}

impl Path {
    fn add(&mut self, fill: &str, step: &str, body: &mut String) {
        if self.fill != fill {
            self.end(body);
            fill.clone_into(&mut self.fill);
        }
        self.steps.push_str(step);
    }

    fn end(&mut self, body: &mut String) {
        if !self.steps.is_empty() {
            let _ = writeln!(
                body,
                "<path shape-rendering=\"crispEdges\" fill=\"{}\" d=\"{}\"/>",
                self.fill, self.steps
            );
        }
        *self = Self::default();
    }
}

/// The colour of an opaque filled rectangle and its outline as steps of a path.
fn filled_rectangle(element: &str) -> Option<(&str, String)> {
    let of = |name: &str| {
        let (_, rest) = element.split_once(&format!(" {name}=\""))?;
        rest.split_once('"').map(|(value, _)| value)
    };
    if !element.starts_with("<rect ") || of("stroke") != Some("none") || of("opacity") != Some("1") {
        return None;
    }
    let (x, y, width, height) = (of("x")?, of("y")?, of("width")?, of("height")?);
    Some((of("fill")?, format!("M{x} {y}h{width}v{height}h-{width}z")))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn rectangles_of_one_colour_become_one_path_and_nothing_else_is_lost() {
        let drawing = draw(100, |area| {
            for (at, colour) in [(0, INK), (10, INK), (20, GRID)] {
                area.draw(&Rectangle::new([(at, 1), (at + 10, 5)], colour.filled()))?;
            }
            area.draw(&Rectangle::new([(0, 0), (9, 9)], line(INK, 1)))?;
            area.draw(&Text::new("a < b", (3, 4), text(INK)))
        });
        assert_eq!((drawing.width, drawing.height), (1760, 400));
        let lines: Vec<_> = drawing.body.lines().collect();
        assert!(lines[0].contains("d=\"M0 1h10v4h-10zM10 1h10v4h-10z\""), "{}", lines[0]);
        assert!(lines[0].contains("fill=\"#24292E\""), "{}", lines[0]);
        assert!(lines[1].contains("d=\"M20 1h10v4h-10z\""), "{}", lines[1]);
        assert!(lines[2].starts_with("<rect") && lines[2].contains("fill=\"none\""), "{}", lines[2]);
        assert!(lines[3].starts_with("<text") && lines[4] == "a &lt; b", "{lines:?}");
        assert_eq!(lines.len(), 6, "{lines:?}");
    }
}
