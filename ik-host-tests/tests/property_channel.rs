//! Promise: a channel's counts are the nearest whole ones to a measured servo's pulse, in every number system; they never
//! leave the pulses that may be sent, never step back, come back through the angle as they were, and tell when they were
//! held.

mod common;

use common::channel::{AnyOutput, Measured, in_every_number};
use common::checks::channel;
use common::effort::rounds;
use common::legs::Sweep;
use ik_core::{
    Angle, Channel, Coarse, Counting, Curve, Fixed16, Fixed32, Float32, MeasuredServo, Number, Servo,
    ServoError, ServoSpec, Short32, Timer, Turns,
};
use ik_host_tests::numbers::Float64;

fn timer() -> Timer {
    Timer::finest(48_000_000, 16, 50.0).expect("a timer")
}

#[test]
fn counts_are_right_within_their_range_and_follow_angles_without_a_step_back() {
    let mut sweep = Sweep::from_seed(41);
    for _ in 0..rounds(1_500) {
        let (servo, output) = (Measured::random(&mut sweep), AnyOutput::random(&mut sweep));
        for model in in_every_number(&servo, output).expect("a channel") {
            channel::check_ends(&*model, &servo, &output).unwrap();
            for _ in 0..40 {
                let degrees = sweep.within(-180.0, 180.0);
                let other = degrees + 10f64.powf(sweep.within(-6.0, 2.3));
                channel::check(&*model, &servo, &output, degrees).unwrap();
                channel::check_monotone(&*model, &servo, degrees, other).unwrap();
            }
            // Where two stretches meet, each step of the number system.
            for [_, degrees] in &servo.points {
                for step in -4..4 {
                    let at = |step: i32| degrees + f64::from(step) * 3e-6;
                    channel::check(&*model, &servo, &output, at(step)).unwrap();
                    channel::check_monotone(&*model, &servo, at(step), at(step + 1)).unwrap();
                }
            }
        }
    }
}

#[test]
fn every_count_comes_back_through_its_angle() {
    let mut sweep = Sweep::from_seed(42);
    for _ in 0..rounds(60) {
        let (servo, output) = (Measured::random(&mut sweep), AnyOutput::random(&mut sweep));
        for model in in_every_number(&servo, output).expect("a channel") {
            let [least, most] = model.range();
            for counts in least..=most {
                // Half a turn ends the way back.
                if model.back(counts).abs() < 179.9 {
                    channel::check_back(&*model, &servo, &output, counts).unwrap();
                }
            }
        }
    }
}

/// The same servo without an output: its pulse is right, within what may be sent, never steps back, and comes back.
#[test]
fn pulses_of_measured_servos_are_right_too() {
    fn check<N: Number>(servo: &Measured, sweep: &mut Sweep, parts_of_a_turn: f64) {
        let model = Servo::<N, 14>::from_curve(&servo.curve().expect("a curve")).expect("a servo");
        let [shortest, longest] = servo.sent_us();
        // A step of the pulse, what the gain's rounding comes to over the longest stretch, and a bend at the nearest angle.
        let slack = 2.0 / 65_536.0 + parts_of_a_turn * 360.0 * servo.steepest();
        for _ in 0..100 {
            let angle =
                |degrees: f64| Angle::<N>::from_degrees(degrees.clamp(-180.0, 180.0)).expect("an angle");
            let from = angle(sweep.within(-180.0, 180.0));
            let command = model.command(from);
            let exact = servo.us_at(from.degrees()).clamp(shortest, longest);
            let off = (command.pulse.us() - exact).abs();
            assert!(off <= slack, "{}: {servo:?} {}: {off} us off", N::NAME, from.degrees());
            let [least, most] = model.pulse_range();
            assert!((least..=most).contains(&command.pulse), "{}: {servo:?}", N::NAME);
            let other = model.command(angle(from.degrees() + 10f64.powf(sweep.within(-5.0, 2.0)))).pulse;
            let (low, high) = if servo.falls() { (other, command.pulse) } else { (command.pulse, other) };
            assert!(low <= high, "{}: {servo:?} {}: a step back", N::NAME, from.degrees());
            let back = model.angle(command.pulse);
            if command.held.is_none() && back.degrees().abs() < 179.9 {
                let off = (model.command(back).pulse.us() - command.pulse.us()).abs();
                assert!(off <= 2.0 * slack, "{}: {servo:?}: {off} us there and back", N::NAME);
            }
        }
    }
    let mut sweep = Sweep::from_seed(44);
    for _ in 0..rounds(600) {
        let servo = Measured::random(&mut sweep);
        check::<Float32>(&servo, &mut sweep, 3e-7);
        check::<Coarse>(&servo, &mut sweep, 3e-7);
        check::<Fixed32>(&servo, &mut sweep, 3e-8);
        check::<Short32>(&servo, &mut sweep, 3e-8);
        check::<Fixed16>(&servo, &mut sweep, 1.0 / 65_536.0);
        check::<Float64>(&servo, &mut sweep, 1e-14);
    }
}

