//! Joint ranges: what a leg must never be commanded beyond.

use crate::angle::{Angle, Joints};
use crate::geometry::Bend;
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

/// The ranges of a leg's three joints, degrees, checked; both ends belong to a range.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Limits {
    hip_deg: [f64; 2],
    thigh_deg: [f64; 2],
    knee_deg: [f64; 2],
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
    /// No angle of the thigh suits its own range, its servo's and that of the shank's.
    Shank,
}

impl LimitsError {
    /// What is wrong, and what would be right.
    pub const fn message(&self) -> &'static str {
        match self {
            Self::Hip => "the hip's range must be [least, most] within -180 to 180 degrees",
            Self::Thigh => "the thigh's (femur's) range must be [least, most] within -180 to 180 degrees",
            Self::Knee => "the knee's range must be [least, most] within 0 to 180 degrees",
            Self::Shank => {
                "no angle of the thigh suits its range, its servo's, and what the shank's servo leaves of the knee's"
            }
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

/// What two ranges have in common; neither holds NaN.
const fn common(a: [f64; 2], b: [f64; 2]) -> [f64; 2] {
    [if a[0] < b[0] { b[0] } else { a[0] }, if a[1] > b[1] { b[1] } else { a[1] }]
}

impl Limits {
    /// Every angle there is: hip and thigh from −180° to 180°, the knee from straight to folded.
    pub const FREE: Self =
        Self { hip_deg: [-180.0, 180.0], thigh_deg: [-180.0, 180.0], knee_deg: [0.0, 180.0] };

    /// Ranges [least, most] in degrees: hip and thigh within ±180°, knee within 0° to 180°.
    ///
    /// # Errors
    /// Says which joint's range cannot be.
    pub const fn degrees(hip: [f64; 2], thigh: [f64; 2], knee: [f64; 2]) -> Result<Self, LimitsError> {
        if !ordered(hip, -180.0) {
            Err(LimitsError::Hip)
        } else if !ordered(thigh, -180.0) {
            Err(LimitsError::Thigh)
        } else if !ordered(knee, 0.0) {
            Err(LimitsError::Knee)
        } else {
            Ok(Self { hip_deg: hip, thigh_deg: thigh, knee_deg: knee })
        }
    }

    /// The ranges of a leg whose knee is driven through a parallelogram ([`Parallelogram`](crate::drive::Parallelogram)), so that its
    /// knee stays within its range whatever the servos are held at: the thigh's range without the angles that its own
    /// servo cannot take, and without those at which no angle of the knee's range suits the shank's servo. The servos'
    /// ranges are [`Curve::joint_deg`](crate::Curve::joint_deg), in degrees; the shank's is that of the knee's servo.
    ///
    /// What is left is enough: with the thigh within, the shank held within its servo's range holds the knee within its
    /// own.
    ///
    /// # Errors
    /// If no angle of the thigh is left.
    pub const fn through_parallelogram(
        self,
        bend: Bend,
        thigh_servo_deg: [f64; 2],
        shank_servo_deg: [f64; 2],
    ) -> Result<Self, LimitsError> {
        // NaN fails the comparisons.
        let sound = thigh_servo_deg[0] <= thigh_servo_deg[1] && shank_servo_deg[0] <= shank_servo_deg[1];
        if !sound {
            return Err(LimitsError::Shank);
        }
        let [knee_least, knee_most] = self.knee_deg;
        // A shank's angle is held at half a turn.
        let [shank_least, shank_most] = common(shank_servo_deg, [-180.0, 180.0]);
        let left = match bend {
            // thigh = shank − knee, or knee − shank.
            Bend::Backward | Bend::Down => [shank_least - knee_most, shank_most - knee_least],
            Bend::Forward | Bend::Up => [knee_least - shank_most, knee_most - shank_least],
        };
        let thigh_deg = common(common(self.thigh_deg, thigh_servo_deg), left);
        if shank_least <= shank_most && ordered(thigh_deg, -180.0) {
            Ok(Self { thigh_deg, ..self })
        } else {
            Err(LimitsError::Shank)
        }
    }

    /// Whether every angle is within.
    pub(crate) const fn are_free(&self) -> bool {
        let [[a, b], [c, d], [e, f]] = [self.hip_deg, self.thigh_deg, self.knee_deg];
        a <= -180.0 && b >= 180.0 && c <= -180.0 && d >= 180.0 && e <= 0.0 && f >= 180.0
    }

    /// The hip's range [least, most], degrees.
    pub const fn hip_deg(&self) -> [f64; 2] {
        self.hip_deg
    }

    /// The thigh's (femur's).
    pub const fn thigh_deg(&self) -> [f64; 2] {
        self.thigh_deg
    }

    /// The knee's.
    pub const fn knee_deg(&self) -> [f64; 2] {
        self.knee_deg
    }
}

/// A range of joint angles in a number system, its ends included.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Range<N: Number> {
    pub(crate) least: Angle<N>,
    pub(crate) most: Angle<N>,
    /// For [`Number::is_well_within`], if the number system wants them: its middle, and its [`Number::extent`].
    pub(crate) middle: N::Angle,
    pub(crate) extent: u32,
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

    /// Whether an angle lies within, by two comparisons; NaN does not.
    #[inline(always)]
    pub(crate) fn contains(&self, angle: N::Angle) -> bool {
        self.least.0 <= angle && angle <= self.most.0
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

/// The ranges of a leg's three joints in a number system.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Ranges<N: Number> {
    /// Whether they are those of [`Limits::FREE`].
    pub(crate) free: bool,
    pub(crate) hip: Range<N>,
    pub(crate) thigh: Range<N>,
    pub(crate) knee: Range<N>,
}

impl<N: Number> Ranges<N> {
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

    /// Whether each joint is sure to lie within its range; NaN is not.
    #[inline(always)]
    pub(crate) fn contain(&self, hip: N::Angle, thigh: N::Angle, knee: N::Angle) -> bool {
        if self.free {
            N::are_sound(hip, thigh)
        } else {
            N::is_well_within(hip, &self.hip)
                && N::is_well_within(thigh, &self.thigh)
                && N::is_well_within(knee, &self.knee)
        }
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

#[cfg(all(test, feature = "float32"))]
mod tests {
    use super::*;
    use crate::Float32;
    use crate::leg::constants::range;

    /// Floats a little to both sides of one.
    fn around(angle: f32) -> impl Iterator<Item = f32> {
        (-40i32..=40).map(move |step| f32::from_bits(angle.to_bits().wrapping_add_signed(step)))
    }

    #[test]
    fn what_is_well_within_is_within() {
        let mut looked_at = 0;
        for least in (-1800..=1800).step_by(37) {
            for width in [0, 1, 2, 15, 450, 1200, 1799, 3600] {
                let (least, most) = (f64::from(least) / 10.0, f64::from(least + width) / 10.0);
                let range = range!(Float32, [least, most.min(180.0)]);
                let well = |angle| Float32::is_well_within(angle, &range);
                for angle in around(range.least.0).chain(around(range.most.0)).chain(around(range.middle)) {
                    assert!(!well(angle) || range.contains(angle), "{angle} in {least} to {most}");
                }
                // 2e-7 turns and what rounding adds.
                let inside = 2.0e-6f32;
                for angle in [range.least.0 + inside, range.most.0 - inside] {
                    if range.most.0 - range.least.0 > 2.0 * inside {
                        assert!(well(angle), "{angle} in {least} to {most}");
                        looked_at += 1;
                    }
                }
                for angle in [f32::NAN, -f32::NAN, f32::INFINITY, f32::NEG_INFINITY, f32::MAX] {
                    assert!(!well(angle), "{angle} in {least} to {most}");
                }
            }
        }
        assert!(looked_at > 1000);
    }
}
