//! Promise: pulses reach any embedded-hal PWM channel and any expander as they were worked out; a frame is one transaction;
//! errors come through, and what was last taken is kept.

mod common;

use common::effort::cases;
use embedded_hal::i2c::{ErrorKind, ErrorType, I2c, NoAcknowledgeSource, Operation};
use embedded_hal_mock::eh1::MockError;
use embedded_hal_mock::eh1::i2c::{Mock as Bus, Transaction};
use embedded_hal_mock::eh1::pwm::{Mock as Pwm, Transaction as Duty};
use ik_core::output::hal::{ExpanderWriter, Layout, PwmServo, WordOrder};
use ik_core::{Angle, Channel, Counting, Expander, Fixed32, OutputError, Pulse, ServoSpec};
use proptest::prelude::*;
use std::io;

fn expander() -> Expander {
    Expander::nearest(25_000_000, 12, 50.0).expect("an expander")
}

/// Expectations for one frame: the address, the register, the bytes, in one transaction.
fn frame(address: u8, register: u8, bytes: &[u8]) -> Vec<Transaction> {
    vec![
        Transaction::transaction_start(address),
        Transaction::write(address, vec![register]),
        Transaction::write(address, bytes.to_vec()),
        Transaction::transaction_end(address),
    ]
}

#[test]
fn a_pulse_is_the_nearest_duty_of_the_channels_period() {
    let expected = [
        Duty::max_duty_cycle(64_000),
        Duty::set_duty_cycle(4800),
        Duty::set_duty_cycle(4801),
        Duty::set_duty_cycle(0),
    ];
    let mut pwm = Pwm::new(&expected);
    let mut servo = PwmServo::new(pwm.clone(), 20_000_000).expect("a servo");
    assert_eq!(servo.sent(), None);
    servo.send(Pulse::from_us(1500.0)).expect("sent");
    assert_eq!(servo.sent(), Some(4800));
    servo.send(Pulse::from_us(1500.2)).expect("sent");
    assert_eq!(servo.sent(), Some(4801));
    servo.release().expect("released");
    assert_eq!(servo.sent(), None);
    pwm.done();
}

#[test]
fn a_pulse_longer_than_the_period_is_held_at_it() {
    let mut pwm = Pwm::new(&[Duty::max_duty_cycle(1000), Duty::set_duty_cycle(1000)]);
    let mut servo = PwmServo::new(pwm.clone(), 3_000_000).expect("a servo");
    servo.send(Pulse::from_us(3500.0)).expect("sent");
    assert_eq!(servo.sent(), Some(1000));
    pwm.done();
}

#[test]
fn an_error_of_the_channel_comes_through_and_the_last_pulse_is_kept() {
    let error = MockError::Io(io::ErrorKind::NotConnected);
    let expected = [
        Duty::max_duty_cycle(64_000),
        Duty::set_duty_cycle(4800),
        Duty::set_duty_cycle(6400).with_error(error.clone()),
        Duty::set_duty_cycle(6400),
    ];
    let mut pwm = Pwm::new(&expected);
    let mut servo = PwmServo::new(pwm.clone(), 20_000_000).expect("a servo");
    servo.send(Pulse::from_us(1500.0)).expect("sent");
    assert_eq!(servo.send(Pulse::from_us(2000.0)), Err(error));
    assert_eq!(servo.sent(), Some(4800));
    servo.send(Pulse::from_us(2000.0)).expect("sent");
    assert_eq!(servo.sent(), Some(6400));
    pwm.done();
}

/// What a firmware does that knows its timer while compiling: the counts of a channel, as they are.
#[test]
fn counts_of_a_channel_go_out_as_they_are() {
    const COUNTING: Counting = match Counting::of_duty(40_000, 20_000_000) {
        Ok(counting) => counting,
        Err(error) => panic!("{}", error.message()),
    };
    let hip = Channel::<Fixed32>::new(ServoSpec::COMMON, COUNTING).expect("a channel");
    let mut pwm = Pwm::new(&[Duty::max_duty_cycle(40_000), Duty::set_duty_cycle(3200)]);
    let mut servo = PwmServo::new(pwm.clone(), 20_000_000).expect("a servo");
    assert_eq!(servo.counting(), COUNTING);
    // 9 degrees at 100/9 us per degree: 1600 us, 2 counts a microsecond.
    let command = hip.command(Angle::from_degrees(9.0).expect("an angle"));
    servo.send_counts(command.counts).expect("sent");
    pwm.done();
}

#[test]
fn a_channel_that_cannot_be_is_refused() {
    for (duty, period_ns) in [(255, 20_000_000), (64_000, 1_999), (64_000, 1_000_000_001)] {
        let mut pwm = Pwm::new(&[Duty::max_duty_cycle(duty)]);
        let servo = PwmServo::new(pwm.clone(), period_ns);
        assert_eq!(servo.err(), Some(OutputError::Frame), "{duty} {period_ns}");
        pwm.done();
    }
}

