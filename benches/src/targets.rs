//! The feet that everyone is asked for: a fixed list in reach, spread evenly over hip, line to the foot and knee.

use crate::legs::Shape;

/// How many there are.
pub const COUNT: usize = 1000;

/// 1000 feet of the demo leg of this shape, mm: hip and line to the foot within ±0.7 rad, knee 0.3 to 2.2 rad, where
/// no form of the solution is singular.
pub fn feet(shape: Shape) -> Vec<[f64; 3]> {
    let [offset, thigh, shank] = shape.leg();
    (0..COUNT)
        .map(|i| {
            // Additive recurrence on the powers of the root of t⁴ = t + 1: even in three dimensions.
            let unit = [0.819_172_513_396_164_4, 0.671_043_606_703_789_2, 0.549_700_477_901_970_3]
                .map(|step| ((i as f64 + 0.5) * step).fract());
            let (hip, line, knee) = (1.4 * unit[0] - 0.7, 1.4 * unit[1] - 0.7, 0.3 + 1.9 * unit[2]);
            let span = (thigh * thigh + shank * shank + 2.0 * thigh * shank * knee.cos()).sqrt();
            let (across, along) = (span * line.sin(), span * line.cos());
            let (sin, cos) = hip.sin_cos();
            match shape {
                Shape::RollHip => [across, offset * cos + along * sin, offset * sin - along * cos],
                Shape::YawHip => [(offset + along) * sin, (offset + along) * cos, across],
            }
        })
        .collect()
}
