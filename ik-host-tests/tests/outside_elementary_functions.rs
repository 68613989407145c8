//! ik-core's arctangents, sines and cosines against a published table, through the seam that the solver uses.
//!
//! Source: `check-values/arctan-sine-cosine.csv`, the arguments of Abramowitz & Stegun, *Handbook of Mathematical
//! Functions*, table 4.14 and its tables of sines and cosines; values recomputed with mpmath to 21 digits.

mod common;

use common::published::Table;
use ik_core::{Coarse, Fixed32, Float32, Number, Short32};
use ik_host_tests::numbers::Float64;
use std::f64::consts::TAU;

/// arctan t as the angle of the vector (1, t), in all four quadrants, rad.
fn arctangents<N: Number>(t: f64) -> [f64; 4] {
    let scale = N::scale_for(200.0).expect("a scale");
    let coord = |v: f64| N::coord_from_mm(v, scale);
    let ahead = [N::product_from_mm(100.0, scale), N::widen(N::NO_COORD)];
    let norm = f64::hypot(1.0, t);
    let (x, y) = (100.0 / norm, 100.0 * t / norm);
    [(y, x), (y, -x), (-y, x), (-y, -x)].map(|(y, x)| {
        let angle = N::turns(N::turn(ahead, [coord(x), coord(y)])) * TAU;
        // Back into the first quadrant.
        let size = angle.abs();
        let folded = if x < 0.0 { TAU / 2.0 - size } else { size };
        if (angle < 0.0) == (y < 0.0) { folded } else { f64::NAN }
    })
}

/// (sin, cos) of an angle in radians and the angle that the number system really took.
fn sine_and_cosine<N: Number>(angle: f64) -> (f64, [f64; 2]) {
    // The largest leg makes the finest steps of a ratio visible in a length.
    const FAR: f64 = 4096.0;
    let scale = N::scale_for(6_000.0).expect("a scale");
    let taken = N::angle_from_turns(angle / TAU);
    let (sin, cos) = N::sin_cos(taken);
    let far = N::coord_from_mm(FAR, scale);
    let value = |ratio| N::mm(N::length(N::narrow(N::stretch(far, ratio)), scale)) / FAR;
    (N::turns(taken) * TAU, [value(sin), value(cos)])
}

/// All rows in one number system: how far an arctangent may be off, rad, and a sine or cosine.
fn table_holds<N: Number>(arctangent: f64, sine: f64) {
    let table = Table::read("arctan-sine-cosine.csv");
    let (mut rows, mut worst) = (0, [0.0f64; 2]);
    for row in table.rows() {
        let (function, argument, value) = (row.text("fn"), row.number("arg"), row.number("value_21sig"));
        rows += 1;
        if function == "arctan" {
            for found in arctangents::<N>(argument) {
                let off = (found - value).abs();
                assert!(off <= arctangent, "{}: arctan {argument} = {found}, not {value}", N::NAME);
                worst[0] = worst[0].max(off);
            }
            continue;
        }
        let angle = if row.text("arg_unit") == "deg" { argument.to_radians() } else { argument };
        let (taken, [sin, cos]) = sine_and_cosine::<N>(angle);
        // A sine moves by no more than its angle does.
        let found = if function == "sin" { sin } else { cos };
        let off = (found - value).abs() - (taken - angle).abs();
        assert!(off <= sine, "{}: {function} {angle} = {found}, not {value}", N::NAME);
        worst[1] = worst[1].max(off);
    }
    assert_eq!(rows, 72, "rows of arctan-sine-cosine.csv");
    println!("{}: arctangents within {:.1e}, sines and cosines within {:.1e}", N::NAME, worst[0], worst[1]);
}

#[test]
fn every_row_holds_in_single_precision() {
    table_holds::<Float32>(2.4e-7, 1.2e-7);
}

#[test]
fn every_row_holds_in_fixed_point() {
    table_holds::<Fixed32>(3.5e-7, 1.6e-8);
}

#[test]
fn every_row_holds_in_short_fixed_point() {
    table_holds::<Short32>(3e-7, 1.2e-8);
}

#[test]
fn every_row_holds_in_coarse_single_precision() {
    table_holds::<Coarse>(1e-2, 2e-3);
}

#[test]
fn every_row_holds_in_double_precision() {
    table_holds::<Float64>(1e-15, 1e-15);
}
