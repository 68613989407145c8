//! ik-core's own legs: from a foot to three joint angles.

use core::marker::PhantomData;

use ik_core::{Answer, Foot, Hip, Joints, Leg, Number, Outcome};
use targets::Target;

use crate::contender::{Contender, Named, PublishedHip, To};
use crate::in_flash::InFlash;

/// [`Leg::solve`] without joint ranges.
pub struct Ours<H, N>(PhantomData<(H, N)>);

impl<H: Hip + PublishedHip, N: InFlash<H>> Contender for Ours<H, N>
where
    Self: Named,
{
    type Hip = H;
    type Leg = Leg<H, N>;
    type Foot = Foot<N>;
    type Answer = Answer<N>;

    const WHAT: &'static str = <N as Number>::NAME;
    const OURS: bool = true;
    const TO: To = To::Joints;
    const LEG: Leg<H, N> = N::FREE_LEG;

    fn foot(target: Target) -> Foot<N> {
        let [x, y, z] = target.map(N::in_steps);
        Foot::new(x, y, z)
    }

    #[inline]
    fn solve(leg: &Leg<H, N>, foot: &Foot<N>) -> Answer<N> {
        leg.solve(*foot, Joints::ZERO)
    }

    fn bits(answer: &Answer<N>) -> [u32; 4] {
        let [hip, thigh, knee] = answer.joints.as_array().map(|joint| N::angle_bits(joint.raw()));
        [hip, thigh, knee, unreached(answer)]
    }

    fn joints(answer: &Answer<N>) -> [f64; 3] {
        answer.joints.as_array().map(|joint| joint.radians())
    }
}

pub(crate) fn unreached<N: Number>(answer: &Answer<N>) -> u32 {
    u32::from(answer.outcome != Outcome::Reached)
}