/// The bounds in the docs of `channel`, and that they are no more than twice as wide as they need be.
#[test]
fn the_bounds_of_counts_hold_over_a_dense_sweep_and_are_no_larger_than_they_need_be() {
    let mut sweep = Sweep::from_seed(43);
    let mut worst = std::collections::BTreeMap::<&'static str, (f64, f64)>::new();
    for _ in 0..rounds(12_000) {
        let at = sweep.within(-170.0, 60.0);
        let (from_us, gain) = (sweep.within(300.0, 1000.0), 10f64.powf(sweep.within(-0.7, 1.2)));
        let points = vec![[from_us, at], [from_us + 110.0 * gain, at + 110.0]];
        let servo = Measured { points, trim_us: 0.0, pulse_us: [0.0, 4000.0] };
        // Fine enough that what is beyond a half is seen, and a little above a power of two, where a line in fixed point
        // has the fewest bits.
        let per_clock =
            channel::width(&servo, &AnyOutput::Timer(Timer::new(1_000_000, 1, 32, 50.0).expect("a timer")));
        let wanted = 2f64.powi(18) * sweep.within(1.0, 1.06);
        let clock_hz = (1e6 * wanted / per_clock) as u32;
        let output = AnyOutput::Timer(Timer::new(clock_hz, 1, 32, 50.0).expect("a timer"));
        let width = channel::width(&servo, &output);
        for model in in_every_number(&servo, output).expect("a channel") {
            let entry = worst.entry(model.name()).or_insert((0.0, model.bound()));
            for _ in 0..100 {
                let beyond = channel::off(&*model, &servo, &output, sweep.within(at, at + 110.0)) - 0.5;
                entry.0 = entry.0.max(beyond / width);
            }
        }
    }
    for (name, (beyond, bound)) in &worst {
        println!("{name}: at most 2^{:.2} w beyond a half, of 2^{:.2}", beyond.log2(), bound.log2());
    }
    for (name, (beyond, bound)) in worst {
        assert!(beyond <= bound, "{name}");
        assert!(beyond > bound / 2.0 || bound < 1e-13, "{name}: the bound is too wide");
    }
}

/// Room for more bends than a curve has changes nothing.
#[test]
fn room_to_spare_changes_no_count_and_no_angle() {
    fn check<N: Number>() {
        let points = [[700.0, -71.0], [1100.0, -30.0], [1900.0, 38.0], [2300.0, 80.0]];
        let curve = MeasuredServo { points: &points, trim_us: 3.5, pulse_us: [650.0, 2250.0] }
            .curve()
            .expect("a curve");
        let counting = timer().counting();
        let tight = Channel::<N, 2>::from_curve(&curve, counting).expect("a channel");
        let wide = Channel::<N, 14>::from_curve(&curve, counting).expect("a channel");
        let (tight_servo, wide_servo) = (
            Servo::<N, 2>::from_curve(&curve).expect("a servo"),
            Servo::<N, 14>::from_curve(&curve).expect("a servo"),
        );
        assert_eq!(Channel::<N, 1>::from_curve(&curve, counting), Err(ServoError::Bends));
        assert_eq!(Servo::<N, 1>::from_curve(&curve), Err(ServoError::Bends));
        for step in -1800..=1800 {
            let angle = Angle::from_degrees(f64::from(step) / 10.0).expect("an angle");
            assert_eq!(tight.command(angle), wide.command(angle), "{step}");
            let command = tight_servo.command(angle);
            assert_eq!(command, wide_servo.command(angle), "{step}");
            assert_eq!(tight_servo.angle(command.pulse), wide_servo.angle(command.pulse), "{step}");
        }
    }
    check::<Float32>();
    check::<Fixed32>();
    check::<Short32>();
    check::<Fixed16>();
}

