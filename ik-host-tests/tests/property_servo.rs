//! Promise: a servo's pulse follows the joint's angle without a step back, never leaves its range, and comes back
//! through the angle as it was; a servo that cannot be is refused.

mod common;

use common::checks::servo;
use common::effort::{cases, rounds};
use common::legs::Sweep;
use common::servo::{ServoModel, core};
use common::solver::NumberSystem;
use ik_core::{End, Fixed32, Float32, Pulse, Servo, ServoError, ServoSpec, Turns};
use proptest::prelude::*;
use std::f64::consts::PI;

/// A servo's measures from numbers in 0 to 1.
fn spec_of([a, b, c, d, e, f]: [f64; 6], against: bool) -> ServoSpec {
    let shortest = 100.0 + 1400.0 * a;
    let longest = shortest + 1.0 + 2000.0 * b;
    let neutral = shortest + (longest - shortest) * c;
    let trim_us = (neutral - shortest).min(longest - neutral) * (2.0 * d - 1.0);
    ServoSpec {
        centre_us: neutral - trim_us,
        trim_us,
        joint_at_centre_deg: 360.0 * e - 180.0,
        // 1 to 30 us per degree, mostly about ten; the ends of what there is have a test of their own.
        us_per_degree: 30f64.powf(f),
        turns: if against { Turns::Against } else { Turns::With },
        pulse_us: [shortest, longest],
    }
}

fn any_servo() -> impl Strategy<Value = ServoSpec> {
    (prop::array::uniform6(0.0..1.0), any::<bool>()).prop_map(|(units, against)| spec_of(units, against))
}

fn every_number(
    spec: ServoSpec,
    check: impl Fn(&dyn ServoModel) -> Result<(), String>,
) -> Result<(), String> {
    NumberSystem::ALL
        .into_iter()
        .try_for_each(|number| check(&*core(number, spec).map_err(|error| format!("{spec:?}: {error}"))?))
}

proptest! {
    #![proptest_config(cases(4_000))]

    #[test]
    fn pulses_are_right_and_within_their_range(spec in any_servo(), angle in -PI..PI) {
        prop_assert_eq!(every_number(spec, |servo| servo::check(servo, angle)), Ok(()));
        prop_assert_eq!(every_number(spec, |servo| servo::check_back(servo, angle, 0.0)), Ok(()));
    }

    #[test]
    fn pulses_follow_angles_without_a_step_back(
        spec in any_servo(),
        angle in -PI..PI,
        apart in prop_oneof![0.0..2.0 * PI, (-10.0..-2.0).prop_map(|e: f64| 10f64.powf(e))],
    ) {
        let other = (angle + apart).min(PI);
        prop_assert_eq!(every_number(spec, |servo| servo::check_monotone(servo, angle, other)), Ok(()));
    }

    #[test]
    fn gains_at_the_ends_of_what_there_is_hold_too(
        gain in prop::sample::select(vec![0.1, 90.0]),
        angle in -PI..PI,
        other in -PI..PI,
        against in any::<bool>(),
    ) {
        let turns = if against { Turns::Against } else { Turns::With };
        let spec = ServoSpec { us_per_degree: gain, turns, pulse_us: [0.0, 32_767.0], ..ServoSpec::COMMON };
        prop_assert_eq!(every_number(spec, |servo| servo::check(servo, angle)), Ok(()));
        prop_assert_eq!(every_number(spec, |servo| servo::check_monotone(servo, angle, other)), Ok(()));
        // Over many turns' worth of pulse, the way back is worth less.
        prop_assert_eq!(every_number(spec, |servo| servo::check_back(servo, angle, 0.01)), Ok(()));
    }

    /// The pulse of a pulse's angle, for any pulse there is, also outside the range: an angle, and then a pulse.
    #[test]
    fn any_pulse_has_an_angle(spec in any_servo(), steps in any::<u32>()) {
        let finite = every_number(spec, |servo| {
            let angle = servo.angle(Pulse::from_steps(steps));
            if angle.abs() < PI + 1e-6 { Ok(()) } else { Err(format!("{angle}")) }
        });
        prop_assert_eq!(finite, Ok(()));
    }
}

#[test]
fn the_bounds_of_pulses_hold_over_a_dense_sweep_and_are_no_larger_than_they_need_be() {
    for number in NumberSystem::ALL {
        let bound = number.bounds().servo;
        let mut sweep = Sweep::from_seed(9);
        let (mut pulse_error, mut back) = (0.0f64, 0.0f64);
        for _ in 0..rounds(2_000) {
            let spec = spec_of([0; 6].map(|_| sweep.within(0.0, 1.0)), sweep.bits() & 1 == 0);
            let servo = core(number, spec).expect("a servo");
            let steps_of_a_radian = 65_536.0 * spec.us_per_degree.to_degrees();
            for _ in 0..100 {
                let angle = sweep.within(-PI, PI);
                // Less the step of the pulse itself.
                pulse_error = pulse_error.max(servo::pulse_error(&*servo, angle) - 2.0 / steps_of_a_radian);
                let pulse = servo.command(angle).0;
                if let Some(off) = servo::there_and_back(&*servo, pulse) {
                    back = back.max(off - 2.0 / steps_of_a_radian);
                }
            }
        }
        println!("{number:?}: pulse off by {pulse_error:.2e} of a radian's, there and back by {back:.2e}");
        let worst = pulse_error.max(back);
        assert!(worst <= bound, "{number:?}: {worst:e} of {bound:e}");
        // `f64` has no error to find beside the step of the pulse.
        assert!(
            worst > 0.5 * bound || bound < 1e-14,
            "{number:?}: {worst:e}: the bound {bound:e} is too wide"
        );
    }
}

