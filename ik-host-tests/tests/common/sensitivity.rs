//! How fast joints move with the foot: the gradients of the inverse, from the triangle's geometry.

use ik_host_tests::reference::closed_form::corners_of_triangle;
use ik_host_tests::reference::{Leg, Pose, Shape};

/// Upper bounds on the change of each joint per mm of the foot, rad/mm, for a foot in reach.
///
/// In the triangle of sides L1, L2, G with the corner β at the foot: d knee/dG = −G/(L1·L2·sin knee), and the
/// corner at the thigh's axis moves by −cos β/(L1·sin knee). The line to the foot turns by 1/G per mm across it;
/// the hip by 1/D (roll) or 1/R (yaw).
pub fn joints_per_mm(leg: &Leg, target: [f64; 3]) -> Pose {
    let [x, y, z] = target;
    // How G, the line's direction and the hip go with the foot.
    let (span, span_per_mm, turn_per_mm, hip) = match leg.shape {
        Shape::Roll => {
            let from_axis = y.hypot(z);
            let depth = (from_axis.powi(2) - leg.offset.powi(2)).max(0.0).sqrt();
            let span = depth.hypot(x);
            let depth_per_mm = from_axis / depth;
            (span, x.hypot(from_axis) / span, depth.hypot(x * depth_per_mm) / span.powi(2), 1.0 / depth)
        }
        Shape::Yaw => {
            let from_axis = x.hypot(y);
            let span = (from_axis - leg.offset).hypot(z);
            (span, 1.0, 1.0 / span, 1.0 / from_axis)
        }
    };
    let sin_knee = corners_of_triangle(leg.thigh, leg.shank, span).flexion.sin().max(1e-300);
    Pose {
        hip,
        thigh: turn_per_mm + span_per_mm / (leg.thigh * sin_knee),
        knee: span_per_mm * span / (leg.thigh * leg.shank * sin_knee),
    }
}

/// From the thigh's axis to the foot, mm.
pub fn span(leg: &Leg, [x, y, z]: [f64; 3]) -> f64 {
    match leg.shape {
        Shape::Roll => (x * x + (y.hypot(z) - leg.offset) * (y.hypot(z) + leg.offset)).max(0.0).sqrt(),
        Shape::Yaw => (x.hypot(y) - leg.offset).hypot(z),
    }
}

/// Whether a pose is away from the places where joint angles lose digits: knee 0.1 to 2.6 rad, and the foot
/// farther than a tenth of the reach from the hip's own singular set (D = 0 of a roll hip, R = 0 of a yaw hip).
pub fn away_from_singular(leg: &Leg, target: [f64; 3], pose: &Pose) -> bool {
    let [x, y, z] = target;
    let clear = match leg.shape {
        Shape::Roll => (y * y + z * z - leg.offset * leg.offset).max(0.0).sqrt(),
        Shape::Yaw => x.hypot(y),
    };
    (0.1..=2.6).contains(&pose.knee) && clear > 0.1 * super::legs::reach(leg)
}
