//! Intervals of f64 with outward rounding: whatever the ends of the operands stand for, the result holds it.
//!
//! Basic operations and roots are rounded to nearest by the processor, so that the next number outward holds the exact one.
//! Sines and arctangents of the standard library are not promised to be; they are widened by `FUNCTION`, and tested
//! against the multiprecision reference.

use std::f64::consts::{FRAC_PI_2, PI, TAU};
use std::ops::{Add, Mul, Neg, Sub};

/// All numbers from `low` to `high`.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Interval {
    /// The least.
    pub low: f64,
    /// The largest.
    pub high: f64,
}

/// What an angle of the standard library may be off by, with room: some units in the last place of π.
const FUNCTION: f64 = 4e-15;

impl Interval {
    /// Nothing but 0.
    pub const ZERO: Self = Self::point(0.0);
    /// Every angle there is, radians.
    pub const CIRCLE: Self = Self { low: -PI - FUNCTION, high: PI + FUNCTION };

    /// Nothing but this.
    pub const fn point(value: f64) -> Self {
        Self { low: value, high: value }
    }

    /// From the one to the other.
    pub const fn new(low: f64, high: f64) -> Self {
        Self { low, high }
    }

    const fn outward(low: f64, high: f64) -> Self {
        Self { low: low.next_down(), high: high.next_up() }
    }

    /// Wider by so much on either side.
    pub fn widened(self, by: f64) -> Self {
        Self::outward(self.low - by, self.high + by)
    }

    /// The largest size.
    pub const fn size(self) -> f64 {
        self.low.abs().max(self.high.abs())
    }

    /// The least size.
    pub fn least_size(self) -> f64 {
        if self.low > 0.0 {
            self.low
        } else if self.high < 0.0 {
            -self.high
        } else {
            0.0
        }
    }

    /// The number in the middle.
    pub fn middle(self) -> f64 {
        self.low + (self.high - self.low) / 2.0
    }

    /// What both hold; the nearest number of this one if they have nothing in common.
    pub fn within(self, low: f64, high: f64) -> Self {
        Self { low: self.low.max(low).min(high), high: self.high.min(high).max(low) }
    }

    /// Whether it holds a number.
    pub fn holds(self, value: f64) -> bool {
        self.low <= value && value <= self.high
    }

    /// Its square: never negative.
    pub fn square(self) -> Self {
        let (least, most) = (self.least_size(), self.size());
        Self { low: (least * least).next_down().max(0.0), high: (most * most).next_up() }
    }

    /// Its root; of what lies below 0, 0.
    pub fn root(self) -> Self {
        let root = |v: f64| v.max(0.0).sqrt();
        Self { low: root(self.low).next_down().max(0.0), high: root(self.high).next_up() }
    }

    /// Divided by what is positive.
    pub fn over(self, by: Self) -> Self {
        let low = if self.low < 0.0 { self.low / by.low } else { self.low / by.high };
        let high = if self.high < 0.0 { self.high / by.high } else { self.high / by.low };
        if by.low > 0.0 {
            Self::outward(low, high)
        } else {
            Self { low: f64::NEG_INFINITY, high: f64::INFINITY }
        }
    }

    /// The arcsine of what lies within [−1, 1].
    pub fn arc_sine(self) -> Self {
        let [low, high] = [self.low, self.high].map(|v| v.clamp(-1.0, 1.0).asin());
        Self { low, high }.widened(FUNCTION)
    }

    /// The cosine.
    pub fn cosine(self) -> Self {
        let [low, high] = [self.low.cos(), self.high.cos()];
        let holds_turn_of = |phase: f64| {
            let turns = ((self.low - phase - FUNCTION) / TAU).ceil();
            turns * TAU + phase <= self.high + FUNCTION
        };
        Self {
            low: if holds_turn_of(PI) { -1.0 } else { low.min(high) - FUNCTION },
            high: if holds_turn_of(0.0) { 1.0 } else { low.max(high) + FUNCTION },
        }
        .within(-1.0, 1.0)
    }

    /// The sine.
    pub fn sine(self) -> Self {
        Self::outward(self.low - FRAC_PI_2, self.high - FRAC_PI_2).widened(FUNCTION).cosine()
    }

    /// The directions of the vectors (x, y): an interval about a direction in (−π, π], which may reach beyond.
    pub fn direction([x, y]: [Self; 2]) -> Self {
        if x.holds(0.0) && y.holds(0.0) {
            return Self::CIRCLE;
        }
        let (mid_x, mid_y) = (x.middle(), y.middle());
        let (mut low, mut high) = (0.0f64, 0.0f64);
        // Seen from 0, a box that does not hold it has its outermost directions at corners, within half a turn.
        for corner_x in [x.low, x.high] {
            for corner_y in [y.low, y.high] {
                let away = (mid_x * corner_y - mid_y * corner_x).atan2(mid_x * corner_x + mid_y * corner_y);
                low = low.min(away);
                high = high.max(away);
            }
        }
        let middle = mid_y.atan2(mid_x);
        // What a cross product of nearly parallel vectors loses is a unit in the last place of the angle.
        Self { low: middle + low, high: middle + high }.widened(FUNCTION)
    }
}

impl Add for Interval {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Self::outward(self.low + other.low, self.high + other.high)
    }
}

impl Sub for Interval {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        Self::outward(self.low - other.high, self.high - other.low)
    }
}

impl Neg for Interval {
    type Output = Self;
    fn neg(self) -> Self {
        Self { low: -self.high, high: -self.low }
    }
}

impl Mul for Interval {
    type Output = Self;
    fn mul(self, other: Self) -> Self {
        let products =
            [self.low * other.low, self.low * other.high, self.high * other.low, self.high * other.high];
        let (mut low, mut high) = (products[0], products[0]);
        for product in products {
            low = low.min(product);
            high = high.max(product);
        }
        Self::outward(low, high)
    }
}
