//! The solver in `f64`: what is left of its error is the method's, not rounding's.

use ik_core::Number;
use ik_core::number::{Knee, Placed};
use std::f64::consts::{PI, TAU};

/// Double precision. Host only; squares are `f64` too, so a knee within 1e-8 rad of straight is worth half of its
/// digits. A survey shows it beside the others as the yardstick of the method.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Float64;

/// An angle of less than three half-turns, in (−π, π].
fn wrapped(angle: f64) -> f64 {
    if angle > PI {
        angle - TAU
    } else if angle <= -PI {
        (angle + TAU).min(PI)
    } else {
        angle
    }
}

impl Number for Float64 {
    type Length = f64;
    type Coord = f64;
    type Square = f64;
    type Ratio = f64;
    type Product = f64;
    type Angle = f64;
    /// The working range, mm.
    type Scale = f64;
    type Unit = f64;
    type Gain = f64;
    type Swing = f64;
    /// Per radian, and at no angle.
    type Line = (f64, f64);

    const NAME: &'static str = "float64";
    const NO_LENGTH: f64 = 0.0;
    const FARTHEST: f64 = f64::MAX;
    const NO_COORD: f64 = 0.0;
    const NO_SQUARE: f64 = 0.0;
    const NO_ANGLE: f64 = 0.0;
    const LEAST_ANGLE: f64 = -PI;
    const MOST_ANGLE: f64 = PI;

    fn scale_for(radius_mm: f64) -> Option<f64> {
        (1.0..=16_383.0).contains(&radius_mm).then_some(2.0 * radius_mm)
    }
    fn length_from_mm(mm: f64) -> f64 {
        mm
    }
    fn coord_from_mm(mm: f64, _: f64) -> f64 {
        mm
    }
    fn square_from_mm2(mm2: f64, _: f64) -> f64 {
        mm2
    }
    fn ratio_from(value: f64) -> f64 {
        value
    }
    fn product_from_mm(mm: f64, _: f64) -> f64 {
        mm
    }
    fn unit_from_mm(unit_mm: f64, _: f64) -> f64 {
        1.0 / unit_mm
    }
    fn angle_from_turns(turns: f64) -> f64 {
        turns * TAU
    }
    fn gain_from(us_per_turn: f64) -> f64 {
        us_per_turn / TAU
    }
    fn swing_from(turns_per_us: f64) -> f64 {
        turns_per_us * TAU
    }
    fn line_from(per_turn: f64, at_zero: f64) -> (f64, f64) {
        (per_turn / TAU, at_zero)
    }

    fn place(foot: [f64; 3], limit: f64) -> Placed<Self> {
        if foot.iter().all(|v| v.abs() < limit) {
            return Placed::Near(foot);
        }
        if !foot.iter().all(|v| v.is_finite()) {
            return Placed::NotFinite;
        }
        let (mut point, mut times) = (foot, 0);
        while point.iter().any(|v| v.abs() >= limit) {
            point = point.map(|v| v * 0.5);
            times += 1;
        }
        Placed::Far(point, times)
    }
    fn length(coord: f64, _: f64) -> f64 {
        coord
    }
    fn mm(length: f64) -> f64 {
        length
    }
    fn turns(angle: f64) -> f64 {
        angle / TAU
    }
    fn millidegrees(angle: f64) -> i32 {
        (angle.to_degrees() * 1000.0).round() as i32
    }
    fn micrometres(length: f64) -> i32 {
        (length * 1000.0).round() as i32
    }
    fn length_difference(a: f64, b: f64) -> f64 {
        a - b
    }

    fn square(coord: f64, _: f64) -> f64 {
        coord * coord
    }
    fn root(square: f64, _: f64) -> f64 {
        square.max(0.0).sqrt()
    }
    fn radial(radial_square: f64, offset: f64, _: f64) -> (f64, f64) {
        let radial = radial_square.max(0.0).sqrt();
        (radial, (radial - offset) * (radial - offset))
    }
    fn stretch(coord: f64, ratio: f64) -> f64 {
        coord * ratio
    }
    fn widen(coord: f64) -> f64 {
        coord
    }
    fn turn([from_x, from_y]: [f64; 2], [to_x, to_y]: [f64; 2]) -> f64 {
        let (sum_x, sum_y) = (from_x + to_x, from_y + to_y);
        let (apart_x, apart_y) = (from_x - to_x, to_y - from_y);
        let half = if sum_x.hypot(apart_y) >= sum_y.hypot(apart_x) {
            apart_y.atan2(sum_x)
        } else {
            apart_x.atan2(sum_y)
        };
        wrapped(2.0 * half)
    }
    fn knee(n: f64, m: f64, unit: f64, scale: f64) -> Knee<Self> {
        let folded = m < n;
        let sine = (Self::root(if folded { m } else { n }, scale) * unit).min(1.0);
        let square = sine * sine;
        let knee = 2.0 * sine.asin();
        Knee { acute: knee, half_sine: sine * (1.0 - square).sqrt(), folded, from_end: square }
    }

    fn sin_cos(angle: f64) -> (f64, f64) {
        angle.sin_cos()
    }
    fn angle_sum(a: f64, b: f64) -> f64 {
        wrapped(a + b)
    }
    fn angle_difference(a: f64, b: f64) -> f64 {
        wrapped(a - b)
    }
    fn narrow(product: f64) -> f64 {
        product
    }

    fn rescale(v: f64, to: f64, from: f64) -> f64 {
        if from > 0.0 { v * (to / from) } else { 0.0 }
    }
    fn halve(coord: f64, times: u32) -> f64 {
        (0..times.min(2048)).fold(coord, |half, _| half * 0.5)
    }
    fn distance(a: [f64; 3], b: [f64; 3]) -> f64 {
        let [x, y, z] = [a[0] - b[0], a[1] - b[1], a[2] - b[2]];
        x.hypot(y).hypot(z).min(f64::MAX)
    }

    fn travel(angle: f64, from: f64, gain: f64) -> i32 {
        ((angle - from) * gain * 65_536.0).round() as i32
    }
    fn swing_to(travel: i32, from: f64, swing: f64) -> f64 {
        (from + f64::from(travel) / 65_536.0 * swing).clamp(-PI, PI)
    }
    fn on_line((slope, start): (f64, f64), angle: f64) -> i32 {
        (slope * angle + start + 0.5).floor() as i32
    }
}
