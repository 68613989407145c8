//! Every contender, with what its image has to log: computed here by the same code.

use contenders::{Contender, PublishedHip, To, Visit};
use counted::Digest;
use targets::Target;

/// A contender, as far as the PC knows it.
#[derive(Debug, Clone)]
pub struct Expected {
    pub name: &'static str,
    pub what: &'static str,
    pub hip: &'static str,
    pub ours: bool,
    pub to: To,
    pub targets: usize,
    /// The line that the image has to log: the same code, the same bits.
    pub line: String,
    /// How far the foot is from where it was asked to be, at most, mm.
    pub largest_foot_error_mm: f64,
    /// The same as a share of thigh and shank together.
    pub largest_foot_error: f64,
    /// How far a joint is from where it should be, at most, radians.
    pub largest_joint_error_rad: f64,
}

#[cfg(test)]
impl Expected {
    /// A contender with two targets, for tests.
    pub fn of_two_targets() -> Self {
        Self {
            name: "some-roll",
            what: "some",
            hip: "roll",
            ours: false,
            to: To::Joints,
            targets: 2,
            line: "some-roll 2 77".into(),
            largest_foot_error_mm: 0.5,
            largest_foot_error: 0.0025,
            largest_joint_error_rad: 0.01,
        }
    }
}

/// All contenders, in the order of the table.
pub fn all() -> Vec<Expected> {
    let mut collector = Collector(Vec::new());
    contenders::visit_all(&mut collector);
    collector.0
}

struct Collector(Vec<Expected>);

impl Visit for Collector {
    fn visit<C: Contender>(&mut self) {
        let targets: &[Target] = C::Hip::PUBLISHED.targets;
        let mut digest = Digest::EMPTY;
        let (mut largest_foot_error_mm, mut largest_joint_error_rad) = (0.0_f64, 0.0_f64);
        for &target in targets {
            let answer = C::solve(&C::LEG, &C::foot(target));
            digest = digest.with(C::bits(&answer));
            if C::TO != To::Nothing {
                let joints = C::joints(&answer);
                let foot_error_mm = contenders::foot_error_mm::<C::Hip>(joints, target);
                largest_foot_error_mm = largest_foot_error_mm.max(foot_error_mm);
                let joint_error_rad = contenders::joint_error_rad::<C::Hip>(joints, target);
                largest_joint_error_rad = largest_joint_error_rad.max(joint_error_rad);
            }
        }
        self.0.push(Expected {
            name: C::NAME,
            what: C::WHAT,
            hip: <C::Hip as PublishedHip>::NAME,
            ours: C::OURS,
            to: C::TO,
            targets: targets.len(),
            line: format!("{} {} {}", C::NAME, targets.len(), digest.value()),
            largest_foot_error_mm,
            largest_foot_error: largest_foot_error_mm
                / (C::Hip::PUBLISHED.thigh_mm + C::Hip::PUBLISHED.shank_mm),
            largest_joint_error_rad,
        });
    }
}
