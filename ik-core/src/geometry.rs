//! The measures of a leg, checked.

use crate::const_math::magnitude;
use core::fmt;
use core::marker::PhantomData;

/// A leg whose first joint rolls about x and carries a sideways offset; thigh and knee pitch.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct RollHip;

/// A leg whose first joint yaws about z and carries a coxa; femur and knee pitch in the upright plane.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct YawHip;

/// The side to which a knee bends; chosen once per leg.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum Bend {
    /// Roll-hip: the knee stands before the line from hip to foot.
    Forward,
    /// Roll-hip: the knee stands behind it.
    Backward,
    /// Yaw-hip: the knee stands above the line from femur joint to foot.
    Up,
    /// Yaw-hip: the knee hangs below it.
    Down,
}

/// Why a leg cannot be built.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
#[non_exhaustive]
pub enum GeometryError {
    /// The hip offset or coxa is NaN or infinite.
    OffsetNotFinite,
    /// The hip offset or coxa is negative; it is measured outboard.
    OffsetNegative,
    /// The thigh (femur) is NaN, infinite, zero or negative.
    ThighNotPositive,
    /// The shank (tibia) is NaN, infinite, zero or negative.
    ShankNotPositive,
    /// One of the two links is more than [`MOST_LINK_RATIO`] times as long as the other.
    LinksOutOfProportion,
    /// The hip offset or coxa is more than [`MOST_OFFSET_RATIO`] times thigh and shank together.
    OffsetOutOfProportion,
    /// The knee of a roll-hip leg bends forward or backward, of a yaw-hip leg up or down.
    BendOfTheOtherHip,
    /// The foot reaches less than 1 mm from the leg's origin.
    TooShort,
    /// The foot reaches farther from the leg's origin than the number system can hold: 16 383 mm, 6 683 mm in
    /// `Short32`, 453 mm in `Fixed16`.
    TooLong,
}

/// The longer link over the shorter one is at most this.
pub const MOST_LINK_RATIO: f64 = 8.0;
/// Hip offset or coxa over thigh and shank together is at most this.
pub const MOST_OFFSET_RATIO: f64 = 2.0;

impl GeometryError {
    /// What is wrong, and what would be right.
    pub const fn message(&self) -> &'static str {
        match self {
            Self::OffsetNotFinite => "the hip offset or coxa is not a finite number of mm",
            Self::OffsetNegative => "the hip offset or coxa is negative; it is measured outboard, from 0 mm",
            Self::ThighNotPositive => "the thigh (femur) must be a finite length above 0 mm",
            Self::ShankNotPositive => "the shank (tibia) must be a finite length above 0 mm",
            Self::LinksOutOfProportion => "one link is more than 8 times as long as the other",
            Self::OffsetOutOfProportion => {
                "the hip offset or coxa is more than twice as long as thigh and shank together"
            }
            Self::BendOfTheOtherHip => {
                "the knee of a roll-hip leg bends forward or backward, of a yaw-hip leg up or down"
            }
            Self::TooShort => "the foot must reach at least 1 mm from the leg's origin",
            Self::TooLong => {
                "the foot reaches farther than the number system holds, 16383 mm (6683 mm in short32, 453 mm in fixed16)"
            }
        }
    }
}

impl fmt::Display for GeometryError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.message())
    }
}

impl core::error::Error for GeometryError {}

/// The measures of a possible leg, in mm; made by [`roll_hip`](Dimensions::roll_hip) or
/// [`yaw_hip`](Dimensions::yaw_hip), both of which run while compiling.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Dimensions<H> {
    offset_mm: f64,
    thigh_mm: f64,
    shank_mm: f64,
    bend: Bend,
    hip: PhantomData<H>,
}

impl Dimensions<RollHip> {
    /// A leg whose hip rolls about x: the thigh's plane lies `offset_mm` outboard of the roll axis.
    ///
    /// # Errors
    /// Says which measure is impossible, and why.
    pub const fn roll_hip(
        offset_mm: f64,
        thigh_mm: f64,
        shank_mm: f64,
        bend: Bend,
    ) -> Result<Self, GeometryError> {
        if !matches!(bend, Bend::Forward | Bend::Backward) {
            return Err(GeometryError::BendOfTheOtherHip);
        }
        Self::checked(offset_mm, thigh_mm, shank_mm, bend)
    }
}

impl Dimensions<YawHip> {
    /// A leg whose hip yaws about z: the femur's joint sits `coxa_mm` away from the yaw axis.
    ///
    /// # Errors
    /// Says which measure is impossible, and why.
    pub const fn yaw_hip(
        coxa_mm: f64,
        femur_mm: f64,
        tibia_mm: f64,
        bend: Bend,
    ) -> Result<Self, GeometryError> {
        if !matches!(bend, Bend::Up | Bend::Down) {
            return Err(GeometryError::BendOfTheOtherHip);
        }
        Self::checked(coxa_mm, femur_mm, tibia_mm, bend)
    }
}

impl<H> Dimensions<H> {
    const fn checked(
        offset_mm: f64,
        thigh_mm: f64,
        shank_mm: f64,
        bend: Bend,
    ) -> Result<Self, GeometryError> {
        // Each comparison is written so that NaN fails it.
        if !(magnitude(offset_mm) <= f64::MAX) {
            return Err(GeometryError::OffsetNotFinite);
        }
        if offset_mm < 0.0 {
            return Err(GeometryError::OffsetNegative);
        }
        if !(thigh_mm > 0.0 && thigh_mm <= f64::MAX) {
            return Err(GeometryError::ThighNotPositive);
        }
        if !(shank_mm > 0.0 && shank_mm <= f64::MAX) {
            return Err(GeometryError::ShankNotPositive);
        }
        if thigh_mm > MOST_LINK_RATIO * shank_mm || shank_mm > MOST_LINK_RATIO * thigh_mm {
            return Err(GeometryError::LinksOutOfProportion);
        }
        if offset_mm > MOST_OFFSET_RATIO * (thigh_mm + shank_mm) {
            return Err(GeometryError::OffsetOutOfProportion);
        }
        Ok(Self { offset_mm, thigh_mm, shank_mm, bend, hip: PhantomData })
    }

    /// Hip offset or coxa, mm.
    pub const fn offset_mm(&self) -> f64 {
        self.offset_mm
    }

    /// Thigh or femur, mm.
    pub const fn thigh_mm(&self) -> f64 {
        self.thigh_mm
    }

    /// Shank or tibia, mm.
    pub const fn shank_mm(&self) -> f64 {
        self.shank_mm
    }

    /// The side to which the knee bends.
    pub const fn bend(&self) -> Bend {
        self.bend
    }

    /// The farthest that the foot gets from the leg's origin, mm: an upper bound that holds for both hips.
    pub(crate) const fn radius_mm(&self) -> f64 {
        self.offset_mm + self.thigh_mm + self.shank_mm
    }

    /// Whether the knee bends to the side that subtracts from the thigh's swing.
    pub(crate) const fn bends_back(&self) -> bool {
        matches!(self.bend, Bend::Backward | Bend::Down)
    }
}
