//! The inverse in f64: right triangle at the hip, then Kahan's angle of a needle-like triangle.
//!
//! Hip: two arctangents, one for where the foot lies and one for how far the offset turns it away.
//! Knee and thigh: corner angles of the triangle (thigh, shank, line to the foot) by the
//! half-angle formula of Kahan, "Miscalculating Area and Angles of a Needle-like Triangle", whose
//! factors are differences of *sides*, here formed in about 106 bits. Every angle is within
//! [`super::ANGLE_TOLERANCE`] of the 256-bit answer, straight, folded and near the hip's axis
//! included (tested).
//!
//! Total over every target: what lies outside the reachable set goes to its closest point; a NaN
//! is reported. Where a direction is undefined, these hold:
//! - roll-hip, target on the roll axis: hip 0, so the foot comes to (x, offset, 0);
//! - roll-hip, target at the origin, no offset, unequal links: straight down; with an offset and
//!   unequal links: forward, x = |thigh − shank|;
//! - yaw-hip, target on the yaw axis: hip 0; where the closest point lies on the yaw axis, the hip
//!   keeps the direction of the target;
//! - yaw-hip, target on the femur axis, unequal links: outboard, level with the axis; target level
//!   with the femur axis but so far inboard of it that the two closest points lie on the yaw axis,
//!   one above and one below: above;
//! - foot on the thigh's axis (equal links, fully folded): thigh 0.

use super::doubled::Doubled;
use super::leg::{Leg, Pose, Range, Shape, Verdict, around_the_circle, distance};
use std::f64::consts::PI;

/// Every flexion there is: from straight to folded.
pub const FREE_KNEE: Range = Range { min: 0.0, max: PI };

/// What the reference answers to one target.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Solution {
    /// Joint angles. Hip and thigh in (−π, π], knee in [0, π].
    pub pose: Pose,
    /// Where an exact leg would put the foot: the target itself, or the closest point.
    pub reached_foot: [f64; 3],
    /// How far that is from the target, in millimetres; may round to 0 for a target a hair outside.
    pub moved_by_mm: f64,
    /// Whether the target lay in the reachable set.
    pub verdict: Verdict,
}

/// Joint angles for `target` (leg frame, millimetres), within reach or not, of a leg with a free knee.
#[must_use]
pub fn solve(leg: &Leg, target: [f64; 3]) -> Solution {
    solve_within(leg, FREE_KNEE, target)
}

/// As [`solve`], for a knee of the given range, which ends the reach where it is narrower than the links do.
#[must_use]
pub fn solve_within(leg: &Leg, knee: Range, target: [f64; 3]) -> Solution {
    ClosedForm::within(*leg, knee).solve(target)
}

/// A leg and the ends of its reach, worked out once for many targets.
#[derive(Clone, Copy, Debug)]
pub struct ClosedForm {
    leg: Leg,
    spans: Spans,
}

impl ClosedForm {
    /// For a knee of the given range, which ends the reach where it is narrower than the links do.
    #[must_use]
    pub fn within(leg: Leg, knee: Range) -> Self {
        Self { leg, spans: Spans::of(&leg, knee) }
    }

    /// Joint angles for `target` (leg frame, millimetres), within reach or not.
    #[must_use]
    pub fn solve(&self, target: [f64; 3]) -> Solution {
        let leg = &self.leg;
        if target.iter().any(|c| c.is_nan()) {
            let pose = Pose::default();
            return Solution {
                pose,
                reached_foot: super::transforms::foot(leg, &pose),
                moved_by_mm: f64::NAN,
                verdict: Verdict::NotANumber,
            };
        }
        let near = tame(leg, target);
        let placed = match leg.shape {
            Shape::Roll => place_roll(leg, &self.spans, near),
            Shape::Yaw => place_yaw(leg, &self.spans, near),
        };
        let corners = corners(leg.thigh, leg.shank, placed.span);
        let reached_foot = placed.moved_to.unwrap_or(target);
        Solution {
            pose: Pose {
                hip: around_the_circle(placed.hip),
                thigh: around_the_circle(placed.direction + leg.bend.sign() * corners.hip),
                knee: corners.flexion,
            },
            reached_foot,
            moved_by_mm: distance(reached_foot, target),
            verdict: if placed.moved_to.is_some() { Verdict::Moved } else { Verdict::Reached },
        }
    }
}

/// The closest point of the reachable set to `target`, how far away it is (mm), and whether the
/// target had to be moved.
#[must_use]
pub fn closest(leg: &Leg, target: [f64; 3]) -> ([f64; 3], f64, Verdict) {
    let solution = solve(leg, target);
    (solution.reached_foot, solution.moved_by_mm, solution.verdict)
}

