//! Legs in flash, solved for a stream of foot targets, the pulses written to timer compare registers.
//!
//! Each answer is logged with defmt, down to the last bit, with the ticks as read back from the
//! registers. The PC computes the same lines (`run-on-emulator/src/expected.rs`) and compares them.
#![no_std]
#![no_main]

use board::{compare::CompareRegisters, end};
use drill::Event;

/// How many targets an image that fails on purpose gets through before it does.
const GOOD_TARGETS: u32 = 10;

#[board::entry]
fn main() -> ! {
    let Some(mut compare) = CompareRegisters::take() else { panic!("the timer is taken") };
    drill::go_through(&mut |event| match event {
        Event::Run { leg, numbers } => defmt::println!("{=str}, {=str}", leg, numbers),
        Event::Answered { number, target: _, answer } => {
            if number == GOOD_TARGETS {
                go_wrong_on_purpose();
            }
            compare.write(answer.ticks);

            let ([hip, thigh, knee], ticks) = (answer.joints, compare.read());
            defmt::println!(
                "target {=u32}: joints {=u32:08x} {=u32:08x} {=u32:08x} {} off by {=u32:08x} ticks {} pulses held {}",
                number,
                hip,
                thigh,
                knee,
                answer.outcome,
                answer.off_by,
                ticks,
                answer.pulses_held
            );
        }
    });
    end::done()
}

/// Does nothing, unless a feature for the runner's self-test is on.
fn go_wrong_on_purpose() {
    if cfg!(feature = "panics") {
        panic!("on purpose");
    }
    if cfg!(feature = "faults") {
        end::fault();
    }
    if cfg!(feature = "hangs") {
        loop {
            core::hint::spin_loop();
        }
    }
    if cfg!(feature = "stops-early") {
        end::done();
    }
}
