//! micromath's functions: smaller and faster, and good to some hundredths.

use super::wrapped;
use core::f32::consts::PI;
use micromath::F32Ext;

/// Hip, thigh, knee (rad) of a roll-hip leg whose knee bends forward.
#[inline]
pub fn roll_hip([offset, thigh, shank]: [f32; 3], [x, y, z]: [f32; 3]) -> [f32; 3] {
    let depth = F32Ext::sqrt(y * y + z * z - offset * offset);
    let hip = F32Ext::atan2(z, y) + F32Ext::atan2(depth, offset);
    let [thigh, knee] = triangle(thigh, shank, x, depth);
    [wrapped(hip), thigh, knee]
}

/// Hip, femur, knee (rad) of a yaw-hip leg whose knee bends up.
#[inline]
pub fn yaw_hip([coxa, femur, tibia]: [f32; 3], [x, y, z]: [f32; 3]) -> [f32; 3] {
    let along = F32Ext::sqrt(x * x + y * y) - coxa;
    let [femur, knee] = triangle(femur, tibia, z, along);
    [F32Ext::atan2(x, y), femur, knee]
}

#[inline]
fn triangle(thigh: f32, shank: f32, across: f32, along: f32) -> [f32; 2] {
    let span_square = along * along + across * across;
    let span = F32Ext::sqrt(span_square);
    // The root may put the foot beyond reach: an arccosine of more than 1 would be NaN.
    let arccosine = |cosine: f32| F32Ext::acos(cosine.clamp(-1.0, 1.0));
    let interior = arccosine((thigh * thigh + shank * shank - span_square) / (2.0 * thigh * shank));
    let corner = arccosine((thigh * thigh + span_square - shank * shank) / (2.0 * thigh * span));
    [wrapped(F32Ext::atan2(across, along) + corner), PI - interior]
}
