//! When targets are stale.

use super::FrameError;

/// What is done about a planner that sends no new targets: hold, and perhaps release.
///
/// Frames are counted from the last new target. Until the rule's first figure the servos go on towards it: a planner may be
/// late. From then on they hold where they are, and from the second figure on they get no pulses. Whether letting go is
/// safer than holding on is the machine's business: a walker that lets go falls.
///
/// ```
/// use ik_core::frame::StaleRule;
///
/// // At 50 frames a second: hold after a fifth of a second, let go after ten.
/// const RULE: StaleRule = match StaleRule::hold_then_release(10, 500) {
///     Ok(rule) => rule,
///     Err(error) => panic!("{}", error.message()),
/// };
/// assert_eq!((RULE.hold_after(), RULE.release_after()), (10, Some(500)));
/// assert!(StaleRule::hold_then_release(0, 500).is_err());
/// ```
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct StaleRule {
    hold_after: u16,
    /// `NEVER`, or more than `hold_after`.
    release_after: u16,
}

const NEVER: u16 = u16::MAX;
/// The most frames that a rule may wait, and to which a state counts.
pub(super) const MOST_FRAMES: u16 = NEVER - 1;

impl StaleRule {
    /// Holds from the `hold_after`th frame without a new target on, and never releases.
    ///
    /// # Errors
    /// If that is not 1 to 65 534 frames.
    pub const fn hold_for_good(hold_after: u16) -> Result<Self, FrameError> {
        if hold_after < 1 || hold_after > MOST_FRAMES {
            return Err(FrameError::Stale);
        }
        Ok(Self { hold_after, release_after: NEVER })
    }

    /// Holds from the `hold_after`th frame without a new target on, and releases from the `release_after`th.
    ///
    /// # Errors
    /// If they are not 1 to 65 534 frames, the second more than the first.
    pub const fn hold_then_release(hold_after: u16, release_after: u16) -> Result<Self, FrameError> {
        if hold_after < 1 || release_after <= hold_after || release_after > MOST_FRAMES {
            return Err(FrameError::Stale);
        }
        Ok(Self { hold_after, release_after })
    }

    /// Frames without a new target until the servos hold.
    pub const fn hold_after(&self) -> u16 {
        self.hold_after
    }

    /// Frames without a new target until the servos are released; `None` for never.
    pub const fn release_after(&self) -> Option<u16> {
        if self.release_after == NEVER { None } else { Some(self.release_after) }
    }

    pub(super) const fn holds(&self, frames: u16) -> bool {
        frames >= self.hold_after
    }

    pub(super) const fn releases(&self, frames: u16) -> bool {
        self.release_after != NEVER && frames >= self.release_after
    }
}
