//! The largest error of every primitive that is found over random and edge arguments.

use super::Quantity;
use super::domain::{Domain, wrapped};
use crate::sheet::NumberSystem;
use ik_core::number::Knee;
use ik_core::{Coarse, Fixed16, Fixed32, Float32, Number, Short32};
use serde::Serialize;

/// The largest error that was found of a quantity.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Found {
    /// Of what.
    pub quantity: Quantity,
    /// The largest, as the quantity counts it.
    pub largest: f64,
    /// With what arguments.
    pub at: String,
}

/// The primitives that are measured, each with the signature that it has in the trait, so that a test can put a worse one in the place of one of them.
#[expect(clippy::type_complexity, reason = "a signature is easier to read where it is than under a name")]
pub struct Primitives<N: Number> {
    /// [`Number::turn`].
    pub turn: fn([N::Product; 2], [N::Coord; 2]) -> N::Angle,
    /// [`Number::hip_angle`].
    pub hip_angle: fn([N::Coord; 2], N::Coord, N::Coord) -> N::Angle,
    /// [`Number::yaw_angle`].
    pub yaw_angle: fn([N::Coord; 2], N::Coord) -> N::Angle,
    /// [`Number::knee`].
    pub knee: fn(N::Square, N::Square, N::Unit, N::Scale) -> Knee<N>,
    /// [`Number::root`].
    pub root: fn(N::Square, N::Scale) -> N::Coord,
    /// [`Number::radial_of`].
    pub radial: fn([N::Coord; 2], N::Square, N::Coord, N::Scale) -> (N::Coord, N::Square),
    /// [`Number::depth`].
    pub depth: fn([N::Coord; 2], N::Coord, N::Square, N::Scale) -> N::Coord,
    /// [`Number::sin_cos`].
    pub sin_cos: fn(N::Angle) -> (N::Ratio, N::Ratio),
    /// [`Number::rescale`].
    pub rescale: fn(N::Coord, N::Coord, N::Coord) -> N::Coord,
    /// [`Number::distance`].
    pub distance: fn([N::Length; 3], [N::Length; 3]) -> N::Length,
}

impl<N: Number> Primitives<N> {
    /// Those of the number system.
    pub fn own() -> Self {
        Self {
            turn: N::turn,
            hip_angle: N::hip_angle,
            yaw_angle: N::yaw_angle,
            knee: N::knee,
            root: N::root,
            radial: N::radial_of,
            depth: N::depth,
            sin_cos: N::sin_cos,
            rescale: N::rescale,
            distance: N::distance,
        }
    }
}

/// The largest errors of a number system's primitives over so many random arguments each, in the order of
/// [`Quantity::ALL`]; the same at every run with the same seed.
pub fn measured(number: NumberSystem, rounds: u32, seed: u64) -> Vec<Found> {
    match number {
        NumberSystem::Float32 => of_any(&Primitives::<Float32>::own(), rounds, seed),
        NumberSystem::Coarse => of_any(&Primitives::<Coarse>::own(), rounds, seed),
        NumberSystem::Fixed32 => of_any(&Primitives::<Fixed32>::own(), rounds, seed),
        NumberSystem::Short32 => of_any(&Primitives::<Short32>::own(), rounds, seed),
        NumberSystem::Fixed16 => of_any(&Primitives::<Fixed16>::own(), rounds, seed),
    }
}

/// The same of any primitives.
pub fn of_any<N: Number>(primitives: &Primitives<N>, rounds: u32, seed: u64) -> Vec<Found> {
    let mut measuring = Measuring { domain: Domain::new(seed), primitives, worst: Worst::default() };
    for _ in 0..rounds {
        measuring.turn();
        measuring.hip();
        measuring.yaw();
        measuring.knee();
        measuring.root();
        measuring.sine();
        measuring.rescale();
        measuring.distance();
    }
    // Its square is read by bisection, which takes longer.
    for _ in 0..rounds.div_ceil(8) {
        measuring.radial();
    }
    measuring.worst.found()
}

/// The largest of each.
#[derive(Default)]
struct Worst([(f64, String); Quantity::ALL.len()]);

impl Worst {
    fn see(&mut self, quantity: Quantity, error: f64, at: impl FnOnce() -> String) {
        let worst = &mut self.0[quantity as usize];
        if error > worst.0 || error.is_nan() {
            *worst = (error, at());
        }
    }

    fn found(self) -> Vec<Found> {
        let each = Quantity::ALL.into_iter().zip(self.0);
        each.map(|(quantity, (largest, at))| Found { quantity, largest, at }).collect()
    }
}

