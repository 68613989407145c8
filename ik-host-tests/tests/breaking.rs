//! The self-test: every checker of these tests is fed a wrong solver, servo or output of the kind that it is there
//! for, and must say so. The same checker is content with ik-core on the same input.

mod common;

use common::channel::{self, AnyOutput, ChannelModel, Measured};
use common::checks::output::Hardware;
use common::checks::published_pose::Published;
use common::checks::{
    channel as channel_checks, continuity, limits, mirror, output, published_pose, reach, round_trip,
    servo as servo_checks, totality,
};
use common::frame::Core;
use common::legs::{CULVERT, ORCHARD};
use common::published::leg_poses;
use common::servo::{self, ServoModel};
use common::solver::{NumberSystem, Solver, Told, core};
use ik_core::frame::{Conduct, FrameSafety, ServoBounds, StaleRule};
use ik_core::output::Output;
use ik_core::{End, Expander, Held, Outcome, Pulse, ServoSpec, Side, Timer};
use ik_host_tests::frame_witness::{self, Stage};
use ik_host_tests::reference::{Leg, Pose, Ranges, transforms};
use std::f64::consts::PI;

type ChangeAnswer = fn([f64; 3], Told) -> Told;
type ChangeForward = fn(&Leg, &Pose, [f64; 3]) -> [f64; 3];
type ChangeMounting = fn(Side, [f64; 3]) -> [f64; 3];

