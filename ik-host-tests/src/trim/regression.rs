//! Linear regression by weighted least squares: nalgebra's singular value decomposition, which says so when columns do not
//! tell apart, and the covariance that follows from it.

use nalgebra::{DMatrix, DVector};

/// A coefficient and its standard error.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Term {
    /// The estimate.
    pub value: f64,
    /// Its standard error, from the scatter of the residuals.
    pub error: f64,
}

/// A regression.
#[derive(Debug, Clone, PartialEq)]
pub struct Regression {
    /// In the order of the columns.
    pub terms: Vec<Term>,
    /// What the fit leaves of each row, unweighted.
    pub residuals: Vec<f64>,
    /// Each row's share in its own estimate, 0 to 1 (the hat matrix's diagonal).
    pub leverages: Vec<f64>,
    /// Weighted sum of the squares of the residuals.
    pub sum_of_squares: f64,
    /// Rows less columns.
    pub freedom: usize,
}

impl Regression {
    /// The residuals' standard deviation, of a row of weight 1.
    pub fn deviation(&self) -> f64 {
        (self.sum_of_squares / self.freedom as f64).sqrt()
    }
}

/// Least squares of `values` on the columns of `rows`, each row weighted by 1/uncertainty². `None` if there are no more rows
/// than columns, or the rows do not tell the columns apart.
pub fn regress(rows: &[Vec<f64>], values: &[f64], uncertainties: &[f64]) -> Option<Regression> {
    let columns = rows.first()?.len();
    let freedom = rows.len().checked_sub(columns).filter(|freedom| *freedom > 0)?;
    let design = DMatrix::from_fn(rows.len(), columns, |row, column| rows[row][column] / uncertainties[row]);
    let wanted = DVector::from_fn(rows.len(), |row, _| values[row] / uncertainties[row]);
    let parts = design.clone().svd(true, true);
    let largest = parts.singular_values.max();
    let least = parts.singular_values.min();
    let tells_apart = least > 1e-12 * largest;
    if !tells_apart {
        return None;
    }
    let solution = parts.solve(&wanted, 0.0).ok()?;
    let left = &wanted - &design * &solution;
    let sum_of_squares = left.norm_squared();
    let (u, v) = (parts.u.as_ref()?, parts.v_t.as_ref()?.transpose());
    let scaled =
        DMatrix::from_fn(columns, columns, |row, column| v[(row, column)] / parts.singular_values[column]);
    let covariance = &scaled * scaled.transpose() * (sum_of_squares / freedom as f64);
    Some(Regression {
        terms: (0..columns)
            .map(|i| Term { value: solution[i], error: covariance[(i, i)].max(0.0).sqrt() })
            .collect(),
        residuals: (0..rows.len()).map(|row| left[row] * uncertainties[row]).collect(),
        leverages: (0..rows.len()).map(|row| u.row(row).norm_squared()).collect(),
        sum_of_squares,
        freedom,
    })
}
