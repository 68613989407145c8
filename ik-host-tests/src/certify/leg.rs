//! A box of targets for a leg: what the solver answers to all of them, and how far off the foot may be.

use super::bounded::{Bounded, root_error};
use super::carried::{self, Table};
use super::decisions::{Misjudged, every_way};
use super::interval::Interval;
use super::pulse::Pulses;
use super::quantities::{Angle, Length};
use crate::machine::{self, Counter, Refused};
use crate::promises;
use crate::reference::{Bend, Leg as Judged, Shape};
use crate::sheet::{HipShape, KneeDrive, LegKind, Robot};
use ik_core::{Answer, Foot, Hip, Joints, Leg, Outcome, RollHip, YawHip};

/// Bounds on the foot's error over a box of targets, mm.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Enclosed {
    /// By arithmetic.
    pub arithmetic_mm: f64,
    /// With pulses rounded to counts as well.
    pub together_mm: f64,
}

/// Ways that the comparisons of one box may go, at the most; a box with more is split.
const MOST_WAYS: usize = 512;

/// A kind of leg in a number system that carries bounds.
pub struct Subject {
    solver: Box<dyn Solver>,
    /// Where its feet are asked for.
    work: [Interval; 3],
}

impl Subject {
    /// A kind of leg in the number system of this name; or why it cannot be certified.
    ///
    /// # Errors
    /// What ik-core refuses.
    pub fn of(robot: &Robot, kind: usize, number: &str) -> Result<Result<Self, String>, Refused> {
        let Some(bounds) = promises::ALL.iter().find(|bounds| bounds.number == number) else {
            return Ok(Err("it has no table of bounds".into()));
        };
        let sheet = &robot.kinds[kind];
        let radius = sheet.offset_mm + sheet.thigh_mm + sheet.shank_mm;
        // A foot is rounded to the lengths that there are before it is a target.
        let side = |[least, most]: [f64; 2]| {
            let [relative, mm] = bounds.length;
            Interval::new(least, most).widened(relative * least.abs().max(most.abs()) + mm)
        };
        let work = [side(sheet.work.x_mm), side(sheet.work.y_mm), side(sheet.work.z_mm)];
        if work.iter().any(|side| side.size() > radius) {
            return Ok(Err(format!(
                "the work volume reaches beyond {radius} mm (offset and links together) along an axis, which the \
                 bounds do not cover"
            )));
        }
        let solver = match number {
            "float32" => solver::<carried::Float32>(robot, kind)?,
            "coarse" => solver::<carried::Coarse>(robot, kind)?,
            "fixed32" => solver::<carried::Fixed32>(robot, kind)?,
            "short32" => solver::<carried::Short32>(robot, kind)?,
            _ => solver::<carried::Fixed16>(robot, kind)?,
        };
        Ok(Ok(Self { solver, work }))
    }

    /// Where its feet are asked for, rounding to lengths included.
    pub const fn work(&self) -> [Interval; 3] {
        self.work
    }

    /// How far off the foot of any target of a box within the work volume may be.
    pub fn enclose(&self, feet: [Interval; 3]) -> Enclosed {
        self.solver.enclose(feet)
    }
}

trait Solver: Send + Sync {
    fn enclose(&self, feet: [Interval; 3]) -> Enclosed;
}

struct InNumber<H: Hip, T: Table> {
    leg: Leg<H, Bounded<T>>,
    judged: Judged,
    pulses: Pulses,
}

fn solver<T: Table>(robot: &Robot, kind: usize) -> Result<Box<dyn Solver>, Refused> {
    let sheet: &LegKind = &robot.kinds[kind];
    let counter = Counter::of_kind(robot, kind)?;
    let (judged, pulses) = (machine::judged_leg(sheet), Pulses::of(robot, kind, &counter, T::BOUNDS));
    Ok(match sheet.hip {
        HipShape::Roll => {
            Box::new(InNumber::<RollHip, T> { leg: machine::roll_leg(robot, kind)?, judged, pulses })
        }
        HipShape::Yaw => {
            Box::new(InNumber::<YawHip, T> { leg: machine::yaw_leg(robot, kind)?, judged, pulses })
        }
    })
}