/// What is wrong, and how it is inflicted.
type Fault = (&'static str, fn(&mut Wrong));

/// A solver with something wrong.
struct Wrong {
    inner: Box<dyn Solver>,
    claimed: Leg,
    answer: ChangeAnswer,
    forward: ChangeForward,
    mounting: ChangeMounting,
}

impl Solver for Wrong {
    fn number(&self) -> NumberSystem {
        self.inner.number()
    }
    fn leg(&self) -> &Leg {
        &self.claimed
    }
    fn ranges(&self) -> Ranges {
        self.inner.ranges()
    }
    fn quantised(&self, foot: [f64; 3]) -> [f64; 3] {
        self.inner.quantised(foot)
    }
    fn quantised_pose(&self, pose: &Pose) -> Pose {
        self.inner.quantised_pose(pose)
    }
    fn solve(&self, foot: [f64; 3], hold: Pose) -> Told {
        (self.answer)(foot, self.inner.solve(foot, hold))
    }
    fn forward(&self, pose: &Pose) -> [f64; 3] {
        (self.forward)(&self.claimed, pose, self.inner.forward(pose))
    }
    fn seen_from_body(&self, at: [f64; 3], side: Side, foot: [f64; 3]) -> [f64; 3] {
        (self.mounting)(side, self.inner.seen_from_body(at, side, foot))
    }
    fn seen_by_body(&self, at: [f64; 3], side: Side, foot: [f64; 3]) -> [f64; 3] {
        self.inner.seen_by_body(at, side, foot)
    }
}

/// ik-core as it is, ready to be broken; every test breaks one thing of it.
fn sound(number: NumberSystem, leg: &Leg, ranges: Option<[[f64; 2]; 3]>) -> Wrong {
    Wrong {
        inner: core(number, leg, ranges).expect("a leg"),
        claimed: *leg,
        answer: |_, told| told,
        forward: |_, _, foot| foot,
        mounting: |_, foot| foot,
    }
}

/// A checker's verdict on ik-core in every number system, then on each broken one.
fn told_apart(
    leg: &Leg,
    ranges: Option<[[f64; 2]; 3]>,
    faults: &[Fault],
    check: impl Fn(&dyn Solver) -> Result<(), String>,
) {
    for number in NumberSystem::ALL {
        assert_eq!(check(&sound(number, leg, ranges)), Ok(()), "{number:?}: sound");
        for (fault, inflict) in faults {
            let mut wrong = sound(number, leg, ranges);
            inflict(&mut wrong);
            assert!(check(&wrong).is_err(), "{number:?}: {fault} went unnoticed");
        }
    }
}

/// A reachable foot of each demo leg, and one that is not.
const ORCHARD_FOOT: [f64; 3] = [40.0, 60.0, -140.0];
const CULVERT_FOOT: [f64; 3] = [40.0, 130.0, -70.0];
const OUT_OF_REACH: [f64; 3] = [120.0, 60.0, -210.0];

const WRONG_ANSWERS: [Fault; 6] = [
    ("the hip's sign flipped", |wrong| {
        wrong.answer = |_, told| Told { pose: Pose { hip: -told.pose.hip, ..told.pose }, ..told };
    }),
    ("the thigh's sign flipped", |wrong| {
        wrong.answer = |_, told| Told { pose: Pose { thigh: -told.pose.thigh, ..told.pose }, ..told };
    }),
    ("a knee a tenth too far", |wrong| {
        wrong.answer = |_, told| Told { pose: Pose { knee: told.pose.knee + 0.1, ..told.pose }, ..told };
    }),
    ("NaN for an angle", |wrong| {
        wrong.answer = |_, told| Told { pose: Pose { knee: f64::NAN, ..told.pose }, ..told };
    }),
    ("links swapped", |wrong| {
        let leg = wrong.claimed;
        let swapped = Leg { thigh: leg.shank, shank: leg.thigh, ..leg };
        wrong.inner = core(wrong.inner.number(), &swapped, None).expect("a leg");
    }),
    ("a square of the offset missing", |wrong| {
        let leg = wrong.claimed;
        wrong.inner = core(wrong.inner.number(), &Leg { offset: 0.0, ..leg }, None).expect("a leg");
    }),
];

#[test]
fn a_wrong_inverse_does_not_come_back() {
    told_apart(&ORCHARD, None, &WRONG_ANSWERS, |solver| round_trip::check(solver, ORCHARD_FOOT));
    told_apart(&CULVERT, None, &WRONG_ANSWERS, |solver| round_trip::check(solver, CULVERT_FOOT));
    // Moved although it is within reach, or held although nothing holds.
    let outcomes: [Fault; 1] = [("held by nothing", |wrong| {
        wrong.answer = |_, told| Told { outcome: Outcome::Held(Held::default()), ..told };
    })];
    told_apart(&ORCHARD, None, &outcomes, |solver| round_trip::check(solver, ORCHARD_FOOT));
}

#[test]
fn a_wrong_forward_does_not_come_back() {
    let faults: [Fault; 3] = [
        ("sine and cosine of the hip swapped", |wrong| {
            wrong.forward = |leg, pose, _| transforms::foot(leg, &Pose { hip: PI / 2.0 - pose.hip, ..*pose });
        }),
        ("the knee bending the other way", |wrong| {
            wrong.forward = |leg, pose, _| transforms::foot(leg, &Pose { knee: -pose.knee, ..*pose });
        }),
        ("a foot that is NaN", |wrong| wrong.forward = |_, _, [x, _, z]| [x, f64::NAN, z]),
    ];
    told_apart(&ORCHARD, None, &faults, |solver| round_trip::check(solver, ORCHARD_FOOT));
    told_apart(&CULVERT, None, &faults, |solver| round_trip::check(solver, CULVERT_FOOT));
}

/// Single precision's errors are told from fixed point's: a bound is not so wide that anything passes.
#[test]
fn an_error_of_a_few_bounds_is_noticed() {
    for number in NumberSystem::ALL {
        let check = |leg: &Leg, foot: [f64; 3]| {
            let bound = number.bounds().angle;
            let off = Off { inner: sound(number, leg, None), by: 3.0 * bound };
            assert!(round_trip::check(&off, foot).is_err(), "{number:?}: {bound:e} thrice went unnoticed");
        };
        check(&ORCHARD, ORCHARD_FOOT);
        check(&CULVERT, CULVERT_FOOT);
    }
}

/// A solver whose knee is off by a given angle.
struct Off {
    inner: Wrong,
    by: f64,
}

impl Solver for Off {
    fn number(&self) -> NumberSystem {
        self.inner.number()
    }
    fn leg(&self) -> &Leg {
        self.inner.leg()
    }
    fn ranges(&self) -> Ranges {
        self.inner.ranges()
    }
    fn quantised(&self, foot: [f64; 3]) -> [f64; 3] {
        self.inner.quantised(foot)
    }
    fn quantised_pose(&self, pose: &Pose) -> Pose {
        self.inner.quantised_pose(pose)
    }
    fn solve(&self, foot: [f64; 3], hold: Pose) -> Told {
        let told = self.inner.solve(foot, hold);
        Told { pose: Pose { knee: told.pose.knee + self.by, ..told.pose }, ..told }
    }
    fn forward(&self, pose: &Pose) -> [f64; 3] {
        self.inner.forward(pose)
    }
    fn seen_from_body(&self, at: [f64; 3], side: Side, foot: [f64; 3]) -> [f64; 3] {
        self.inner.seen_from_body(at, side, foot)
    }
    fn seen_by_body(&self, at: [f64; 3], side: Side, foot: [f64; 3]) -> [f64; 3] {
        self.inner.seen_by_body(at, side, foot)
    }
}

#[test]
fn a_mounting_that_does_not_mirror_is_noticed() {
    let faults: [Fault; 2] = [
        ("right legs not mirrored", |wrong| {
            wrong.mounting = |side, [x, y, z]| if side == Side::Right { [x, -y, z] } else { [x, y, z] };
        }),
        ("both sides mirrored", |wrong| wrong.mounting = |_, [x, y, z]| [x, -y, z]),
    ];
    let check = |solver: &dyn Solver| mirror::check(solver, [80.0, 60.0, 0.0], [110.0, 130.0, -140.0]);
    told_apart(&ORCHARD, None, &faults, check);
}

#[test]
fn a_joint_that_jumps_is_noticed() {
    let faults: [Fault; 2] = [
        ("a jump of the hip half way", |wrong| {
            wrong.answer = |[x, ..], told| {
                let hip = told.pose.hip + if x > 20.0 { 0.3 } else { 0.0 };
                Told { pose: Pose { hip, ..told.pose }, ..told }
            };
        }),
        ("the other branch of the knee half way", |wrong| {
            wrong.answer = |[x, ..], told| {
                let thigh = if x > 20.0 { -told.pose.thigh } else { told.pose.thigh };
                Told { pose: Pose { thigh, ..told.pose }, ..told }
            };
        }),
    ];
    told_apart(&ORCHARD, None, &faults, |solver| {
        continuity::check(solver, [0.0, 50.0, -140.0], [40.0, 60.0, -140.0], 40).map(drop)
    });
}

const HOLD: Pose = Pose { hip: 0.1, thigh: -0.2, knee: 0.5 };

#[test]
fn an_answer_that_is_none_is_noticed() {
    let ranges = Some([[-45.0, 45.0], [-80.0, 80.0], [5.0, 150.0]]);
    let faults: [Fault; 5] = [
        ("NaN for an angle", |wrong| {
            wrong.answer = |_, told| Told { pose: Pose { hip: f64::NAN, ..told.pose }, ..told };
        }),
        ("an angle beyond its range", |wrong| {
            wrong.answer = |_, told| Told { pose: Pose { knee: 3.0, ..told.pose }, ..told };
        }),
        ("a distance that is NaN", |wrong| wrong.answer = |_, told| Told { off_by: f64::NAN, ..told }),
        ("a distance below zero", |wrong| wrong.answer = |_, told| Told { off_by: -1.0, ..told }),
        ("a foot that is infinite", |wrong| wrong.forward = |_, _, [x, y, _]| [x, y, f64::INFINITY]),
    ];
    told_apart(&ORCHARD, ranges, &faults, |solver| totality::check(solver, OUT_OF_REACH, HOLD));
}

#[test]
fn a_foot_that_is_not_finite_must_be_reported_and_the_pose_kept() {
    let faults: [Fault; 2] = [
        ("NaN called reached", |wrong| {
            wrong.answer = |_, told| Told { outcome: Outcome::Reached, ..told };
        }),
        ("the pose not kept", |wrong| {
            wrong.answer = |_, told| Told { pose: Pose { hip: 0.0, ..told.pose }, ..told };
        }),
    ];
    for number in NumberSystem::ALL.into_iter().filter(|n| n.floats()) {
        let nowhere = [f64::NAN, 31.5, -150.0];
        assert_eq!(totality::check(&sound(number, &ORCHARD, None), nowhere, HOLD), Ok(()));
        for (fault, inflict) in faults {
            let mut wrong = sound(number, &ORCHARD, None);
            inflict(&mut wrong);
            assert!(totality::check(&wrong, nowhere, HOLD).is_err(), "{number:?}: {fault} went unnoticed");
        }
    }
}

#[test]
fn a_wrong_word_on_limits_is_noticed() {
    // The knee of this foot bends farther than it may, at its upper end.
    let ranges = Some([[-45.0, 45.0], [-80.0, 80.0], [5.0, 60.0]]);
    let faults: [Fault; 5] = [
        ("an angle beyond its range", |wrong| {
            wrong.answer = |_, told| Told { pose: Pose { knee: told.pose.knee + 0.1, ..told.pose }, ..told };
        }),
        ("held, but not said", |wrong| {
            wrong.answer = |_, told| Told { outcome: Outcome::Reached, off_by: 0.0, ..told };
        }),
        ("the wrong joint", |wrong| {
            wrong.answer = |_, told| {
                let held = Held { thigh: Some(End::Most), ..Held::default() };
                Told { outcome: Outcome::Held(held), ..told }
            };
        }),
        ("the wrong end", |wrong| {
            wrong.answer = |_, told| {
                let held = Held { knee: Some(End::Least), ..Held::default() };
                Told { outcome: Outcome::Held(held), ..told }
            };
        }),
        ("a wrong distance", |wrong| {
            wrong.answer = |_, told| Told { off_by: told.off_by * 2.0 + 10.0, ..told }
        }),
    ];
    for number in NumberSystem::ALL {
        let told = sound(number, &ORCHARD, ranges).solve(ORCHARD_FOOT, Pose::default());
        assert!(matches!(
            told.outcome,
            Outcome::Held(Held { hip: None, thigh: None, knee: Some(End::Most) })
        ));
    }
    told_apart(&ORCHARD, ranges, &faults, |solver| {
        let by_knee = Some([[-180.0, 180.0], [-180.0, 180.0], [5.0, 60.0]]);
        limits::check(solver, &*core(solver.number(), &ORCHARD, by_knee).expect("a leg"), ORCHARD_FOOT)
    });
    // And held, said of a foot that was not.
    let faults: [Fault; 1] = [("not held, but said", |wrong| {
        wrong.answer = |_, told| {
            let held = Held { knee: Some(End::Least), ..Held::default() };
            Told { outcome: Outcome::Held(held), ..told }
        };
    })];
    told_apart(&ORCHARD, None, &faults, |solver| {
        limits::check(solver, &*core(solver.number(), &ORCHARD, None).expect("a leg"), ORCHARD_FOOT)
    });
}

#[test]
fn a_point_that_is_not_the_closest_is_noticed() {
    let faults: [Fault; 4] = [
        ("a point beside the closest", |wrong| {
            wrong.answer = |_, told| Told { pose: Pose { hip: told.pose.hip + 0.2, ..told.pose }, ..told };
        }),
        ("moved too far in", |wrong| {
            wrong.answer = |_, told| Told { pose: Pose { knee: told.pose.knee + 0.6, ..told.pose }, ..told };
        }),
        ("moved, but called reached", |wrong| {
            wrong.answer = |_, told| Told { outcome: Outcome::Reached, off_by: 0.0, ..told };
        }),
        ("a wrong distance", |wrong| wrong.answer = |_, told| Told { off_by: 0.5 * told.off_by, ..told }),
    ];
    told_apart(&ORCHARD, None, &faults, |solver| reach::check(solver, OUT_OF_REACH));
    let faults: [Fault; 1] = [("the inner end instead of the outer", |wrong| {
        wrong.answer = |_, told| Told { pose: Pose { knee: PI, ..told.pose }, ..told };
    })];
    told_apart(&CULVERT, None, &faults, |solver| reach::check(solver, [0.0, 300.0, 0.0]));
}

#[test]
fn a_published_pose_catches_a_wrong_solver() {
    let (leg, published) = leg_poses().into_iter().find(|(_, p)| p.name == "R04 Forward").expect("row R04");
    told_apart(&leg, None, &WRONG_ANSWERS, |solver| published_pose::check(solver, &published));
    let forward: [Fault; 1] = [("a forward with the hip's sign flipped", |wrong| {
        wrong.forward = |leg, pose, _| transforms::foot(leg, &Pose { hip: -pose.hip, ..*pose });
    })];
    told_apart(&leg, None, &forward, |solver| published_pose::check(solver, &published));
    // A slip in the table is noticed just as well.
    let slipped =
        Published { pose: Pose { thigh: published.pose.thigh + 0.1, ..published.pose }, ..published };
    for number in NumberSystem::ALL {
        assert!(published_pose::check(&sound(number, &leg, None), &slipped).is_err(), "{number:?}");
    }
}

/// An angle, its pulse and whether it was held, to another pulse and word.
type ChangeCommand = fn(f64, Pulse, Option<End>) -> (Pulse, Option<End>);

/// A servo with something wrong.
struct WrongServo {
    inner: Box<dyn ServoModel>,
    change: ChangeCommand,
    back: fn(f64) -> f64,
}

impl ServoModel for WrongServo {
    fn number(&self) -> NumberSystem {
        self.inner.number()
    }
    fn spec(&self) -> ServoSpec {
        self.inner.spec()
    }
    fn quantised(&self, radians: f64) -> f64 {
        self.inner.quantised(radians)
    }
    fn command(&self, radians: f64) -> (Pulse, Option<End>) {
        let (pulse, held) = self.inner.command(radians);
        (self.change)(radians, pulse, held)
    }
    fn angle(&self, pulse: Pulse) -> f64 {
        (self.back)(self.inner.angle(pulse))
    }
    fn pulse_range(&self) -> [Pulse; 2] {
        self.inner.pulse_range()
    }
}

#[test]
fn a_wrong_servo_is_noticed() {
    let check = |servo: &dyn ServoModel| {
        [-1.0, -0.5, 0.0, 0.3, 0.5, 1.0].into_iter().try_for_each(|angle| {
            servo_checks::check(servo, angle)?;
            servo_checks::check_back(servo, angle, 0.0)?;
            servo_checks::check_monotone(servo, angle, angle + 0.05)
        })
    };
    let faults: [(&str, ChangeCommand); 5] = [
        ("the gain's sign flipped", |_, pulse, held| (Pulse::from_us(3000.0 - pulse.us()), held)),
        ("a pulse beyond the range", |_, pulse, held| {
            (if held == Some(End::Most) { Pulse::from_us(2100.0) } else { pulse }, held)
        }),
        ("held, but not said", |_, pulse, _| (pulse, None)),
        ("a step back", |angle, pulse, held| {
            (if angle > 0.5 && held.is_none() { Pulse::from_us(1700.0) } else { pulse }, held)
        }),
        ("a pulse a microsecond off", |_, pulse, held| {
            (if held.is_none() { Pulse::from_us(pulse.us() + 1.0) } else { pulse }, held)
        }),
    ];
    for number in NumberSystem::ALL {
        let sound = servo::core(number, ServoSpec::COMMON).expect("a servo");
        assert_eq!(check(&*sound), Ok(()), "{number:?}: sound");
        for (fault, change) in faults {
            let inner = servo::core(number, ServoSpec::COMMON).expect("a servo");
            let wrong = WrongServo { inner, change, back: |angle| angle };
            assert!(check(&wrong).is_err(), "{number:?}: {fault} went unnoticed");
        }
        let inner = servo::core(number, ServoSpec::COMMON).expect("a servo");
        let wrong = WrongServo { inner, change: |_, pulse, held| (pulse, held), back: |angle| 1.001 * angle };
        assert!(check(&wrong).is_err(), "{number:?}: a wrong way back went unnoticed");
    }
}

/// Only what steps back: the pulses themselves are not looked at.
#[test]
fn a_servo_that_steps_back_is_noticed_by_that_alone() {
    for number in NumberSystem::ALL {
        let inner = servo::core(number, ServoSpec::COMMON).expect("a servo");
        let wrong = WrongServo {
            inner,
            change: |angle, pulse, held| (if angle > 0.2 { Pulse::from_us(1500.0) } else { pulse }, held),
            back: |angle| angle,
        };
        assert!(servo_checks::check_monotone(&wrong, 0.1, 0.3).is_err(), "{number:?}");
        assert_eq!(servo_checks::check_monotone(&wrong, -0.1, 0.1), Ok(()), "{number:?}");
    }
}

/// Counts and whether they were held, to other counts and another word.
type ChangeCount = fn(f64, u32, Option<End>) -> (u32, Option<End>);
/// A range of counts to another.
type ChangeRange = fn([u32; 2]) -> [u32; 2];

/// A servo on an output with something wrong.
struct WrongChannel {
    inner: Box<dyn ChannelModel>,
    change: ChangeCount,
    range: ChangeRange,
    back: fn(f64) -> f64,
}

impl ChannelModel for WrongChannel {
    fn name(&self) -> &'static str {
        self.inner.name()
    }
    fn quantised(&self, degrees: f64) -> f64 {
        self.inner.quantised(degrees)
    }
    fn command(&self, degrees: f64) -> (u32, Option<End>) {
        let (counts, held) = self.inner.command(degrees);
        (self.change)(degrees, counts, held)
    }
    fn back(&self, counts: u32) -> f64 {
        (self.back)(self.inner.back(counts))
    }
    fn range(&self) -> [u32; 2] {
        (self.range)(self.inner.range())
    }
    fn bound(&self) -> f64 {
        self.inner.bound()
    }
}

