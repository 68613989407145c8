//! What a number system that carries bounds computes with.
//!
//! Every quantity is an enclosure of the exact values over a box of targets, and bounds on how far the computed value of any
//! one target is from its exact one. Two independent enclosures would forget that the two belong together, and a certificate
//! from them would never be narrower than its boxes.

use super::carried::Table;
use super::decisions::{decide, note};
use super::interval::Interval;
use std::f64::consts::PI;
use std::marker::PhantomData;
use std::ops::{Add, Neg, Sub};

/// A length in mm as users give it: exact.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Length(pub(super) Interval);

/// A length within the solver, mm.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Coord<T> {
    pub(super) exact: Interval,
    /// |computed − exact|.
    pub(super) error: f64,
    /// |computed² − exact²|: near 0, less than `error` tells.
    pub(super) square: f64,
    /// How far the foot is off because of this when all that is worked out from the computed value is exact: what came
    /// in by rounding the place itself. A root of a rounded square comes to nothing here, for hip and thigh go by the
    /// same root.
    pub(super) displaced: f64,
    /// The part of `error` that is this one's by itself, and what share of it all three coordinates of a rescaled place are off
    /// by alike: that turns nothing.
    pub(super) alone: f64,
    pub(super) alike: f64,
    /// The smallest step, mm; 0 for what has none of its own.
    pub(super) unit: f64,
    pub(super) of: PhantomData<T>,
}

/// A sum of squares, mm².
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Square<T> {
    pub(super) exact: Interval,
    pub(super) error: f64,
    /// One of the leg's own: an end of its reach.
    pub(super) constant: bool,
    pub(super) of: PhantomData<T>,
}

/// A pure number. Ratios of the knee's triangle are compared with those of *one* triangle near the exact one, which knee and
/// thigh share (`own`), and with those of the exact one (`full`).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Ratio<T> {
    pub(super) exact: Interval,
    pub(super) own: f64,
    pub(super) full: f64,
    /// By how much the square of the line from thigh joint to foot differs between the two triangles, mm².
    pub(super) gap: f64,
    pub(super) of: PhantomData<T>,
}

/// A product of a coordinate and a ratio, mm.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Product<T> {
    pub(super) exact: Interval,
    /// As of a ratio; of a coordinate, against what it computes to less what it displaces.
    pub(super) own: f64,
    pub(super) full: f64,
    pub(super) gap: f64,
    /// As of a coordinate.
    pub(super) square: f64,
    pub(super) unit: f64,
    pub(super) of: PhantomData<T>,
}

/// What an angle is.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Sort {
    /// What turns one vector to another: the hip of a foot within reach, as a rule.
    Hip,
    /// What turns one vector to another: the thigh; and the hip of a foot moved onto a roll-hip leg's cylinder.
    Turn,
    /// The knee.
    Knee,
    /// The knee of a foot that was moved to an end of the reach, where the solver puts it at its limit exactly.
    KneeAtItsEnd,
    /// A limit or another constant.
    Constant,
}

/// An angle, radians.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Angle<T> {
    pub(super) exact: Interval,
    /// |computed − exact|, around the circle.
    pub(super) error: f64,
    /// A turn: how far what it turns misses where it should come to, along and across the vector there, mm.
    pub(super) along: f64,
    pub(super) across: f64,
    /// And by how much that place itself was displaced by rounding, mm.
    pub(super) displaced: f64,
    /// A knee: against that of the one triangle that it shares with the thigh.
    pub(super) own: f64,
    /// The same if it was then held at a limit which, by n, it does not pass.
    pub(super) own_if_held: f64,
    pub(super) sort: Sort,
    pub(super) of: PhantomData<T>,
}

impl<T> Coord<T> {
    pub(super) const fn new(exact: Interval, error: f64, displaced: f64, unit: f64) -> Self {
        Self {
            exact,
            error,
            square: error * (2.0 * exact.size() + error),
            displaced,
            alone: error,
            alike: 0.0,
            unit,
            of: PhantomData,
        }
    }

    /// The size of the computed value, at the most.
    pub(super) fn size(&self) -> f64 {
        self.exact.size() + self.error
    }
}

impl<T> Square<T> {
    pub(super) fn new(exact: Interval, error: f64) -> Self {
        Self { exact, error, constant: false, of: PhantomData }
    }
}

impl<T> Angle<T> {
    /// Whether it is a limit.
    pub(super) fn is_constant(&self) -> bool {
        self.sort == Sort::Constant
    }

    pub(super) const fn constant(exact: f64, error: f64) -> Self {
        let exact = Interval::point(exact);
        Self {
            exact,
            error,
            along: 0.0,
            across: 0.0,
            displaced: 0.0,
            own: 0.0,
            own_if_held: 0.0,
            sort: Sort::Constant,
            of: PhantomData,
        }
    }
}

impl<T: Table> Coord<T> {
    fn sum_of(exact: Interval, a: Self, b: Self) -> Self {
        let rounding = T::BOUNDS.sum.relative * (exact.size() + a.error + b.error);
        let error = a.error + b.error + rounding;
        Self::new(exact, error, a.displaced + b.displaced + rounding, a.unit.max(b.unit))
    }
}

impl<T: Table> Add for Coord<T> {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Self::sum_of(self.exact + other.exact, self, other)
    }
}

impl<T: Table> Sub for Coord<T> {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        Self::sum_of(self.exact - other.exact, self, other)
    }
}

