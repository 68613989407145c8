//! The places where legs go wrong, as far as they lie in the work volume: full reach, folded, on the hip's axis,
//! and at every joint limit, each of them a little to both sides.

use super::targets::is_within;
use crate::machine::judged_leg;
use crate::reference::{self, Leg, Pose, Shape};
use crate::sheet::LegKind;
use rand::{Rng, RngExt};
use std::f64::consts::PI;

/// Steps to both sides of an edge, as a fraction of a radian or of the leg's size: exactly on it, at the edge of
/// what the number systems resolve, and where cancellation used to bite.
const STEPS: [f64; 9] = [0.0, 1e-9, -1e-9, 1e-7, -1e-7, 1e-5, -1e-5, 1e-3, -1e-3];
/// How often to try for a point of an edge that lies in the work volume.
const TRIES_PER_POINT: usize = 40;

/// Makes a point of an edge, wherever it lies.
type Maker = fn(&Subject<'_>, &mut dyn Rng) -> [f64; 3];

/// Up to `most` points on edges within the work volume of a kind of leg.
pub(super) fn of(kind: &LegKind, most: usize, random: &mut impl Rng) -> Vec<[f64; 3]> {
    let makers: [Maker; 5] = [straight, folded, on_the_hip_axis, at_a_limit, at_two_limits];
    let subject = Subject { kind, leg: judged_leg(kind), ranges: kind.range_deg };
    let each = most / makers.len();
    makers
        .iter()
        .flat_map(|make| {
            let mut points = Vec::new();
            for _ in 0..each * TRIES_PER_POINT {
                if points.len() == each {
                    break;
                }
                let point = make(&subject, random);
                if is_within(&subject.kind.work, point) {
                    points.push(point);
                }
            }
            points
        })
        .collect()
}

struct Subject<'a> {
    kind: &'a LegKind,
    leg: Leg,
    ranges: [[f64; 2]; 3],
}

impl Subject<'_> {
    /// A random pose within the joint ranges.
    fn pose(&self, random: &mut dyn Rng) -> [f64; 3] {
        self.ranges.map(|[least, most]| (least + (most - least) * random.random::<f64>()).to_radians())
    }

    fn foot(&self, [hip, thigh, knee]: [f64; 3]) -> [f64; 3] {
        reference::foot(&self.leg, &Pose { hip, thigh, knee })
    }
}

fn step(random: &mut dyn Rng) -> f64 {
    STEPS[random.random_range(0..STEPS.len())]
}

/// A straight leg, and feet a little beyond it.
fn straight(subject: &Subject<'_>, random: &mut dyn Rng) -> [f64; 3] {
    let [hip, thigh, _] = subject.pose(random);
    let beyond = 1.0 + step(random).max(0.0);
    subject.foot([hip, thigh, step(random).abs()]).map(|v| v * beyond)
}

/// A fully folded leg.
fn folded(subject: &Subject<'_>, random: &mut dyn Rng) -> [f64; 3] {
    let [hip, thigh, _] = subject.pose(random);
    subject.foot([hip, thigh, PI - step(random).abs()])
}

/// On the axis of a yaw-hip leg; on the cylinder that a roll-hip leg's offset sweeps around its axis.
fn on_the_hip_axis(subject: &Subject<'_>, random: &mut dyn Rng) -> [f64; 3] {
    let size = subject.leg.size();
    let along = size * random.random_range(-1.0..1.0);
    let around: f64 = random.random_range(-PI..PI);
    let (sin, cos) = around.sin_cos();
    match subject.leg.shape {
        Shape::Roll => {
            let radius = subject.leg.offset + size * step(random);
            [along, radius * cos, radius * sin]
        }
        Shape::Yaw => {
            let radius = size * step(random).abs();
            [radius * sin, radius * cos, along]
        }
    }
}

/// One joint at an end of its range.
fn at_a_limit(subject: &Subject<'_>, random: &mut dyn Rng) -> [f64; 3] {
    let mut pose = subject.pose(random);
    hold_one(subject, &mut pose, random);
    subject.foot(pose)
}

/// Two of them.
fn at_two_limits(subject: &Subject<'_>, random: &mut dyn Rng) -> [f64; 3] {
    let mut pose = subject.pose(random);
    hold_one(subject, &mut pose, random);
    hold_one(subject, &mut pose, random);
    subject.foot(pose)
}

fn hold_one(subject: &Subject<'_>, pose: &mut [f64; 3], random: &mut dyn Rng) {
    let joint = random.random_range(0..3);
    let [least, most] = subject.ranges[joint];
    pose[joint] = if random.random() { least } else { most }.to_radians() + step(random);
}
