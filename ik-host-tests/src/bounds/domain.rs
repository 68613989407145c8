//! Arguments for primitives, and how what they give is read exactly.
//!
//! Coordinates are finer than lengths by a power of two that depends on the leg. For a leg of a suitable size they are as
//! fine, and what [`Number::length`] gives is exactly the coordinate; the size is chosen just above a power of two, where the
//! steps are as coarse beside the leg as they get.

use ik_core::Number;
use rand::{RngExt, SeedableRng};
use rand_xoshiro::Xoshiro256PlusPlus;
use std::f64::consts::{PI, TAU};

/// The radius whose coordinates are lengths, mm; and the smallest step of a square, mm².
fn radius_and_square_step<N: Number>() -> [f64; 2] {
    match N::NAME {
        "fixed32" => [8_193.0, 2f64.powi(-32)],
        "short32" => [3_343.0, 2f64.powi(-4)],
        "fixed16" => [227.0, 2f64.powi(-12)],
        // Floats are their own lengths; squares are those of steps of 2^-16 mm.
        _ => [8_193.0, 2f64.powi(-32)],
    }
}

/// Random arguments for the primitives of a number system.
pub(super) struct Domain<N: Number> {
    pub(super) radius: f64,
    square_step: f64,
    pub(super) scale: N::Scale,
    random: Xoshiro256PlusPlus,
}

impl<N: Number> Domain<N> {
    pub(super) fn new(seed: u64) -> Self {
        let [radius, square_step] = radius_and_square_step::<N>();
        let scale = N::scale_for(radius).expect("a number system holds a leg of its own size");
        Self { radius, square_step, scale, random: Xoshiro256PlusPlus::seed_from_u64(seed) }
    }

    pub(super) fn between(&mut self, least: f64, most: f64) -> f64 {
        self.random.random_range(least..=most)
    }

    /// A length up to the radius: half of them anywhere, half of all sizes.
    pub(super) fn length(&mut self) -> f64 {
        let most = 0.999 * self.radius;
        if self.random.random_bool(0.5) {
            self.between(0.0, most)
        } else {
            most * 2f64.powf(self.between(-12.0, 0.0))
        }
    }

    /// The same, and some of a few steps.
    pub(super) fn length_or_next_to_none(&mut self) -> f64 {
        if self.random.random_bool(0.1) {
            self.radius * 2f64.powf(self.between(-15.0, -12.0))
        } else {
            self.length()
        }
    }

    /// An angle: most of them anywhere, some next to eighths of a turn.
    pub(super) fn angle(&mut self) -> f64 {
        match self.random.random_range(0..8) {
            0 => {
                let eighth = f64::from(self.random.random_range(-4..=4i32)) * TAU / 8.0;
                eighth + 10f64.powf(self.between(-9.0, -1.0)) * if self.random.random() { 1.0 } else { -1.0 }
            }
            _ => self.between(-PI, PI),
        }
    }

    /// A coordinate, and what it is exactly, mm.
    pub(super) fn coord(&self, mm: f64) -> (N::Coord, f64) {
        let coord = N::coord_from_mm(mm, self.scale);
        (coord, self.mm(coord))
    }

    /// What a coordinate is, mm.
    pub(super) fn mm(&self, coord: N::Coord) -> f64 {
        N::mm(N::length(coord, self.scale))
    }

    /// A product that is a coordinate, and what it is exactly, mm.
    pub(super) fn product(&self, mm: f64) -> (N::Product, f64) {
        let product = N::widen(N::coord_from_mm(mm, self.scale));
        (product, self.mm(N::narrow(product)))
    }

    /// A square that the number system holds exactly, mm².
    pub(super) fn square(&self, mm2: f64) -> (N::Square, f64) {
        let exact = (mm2 / self.square_step).round() * self.square_step;
        (N::square_from_mm2(exact, self.scale), exact)
    }

    /// What a square is, mm²: by bisection, for squares can be compared.
    pub(super) fn mm2(&self, square: N::Square) -> f64 {
        let (mut low, mut high) = (-4.0 * self.radius * self.radius, 4.0 * self.radius * self.radius);
        while high - low > self.square_step {
            let middle = ((low + high) / (2.0 * self.square_step)).round() * self.square_step;
            if middle <= low || middle >= high {
                break;
            }
            if N::square_from_mm2(middle, self.scale) <= square { low = middle } else { high = middle }
        }
        low
    }

    /// What a ratio makes of the radius, of the radius.
    pub(super) fn ratio(&self, ratio: N::Ratio) -> f64 {
        let far = N::coord_from_mm(self.radius, self.scale);
        self.mm(N::narrow(N::stretch(far, ratio))) / self.mm(far)
    }

    /// Radians.
    pub(super) fn radians(angle: N::Angle) -> f64 {
        N::turns(angle) * TAU
    }
}

/// An angle in (−π, π].
pub(super) fn wrapped(angle: f64) -> f64 {
    angle - TAU * (angle / TAU).round()
}
