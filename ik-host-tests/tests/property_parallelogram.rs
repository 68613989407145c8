//! Promise: a leg whose knee is driven from the body through a parallelogram keeps its limits in both spaces: whatever foot
//! is asked for, no servo leaves its pulses, and thigh and knee, where the servos really put them, stay within their
//! ranges; a foot that is reached is reached.

mod common;

use common::channel::{AnyOutput, BENDS, Measured};
use common::effort::rounds;
use common::legs::Sweep;
use ik_core::drive::{Drive, Sent};
use ik_core::limits::LimitsError;
use ik_core::{
    Angle, Bend, Channel, Coarse, Counts, Dimensions, Fixed16, Fixed32, Float32, Foot, Hip, Joints, Leg,
    Limb, Limits, Mounting, Number, Outcome, Parallelogram, RollHip, Short32, Side, YawHip,
};
use ik_host_tests::numbers::Float64;
use ik_host_tests::reference::leg::distance;
use ik_host_tests::reference::{self, Pose, Shape};

/// A leg with a parallelogram: measures, ranges as given, and servos of hip, thigh and shank.
struct Case {
    measures: [f64; 3],
    bend: Bend,
    range_deg: [[f64; 2]; 3],
    servos: [Measured; 3],
    output: AnyOutput,
}

impl Case {
    fn random(sweep: &mut Sweep) -> Self {
        let bend = [Bend::Forward, Bend::Backward, Bend::Up, Bend::Down][(sweep.bits() % 4) as usize];
        let range = |sweep: &mut Sweep, least: f64, most: f64| {
            let middle = sweep.within(least, most);
            let half = sweep.within(10.0, 60.0);
            [(middle - half).max(-179.0), (middle + half).min(179.0)]
        };
        let [least, most] = range(sweep, 30.0, 130.0);
        Self {
            measures: [sweep.within(0.0, 60.0), sweep.within(60.0, 140.0), sweep.within(60.0, 140.0)],
            bend,
            range_deg: [range(sweep, -30.0, 30.0), range(sweep, -60.0, 60.0), [least.max(0.0), most]],
            servos: [(); 3].map(|()| Measured::random(sweep)),
            output: AnyOutput::random(sweep),
        }
    }

    /// A foot: that of a pose within the ranges, or any.
    fn foot(&self, sweep: &mut Sweep) -> [f64; 3] {
        if sweep.bits() & 1 == 0 {
            let [hip, thigh, knee] =
                self.range_deg.map(|[least, most]| sweep.within(least, most).to_radians());
            reference::foot(&self.judged(), &Pose { hip, thigh, knee })
        } else {
            [(); 3].map(|()| sweep.within(-250.0, 250.0))
        }
    }

    fn bends_back(&self) -> bool {
        matches!(self.bend, Bend::Backward | Bend::Down)
    }

    fn limits(&self) -> Result<Limits, LimitsError> {
        let [hip, thigh, knee] = self.range_deg;
        let servo = |joint: usize| self.servos[joint].curve().expect("a curve").joint_deg();
        Limits::degrees(hip, thigh, knee)?.through_parallelogram(self.bend, servo(1), servo(2))
    }

    /// The reference's leg.
    fn judged(&self) -> reference::Leg {
        let [offset, thigh, shank] = self.measures;
        let (shape, bend) = match self.bend {
            Bend::Forward => (Shape::Roll, reference::Bend::Forward),
            Bend::Backward => (Shape::Roll, reference::Bend::Backward),
            Bend::Up => (Shape::Yaw, reference::Bend::Up),
            Bend::Down => (Shape::Yaw, reference::Bend::Down),
        };
        reference::Leg { shape, offset, thigh, shank, bend }
    }

    /// Hip, thigh and knee where the servos stand, degrees, by what a parallelogram does: the shank keeps its direction.
    fn at_counts(&self, counts: [u32; 3]) -> [f64; 3] {
        let count_us = self.output.as_output().count_us();
        let [hip, thigh, shank] =
            [0, 1, 2].map(|joint| self.servos[joint].degrees_at(f64::from(counts[joint]) * count_us));
        [hip, thigh, if self.bends_back() { shank - thigh } else { shank + thigh }]
    }

    /// What a count, the number system's step and the rounding of the ranges come to, degrees.
    fn slack(&self, number: &str) -> f64 {
        let count_us = self.output.as_output().count_us();
        let count = |servo: &Measured| {
            servo.points.windows(2).fold(0.0f64, |most, pair| {
                most.max(((pair[1][1] - pair[0][1]) / (pair[1][0] - pair[0][0])).abs() * count_us)
            })
        };
        let step = if number == "fixed16" { 360.0 / 65_536.0 } else { 1e-4 };
        count(&self.servos[1]) + count(&self.servos[2]) + 3.0 * step
    }

