//! ik-core against leg poses computed outside the project, in every number system.
//!
//! Source: `check-values/leg-poses.csv`, found by mpmath's root finder on products of 4×4 homogeneous transforms at
//! 60 digits; scipy's root finder agrees to 6e-15. Its frame and signs are mapped where the file is read
//! (`common/published.rs`).

mod common;

use common::checks::published_pose;
use common::published::leg_poses;
use common::solver::{NumberSystem, core};
use ik_core::Side;
use ik_host_tests::reference::Pose;

#[test]
fn every_published_pose_is_found_from_its_foot_and_the_foot_from_the_pose() {
    let poses = leg_poses();
    assert_eq!(poses.len(), 48, "rows of leg-poses.csv");
    for (leg, published) in poses {
        for number in NumberSystem::ALL {
            let solver = core(number, &leg, None).expect("a leg");
            assert_eq!(published_pose::check(&*solver, &published), Ok(()));
        }
    }
}

/// The file's right legs (side −1) are right-hand mirrored feet in the body's frame: through the mounting.
#[test]
fn right_legs_of_the_file_are_mounted_right() {
    let poses = leg_poses();
    for (leg, published) in
        poses.iter().filter(|(_, p)| p.name.starts_with("R06") || p.name.starts_with("R07"))
    {
        let [x, y, z] = published.foot;
        for number in NumberSystem::ALL {
            let solver = core(number, leg, None).expect("a leg");
            let seen = solver.seen_from_body([0.0; 3], Side::Right, [x, -y, z]);
            let told = solver.solve(seen, Pose::default());
            let off = told.pose.largest_difference(&published.pose);
            assert!(off <= number.bounds().angle, "{}: {number:?}: {off:e}", published.name);
        }
    }
}