#[test]
fn a_wrong_channel_is_noticed() {
    let servo = Measured {
        points: vec![[700.0, -70.5], [1100.0, -30.0], [1900.0, 38.0], [2300.0, 80.0]],
        trim_us: 4.0,
        pulse_us: [750.2, 2250.4],
    };
    let output = AnyOutput::Timer(Timer::finest(48_000_000, 16, 50.0).expect("a timer"));
    let check = |channel: &dyn ChannelModel| {
        channel_checks::check_ends(channel, &servo, &output)?;
        (-100..100).try_for_each(|degrees| {
            let degrees = f64::from(degrees) * 1.003;
            channel_checks::check(channel, &servo, &output, degrees)?;
            channel_checks::check_monotone(channel, &servo, degrees, degrees + 0.7)?;
            channel_checks::check_back(channel, &servo, &output, channel.command(degrees).0)
        })
    };
    let faults: [(&str, ChangeCount); 5] = [
        ("a count too many", |_, counts, held| (counts + u32::from(held.is_none()), held)),
        ("held, but not said", |_, counts, _| (counts, None)),
        ("said to be held, but not", |_, counts, held| (counts, held.or(Some(End::Most)))),
        ("beyond its range", |_, counts, held| (counts + u32::from(held == Some(End::Most)), held)),
        ("a step back", |degrees, counts, held| {
            (if degrees > 30.0 { counts.min(5500) } else { counts }, held)
        }),
    ];
    let sound = || channel::in_every_number(&servo, output).expect("a channel");
    for model in sound() {
        assert_eq!(check(&*model), Ok(()), "{}: sound", model.name());
    }
    let same: ChangeRange = |range| range;
    for (fault, change) in faults {
        for inner in sound() {
            let wrong = WrongChannel { inner, change, range: same, back: |degrees| degrees };
            assert!(check(&wrong).is_err(), "{}: {fault} went unnoticed", wrong.name());
        }
    }
    let ranges: [(&str, ChangeRange); 4] = [
        ("a least too short", |[least, most]| [least - 1, most]),
        ("a least too long", |[least, most]| [least + 1, most]),
        ("a most too short", |[least, most]| [least, most - 1]),
        ("a most too long", |[least, most]| [least, most + 1]),
    ];
    for (fault, range) in ranges {
        for inner in sound() {
            let wrong = WrongChannel {
                inner,
                change: |_, counts, held| (counts, held),
                range,
                back: |degrees| degrees,
            };
            assert!(
                channel_checks::check_ends(&wrong, &servo, &output).is_err(),
                "{}: {fault}",
                wrong.name()
            );
        }
    }
    for inner in sound() {
        let wrong = WrongChannel {
            inner,
            change: |_, counts, held| (counts, held),
            range: same,
            back: |degrees| degrees + 0.1,
        };
        assert!(check(&wrong).is_err(), "{}: a wrong way back went unnoticed", wrong.name());
    }
}

