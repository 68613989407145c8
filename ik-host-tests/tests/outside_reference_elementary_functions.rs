//! The 256-bit reference's functions, and the machine's f64 ones, against handbook tables.
//!
//! Source: `check-values/arctan-sine-cosine.csv`, the arguments of Abramowitz & Stegun, *Handbook
//! of Mathematical Functions*, table 4.14 and its tables of sines and cosines, the values
//! recomputed with mpmath to 21 digits.

use std::str::FromStr;

use dashu_float::DBig;
use ik_host_tests::reference::multiprecision::{self, BITS, Real};

/// A decimal as a 256-bit number.
fn decimal(text: &str) -> Real {
    let exact = DBig::from_str(text).unwrap();
    exact.with_rounding().with_base_and_precision::<2>(BITS).value()
}

fn records() -> Vec<csv::StringRecord> {
    let path = concat!(env!("CARGO_MANIFEST_DIR"), "/check-values/arctan-sine-cosine.csv");
    let records: Vec<_> = csv::Reader::from_path(path).unwrap().records().map(Result::unwrap).collect();
    assert_eq!(records.len(), 72);
    records
}

#[test]
fn arctangent_sine_cosine_and_arccosine_in_256_bits_match_the_tables_to_21_digits() {
    let one = decimal("1");
    for record in records() {
        let value = decimal(&record[3]);
        let argument = match &record[2] {
            "deg" => decimal(&record[1]) * multiprecision::pi() / decimal("180"),
            _ => decimal(&record[1]),
        };
        let mut found = vec![match &record[0] {
            "arctan" => multiprecision::angle_of(&argument, &one),
            "sin" => argument.sin_cos().0,
            "cos" => argument.sin_cos().1,
            other => panic!("unknown function {other}"),
        }];
        if &record[0] == "arctan" {
            // The same angle by the arccosine: cos(arctan t) = 1 / √(1 + t²).
            let hypotenuse = (&argument * &argument + &one).sqrt();
            found.push(multiprecision::arccosine(&(&one / hypotenuse)));
        }
        for found in found {
            let off = multiprecision::to_f64(&(found - &value)).abs();
            let allowed = 5e-21 * multiprecision::to_f64(&value).abs().max(1e-9);
            assert!(off <= allowed, "{record:?}: off by {off:e}");
        }
    }
}

#[test]
fn the_machines_arctangent_sine_and_cosine_match_the_tables_to_their_last_places() {
    for record in records() {
        let value: f64 = record[3].parse().unwrap();
        let argument: f64 = record[1].parse().unwrap();
        let radians = if &record[2] == "deg" { argument.to_radians() } else { argument };
        let found = match &record[0] {
            "arctan" => radians.atan2(1.0),
            "sin" => radians.sin(),
            "cos" => radians.cos(),
            other => panic!("unknown function {other}"),
        };
        // The argument itself is rounded: an error of half its last place goes through.
        let allowed = f64::EPSILON * (value.abs() + radians.abs().min(3.2));
        assert!((found - value).abs() <= allowed, "{record:?}: {found}");
    }
}

#[test]
fn pi_in_256_bits_is_pi() {
    // Fifty decimals as in any handbook (Abramowitz & Stegun, table 1.1); from memory.
    let published = decimal("3.14159265358979323846264338327950288419716939937510");
    let off = multiprecision::to_f64(&(multiprecision::pi() - published)).abs();
    assert!(off < 1e-50, "{off:e}");
}
