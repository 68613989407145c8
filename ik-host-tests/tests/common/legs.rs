//! Legs and targets: drawn by proptest, or from a fixed seed for sweeps.

use ik_host_tests::reference::{Bend, Leg, Shape};
use proptest::prelude::*;
use rand::{RngExt, SeedableRng};
use rand_xoshiro::Xoshiro256PlusPlus;
use std::f64::consts::{FRAC_PI_2, PI};

/// The orchard walker's leg: the demo with roll hips.
pub const ORCHARD: Leg =
    Leg { shape: Shape::Roll, offset: 31.5, thigh: 94.0, shank: 107.0, bend: Bend::Forward };
/// The culvert walker's leg: the demo with yaw hips.
pub const CULVERT: Leg = Leg { shape: Shape::Yaw, offset: 42.0, thigh: 71.0, shank: 118.0, bend: Bend::Up };

/// Both hips, both bends.
pub const KINDS: [(Shape, Bend); 4] = [
    (Shape::Roll, Bend::Forward),
    (Shape::Roll, Bend::Backward),
    (Shape::Yaw, Bend::Up),
    (Shape::Yaw, Bend::Down),
];

/// The length that errors are fractions of: thigh and shank.
pub fn reach(leg: &Leg) -> f64 {
    leg.thigh + leg.shank
}

/// A leg within sense: links of 20 to 300 mm, at most four times as long as one another, offset 0 to 100 mm.
pub fn leg_of(kind: usize, thigh: f64, ratio: f64, offset: f64) -> Leg {
    let (shape, bend) = KINDS[kind % KINDS.len()];
    let shank = (thigh * 4f64.powf(ratio)).clamp(20.0, 300.0);
    // An offset below zero stands for a leg without.
    let offset = offset.clamp(0.0, 1.9 * (thigh + shank));
    // Like targets, measures are rounded to what the coarsest number system holds, so that what is measured is
    // the solver's error and not that of the leg's measures.
    let [offset, thigh, shank] = [offset, thigh, shank].map(|mm| f64::from(mm as f32));
    Leg { shape, offset, thigh, shank, bend }
}

/// A point that the foot can be at: `hip`, `line` in units of π for the hip's angle and the line to the foot,
/// `knee` for its flexion.
pub fn target_of(leg: &Leg, hip: f64, line: f64, knee: f64) -> [f64; 3] {
    let span = (leg.thigh.powi(2) + leg.shank.powi(2) + 2.0 * leg.thigh * leg.shank * (PI * knee).cos())
        .max(0.0)
        .sqrt();
    let (sin, cos) = (PI * hip).sin_cos();
    match leg.shape {
        Shape::Roll => {
            let (depth, x) = (span * (FRAC_PI_2 * line).cos(), span * (FRAC_PI_2 * line).sin());
            [x, leg.offset * cos + depth * sin, leg.offset * sin - depth * cos]
        }
        Shape::Yaw => {
            let (out, z) = (span * (PI * line).cos(), span * (PI * line).sin());
            // The side of the ring that lies beyond the yaw axis belongs to the hip's other half turn.
            let out = if leg.offset + out < 0.0 { -out } else { out };
            [(leg.offset + out) * sin, (leg.offset + out) * cos, z]
        }
    }
}

/// Any leg within sense, the demo legs now and then.
pub fn any_leg() -> impl Strategy<Value = Leg> {
    prop_oneof![
        8 => (0usize..4, 20.0..300.0, -1.0..1.0, -25.0..100.0).prop_map(|(k, t, r, o)| leg_of(k, t, r, o)),
        1 => Just(ORCHARD),
        1 => Just(CULVERT),
    ]
}

/// A leg and a target that it can reach.
pub fn leg_and_target() -> impl Strategy<Value = (Leg, [f64; 3])> {
    (any_leg(), -1.0..1.0, -1.0..1.0, knee()).prop_map(|(leg, hip, line, knee)| {
        let target = target_of(&leg, hip, line, knee);
        (leg, target)
    })
}

/// A knee in units of π: anywhere, or near straight or folded.
fn knee() -> impl Strategy<Value = f64> {
    prop_oneof![
        4 => 0.0..1.0,
        1 => (-6.0..-1.0).prop_map(|e: f64| 10f64.powf(e)),
        1 => (-6.0..-1.0).prop_map(|e: f64| 1.0 - 10f64.powf(e)),
    ]
}

/// A leg and a point in a box of one and a half times its size, within reach or not.
pub fn leg_and_point() -> impl Strategy<Value = (Leg, [f64; 3])> {
    (any_leg(), prop::array::uniform3(-1.5..1.5)).prop_map(|(leg, unit)| {
        let target = unit.map(|u: f64| u * leg.size());
        (leg, target)
    })
}

/// Legs and targets from a seed.
pub struct Sweep(Xoshiro256PlusPlus);

impl Sweep {
    pub fn from_seed(seed: u64) -> Self {
        Self(Xoshiro256PlusPlus::seed_from_u64(seed))
    }

    pub fn within(&mut self, least: f64, most: f64) -> f64 {
        self.0.random_range(least..most)
    }

    pub fn bits(&mut self) -> u32 {
        self.0.random()
    }

    /// A leg within sense, like [`any_leg`].
    pub fn leg(&mut self) -> Leg {
        match self.0.random_range(0..10) {
            0 => ORCHARD,
            1 => CULVERT,
            n => {
                let (thigh, ratio) = (self.within(20.0, 300.0), self.within(-1.0, 1.0));
                let offset = self.within(-25.0, 100.0);
                leg_of(n, thigh, ratio, offset)
            }
        }
    }

    /// A target that the leg can reach, like [`leg_and_target`]'s.
    pub fn target(&mut self, leg: &Leg) -> [f64; 3] {
        let (hip, line) = (self.within(-1.0, 1.0), self.within(-1.0, 1.0));
        let knee = match self.0.random_range(0..6) {
            0 => 10f64.powf(self.within(-6.0, -1.0)),
            1 => 1.0 - 10f64.powf(self.within(-6.0, -1.0)),
            _ => self.within(0.0, 1.0),
        };
        target_of(leg, hip, line, knee)
    }

    /// A point in a box of one and a half times the leg's size.
    pub fn point(&mut self, leg: &Leg) -> [f64; 3] {
        [0; 3].map(|_| self.within(-1.5, 1.5) * leg.size())
    }
}