    fn command<H: Hip, N: Number>(
        &self,
        dimensions: Dimensions<H>,
        limits: Limits,
        foot: [f64; 3],
    ) -> (Outcome, Counts, [f64; 3]) {
        let channel = |joint: usize| {
            let curve = self.servos[joint].curve().expect("a curve");
            Channel::<N, BENDS>::from_curve(&curve, self.output.counting()).expect("a channel")
        };
        let limb = Limb {
            leg: Leg::<H, N>::from_dimensions(dimensions, limits).expect("a leg"),
            mounting: Mounting::new(Foot::from_mm(0.0, 0.0, 0.0), Side::Left),
            servos: Parallelogram([channel(0), channel(1), channel(2)]),
        };
        let [x, y, z] = foot;
        let foot = Foot::from_mm(x, y, z);
        let command = limb.command(foot, Joints::ZERO);
        // The short way and the long one are the same.
        assert_eq!(limb.commands(&command.answer.joints), command.commands);
        (command.answer.outcome, command.commands, foot.mm())
    }

    fn check<N: Number>(&self, limits: Limits, foot: [f64; 3]) -> Result<bool, String> {
        let [offset, thigh, shank] = self.measures;
        let (outcome, sent, foot) = if self.judged().shape == Shape::Roll {
            self.command::<RollHip, N>(
                Dimensions::roll_hip(offset, thigh, shank, self.bend).expect("measures"),
                limits,
                foot,
            )
        } else {
            self.command::<YawHip, N>(
                Dimensions::yaw_hip(offset, thigh, shank, self.bend).expect("measures"),
                limits,
                foot,
            )
        };
        let at = self.at_counts(sent.counts);
        let slack = self.slack(N::NAME);
        for (joint, name) in [(1, "thigh"), (2, "knee")] {
            let [least, most] = self.range_deg[joint];
            if !(least - slack..=most + slack).contains(&at[joint]) {
                return Err(format!("{}: {name} at {} of {least} to {most}", N::NAME, at[joint]));
            }
        }
        let reached = outcome == Outcome::Reached && !sent.is_held();
        if reached {
            let [hip, thigh, knee] = at.map(f64::to_radians);
            let off = distance(reference::foot(&self.judged(), &Pose { hip, thigh, knee }), foot);
            // Hip, thigh and knee off by a count or two each, at up to 340 mm from the foot.
            let hip_count = 0.2 * self.output.as_output().count_us();
            let coarse = if N::NAME == "coarse" { 20.0 } else { 0.05 };
            let allowed = 2.0 * 340.0 * (slack + hip_count).to_radians() + coarse;
            if off > allowed {
                return Err(format!("{}: {off} mm off, {allowed} allowed", N::NAME));
            }
        }
        Ok(reached)
    }
}

fn every_number(case: &Case, limits: Limits, foot: [f64; 3]) -> Result<bool, String> {
    case.check::<Coarse>(limits, foot)?;
    case.check::<Fixed16>(limits, foot)?;
    case.check::<Fixed32>(limits, foot)?;
    case.check::<Short32>(limits, foot)?;
    case.check::<Float64>(limits, foot)?;
    case.check::<Float32>(limits, foot)
}

#[test]
fn thigh_and_knee_stay_within_their_ranges_wherever_the_servos_end() {
    let mut sweep = Sweep::from_seed(51);
    let (mut legs, mut reached, mut other) = (0, 0, 0);
    for _ in 0..rounds(1_000) {
        let case = Case::random(&mut sweep);
        let Ok(limits) = case.limits() else { continue };
        legs += 1;
        for _ in 0..40 {
            let foot = case.foot(&mut sweep);
            match every_number(&case, limits, foot) {
                Ok(true) => reached += 1,
                Ok(false) => other += 1,
                Err(wrong) => {
                    panic!("{wrong}: {foot:?}, {:?} {:?} {:?}", case.bend, case.range_deg, case.servos)
                }
            }
        }
    }
    // The promise is only worth something if all of it was met.
    println!("{legs} legs, {reached} feet reached, {other} not");
    assert!(legs > 300 && reached > 500 && other > 500, "{legs} {reached} {other}");
}

/// Without the narrower thigh, some leg would break its knee's range: the test above can fail.
#[test]
fn ranges_that_do_not_know_of_the_parallelogram_are_found_out() {
    let mut sweep = Sweep::from_seed(51);
    let found = (0..1_000).any(|_| {
        let case = Case::random(&mut sweep);
        let [hip, thigh, knee] = case.range_deg;
        let limits = Limits::degrees(hip, thigh, knee).expect("ranges");
        (0..40).any(|_| {
            let foot = [(); 3].map(|()| sweep.within(-250.0, 250.0));
            case.check::<Fixed32>(limits, foot).is_err()
        })
    });
    assert!(found);
}