/// A common servo's pulse, to the tenth of a microsecond that a good timer has and far below, there and back.
#[test]
fn a_common_servos_pulses_come_back_to_a_thousandth_of_a_microsecond() {
    for number in NumberSystem::ALL {
        let servo = core(number, ServoSpec::COMMON).expect("a servo");
        let [shortest, longest] = servo.pulse_range();
        let mut worst = 0.0f64;
        for steps in (shortest.steps()..=longest.steps()).step_by(997) {
            let pulse = Pulse::from_steps(steps);
            worst = worst.max((servo.command(servo.angle(pulse)).0.us() - pulse.us()).abs());
        }
        println!("{number:?}: a common servo's pulses come back within {worst:.1e} us");
        assert!(worst < 1e-3, "{number:?}: {worst} us");
    }
}

#[test]
fn angles_beyond_the_range_are_held_at_the_right_end() {
    for number in NumberSystem::ALL {
        for (turns, high, low) in
            [(Turns::With, End::Most, End::Least), (Turns::Against, End::Least, End::Most)]
        {
            let servo = core(number, ServoSpec { turns, ..ServoSpec::COMMON }).expect("a servo");
            assert_eq!(servo.command(1.0).1, Some(high), "{number:?} {turns:?}");
            assert_eq!(servo.command(-1.0).1, Some(low), "{number:?} {turns:?}");
            assert_eq!(servo.command(0.5).1, None, "{number:?} {turns:?}");
        }
    }
}

#[test]
fn a_servo_that_cannot_be_is_refused() {
    let good = ServoSpec::COMMON;
    let nan = f64::NAN;
    let with_range = |pulse_us| ServoSpec { pulse_us, ..good };
    let cases = [
        (with_range([2000.0, 1000.0]), ServoError::PulseRange),
        (with_range([nan, 2000.0]), ServoError::PulseRange),
        (with_range([1000.0, nan]), ServoError::PulseRange),
        (with_range([-1.0, 2000.0]), ServoError::PulseRange),
        (with_range([1000.0, 32_768.0]), ServoError::PulseRange),
        (with_range([1000.0, f64::INFINITY]), ServoError::PulseRange),
        (with_range([1600.0, 2000.0]), ServoError::Centre),
        (ServoSpec { centre_us: nan, ..good }, ServoError::Centre),
        (ServoSpec { trim_us: nan, ..good }, ServoError::Centre),
        (ServoSpec { trim_us: 501.0, ..good }, ServoError::Centre),
        (ServoSpec { us_per_degree: nan, ..good }, ServoError::Gain),
        (ServoSpec { us_per_degree: 0.0, ..good }, ServoError::Gain),
        (ServoSpec { us_per_degree: -10.0, ..good }, ServoError::Gain),
        (ServoSpec { us_per_degree: 90.1, ..good }, ServoError::Gain),
        (ServoSpec { us_per_degree: f64::INFINITY, ..good }, ServoError::Gain),
        (ServoSpec { joint_at_centre_deg: nan, ..good }, ServoError::JointAtCentre),
        (ServoSpec { joint_at_centre_deg: 180.1, ..good }, ServoError::JointAtCentre),
    ];
    for (spec, error) in cases {
        for number in NumberSystem::ALL {
            assert_eq!(core(number, spec).err(), Some(error), "{number:?}: {spec:?}");
        }
        // What firmware calls while compiling is another text of the same.
        assert_eq!(Servo::<Fixed32>::new(spec), Err(error), "{spec:?}");
        assert_eq!(Servo::<Float32>::new(spec), Err(error), "{spec:?}");
    }
}

/// A servo that is made while compiling is the one that is made while running.
#[test]
fn constant_servos_are_the_same() {
    const FIXED: Result<Servo<Fixed32>, ServoError> = Servo::<Fixed32>::new(ServoSpec::COMMON);
    const FLOAT: Result<Servo<Float32>, ServoError> = Servo::<Float32>::new(ServoSpec::COMMON);
    assert_eq!(FIXED, Servo::from_spec(ServoSpec::COMMON));
    assert_eq!(FLOAT, Servo::from_spec(ServoSpec::COMMON));
    assert!(FIXED.is_ok() && FLOAT.is_ok());
}
