//! What each primitive of each number system promises, as plain numbers: the certificate is built on these and on nothing
//! else about the number systems.
//!
//! A primitive's bound is on the difference between what it computes and what the exact function gives **of the very
//! values that it was handed**; what was wrong with those already is carried along by [`certify`](crate::certify). The
//! values are of feet within the leg's radius (offset, thigh and shank together), in mm once multiplied by
//! [`unit_mm`](Bounds::unit_mm) of the leg.
//!
//! | primitive | field |
//! | --- | --- |
//! | `coord_from_mm`, `product_from_mm` | [`coord_of`](Bounds::coord_of), [`product_of`](Bounds::product_of): what they give |
//! | `+`, `−` of coordinates | [`sum`](Bounds::sum) |
//! | `square`, `square_from_mm2`, `cylinder_from_mm2` | [`square`](Bounds::square), [`square_constant`](Bounds::square_constant), [`cylinder`](Bounds::cylinder) |
//! | `root`, `depth` | [`root`](Bounds::root) |
//! | `radial`, `radial_of` | [`radial`](Bounds::radial), [`radial_square`](Bounds::radial_square) |
//! | `stretch`, `widen`, `+` of products | [`stretch`](Bounds::stretch), [`widen`](Bounds::widen), [`product_sum`](Bounds::product_sum) |
//! | `turn`, `hip_angle`, `yaw_angle` | [`turn`](Bounds::turn), [`hip`](Bounds::hip), [`yaw`](Bounds::yaw) |
//! | `knee` and `knee_angle` | [`knee`](Bounds::knee) |
//! | `rescale` of `enlarged` | [`rescale`](Bounds::rescale) |
//! | `angle_from_turns`, `range_from_turns` | [`angle`](Bounds::angle) |
//! | `on_line` | [`line`](Bounds::line) |

mod coarse;
mod fixed16;
mod fixed32;
mod float32;
mod short32;

pub use coarse::COARSE;
pub use fixed16::FIXED16;
pub use fixed32::FIXED32;
pub use float32::FLOAT32;
pub use short32::SHORT32;

/// The bounds of every number system that has some.
pub const ALL: [&Bounds; 5] = [&FLOAT32, &COARSE, &FIXED32, &SHORT32, &FIXED16];

/// The bounds of a number system's primitives.
#[derive(Debug, Clone, Copy)]
pub struct Bounds {
    /// The number system's name.
    pub number: &'static str,
    /// The smallest step of a coordinate (of the exact squares, in floating point) for a leg of this radius, mm.
    pub unit_mm: fn(radius_mm: f64) -> f64,
    /// The greatest radius of a leg, mm.
    pub most_radius_mm: f64,
    /// A length, which a foot's coordinate is rounded to when it is asked for: relative, and mm.
    pub length: [f64; 2],
    /// A coordinate made from mm, in mm, with this unit.
    pub coord_of: fn(mm: f64, unit_mm: f64) -> f64,
    /// A product made from mm, in mm, with this unit.
    pub product_of: fn(mm: f64, unit_mm: f64) -> f64,
    /// A sum or difference of two coordinates, of itself; it has no units.
    pub sum: Rounding,
    /// The square of a coordinate.
    pub square: Squaring,
    /// A square made from mm²; units².
    pub square_constant: f64,
    /// The square of a roll-hip leg's offset; units².
    pub cylinder: f64,
    /// A root, of itself; `depth` too.
    pub root: Rounding,
    /// A radius, of itself.
    pub radial: Rounding,
    /// (radius − offset)².
    pub radial_square: RadialSquare,
    /// A product of a coordinate and a ratio, of itself.
    pub stretch: Rounding,
    /// A coordinate as a product.
    pub widen: Rounding,
    /// A sum of products, of itself.
    pub product_sum: Rounding,
    /// [`turn`](ik_core::Number::turn).
    pub turn: Turning,
    /// [`hip_angle`](ik_core::Number::hip_angle).
    pub hip: Turning,
    /// [`yaw_angle`](ik_core::Number::yaw_angle).
    pub yaw: Turning,
    /// [`knee`](ik_core::Number::knee).
    pub knee: KneeBounds,
    /// A coordinate of an enlarged vector over its norm, times a length: what `enlarged` and `rescale` make of each by itself.
    pub rescale: Rounding,
    /// And what they, and squares of an enlarged vector, make of all three alike; relative.
    pub rescale_common: f64,
    /// A joint's limit, which is rounded inward.
    pub angle: AngleRounding,
    /// Counts beyond ½, as a fraction of the counts in a turn and in the pulse at no angle together.
    pub line: f64,
}

/// Off by no more than `relative` of the size of the exact result and `units` units.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Rounding {
    /// Of the exact result.
    pub relative: f64,
    /// Units.
    pub units: f64,
}

/// Off by no more than `relative` of the size and `rad` radians; where an angle is half a turn, which may be one less, by `rad`.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct AngleRounding {
    /// Of the size.
    pub relative: f64,
    /// Radians.
    pub rad: f64,
}