/// An output with something wrong.
struct WrongOutput {
    inner: Expander,
    counts: fn(Pulse, f64, u32) -> u32,
    back: fn(u32, Pulse) -> Pulse,
    period: f64,
}

impl Output for WrongOutput {
    fn counts(&self, pulse: Pulse) -> u32 {
        (self.counts)(pulse, self.inner.count_us(), self.inner.counts(pulse))
    }
    fn pulse(&self, counts: u32) -> Pulse {
        (self.back)(counts, self.inner.pulse(counts))
    }
    fn most_counts(&self) -> u32 {
        self.inner.most_counts()
    }
    fn count_us(&self) -> f64 {
        self.inner.count_us() * self.period
    }
    fn frame_us(&self) -> f64 {
        self.inner.frame_us()
    }
}

#[test]
fn a_wrong_output_is_noticed() {
    let hardware = Hardware { clock_hz: 25_000_000, divider: 122, most: 4095, frame: 4096 };
    let sound = || WrongOutput {
        inner: Expander::new(25_000_000, 122, 12).expect("an expander"),
        counts: |_, _, counts| counts,
        back: |_, pulse| pulse,
        period: 1.0,
    };
    let check = |output: &dyn Output| -> Result<(), String> {
        output::check_period(output, &hardware)?;
        for us in [0.0, 1000.0, 1499.9, 1502.0, 2000.0, 30_000.0] {
            output::check(output, &hardware, Pulse::from_us(us))?;
        }
        [0, 1, 307, 4095].into_iter().try_for_each(|counts| output::check_back(output, &hardware, counts))
    };
    assert_eq!(check(&sound()), Ok(()));
    let faults: [(&str, WrongOutput); 6] = [
        ("rounding down", WrongOutput { counts: |p, us, c| c.min((p.us() / us) as u32), ..sound() }),
        (
            "rounding up",
            WrongOutput { counts: |p, us, _| (p.us() / us).ceil().min(4095.0) as u32, ..sound() },
        ),
        (
            "the nominal tick",
            WrongOutput { counts: |p, _, _| (p.us() / 4.8828125).round() as u32, ..sound() },
        ),
        (
            "a count beyond the frame",
            WrongOutput { counts: |p, us, _| (p.us() / us).round() as u32, ..sound() },
        ),
        ("a pulse half a count off", WrongOutput { back: |_, p| Pulse::from_us(p.us() + 2.44), ..sound() }),
        ("a wrong period", WrongOutput { period: 121.0 / 122.0, ..sound() }),
    ];
    for (fault, wrong) in &faults {
        assert!(check(wrong).is_err(), "{fault} went unnoticed");
    }
}

