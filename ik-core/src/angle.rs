//! Angles and joint angles.

use crate::number::Number;

/// An angle in (−½, ½] turn, stored as the number system likes: radians or a fraction of a turn.
///
/// Fixed point cannot tell +180° from −180°; it stores the angle just inside.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Angle<N: Number>(pub(crate) N::Angle);

impl<N: Number> Angle<N> {
    /// No angle.
    pub const ZERO: Self = Self(N::NO_ANGLE);

    /// An angle in the number system's own representation: `f32` radians, or `I0F32` turns.
    ///
    /// A value outside (−½, ½] turn, or NaN, is refused.
    pub fn from_raw(raw: N::Angle) -> Option<Self> {
        (N::LEAST_ANGLE..=N::MOST_ANGLE).contains(&raw).then_some(Self(raw))
    }

    /// The number system's own representation.
    pub const fn raw(self) -> N::Angle {
        self.0
    }

    /// From degrees in [−180, 180], rounded; anything else, NaN included, is refused.
    ///
    /// On a chip without an FPU this links software floating point unless the argument is a constant.
    pub fn from_degrees(degrees: f64) -> Option<Self> {
        (-180.0..=180.0).contains(&degrees).then(|| Self(N::angle_from_turns(degrees / 360.0)))
    }

    /// From radians in [−π, π], rounded; anything else, NaN included, is refused.
    pub fn from_radians(radians: f64) -> Option<Self> {
        Self::from_degrees(radians.to_degrees())
    }

    /// In turns.
    pub fn turns(self) -> f64 {
        N::turns(self.0)
    }

    /// In degrees.
    pub fn degrees(self) -> f64 {
        self.turns() * 360.0
    }

    /// In radians.
    pub fn radians(self) -> f64 {
        self.turns() * core::f64::consts::TAU
    }
}

/// The three joint angles of a leg; signs as in the [crate's introduction](crate#frames-units-signs).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Joints<N: Number> {
    /// Hip: roll or yaw.
    pub hip: Angle<N>,
    /// Thigh or femur.
    pub thigh: Angle<N>,
    /// Knee flexion.
    pub knee: Angle<N>,
}

impl<N: Number> Joints<N> {
    /// The zero pose.
    pub const ZERO: Self = Self { hip: Angle::ZERO, thigh: Angle::ZERO, knee: Angle::ZERO };

    /// Hip, thigh, knee.
    pub const fn as_array(&self) -> [Angle<N>; 3] {
        [self.hip, self.thigh, self.knee]
    }
}

#[cfg(feature = "defmt")]
impl<N: Number> defmt::Format for Angle<N> {
    fn format(&self, f: defmt::Formatter<'_>) {
        let thousandths = N::millidegrees(self.0);
        let sign = if thousandths < 0 { "-" } else { "" };
        let size = thousandths.unsigned_abs();
        defmt::write!(f, "{=str}{=u32}.{=u32:03} deg", sign, size / 1000, size % 1000);
    }
}

#[cfg(feature = "defmt")]
impl<N: Number> defmt::Format for Joints<N> {
    fn format(&self, f: defmt::Formatter<'_>) {
        defmt::write!(f, "hip {}, thigh {}, knee {}", self.hip, self.thigh, self.knee);
    }
}
