//! ik-core's frame safety as a stage that can be watched, with bounds drawn at random.

use crate::common::legs::Sweep;
use ik_core::frame::{FrameSafety, FrameState, ServoBounds, StaleRule};
use ik_host_tests::frame_witness::{Promise, ServoPromise, Stage};

/// ik-core's stage and its state.
pub struct Core<const SERVOS: usize> {
    pub safety: FrameSafety<SERVOS>,
    pub state: FrameState<SERVOS>,
}

impl<const SERVOS: usize> Core<SERVOS> {
    pub fn new(safety: FrameSafety<SERVOS>) -> Self {
        Self { state: safety.start(), safety }
    }

    /// A stage of random bounds: wide and narrow ranges, slews from one count to more than the range.
    pub fn random(sweep: &mut Sweep) -> Self {
        let servos = std::array::from_fn(|_| {
            let whole = |sweep: &mut Sweep, most: f64| 2f64.powf(sweep.within(0.0, most)) as u32;
            let (least, span) = (whole(sweep, 31.0), whole(sweep, 31.0) - 1);
            let most = least.saturating_add(span);
            let start = least + (f64::from(most - least) * sweep.within(0.0, 1.0)) as u32;
            let exponent = f64::from(span.max(2)).log2() + 2.0;
            let slew = whole(sweep, exponent.min(31.9));
            ServoBounds::in_counts([least, most], start, slew).expect("bounds")
        });
        let hold_after = 2f64.powf(sweep.within(0.0, 5.0)) as u16;
        let stale = if sweep.within(0.0, 1.0) < 0.2 {
            StaleRule::hold_for_good(hold_after)
        } else {
            StaleRule::hold_then_release(hold_after, hold_after + 2f64.powf(sweep.within(0.0, 6.0)) as u16)
        };
        Self::new(FrameSafety::new(servos, stale.expect("a rule")))
    }

    /// What it promises.
    pub fn promise(&self) -> Promise {
        let promise_of = |servo: &ServoBounds| ServoPromise {
            range: servo.range(),
            start: servo.start(),
            slew: servo.slew(),
        };
        Promise {
            servos: self.safety.servos.iter().map(promise_of).collect(),
            hold_after: self.safety.stale.hold_after().into(),
            release_after: self.safety.stale.release_after().map(u32::from),
        }
    }
}

impl<const SERVOS: usize> Stage for Core<SERVOS> {
    fn start(&mut self) {
        self.state = self.safety.start();
    }

    fn engage(&mut self) {
        self.state.engage();
    }

    fn release(&mut self) {
        self.state.release();
    }

    fn frame(&mut self, new: Option<&[u32]>, sent: &mut [u32]) -> bool {
        let new = new.map(|new| new.try_into().expect("as many as servos"));
        match self.safety.frame(&mut self.state, new) {
            Some(counts) => {
                sent.copy_from_slice(counts);
                true
            }
            None => false,
        }
    }
}
