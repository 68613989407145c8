//! Forward kinematics as a product of 4×4 homogeneous transforms, in f64.
//!
//! One factor per joint and per link, read off the drawing of the leg, and no angle addition by
//! hand: a slip in the closed forms cannot repeat itself here. (Method: any robotics textbook, for
//! example Craig, *Introduction to Robotics*, ch. 2 and 3.)

use super::leg::{Leg, Pose, Shape};

/// A rigid motion: the upper-left 3×3 turns, the last column shifts, the last row is 0 0 0 1.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Transform(pub [[f64; 4]; 4]);

impl Transform {
    /// No motion.
    pub const IDENTITY: Self =
        Self([[1.0, 0.0, 0.0, 0.0], [0.0, 1.0, 0.0, 0.0], [0.0, 0.0, 1.0, 0.0], [0.0, 0.0, 0.0, 1.0]]);

    /// Right-handed rotation about x: y towards z. Radians.
    #[inline]
    #[must_use]
    pub fn about_x(angle: f64) -> Self {
        let (s, c) = angle.sin_cos();
        Self([[1.0, 0.0, 0.0, 0.0], [0.0, c, -s, 0.0], [0.0, s, c, 0.0], [0.0, 0.0, 0.0, 1.0]])
    }

    /// Right-handed rotation about y: z towards x. Radians.
    #[inline]
    #[must_use]
    pub fn about_y(angle: f64) -> Self {
        let (s, c) = angle.sin_cos();
        Self([[c, 0.0, s, 0.0], [0.0, 1.0, 0.0, 0.0], [-s, 0.0, c, 0.0], [0.0, 0.0, 0.0, 1.0]])
    }

    /// Right-handed rotation about z: x towards y. Radians.
    #[inline]
    #[must_use]
    pub fn about_z(angle: f64) -> Self {
        let (s, c) = angle.sin_cos();
        Self([[c, -s, 0.0, 0.0], [s, c, 0.0, 0.0], [0.0, 0.0, 1.0, 0.0], [0.0, 0.0, 0.0, 1.0]])
    }

    /// A shift along the axes, in the unit of the points it is applied to.
    #[inline]
    #[must_use]
    pub const fn shift(x: f64, y: f64, z: f64) -> Self {
        Self([[1.0, 0.0, 0.0, x], [0.0, 1.0, 0.0, y], [0.0, 0.0, 1.0, z], [0.0, 0.0, 0.0, 1.0]])
    }

    /// The matrix product: `next` happens in the frame that `self` leads to.
    #[inline]
    #[must_use]
    pub fn then(&self, next: &Self) -> Self {
        let mut product = [[0.0; 4]; 4];
        for (row, left) in product.iter_mut().zip(&self.0) {
            for (column, cell) in row.iter_mut().enumerate() {
                *cell = left[0] * next.0[0][column]
                    + left[1] * next.0[1][column]
                    + left[2] * next.0[2][column]
                    + left[3] * next.0[3][column];
            }
        }
        Self(product)
    }

    /// Where the origin of the inner frame lies, seen from the outer.
    #[inline]
    #[must_use]
    pub const fn origin(&self) -> [f64; 3] {
        [self.0[0][3], self.0[1][3], self.0[2][3]]
    }
}

/// The frames of a leg in the leg frame: after the hip joint and its offset (the thigh's axis),
/// at the knee's axis, and at the foot, each turned with the link that carries it.
#[inline]
#[must_use]
pub fn frames(leg: &Leg, pose: &Pose) -> [Transform; 3] {
    let flexion = leg.bend.sign() * pose.knee;
    let (hip, thigh, knee) = match leg.shape {
        Shape::Roll => (
            Transform::about_x(pose.hip).then(&Transform::shift(0.0, leg.offset, 0.0)),
            // A positive turn about y swings a hanging link backwards.
            Transform::about_y(-pose.thigh).then(&Transform::shift(0.0, 0.0, -leg.thigh)),
            Transform::about_y(flexion).then(&Transform::shift(0.0, 0.0, -leg.shank)),
        ),
        Shape::Yaw => (
            // A positive turn about z swings a link that points outboard backwards.
            Transform::about_z(-pose.hip).then(&Transform::shift(0.0, leg.offset, 0.0)),
            Transform::about_x(pose.thigh).then(&Transform::shift(0.0, leg.thigh, 0.0)),
            Transform::about_x(-flexion).then(&Transform::shift(0.0, leg.shank, 0.0)),
        ),
    };
    let at_knee = hip.then(&thigh);
    [hip, at_knee, at_knee.then(&knee)]
}

/// Where the foot is: leg frame, millimetres. Error below [`super::FOOT_TOLERANCE`] of the leg's
/// size for angles within ±2π (tested against 256 bits); NaN or infinite only if an input is.
#[inline]
#[must_use]
pub fn foot(leg: &Leg, pose: &Pose) -> [f64; 3] {
    frames(leg, pose)[2].origin()
}