impl<T> Neg for Coord<T> {
    type Output = Self;
    fn neg(self) -> Self {
        Self { exact: -self.exact, ..self }
    }
}

impl<T> Add for Square<T> {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Self::new(self.exact + other.exact, self.error + other.error)
    }
}

impl<T> Sub for Square<T> {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        Self::new(self.exact - other.exact, self.error + other.error)
    }
}

impl<T> Ratio<T> {
    fn sum_of(exact: Interval, a: Self, b: Self) -> Self {
        Self { exact, own: a.own + b.own, full: a.full + b.full, gap: a.gap.max(b.gap), of: PhantomData }
    }
}

impl<T> Add for Ratio<T> {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Self::sum_of(self.exact + other.exact, self, other)
    }
}

impl<T> Sub for Ratio<T> {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        Self::sum_of(self.exact - other.exact, self, other)
    }
}

impl<T> Neg for Ratio<T> {
    type Output = Self;
    fn neg(self) -> Self {
        Self { exact: -self.exact, ..self }
    }
}

impl<T: Table> Product<T> {
    fn sum_of(exact: Interval, a: Self, b: Self) -> Self {
        let rounding = T::BOUNDS.product_sum.relative * (exact.size() + a.full + b.full);
        Self {
            exact,
            own: a.own + b.own + rounding,
            full: a.full + b.full + rounding,
            gap: a.gap.max(b.gap),
            square: a.square + b.square,
            unit: a.unit.max(b.unit),
            of: PhantomData,
        }
    }
}

impl<T: Table> Add for Product<T> {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Self::sum_of(self.exact + other.exact, self, other)
    }
}

impl<T: Table> Sub for Product<T> {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        Self::sum_of(self.exact - other.exact, self, other)
    }
}

impl<T> Neg for Product<T> {
    type Output = Self;
    fn neg(self) -> Self {
        Self { exact: -self.exact, ..self }
    }
}

/// Whether the computed difference is below 0, or (`or_equal`) 0 as well, when the exact one lies within `exact` and is off by no
/// more than `error`; and whether the exact one may say otherwise.
fn below(exact: Interval, error: f64, or_equal: bool) -> (bool, bool) {
    let is_below = |v: f64| if or_equal { v <= 0.0 } else { v < 0.0 };
    let decided = decide(is_below(exact.low - error), !is_below(exact.high + error));
    (decided, if decided { !is_below(exact.high) } else { is_below(exact.low) })
}

/// All four comparisons by one; `partial_cmp` is for nobody but the traits.
macro_rules! compared {
    ($($quantity:ident)*) => {$(
        impl<T: Table> PartialOrd for $quantity<T> {
            fn partial_cmp(&self, other: &Self) -> Option<std::cmp::Ordering> {
                self.exact.low.partial_cmp(&other.exact.low)
            }
            fn lt(&self, other: &Self) -> bool {
                self.is_below(other, false)
            }
            fn le(&self, other: &Self) -> bool {
                self.is_below(other, true)
            }
            fn gt(&self, other: &Self) -> bool {
                other.is_below(self, false)
            }
            fn ge(&self, other: &Self) -> bool {
                other.is_below(self, true)
            }
        }
    )*};
}

compared!(Coord Square Angle);

impl<T> Coord<T> {
    fn is_below(&self, other: &Self, or_equal: bool) -> bool {
        let error = self.error + other.error;
        let (decided, misjudged) = below(self.exact - other.exact, error, or_equal);
        if misjudged {
            note(|all| all.length_mm += error);
        }
        decided
    }
}

impl<T> Square<T> {
    fn is_below(&self, other: &Self, or_equal: bool) -> bool {
        let error = self.error + other.error;
        let (decided, misjudged) = below(self.exact - other.exact, error, or_equal);
        if misjudged {
            note(|all| all.square_mm2 += error);
        }
        decided
    }
}

impl<T> Angle<T> {
    fn is_below(&self, other: &Self, or_equal: bool) -> bool {
        // The least of a range is on the left of `least ≤ angle` and on the right of `angle < least`.
        let (angle, limit, is_least) = match (self.sort, other.sort) {
            (Sort::Constant, _) => (other, self, or_equal),
            _ => (self, other, !or_equal),
        };
        let (is_knee, end) = (angle.sort == Sort::Knee, limit.exact.middle());
        // Half a turn either way, and a knee that is straight or folded, are where the joint's angle itself ends.
        let ends_there = if is_least { end <= -PI || (is_knee && end == 0.0) } else { end >= PI };
        if angle.sort == Sort::KneeAtItsEnd {
            return or_equal;
        }
        if ends_there && angle.sort != Sort::Constant && limit.sort == Sort::Constant {
            return or_equal;
        }
        let error = self.error + other.error;
        let (decided, misjudged) = below(self.exact - other.exact, error, or_equal);
        if is_knee {
            // The foot is within reach, so that the knee is beyond its limit by no more than rounding.
            if misjudged || (decided && !or_equal) {
                note(|all| {
                    all.knee_rad = all.knee_rad.max(error);
                    all.knee_own_rad = all.knee_own_rad.max(angle.own_if_held + limit.error);
                });
            }
        } else if misjudged {
            let joint = if angle.sort == Sort::Hip { 0 } else { 1 };
            note(|all| all.turns_rad[joint] = all.turns_rad[joint].max(error));
        }
        decided
    }
}

impl PartialOrd for Length {
    fn partial_cmp(&self, other: &Self) -> Option<std::cmp::Ordering> {
        self.0.low.partial_cmp(&other.0.low)
    }
}
