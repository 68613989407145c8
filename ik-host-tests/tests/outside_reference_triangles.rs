//! The knee of the references against triangles from outside the project.
//!
//! Sources: `check-values/needle-triangles.csv`, the table of Kahan, "Miscalculating Area and
//! Angles of a Needle-like Triangle" (1999), its angles recomputed to 20 digits;
//! `check-values/integer-triangles.csv`, integer sides with rational cosines, by exact arithmetic.
//! Sides a and b are the links, c the line from hip to foot: the angle C between the links is
//! π less the flexion.

use std::f64::consts::PI;

use ik_host_tests::reference::closed_form::corners_of_triangle;
use ik_host_tests::reference::{Bend, Leg, Shape, Verdict, multiprecision, solve};

fn records(file: &str) -> Vec<csv::StringRecord> {
    let path = format!("{}/check-values/{file}", env!("CARGO_MANIFEST_DIR"));
    csv::Reader::from_path(path).unwrap().records().map(Result::unwrap).collect()
}

/// A decimal as an integer of 10⁻⁷ units: exact, where binary fractions are not.
fn scaled(decimal: &str) -> f64 {
    let (whole, fraction) = decimal.split_once('.').unwrap_or((decimal, ""));
    assert!(fraction.len() <= 7, "{decimal}");
    let digits = format!("{whole}{fraction:0<7}");
    let integer: i64 = digits.parse().unwrap();
    assert!(integer.abs() < 1 << 53, "{decimal} is not exact in f64 when scaled");
    integer as f64
}

fn hanging(thigh: f64, shank: f64) -> Leg {
    Leg { shape: Shape::Roll, offset: 0.0, thigh, shank, bend: Bend::Forward }
}

/// Flexion of a leg with these links and its foot `span` straight below the hip, by the closed
/// form and by 256 bits, with the closed form's verdict.
fn flexions(thigh: f64, shank: f64, span: f64) -> (f64, f64, Verdict) {
    let leg = hanging(thigh, shank);
    leg.check().unwrap();
    let target = [0.0, 0.0, -span];
    let found = solve(&leg, target);
    let exact = multiprecision::solve(&leg, target).unwrap();
    (found.pose.knee, exact.pose.rounded().knee, found.verdict)
}

#[test]
fn every_needle_triangle_gives_its_published_angle_or_is_refused() {
    let (mut angles, mut refused) = (0, 0);
    for record in records("needle-triangles.csv") {
        let number = &record[0];
        let [a, b, c] = [1, 2, 3].map(|column| scaled(&record[column]));
        if &record[4] == "not a triangle" {
            refused += 1;
            // A side below zero is no link; a side too long for the others is out of reach.
            if a > 0.0 {
                let (flexion, exact, verdict) = flexions(a, b, c);
                assert_eq!((flexion, exact, verdict), (0.0, 0.0, Verdict::Moved), "row {number}");
            } else {
                assert!(hanging(a, b).check().is_err(), "row {number}");
            }
            continue;
        }
        angles += 1;
        let angle: f64 = record[6].parse().unwrap();
        let (flexion, exact, verdict) = flexions(a, b, c);
        assert_eq!(verdict, Verdict::Reached, "row {number}");
        // Near-folded needles leave π − C only π's last place; near-straight ones keep theirs.
        let allowed = 2.0 * f64::EPSILON;
        assert!((flexion - (PI - angle)).abs() <= allowed, "row {number}: {flexion}");
        assert!((exact - (PI - angle)).abs() <= allowed, "row {number}: {exact}");
        // The corner itself is good to its own last places, be it 2e-10 rad small.
        let corner = corners_of_triangle(a, b, c).knee;
        assert!(
            (corner - angle).abs() <= 4.0 * f64::EPSILON * angle,
            "row {number}: {corner:e}, not {angle:e}"
        );
        // And the area, from the two sides and the corner between them.
        let area: f64 = record[5].parse().unwrap();
        let found = 0.5 * a * b * corner.sin() * 1e-14;
        assert!(
            (found - area).abs() <= 8.0 * f64::EPSILON * area + 1e-30 * a * b,
            "row {number}: {found:e}, not {area:e}"
        );
    }
    assert_eq!((angles, refused), (10, 2));
}

#[test]
fn every_integer_triangle_gives_its_rational_cosine_and_half_tangent() {
    let fraction = |text: &str| {
        let (over, under) = text.split_once('/').unwrap_or((text, "1"));
        over.parse::<f64>().unwrap() / under.parse::<f64>().unwrap()
    };
    let records = records("integer-triangles.csv");
    assert_eq!(records.len(), 21);
    for record in records {
        let [a, b, c] = [0, 1, 2].map(|column| record[column].parse::<f64>().unwrap());
        let angle: f64 = record[6].parse().unwrap();
        let (flexion, exact, verdict) = flexions(a, b, c);
        assert_eq!(verdict, Verdict::Reached, "{record:?}");
        assert!((flexion - (PI - angle)).abs() <= 2.0 * f64::EPSILON, "{record:?}: {flexion}");
        assert!((exact - (PI - angle)).abs() <= 2.0 * f64::EPSILON, "{record:?}: {exact}");
        let corner = corners_of_triangle(a, b, c).knee;
        let near = |found: f64, published: &str| {
            let off = (found - fraction(published)).abs();
            assert!(off <= 4.0 * f64::EPSILON, "{record:?}: {found}, not {published}");
        };
        near(corner.cos(), &record[3]);
        near(corner.sin(), &record[4]);
        near((corner / 2.0).tan(), &record[5]);
    }
}

#[test]
fn all_three_corners_of_a_triangle_make_half_a_turn() {
    // Euclid, Elements I.32.
    for (a, b, c) in [(3.0, 4.0, 5.0), (13.0, 14.0, 15.0), (94.0, 107.0, 200.99)] {
        let at_hip = corners_of_triangle(a, b, c);
        let from_the_other_end = corners_of_triangle(b, a, c);
        let sum = at_hip.hip + at_hip.knee + from_the_other_end.hip;
        assert!((sum - PI).abs() <= 4.0 * f64::EPSILON, "{sum}");
    }
}