/// The frame's number, ik-core's stage after it, the target and what is sent, to what is sent instead; no pulses is 0.
type ChangeSent = fn(u64, &mut Core<3>, Option<[u32; 3]>, [u32; 3]) -> [u32; 3];

/// A frame-safety stage with something wrong: what it does with what ik-core's stage sends.
struct WrongStage {
    inner: Core<3>,
    change: ChangeSent,
    frames: u64,
}

impl Stage for WrongStage {
    fn start(&mut self) {
        self.inner.start();
    }
    fn engage(&mut self) {
        self.inner.engage();
    }
    fn release(&mut self) {
        self.inner.release();
    }
    fn frame(&mut self, new: Option<&[u32]>, sent: &mut [u32]) -> bool {
        self.frames += 1;
        let mut counts = [0; 3];
        self.inner.frame(new, &mut counts);
        if !self.inner.state.conduct().has_pulses() {
            counts = [0; 3];
        }
        let new = new.map(|new| new.try_into().expect("three servos"));
        let counts = (self.change)(self.frames, &mut self.inner, new, counts);
        sent.copy_from_slice(&counts);
        counts != [0; 3]
    }
}

/// A promise to another.
type ChangePromise = fn(&mut frame_witness::Promise);
/// What is wrong with a stage, and what the witness must say of it.
type StageFault = (&'static str, &'static str, ChangeSent);

