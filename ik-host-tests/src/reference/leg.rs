//! A leg, a pose and joint ranges as plain numbers: what every reference speaks.
//!
//! Millimetres and radians. Leg frame, right-handed for a left leg: x forward, y outboard, z up,
//! origin on the first joint's axis. A right leg is its mirror image in y, so the same numbers
//! serve both sides.

use std::fmt;

/// What the first joint of a leg does.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Shape {
    /// The hip rolls about x and carries a sideways offset; thigh and knee pitch.
    /// Zero pose: hanging straight down, foot at (0, offset, −(thigh + shank)).
    Roll,
    /// The hip yaws about z and carries a coxa; femur and knee pitch.
    /// Zero pose: stretched straight outboard, foot at (0, offset + thigh + shank, 0).
    Yaw,
}

impl Shape {
    /// In a word.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Roll => "roll-hip",
            Self::Yaw => "yaw-hip",
        }
    }
}

/// To which side the knee bends as its flexion grows from zero.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Bend {
    /// Roll-hip: the knee points forward of the line from hip to foot.
    Forward,
    /// Roll-hip: the knee points behind the line from hip to foot.
    Backward,
    /// Yaw-hip: the knee stands above the line from femur axis to foot.
    Up,
    /// Yaw-hip: the knee hangs below the line from femur axis to foot.
    Down,
}

impl Bend {
    /// +1 for forward and up, −1 for backward and down: the second link's angle is
    /// thigh − sign · knee, in both shapes.
    #[inline]
    #[must_use]
    pub const fn sign(self) -> f64 {
        match self {
            Self::Forward | Self::Up => 1.0,
            Self::Backward | Self::Down => -1.0,
        }
    }

    /// Whether a leg of this shape can bend this way.
    #[must_use]
    pub const fn suits(self, shape: Shape) -> bool {
        matches!(
            (self, shape),
            (Self::Forward | Self::Backward, Shape::Roll) | (Self::Up | Self::Down, Shape::Yaw)
        )
    }
}

/// The dimensions of one leg. Build it as a literal and call [`Leg::check`] once: the references
/// promise nothing for a leg that does not pass.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Leg {
    /// What the first joint does.
    pub shape: Shape,
    /// Roll-hip: sideways offset from the roll axis to the plane of the leg. Yaw-hip: length of
    /// the coxa. Millimetres, zero or more.
    pub offset: f64,
    /// First link, called femur in a yaw-hip leg. Millimetres, above zero.
    pub thigh: f64,
    /// Second link, called tibia in a yaw-hip leg. Millimetres, above zero.
    pub shank: f64,
    /// To which side the knee bends.
    pub bend: Bend,
}

/// Lengths that [`Leg::check`] accepts, in millimetres: wide enough for any machine and narrow
/// enough that no square in f64 overflows or loses bits to underflow.
pub const LENGTHS: std::ops::RangeInclusive<f64> = 1e-15..=1e15;

impl Leg {
    /// Offset + thigh + shank: the length that foot tolerances are relative to, in millimetres.
    #[inline]
    #[must_use]
    pub fn size(&self) -> f64 {
        self.offset + self.thigh + self.shank
    }

    /// Whether these dimensions make a leg.
    ///
    /// # Errors
    /// Names the field, its value and what would be right.
    pub fn check(&self) -> Result<(), String> {
        for (field, value) in [("thigh", self.thigh), ("shank", self.shank)] {
            if !LENGTHS.contains(&value) {
                return Err(format!(
                    "{field} = {value} mm: a link must be between {:e} and {:e} mm long",
                    LENGTHS.start(),
                    LENGTHS.end()
                ));
            }
        }
        if self.offset != 0.0 && !LENGTHS.contains(&self.offset) {
            return Err(format!(
                "offset = {} mm: must be zero or between {:e} and {:e} mm",
                self.offset,
                LENGTHS.start(),
                LENGTHS.end()
            ));
        }
        if !self.bend.suits(self.shape) {
            return Err(format!(
                "bend = {:?}: a {:?}-hip leg bends {}",
                self.bend,
                self.shape,
                match self.shape {
                    Shape::Roll => "Forward or Backward",
                    Shape::Yaw => "Up or Down",
                }
            ));
        }
        Ok(())
    }
}

