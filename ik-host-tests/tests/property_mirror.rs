//! Promise: a right leg is a left leg mirrored; mirrored feet come to identical joint angles, to the last bit.

mod common;

use common::checks::mirror;
use common::effort::cases;
use common::legs::leg_and_point;
use common::solver::{NumberSystem, core};
use proptest::prelude::*;

proptest! {
    #![proptest_config(cases(2_000))]

    #[test]
    fn mirrored_feet_come_to_identical_joints(
        (leg, point) in leg_and_point(),
        at in prop::array::uniform3(-300.0..300.0),
    ) {
        let foot = [0, 1, 2].map(|i| at[i] + point[i]);
        for number in NumberSystem::ALL {
            let solver = core(number, &leg, None).expect("a leg");
            prop_assert_eq!(mirror::check(&*solver, at, foot), Ok(()));
        }
    }
}
