//! Promise: feet leave the queue in the order in which they were sent, a full queue gives them back, an empty one
//! repeats the last; a robot's frame is what each of its limbs would be commanded alone, from its last pose.

mod common;

use common::effort::cases;
use ik_core::queue::FootQueue;
use ik_core::robot::Robot;
use ik_core::{
    Bend, Dimensions, Fixed32, Float32, Foot, Joints, Leg, Limb, Limits, Mounting, Number, Outcome, RollHip,
    Servo, ServoSpec, Side, YawHip,
};
use proptest::prelude::*;
use std::collections::VecDeque;

const SLOTS: usize = 5;

proptest! {
    #![proptest_config(cases(1_000))]

    /// Against a queue of the standard library that is told the same.
    #[test]
    fn the_queue_keeps_order_and_loses_nothing(sends in prop::collection::vec(any::<bool>(), 0..60)) {
        let mut queue = FootQueue::<Fixed32, 2, SLOTS>::new();
        let (mut planner, mut frame) = queue.split();
        let mut model = VecDeque::new();
        let mut last = None;
        for (i, send) in sends.into_iter().enumerate() {
            let feet = [Foot::from_mm(i as f64, 1.0, 2.0), Foot::from_mm(0.0, i as f64, -3.0)];
            if send {
                let room = model.len() < SLOTS - 1;
                prop_assert_eq!(planner.ready(), room);
                prop_assert_eq!(planner.send(feet), if room { Ok(()) } else { Err(feet) });
                if room {
                    model.push_back(feet);
                }
            } else {
                last = model.pop_front().or(last);
                prop_assert_eq!(frame.next(), last);
            }
        }
    }

    #[test]
    fn a_robots_frame_is_its_limbs_alone(
        feet in prop::collection::vec(prop::collection::vec(prop::array::uniform3(-250.0..250.0), 0..6), 1..5),
        nan in prop::option::of(0usize..4),
    ) {
        frames_are_the_limbs_alone::<Fixed32>(&feet, None);
        frames_are_the_limbs_alone::<Float32>(&feet, nan);
    }
}

/// Four yaw-hip limbs around the body.
fn limbs<N: Number>() -> [Limb<YawHip, N>; 4] {
    let dimensions = Dimensions::yaw_hip(42.0, 71.0, 118.0, Bend::Up).expect("measures");
    let leg = Leg::from_dimensions(dimensions, Limits::FREE).expect("a leg");
    let servos = [Servo::from_spec(ServoSpec::COMMON).expect("a servo"); 3];
    [(80.0, 60.0), (-80.0, 60.0), (80.0, -60.0), (-80.0, -60.0)].map(|(x, y)| {
        let side = if y > 0.0 { Side::Left } else { Side::Right };
        Limb { leg, mounting: Mounting::new(Foot::from_mm(x, y, 0.0), side), servos }
    })
}

fn frames_are_the_limbs_alone<N: Number>(frames: &[Vec<[f64; 3]>], nan: Option<usize>) {
    let limbs = limbs::<N>();
    let mut robot = Robot::<YawHip, N, 4>::new();
    for limb in limbs {
        assert!(robot.add(limb).is_ok());
    }
    assert_eq!(robot.legs(), 4);
    assert!(robot.add(limbs[0]).is_err(), "a fifth leg");
    let mut poses = [Joints::<N>::ZERO; 4];
    for feet in frames {
        let feet: Vec<Foot<N>> = feet
            .iter()
            .enumerate()
            .map(|(i, &[x, y, z])| Foot::from_mm(if nan == Some(i) { f64::NAN } else { x }, y, z))
            .collect();
        let commands = robot.frame(&feet);
        // Feet without a leg are passed over; legs without a foot keep their pose.
        assert_eq!(commands.len(), feet.len().min(4));
        for (i, command) in commands.iter().enumerate() {
            let alone = limbs[i].command(feet[i], poses[i]);
            assert_eq!(*command, alone);
            if nan == Some(i) {
                assert_eq!(command.answer.outcome, Outcome::NotFinite);
                assert_eq!(command.answer.joints, poses[i]);
            }
            poses[i] = command.answer.joints;
        }
    }
}

#[test]
fn a_new_queue_has_no_feet_and_one_that_ran_empty_repeats_the_last() {
    let mut queue = FootQueue::<Float32, 1, 2>::default();
    let (mut planner, mut frame) = queue.split();
    assert_eq!(frame.next(), None);
    let feet = [Foot::from_mm(1.0, 2.0, 3.0)];
    planner.send(feet).expect("room for one");
    assert_eq!(planner.send(feet), Err(feet));
    assert_eq!(frame.next(), Some(feet));
    assert_eq!(frame.next(), Some(feet));
}

#[test]
fn a_robot_without_legs_has_an_empty_frame() {
    let mut robot = Robot::<RollHip, Fixed32, 2>::default();
    assert_eq!(robot.legs(), 0);
    assert!(robot.frame(&[Foot::from_mm(0.0, 0.0, -100.0)]).is_empty());
}
