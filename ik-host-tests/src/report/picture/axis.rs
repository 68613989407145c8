//! Axes: where their ticks are and what stands at them.

use plotters::coord::ranged1d::{KeyPointHint, NoDefaultFormatting, Ranged, ValueFormatter};
use std::ops::Range;

/// An axis of a picture.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Axis {
    /// From and to.
    pub(super) range: [f64; 2],
    /// Where a tick is, and what stands there.
    pub(super) ticks: Vec<(f64, String)>,
    /// What it shows, with its unit.
    pub(super) title: String,
}

impl Axis {
    /// Ticks at round numbers, at most about `most` of them.
    pub(super) fn linear(range: [f64; 2], most: usize, title: impl Into<String>) -> Self {
        let step = round_step((range[1] - range[0]) / most as f64);
        let decimals = decimals(step);
        let first = (range[0] / step).ceil() as i64;
        let last = (range[1] / step + 1e-9).floor() as i64;
        let ticks = (first..=last)
            .map(|number| {
                let at = number as f64 * step;
                (at, format!("{at:.decimals$}").replace('-', "−"))
            })
            .collect();
        Self { range, ticks, title: title.into() }
    }

    /// For decimal logarithms: ticks at whole powers of ten, at most about `most` of them.
    pub(super) fn powers(exponents: [i32; 2], most: i32, title: impl Into<String>) -> Self {
        let [first, last] = exponents;
        let every = (f64::from(last - first) / f64::from(most)).ceil().max(1.0) as usize;
        let ticks = (first..=last)
            .rev()
            .step_by(every)
            .map(|exponent| (f64::from(exponent), power_of_ten(exponent)))
            .collect();
        Self { range: [f64::from(first), f64::from(last)], ticks, title: title.into() }
    }
}

impl Ranged for Axis {
    type FormatOption = NoDefaultFormatting;
    type ValueType = f64;

    fn map(&self, value: &f64, (from, to): (i32, i32)) -> i32 {
        let [least, most] = self.range;
        // Added before it is rounded: what lies far off the axis saturates.
        (f64::from(from) + (value - least) / (most - least) * f64::from(to - from)).round() as i32
    }

    fn key_points<Hint: KeyPointHint>(&self, hint: Hint) -> Vec<f64> {
        if hint.weight().allow_light_points() {
            return Vec::new();
        }
        self.ticks.iter().map(|(at, _)| *at).collect()
    }

    fn range(&self) -> Range<f64> {
        self.range[0]..self.range[1]
    }
}

impl ValueFormatter<f64> for Axis {
    fn format_ext(&self, value: &f64) -> String {
        self.ticks.iter().find(|(at, _)| at == value).map_or_else(String::new, |(_, label)| label.clone())
    }
}

/// The least of 1, 2, 2.5 and 5 times a power of ten that is not below `least`.
pub(super) fn round_step(least: f64) -> f64 {
    let power = 10_f64.powf(least.log10().floor());
    let times = [1.0, 2.0, 2.5, 5.0, 10.0].into_iter().find(|times| times * power >= least * (1.0 - 1e-9));
    times.unwrap_or(10.0) * power
}

/// The digits after the point that multiples of a round step need.
fn decimals(step: f64) -> usize {
    let power = step.log10().floor();
    // 2.5 times a power of ten needs one more.
    let more = i32::from((step / 10_f64.powf(power) - 2.5).abs() < 1e-6);
    (more - power as i32).max(0) as usize
}

/// `0.1`, `1`, `10`, else `10⁻⁶`.
pub(super) fn power_of_ten(exponent: i32) -> String {
    match exponent {
        -2 => "0.01".into(),
        -1 => "0.1".into(),
        0 => "1".into(),
        1 => "10".into(),
        2 => "100".into(),
        _ => format!("10{}", raised(exponent)),
    }
}