const CURVE: Curve = {
    let measured = MeasuredServo {
        points: &[[700.0, 71.0], [1100.0, 30.0], [1900.0, -38.0]],
        trim_us: 0.0,
        pulse_us: [0.0, 3000.0],
    };
    match measured.curve() {
        Ok(curve) => curve,
        Err(error) => panic!("{}", error.message()),
    }
};
const COUNTING: Counting = match Timer::finest(48_000_000, 16, 50.0) {
    Ok(timer) => timer.counting(),
    Err(error) => panic!("{}", error.message()),
};

/// A channel that is made while compiling is the one that is made while running.
#[test]
fn constant_channels_are_the_same() {
    macro_rules! check {
        ($number:ty) => {{
            const BENT: Result<Channel<$number, 3>, ServoError> = Channel::<$number, 3>::of(&CURVE, COUNTING);
            const STRAIGHT: Result<Channel<$number>, ServoError> =
                Channel::<$number>::new(ServoSpec::COMMON, COUNTING);
            const SERVO: Result<Servo<$number, 1>, ServoError> = Servo::<$number, 1>::of(&CURVE);
            assert_eq!(BENT, Channel::from_curve(&CURVE, COUNTING));
            assert_eq!(STRAIGHT, Channel::from_spec(ServoSpec::COMMON, COUNTING));
            assert_eq!(SERVO, Servo::from_curve(&CURVE));
            assert!(BENT.is_ok() && STRAIGHT.is_ok() && SERVO.is_ok());
        }};
    }
    check!(Float32);
    check!(Fixed32);
    check!(Short32);
    check!(Fixed16);
}

/// Two points say the same as a centre and a gain, and a straight channel the same as a pulse put on the timer.
#[test]
fn two_points_are_a_straight_servo() {
    fn check<N: Number>(slack: u32) {
        for turns in [Turns::With, Turns::Against] {
            let spec = ServoSpec { turns, trim_us: 12.5, ..ServoSpec::COMMON };
            let sign = if turns == Turns::With { 1.0 } else { -1.0 };
            let points = [[987.5, sign * -46.125], [1987.5, sign * 43.875]];
            let measured = MeasuredServo { points: &points, trim_us: 12.5, pulse_us: [1000.0, 2000.0] };
            let counting = timer().counting();
            let straight = Channel::<N>::from_spec(spec, counting).expect("a channel");
            let pointed =
                Channel::<N>::from_curve(&measured.curve().expect("a curve"), counting).expect("a channel");
            let servo = Servo::<N>::from_spec(spec).expect("a servo");
            assert_eq!(straight.range(), pointed.range());
            for step in -1800..=1800 {
                let angle = Angle::from_degrees(f64::from(step) / 10.0).expect("an angle");
                let counts = straight.command(angle).counts;
                assert!(counts.abs_diff(pointed.command(angle).counts) <= 1, "{step}");
                let long_way = ik_core::output::Output::counts(&timer(), servo.command(angle).pulse);
                assert!(counts.abs_diff(long_way) <= slack, "{step}: {counts} {long_way}");
            }
        }
    }
    check::<Float32>(1);
    check::<Fixed32>(1);
    check::<Short32>(1);
    check::<Fixed16>(1);
}

#[test]
fn ends_are_rounded_inward_and_no_count_is_none() {
    let counting = Timer::new(1_000_000, 8, 16, 50.0).expect("a timer").counting();
    let range = |pulse_us| {
        Channel::<Fixed32>::from_spec(ServoSpec { pulse_us, ..ServoSpec::COMMON }, counting)
            .map(|it| it.range())
    };
    // 8 µs a count: 1000 is 125 counts exactly, 1001 lies above.
    assert_eq!(range([1000.0, 2000.0]), Ok([125, 250]));
    assert_eq!(range([1001.0, 1999.0]), Ok([126, 249]));
    assert_eq!(range([1000.0001, 1999.9999]), Ok([126, 249]));
    // 0 counts are no pulse, not a short one.
    assert_eq!(range([0.0, 2000.0]), Ok([1, 250]));
    assert_eq!(range([1497.0, 1503.0]), Err(ServoError::Counts));
    // A frame of 2500 counts is all that there is.
    assert_eq!(range([1000.0, 32_000.0]), Ok([125, 2500]));
}
