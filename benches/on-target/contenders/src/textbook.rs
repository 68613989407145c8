//! The textbook form: right triangle at the hip, law of cosines at knee and thigh, over general-purpose libraries.
//!
//! The very files that the benches on the PC measure; what they compute and how well stands there. They take a foot in
//! reach and tell no outcome, which spares them some instructions that the others spend.

use core::marker::PhantomData;

use fixed::types::I16F16;
use ik_core::{RollHip, YawHip};
use targets::{STEPS_PER_MM, Target};

use crate::contender::{Contender, Named, PublishedHip, To};

// The folder of the benches that hold them.
#[path = "../../../src"]
mod benches {
    pub(crate) mod textbook;
}
use benches::textbook::{on_cordic, on_libm, on_micromath};

/// The textbook form of one leg over one library.
pub struct Textbook<H, L>(PhantomData<(H, L)>);

/// libm in `f32`.
pub struct OnLibm;
/// micromath in `f32`.
pub struct OnMicromath;
/// The crate `cordic` on `fixed`'s `I16F16`.
pub struct OnCordic;

/// A library to write the form over.
pub trait Library: 'static {
    /// What it computes with.
    type Number: Copy + 'static;
    /// What it is, for the table.
    const WHAT: &'static str;

    /// A length of so many steps of 1/64 mm, exact.
    fn length(steps: i32) -> Self::Number;
    /// As it is stored.
    fn bits(number: Self::Number) -> u32;
    /// An angle in radians.
    fn radians(angle: Self::Number) -> f64;
}

/// The form for a hip.
pub trait Form<H>: Library {
    /// Offset, thigh, shank.
    const LEG: [Self::Number; 3];
    /// Hip, thigh, knee.
    fn solve(leg: [Self::Number; 3], foot: [Self::Number; 3]) -> [Self::Number; 3];
}

impl<H: PublishedHip, L: Form<H>> Contender for Textbook<H, L>
where
    Self: Named,
{
    type Hip = H;
    type Leg = [L::Number; 3];
    type Foot = [L::Number; 3];
    type Answer = [L::Number; 3];

    const WHAT: &'static str = L::WHAT;
    const TO: To = To::Joints;
    const LEG: [L::Number; 3] = L::LEG;

    fn foot(target: Target) -> [L::Number; 3] {
        target.map(L::length)
    }

    #[inline]
    fn solve(leg: &[L::Number; 3], foot: &[L::Number; 3]) -> [L::Number; 3] {
        L::solve(*leg, *foot)
    }

    fn bits(answer: &[L::Number; 3]) -> [u32; 4] {
        let [hip, thigh, knee] = answer.map(L::bits);
        [hip, thigh, knee, 0]
    }

    fn joints(answer: &[L::Number; 3]) -> [f64; 3] {
        answer.map(L::radians)
    }
}

impl Library for OnLibm {
    type Number = f32;
    const WHAT: &'static str = "textbook on libm f32";

    fn length(steps: i32) -> f32 {
        steps as f32 / STEPS_PER_MM as f32
    }

    fn bits(number: f32) -> u32 {
        number.to_bits()
    }

    fn radians(angle: f32) -> f64 {
        f64::from(angle)
    }
}

impl Library for OnMicromath {
    type Number = f32;
    const WHAT: &'static str = "textbook on micromath f32";

    fn length(steps: i32) -> f32 {
        OnLibm::length(steps)
    }

    fn bits(number: f32) -> u32 {
        number.to_bits()
    }

    fn radians(angle: f32) -> f64 {
        f64::from(angle)
    }
}

impl Library for OnCordic {
    type Number = I16F16;
    const WHAT: &'static str = "textbook on cordic I16F16";

    fn length(steps: i32) -> I16F16 {
        I16F16::from_bits(steps * ((1 << 16) / STEPS_PER_MM / on_cordic::UNIT_MM as i32))
    }

    fn bits(number: I16F16) -> u32 {
        number.to_bits() as u32
    }

    fn radians(angle: I16F16) -> f64 {
        f64::from(angle)
    }
}

/// mm in the unit of the form on cordic, while compiling.
const fn in_units(mm: f64) -> I16F16 {
    I16F16::from_bits((mm / on_cordic::UNIT_MM * 65536.0) as i32)
}

macro_rules! forms {
    ($($library:ty, $module:ident, $number:expr;)*) => { $(
        forms!($library, $module::roll_hip, RollHip, $number);
        forms!($library, $module::yaw_hip, YawHip, $number);
    )* };
    ($library:ty, $form:path, $hip:ty, $number:expr) => {
        impl Form<$hip> for $library {
            const LEG: [Self::Number; 3] = {
                let leg = <$hip as PublishedHip>::PUBLISHED;
                [$number(leg.offset_mm), $number(leg.thigh_mm), $number(leg.shank_mm)]
            };

            #[inline]
            fn solve(leg: [Self::Number; 3], foot: [Self::Number; 3]) -> [Self::Number; 3] {
                $form(leg, foot)
            }
        }
    };
}

const fn in_mm(mm: f64) -> f32 {
    mm as f32
}

forms! {
    OnLibm, on_libm, in_mm;
    OnMicromath, on_micromath, in_mm;
    OnCordic, on_cordic, in_units;
}
