//! The inverse and the forward kinematics in 256-bit numbers, by the textbook.
//!
//! Law of cosines and arccosines, which cancel near a straight or a folded leg; with this many
//! bits to lose, an f64's worth is always left: inputs are f64 taken exactly, so a square root of
//! a cancelled difference keeps at least 256 − 2 · 53 good bits. The closest point is not found by
//! the case distinction of [`super::closed_form`] but by listing every point where the closest one
//! can be (projections onto each edge of the reachable set, and the edges' corners) and taking the
//! nearest that belongs to the set.
//!
//! Arithmetic and elementary functions are dashu-float's, correctly rounded.

use dashu_float::FBig;
use dashu_float::round::mode::HalfEven;

use super::closed_form::FREE_KNEE;
use super::leg::{Leg, Pose, Range, Shape, Verdict};
use std::f64::consts::PI;

/// Bits of every number here.
pub const BITS: usize = 256;

/// The largest coordinate of a target taken, in leg sizes.
pub const FARTHEST: f64 = 1e15;

/// A 256-bit number.
pub type Real = FBig<HalfEven, 2>;

/// Joint angles in radians, as [`Pose`], at full precision.
#[derive(Clone, Debug)]
pub struct RealPose {
    /// See [`Pose::hip`].
    pub hip: Real,
    /// See [`Pose::thigh`].
    pub thigh: Real,
    /// See [`Pose::knee`].
    pub knee: Real,
}

impl RealPose {
    /// The nearest f64 to each angle.
    #[must_use]
    pub fn rounded(&self) -> Pose {
        Pose { hip: to_f64(&self.hip), thigh: to_f64(&self.thigh), knee: to_f64(&self.knee) }
    }
}

/// What [`solve`] answers to one target.
#[derive(Clone, Debug)]
pub struct RealSolution {
    /// Joint angles.
    pub pose: RealPose,
    /// The target itself, or the closest point of the reachable set. Millimetres.
    pub reached_foot: [Real; 3],
    /// How far that is from the target, in millimetres.
    pub moved_by: Real,
    /// Whether the target lay in the reachable set.
    pub verdict: Verdict,
}

/// `value`, exactly. `None` for NaN and infinities.
#[must_use]
pub fn real(value: f64) -> Option<Real> {
    let exact = Real::try_from(value).ok()?;
    exact.repr().is_finite().then(|| exact.with_precision(BITS).value())
}

/// The nearest f64.
#[must_use]
pub fn to_f64(value: &Real) -> f64 {
    value.to_f64().value()
}

/// π.
#[must_use]
pub fn pi() -> Real {
    Real::pi(BITS)
}

fn zero() -> Real {
    Real::ZERO.with_precision(BITS).value()
}

fn square(value: &Real) -> Real {
    value * value
}

fn absolute(value: &Real) -> Real {
    if *value < zero() { -value } else { value.clone() }
}

/// Square root, zero for anything below.
fn root(value: &Real) -> Real {
    if *value <= zero() { zero() } else { value.sqrt() }
}

/// Arccosine in radians, its argument held within ±1 against the last bit's rounding.
#[must_use]
pub fn arccosine(value: &Real) -> Real {
    let one = Real::ONE.with_precision(BITS).value();
    if *value >= one {
        zero()
    } else if *value <= -&one {
        pi()
    } else {
        value.acos()
    }
}

/// Angle of the vector (x, y) from the x axis; 0 for the zero vector.
#[must_use]
pub fn angle_of(y: &Real, x: &Real) -> Real {
    let nought = zero();
    if *y == nought { if *x >= nought { nought } else { pi() } } else { y.atan2(x) }
}

/// A leg's lengths as 256-bit numbers.
struct Lengths {
    offset: Real,
    thigh: Real,
    shank: Real,
    longest: Real,
    shortest: Real,
    /// Far below any f64's last bit, far above this arithmetic's: what counts as on an edge.
    hair: Real,
}

impl Lengths {
    fn of(leg: &Leg, knee: Range) -> Option<Self> {
        let (offset, thigh, shank) = (real(leg.offset)?, real(leg.thigh)?, real(leg.shank)?);
        let hair = real(leg.size() * 2f64.powi(-180))?;
        // Law of cosines: the corner between the links is π less the knee.
        let bent = |knee: f64| {
            let twice = Real::from(2u8).with_precision(BITS).value() * &thigh * &shank;
            Some(root(&(square(&thigh) + square(&shank) + twice * real(knee)?.cos())))
        };
        Some(Self {
            longest: if knee.min > 0.0 { bent(knee.min)? } else { &thigh + &shank },
            shortest: if knee.max < PI { bent(knee.max)? } else { absolute(&(&thigh - &shank)) },
            offset,
            thigh,
            shank,
            hair,
        })
    }

