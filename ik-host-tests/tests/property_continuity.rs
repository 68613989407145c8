//! Promise: along a straight path away from singular places, no joint jumps: it moves by no more than the gradient
//! of the inverse allows.

mod common;

use common::checks::continuity;
use common::effort::{cases, rounds};
use common::legs::{Sweep, leg_and_target, reach};
use common::solver::{NumberSystem, core};
use proptest::prelude::*;

proptest! {
    #![proptest_config(cases(300))]

    #[test]
    fn joints_do_not_jump(
        (leg, start) in leg_and_target(),
        way in prop::array::uniform3(-0.1..0.1),
    ) {
        let end = [0, 1, 2].map(|i| start[i] + way[i] * reach(&leg));
        for number in NumberSystem::ALL {
            let solver = core(number, &leg, None).expect("a leg");
            let looked_at = continuity::check(&*solver, start, end, 40);
            prop_assert!(looked_at.is_ok(), "{}", looked_at.unwrap_err());
        }
    }
}

/// Or else the paths above might all lead through places that are passed over.
#[test]
fn most_steps_of_random_paths_are_looked_at() {
    let mut sweep = Sweep::from_seed(3);
    let (mut looked_at, mut steps) = (0, 0);
    for _ in 0..rounds(200) {
        let leg = sweep.leg();
        let start = sweep.target(&leg);
        let end = start.map(|v| v + sweep.within(-0.1, 0.1) * reach(&leg));
        let solver = core(NumberSystem::Fixed32, &leg, None).expect("a leg");
        looked_at += continuity::check(&*solver, start, end, 20).expect("no jump");
        steps += 20;
    }
    assert!(3 * looked_at > steps, "{looked_at} of {steps}");
}
