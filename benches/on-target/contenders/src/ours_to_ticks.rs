//! ik-core's whole way: from a foot on the body's frame, through joint ranges and pulse ranges, to three timer ticks.

use core::marker::PhantomData;

use ik_core::channel::Counts;
use ik_core::limb::LimbCommand;
use ik_core::{Channel, Foot, Hip, Joints, Limb, Number};
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
    type Leg = Limb<H, N, [Channel<N>; 3]>;
    type Foot = Foot<N>;
    /// With the pose: a firmware gives it back with the next foot.
    type Answer = LimbCommand<N, Counts>;

    const WHAT: &'static str = <N as Number>::NAME;
    const OURS: bool = true;
    const TO: To = To::Ticks;
    const LEG: Limb<H, N, [Channel<N>; 3]> = N::LIMB;

    fn foot(target: Target) -> Foot<N> {
        let [x, y, z] = target.map(N::in_steps);
        N::LIMB.mounting.body_frame(Foot::new(x, y, z))
    }

    #[inline]
    fn solve(limb: &Limb<H, N, [Channel<N>; 3]>, foot: &Foot<N>) -> Self::Answer {
        limb.command(*foot, Joints::ZERO)
    }

    fn bits(command: &Self::Answer) -> [u32; 4] {
        let [hip, thigh, knee] = command.counts();
        [hip, thigh, knee, unreached(&command.answer) | u32::from(command.pulse_held())]
    }

    fn joints(command: &Self::Answer) -> [f64; 3] {
        command.answer.joints.as_array().map(|joint| joint.radians())
    }
}
