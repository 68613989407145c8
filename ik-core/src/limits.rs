//! Joint ranges: what a leg must never be commanded beyond.

use crate::angle::{Angle, Joints};
use crate::number::Number;
use core::fmt;

/// An end of a range.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum End {
    /// The least.
    Least,
    /// The most.
    Most,
}

/// A range of joint angles, its ends included.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Range<N: Number> {
    least: Angle<N>,
    most: Angle<N>,
}

impl<N: Number> Range<N> {
    /// The least angle.
    pub const fn least(&self) -> Angle<N> {
        self.least
    }

    /// The most.
    pub const fn most(&self) -> Angle<N> {
        self.most
    }

    /// The angle of the range that is nearest in number, and the end at which it was held.
    ///
    /// Nearest in number, not around the circle: a joint does not turn through its stop.
    #[inline(always)]
    pub fn hold(&self, angle: Angle<N>) -> (Angle<N>, Option<End>) {
        if angle.0 < self.least.0 {
            (self.least, Some(End::Least))
        } else if angle.0 > self.most.0 {
            (self.most, Some(End::Most))
        } else {
            (angle, None)
        }
    }
}

/// The ranges of a leg's three joints.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Limits<N: Number> {
    hip: Range<N>,
    thigh: Range<N>,
    knee: Range<N>,
}

/// Why joint ranges cannot be.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
#[non_exhaustive]
pub enum LimitsError {
    /// An end of the hip's range is NaN or beyond ±180°, or its least lies above its most.
    Hip,
    /// The same of the thigh (femur).
    Thigh,
    /// An end of the knee's range is NaN or outside 0° to 180°, or its least lies above its most.
    Knee,
}

impl LimitsError {
    /// What is wrong, and what would be right.
    pub const fn message(&self) -> &'static str {
        match self {
            Self::Hip => "the hip's range must be [least, most] within -180 to 180 degrees",
            Self::Thigh => "the thigh's (femur's) range must be [least, most] within -180 to 180 degrees",
            Self::Knee => "the knee's range must be [least, most] within 0 to 180 degrees",
        }
    }
}

impl fmt::Display for LimitsError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.message())
    }
}

impl core::error::Error for LimitsError {}

const fn ordered(range: [f64; 2], least: f64) -> bool {
    // NaN fails every comparison.
    range[0] >= least && range[1] <= 180.0 && range[0] <= range[1]
}

/// One text for `const fn` and for generic code; see `geometry::constants`.
macro_rules! limits {
    ($number:ty, $hip:expr, $thigh:expr, $knee:expr) => {{
        let (hip, thigh, knee): ([f64; 2], [f64; 2], [f64; 2]) = ($hip, $thigh, $knee);
        if !ordered(hip, -180.0) {
            Err(LimitsError::Hip)
        } else if !ordered(thigh, -180.0) {
            Err(LimitsError::Thigh)
        } else if !ordered(knee, 0.0) {
            Err(LimitsError::Knee)
        } else {
            Ok(Limits {
                hip: Range {
                    least: Angle(<$number>::angle_from_turns(hip[0] / 360.0)),
                    most: Angle(<$number>::angle_from_turns(hip[1] / 360.0)),
                },
                thigh: Range {
                    least: Angle(<$number>::angle_from_turns(thigh[0] / 360.0)),
                    most: Angle(<$number>::angle_from_turns(thigh[1] / 360.0)),
                },
                knee: Range {
                    least: Angle(<$number>::angle_from_turns(knee[0] / 360.0)),
                    most: Angle(<$number>::angle_from_turns(knee[1] / 360.0)),
                },
            })
        }
    }};
}

#[cfg(feature = "fixed32")]
impl Limits<crate::Fixed32> {
    /// Ranges [least, most] in degrees: hip and thigh within ±180°, knee within 0° to 180°.
    ///
    /// # Errors
    /// Says which joint's range cannot be.
    pub const fn degrees(hip: [f64; 2], thigh: [f64; 2], knee: [f64; 2]) -> Result<Self, LimitsError> {
        limits!(crate::Fixed32, hip, thigh, knee)
    }
}

#[cfg(any(feature = "float32", feature = "coarse"))]
impl<M: crate::number::float::FloatMaths> Limits<crate::number::float::Float<M>> {
    /// Ranges [least, most] in degrees: hip and thigh within ±180°, knee within 0° to 180°.
    ///
    /// # Errors
    /// Says which joint's range cannot be.
    pub const fn degrees(hip: [f64; 2], thigh: [f64; 2], knee: [f64; 2]) -> Result<Self, LimitsError> {
        limits!(crate::number::float::Float<M>, hip, thigh, knee)
    }
}

impl<N: Number> Limits<N> {
    /// Every angle there is; the knee from straight.
    pub const FREE: Self = {
        let turn = Range { least: Angle(N::LEAST_ANGLE), most: Angle(N::MOST_ANGLE) };
        Self { hip: turn, thigh: turn, knee: Range { least: Angle(N::NO_ANGLE), most: turn.most } }
    };

    /// Like `degrees`, for any number system, while running.
    ///
    /// # Errors
    /// Says which joint's range cannot be.
    pub fn from_degrees(hip: [f64; 2], thigh: [f64; 2], knee: [f64; 2]) -> Result<Self, LimitsError> {
        limits!(N, hip, thigh, knee)
    }

    /// The hip's range.
    pub const fn hip(&self) -> Range<N> {
        self.hip
    }

    /// The thigh's (femur's).
    pub const fn thigh(&self) -> Range<N> {
        self.thigh
    }

    /// The knee's.
    pub const fn knee(&self) -> Range<N> {
        self.knee
    }

    /// Each joint at the angle of its range that is nearest in number, and which ones were held where.
    #[inline(always)]
    pub fn hold(&self, joints: Joints<N>) -> (Joints<N>, Held) {
        let (hip, hip_held) = self.hip.hold(joints.hip);
        let (thigh, thigh_held) = self.thigh.hold(joints.thigh);
        let (knee, knee_held) = self.knee.hold(joints.knee);
        (Joints { hip, thigh, knee }, Held { hip: hip_held, thigh: thigh_held, knee: knee_held })
    }
}

/// Which joints were held by their ranges, and at which end.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Default)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Held {
    /// Hip.
    pub hip: Option<End>,
    /// Thigh or femur.
    pub thigh: Option<End>,
    /// Knee.
    pub knee: Option<End>,
}

impl Held {
    /// Whether any joint was held.
    #[inline(always)]
    pub const fn any(&self) -> bool {
        self.hip.is_some() || self.thigh.is_some() || self.knee.is_some()
    }

    /// Hip, thigh, knee.
    pub const fn as_array(&self) -> [Option<End>; 3] {
        [self.hip, self.thigh, self.knee]
    }
}
