//! Servos and outputs against facts of the trade and arithmetic that anyone can redo.

mod common;

use common::servo;
use common::solver::{NumberSystem, core};
use ik_core::output::Output;
use ik_core::{Expander, Pulse, ServoSpec, Timer};
use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{Bend, Leg, Pose, Shape};

/// Common practice, no source: 1000 µs to 2000 µs about 1500 µs, over 90°: 0.09° a µs.
#[test]
fn a_common_servo_turns_90_degrees_over_1000_us_about_1500() {
    for number in NumberSystem::ALL {
        let servo = servo::core(number, ServoSpec::COMMON).expect("a servo");
        for (degrees, us) in [(0.0, 1500.0), (45.0, 2000.0), (-45.0, 1000.0), (0.09, 1501.0), (-9.0, 1400.0)]
        {
            let found = servo.command(f64::to_radians(degrees)).0.us();
            assert!((found - us).abs() < 1e-3, "{number:?}: {degrees} degrees: {found} us");
            let found = servo.angle(Pulse::from_us(us)).to_degrees();
            assert!((found - degrees).abs() < 1e-4, "{number:?}: {us} us: {found} degrees");
        }
    }
}

/// Arithmetic: 12 bits at 50 Hz nominal are 4.8828125 µs a count, but the divider of a 25 MHz oscillator is a whole
/// number: 25e6/(4096·50) rounds to 122, which gives 50.0288 Hz and 4.88 µs; at 200 Hz the nominal figure is 1.6 % off.
#[test]
fn a_12_bit_expander_at_25_mhz_divides_by_122() {
    let expander = Expander::nearest(25_000_000, 12, 50.0).expect("an expander");
    assert_eq!(expander.divider(), 122);
    assert!((1e6 / expander.frame_us() - 50.0288).abs() < 5e-5);
    assert_eq!(expander.count_us(), 4.88);
    // 1500 us are 307.38 counts.
    assert_eq!(expander.counts(Pulse::from_us(1500.0)), 307);
    assert_eq!(expander.counts(Pulse::from_us(1000.0)), 205);
    assert_eq!(expander.counts(Pulse::from_us(2000.0)), 410);
    let fast = Expander::nearest(25_000_000, 12, 200.0).expect("an expander");
    assert_eq!(fast.divider(), 31);
    assert!((1e6 / fast.frame_us() / 200.0 - 1.0 + 0.016).abs() < 5e-4, "{}", 1e6 / fast.frame_us());
}

/// Arithmetic: a 16-bit timer at 48 MHz holds a frame of 20 ms when divided by 15, and steps 0.3125 µs.
#[test]
fn a_16_bit_timer_at_48_mhz_steps_0_3125_us() {
    let timer = Timer::finest(48_000_000, 16, 50.0).expect("a timer");
    assert_eq!((timer.divider(), timer.frame_ticks(), timer.count_us()), (15, 64_000, 0.3125));
    assert_eq!(timer.frame_us(), 20_000.0);
    for (us, ticks) in [(1000.0, 3200), (1500.0, 4800), (2000.0, 6400), (1500.2, 4801), (1500.1, 4800)] {
        assert_eq!(timer.counts(Pulse::from_us(us)), ticks, "{us} us");
    }
}

/// Arithmetic: 1 µs at 0.09° a µs moves a foot 200 mm away by 200·0.09·π/180 = 0.314 mm.
#[test]
fn one_us_moves_a_foot_200_mm_away_by_0_314_mm() {
    let leg = Leg { shape: Shape::Roll, offset: 0.0, thigh: 100.0, shank: 100.0, bend: Bend::Forward };
    for number in NumberSystem::ALL.into_iter().filter(|n| *n != NumberSystem::Coarse) {
        let solver = core(number, &leg, None).expect("a leg");
        let servo = servo::core(number, ServoSpec::COMMON).expect("a servo");
        let foot_at = |us: f64| {
            let thigh = servo.angle(Pulse::from_us(us));
            solver.forward(&Pose { hip: 0.0, thigh, knee: 0.0 })
        };
        let moved = distance(foot_at(1500.0), foot_at(1501.0));
        assert!((moved - 0.314).abs() < 5e-4, "{number:?}: {moved} mm");
    }
}
