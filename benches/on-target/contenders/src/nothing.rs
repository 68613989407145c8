//! The call alone: what is subtracted from every contender, in instructions and in flash.

use core::marker::PhantomData;

use targets::Target;

use crate::contender::{Contender, Named, PublishedHip, To};

/// Solves nothing.
pub struct Nothing<H>(PhantomData<H>);

impl<H: PublishedHip> Contender for Nothing<H>
where
    Self: Named,
{
    type Hip = H;
    type Leg = ();
    type Foot = Target;
    type Answer = ();

    const WHAT: &'static str = "the call alone";
    const TO: To = To::Nothing;
    const LEG: () = ();

    fn foot(target: Target) -> Target {
        target
    }

    fn solve(_leg: &(), _foot: &Target) {}

    fn bits(_answer: &()) -> [u32; 4] {
        [0; 4]
    }

    fn joints(_answer: &()) -> [f64; 3] {
        [f64::NAN; 3]
    }
}
