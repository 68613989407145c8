//! Frame safety: what stands between the solver's pulses and the servos, frame by frame.
//!
//! | part | what it sees to |
//! | --- | --- |
//! | [`ServoBounds`] | no pulse leaves its range, none is farther than a slew from the one before |
//! | [`StaleRule`] | a planner that sends no targets any more: hold, then release |
//! | [`Watch`] | no pulse before it is asked for, and none after a release until it is asked for again |
//! | [`FrameSafety`] | all of them together, for all servos of a frame |
//!
//! All of it is whole numbers: counts of an output, or steps of a pulse. It costs the same in every number system, rounds
//! nothing, and has no input that it does not answer.
//!
//! # What always holds
//!
//! Whatever is called in whatever order, with whatever targets, for what [`FrameSafety::frame`] gives frame by frame:
//!
//! 1. a pulse is within its servo's range;
//! 2. between one frame and the next no pulse changes by more than its servo's slew;
//! 3. there is one exception: the first pulse after a frame without pulses. It is the pulse that the state was started with
//!    ([`FrameSafety::start`], [`FrameSafety::start_at`]) or the last one that was sent, never a target, and comes only
//!    after [`FrameState::engage`];
//! 4. without a new target nothing moves from the first frame of the stale rule on, and from the second on there are no
//!    pulses.
//!
//! (3) cannot be a limited step: nobody knows where a servo without pulses stands. A hobby servo does not tell; its joint
//! may have been moved by hand, or by the leg's weight. What can be done is to state where it is likely to be, to begin
//! there, and to leave the moment to the caller.
//!
//! Nothing of the caller's runs within a frame, and nothing in it can panic: a caller that panics between two frames finds the
//! state of the last whole one. States cannot be copied, so that nobody goes on from an old one, whose pulses the servos have
//! left long ago.
//!
#![doc = include_str!("../docs/frame-safety.md")]

mod bounds;
mod stage;
mod stale;
mod watch;

pub use bounds::ServoBounds;
pub use stage::{FrameSafety, FrameState, counts_of};
pub use stale::StaleRule;
pub use watch::{Conduct, Watch};

use core::fmt;

/// Why the bounds of a servo or a stale rule cannot be.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
#[non_exhaustive]
pub enum FrameError {
    /// The range is not [least, most], or its least is 0, which is no pulse.
    Range,
    /// The pulse to start with lies outside the range.
    Start,
    /// The slew is less than one count, NaN, or longer than any pulse.
    Slew,
    /// The frames of the stale rule are not 1 to 65 534, or do not rise.
    Stale,
}

impl FrameError {
    /// What is wrong, and what would be right.
    pub const fn message(&self) -> &'static str {
        match self {
            Self::Range => "the range must be [least, most], its least 1 or more: 0 counts are no pulse",
            Self::Start => "the pulse to start with must lie within the servo's pulse range",
            Self::Slew => {
                "the slew must be at least one count of the output in a frame, and no more than 32767 us: a servo of \
                 0.16 s for 60 degrees and 11 us per degree goes 83 us in a frame of 20 ms"
            }
            Self::Stale => {
                "the stale rule must hold after 1 to 65534 frames without a target, and release after more than those"
            }
        }
    }
}

impl fmt::Display for FrameError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.message())
    }
}

impl core::error::Error for FrameError {}