struct Measuring<'a, N: Number> {
    domain: Domain<N>,
    primitives: &'a Primitives<N>,
    worst: Worst,
}

impl<N: Number> Measuring<'_, N> {
    /// The error of an angle between vectors of nearly the same length, beyond what comes of their lengths being apart.
    fn beyond_lengths(got: N::Angle, from: [f64; 2], to: [f64; 2]) -> f64 {
        let [from_length, to_length] = [from, to].map(|[x, y]| x.hypot(y));
        let want = to[1].atan2(to[0]) - from[1].atan2(from[0]);
        let apart = (from_length - to_length).abs() / to_length.max(f64::MIN_POSITIVE);
        (wrapped(Domain::<N>::radians(got) - want).abs() - apart).max(0.0)
    }

    fn turn(&mut self) {
        let (length, from, to) = (self.domain.length(), self.domain.angle(), self.domain.angle());
        let [(from_x, exact_from_x), (from_y, exact_from_y)] =
            [from.cos(), from.sin()].map(|part| self.domain.product(length * part));
        let [(to_x, exact_to_x), (to_y, exact_to_y)] =
            [to.cos(), to.sin()].map(|part| self.domain.coord(length * part));
        let got = (self.primitives.turn)([from_x, from_y], [to_x, to_y]);
        let (from, to) = ([exact_from_x, exact_from_y], [exact_to_x, exact_to_y]);
        let error = Self::beyond_lengths(got, from, to);
        let at = || format!("from {from:?} to {to:?}");
        if length > self.domain.radius / 4.0 {
            self.worst.see(Quantity::Turn, error, at);
        }
        self.worst.see(Quantity::Turned, error * to[0].hypot(to[1]) / self.domain.radius, at);
    }

    fn hip(&mut self) {
        let (length, foot) = (self.domain.length(), self.domain.angle());
        let share = self.domain.between(0.0, std::f64::consts::FRAC_PI_2);
        let [(y, exact_y), (z, exact_z)] =
            [foot.cos(), foot.sin()].map(|part| self.domain.coord(length * part));
        let [(offset, exact_offset), (depth, exact_depth)] =
            [share.cos(), share.sin()].map(|part| self.domain.coord(length * part));
        let got = (self.primitives.hip_angle)([y, z], offset, depth);
        let (from, to) = ([exact_offset, -exact_depth], [exact_y, exact_z]);
        if length > self.domain.radius / 4.0 {
            let error = Self::beyond_lengths(got, from, to);
            self.worst.see(Quantity::HipAngle, error, || format!("from {from:?} to {to:?}"));
        }
        // The depth from the foot and the offset.
        let scale = self.domain.scale;
        let square = N::square(y, scale) + N::square(z, scale) - N::square(offset, scale);
        let want = exact_y * exact_y + exact_z * exact_z - exact_offset * exact_offset;
        if square >= N::NO_SQUARE && want >= 0.0 {
            let got = self.domain.mm((self.primitives.depth)([y, z], offset, square, scale));
            let error = (got * got - want).abs() / (self.domain.radius * self.domain.radius);
            self.worst.see(Quantity::Depth, error, || format!("foot {to:?}, offset {exact_offset}"));
        }
    }

    fn yaw(&mut self) {
        let (length, foot) =
            (self.domain.between(self.domain.radius / 4.0, self.domain.radius), self.domain.angle());
        let [(x, exact_x), (y, exact_y)] =
            [foot.sin(), foot.cos()].map(|part| self.domain.coord(0.999 * length * part));
        let (radial, exact_radial) = self.domain.coord(exact_x.hypot(exact_y));
        let got = (self.primitives.yaw_angle)([x, y], radial);
        let error = Self::beyond_lengths(got, [exact_radial, 0.0], [exact_y, exact_x]);
        self.worst
            .see(Quantity::YawAngle, error, || format!("x {exact_x}, y {exact_y}, radius {exact_radial}"));
    }

    fn knee(&mut self) {
        // Links of 1:1 to 8:1, together as long as the leg's radius.
        let ratio = 8f64.powf(self.domain.between(0.0, 1.0));
        let unit = 2.0 * self.domain.radius * ratio.sqrt() / (1.0 + ratio);
        let (fold, exact_fold) = self.domain.square(unit * unit);
        let share = match self.domain.between(0.0, 3.0) {
            part if part < 1.0 => self.domain.between(0.0, 0.5),
            part if part < 2.0 => 10f64.powf(self.domain.between(-9.0, -0.3)),
            _ => 0.5 - 10f64.powf(self.domain.between(-9.0, -1.0)),
        };
        let (least, exact_least) = self.domain.square(share * exact_fold);
        let folded = self.domain.between(0.0, 1.0) < 0.5;
        let (n, m) = if folded { (fold - least, least) } else { (least, fold - least) };
        let scale = self.domain.scale;
        let knee = (self.primitives.knee)(n, m, N::unit_from_mm(unit, scale), scale);
        let e = (exact_least / exact_fold).min(1.0 - exact_least / exact_fold);
        let at = || format!("{e} from {}, unit {unit} mm", if folded { "folded" } else { "straight" });
        let acute = 2.0 * e.sqrt().asin();
        self.worst.see(Quantity::KneeAngle, (Domain::<N>::radians(knee.acute) - acute).abs(), at);
        let half_sine = (e * (1.0 - e)).sqrt();
        self.worst.see(Quantity::HalfSine, (self.domain.ratio(knee.half_sine) - half_sine).abs(), at);
        self.worst.see(Quantity::FromEnd, (self.domain.ratio(knee.from_end) - e).abs(), at);
    }

    fn root(&mut self) {
        let length = self.domain.length();
        let (square, exact) = self.domain.square(length * length);
        let got = self.domain.mm((self.primitives.root)(square, self.domain.scale));
        let error = (got - exact.sqrt()).abs() / self.domain.radius;
        self.worst.see(Quantity::Root, error, || format!("{exact} mm²"));
    }

    fn radial(&mut self) {
        let (radius, foot) = (self.domain.length_or_next_to_none(), self.domain.angle());
        let [(x, exact_x), (y, exact_y)] =
            [foot.sin(), foot.cos()].map(|part| self.domain.coord(radius * part));
        let most = self.domain.radius / 2.0;
        let (offset, exact_offset) = {
            let mm = self.domain.between(0.0, most);
            self.domain.coord(mm)
        };
        let scale = self.domain.scale;
        let square = N::square(x, scale) + N::square(y, scale);
        let (radial, along) = (self.primitives.radial)([x, y], square, offset, scale);
        let want = exact_x.hypot(exact_y);
        let at = || format!("x {exact_x}, y {exact_y}, coxa {exact_offset}");
        let error = (self.domain.mm(radial) - want).abs() / self.domain.radius;
        self.worst.see(Quantity::Radial, error, at);
        let apart = self.domain.mm2(along) - (want - exact_offset) * (want - exact_offset);
        let error = apart.abs() / (self.domain.radius * self.domain.radius);
        self.worst.see(Quantity::RadialSquare, error, at);
    }

    fn sine(&mut self) {
        let angle = N::angle_from_turns(wrapped(self.domain.angle()) / std::f64::consts::TAU);
        let exact = Domain::<N>::radians(angle);
        let (sine, cosine) = (self.primitives.sin_cos)(angle);
        let (sine, cosine) = (self.domain.ratio(sine) - exact.sin(), self.domain.ratio(cosine) - exact.cos());
        self.worst.see(Quantity::Sine, sine.abs().max(cosine.abs()), || format!("{exact} rad"));
    }

    fn rescale(&mut self) {
        let from = self.domain.between(self.domain.radius / 8.0, 0.999 * self.domain.radius);
        let (v, to) = (self.domain.between(-from, from), self.domain.length());
        let [(v, exact_v), (to, exact_to), (from, exact_from)] =
            [v, to, from].map(|mm| self.domain.coord(mm));
        if exact_v.abs() <= exact_from {
            let got = self.domain.mm((self.primitives.rescale)(v, to, from));
            let error = (got - exact_v * exact_to / exact_from).abs() / self.domain.radius;
            self.worst.see(Quantity::Rescale, error, || format!("{exact_v}·{exact_to}/{exact_from}"));
        }
    }

    fn distance(&mut self) {
        let third = self.domain.radius / 3.0;
        let points = [0, 1].map(|_| [0, 1, 2].map(|_| N::length_from_mm(self.domain.between(-third, third))));
        let [a, b] = points.map(|point| point.map(N::mm));
        let want = (a[0] - b[0]).hypot(a[1] - b[1]).hypot(a[2] - b[2]);
        if want > self.domain.radius / 10.0 {
            let got = N::mm((self.primitives.distance)(points[0], points[1]));
            self.worst.see(Quantity::Distance, (got / want - 1.0).abs(), || format!("{a:?} to {b:?}"));
        }
    }
}
