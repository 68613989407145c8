//! Promise: a pulse's count is the exactly rounded quotient of pulse and tick, at the clock's true period; counts
//! come back through the pulse as they were; what hardware cannot do is refused.

mod common;

use common::checks::output::{self, Hardware};
use common::effort::cases;
use ik_core::output::Output;
use ik_core::{Expander, OutputError, Pulse, Timer};
use proptest::prelude::*;

/// Any clock from 1 kHz to 1 GHz, as likely slow as fast; round ones now and then.
fn clock_hz() -> impl Strategy<Value = u32> {
    prop_oneof![
        2 => (3.0..9.0).prop_map(|e: f64| 10f64.powf(e) as u32),
        1 => prop::sample::select(vec![1_000, 16_000_000, 25_000_000, 48_000_000, 84_000_000, 1_000_000_000]),
    ]
}

fn divider() -> impl Strategy<Value = u32> {
    prop_oneof![1u32..=65_536, 1u32..300, Just(1), Just(65_536)]
}

/// A pulse of any length, and of those that servos have.
fn pulse() -> impl Strategy<Value = Pulse> {
    prop_oneof![any::<u32>(), 0..2500 * 65_536u32, Just(0), Just(u32::MAX)].prop_map(Pulse::from_steps)
}

fn check(output: &impl Output, hardware: &Hardware, pulse: Pulse, count: u32) -> Result<(), String> {
    output::check_period(output, hardware)?;
    output::check(output, hardware, pulse)?;
    output::check_back(output, hardware, count)?;
    // Pulses at the border between two counts, where rounding is decided.
    let border = output.pulse(count).steps().saturating_add((32_768.0 * output.count_us()) as u32);
    for steps in border.saturating_sub(2)..=border.saturating_add(2) {
        output::check(output, hardware, Pulse::from_steps(steps))?;
    }
    Ok(())
}

proptest! {
    #![proptest_config(cases(8_000))]

    #[test]
    fn an_expanders_counts_are_exact(
        clock_hz in clock_hz(),
        divider in divider(),
        bits in 8u8..=16,
        pulse in pulse(),
        count in any::<u32>(),
    ) {
        let frame = 1 << bits;
        let hardware = Hardware { clock_hz, divider, most: frame - 1, frame };
        let expander = Expander::new(clock_hz, divider, bits).expect("an expander");
        prop_assert_eq!(check(&expander, &hardware, pulse, count % frame), Ok(()));
    }

    #[test]
    fn a_timers_ticks_are_exact(
        clock_hz in clock_hz(),
        divider in divider(),
        frame_hz in 1.0..400.0,
        pulse in pulse(),
        count in any::<u32>(),
    ) {
        let ticks = f64::round(f64::from(clock_hz) / (f64::from(divider) * frame_hz));
        let timer = Timer::new(clock_hz, divider, 32, frame_hz);
        if (256.0..=4_294_967_295.0).contains(&ticks) {
            let timer = timer.expect("a timer");
            let frame = ticks as u32;
            prop_assert_eq!(timer.frame_ticks(), frame);
            let hardware = Hardware { clock_hz, divider, most: timer.most_counts(), frame };
            prop_assert!(timer.most_counts() <= frame);
            prop_assert_eq!(check(&timer, &hardware, pulse, count % frame), Ok(()));
        } else {
            prop_assert_eq!(timer, Err(OutputError::Frame));
        }
    }

}

proptest! {
    // Finding the finest may take 65 536 tries.
    #![proptest_config(cases(200))]

    /// The finest timer: its counter holds a frame, and with a divider one less it would not.
    #[test]
    fn the_finest_timer_is_the_finest(clock_hz in clock_hz(), bits in 8u8..=32, frame_hz in 1.0..400.0) {
        let ticks = |divider: u32| f64::round(f64::from(clock_hz) / (f64::from(divider) * frame_hz));
        let most = 2f64.powi(i32::from(bits)).min(4_294_967_295.0);
        match Timer::finest(clock_hz, bits, frame_hz) {
            Ok(timer) => {
                let divider = timer.divider();
                prop_assert!((256.0..=most).contains(&ticks(divider)));
                prop_assert!(divider == 1 || ticks(divider - 1) > most);
            }
            Err(error) => {
                prop_assert_eq!(error, OutputError::Frame);
                // No divider is large enough, or the first that is makes frames of too few ticks.
                let first = (f64::from(clock_hz) / (frame_hz * (most + 0.5))).ceil().max(1.0) as u32;
                prop_assert!((first..first + 2).all(|d| d > 65_536 || ticks(d) < 256.0), "{}", first);
            }
        }
    }

    /// The nearest expander: neither neighbouring divider comes closer to the divider wanted.
    #[test]
    fn the_nearest_expander_is_the_nearest(clock_hz in clock_hz(), bits in 8u8..=16, frame_hz in 1.0..2000.0) {
        let wanted = f64::from(clock_hz) / (f64::from(1u32 << bits) * frame_hz);
        match Expander::nearest(clock_hz, bits, frame_hz) {
            Ok(expander) => prop_assert!((f64::from(expander.divider()) - wanted).abs() <= 0.5 + 1e-9),
            Err(error) => {
                prop_assert_eq!(error, OutputError::Frame);
                prop_assert!(!(0.5..65_536.5).contains(&wanted), "{}", wanted);
            }
        }
    }
}

#[test]
fn hardware_that_cannot_be_is_refused() {
    assert_eq!(Expander::new(999, 1, 12), Err(OutputError::Clock));
    assert_eq!(Expander::new(1_000_000_001, 1, 12), Err(OutputError::Clock));
    assert_eq!(Expander::new(25_000_000, 0, 12), Err(OutputError::Divider));
    assert_eq!(Expander::new(25_000_000, 65_537, 12), Err(OutputError::Divider));
    assert_eq!(Expander::new(25_000_000, 1, 7), Err(OutputError::Bits));
    assert_eq!(Expander::new(25_000_000, 1, 17), Err(OutputError::Bits));
    assert_eq!(Timer::new(48_000_000, 15, 7, 50.0), Err(OutputError::Bits));
    assert_eq!(Timer::new(48_000_000, 15, 33, 50.0), Err(OutputError::Bits));
    assert_eq!(Timer::new(48_000_000, 14, 16, 50.0), Err(OutputError::Frame));
    assert_eq!(Timer::new(0, 1, 16, 50.0), Err(OutputError::Clock));
    for frame_hz in [f64::NAN, 0.0, -50.0, f64::INFINITY, f64::NEG_INFINITY] {
        assert_eq!(Timer::new(48_000_000, 15, 16, frame_hz), Err(OutputError::Frame), "{frame_hz}");
        assert_eq!(Timer::finest(48_000_000, 16, frame_hz), Err(OutputError::Frame), "{frame_hz}");
        assert_eq!(Expander::nearest(25_000_000, 12, frame_hz), Err(OutputError::Frame), "{frame_hz}");
    }
}
