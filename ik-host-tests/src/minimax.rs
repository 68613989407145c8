//! Minimax polynomials and quotients of polynomials for ik-core's kernels, by Remez's exchange algorithm (E. Ya. Remez, 1934), in f64.
//!
//! The coefficients stand in `ik-core/src/number/float/coefficients.rs`, which [`float_coefficients`] prints: a test
//! compares the two, and `cargo run -p ik-host-tests --example float-coefficients` prints it anew.

use std::fmt::Write as _;

/// A quotient of two polynomials in t², the upper one times a power of t, and the largest absolute error that it leaves.
#[derive(Debug, Clone, PartialEq)]
pub struct Minimax {
    /// Of the upper polynomial, from the lowest power up.
    pub above: Vec<f64>,
    /// Of the lower polynomial, from the lowest power up; the highest, 1, is left out. Without any it is 1.
    pub below: Vec<f64>,
    /// The largest |quotient − function| over the interval, before coefficients are rounded.
    pub error: f64,
}

impl Minimax {
    /// The lower polynomial.
    fn divisor(&self, t: f64) -> f64 {
        self.below.iter().rev().fold(1.0, |sum, c| sum * t * t + c)
    }

    /// The quotient, whose upper polynomial starts with t^first.
    fn at(&self, first: i32, t: f64) -> f64 {
        t.powi(first) * self.above.iter().rev().fold(0.0, |sum, c| sum * t * t + c) / self.divisor(t)
    }
}

/// Points at which the error is looked at.
const GRID: usize = 20_000;
/// Exchanges; some five are enough for what is approximated here.
const EXCHANGES: usize = 30;
/// Steps of the iteration within an exchange, in which the error times the divisor is that of the divisor before.
const STEPS: usize = 40;

/// The best approximation of `function` on [0, end] by a quotient with `above` terms above, the first of them t^first,
/// and `below` terms below besides the highest.
pub fn minimax(function: impl Fn(f64) -> f64, first: i32, [above, below]: [usize; 2], end: f64) -> Minimax {
    let power = |term: usize, t: f64| t.powi(2 * term as i32);
    // An odd function is met at 0 by itself: no alternation is to be had there.
    let start = if first > 0 { end / GRID as f64 } else { 0.0 };
    let grid: Vec<f64> = (0..=GRID)
        .map(|i| {
            let along = (1.0 - (std::f64::consts::PI * i as f64 / GRID as f64).cos()) / 2.0;
            start + (end - start) * along
        })
        .collect();
    let unknowns = above + below + 1;
    let mut nodes: Vec<f64> = (0..unknowns).map(|i| grid[(GRID * (2 * i + 1)) / (2 * unknowns)]).collect();
    let mut best = Minimax { above: vec![0.0; above], below: vec![1.0; below], error: 0.0 };
    for _ in 0..EXCHANGES {
        for _ in 0..if below == 0 { 1 } else { STEPS } {
            let rows = nodes
                .iter()
                .enumerate()
                .map(|(i, t)| {
                    let value = function(*t);
                    let mut row: Vec<f64> = (0..above).map(|term| t.powi(first) * power(term, *t)).collect();
                    row.extend((0..below).map(|term| -value * power(term, *t)));
                    row.push(if i % 2 == 0 { best.divisor(*t) } else { -best.divisor(*t) });
                    row.push(value * power(below, *t));
                    row
                })
                .collect();
            let solution = solved(rows);
            best.above = solution[..above].to_vec();
            best.below = solution[above..above + below].to_vec();
        }
        let next = extrema(&grid, |t| best.at(first, t) - function(t), unknowns);
        if next.len() < unknowns || next == nodes {
            break;
        }
        nodes = next;
    }
    best.error = grid.iter().map(|t| (best.at(first, *t) - function(*t)).abs()).fold(0.0, f64::max);
    best
}