impl<H: Hip + Send + Sync, T: Table> Solver for InNumber<H, T> {
    fn enclose(&self, feet: [Interval; 3]) -> Enclosed {
        let [x, y, z] = feet.map(Length);
        let mut all = Enclosed { arithmetic_mm: 0.0, together_mm: 0.0 };
        let covered = every_way(MOST_WAYS, |misjudged| {
            let answer = self.leg.solve(Foot::new(x, y, z), Joints::ZERO);
            let one = self.off(feet, &answer, &misjudged());
            all.arithmetic_mm = larger(all.arithmetic_mm, one.arithmetic_mm);
            all.together_mm = larger(all.together_mm, one.together_mm);
        });
        if covered { all } else { Enclosed { arithmetic_mm: f64::INFINITY, together_mm: f64::INFINITY } }
    }
}

/// The larger; what is no number is larger than any.
fn larger(a: f64, b: f64) -> f64 {
    if b.is_nan() { f64::INFINITY } else { a.max(b) }
}

/// What the f64 arithmetic of the bounds themselves may have lost, many times over; and of the leg's size, what the f64 reference
/// may be off by.
const OWN_ROUNDING: f64 = 1e-9;
const REFERENCE: f64 = 1e-12;

/// What a chord is at the most, of an angle in radians, on a circle of radius 1.
fn chord(angle: f64) -> f64 {
    angle.min(2.0)
}

impl<H: Hip, T: Table> InNumber<H, T> {
    /// How far off the feet may be that went one way.
    fn off(&self, feet: [Interval; 3], answer: &Answer<Bounded<T>>, misjudged: &Misjudged) -> Enclosed {
        let leg = &self.judged;
        let [hip, thigh, knee] = answer.joints.as_array().map(|angle| angle.raw());
        let reached = answer.outcome == Outcome::Reached;
        let line = self.line(&knee);
        let [x, y, z] = feet;
        // From the hip's axis to the foot.
        let asked_radius = match leg.shape {
            Shape::Roll => (y.square() + z.square()).root(),
            Shape::Yaw => (x.square() + y.square()).root(),
        };
        let radius = if reached { asked_radius } else { self.radius(&thigh, &knee, line) };
        // The hip moves the foot across the leg's plane, but for what a roll-hip leg's offset leans.
        let lean = match leg.shape {
            Shape::Roll => leg.offset / radius.low,
            Shape::Yaw => 0.0,
        };
        let cosine = (lean + hip.error).min(1.0);
        let both = |hip: f64, plane: f64| (hip * hip + plane * plane + 2.0 * cosine * hip * plane).sqrt();
        // Joint by joint: a limit brings two angles no farther apart than they are, or its own rounding.
        let [hip_limit, thigh_limit] = misjudged.turns_rad;
        let onto_the_cylinder = !reached && leg.shape == Shape::Roll;
        let line_mm = if onto_the_cylinder { line.high.max(radius.high) } else { line.high };
        let hip_mm = radius.high * chord(hip.error.max(hip_limit));
        let knee_mm = leg.shank * chord(knee.error.max(misjudged.knee_rad));
        let by_joints = |thigh_rad: f64| both(hip_mm, line_mm * chord(thigh_rad) + knee_mm);
        // In foot space, where what is singular for the joints is not.
        let knee_own = leg.shank * knee.own.max(misjudged.knee_own_rad);
        let in_place = || {
            let plane = thigh.along.hypot(thigh.across) + thigh.displaced + knee_own + hip.along;
            both(hip.across, plane) + hip.displaced
        };
        let unlimited = || {
            let by_joints = by_joints(thigh.error);
            if reached { by_joints.min(in_place()) } else { by_joints }
        };
        let solved = if thigh_limit > 0.0 && hip_limit == 0.0 && !hip.is_constant() && !onto_the_cylinder {
            if thigh.is_constant() {
                // Held, where the exact thigh may be within: on the way from the exact one to that which was not held, which
                // another way of this box looks at. The way is an arc.
                by_joints(thigh.error) + line_mm * thigh_limit * thigh_limit
            } else {
                // Not held, where the exact one may be: what the limit moves that one's foot counts instead.
                unlimited().max(line_mm * chord(thigh_limit))
            }
        } else if hip_limit > 0.0 || thigh_limit > 0.0 {
            by_joints(thigh.error.max(thigh_limit))
        } else {
            unlimited()
        };
        let asked_line = self.asked_line(feet);
        let by_square =
            root_error(misjudged.square_mm2, Interval::point(asked_line.low.min(asked_radius.low)));
        let by_length = misjudged.length_mm + (2.0 * leg.size() * misjudged.length_mm).sqrt();
        let arithmetic_mm = (solved + by_square + by_length) * (1.0 + OWN_ROUNDING) + REFERENCE * leg.size();
        let pulse_mm = self.pulse(radius.high, line, &knee, arithmetic_mm) * (1.0 + OWN_ROUNDING);
        Enclosed { arithmetic_mm, together_mm: arithmetic_mm + pulse_mm }
    }