impl fmt::Display for Leg {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(
            f,
            "{:?}-hip leg, offset {} mm, thigh {} mm, shank {} mm, bending {:?}",
            self.shape, self.offset, self.thigh, self.shank, self.bend
        )
    }
}

/// Joint angles in radians.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Pose {
    /// Roll-hip: positive swings the foot outboard. Yaw-hip: positive swings it forward.
    pub hip: f64,
    /// Roll-hip: positive swings the foot forward. Yaw-hip (femur): positive raises the knee.
    pub thigh: f64,
    /// Flexion: 0 is a straight leg; positive bends it to the leg's [`Bend`] side.
    pub knee: f64,
}

impl Pose {
    /// Largest difference of any joint from `other`, in radians; hip and thigh are compared
    /// around the circle, so that −π and π are the same angle. NaN if any angle is.
    #[must_use]
    pub fn largest_difference(&self, other: &Self) -> f64 {
        [
            around_the_circle(self.hip - other.hip).abs(),
            around_the_circle(self.thigh - other.thigh).abs(),
            (self.knee - other.knee).abs(),
        ]
        .into_iter()
        .fold(0.0, |largest, d| if d <= largest { largest } else { d })
    }
}

/// `angle`, which must lie within (−3π, 3π], moved by a whole turn into (−π, π] if outside.
#[inline]
pub(super) fn around_the_circle(angle: f64) -> f64 {
    use std::f64::consts::{PI, TAU};
    if angle > PI {
        angle - TAU
    } else if angle <= -PI {
        angle + TAU
    } else {
        angle
    }
}

/// What one joint may do, in radians, ends included.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Range {
    /// Smallest angle allowed.
    pub min: f64,
    /// Largest angle allowed.
    pub max: f64,
}

impl Range {
    /// `angle` if allowed, else the nearer end, and whether it was moved. Angles are taken as they
    /// are: no whole turns are added. A NaN is held at `min`; a range with `min > max` gives `max`.
    #[inline]
    #[must_use]
    pub fn hold(self, angle: f64) -> (f64, bool) {
        // Not f64::clamp: that panics on an inverted range.
        #[allow(clippy::manual_clamp)]
        let held = angle.max(self.min).min(self.max);
        (held, held != angle)
    }
}

/// The ranges of all three joints.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Ranges {
    /// Hip.
    pub hip: Range,
    /// Thigh, or femur.
    pub thigh: Range,
    /// Knee flexion.
    pub knee: Range,
}

/// Which joints a range held back.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Held {
    /// Hip.
    pub hip: bool,
    /// Thigh, or femur.
    pub thigh: bool,
    /// Knee.
    pub knee: bool,
}

impl Held {
    /// Whether any joint was held.
    #[must_use]
    pub const fn any(self) -> bool {
        self.hip || self.thigh || self.knee
    }
}

/// Each joint of `pose` held within its range, and which of them had to be.
#[inline]
#[must_use]
pub fn clamp(pose: &Pose, ranges: &Ranges) -> (Pose, Held) {
    let (hip, hip_held) = ranges.hip.hold(pose.hip);
    let (thigh, thigh_held) = ranges.thigh.hold(pose.thigh);
    let (knee, knee_held) = ranges.knee.hold(pose.knee);
    (Pose { hip, thigh, knee }, Held { hip: hip_held, thigh: thigh_held, knee: knee_held })
}

/// Whether the foot can be where it was asked to be.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Verdict {
    /// The target lies in the reachable set, its edge included.
    Reached,
    /// The target lies outside and was moved to the closest point of the reachable set.
    Moved,
    /// A coordinate of the target is NaN; the zero pose is given in its place.
    NotANumber,
}

/// Straight-line distance between two points, without overflow or underflow on the way.
#[inline]
#[must_use]
pub fn distance(a: [f64; 3], b: [f64; 3]) -> f64 {
    let apart = [a[0] - b[0], a[1] - b[1], a[2] - b[2]];
    let square: f64 = apart.iter().map(|v| v * v).sum();
    // Squares that neither overflow nor lose bits below the smallest number are as good, and quicker.
    if (1e-200..1e200).contains(&square) { square.sqrt() } else { apart[0].hypot(apart[1]).hypot(apart[2]) }
}
