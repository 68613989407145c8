//! The published set: two legs, and for each of them 200 foot targets that every contender is counted over.
//!
//! # The rule
//!
//! Pose k (k = 1, 2, …) has its joints at the fractions (H₂(k), H₃(k), H₅(k)) of their ranges, hip, thigh and
//! knee, each range drawn in by one degree at both ends. H_b is the radical inverse in base b: Halton, "On the
//! efficiency of certain quasi-random sequences of points in evaluating multi-dimensional integrals", Numerische
//! Mathematik 2 (1960), pages 84–90 (from memory). Poses that put the foot less than 20 mm in front of the hip are
//! left out: below a roll-hip leg's axis, seen in the leg's plane, or outboard of a yaw-hip leg's axis; there an inverse
//! solver rightly answers with another pose. The feet of the first 200 poses left are rounded to whole 1/64 mm, which
//! `f32` and binary fractions of 6 bits hold exactly, so that every number system solves the same points.
//!
//! The tables are written down, not computed on the chip; a test holds them against the rule.
#![cfg_attr(not(test), no_std)]
#![forbid(unsafe_code)]

mod roll_hip;
mod yaw_hip;

/// A foot in a leg's own frame (x forward, y outboard, z up), in steps of 1/64 mm.
pub type Target = [i32; 3];

/// Steps of a target's coordinate in a millimetre.
pub const STEPS_PER_MM: i32 = 64;

/// What a leg is, and its targets.
#[derive(Debug, Clone, Copy)]
pub struct PublishedLeg {
    /// Hip offset (roll-hip) or coxa (yaw-hip), mm.
    pub offset_mm: f64,
    /// Thigh or femur, mm.
    pub thigh_mm: f64,
    /// Shank or tibia, mm.
    pub shank_mm: f64,
    /// The ranges of hip, thigh and knee, degrees.
    pub ranges_deg: [[f64; 2]; 3],
    /// Within those ranges.
    pub targets: &'static [Target],
}

/// A roll-hip leg whose knee bends forward.
pub const ROLL_HIP: PublishedLeg = PublishedLeg {
    offset_mm: 31.5,
    thigh_mm: 94.0,
    shank_mm: 107.0,
    ranges_deg: [[-35.0, 35.0], [-25.0, 85.0], [15.0, 130.0]],
    targets: &roll_hip::TARGETS,
};

/// A yaw-hip leg whose knee bends up.
pub const YAW_HIP: PublishedLeg = PublishedLeg {
    offset_mm: 42.0,
    thigh_mm: 71.0,
    shank_mm: 118.0,
    ranges_deg: [[-50.0, 50.0], [-40.0, 90.0], [15.0, 155.0]],
    targets: &yaw_hip::TARGETS,
};

#[cfg(test)]
mod tests {
    use super::*;

    fn radical_inverse(mut k: usize, base: usize) -> f64 {
        let (mut sum, mut place) = (0.0, 1.0 / base as f64);
        while k > 0 {
            sum += (k % base) as f64 * place;
            (k, place) = (k / base, place / base as f64);
        }
        sum
    }

    fn joints(leg: &PublishedLeg, k: usize) -> [f64; 3] {
        let mut fractions = [2, 3, 5].into_iter().map(|base| radical_inverse(k, base));
        leg.ranges_deg.map(|[least, most]| {
            let fraction = fractions.next().expect("three joints");
            (least + 1.0 + fraction * (most - least - 2.0)).to_radians()
        })
    }

    /// The foot, and how far it is in front of the hip. The shank of both legs turns back by the knee's angle.
    fn roll_hip_foot(leg: &PublishedLeg, [hip, thigh, knee]: [f64; 3]) -> ([f64; 3], f64) {
        let down = leg.thigh_mm * thigh.cos() + leg.shank_mm * (thigh - knee).cos();
        let forward = leg.thigh_mm * thigh.sin() + leg.shank_mm * (thigh - knee).sin();
        let [y, z] =
            [leg.offset_mm * hip.cos() + down * hip.sin(), leg.offset_mm * hip.sin() - down * hip.cos()];
        ([forward, y, z], down)
    }

    fn yaw_hip_foot(leg: &PublishedLeg, [hip, femur, knee]: [f64; 3]) -> ([f64; 3], f64) {
        let out = leg.offset_mm + leg.thigh_mm * femur.cos() + leg.shank_mm * (femur - knee).cos();
        let up = leg.thigh_mm * femur.sin() + leg.shank_mm * (femur - knee).sin();
        ([out * hip.sin(), out * hip.cos(), up], out)
    }

    type Forward = fn(&PublishedLeg, [f64; 3]) -> ([f64; 3], f64);

    fn by_the_rule(leg: &PublishedLeg, foot: Forward) -> Vec<Target> {
        let steps = |mm: f64| (mm * f64::from(STEPS_PER_MM)).round() as i32;
        (1..)
            .map(|k| foot(leg, joints(leg, k)))
            .filter(|&(_, in_front)| in_front >= 20.0)
            .take(200)
            .map(|(foot, _)| foot.map(steps))
            .collect()
    }

    fn check(leg: &PublishedLeg, foot: Forward) {
        let wanted = by_the_rule(leg, foot);
        if leg.targets != wanted {
            let lines: String = wanted.iter().map(|[x, y, z]| format!("    [{x}, {y}, {z}],\n")).collect();
            panic!("the table does not follow the rule, which gives\n{lines}");
        }
    }

    #[test]
    fn the_roll_hip_table_follows_the_rule() {
        check(&ROLL_HIP, roll_hip_foot);
    }

    #[test]
    fn the_yaw_hip_table_follows_the_rule() {
        check(&YAW_HIP, yaw_hip_foot);
    }
}