#[test]
fn a_wrong_frame_safety_stage_is_noticed() {
    const NONE: [u32; 3] = [0; 3];
    let servo = |range, start, slew| ServoBounds::in_counts(range, start, slew).expect("bounds");
    let servos = [servo([3200, 6400], 4000, 83), servo([150, 450], 307, 9), servo([2000, 7000], 7000, 400)];
    let core = || Core::new(FrameSafety::new(servos, StaleRule::hold_then_release(4, 15).expect("a rule")));
    let check = |change| {
        let mut stage = WrongStage { inner: core(), change, frames: 0 };
        frame_witness::run(&mut stage, &core().promise(), 71, 20_000)
    };
    assert!(check(|_, _, _, sent| sent).expect("sound").moving > 1000);
    let faults: [StageFault; 13] = [
        (
            "a count more than its slew, once in a thousand frames",
            "more than its slew",
            |frame, core, _, [a, b, c]| {
                let moves = core.state.conduct() == Conduct::Following && core.state.behind() > 0;
                [a, if moves && b > 200 && frame % 1000 < 20 { b + 20 } else { b }, c]
            },
        ),
        ("a count beyond its range", "beyond its range", |_, _, _, [a, b, c]| {
            [a, b, if c == 7000 { 7001 } else { c }]
        }),
        ("a count short of its range", "beyond its range", |_, _, _, [a, b, c]| {
            [if a == 3200 { 3199 } else { a }, b, c]
        }),
        ("the target at once", "more than its slew", |_, core, new, sent| match new {
            Some(new) if sent != NONE => std::array::from_fn(|it| core.safety.servos[it].hold(new[it])),
            _ => sent,
        }),
        ("a first pulse that is the target", "a first pulse", |_, core, new, sent| match new {
            Some(new) if core.state.conduct() == Conduct::First => {
                std::array::from_fn(|it| core.safety.servos[it].hold(new[it]))
            }
            _ => sent,
        }),
        ("pulses that nobody allowed", "not allowed", |_, core, new, sent| {
            if new.is_some() && !core.state.is_engaged() {
                core.state.engage()
            }
            sent
        }),
        ("pulses although released", "not allowed", |_, core, _, sent| {
            if core.state.is_engaged() { sent } else { core.state.last() }
        }),
        ("no frame without pulses at the start", "not let go of", |_, core, _, sent| {
            if core.state.is_engaged() { core.state.last() } else { sent }
        }),
        ("nothing ever sent", "no pulses, although", |_, _, _, _| NONE),
        ("a servo that does not move", "should have moved by", |_, _, _, [a, b, c]| {
            [a, if b == 0 { 0 } else { 307 }, c]
        }),
        ("a frame without pulses now and then", "no pulses, although", |frame, _, _, sent| {
            if frame.is_multiple_of(997) { NONE } else { sent }
        }),
        ("a stale target followed", "should have moved by 0", |frame, core, new, sent| {
            if core.state.conduct() != Conduct::Holding || new.is_some() {
                return sent;
            }
            let nudge = u32::from(frame % 2 == 0);
            [sent[0], sent[1], (sent[2] - nudge).max(2000)]
        }),
        ("a pulse of 0 among others", "beyond its range", |_, _, _, [a, b, _]| [a, b, 0]),
    ];
    for (fault, said, change) in faults {
        let broken = check(change).expect_err(fault);
        assert!(broken.contains(said), "{fault}: {broken}");
    }
    // Promises that are not those of the stage: the witness judges by what it was told.
    let changed: [(&str, ChangePromise); 7] = [
        ("a slew less by one", |promise| promise.servos[1].slew -= 1),
        ("a slew more by one", |promise| promise.servos[1].slew += 1),
        ("another start", |promise| promise.servos[2].start -= 1),
        ("a narrower range", |promise| promise.servos[0].range[1] -= 1),
        ("a hold a frame earlier", |promise| promise.hold_after -= 1),
        ("a release a frame earlier", |promise| promise.release_after = Some(14)),
        ("a release a frame later", |promise| promise.release_after = Some(16)),
    ];
    for (what, change) in changed {
        let mut promise = core().promise();
        change(&mut promise);
        assert!(frame_witness::run(&mut core(), &promise, 72, 20_000).is_err(), "{what} went unnoticed");
    }
}
