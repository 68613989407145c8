//! Every primitive of every number system keeps the bound that is stated of it, and no bound is twice as wide as what is
//! found; and the demo legs keep theirs. With TOEHOLD_LONG=1, over twenty million arguments per primitive.

use ik_core::{Fixed16, Fixed32, Float32, Number, Short32};
use ik_host_tests::bounds::{
    Found, LEGS, LegBound, LegFound, Primitives, Quantity, Verdict, measured, of_any, of_legs, stated,
};
use ik_host_tests::sheet::{self, NumberSystem};

fn rounds(short: u32) -> u32 {
    if std::env::var_os("TOEHOLD_LONG").is_some() { 200 * short } else { short }
}

/// What is wrong with what was found, if anything.
fn complaints(number: NumberSystem, found: &[Found]) -> Vec<String> {
    let name = number.name();
    stated(number)
        .iter()
        .zip(found)
        .filter(|(stated, found)| Verdict::of(stated.bound, found.largest) != Verdict::Holds)
        .map(|(stated, found)| {
            assert_eq!(stated.quantity, found.quantity);
            let Found { quantity, largest, at } = found;
            format!("{name}: {quantity}: {largest:e} of {:e} at {at}", stated.bound)
        })
        .collect()
}

#[test]
fn every_primitive_keeps_its_bound_and_no_bound_is_slack() {
    let all: Vec<_> = NumberSystem::ALL
        .into_iter()
        .flat_map(|number| complaints(number, &measured(number, rounds(100_000), 7)))
        .collect();
    assert!(all.is_empty(), "{all:#?}");
}

/// The error of this quantity is noticed if the primitive is off by twice its bound.
fn is_noticed<N: Number>(number: NumberSystem, quantity: Quantity, worse: &Primitives<N>) {
    let found = of_any(worse, 5_000, 7);
    let of_it = &found[quantity as usize];
    let bound = stated(number)[quantity as usize].bound;
    assert_eq!(Verdict::of(bound, of_it.largest), Verdict::Exceeded, "{}: {of_it:?}", number.name());
}

#[test]
fn a_primitive_that_is_off_by_twice_its_bound_is_noticed() {
    // Twice the bound of a turn of `fixed32` are 2e-6 rad: 1340 steps of an angle.
    let turn = |from, to| {
        let angle = Fixed32::turn(from, to);
        Fixed32::angle_sum(angle, Fixed32::angle_from_turns(2.0 * 9.8e-7 / std::f64::consts::TAU))
    };
    is_noticed(NumberSystem::Fixed32, Quantity::Turn, &Primitives { turn, ..Primitives::<Fixed32>::own() });
    let knee = |n, m, unit, scale| {
        let mut knee = Short32::knee(n, m, unit, scale);
        knee.half_sine += Short32::ratio_from(4.8e-7);
        knee
    };
    is_noticed(
        NumberSystem::Short32,
        Quantity::HalfSine,
        &Primitives { knee, ..Primitives::<Short32>::own() },
    );
    let root =
        |square, scale| Fixed16::root(square, scale) + Fixed16::coord_from_mm(2.0 * 5.6e-5 * 227.0, scale);
    is_noticed(NumberSystem::Fixed16, Quantity::Root, &Primitives { root, ..Primitives::<Fixed16>::own() });
    let sin_cos = |angle| {
        let (sine, cosine) = Float32::sin_cos(angle);
        (sine + 2.56e-7, cosine)
    };
    is_noticed(
        NumberSystem::Float32,
        Quantity::Sine,
        &Primitives { sin_cos, ..Primitives::<Float32>::own() },
    );
}

#[test]
fn a_bound_of_more_than_twice_what_is_found_is_slack() {
    assert_eq!(Verdict::of(1.0, 0.49), Verdict::Slack);
    assert_eq!(Verdict::of(1.0, 0.5), Verdict::Holds);
    assert_eq!(Verdict::of(1.0, 1.0), Verdict::Holds);
    assert_eq!(Verdict::of(1.0, 1.01), Verdict::Exceeded);
    assert_eq!(Verdict::of(1.0, f64::NAN), Verdict::Exceeded);
}

#[test]
fn the_demo_legs_keep_their_bounds_and_no_bound_is_slack() {
    let demos = sheet::DEMOS.iter().map(|demo| sheet::demo(demo.name).expect("a demo's sheet"));
    let found: Vec<_> =
        demos.flat_map(|robot| of_legs(&robot, rounds(100_000), 7).expect("its legs")).collect();
    for bound in LEGS {
        let of_it: Vec<&LegFound> =
            found.iter().filter(|found| found.number == bound.number.name()).collect();
        assert_eq!(of_it.len(), 2, "{:?}", bound.number);
        type Of<T> = fn(&T) -> f64;
        let each: [(&str, Of<LegFound>, Of<LegBound>); 3] = [
            ("joint", |found| found.joint_rad, |bound| bound.joint_rad),
            ("knee near an end", |found| found.near_an_end_rad, |bound| bound.near_an_end_rad),
            ("foot", |found| found.foot_of_reach, |bound| bound.foot_of_reach),
        ];
        for (what, of_found, of_bound) in each {
            let largest = of_it.iter().map(|found| of_found(found)).fold(0.0, f64::max);
            let verdict = Verdict::of(of_bound(&bound), largest);
            assert_eq!(
                verdict,
                Verdict::Holds,
                "{:?}: {what}: {largest:e} of {:e}",
                bound.number,
                of_bound(&bound)
            );
        }
    }
}