fn raised(exponent: i32) -> String {
    exponent
        .to_string()
        .chars()
        .map(|digit| match digit {
            '-' => '⁻',
            '1' => '¹',
            '2' => '²',
            '3' => '³',
            '4' => '⁴',
            '5' => '⁵',
            '6' => '⁶',
            '7' => '⁷',
            '8' => '⁸',
            '9' => '⁹',
            _ => '⁰',
        })
        .collect()
}

/// Bands of a scale of errors from zero: their edges, in mm, and how the edges are written.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Bands {
    /// Width of a band, mm.
    pub(super) step: f64,
    /// How many.
    pub(super) count: usize,
    /// The power of ten that the written edges leave out.
    exponent: i32,
}

impl Bands {
    /// At most `most` bands of a round width that reach up to `largest`, mm.
    pub(super) fn up_to(largest: f64, most: usize) -> Self {
        let largest = if largest.is_finite() { largest } else { 1e6 };
        if largest <= 0.0 {
            return Self { step: 1.0, count: 1, exponent: 0 };
        }
        let step = round_step(largest / most as f64);
        let count = ((largest / step - 1e-9).ceil() as usize).clamp(1, most);
        let exponent = if step < 1e-3 { (step * count as f64).log10().floor() as i32 } else { 0 };
        Self { step, count, exponent }
    }

    /// The band of an error; the last one for what lies beyond.
    pub(super) fn of(&self, mm: f64) -> usize {
        if mm.is_nan() {
            return self.count - 1;
        }
        ((mm / self.step) as usize).min(self.count - 1)
    }

    /// `mm`, or `10⁻⁶ mm`.
    pub(super) fn unit(&self) -> String {
        if self.exponent == 0 { "mm".into() } else { format!("{} mm", power_of_ten(self.exponent)) }
    }

    /// The edge below a band, in that unit.
    pub(super) fn edge(&self, band: usize) -> String {
        let unit = 10_f64.powi(self.exponent);
        let decimals = decimals(self.step / unit);
        format!("{:.decimals$}", band as f64 * self.step / unit)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn labels(axis: &Axis) -> Vec<&str> {
        axis.ticks.iter().map(|(_, label)| label.as_str()).collect()
    }

    #[test]
    fn ticks_are_round_and_within() {
        assert_eq!(labels(&Axis::linear([-61.0, 60.0], 5, "")), ["−50", "−25", "0", "25", "50"]);
        assert_eq!(labels(&Axis::linear([0.0, 1.0], 4, "")), ["0.00", "0.25", "0.50", "0.75", "1.00"]);
        assert_eq!(labels(&Axis::powers([-4, 1], 6, "")), ["10", "1", "0.1", "0.01", "10⁻³", "10⁻⁴"]);
        assert_eq!(labels(&Axis::powers([-12, 1], 5, "")), ["10", "0.01", "10⁻⁵", "10⁻⁸", "10⁻¹¹"]);
    }

    #[test]
    fn bands_cover_the_largest_error() {
        for largest in [1e-13, 1.48e-5, 0.0817, 0.9999, 1.0, 1.3001, 250.0] {
            let bands = Bands::up_to(largest, 8);
            assert!(
                bands.count <= 8 && bands.count as f64 * bands.step >= largest * (1.0 - 1e-9),
                "{bands:?}"
            );
            assert_eq!(bands.of(largest), bands.count - 1, "{bands:?}");
            assert_eq!(bands.of(0.0), 0);
        }
        let bands = Bands::up_to(1.48e-5, 8);
        assert_eq!(bands.unit(), "10⁻⁵ mm");
        assert_eq!((bands.edge(0), bands.edge(bands.count)), ("0.0".into(), "1.6".into()));
        assert_eq!(Bands::up_to(1.3001, 8).edge(7), "1.4");
        // No error at all, and one beyond all bounds, are drawn too.
        assert_eq!(Bands::up_to(0.0, 8).of(0.0), 0);
        let bands = Bands::up_to(f64::INFINITY, 8);
        assert_eq!(bands.of(f64::NAN), bands.count - 1);
        assert_eq!(bands.of(f64::INFINITY), bands.count - 1);
    }
}