/// The corner angles of the triangle that a leg makes, in radians.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Corners {
    /// At the thigh's axis, between the thigh and the line to the foot.
    pub hip: f64,
    /// At the knee, between the links: π straight, 0 folded.
    pub knee: f64,
    /// π less the knee's corner, with full relative accuracy of its own: 0 straight, π folded.
    pub flexion: f64,
}

/// Corner angles for links `thigh` and `shank` and a foot `span` from the thigh's axis, all in the
/// same unit. A span outside [|thigh − shank|, thigh + shank] is taken as the nearer end.
#[must_use]
pub fn corners_of_triangle(thigh: f64, shank: f64, span: f64) -> Corners {
    corners(thigh, shank, Doubled::from(span))
}

fn corners(thigh: f64, shank: f64, span: Doubled) -> Corners {
    let difference = Doubled::sum(thigh, -shank);
    let sum = Doubled::sum(thigh, shank);
    // The factors of Kahan's formula: the perimeter, and what it exceeds each side's double by.
    let short_of_straight = (sum - span).value().max(0.0);
    let perimeter = (sum + span).value();
    let past_shank_less_thigh = (span - difference).value().max(0.0);
    let past_thigh_less_shank = (span + difference).value().max(0.0);

    let open = (short_of_straight * perimeter).sqrt();
    let shut = (past_shank_less_thigh * past_thigh_less_shank).sqrt();
    Corners {
        // Equal links, fully folded: 0 over 0, and atan2 makes it 0.
        hip: 2.0
            * (past_shank_less_thigh * short_of_straight)
                .sqrt()
                .atan2((perimeter * past_thigh_less_shank).sqrt()),
        knee: 2.0 * shut.atan2(open),
        flexion: 2.0 * open.atan2(shut),
    }
}

/// A foot placed within the plane of its leg.
struct Placed {
    hip: f64,
    /// Angle of the line from the thigh's axis to the foot, counted as the thigh's angle is.
    direction: f64,
    /// Length of that line.
    span: Doubled,
    /// The closest point, where the target was out of reach.
    moved_to: Option<[f64; 3]>,
}

/// The ends of the span that two links and the knee's range allow, and their squares.
#[derive(Clone, Copy, Debug)]
struct Spans {
    shortest: Doubled,
    longest: Doubled,
    shortest_squared: Doubled,
    longest_squared: Doubled,
}

impl Spans {
    fn of(leg: &Leg, knee: Range) -> Self {
        let free = |end: Doubled| (end, end.squared());
        // Law of cosines: the corner between the links is π less the knee.
        let bent = |knee: f64| {
            let squared = Doubled::square(leg.thigh)
                + Doubled::square(leg.shank)
                + Doubled::from(2.0 * leg.thigh * leg.shank * knee.cos());
            (squared.root(), squared)
        };
        let (longest, longest_squared) =
            if knee.min > 0.0 { bent(knee.min) } else { free(Doubled::sum(leg.thigh, leg.shank)) };
        let (shortest, shortest_squared) =
            if knee.max < PI { bent(knee.max) } else { free(Doubled::sum(leg.thigh, -leg.shank).abs()) };
        Self { shortest, longest, shortest_squared, longest_squared }
    }

    /// The end that a squared span lies beyond, with its square; `None` if it is allowed.
    fn beyond(&self, squared: Doubled) -> Option<(Doubled, Doubled)> {
        if (self.longest_squared - squared).is_negative() {
            Some((self.longest, self.longest_squared))
        } else if (squared - self.shortest_squared).is_negative() {
            Some((self.shortest, self.shortest_squared))
        } else {
            None
        }
    }
}

