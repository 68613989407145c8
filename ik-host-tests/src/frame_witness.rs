//! A witness of frame safety: is told what is called and what comes out, and says what should not have.
//!
//! It knows the promises of [`ik_core::frame`] and shares no code with it: it takes any stage, ik-core's, its face in
//! another language, or one that is wrong on purpose (`tests/breaking.rs`).

mod random_calls;

pub use random_calls::{Tally, run};

/// What a stage promises of one servo, in counts.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct ServoPromise {
    /// [least, most].
    pub range: [u32; 2],
    /// The first pulse of a state that was just started.
    pub start: u32,
    /// The most that a pulse changes from one frame to the next.
    pub slew: u32,
}

/// What a stage promises.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Promise {
    /// Of each servo.
    pub servos: Vec<ServoPromise>,
    /// From this frame without a new target on, nothing moves.
    pub hold_after: u32,
    /// From this one on, there are no pulses; never, if `None`.
    pub release_after: Option<u32>,
}

/// A stage under test, with its state.
pub trait Stage {
    /// Throws the state away and takes a new one, with the stated first pulses.
    fn start(&mut self);
    /// Allows pulses.
    fn engage(&mut self);
    /// Forbids them.
    fn release(&mut self);
    /// One frame with a new target or none: writes what is sent, or says `false` if there are no pulses.
    fn frame(&mut self, new: Option<&[u32]>, sent: &mut [u32]) -> bool;
}

/// What the last frame was seen to send.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Seen {
    /// There was no frame since the start.
    Nothing,
    NoPulses,
    Pulses,
}

/// The witness.
#[derive(Debug, Clone)]
pub struct Witness<'a> {
    promise: &'a Promise,
    /// What was sent last, or was stated.
    last: Vec<i64>,
    target: Vec<i64>,
    seen: Seen,
    allowed: bool,
    /// Frames since the last new target.
    quiet: u64,
}

impl<'a> Witness<'a> {
    /// Before the first frame.
    pub fn new(promise: &'a Promise) -> Self {
        let start: Vec<i64> = promise.servos.iter().map(|servo| i64::from(servo.start)).collect();
        Self { promise, last: start.clone(), target: start, seen: Seen::Nothing, allowed: false, quiet: 0 }
    }

    /// Pulses are allowed from here on.
    pub fn engage(&mut self) {
        if !self.allowed {
            self.allowed = true;
            self.quiet = 0;
            self.target.clone_from(&self.last);
        }
    }

    /// They are not any more.
    pub fn release(&mut self) {
        self.allowed = false;
    }

    /// A frame, and what was sent in it.
    ///
    /// # Errors
    /// Says which promise was broken, and how.
    pub fn frame(&mut self, new: Option<&[u32]>, sent: Option<&[u32]>) -> Result<(), String> {
        self.quiet = if new.is_some() { 0 } else { self.quiet + 1 };
        if let Some(new) = new {
            for ((target, new), servo) in self.target.iter_mut().zip(new).zip(&self.promise.servos) {
                *target = i64::from(*new).clamp(servo.range[0].into(), servo.range[1].into());
            }
        }
        let quiet_for = |frames: u32| self.quiet >= u64::from(frames);
        self.allowed &= !self.promise.release_after.is_some_and(quiet_for);
        let holds = quiet_for(self.promise.hold_after);
        match sent {
            Some(sent) => self.pulses(sent, holds)?,
            None if self.allowed && self.seen != Seen::Nothing => {
                return Err("no pulses, although they are allowed".into());
            }
            None => {}
        }
        self.seen = if sent.is_some() { Seen::Pulses } else { Seen::NoPulses };
        Ok(())
    }

    fn pulses(&mut self, sent: &[u32], holds: bool) -> Result<(), String> {
        if !self.allowed {
            return Err(format!(
                "pulses, although they are not allowed; {} frames without a target",
                self.quiet
            ));
        }
        if self.seen == Seen::Nothing {
            return Err("pulses in the first frame of a state: the servos were not let go of".into());
        }
        if sent.len() != self.promise.servos.len() {
            return Err(format!("{} pulses for {} servos", sent.len(), self.promise.servos.len()));
        }
        for (number, (sent, promise)) in sent.iter().zip(&self.promise.servos).enumerate() {
            let (sent, last, target) = (i64::from(*sent), self.last[number], self.target[number]);
            let [least, most] = promise.range.map(i64::from);
            let case =
                || format!("servo {number}: sent {sent} after {last}, on the way to {target}; {promise:?}");
            if sent < least || sent > most {
                return Err(format!("beyond its range: {}", case()));
            }
            if self.seen != Seen::Pulses {
                if sent != last {
                    return Err(format!("a first pulse that was not stated: {}", case()));
                }
                continue;
            }
            let (moved, way) = ((sent - last).abs(), (target - last).abs());
            if moved > i64::from(promise.slew) {
                return Err(format!("more than its slew: {}", case()));
            }
            let due = if holds { 0 } else { way.min(promise.slew.into()) };
            if moved != due || (target - sent).abs() != way - moved {
                return Err(format!("should have moved by {due} towards its target: {}", case()));
            }
        }
        for (last, sent) in self.last.iter_mut().zip(sent) {
            *last = i64::from(*sent);
        }
        Ok(())
    }

    /// A state was thrown away and a new one taken.
    pub fn start(&mut self) {
        *self = Self::new(self.promise);
    }
}