/// The `wanted` largest of the alternating extrema of an error, in order.
fn extrema(grid: &[f64], error: impl Fn(f64) -> f64, wanted: usize) -> Vec<f64> {
    let mut found: Vec<(f64, f64)> = Vec::new();
    for t in grid {
        let this = (*t, error(*t));
        match found.last_mut() {
            Some(last) if (last.1 < 0.0) == (this.1 < 0.0) => {
                if this.1.abs() > last.1.abs() {
                    *last = this;
                }
            }
            _ => found.push(this),
        }
    }
    while found.len() > wanted {
        // Dropping the smaller end keeps the signs alternating.
        let (first, last) = (found[0].1.abs(), found[found.len() - 1].1.abs());
        if first < last {
            found.remove(0);
        } else {
            found.pop();
        }
    }
    found.into_iter().map(|(t, _)| t).collect()
}

/// The solution of linear equations by Gauss's elimination with pivots; the last column is the right side.
fn solved(mut rows: Vec<Vec<f64>>) -> Vec<f64> {
    let size = rows.len();
    for column in 0..size {
        let pivot = (column..size)
            .max_by(|a, b| rows[*a][column].abs().total_cmp(&rows[*b][column].abs()))
            .unwrap_or(column);
        rows.swap(column, pivot);
        for row in column + 1..size {
            let factor = rows[row][column] / rows[column][column];
            let pivot = rows[column].clone();
            for (value, of_pivot) in rows[row].iter_mut().zip(&pivot).skip(column) {
                *value -= factor * of_pivot;
            }
        }
    }
    let mut solution = vec![0.0; size];
    for row in (0..size).rev() {
        let known: f64 = (row + 1..size).map(|k| rows[row][k] * solution[k]).sum();
        solution[row] = (rows[row][size] - known) / rows[row][row];
    }
    solution
}

/// t times a quotient of polynomials in t², or if `first` is 3 2·t and t³ times it, in `f32`, as ik-core works it out.
fn in_single_precision([above, below]: &[Vec<f32>; 2], first: i32, t: f32) -> f32 {
    let u = t * t;
    let mut dividend = 0.0;
    for c in above.iter().rev() {
        dividend = dividend * u + c;
    }
    let mut divisor = 1.0;
    for c in below.iter().rev() {
        divisor = divisor * u + c;
    }
    if first == 3 { t + t + t * (u * dividend) / divisor } else { t * dividend / divisor }
}

/// Coefficients rounded to `f32`, and each moved by some last bits, to and fro, as long as the largest error in `f32`
/// falls; with that error. Rounding each on its own would leave the quotient off by what all of them lose.
fn rounded(best: &Minimax, function: impl Fn(f64) -> f64, first: i32, end: f64) -> ([Vec<f32>; 2], f64) {
    let targets: Vec<(f32, f64)> = (1..=GRID)
        .map(|i| (end * i as f64 / GRID as f64) as f32)
        .map(|t| (t, function(f64::from(t))))
        .collect();
    let largest = |coefficients: &[Vec<f32>; 2]| {
        let error =
            |(t, want): &(f32, f64)| (f64::from(in_single_precision(coefficients, first, *t)) - want).abs();
        targets.iter().map(error).fold(0.0, f64::max)
    };
    let mut found =
        [&best.above, &best.below].map(|list| list.iter().map(|c| *c as f32).collect::<Vec<f32>>());
    let places = (0..best.above.len()).map(|i| (0, i)).chain((0..best.below.len()).map(|i| (1, i)));
    let mut least = largest(&found);
    loop {
        let before = least;
        for (list, place) in places.clone() {
            for bits in [-9, -3, -2, -1, 1, 2, 3, 9] {
                let mut tried = found.clone();
                tried[list][place] = f32::from_bits(tried[list][place].to_bits().wrapping_add_signed(bits));
                let error = largest(&tried);
                if error < least {
                    (found, least) = (tried, error);
                }
            }
        }
        if least == before {
            return (found, least);
        }
    }
}