/// Roll-hip. With ρ = √(y² + z²), the distance from the roll axis, the reachable set is
/// (L1 − L2)² + a² ≤ x² + ρ² ≤ (L1 + L2)² + a² with ρ ≥ a.
fn place_roll(leg: &Leg, spans: &Spans, [x, y, z]: [f64; 3]) -> Placed {
    let offset_squared = Doubled::square(leg.offset);
    let from_axis_squared = Doubled::square(y) + Doubled::square(z);
    let depth_squared = from_axis_squared - offset_squared;
    let span_squared = depth_squared + Doubled::square(x);
    let hip = |depth: f64| z.atan2(y) + depth.atan2(leg.offset);

    let beyond = spans.beyond(span_squared);
    if beyond.is_none() && !depth_squared.is_negative() {
        let depth = depth_squared.root().value();
        return Placed {
            hip: hip(depth),
            direction: x.atan2(depth),
            span: span_squared.root(),
            moved_to: None,
        };
    }

    if let Some((span, span_end_squared)) = beyond {
        let from_origin_squared = from_axis_squared + Doubled::square(x);
        if from_origin_squared.value() == 0.0 && leg.offset == 0.0 {
            let depth = span.value();
            return Placed { hip: 0.0, direction: 0.0, span, moved_to: Some([0.0, 0.0, -depth]) };
        }
        // Scaled onto the sphere (radius² = span² + a²), the foot's depth² is
        // (radius² · ρ² − a² · |p|²) / |p|².
        let radius_squared = span_end_squared + offset_squared;
        let depth_scaled = radius_squared * from_axis_squared - offset_squared * from_origin_squared;
        if from_origin_squared.value() > 0.0 && !depth_scaled.is_negative() {
            let from_origin = from_origin_squared.root().value();
            let depth = depth_scaled.root().value() / from_origin;
            let scale = radius_squared.root().value() / from_origin;
            return Placed {
                hip: hip(depth),
                direction: (x * scale).atan2(depth),
                span,
                moved_to: Some([x * scale, y * scale, z * scale]),
            };
        }
    }

    // Onto the cylinder ρ = a, no further along x than the links allow.
    let along = Doubled::from(x.abs());
    let span = if (spans.longest - along).is_negative() {
        spans.longest
    } else if (along - spans.shortest).is_negative() {
        spans.shortest
    } else {
        along
    };
    let x = if x < 0.0 { -span.value() } else { span.value() };
    let from_axis = y.hypot(z);
    let (y, z) = if from_axis > 0.0 {
        (y / from_axis * leg.offset, z / from_axis * leg.offset)
    } else {
        (leg.offset, 0.0)
    };
    Placed { hip: hip(0.0), direction: x.atan2(0.0), span, moved_to: Some([x, y, z]) }
}

/// Yaw-hip. In the half plane R ≥ 0 at the target's azimuth, the reachable set is the ring
/// |L1 − L2| ≤ G ≤ L1 + L2 about (c, 0).
fn place_yaw(leg: &Leg, spans: &Spans, [x, y, z]: [f64; 3]) -> Placed {
    let from_axis = (Doubled::square(x) + Doubled::square(y)).root();
    let hip = x.atan2(y);
    let out = from_axis - Doubled::from(leg.offset);
    let span_squared = out.squared() + Doubled::square(z);

    let Some((span, span_end_squared)) = spans.beyond(span_squared) else {
        return Placed { hip, direction: z.atan2(out.value()), span: span_squared.root(), moved_to: None };
    };

    let from_femur_axis = span_squared.root().value();
    let (mut out, mut z) = if from_femur_axis > 0.0 {
        (out.value() / from_femur_axis * span.value(), z / from_femur_axis * span.value())
    } else {
        (span.value(), 0.0)
    };
    if out < -leg.offset {
        // Scaling would cross the yaw axis: the closest point is where the ring meets it.
        let height = (span_end_squared - Doubled::square(leg.offset)).root().value();
        out = -leg.offset;
        z = if z < 0.0 { -height } else { height };
    }
    let reach = (leg.offset + out).max(0.0);
    // Not from_axis, whose squares may have lost bits to underflow.
    let from_axis = x.hypot(y);
    let (x, y) = if from_axis > 0.0 { (x / from_axis * reach, y / from_axis * reach) } else { (0.0, reach) };
    Placed { hip, direction: z.atan2(out), span, moved_to: Some([x, y, z]) }
}

/// `target` with −0 made 0, and with a magnitude whose squares neither overflow nor underflow.
///
/// From beyond 1e40 leg sizes, or within 1e-40 of one, only the direction matters to f64: such a
/// target is scaled to that distance, and of an infinite one the infinite coordinates set the
/// direction.
fn tame(leg: &Leg, target: [f64; 3]) -> [f64; 3] {
    let largest = target.iter().fold(0.0, |l: f64, c| l.max(c.abs()));
    let (nearest, farthest) = (1e-40 * leg.size(), 1e40 * leg.size());
    let direction = if largest.is_infinite() {
        target.map(|c| if c.is_infinite() { c.signum() } else { 0.0 })
    } else if largest > farthest || (largest > 0.0 && largest < nearest) {
        target.map(|c| c / largest)
    } else {
        return target.map(|c| c + 0.0);
    };
    let scale = if largest < 1.0 { nearest } else { farthest };
    direction.map(|c| c * scale + 0.0)
}