/// Off by no more than `linear`·units·min(|v|, `up_to` units) + `units2` units².
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Squaring {
    /// Units, times the size of what is squared.
    pub linear: f64,
    /// The size beyond which `linear` counts no more, units.
    pub up_to: f64,
    /// Units².
    pub units2: f64,
}

/// (R − c)² from R² and c, off by no more than `product`·c·R + `linear` units·(R + c) + `units2`·(1 + c / max(R, 4 units))
/// units².
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct RadialSquare {
    /// Times c·R.
    pub product: f64,
    /// Units, times R + c.
    pub linear: f64,
    /// Units², and as much again per c / R.
    pub units2: f64,
}

/// An angle that turns `from` to `to`: besides missing by the difference d of the two lengths (by d along `to`, by no more than
/// d across), the turned vector misses across by no more than (`rad` or `obtuse_rad`)·|to| + `units` units + `units2` units² / |to|.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Turning {
    /// Radians, if the two are less than a quarter turn apart (and `to` lies ahead, for the yaw).
    pub rad: f64,
    /// Radians, if they are not.
    pub obtuse_rad: f64,
    /// Units.
    pub units: f64,
    /// Units², over the length; and so many times the tangent of half of the angle of it besides. No more than `most_rad`
    /// radians.
    pub units2: [f64; 2],
    /// See `units2`.
    pub most_rad: f64,
    /// Vectors of so many units or more, less than a quarter turn apart, are turned by the quotient of their products: they miss
    /// across by no more than d times the tangent of half of their angle.
    pub by_products_from: f64,
}

/// The knee: all that it returns is within these of what belongs to one s, which is itself within `sine` of √(n / 4·L1·L2)
/// (or of the root for m); `units` of `sine` are over 2·√(L1·L2).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct KneeBounds {
    /// s against the root.
    pub sine: Rounding,
    /// And more of it: of 1.
    pub sine_rest: f64,
    /// `acute` against 2·arcsin s, radians.
    pub angle_rad: f64,
    /// What taking it off half a turn adds.
    pub folded_rad: f64,
    /// `half_sine` against s·√(1 − s²).
    pub half_sine: f64,
    /// `from_end` against s².
    pub from_end: f64,
}

impl Rounding {
    /// Exact.
    pub const NONE: Self = Self { relative: 0.0, units: 0.0 };

    /// Of a result no larger than this, with this unit.
    pub fn of(&self, size: f64, unit: f64) -> f64 {
        self.relative * size + self.units * unit
    }
}

/// The nearest multiple of a step.
fn nearest(mm: f64, step_mm: f64) -> f64 {
    (mm / step_mm).round() * step_mm
}

/// The nearest single-precision number.
fn single(mm: f64, _: f64) -> f64 {
    f64::from(mm as f32)
}

/// The least power of two above the radius over 2^30: a step of floating point's exact squares, mm.
fn step_of_floats(radius_mm: f64) -> f64 {
    let mut range = 1.0;
    while range <= radius_mm {
        range *= 2.0;
    }
    range / f64::from(1 << 30)
}

/// The largest unit of 2^-`bits` mm halved, no more than `most` times, so often that a radius twice as long in units stays below
/// `limit`.
fn unit_of_fixed(bits: i32, most: u32, limit: f64, radius_mm: f64) -> f64 {
    let mut unit = 2.0f64.powi(-bits);
    let mut times = 0;
    while times < most && radius_mm / unit * 2.0 < limit {
        unit /= 2.0;
        times += 1;
    }
    unit
}

#[cfg(test)]
mod tests {
    use super::*;
    use ik_core::number::Placed;
    use ik_core::{Fixed16, Fixed32, Number, Short32};

    /// The unit is what the smallest length, or half of it, and so on, makes of a coordinate.
    fn keeps_units<N: Number>(bounds: &Bounds, least_mm: f64)
    where
        N::Coord: Into<i32>,
    {
        for radius in [1.0, 1.9, 10.0, 57.3, 231.9, 232.0, 299.0, 452.0, 6000.0] {
            if radius > bounds.most_radius_mm {
                continue;
            }
            let scale = N::scale_for(radius).unwrap();
            let Placed::Near([coord, ..]) = N::place([N::length_from_mm(least_mm); 3], scale) else {
                panic!("the smallest length is near");
            };
            let coord: i32 = coord.into();
            assert_eq!((bounds.unit_mm)(radius) * f64::from(coord), least_mm, "{} {radius}", bounds.number);
        }
    }

    #[test]
    fn units_are_those_of_the_number_systems() {
        keeps_units::<Fixed32>(&FIXED32, 1.0 / 65_536.0);
        keeps_units::<Short32>(&SHORT32, 1.0 / 65_536.0);
        keeps_units::<Fixed16>(&FIXED16, 1.0 / 64.0);
    }
}
