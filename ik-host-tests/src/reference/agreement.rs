//! Before the references judge anything, they are held against one another.

use std::error::Error;
use std::fmt;

use super::closed_form::{self, Solution};
use super::leg::{Leg, Pose, Verdict, distance};
use super::{multiprecision, transforms};

/// Largest difference allowed between an angle in f64 and in 256 bits, in radians: some
/// four units in the last place of π.
pub const ANGLE_TOLERANCE: f64 = 2e-15;

/// Largest distance allowed between two f64 answers for where the foot is, as a fraction of the
/// leg's size (offset + thigh + shank; and of the target's distance, for how far it was moved).
pub const FOOT_TOLERANCE: f64 = 3e-15;

/// That the references agree, and how closely.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Agreement {
    /// Targets compared.
    pub targets: usize,
    /// How many of them were out of reach.
    pub moved: usize,
    /// Largest difference of any joint angle, f64 against 256 bits, in radians.
    pub largest_angle_rad: f64,
    /// The target at which it was found.
    pub at_angle: [f64; 3],
    /// Largest distance between two answers for where the foot is, in millimetres: the chain of
    /// transforms against the closest point sought, and both against 256 bits.
    pub largest_foot_mm: f64,
    /// The target at which it was found.
    pub at_foot: [f64; 3],
}

impl fmt::Display for Agreement {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(
            f,
            "transforms, closed form and {} bits agree on {} targets ({} out of reach) \
             within {:.1e} rad and {:.1e} mm",
            multiprecision::BITS,
            self.targets,
            self.moved,
            self.largest_angle_rad,
            self.largest_foot_mm
        )
    }
}

/// Two references that differ by more than they may.
#[derive(Clone, Debug, PartialEq)]
pub struct Disagreement {
    /// The leg.
    pub leg: Leg,
    /// The target, in its frame, in millimetres.
    pub target: [f64; 3],
    /// What was compared, as a quantity with its unit.
    pub what: &'static str,
    /// What it came to.
    pub found: f64,
    /// What it may come to.
    pub allowed: f64,
}

impl fmt::Display for Disagreement {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let [x, y, z] = self.target;
        write!(
            f,
            "the references disagree on the {}, foot asked to ({x}, {y}, {z}) mm: {} is {:e}, \
             at most {:e} is allowed",
            self.leg, self.what, self.found, self.allowed
        )
    }
}

impl Error for Disagreement {}

/// Holds the f64 closed form, the chain of transforms and the 256-bit solution against one another
/// at every target. Takes about a millisecond a target in a
/// release build, nearly all of it for arctangents and arccosines in 256 bits.
///
/// # Errors
/// The first target at which two of them differ by more than [`ANGLE_TOLERANCE`] or
/// [`FOOT_TOLERANCE`]; or that is not finite, or beyond [`multiprecision::FARTHEST`].
pub fn agreement(leg: &Leg, targets: &[[f64; 3]]) -> Result<Agreement, Disagreement> {
    agreement_of(leg, targets, closed_form::solve, transforms::foot)
}

/// As [`agreement`], with an inverse and a forward function of the caller's in the places of
/// [`closed_form::solve`] and [`transforms::foot`]: so that tests can see a wrong one caught.
///
/// # Errors
/// As [`agreement`].
pub fn agreement_of(
    leg: &Leg,
    targets: &[[f64; 3]],
    inverse: impl Fn(&Leg, [f64; 3]) -> Solution,
    forward: impl Fn(&Leg, &Pose) -> [f64; 3],
) -> Result<Agreement, Disagreement> {
    let mut result = Agreement {
        targets: targets.len(),
        moved: 0,
        largest_angle_rad: 0.0,
        at_angle: [0.0; 3],
        largest_foot_mm: 0.0,
        at_foot: [0.0; 3],
    };
    for &target in targets {
        let compared = compare(leg, target, &inverse(leg, target), &forward)?;
        result.moved += usize::from(compared.moved);
        if compared.angle_rad > result.largest_angle_rad {
            result.largest_angle_rad = compared.angle_rad;
            result.at_angle = target;
        }
        if compared.foot_mm > result.largest_foot_mm {
            result.largest_foot_mm = compared.foot_mm;
            result.at_foot = target;
        }
    }
    Ok(result)
}

struct Compared {
    moved: bool,
    angle_rad: f64,
    foot_mm: f64,
}

