//! Every function of a number system, and opaque values of its types.

use fixed::types::{I0F16, I0F32, I10F6, I16F16};
use ik_core::Number;
#[cfg(any(feature = "float32", feature = "coarse"))]
use ik_core::number::float::{Float, FloatMaths};

use crate::opaque::{number, truth, two, use_up, word};

/// A number system whose values can be opaque.
pub trait Opaque: Number {
    /// Any length.
    fn any_length() -> Self::Length;
    /// Any angle in its representation, those that are none included.
    fn any_angle() -> Self::Angle;
    /// Functions that are not the trait's.
    fn own();
}

/// What a type of `fixed` or `f32` is made of.
trait Raw {
    fn raw() -> Self;
}

macro_rules! raw {
    ($($type:ty = $make:expr;)*) => {$(
        impl Raw for $type {
            fn raw() -> Self {
                $make(word())
            }
        }
    )*};
}

raw! {
    f32 = f32::from_bits;
    I16F16 = |word| I16F16::from_bits(word as i32);
    I0F32 = |word| I0F32::from_bits(word as i32);
    I10F6 = |word| I10F6::from_bits(word as i16);
    I0F16 = |word| I0F16::from_bits(word as i16);
}

macro_rules! opaque {
    ($([$($generics:tt)*] $number:ty, $own:expr;)*) => {$(
        impl<$($generics)*> Opaque for $number {
            fn any_length() -> Self::Length {
                Raw::raw()
            }

            fn any_angle() -> Self::Angle {
                Raw::raw()
            }

            fn own() {
                $own
            }
        }
    )*};
}

#[cfg(any(feature = "float32", feature = "coarse"))]
opaque! {
    [M: FloatMaths] Float<M>, {
        use_up(M::root(Raw::raw()));
        use_up(M::root_of_words(word() as i32, word()));
        use_up(M::double_arc_tangent(Raw::raw()));
        use_up(M::double_arc_sine(Raw::raw(), Raw::raw(), Raw::raw()));
        use_up(M::sin_cos(Raw::raw()));
    };
}
#[cfg(feature = "fixed32")]
opaque! { [] ik_core::Fixed32, {}; }
#[cfg(feature = "short32")]
opaque! { [] ik_core::Short32, {}; }
#[cfg(feature = "fixed16")]
opaque! { [] ik_core::Fixed16, {}; }

/// Every function of the trait, for all that the ones before it can give.
pub fn every_primitive<N: Opaque>() {
    N::own();
    let Some(scale) = N::scale_for(number()) else { return };
    let ratio = || N::ratio_from(number());
    let product = || N::product_from_mm(number(), scale);
    let square = || N::square_from_mm2(number(), scale);
    let coord = || N::coord_from_mm(number(), scale);
    let angle = || N::angle_from_turns(number());
    use_up(N::range_from_turns(two()));
    use_up(ratio());
    use_up(N::extent([N::any_angle(), N::any_angle()], two()));
    use_up(N::length_from_mm(number()));

    let foot = [N::any_length(), N::any_length(), N::any_length()];
    use_up(N::near(foot, scale));
    use_up(N::place(foot, scale));
    use_up(N::length(coord(), scale));
    use_up(N::mm(N::any_length()));
    use_up(N::turns(N::any_angle()));
    use_up(N::millidegrees(N::any_angle()));
    use_up(N::micrometres(N::any_length()));
    use_up(N::length_difference(N::any_length(), N::any_length()));
    use_up(N::length_difference_or_mirrored(N::any_length(), N::any_length(), truth()));

    use_up(N::square(coord(), scale));
    use_up(N::root(square(), scale));
    use_up(N::cylinder_from_mm2(number(), scale));
    use_up(N::radial(square(), coord(), scale));
    use_up(N::radial_of([coord(), coord()], square(), coord(), scale));
    use_up(N::depth([coord(), coord()], coord(), square(), scale));
    use_up(N::stretch(coord(), ratio()));
    use_up(N::widen(coord()));
    use_up(N::turn([product(), product()], [coord(), coord()]));
    use_up(N::hip_angle([coord(), coord()], coord(), coord()));
    use_up(N::yaw_angle([coord(), coord()], coord()));
    use_up(N::knee_angle(N::any_angle(), N::any_angle(), ratio(), truth()));
    use_up(N::knee(square(), square(), N::unit_from_mm(number(), scale), scale));
    use_up(N::are_sound(N::any_angle(), N::any_angle()));

    use_up(N::sin_cos(N::any_angle()));
    use_up(N::angle_sum(angle(), N::any_angle()));
    use_up(N::angle_difference(angle(), N::any_angle()));
    use_up(N::narrow(product()));

    use_up(N::enlarged([coord(), coord(), coord()]));
    use_up(N::rescale(coord(), coord(), coord()));
    use_up(N::halve(coord(), word()));
    use_up(N::distance(foot, [N::any_length(), N::any_length(), N::any_length()]));

    use_up(N::travel(N::any_angle(), N::any_angle(), N::gain_from(number())));
    use_up(N::on_line(N::line_from(number(), number()), N::any_angle()));
    use_up(N::swing_to(word() as i32, N::any_angle(), N::swing_from(number())));
}