    /// The line from thigh joint to foot.
    fn line(&self, knee: &Angle<T>) -> Interval {
        let (thigh, shank) = (self.judged.thigh, self.judged.shank);
        let sides = Interval::point(thigh).square() + Interval::point(shank).square();
        let twice = Interval::point(2.0 * thigh) * Interval::point(shank);
        (sides + twice * knee.exact.cosine()).root()
    }

    /// The same for the feet that are asked for.
    fn asked_line(&self, [x, y, z]: [Interval; 3]) -> Interval {
        let offset = Interval::point(self.judged.offset);
        match self.judged.shape {
            Shape::Roll => (x.square() + y.square() + z.square() - offset.square()).root(),
            Shape::Yaw => {
                let along = (x.square() + y.square()).root() - offset;
                (along.square() + z.square()).root()
            }
        }
    }

    /// From the hip's axis to the foot, by thigh and knee.
    fn radius(&self, thigh: &Angle<T>, knee: &Angle<T>, line: Interval) -> Interval {
        let leg = &self.judged;
        let shank = match leg.bend {
            Bend::Backward | Bend::Down => thigh.exact + knee.exact,
            Bend::Forward | Bend::Up => thigh.exact - knee.exact,
        };
        let along =
            Interval::point(leg.thigh) * thigh.exact.cosine() + Interval::point(leg.shank) * shank.cosine();
        let along = along.within(-line.high, line.high);
        match leg.shape {
            Shape::Roll => (along.square() + Interval::point(leg.offset).square()).root(),
            Shape::Yaw => {
                let radius = along + Interval::point(leg.offset);
                Interval::new(radius.least_size(), radius.size())
            }
        }
    }

    /// How far rounding the pulses moves the foot, from joints that are off by `off_mm` in foot space.
    ///
    /// With a the line from thigh joint to foot and b the shank, both as vectors, small turns t and k of thigh and knee move the
    /// foot in the leg's plane by |t·a + k·b|, and 2·a·b = a² + b² − thigh²; the hip moves it along its circle. Over
    /// finite turns the vectors change by no more than the foot moves.
    fn pulse(&self, radius: f64, line: Interval, knee: &Angle<T>, off_mm: f64) -> f64 {
        let leg = &self.judged;
        let [hip_rad, thigh_rad, last_rad] = self.pulses.servo_rad;
        let in_plane = match self.pulses.knee_drive {
            KneeDrive::Direct => {
                let change = leg.shank * last_rad + off_mm;
                let line = line.widened(change).within(0.0, leg.thigh + leg.shank);
                let (own, shank, thigh) =
                    (line.square(), Interval::point(leg.shank).square(), Interval::point(leg.thigh).square());
                let between = (own + shank - thigh).size();
                (own.high * thigh_rad * thigh_rad
                    + shank.high * last_rad * last_rad
                    + between * thigh_rad * last_rad)
                    .sqrt()
            }
            // Thigh and shank turn on their own: 2·thigh·shank·cos(knee) between them.
            KneeDrive::Parallelogram => {
                let change = thigh_rad + last_rad + off_mm / leg.thigh.min(leg.shank);
                let between = 2.0 * leg.thigh * leg.shank * knee.exact.widened(change).cosine().size();
                (leg.thigh * leg.thigh * thigh_rad * thigh_rad
                    + leg.shank * leg.shank * last_rad * last_rad
                    + between * thigh_rad * last_rad)
                    .sqrt()
            }
        };
        let around = (radius + in_plane + off_mm) * hip_rad;
        // The offset makes a roll-hip leg's circle lean into the leg's plane.
        let leaning = match leg.shape {
            Shape::Roll => 2.0 * leg.offset * hip_rad * in_plane,
            Shape::Yaw => 0.0,
        };
        (around * around + in_plane * in_plane + leaning).sqrt()
    }
}