proptest! {
    #![proptest_config(cases(2_000))]

    /// By whole numbers: the duty is the quotient of pulse and period, rounded, halves upwards.
    #[test]
    fn any_duty_is_exact(duty in 256u16.., period_ns in 2_000u32..=1_000_000_000, steps in any::<u32>()) {
        let counting = Counting::of_duty(duty, period_ns).expect("a counting");
        let (pulse, whole) = (u128::from(steps) * 1000, u128::from(period_ns) << 16);
        let wanted = ((2 * pulse * u128::from(duty) + whole) / (2 * whole)).min(u128::from(duty));
        prop_assert_eq!(u128::from(counting.counts(Pulse::from_steps(steps))), wanted);
    }

    /// Counts come back through their pulse.
    #[test]
    fn any_duty_comes_back(duty in 256u16.., period_ns in 2_000_000u32..=65_000_000, part in 0.0..1.0) {
        let counting = Counting::of_duty(duty, period_ns).expect("a counting");
        let counts = (f64::from(duty) * part) as u32;
        prop_assert_eq!(counting.counts(counting.pulse(counts)), counts);
    }
}

#[test]
fn a_frame_is_one_transaction_of_all_channels() {
    // Low byte first; no beginnings.
    let layout = Layout { first_register: 8, order: WordOrder::LowFirst, has_beginnings: false };
    let mut bus = Bus::new(&frame(0x41, 8, &[0x33, 0x01, 0xCD, 0x00, 0xFF, 0x0F]));
    let mut writer = ExpanderWriter::<_, 3>::new(bus.clone(), 0x41, layout, expander()).expect("a writer");
    assert_eq!(writer.sent(), None);
    // The last one is more than the expander counts to.
    writer.send(&[307, 205, 70_000]).expect("sent");
    assert_eq!(writer.sent(), Some([307, 205, 4095]));
    bus.done();
}

#[test]
fn channels_with_beginnings_begin_at_0() {
    let layout = Layout { first_register: 0x20, order: WordOrder::HighFirst, has_beginnings: true };
    let mut bus = Bus::new(&frame(0x60, 0x20, &[0, 0, 0x01, 0x33, 0, 0, 0x00, 0xCD]));
    let mut writer = ExpanderWriter::<_, 2>::new(bus.clone(), 0x60, layout, expander()).expect("a writer");
    writer.send(&[307, 205]).expect("sent");
    bus.done();
}

/// The mock has no transactions that fail; this is one in front of it.
struct SecondFrameFails {
    bus: Bus,
    frames: u32,
}

impl ErrorType for SecondFrameFails {
    type Error = ErrorKind;
}

impl I2c for SecondFrameFails {
    fn transaction(&mut self, address: u8, operations: &mut [Operation<'_>]) -> Result<(), ErrorKind> {
        self.frames += 1;
        if self.frames == 2 {
            return Err(ErrorKind::NoAcknowledge(NoAcknowledgeSource::Address));
        }
        self.bus.transaction(address, operations)
    }
}

#[test]
fn an_error_of_the_bus_comes_through_and_the_last_frame_is_kept() {
    let layout = Layout { first_register: 0, order: WordOrder::LowFirst, has_beginnings: false };
    let good = frame(0x41, 0, &[100, 0, 200, 0]);
    let released = frame(0x41, 0, &[0, 0, 0, 0]);
    let mut mock = Bus::new(&[good.clone(), good, released].concat());
    let bus = SecondFrameFails { bus: mock.clone(), frames: 0 };
    let no_answer = ErrorKind::NoAcknowledge(NoAcknowledgeSource::Address);
    let mut writer = ExpanderWriter::<_, 2>::new(bus, 0x41, layout, expander()).expect("a writer");
    // Nothing to send again yet: the bus is left alone.
    writer.send_again().expect("nothing to do");
    writer.send(&[100, 200]).expect("sent");
    assert_eq!(writer.send(&[101, 201]), Err(no_answer));
    assert_eq!(writer.sent(), Some([100, 200]));
    writer.send_again().expect("sent");
    writer.release().expect("released");
    assert_eq!(writer.sent(), Some([0, 0]));
    assert_eq!(writer.into_inner().frames, 4);
    mock.done();
}

#[test]
fn channels_beyond_the_registers_are_refused() {
    let fits = |first_register, has_beginnings| {
        let layout = Layout { first_register, order: WordOrder::LowFirst, has_beginnings };
        let mut bus = Bus::new(&[]);
        let error = ExpanderWriter::<_, 16>::new(bus.clone(), 0x41, layout, expander()).err();
        bus.done();
        error.is_none_or(|error| {
            assert_eq!(error, OutputError::Registers);
            false
        })
    };
    // 16 channels of 2 or 4 bytes.
    assert!(fits(224, false) && !fits(225, false));
    assert!(fits(192, true) && !fits(193, true));
}
