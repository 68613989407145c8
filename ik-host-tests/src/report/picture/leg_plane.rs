//! A leg in its own plane: where its joints are, how far its foot goes.
//!
//! The plane of a roll-hip leg holds thigh and shank: forward to the right, and up where the hip stands at 0. That of
//! a yaw-hip leg holds the yaw axis and all links: outboard to the right, and up.
//! Poses come to their places by the reference's forward kinematics, so that signs and bends are the reference's.

use crate::machine::judged_leg;
use crate::reference::{self, Leg, Pose, Shape, transforms};
use crate::sheet::LegKind;

/// A place in the plane: to the right, up; mm.
pub(super) type Place = (f64, f64);

/// How finely curves are drawn.
const STEPS: usize = 120;

/// A leg in its plane.
pub(super) struct LegPlane {
    leg: Leg,
    /// Thigh and knee, least and most, radians.
    thigh: [f64; 2],
    knee: [f64; 2],
}

impl LegPlane {
    pub(super) fn of(kind: &LegKind) -> Self {
        let [_, thigh, knee] = kind.range_deg.map(|range| range.map(f64::to_radians));
        Self { leg: judged_leg(kind), thigh, knee }
    }

    fn place(&self, [x, y, z]: [f64; 3]) -> Place {
        match self.leg.shape {
            Shape::Roll => (x, z),
            Shape::Yaw => (y, z),
        }
    }

    /// Thigh's joint, knee and foot of a pose.
    pub(super) fn joints(&self, thigh: f64, knee: f64) -> [Place; 3] {
        let pose = Pose { hip: 0.0, thigh, knee };
        transforms::frames(&self.leg, &pose).map(|frame| self.place(frame.origin()))
    }

    fn foot(&self, thigh: f64, knee: f64) -> Place {
        self.place(reference::foot(&self.leg, &Pose { hip: 0.0, thigh, knee }))
    }

    /// The thigh's joint.
    pub(super) fn thigh_joint(&self) -> Place {
        self.joints(0.0, 0.0)[0]
    }

    /// Where a foot comes to lie when the hip turns it into the plane. Exact for feet that the hip turns outboard or
    /// down; a foot nearer to a roll axis than the offset comes to lie level with the axis.
    pub(super) fn turned_into(&self, [x, y, z]: [f64; 3]) -> Place {
        match self.leg.shape {
            Shape::Roll => (x, -self.down(y.hypot(z))),
            Shape::Yaw => (x.hypot(y), z),
        }
    }

    /// How far below a roll axis the plane of the leg meets a circle around it.
    fn down(&self, radius: f64) -> f64 {
        (radius * radius - self.leg.offset * self.leg.offset).max(0.0).sqrt()
    }

    /// The outline of all places to which the thigh and knee ranges let the foot: its distance from the thigh's joint
    /// hangs on the knee alone, and its direction on both, so that the outline is that of the two ranges.
    pub(super) fn reach(&self) -> Vec<Place> {
        let ([t0, t1], [k0, k1]) = (self.thigh, self.knee);
        let run = |from: (f64, f64), to: (f64, f64)| {
            between(from.0, to.0).zip(between(from.1, to.1)).map(|(thigh, knee)| self.foot(thigh, knee))
        };
        run((t0, k0), (t1, k0))
            .chain(run((t1, k0), (t1, k1)))
            .chain(run((t1, k1), (t0, k1)))
            .chain(run((t0, k1), (t0, k0)))
            .collect()
    }

    /// Inner and outer limit of the reach as the links alone give it, mm from the thigh's joint.
    pub(super) fn links_reach(&self) -> [f64; 2] {
        [(self.leg.thigh - self.leg.shank).abs(), self.leg.thigh + self.leg.shank]
    }

    /// As [`Self::links_reach`], as the knee's range gives it.
    pub(super) fn knee_reach(&self) -> [f64; 2] {
        let hub = self.thigh_joint();
        let [near, far] = [self.knee[1], self.knee[0]].map(|knee| self.foot(0.0, knee));
        [near, far].map(|foot| (foot.0 - hub.0).hypot(foot.1 - hub.1))
    }

    /// A sector that shows the thigh's range.
    pub(super) fn thigh_range(&self) -> Vec<Place> {
        let toward = |thigh| self.joints(thigh, 0.0)[1];
        sector(self.thigh_joint(), 0.3 * self.leg.thigh, between(self.thigh[0], self.thigh[1]).map(toward))
    }

