//! The `cordic` crate's functions on fixed point: `I16F16`, and `I32F32` for accuracy.
//!
//! Lengths are in units of 128 mm: squares of millimetres would overflow `I16F16` past 181 mm.

use cordic::CordicNumber;

/// Millimetres in the unit of length.
pub const UNIT_MM: f64 = 128.0;

/// Hip, thigh, knee (rad) of a roll-hip leg whose knee bends forward.
#[inline]
pub fn roll_hip<T: CordicNumber>([offset, thigh, shank]: [T; 3], [x, y, z]: [T; 3]) -> [T; 3] {
    let depth = cordic::sqrt(y * y + z * z - offset * offset);
    let hip = angle_of(z, y) + angle_of(depth, offset);
    let [thigh, knee] = triangle(thigh, shank, x, depth);
    [wrapped(hip), thigh, knee]
}

/// Hip, femur, knee (rad) of a yaw-hip leg whose knee bends up.
#[inline]
pub fn yaw_hip<T: CordicNumber>([coxa, femur, tibia]: [T; 3], [x, y, z]: [T; 3]) -> [T; 3] {
    let along = cordic::sqrt(x * x + y * y) - coxa;
    let [femur, knee] = triangle(femur, tibia, z, along);
    [angle_of(x, y), femur, knee]
}

#[inline]
fn triangle<T: CordicNumber>(thigh: T, shank: T, across: T, along: T) -> [T; 2] {
    let span_square = along * along + across * across;
    let span = cordic::sqrt(span_square);
    let twice = thigh + thigh;
    let interior = cordic::acos((thigh * thigh + shank * shank - span_square) / (twice * shank));
    let corner = cordic::acos((thigh * thigh + span_square - shank * shank) / (twice * span));
    [wrapped(angle_of(across, along) + corner), T::pi() - interior]
}

/// The angle of (x, y), of the smaller quotient: the crate's own of y/x overflows as x becomes small.
fn angle_of<T: CordicNumber>(y: T, x: T) -> T {
    let size = |v: T| if v < T::zero() { -v } else { v };
    if size(y) <= size(x) {
        return cordic::atan2(y, x);
    }
    let angle = T::frac_pi_2() - cordic::atan2(x, size(y));
    if y < T::zero() { -angle } else { angle }
}

/// An angle of less than three half-turns, in (−π, π].
fn wrapped<T: CordicNumber>(angle: T) -> T {
    if angle > T::pi() {
        angle - T::pi() - T::pi()
    } else if angle <= -T::pi() {
        angle + T::pi() + T::pi()
    } else {
        angle
    }
}