/// One target's answer in f64 against 256 bits, and its pose through both forward kinematics.
fn compare(
    leg: &Leg,
    target: [f64; 3],
    answer: &Solution,
    forward: &impl Fn(&Leg, &Pose) -> [f64; 3],
) -> Result<Compared, Disagreement> {
    // Written so that a NaN is a disagreement too.
    let hold = |what, found: f64, allowed: f64| {
        if found <= allowed {
            Ok(found)
        } else {
            Err(Disagreement { leg: *leg, target, what, found, allowed })
        }
    };
    let unfit = || Disagreement {
        leg: *leg,
        target,
        what: "the largest coordinate of the target (leg sizes)",
        found: target.iter().fold(0.0, |l: f64, c| if c.abs() <= l { l } else { c.abs() }) / leg.size(),
        allowed: multiprecision::FARTHEST,
    };
    let to_f64 = |foot: &[multiprecision::Real; 3]| {
        [multiprecision::to_f64(&foot[0]), multiprecision::to_f64(&foot[1]), multiprecision::to_f64(&foot[2])]
    };

    let exact = multiprecision::solve(leg, target).ok_or_else(unfit)?;
    let exact_foot = to_f64(&exact.reached_foot);
    let exact_moved_by = multiprecision::to_f64(&exact.moved_by);
    let of_size = FOOT_TOLERANCE * leg.size();

    // A target closer to the edge of the reachable set than f64 can tell may go either way.
    if answer.verdict != exact.verdict {
        hold("the distance out of reach at which the verdicts differ (mm)", exact_moved_by, of_size * 1e-6)?;
    }
    hold(
        "the difference in how far the target was moved (mm)",
        (answer.moved_by_mm - exact_moved_by).abs(),
        of_size + f64::EPSILON * 4.0 * exact_moved_by,
    )?;
    let angle_rad = hold(
        "the difference of a joint angle from 256 bits (rad)",
        answer.pose.largest_difference(&exact.pose.rounded()),
        ANGLE_TOLERANCE,
    )?;
    let mut foot_mm = hold(
        "the distance between the points that can be reached (mm)",
        distance(answer.reached_foot, exact_foot),
        of_size,
    )?;

    let chained = forward(leg, &answer.pose);
    let pose = multiprecision::real_pose(&answer.pose).ok_or_else(unfit)?;
    let summed = to_f64(&multiprecision::foot(leg, &pose).ok_or_else(unfit)?);
    foot_mm = foot_mm.max(hold(
        "the distance between two forward kinematics of one pose (mm)",
        distance(chained, summed),
        of_size,
    )?);
    foot_mm = foot_mm.max(hold(
        "the distance of the foot at the angles found from the foot sought (mm)",
        distance(chained, answer.reached_foot),
        of_size,
    )?);
    Ok(Compared { moved: exact.verdict == Verdict::Moved, angle_rad, foot_mm })
}

/// `count` targets for [`agreement`]: spread evenly through a box a little larger than the reach,
/// and every fourth one set where it is hard: near a straight knee, near a folded one, near the
/// hip's axis, on the edge itself. The same leg gives the same targets.
#[must_use]
pub fn spread(leg: &Leg, count: usize) -> Vec<[f64; 3]> {
    // Additive recurrence on the roots of t⁴ = t + 1 (after Roberts' generalised golden ratio):
    // even in three dimensions for any count.
    const STEPS: [f64; 3] = [0.819_172_513_396_164_4, 0.671_043_606_703_789_2, 0.549_700_477_901_970_3];
    (0..count)
        .map(|index| {
            let number = index as f64 + 0.5;
            let unit = STEPS.map(|step| (number * step).fract() * 2.0 - 1.0);
            let plain = unit.map(|u| u * 1.2 * leg.size());
            if index % 4 != 3 {
                return plain;
            }
            // From stretched or folded to a hair of it, in both directions.
            let nearness = 10f64.powi(-(i32::try_from(index / 12 % 16).unwrap_or(0)));
            let pose = Pose {
                hip: unit[0] * 3.0,
                thigh: unit[1] * 1.5,
                knee: match index / 4 % 3 {
                    0 => nearness,
                    1 => std::f64::consts::PI - nearness,
                    _ => 1.0 + unit[2],
                },
            };
            let [x, y, z] = transforms::foot(leg, &pose);
            if index / 4 % 3 == 2 {
                // Close to the hip's axis, within the offset's cylinder or just outside it.
                let from_axis = leg.offset * (1.0 + nearness * unit[2]) + nearness;
                let (sin, cos) = pose.hip.sin_cos();
                return match leg.shape {
                    super::Shape::Roll => [x, from_axis * cos, from_axis * sin],
                    super::Shape::Yaw => [nearness * sin, nearness * cos, z],
                };
            }
            [x, y, z]
        })
        .collect()
}
