//! Interval arithmetic against the multiprecision reference: every enclosure holds the exact result of every pair of numbers
//! in its operands.

use dashu_float::FBig;
use dashu_float::round::mode::HalfEven;
use ik_host_tests::certify::interval::Interval;
use proptest::prelude::*;

/// 256 bits.
type Exact = FBig<HalfEven>;

fn exact(value: f64) -> Exact {
    Exact::try_from(value).unwrap().with_precision(256).value()
}

fn holds(interval: Interval, value: &Exact) -> bool {
    exact(interval.low) <= *value && *value <= exact(interval.high)
}

/// An interval of any width, and two numbers in it: an end or something between.
fn within() -> impl Strategy<Value = (Interval, f64)> {
    let size = prop_oneof![-1e3..1e3f64, -1e-6..1e-6f64, -1.0..1.0f64];
    let width = prop_oneof![Just(0.0), 0.0..1e-12f64, 0.0..1.0f64, 0.0..100.0f64];
    (size, width, 0.0..=1.0f64).prop_map(|(low, width, share)| {
        let interval = Interval::new(low, low + width);
        (interval, (low + width * share).clamp(interval.low, interval.high))
    })
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, cases: 2_000, ..ProptestConfig::default() })]

    #[test]
    fn sums_products_and_squares_hold_the_exact_ones((a, x) in within(), (b, y) in within()) {
        let (left, right) = (exact(x), exact(y));
        prop_assert!(holds(a + b, &(&left + &right)));
        prop_assert!(holds(a - b, &(&left - &right)));
        prop_assert!(holds(a * b, &(&left * &right)));
        prop_assert!(holds(-a, &-left.clone()));
        prop_assert!(holds(a.square(), &(&left * &left)));
        prop_assert!(a.size() >= x.abs() && a.least_size() <= x.abs());
        prop_assert!(a.widened(1e-3).holds(x + 9e-4) && a.widened(1e-3).holds(x - 9e-4));
    }

    #[test]
    fn roots_and_quotients_hold_the_exact_ones((a, x) in within(), (b, y) in within()) {
        // x ≤ high² and x ≥ low², exactly.
        let root = a.root();
        let (low, high) = (exact(root.low), exact(root.high));
        let value = exact(x.max(0.0));
        prop_assert!(&low * &low <= value && value <= &high * &high);
        if b.low > 0.0 {
            let (quotient, divisor) = (a.over(b), exact(y));
            prop_assert!(&exact(quotient.low) * &divisor <= exact(x));
            prop_assert!(exact(x) <= &exact(quotient.high) * &divisor);
        }
    }

    /// By the tangent and by the law of sines: a direction that is held has both of its neighbours on the right sides.
    #[test]
    fn directions_and_their_functions_hold_the_exact_ones((a, x) in within(), (b, y) in within()) {
        let direction = Interval::direction([a, b]);
        if x != 0.0 || y != 0.0 {
            let (lowest, highest) = (direction.low, direction.high);
            let width = highest - lowest;
            // What is left of the least direction, and right of the largest, by cross products with 256 bits.
            if width < 3.0 {
                let side = |angle: f64| {
                    let (sine, cosine) = sine_and_cosine(angle);
                    &cosine * &exact(y) - &sine * &exact(x)
                };
                let nothing = exact(0.0);
                prop_assert!(side(lowest) >= nothing && side(highest) <= nothing);
            }
        }
        let (sine, cosine) = sine_and_cosine(x / 200.0);
        let angles = Interval::new(a.low / 200.0, a.high / 200.0).widened(1e-16);
        prop_assert!(holds(angles.sine(), &sine) && holds(angles.cosine(), &cosine));
        let arc = Interval::new((a.low / 1e3).clamp(-1.0, 1.0), (a.high / 1e3).clamp(-1.0, 1.0));
        let (low, _) = sine_and_cosine(arc.arc_sine().low.max(-1.57));
        let (high, _) = sine_and_cosine(arc.arc_sine().high.min(1.57));
        if arc.low > -0.999 && arc.high < 0.999 {
            prop_assert!(low <= exact(arc.low) && exact(arc.high) <= high);
        }
    }
}

/// Taylor's series, which after halving thrice and forty terms leaves less than 256 bits; angles of less than two turns.
fn sine_and_cosine(angle: f64) -> (Exact, Exact) {
    const HALVINGS: usize = 8;
    let small = exact(angle) / exact(f64::from(1u32 << HALVINGS));
    let square = &small * &small;
    let (mut sine, mut cosine) = (exact(0.0), exact(0.0));
    let (mut odd, mut even) = (small.clone(), exact(1.0));
    for k in 0..30u32 {
        sine += &odd;
        cosine += &even;
        let next = f64::from(2 * k + 1) * f64::from(2 * k + 2);
        even = -(even * &square / exact(next));
        let next = f64::from(2 * k + 2) * f64::from(2 * k + 3);
        odd = -(odd * &square / exact(next));
    }
    for _ in 0..HALVINGS {
        let doubled = exact(2.0) * &sine * &cosine;
        cosine = exact(1.0) - exact(2.0) * &sine * &sine;
        sine = doubled;
    }
    (sine, cosine)
}

#[test]
fn the_series_is_what_it_says() {
    let (sine, cosine) = sine_and_cosine(1.0);
    // sin 1 and cos 1 to 20 digits: Abramowitz and Stegun, Handbook of Mathematical Functions, table 4.6; from memory.
    let close = |value: &Exact, digits: &str| {
        let wanted: f64 = digits.parse().unwrap();
        (value.to_f64().value() - wanted).abs() < 1e-16
    };
    assert!(close(&sine, "0.84147098480789650665"));
    assert!(close(&cosine, "0.54030230586813971740"));
    assert!((&sine * &sine + &cosine * &cosine - exact(1.0)).to_f64().value().abs() < 1e-60);
}