    /// Whether `value` lies in [least, most], give or take a hair.
    fn between(&self, value: &Real, least: &Real, most: &Real) -> bool {
        *value >= least - &self.hair && *value <= most + &self.hair
    }
}

/// A point in the half plane that the hip turns: roll-hip (x, distance from the roll axis),
/// yaw-hip (distance from the yaw axis, z).
type HalfPlane = (Real, Real);

/// Joint angles and closest point for `target` (leg frame, millimetres). `None` if a coordinate is
/// not finite or beyond [`FARTHEST`].
#[must_use]
pub fn solve(leg: &Leg, target: [f64; 3]) -> Option<RealSolution> {
    solve_within(leg, FREE_KNEE, target)
}

/// As [`solve`], for a knee of the given range, which ends the reach where it is narrower than the links do.
#[must_use]
pub fn solve_within(leg: &Leg, knee: Range, target: [f64; 3]) -> Option<RealSolution> {
    if target.iter().any(|c| !c.is_finite() || c.abs() > FARTHEST * leg.size()) {
        return None;
    }
    let lengths = Lengths::of(leg, knee)?;
    let [x, y, z] = [real(target[0])?, real(target[1])?, real(target[2])?];
    let asked: HalfPlane = match leg.shape {
        Shape::Roll => (x.clone(), root(&(square(&y) + square(&z)))),
        Shape::Yaw => (root(&(square(&x) + square(&y))), z.clone()),
    };

    let belongs = |point: &HalfPlane| match leg.shape {
        Shape::Roll => {
            let depth_squared = square(&point.1) - square(&lengths.offset);
            let span = root(&(square(&point.0) + &depth_squared));
            point.1 >= &lengths.offset - &lengths.hair
                && lengths.between(&span, &lengths.shortest, &lengths.longest)
        }
        Shape::Yaw => {
            let span = root(&(square(&(&point.0 - &lengths.offset)) + square(&point.1)));
            point.0 >= -&lengths.hair && lengths.between(&span, &lengths.shortest, &lengths.longest)
        }
    };

    let verdict = if belongs(&asked) { Verdict::Reached } else { Verdict::Moved };
    let reached = if verdict == Verdict::Reached {
        asked.clone()
    } else {
        let candidates = match leg.shape {
            Shape::Roll => candidates_roll(&lengths, &asked),
            Shape::Yaw => candidates_yaw(&lengths, &asked),
        };
        let mut nearest: Option<(Real, HalfPlane)> = None;
        for candidate in candidates.into_iter().filter(belongs) {
            let away = square(&(&candidate.0 - &asked.0)) + square(&(&candidate.1 - &asked.1));
            if nearest.as_ref().is_none_or(|(least, _)| away < *least) {
                nearest = Some((away, candidate));
            }
        }
        nearest?.1
    };

    let reached_foot = if verdict == Verdict::Reached {
        [x.clone(), y.clone(), z.clone()]
    } else {
        put_back(leg, &lengths, &asked, &reached, [&x, &y, &z])
    };
    let moved_by = root(
        &(square(&(&reached_foot[0] - &x))
            + square(&(&reached_foot[1] - &y))
            + square(&(&reached_foot[2] - &z))),
    );

    let (hip, direction, span) = match leg.shape {
        Shape::Roll => {
            let depth = root(&(square(&reached.1) - square(&lengths.offset)));
            // The angle at the roll axis in the right triangle of offset, depth and ρ.
            let turned = if reached.1 > zero() { arccosine(&(&lengths.offset / &reached.1)) } else { zero() };
            (
                angle_of(&reached_foot[2], &reached_foot[1]) + turned,
                angle_of(&reached.0, &depth),
                root(&(square(&reached.0) + square(&depth))),
            )
        }
        Shape::Yaw => {
            let out = &reached.0 - &lengths.offset;
            let span = root(&(square(&out) + square(&reached.1)));
            (angle_of(&x, &y), angle_of(&reached.1, &out), span)
        }
    };
    let (lift, flexion) = law_of_cosines(&lengths, &span);
    let thigh = if leg.bend.sign() > 0.0 { direction + lift } else { direction - lift };
    Some(RealSolution {
        pose: RealPose { hip: turned_back(hip), thigh: turned_back(thigh), knee: flexion },
        reached_foot,
        moved_by,
        verdict,
    })
}