    /// A sector that shows the knee's range, for a pose with this thigh angle.
    pub(super) fn knee_range(&self, thigh: f64) -> Vec<Place> {
        let knee = self.joints(thigh, 0.0)[1];
        let toward = |flexion| self.foot(thigh, flexion);
        sector(knee, 0.25 * self.leg.shank, between(self.knee[0], self.knee[1]).map(toward))
    }

    /// The corners of the work volume, every foot of it turned into the plane: a rectangle, because a foot keeps its
    /// place along the hip's axis and its distance from it.
    pub(super) fn work(&self, kind: &LegKind) -> [Place; 4] {
        let work = &kind.work;
        let (right, up) = match self.leg.shape {
            Shape::Roll => (work.x_mm, distances(work.y_mm, work.z_mm).map(|radius| -self.down(radius))),
            Shape::Yaw => (distances(work.x_mm, work.y_mm), work.z_mm),
        };
        [(right[0], up[0]), (right[1], up[0]), (right[1], up[1]), (right[0], up[1])]
    }
}

/// Least and largest distance of a rectangle's points from the origin.
fn distances(a: [f64; 2], b: [f64; 2]) -> [f64; 2] {
    let near =
        |[least, most]: [f64; 2]| if least <= 0.0 && 0.0 <= most { 0.0 } else { least.abs().min(most.abs()) };
    let far = |[least, most]: [f64; 2]| least.abs().max(most.abs());
    [near(a).hypot(near(b)), far(a).hypot(far(b))]
}

fn between(from: f64, to: f64) -> impl Iterator<Item = f64> {
    (0..=STEPS).map(move |step| from + (to - from) * step as f64 / STEPS as f64)
}

/// A sector around a hub, of a radius, through the directions of the given places.
fn sector(hub: Place, radius: f64, towards: impl Iterator<Item = Place>) -> Vec<Place> {
    let rim = towards.map(|place| {
        let (right, up) = (place.0 - hub.0, place.1 - hub.1);
        let length = right.hypot(up);
        (hub.0 + right / length * radius, hub.1 + up / length * radius)
    });
    std::iter::once(hub).chain(rim).collect()
}

/// Points of a circle.
pub(super) fn circle(hub: Place, radius: f64) -> impl Iterator<Item = Place> {
    between(0.0, std::f64::consts::TAU)
        .map(move |angle| (hub.0 + radius * angle.cos(), hub.1 + radius * angle.sin()))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::sheet::{self, DEMOS};
    use crate::survey::Judge;

    /// The reference's poses put the foot where the plane says that it is, for every corner of the work volume.
    #[test]
    fn a_foot_turned_into_the_plane_is_the_foot_of_its_pose() {
        for demo in DEMOS {
            let robot = sheet::demo(demo.name).unwrap();
            let kind = &robot.kinds[0];
            let (plane, judge) = (LegPlane::of(kind), Judge::of(&robot, 0).unwrap());
            let mut reached = 0;
            for corner in 0..8 {
                let pick = |range: [f64; 2], bit: usize| range[corner >> bit & 1];
                let foot = [pick(kind.work.x_mm, 0), pick(kind.work.y_mm, 1), pick(kind.work.z_mm, 2)];
                let judged = judge.judge(foot);
                if judged.reached {
                    reached += 1;
                    let drawn = plane.joints(judged.pose.thigh, judged.pose.knee)[2];
                    let turned = plane.turned_into(foot);
                    let apart = (drawn.0 - turned.0).hypot(drawn.1 - turned.1);
                    assert!(apart < 1e-9, "{} {foot:?}: {drawn:?}, {turned:?}", demo.name);
                }
            }
            assert!(reached >= 4, "{}: {reached} corners are reached", demo.name);
        }
    }

    #[test]
    fn the_outline_of_the_reach_lies_between_the_limits_of_the_knee_and_those_within_the_links() {
        for demo in DEMOS {
            let plane = LegPlane::of(&sheet::demo(demo.name).unwrap().kinds[0]);
            let ([near, far], [inner, outer]) = (plane.knee_reach(), plane.links_reach());
            assert!(inner < near && near < far && far < outer);
            let hub = plane.thigh_joint();
            let spans: Vec<_> = plane.reach().iter().map(|p| (p.0 - hub.0).hypot(p.1 - hub.1)).collect();
            let least = spans.iter().copied().fold(f64::INFINITY, f64::min);
            let most = spans.iter().copied().fold(0.0, f64::max);
            assert!((least - near).abs() < 1e-9 && (most - far).abs() < 1e-9, "{}", demo.name);
        }
    }
}