/// The text of `ik-core/src/number/float/coefficients.rs`.
pub fn float_coefficients() -> String {
    let quarter = std::f64::consts::FRAC_PI_4;
    let mut text = String::from(
        "//! Coefficients of minimax polynomials and quotients of polynomials, by Remez's exchange algorithm.\n\
         //!\n\
         //! Made by `cargo run -p ik-host-tests --example float-coefficients`; a test there compares. The errors are those\n\
         //! before the coefficients are rounded to `f32`.\n\n\
         use super::quotient::Quotient;\n",
    );
    let listed = |name: &str, coefficients: &[f32], indent: &str| {
        let list: Vec<_> = coefficients.iter().map(|c| format!("{indent}    {c:?},\n")).collect();
        format!("{name}[\n{}{indent}]", list.concat())
    };
    let most_sine = std::f64::consts::FRAC_1_SQRT_2 * 1.001;
    type Function = fn(f64) -> f64;
    for (name, about, function, first, [above, below], end) in [
        ("ARC_TANGENT", "2·arctan t − 2·t on [0, 1]", (|t| 2.0 * t.atan()) as Function, 3, [3, 2], 1.0),
        ("ARC_SINE", "2·arcsin t − 2·t on [0, √½]", |t| 2.0 * t.asin(), 3, [2, 2], most_sine),
    ] {
        let left = if first == 3 { 2.0 } else { 0.0 };
        let best = minimax(|t| function(t) - left * t, first, [above, below], end);
        let (single, error) = rounded(&best, function, first, end);
        let _ = write!(
            text,
            "\n/// {about}, within {:.1e}; rounded and in `f32`, within {error:.1e}.\n#[rustfmt::skip]\n\
             pub(super) const {name}: Quotient<{above}, {below}> = Quotient {{\n{},\n{},\n}};\n",
            best.error,
            listed("    above: ", &single[0], "    "),
            listed("    below: ", &single[1], "    "),
        );
    }
    for (name, about, best) in [
        ("SINE", "sin t ≈ t·Σ c·t^2k on [0, π/4]", minimax(f64::sin, 1, [4, 0], quarter)),
        ("COSINE", "cos t ≈ Σ c·t^2k on [0, π/4]", minimax(f64::cos, 0, [5, 0], quarter)),
    ] {
        let _ = write!(
            text,
            "\n/// {about}, within {:.1e}.\n#[rustfmt::skip]\npub(super) const {name}: [f32; {}] = {};\n",
            best.error,
            best.above.len(),
            listed("", &best.above.iter().map(|c| *c as f32).collect::<Vec<_>>(), ""),
        );
    }
    text
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn arctangents_have_the_errors_that_are_known_of_them() {
        // Minimax errors of arctan on [0, 1] by degree in t²: 3 → 8.1e-5, 4 → 1.1e-5, 5 → 1.7e-6, 6 → 2.5e-7,
        // 7 → 3.7e-8 (made with another program, in 40 digits).
        for (degree, error) in [(3, 8.1e-5), (4, 1.1e-5), (5, 1.7e-6), (6, 2.5e-7), (7, 3.7e-8)] {
            let found = minimax(f64::atan, 1, [degree + 1, 0], 1.0).error;
            assert!((found / error - 1.0).abs() < 0.07, "{degree}: {found:e}");
        }
    }

    #[test]
    fn an_error_of_a_quotient_alternates_as_often_as_it_has_coefficients_and_once_more() {
        // What makes it the best there is (P. L. Chebyshev's equioscillation theorem).
        let best = minimax(|t| 2.0 * t.atan(), 1, [4, 2], 1.0);
        let grid: Vec<f64> = (1..=GRID).map(|i| i as f64 / GRID as f64).collect();
        let error = |t: f64| best.at(1, t) - 2.0 * t.atan();
        let peaks = extrema(&grid, error, usize::MAX);
        assert_eq!(peaks.len(), 7);
        for t in peaks {
            assert!(
                (error(t).abs() / best.error - 1.0).abs() < 0.01,
                "{t}: {:e} of {:e}",
                error(t),
                best.error
            );
        }
    }

    #[test]
    fn the_coefficients_in_ik_core_are_these() {
        let path = concat!(env!("CARGO_MANIFEST_DIR"), "/../ik-core/src/number/float/coefficients.rs");
        assert_eq!(std::fs::read_to_string(path).unwrap(), float_coefficients());
    }
}
