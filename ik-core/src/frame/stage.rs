//! All servos of a frame.

use super::{Conduct, ServoBounds, StaleRule, Watch};
use crate::channel::Counts;
use crate::leg::Outcome;
use crate::limb::LimbCommand;
use crate::number::Number;

/// The last stage before the output: wanted counts in, counts to send out. A `const` one lives in flash; what changes from
/// frame to frame is a [`FrameState`].
///
/// ```
/// use ik_core::frame::{FrameSafety, ServoBounds, StaleRule};
///
/// /// Something impossible does not compile.
/// macro_rules! possible {
///     ($checked:expr) => {
///         match $checked {
///             Ok(possible) => possible,
///             Err(error) => panic!("{}", error.message()),
///         }
///     };
/// }
/// // Two servos of 3200 to 6400 ticks, 265 of them in a frame; they stand at 3840 when the machine lies on its belly.
/// const SERVO: ServoBounds = possible!(ServoBounds::in_counts([3200, 6400], 3840, 265));
/// const SAFETY: FrameSafety<2> = FrameSafety::new([SERVO; 2], possible!(StaleRule::hold_then_release(2, 4)));
///
/// let mut state = SAFETY.start();
/// assert_eq!(SAFETY.frame(&mut state, Some(&[5000, 9999])), None); // no pulse before it is asked for
/// state.engage();
/// assert_eq!(SAFETY.frame(&mut state, Some(&[4000, 9999])), Some(&[3840, 3840])); // where it is said to stand
/// assert_eq!(SAFETY.frame(&mut state, None), Some(&[4000, 4105])); // and on to the target, which is a frame old
/// assert_eq!(SAFETY.frame(&mut state, None), Some(&[4000, 4105])); // two frames: hold
/// assert_eq!(SAFETY.frame(&mut state, None), Some(&[4000, 4105]));
/// assert_eq!(SAFETY.frame(&mut state, None), None); // four: let go
/// assert_eq!(SAFETY.frame(&mut state, Some(&[5000, 5000])), None); // until it is asked for again
/// ```
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct FrameSafety<const SERVOS: usize> {
    /// What each servo may be sent.
    pub servos: [ServoBounds; SERVOS],
    /// What is done about stale targets.
    pub stale: StaleRule,
}

/// What [`FrameSafety`] knows from one frame to the next. It is no `Copy`: see [the module](crate::frame).
#[derive(Debug, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct FrameState<const SERVOS: usize> {
    /// What was sent last, or is to be sent first.
    at: [u32; SERVOS],
    /// The last target.
    wanted: [u32; SERVOS],
    watch: Watch,
}

impl<const SERVOS: usize> FrameSafety<SERVOS> {
    /// From its parts, which were checked when they were made.
    pub const fn new(servos: [ServoBounds; SERVOS], stale: StaleRule) -> Self {
        Self { servos, stale }
    }

    /// A state before the first frame, with the first pulses that the servos' bounds state.
    pub const fn start(&self) -> FrameState<SERVOS> {
        let mut at = [0; SERVOS];
        let mut servo = 0;
        while servo < SERVOS {
            at[servo] = self.servos[servo].start();
            servo += 1;
        }
        FrameState { at, wanted: at, watch: Watch::START }
    }

    /// The same with first pulses that are only known while running, held within their ranges: those of a pose that was
    /// kept in memory, or of the feet where they stand.
    pub fn start_at(&self, first: [u32; SERVOS]) -> FrameState<SERVOS> {
        let mut at = first;
        for (at, servo) in at.iter_mut().zip(&self.servos) {
            *at = servo.hold(*at);
        }
        FrameState { at, wanted: at, watch: Watch::START }
    }

    /// One frame: what to send to each servo, `None` for no pulse to any of them. `new` is what the servos are wanted at, if
    /// that is known anew in this frame; any number will do. Call it once a frame, and send what it gives.
    #[inline]
    pub fn frame<'state>(
        &self,
        state: &'state mut FrameState<SERVOS>,
        new: Option<&[u32; SERVOS]>,
    ) -> Option<&'state [u32; SERVOS]> {
        // In place, for copies would cost more than the steps. Nothing of the caller's runs in here, and nothing panics, so
        // that nobody ever sees half of it.
        let watch = state.watch.next(&self.stale, new.is_some());
        if let Some(new) = new {
            state.wanted = *new;
        }
        match watch.conduct() {
            Conduct::Following => step(&self.servos, &mut state.at, &state.wanted),
            // Of no effect, unless a state of other bounds is brought here: what is sent is within these.
            Conduct::First | Conduct::Holding => hold(&self.servos, &mut state.at),
            Conduct::Unsent | Conduct::Released => {}
        }
        state.watch = watch;
        watch.conduct().has_pulses().then_some(&state.at)
    }
}

impl<const SERVOS: usize> FrameState<SERVOS> {
    /// Allows pulses from the next frame on. The servos go to the pulses that the state was started with, or to the last
    /// ones that were sent, **at once and as fast as they can**; to where they are wanted they then go within their slews.
    /// Does nothing where pulses are allowed already. For a deliberate act of a person, not for a loop.
    pub const fn engage(&mut self) {
        if !self.watch.is_engaged() {
            // A target from before the release is forgotten.
            self.wanted = self.at;
            self.watch = self.watch.engaged();
        }
    }

    /// Sends no pulses from the next frame on, until [`engage`](Self::engage); most servos then let go of their joints, and
    /// the legs may fall.
    pub const fn release(&mut self) {
        self.watch = self.watch.released();
    }

    /// What the last frame did.
    pub const fn conduct(&self) -> Conduct {
        self.watch.conduct()
    }

    /// Whether pulses are allowed: after [`engage`](Self::engage), until [`release`](Self::release) or the stale rule.
    pub const fn is_engaged(&self) -> bool {
        self.watch.is_engaged()
    }

    /// What was sent last, and would be sent first after a release; before the first pulses, the stated ones.
    pub const fn last(&self) -> [u32; SERVOS] {
        self.at
    }

    /// How many servos are still on their way to where they are wanted; those whose target lies outside their range among
    /// them, for good.
    pub fn behind(&self) -> usize {
        self.at.iter().zip(&self.wanted).filter(|(at, wanted)| at != wanted).count()
    }
}

/// One step of every servo. Not part of its caller, where the number of servos is known and the loop would be unrolled.
#[inline(never)]
fn step(servos: &[ServoBounds], at: &mut [u32], wanted: &[u32]) {
    for ((servo, at), wanted) in servos.iter().zip(at).zip(wanted) {
        *at = servo.step(*at, *wanted);
    }
}

#[inline(never)]
fn hold(servos: &[ServoBounds], at: &mut [u32]) {
    for (servo, at) in servos.iter().zip(at) {
        *at = servo.hold(*at);
    }
}

/// The counts of all legs of a frame, hip, thigh, knee of each in turn; `None` if a foot was not a number, or if there are
/// not as many as `SERVOS`. A frame that is not whole is no new target: a planner that sends NaN is a planner that has
/// failed, and the stale rule sees to it.
pub fn counts_of<N: Number, const SERVOS: usize>(
    commands: &[LimbCommand<N, Counts>],
) -> Option<[u32; SERVOS]> {
    let mut counts = [0; SERVOS];
    let (legs, rest) = counts.as_chunks_mut::<3>();
    if legs.len() != commands.len() || !rest.is_empty() {
        return None;
    }
    for (servos, command) in legs.iter_mut().zip(commands) {
        if command.answer.outcome == Outcome::NotFinite {
            return None;
        }
        *servos = command.counts();
    }
    Some(counts)
}