#[test]
fn the_shank_is_counted_as_the_knee_is_and_never_wraps() {
    fn check<N: Number>(slack: f64) {
        let joints = |thigh: f64, knee: f64| Joints::<N> {
            hip: Angle::ZERO,
            thigh: Angle::from_degrees(thigh).expect("a thigh"),
            knee: Angle::from_degrees(knee).expect("a knee"),
        };
        let shank = |thigh, knee, back| Parallelogram::<()>::shank(&joints(thigh, knee), back).degrees();
        for thigh in (-180..=180).step_by(5) {
            for knee in (0..=180).step_by(5) {
                let (thigh, knee) = (f64::from(thigh), f64::from(knee));
                let (back, front) =
                    ((knee + thigh).clamp(-180.0, 180.0), (knee - thigh).clamp(-180.0, 180.0));
                // At half a turn itself either side may be meant; a knee of 0 and a thigh of -180 is that.
                let near = |found: f64, wanted: f64| (found - wanted).abs() < slack || wanted.abs() > 179.9;
                assert!(near(shank(thigh, knee, true), back), "{} {thigh} {knee}", N::NAME);
                assert!(near(shank(thigh, knee, false), front), "{} {thigh} {knee}", N::NAME);
            }
        }
        // Beyond half a turn: held there, on its own side.
        assert!((shank(90.0, 120.0, true) - 180.0).abs() < slack);
        assert!((shank(-90.0, 120.0, false) - 180.0).abs() < slack);
    }
    check::<Float32>(1e-4);
    check::<Coarse>(1e-4);
    check::<Fixed32>(1e-4);
    check::<Short32>(1e-4);
    check::<Fixed16>(0.02);
    check::<Float64>(1e-9);
}

#[test]
fn a_shank_that_leaves_the_thigh_nothing_is_refused() {
    let limits = Limits::degrees([-30.0, 30.0], [0.0, 40.0], [60.0, 90.0]).expect("ranges");
    let narrowed = |bend, thigh, shank| limits.through_parallelogram(bend, thigh, shank);
    // Backward: a shank of up to 50 degrees would need the thigh below -10.
    assert_eq!(narrowed(Bend::Backward, [-90.0, 90.0], [-90.0, 50.0]), Err(LimitsError::Shank));
    assert_eq!(narrowed(Bend::Forward, [-90.0, 90.0], [100.0, 170.0]), Err(LimitsError::Shank));
    assert_eq!(narrowed(Bend::Backward, [50.0, 90.0], [-90.0, 170.0]), Err(LimitsError::Shank));
    for (thigh, shank) in [
        ([f64::NAN, 90.0], [-90.0, 170.0]),
        ([-90.0, f64::NAN], [-90.0, 170.0]),
        ([-90.0, 90.0], [f64::NAN, 170.0]),
        ([-90.0, 90.0], [-90.0, f64::NAN]),
        ([-90.0, 90.0], [170.0, -90.0]),
    ] {
        assert_eq!(narrowed(Bend::Backward, thigh, shank), Err(LimitsError::Shank), "{thigh:?} {shank:?}");
    }
    let narrow = narrowed(Bend::Backward, [-90.0, 35.0], [-90.0, 80.0]).expect("ranges");
    assert_eq!((narrow.thigh_deg(), narrow.knee_deg()), ([0.0, 20.0], [60.0, 90.0]));
    let narrow = narrowed(Bend::Forward, [-90.0, 35.0], [40.0, 170.0]).expect("ranges");
    assert_eq!(narrow.thigh_deg(), [0.0, 35.0]);
}

/// Drives are drives: servos one by one give the same as three of them together.
#[test]
fn three_channels_are_three_channels() {
    let mut sweep = Sweep::from_seed(53);
    for _ in 0..rounds(200) {
        let case = Case::random(&mut sweep);
        let channels = [0, 1, 2].map(|joint| {
            let curve = case.servos[joint].curve().expect("a curve");
            Channel::<Fixed32, BENDS>::from_curve(&curve, case.output.counting()).expect("a channel")
        });
        for _ in 0..50 {
            let angle =
                |sweep: &mut Sweep| Angle::from_degrees(sweep.within(-180.0, 180.0)).expect("an angle");
            let joints = Joints { hip: angle(&mut sweep), thigh: angle(&mut sweep), knee: angle(&mut sweep) };
            let sent = channels.send(&joints, false);
            let alone = [0, 1, 2].map(|joint| channels[joint].command(joints.as_array()[joint]));
            assert_eq!(sent.counts, alone.map(|count| count.counts));
            assert_eq!(sent.held.as_array(), alone.map(|count| count.held));
            assert_eq!(sent.is_held(), alone.iter().any(|count| count.held.is_some()));
            let quick = channels.send_quickly(&joints, false);
            assert!(quick.is_none_or(|quick| quick == sent));
        }
    }
}
