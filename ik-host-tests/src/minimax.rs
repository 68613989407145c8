//! Minimax polynomials for ik-core's kernels, by Remez's exchange algorithm (E. Ya. Remez, 1934), in f64.
//!
//! The coefficients stand in `ik-core/src/number/float/coefficients.rs`, which [`float_coefficients`] prints: a test
//! compares the two, and `cargo run -p ik-host-tests --example float-coefficients` prints it anew.

use std::fmt::Write as _;

/// A polynomial Σ c·t^power with every other power missing, and the largest absolute error that it leaves.
#[derive(Debug, Clone, PartialEq)]
pub struct Minimax {
    /// From the lowest power up.
    pub coefficients: Vec<f64>,
    /// The largest |polynomial − function| over the interval, before coefficients are rounded.
    pub error: f64,
}

/// Points at which the error is looked at.
const GRID: usize = 20_000;
/// Exchanges; some five are enough for what is approximated here.
const EXCHANGES: usize = 30;

/// The best approximation of `function` on [0, end] by c₀·t^first + c₁·t^(first+2) + …, `count` terms.
pub fn minimax(function: impl Fn(f64) -> f64, first: i32, count: usize, end: f64) -> Minimax {
    let power = |term: usize, t: f64| t.powi(first + 2 * term as i32);
    let value = |coefficients: &[f64], t: f64| -> f64 {
        coefficients.iter().enumerate().map(|(term, c)| c * power(term, t)).sum()
    };
    // An odd polynomial is right at 0 by itself: no alternation is to be had there.
    let start = if first > 0 { end / GRID as f64 } else { 0.0 };
    let grid: Vec<f64> = (0..=GRID)
        .map(|i| {
            let along = (1.0 - (std::f64::consts::PI * i as f64 / GRID as f64).cos()) / 2.0;
            start + (end - start) * along
        })
        .collect();
    let mut nodes: Vec<f64> = (0..=count).map(|i| grid[(GRID * (2 * i + 1)) / (2 * count + 2)]).collect();
    let mut coefficients = Vec::new();
    for _ in 0..EXCHANGES {
        let rows = nodes
            .iter()
            .enumerate()
            .map(|(i, t)| {
                let mut row: Vec<f64> = (0..count).map(|term| power(term, *t)).collect();
                row.push(if i % 2 == 0 { 1.0 } else { -1.0 });
                row.push(function(*t));
                row
            })
            .collect();
        let mut solution = solved(rows);
        solution.pop();
        coefficients = solution;
        let next = extrema(&grid, |t| value(&coefficients, t) - function(t), count + 1);
        if next.len() < count + 1 || next == nodes {
            break;
        }
        nodes = next;
    }
    let error = grid.iter().map(|t| (value(&coefficients, *t) - function(*t)).abs()).fold(0.0, f64::max);
    Minimax { coefficients, error }
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

/// The text of `ik-core/src/number/float/coefficients.rs`.
pub fn float_coefficients() -> String {
    let quarter = std::f64::consts::FRAC_PI_4;
    let mut text = String::from(
        "//! Coefficients of minimax polynomials, by Remez's exchange algorithm.\n\
         //!\n\
         //! Made by `cargo run -p ik-host-tests --example float-coefficients`; a test there compares. The errors are those of\n\
         //! the polynomials before their coefficients are rounded to `f32`.\n",
    );
    for (name, about, polynomial) in [
        ("ARC_TANGENT", "2·arctan t ≈ t·Σ c·t^2k on [0, 1]", minimax(|t| 2.0 * t.atan(), 1, 8, 1.0)),
        (
            "KNEE_ARC_TANGENT",
            "4·arctan t ≈ t·Σ c·t^2k on [0, tan π/8]",
            minimax(|t| 4.0 * t.atan(), 1, 5, (std::f64::consts::FRAC_PI_8).tan() * 1.001),
        ),
        ("SINE", "sin t ≈ t·Σ c·t^2k on [0, π/4]", minimax(f64::sin, 1, 4, quarter)),
        ("COSINE", "cos t ≈ Σ c·t^2k on [0, π/4]", minimax(f64::cos, 0, 5, quarter)),
    ] {
        let list: Vec<_> = polynomial.coefficients.iter().map(|c| format!("{:?}", *c as f32)).collect();
        let _ = write!(
            text,
            "\n/// {about}, within {:.1e}.\n#[rustfmt::skip]\n\
             pub(super) const {name}: [f32; {}] = [\n    {},\n];\n",
            polynomial.error,
            list.len(),
            list.join(",\n    ")
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
            let found = minimax(f64::atan, 1, degree + 1, 1.0).error;
            assert!((found / error - 1.0).abs() < 0.07, "{degree}: {found:e}");
        }
    }

    #[test]
    fn the_coefficients_in_ik_core_are_these() {
        let path = concat!(env!("CARGO_MANIFEST_DIR"), "/../ik-core/src/number/float/coefficients.rs");
        assert_eq!(std::fs::read_to_string(path).unwrap(), float_coefficients());
    }
}
