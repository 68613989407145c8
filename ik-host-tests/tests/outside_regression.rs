//! Trimming's least squares against published worked regressions.
//!
//! - NIST/ITL, *Statistical Reference Datasets*, linear regression "Norris": certified values (from memory).
//! - F. J. Anscombe, "Graphs in Statistical Analysis", *The American Statistician* 27 (1973), first data set, with the
//!   standard errors that he gives (from memory).

mod common;

use common::published::Table;
use ik_host_tests::trim::{Regression, regress};

fn straight_line(file: &str) -> Regression {
    let table = Table::read(file);
    let (rows, values): (Vec<_>, Vec<_>) =
        table.rows().map(|row| (vec![1.0, row.number("x")], row.number("y"))).unzip();
    let ones = vec![1.0; values.len()];
    regress(&rows, &values, &ones).expect("a regression")
}

#[track_caller]
fn agrees(found: f64, published: f64, within: f64) {
    assert!((found / published - 1.0).abs() < within, "{found}, published {published}");
}

#[test]
fn norris() {
    let found = straight_line("norris.csv");
    agrees(found.terms[0].value, -0.262_323_073_774_029, 1e-10);
    agrees(found.terms[0].error, 0.232_818_234_301_152, 1e-10);
    agrees(found.terms[1].value, 1.002_116_818_020_45, 1e-12);
    agrees(found.terms[1].error, 0.429_796_848_199_937e-3, 1e-10);
    agrees(found.deviation(), 0.884_796_396_144_373, 1e-10);
    assert_eq!(found.freedom, 34);
}

#[test]
fn anscombe() {
    let found = straight_line("anscombe-first.csv");
    agrees(found.terms[0].value, 3.00, 1e-3);
    agrees(found.terms[0].error, 1.125, 1e-3);
    agrees(found.terms[1].value, 0.500, 1e-3);
    agrees(found.terms[1].error, 0.118, 3e-3);
}

#[test]
fn a_row_half_as_sure_counts_a_quarter() {
    // The weighted mean of 0 and 10 with uncertainties 1 and 2 is 2.
    let found = regress(&[vec![1.0], vec![1.0]], &[0.0, 10.0], &[1.0, 2.0]).expect("a mean");
    assert!((found.terms[0].value - 2.0).abs() < 1e-12, "{found:?}");
}

#[test]
fn columns_that_are_not_told_apart_are_refused() {
    let rows: Vec<_> = (0..5).map(|_| vec![1.0, 7.0]).collect();
    assert_eq!(regress(&rows, &[1.0, 2.0, 3.0, 4.0, 5.0], &[1.0; 5]), None);
    assert_eq!(regress(&rows[..2], &[1.0, 2.0], &[1.0; 2]), None);
}
