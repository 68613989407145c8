//! Every function of `frame`.

use ik_core::frame;
use ik_core::frame::{Conduct, FrameError, FrameSafety, ServoBounds, StaleRule, Watch};
use ik_core::limb::LimbCommand;
use ik_core::{Channel, Counting, Counts, Pulse, Servo};

use crate::numbers::Opaque;
use crate::opaque::{truth, two, use_up, word};

/// Every function, for a channel and a servo of a number system.
pub fn all<N: Opaque>(channel: &Channel<N, 4>, servo: &Servo<N>, counting: Counting) {
    let pulse = || Pulse::from_steps(word());
    legs_and_servos::<3>(bounds(ServoBounds::in_counts([word(), word()], word(), word())));
    legs_and_servos::<18>(bounds(ServoBounds::on_channel(channel, counting, pulse(), pulse())));
    legs_and_servos::<1>(bounds(ServoBounds::on_servo(servo, pulse(), pulse())));
    let [us, _] = two();
    use_up(ServoBounds::on_channel(channel, counting, Pulse::from_us(us), Pulse::from_us(us)).is_ok());
}

/// The counts of so many legs.
pub fn targets<N: Opaque>(commands: &[LimbCommand<N, Counts>]) {
    use_up((
        frame::counts_of::<N, 3>(commands),
        frame::counts_of::<N, 18>(commands),
        frame::counts_of::<N, 7>(commands),
    ));
}

fn bounds(made: Result<ServoBounds, FrameError>) -> Option<ServoBounds> {
    made.inspect_err(|error| use_up(error.message())).ok()
}

fn legs_and_servos<const SERVOS: usize>(bounds: Option<ServoBounds>) {
    let Some(bounds) = bounds else { return };
    use_up((bounds.range(), bounds.start(), bounds.slew(), bounds.hold(word()), bounds.step(word(), word())));
    let rule = if truth() {
        StaleRule::hold_for_good(word() as u16)
    } else {
        StaleRule::hold_then_release(word() as u16, word() as u16)
    };
    let Ok(rule) = rule else { return };
    use_up((rule.hold_after(), rule.release_after()));
    watch(&rule);

    let safety = FrameSafety::new([bounds; SERVOS], rule);
    let first = core::array::from_fn(|_| word());
    let mut state = if truth() { safety.start() } else { safety.start_at(first) };
    for _ in 0..word() {
        if truth() {
            state.engage();
        }
        if truth() {
            state.release();
        }
        let new: Option<[u32; SERVOS]> = truth().then(|| core::array::from_fn(|_| word()));
        use_up(safety.frame(&mut state, new.as_ref()));
        use_up((state.conduct(), state.is_engaged(), state.last(), state.behind()));
    }
}

fn watch(rule: &StaleRule) {
    let watch = Watch::from_bits(word()).engaged().next(rule, truth()).released().next(rule, truth());
    let conduct: Conduct = watch.conduct();
    use_up((conduct.has_pulses(), watch.is_engaged(), watch.frames(), watch.to_bits()));
}
