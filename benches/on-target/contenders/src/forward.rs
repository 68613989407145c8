//! Where the foot is, in `f64`: what the contenders are judged by. Written down on its own, from the frames and signs
//! that ik-core documents; it shares no code with what it judges.

use ik_core::{RollHip, YawHip};
use targets::{PublishedLeg, STEPS_PER_MM, Target};

use crate::contender::PublishedHip;

/// A hip whose forward kinematics is known here.
pub trait Forward {
    /// The foot, mm, for joints in radians.
    fn foot_mm(leg: &PublishedLeg, joints: [f64; 3]) -> [f64; 3];
}

impl Forward for RollHip {
    fn foot_mm(leg: &PublishedLeg, [hip, thigh, knee]: [f64; 3]) -> [f64; 3] {
        let (sine, cosine) = libm::sincos(hip);
        let down = leg.thigh_mm * libm::cos(thigh) + leg.shank_mm * libm::cos(thigh - knee);
        let forward = leg.thigh_mm * libm::sin(thigh) + leg.shank_mm * libm::sin(thigh - knee);
        [forward, leg.offset_mm * cosine + down * sine, leg.offset_mm * sine - down * cosine]
    }
}

impl Forward for YawHip {
    fn foot_mm(leg: &PublishedLeg, [hip, femur, knee]: [f64; 3]) -> [f64; 3] {
        let (sine, cosine) = libm::sincos(hip);
        let out = leg.offset_mm + leg.thigh_mm * libm::cos(femur) + leg.shank_mm * libm::cos(femur - knee);
        let up = leg.thigh_mm * libm::sin(femur) + leg.shank_mm * libm::sin(femur - knee);
        [out * sine, out * cosine, up]
    }
}

/// How far the foot is from where it was asked to be, mm.
pub fn foot_error_mm<H: PublishedHip>(joints: [f64; 3], target: Target) -> f64 {
    let foot = H::foot_mm(&H::PUBLISHED, joints);
    let asked = target.map(|steps| f64::from(steps) / f64::from(STEPS_PER_MM));
    let [x, y, z] = [0, 1, 2].map(|axis| foot[axis] - asked[axis]);
    libm::sqrt(x * x + y * y + z * z)
}
