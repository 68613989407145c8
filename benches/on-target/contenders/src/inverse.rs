//! The joint angles, in `f64`: what the contenders' joints are compared with. Written down on its own, from the frames
//! and signs that ik-core documents; the knee by its half-angle, which loses nothing near straight and folded.

use ik_core::{RollHip, YawHip};
use targets::{PublishedLeg, STEPS_PER_MM, Target};

use crate::contender::PublishedHip;

/// A hip whose inverse kinematics is known here.
pub trait Inverse {
    /// Hip, thigh, knee, radians, for a foot in reach, mm. The knees of both published legs bend forward or up.
    fn joints(leg: &PublishedLeg, foot_mm: [f64; 3]) -> [f64; 3];
}

impl Inverse for RollHip {
    fn joints(leg: &PublishedLeg, [x, y, z]: [f64; 3]) -> [f64; 3] {
        let offset = leg.offset_mm;
        let down = libm::sqrt(y * y + z * z - offset * offset);
        let hip = libm::atan2(z * offset + y * down, y * offset - z * down);
        let [thigh, knee] = triangle(leg, x, down);
        [hip, thigh, knee]
    }
}

impl Inverse for YawHip {
    fn joints(leg: &PublishedLeg, [x, y, z]: [f64; 3]) -> [f64; 3] {
        let [femur, knee] = triangle(leg, z, libm::hypot(x, y) - leg.offset_mm);
        [libm::atan2(x, y), femur, knee]
    }
}

/// Thigh and knee for a foot that lies `across` and `along` in the plane of the leg.
fn triangle(leg: &PublishedLeg, across: f64, along: f64) -> [f64; 2] {
    let (thigh, shank) = (leg.thigh_mm, leg.shank_mm);
    let far = thigh + shank;
    let short_of_straight = far * far - across * across - along * along;
    let short_of_folded = 4.0 * thigh * shank - short_of_straight;
    let knee = 2.0 * libm::atan2(libm::sqrt(short_of_straight), libm::sqrt(short_of_folded));
    let (sine, cosine) = libm::sincos(knee);
    [libm::atan2(across, along) + libm::atan2(shank * sine, thigh + shank * cosine), knee]
}

/// The largest difference of a joint from where it should be, radians.
pub fn joint_error_rad<H: PublishedHip>(joints: [f64; 3], target: Target) -> f64 {
    let foot = target.map(|steps| f64::from(steps) / f64::from(STEPS_PER_MM));
    let right = H::joints(&H::PUBLISHED, foot);
    let apart = |joint: usize| libm::fabs(joints[joint] - right[joint]);
    apart(0).max(apart(1)).max(apart(2))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::forward::foot_error_mm;

    fn round_trip<H: PublishedHip>() {
        for &target in H::PUBLISHED.targets {
            let foot = target.map(|steps| f64::from(steps) / f64::from(STEPS_PER_MM));
            let joints = H::joints(&H::PUBLISHED, foot);
            let off = foot_error_mm::<H>(joints, target);
            assert!(off < 1e-11, "{target:?}: {off} mm");
            assert!(joint_error_rad::<H>(joints, target) == 0.0);
            assert!(
                (joint_error_rad::<H>([joints[0], joints[1] + 1e-3, joints[2]], target) - 1e-3).abs() < 1e-12
            );
        }
    }

    #[test]
    fn inverse_and_forward_agree_on_every_published_target() {
        round_trip::<RollHip>();
        round_trip::<YawHip>();
    }
}
