//! libm's functions in single precision: what most firmware on a chip with an FPU links.

use super::wrapped;
use core::f32::consts::PI;

/// Hip, thigh, knee (rad) of a roll-hip leg whose knee bends forward.
#[inline]
pub fn roll_hip([offset, thigh, shank]: [f32; 3], [x, y, z]: [f32; 3]) -> [f32; 3] {
    let depth = libm::sqrtf(y * y + z * z - offset * offset);
    let hip = libm::atan2f(z, y) + libm::atan2f(depth, offset);
    let [thigh, knee] = triangle(thigh, shank, x, depth);
    [wrapped(hip), thigh, knee]
}

/// Hip, femur, knee (rad) of a yaw-hip leg whose knee bends up.
#[inline]
pub fn yaw_hip([coxa, femur, tibia]: [f32; 3], [x, y, z]: [f32; 3]) -> [f32; 3] {
    let along = libm::sqrtf(x * x + y * y) - coxa;
    let [femur, knee] = triangle(femur, tibia, z, along);
    [libm::atan2f(x, y), femur, knee]
}

#[inline]
fn triangle(thigh: f32, shank: f32, across: f32, along: f32) -> [f32; 2] {
    let span_square = along * along + across * across;
    let span = libm::sqrtf(span_square);
    let interior = libm::acosf((thigh * thigh + shank * shank - span_square) / (2.0 * thigh * shank));
    let corner = libm::acosf((thigh * thigh + span_square - shank * shank) / (2.0 * thigh * span));
    [wrapped(libm::atan2f(across, along) + corner), PI - interior]
}
