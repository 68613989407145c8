//! ik-core's whole way: from a foot on the body's frame, through joint ranges and pulse ranges, to three timer ticks.

use core::marker::PhantomData;

use ik_core::{Answer, Channel, Foot, Hip, Joints, Limb, Number};
use targets::Target;

use crate::contender::{Contender, Named, PublishedHip, To};
use crate::in_flash::InFlash;
use crate::ours::unreached;

/// [`Limb::command`] with its servos on a timer.
pub struct OursToTicks<H, N>(PhantomData<(H, N)>);

impl<H: Hip + PublishedHip, N: InFlash<H>> Contender for OursToTicks<H, N>
where
    Self: Named,
{
    type Hip = H;
    type Leg = Limb<H, N, Channel<N>>;
    type Foot = Foot<N>;
    /// The pose is kept as well: a firmware gives it back with the next foot.
    type Answer = (Answer<N>, [u32; 3]);

    const WHAT: &'static str = <N as Number>::NAME;
    const OURS: bool = true;
    const TO: To = To::Ticks;
    const LEG: Limb<H, N, Channel<N>> = N::LIMB;

    fn foot(target: Target) -> Foot<N> {
        let [x, y, z] = target.map(N::in_steps);
        N::LIMB.mounting.body_frame(Foot::new(x, y, z))
    }

    #[inline]
    fn solve(limb: &Limb<H, N, Channel<N>>, foot: &Foot<N>) -> Self::Answer {
        let command = limb.command(*foot, Joints::ZERO);
        (command.answer, command.counts())
    }

    fn bits((answer, [hip, thigh, knee]): &Self::Answer) -> [u32; 4] {
        [*hip, *thigh, *knee, unreached(answer)]
    }

    fn joints((answer, _): &Self::Answer) -> [f64; 3] {
        answer.joints.as_array().map(|joint| joint.radians())
    }
}