/// Where the foot is, by the sums of sines and cosines of the leg's drawing.
#[must_use]
pub fn foot(leg: &Leg, pose: &RealPose) -> Option<[Real; 3]> {
    let lengths = Lengths::of(leg, FREE_KNEE)?;
    let second = if leg.bend.sign() > 0.0 { &pose.thigh - &pose.knee } else { &pose.thigh + &pose.knee };
    let (sin_hip, cos_hip) = pose.hip.sin_cos();
    let (sin_first, cos_first) = pose.thigh.sin_cos();
    let (sin_second, cos_second) = second.sin_cos();
    let by_cosine = &lengths.thigh * cos_first + &lengths.shank * cos_second;
    let by_sine = &lengths.thigh * sin_first + &lengths.shank * sin_second;
    Some(match leg.shape {
        Shape::Roll => [
            by_sine,
            &lengths.offset * &cos_hip + &by_cosine * &sin_hip,
            &lengths.offset * sin_hip - by_cosine * cos_hip,
        ],
        Shape::Yaw => {
            let from_axis = &lengths.offset + by_cosine;
            [&from_axis * sin_hip, from_axis * cos_hip, by_sine]
        }
    })
}

/// `pose`, exactly. `None` if an angle is not finite.
#[must_use]
pub fn real_pose(pose: &Pose) -> Option<RealPose> {
    Some(RealPose { hip: real(pose.hip)?, thigh: real(pose.thigh)?, knee: real(pose.knee)? })
}

/// Corner at the thigh's axis, and flexion of the knee.
fn law_of_cosines(lengths: &Lengths, span: &Real) -> (Real, Real) {
    let (thigh, shank) = (&lengths.thigh, &lengths.shank);
    let two = Real::from(2u8).with_precision(BITS).value();
    if *span <= lengths.hair {
        // Equal links, fully folded.
        return (zero(), pi());
    }
    let knee = arccosine(&((square(thigh) + square(shank) - square(span)) / (&two * thigh * shank)));
    let hip = arccosine(&((square(thigh) + square(span) - square(shank)) / (two * thigh * span)));
    (hip, pi() - knee)
}

/// Every point where the closest one can be. Ties go to the first.
fn candidates_roll(lengths: &Lengths, (x, from_axis): &HalfPlane) -> Vec<HalfPlane> {
    let offset = &lengths.offset;
    let from_origin = root(&(square(x) + square(from_axis)));
    let mut points = Vec::new();
    for span in [&lengths.longest, &lengths.shortest] {
        let radius = root(&(square(span) + square(offset)));
        if from_origin > zero() {
            let scale = radius / &from_origin;
            points.push((x * &scale, from_axis * scale));
        } else if *offset == zero() {
            // No direction from the origin: straight down.
            points.push((zero(), radius));
        }
        points.push((span.clone(), offset.clone()));
        points.push((-span, offset.clone()));
    }
    points.push((x.clone(), offset.clone()));
    points
}

/// Every point where the closest one can be. Ties go to the first.
fn candidates_yaw(lengths: &Lengths, (from_axis, z): &HalfPlane) -> Vec<HalfPlane> {
    let offset = &lengths.offset;
    let out = from_axis - offset;
    let from_femur_axis = root(&(square(&out) + square(z)));
    let mut points = Vec::new();
    for span in [&lengths.longest, &lengths.shortest] {
        if from_femur_axis > zero() {
            let scale = span / &from_femur_axis;
            points.push((offset + &out * &scale, z * scale));
        } else {
            // No direction from the femur axis: outboard.
            points.push((offset + span, zero()));
        }
        if span >= offset {
            let height = root(&(square(span) - square(offset)));
            points.push((zero(), height.clone()));
            points.push((zero(), -height));
        }
    }
    points.push((zero(), z.clone()));
    points
}

/// The point `reached` of the half plane in the leg frame, at the azimuth of the target.
fn put_back(
    leg: &Leg,
    lengths: &Lengths,
    asked: &HalfPlane,
    reached: &HalfPlane,
    [x, y, z]: [&Real; 3],
) -> [Real; 3] {
    match leg.shape {
        Shape::Roll if asked.1 > zero() => {
            let scale = &reached.1 / &asked.1;
            [reached.0.clone(), y * &scale, z * scale]
        }
        Shape::Roll => {
            // On the roll axis: hip 0.
            let depth = root(&(square(&reached.1) - square(&lengths.offset)));
            [reached.0.clone(), lengths.offset.clone(), -depth]
        }
        Shape::Yaw if asked.0 > zero() => {
            let scale = &reached.0 / &asked.0;
            [x * &scale, y * scale, reached.1.clone()]
        }
        // On the yaw axis: hip 0.
        Shape::Yaw => [zero(), reached.0.clone(), reached.1.clone()],
    }
}

/// An angle within (−3π, 3π] moved by a whole turn into (−π, π].
fn turned_back(angle: Real) -> Real {
    let half = pi();
    if angle > half {
        angle - &half - half
    } else if angle <= -&half {
        angle + &half + half
    } else {
        angle
    }
}
