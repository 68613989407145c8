//! Damped least squares: what "just use a general solver" costs.
//!
//! The step is Δ = Jᵀ·(J·Jᵀ + λ²·1)⁻¹·e, with e the way from foot to target and J the foot's derivative by the joints:
//! Wampler, "Manipulator inverse kinematic solutions based on vector formulations and damped least-squares methods",
//! IEEE Transactions on Systems, Man, and Cybernetics 16 (1986), pages 93–101 (from memory). The damping goes with the
//! error, λ² = |e|²/8 + 0.01 mm², so that the last steps are nearly Newton's; of 1, 2, 4, 8, 16, 32 and 64 in the place
//! of that 8, 4 and 8 need the fewest steps over the published targets, 4.4 and 4.7 on average. Every target starts
//! from the middle of the joint ranges and is followed to 0.001 mm, by nalgebra in `f32`, with sines and cosines from
//! libm.

use core::marker::PhantomData;

use ik_core::{RollHip, YawHip};
use nalgebra::{Matrix3, Vector3};
use targets::{PublishedLeg, STEPS_PER_MM, Target};

use crate::contender::{Contender, Named, PublishedHip, To};

/// Steps are given up after so many.
pub const MOST_STEPS: u32 = 50;
/// Near enough, mm.
pub const NEAR_MM: f32 = 1e-3;

/// Damped least squares for one leg.
pub struct LeastSquares<H>(PhantomData<H>);

/// What the solver keeps of a leg.
#[derive(Debug, Clone, Copy)]
pub struct Measures {
    offset: f32,
    thigh: f32,
    shank: f32,
    start: [f32; 3],
}

impl Measures {
    const fn of(leg: PublishedLeg) -> Self {
        let [hip, thigh, knee] = leg.ranges_deg;
        Self {
            offset: leg.offset_mm as f32,
            thigh: leg.thigh_mm as f32,
            shank: leg.shank_mm as f32,
            start: [middle(hip), middle(thigh), middle(knee)],
        }
    }

    /// The foot within the leg's plane and its derivatives: along (down from a roll hip, outward from a yaw hip) and
    /// across (forward, up), each with its derivatives by thigh and knee.
    fn plane(&self, thigh: f32, knee: f32) -> ([f32; 3], [f32; 3]) {
        let (thigh_sine, thigh_cosine) = libm::sincosf(thigh);
        let (shank_sine, shank_cosine) = libm::sincosf(thigh - knee);
        let [a, b] = [self.thigh * thigh_cosine, self.shank * shank_cosine];
        let [c, d] = [self.thigh * thigh_sine, self.shank * shank_sine];
        ([a + b, -(c + d), d], [c + d, a + b, -b])
    }
}

const fn middle([least, most]: [f64; 2]) -> f32 {
    ((least + most) / 2.0).to_radians() as f32
}

/// A hip as the solver sees it.
pub trait Derived {
    /// Where the foot is, and its derivative by the joints.
    fn foot(leg: &Measures, joints: &Vector3<f32>) -> (Vector3<f32>, Matrix3<f32>);
}

impl Derived for RollHip {
    fn foot(leg: &Measures, joints: &Vector3<f32>) -> (Vector3<f32>, Matrix3<f32>) {
        let (sine, cosine) = libm::sincosf(joints.x);
        let ([down, down_by_thigh, down_by_knee], [forward, forward_by_thigh, forward_by_knee]) =
            leg.plane(joints.y, joints.z);
        let (y, z) = (leg.offset * cosine + down * sine, leg.offset * sine - down * cosine);
        (
            Vector3::new(forward, y, z),
            Matrix3::new(
                0.0,
                forward_by_thigh,
                forward_by_knee,
                -z,
                down_by_thigh * sine,
                down_by_knee * sine,
                y,
                -down_by_thigh * cosine,
                -down_by_knee * cosine,
            ),
        )
    }
}

impl Derived for YawHip {
    fn foot(leg: &Measures, joints: &Vector3<f32>) -> (Vector3<f32>, Matrix3<f32>) {
        let (sine, cosine) = libm::sincosf(joints.x);
        let ([along, out_by_femur, out_by_knee], [up, up_by_femur, up_by_knee]) =
            leg.plane(joints.y, joints.z);
        let out = leg.offset + along;
        (
            Vector3::new(out * sine, out * cosine, up),
            Matrix3::new(
                out * cosine,
                out_by_femur * sine,
                out_by_knee * sine,
                -out * sine,
                out_by_femur * cosine,
                out_by_knee * cosine,
                0.0,
                up_by_femur,
                up_by_knee,
            ),
        )
    }
}

/// Joints, and how many steps they took; `None` if the foot was not reached.
pub type Answer = ([f32; 3], Option<u32>);

impl<H: PublishedHip + Derived> Contender for LeastSquares<H>
where
    Self: Named,
{
    type Hip = H;
    type Leg = Measures;
    type Foot = [f32; 3];
    type Answer = Answer;

    const WHAT: &'static str = "damped least squares on nalgebra f32";
    const TO: To = To::Joints;
    const LEG: Measures = Measures::of(H::PUBLISHED);

    fn foot(target: Target) -> [f32; 3] {
        target.map(|steps| steps as f32 / STEPS_PER_MM as f32)
    }

    fn solve(leg: &Measures, foot: &[f32; 3]) -> Answer {
        let target = Vector3::from(*foot);
        let mut joints = Vector3::from(leg.start);
        for steps in 0..MOST_STEPS {
            let (foot, derivative) = H::foot(leg, &joints);
            let error = target - foot;
            let square = error.norm_squared();
            if square < NEAR_MM * NEAR_MM {
                return (joints.into(), Some(steps));
            }
            let damping = square / 8.0 + 0.01;
            let damped = derivative * derivative.transpose() + Matrix3::from_diagonal_element(damping);
            // With the damping the matrix is positive definite; without a decomposition there is no step.
            let Some(decomposed) = damped.cholesky() else { break };
            joints += derivative.transpose() * decomposed.solve(&error);
        }
        (joints.into(), None)
    }

    fn bits((joints, steps): &Answer) -> [u32; 4] {
        let [hip, thigh, knee] = joints.map(f32::to_bits);
        [hip, thigh, knee, u32::from(steps.is_none())]
    }

    fn joints((joints, _): &Answer) -> [f64; 3] {
        joints.map(f64::from)
    }
}
