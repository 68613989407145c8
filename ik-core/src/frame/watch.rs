//! Whether there are pulses in a frame, and whether they move.

use super::stale::{MOST_FRAMES, StaleRule};

/// What a frame does with the servos.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum Conduct {
    /// Nothing was sent yet: not even that there is no pulse.
    Unsent,
    /// No pulses.
    Released,
    /// The first pulses after none: the stated ones, or the last ones before.
    First,
    /// Pulses on their way to the target, or there.
    Following,
    /// Pulses that stay where they are: the target is stale.
    Holding,
}

impl Conduct {
    /// Whether there are pulses.
    pub const fn has_pulses(self) -> bool {
        matches!(self, Self::First | Self::Following | Self::Holding)
    }
}

/// What all servos of a frame have in common: whether they may have pulses, what the last frame did, and how long ago the
/// last new target came. [`FrameState`](super::FrameState) holds one; it is public for what keeps states of its own, such as
/// an interface to another language.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Watch {
    frames: u16,
    engaged: bool,
    conduct: Conduct,
}

impl Watch {
    /// Before the first frame.
    pub const START: Self = Self { frames: 0, engaged: false, conduct: Conduct::Unsent };

    /// Allowed to have pulses from the next frame on, with no target yet. Changes nothing where it is allowed already, so
    /// that to say it again does not make stale targets new.
    #[must_use]
    pub const fn engaged(self) -> Self {
        if self.engaged { self } else { Self { frames: 0, engaged: true, ..self } }
    }

    /// Not allowed to have pulses.
    #[must_use]
    pub const fn released(self) -> Self {
        Self { engaged: false, ..self }
    }

    /// The next frame, with a new target or not; what it does is its [`conduct`](Self::conduct).
    #[must_use]
    pub const fn next(self, rule: &StaleRule, is_new: bool) -> Self {
        let frames = match self.frames {
            _ if is_new => 0,
            MOST_FRAMES.. => MOST_FRAMES,
            frames => frames + 1,
        };
        let engaged = self.engaged && !rule.releases(frames);
        let conduct = match self.conduct {
            _ if !engaged => Conduct::Released,
            // However it came to be unsent, the servos are let go of before they are moved.
            Conduct::Unsent => Conduct::Released,
            Conduct::Released => Conduct::First,
            _ if rule.holds(frames) => Conduct::Holding,
            _ => Conduct::Following,
        };
        Self { frames, engaged, conduct }
    }

    /// What the last frame did.
    pub const fn conduct(self) -> Conduct {
        self.conduct
    }

    /// Whether pulses are allowed.
    pub const fn is_engaged(self) -> bool {
        self.engaged
    }

    /// Frames since the last new target, or since pulses were allowed; up to 65 534.
    pub const fn frames(self) -> u16 {
        self.frames
    }

    /// All of it in a word.
    pub const fn to_bits(self) -> u32 {
        let conduct = match self.conduct {
            Conduct::Unsent => 0,
            Conduct::Released => 1,
            Conduct::First => 2,
            Conduct::Following => 3,
            Conduct::Holding => 4,
        };
        self.frames as u32 | (self.engaged as u32) << 16 | conduct << 17
    }

    /// From a word of [`to_bits`](Self::to_bits). A word that is none of them is unsent and released, as at the start.
    pub const fn from_bits(bits: u32) -> Self {
        let conduct = match bits >> 17 {
            0 => Conduct::Unsent,
            1 => Conduct::Released,
            2 => Conduct::First,
            3 => Conduct::Following,
            4 => Conduct::Holding,
            _ => return Self::START,
        };
        let frames = bits as u16;
        if frames > MOST_FRAMES {
            Self::START
        } else {
            Self { frames, engaged: bits >> 16 & 1 == 1, conduct }
        }
    }
}
