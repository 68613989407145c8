//! The leg of a kind alone, with its joint ranges.

use super::{Refused, bend, curves, limits};
use crate::sheet::{LegKind, Robot};
use ik_core::{Curve, Dimensions, GeometryError, Hip, Leg, Number, RollHip, YawHip};

/// The roll-hip leg of a kind in a number system.
///
/// # Errors
/// What ik-core refuses, a yaw-hip kind included, and why.
pub fn roll_leg<N: Number>(robot: &Robot, kind: usize) -> Result<Leg<RollHip, N>, Refused> {
    let sheet = &robot.kinds[kind];
    limited(sheet, roll_measures(sheet)?, &curves(robot, kind)?)
}

/// The yaw-hip leg of a kind in a number system.
///
/// # Errors
/// What ik-core refuses, a roll-hip kind included, and why.
pub fn yaw_leg<N: Number>(robot: &Robot, kind: usize) -> Result<Leg<YawHip, N>, Refused> {
    let sheet = &robot.kinds[kind];
    limited(sheet, yaw_measures(sheet)?, &curves(robot, kind)?)
}

/// Without its servos, but with the joint ranges that suit them.
pub(super) fn limited<H: Hip, N: Number>(
    sheet: &LegKind,
    dimensions: Dimensions<H>,
    curves: &[[Curve; 3]],
) -> Result<Leg<H, N>, Refused> {
    let limits = limits(sheet, dimensions.bend(), curves).map_err(|error| Refused {
        kind: sheet.name.clone(),
        what: "range_deg".into(),
        why: error.to_string(),
    })?;
    Leg::from_dimensions(dimensions, limits).map_err(|error| refused(sheet, error))
}

pub(super) fn roll_measures(sheet: &LegKind) -> Result<Dimensions<RollHip>, Refused> {
    Dimensions::roll_hip(sheet.offset_mm, sheet.thigh_mm, sheet.shank_mm, bend(sheet.bend))
        .map_err(|error| refused(sheet, error))
}

pub(super) fn yaw_measures(sheet: &LegKind) -> Result<Dimensions<YawHip>, Refused> {
    Dimensions::yaw_hip(sheet.offset_mm, sheet.thigh_mm, sheet.shank_mm, bend(sheet.bend))
        .map_err(|error| refused(sheet, error))
}

fn refused(sheet: &LegKind, error: GeometryError) -> Refused {
    Refused { kind: sheet.name.clone(), what: "measures".into(), why: error.to_string() }
}
