//! What rounding pulses to whole counts makes of joint angles.

use crate::machine::{Counter, trims};
use crate::promises::Bounds;
use crate::sheet::{KneeDrive, LegKind, Robot, Servo, ServoCurve};
use ik_core::output::Output as _;
use std::f64::consts::PI;

/// By how much each servo's angle may be off, radians; and what its knee's servo turns.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Pulses {
    /// Hip, thigh, and knee or shank.
    pub servo_rad: [f64; 3],
    pub knee_drive: KneeDrive,
}

impl Pulses {
    /// The worst over the legs of a kind.
    pub(super) fn of(robot: &Robot, kind: usize, counter: &Counter, bounds: &Bounds) -> Self {
        let sheet: &LegKind = &robot.kinds[kind];
        let counts_per_us = 1.0 / counter.count_us();
        let mut servo_rad = [0.0f64; 3];
        for trims in trims(robot, kind) {
            for joint in 0..3 {
                let off = off_rad(&sheet.servos[joint], trims[joint], counts_per_us, bounds);
                servo_rad[joint] = servo_rad[joint].max(off);
            }
        }
        if sheet.knee_drive == KneeDrive::Parallelogram {
            // Thigh and knee are added up, which may be rounded.
            servo_rad[2] += bounds.angle.relative * PI + bounds.angle.rad;
        }
        Self { servo_rad, knee_drive: sheet.knee_drive }
    }
}

/// A straight piece of a servo's curve: µs per degree in size, and its pulse at no angle.
fn pieces(servo: &Servo, trim_us: f64) -> Vec<(f64, f64)> {
    match &servo.curve {
        ServoCurve::Straight { centre_us, joint_at_centre_deg, us_per_degree, .. } => {
            let least = centre_us.abs() + joint_at_centre_deg.abs() * us_per_degree.abs() + trim_us.abs();
            vec![(us_per_degree.abs(), least)]
        }
        ServoCurve::Measured { measured } => measured
            .windows(2)
            .map(|points| {
                let slope = ((points[1][0] - points[0][0]) / (points[1][1] - points[0][1])).abs();
                (slope, points[0][0].abs() + points[0][1].abs() * slope + trim_us.abs())
            })
            .collect(),
    }
}

fn off_rad(servo: &Servo, trim_us: f64, counts_per_us: f64, bounds: &Bounds) -> f64 {
    let pieces = pieces(servo, trim_us);
    let bends = pieces.len() > 1;
    let steepest = pieces.iter().map(|(slope, _)| *slope).fold(0.0, f64::max);
    pieces
        .iter()
        .map(|(slope, at_zero_us)| {
            let in_a_turn = (360.0 * slope + at_zero_us) * counts_per_us;
            // Something per degree becomes something per radian as radians become degrees.
            let per_rad = slope.to_degrees() * counts_per_us;
            let rounding = 0.5 + (bounds.line * in_a_turn).max(1.0 / 4_194_304.0);
            // Where two pieces meet, a count is held at the last whole one of its piece, and the bend lies at the nearest
            // angle that there is.
            let at_a_bend = if bends {
                0.5 + (bounds.angle.relative * PI + bounds.angle.rad) * steepest.to_degrees() * counts_per_us
            } else {
                0.0
            };
            (rounding + at_a_bend) / per_rad
        })
        .fold(0.0, f64::max)
}
