//! Promise: a limb's short way from foot to counts is its leg's answer and its servos' commands, to the last bit, whatever
//! the foot.

mod common;

use common::effort::rounds;
use common::legs::Sweep;
use ik_core::drive::Drive;
use ik_core::{
    Bend, Channel, Coarse, Dimensions, Fixed16, Fixed32, Float32, Foot, Hip, Joints, Leg, Limb, Limits,
    Mounting, Number, Outcome, Servo, ServoSpec, Short32, Side, Timer, Turns,
};
use ik_host_tests::numbers::Float64;

/// What was met on the way.
#[derive(Debug, Default)]
struct Met {
    reached: u32,
    moved: u32,
    held: u32,
    not_finite: u32,
    pulse_held: u32,
}

fn specs(pulse_us: [f64; 2]) -> [ServoSpec; 3] {
    let servo = |joint_at_centre_deg, turns, trim_us| ServoSpec {
        centre_us: 1500.0,
        joint_at_centre_deg,
        us_per_degree: 11.1,
        turns,
        trim_us,
        pulse_us,
    };
    [servo(0.0, Turns::With, -3.0), servo(30.0, Turns::Against, 12.0), servo(72.5, Turns::With, -7.0)]
}

fn check<H: Hip, N: Number>(dimensions: Dimensions<H>, limits: Limits, sweep: &mut Sweep, met: &mut Met) {
    let leg = Leg::<H, N>::from_dimensions(dimensions, limits).expect("a leg");
    let timer = Timer::finest(48_000_000, 16, 50.0).expect("a timer");
    // Wide pulses, and pulses that end within the joint ranges.
    let specs = specs(if sweep.bits() & 1 == 0 { [500.0, 2500.0] } else { [1100.0, 1900.0] });
    let channels = specs.map(|spec| Channel::<N>::from_spec(spec, timer.counting()).expect("a channel"));
    let servos = specs.map(|spec| Servo::<N>::from_spec(spec).expect("a servo"));
    let side = if sweep.bits() & 1 == 0 { Side::Left } else { Side::Right };
    let mounting = Mounting::new(Foot::from_mm(20.0, 15.5, -3.0), side);
    let (to_counts, to_pulses) = (Limb { leg, mounting, servos: channels }, Limb { leg, mounting, servos });
    let hold = Joints::ZERO;
    for _ in 0..200 {
        let foot = match sweep.bits() % 20 {
            0 => [f64::NAN, 0.0, 0.0],
            1 => [0.0, f64::INFINITY, -100.0],
            2 => [1e4, 20.0, -30.0],
            3 => [20.0, 15.5, -3.0],
            _ => [(); 3].map(|()| sweep.within(-220.0, 220.0)),
        };
        let [x, y, z] = foot;
        let foot = Foot::<N>::from_mm(x, y, z);
        let command = to_counts.command(foot, hold);
        let answer = leg.solve(mounting.leg_frame(foot), hold);
        assert_eq!(command.answer, answer, "{}: {x} {y} {z}", N::NAME);
        assert_eq!(command.commands, channels.send(&answer.joints, false), "{}: {x} {y} {z}", N::NAME);
        assert_eq!(to_pulses.command(foot, hold).answer, answer, "{}: {x} {y} {z}", N::NAME);
        assert_eq!(
            to_pulses.command(foot, hold).commands,
            servos.send(&answer.joints, false),
            "{}: {x} {y} {z}",
            N::NAME
        );
        match answer.outcome {
            Outcome::Reached => met.reached += 1,
            Outcome::Moved => met.moved += 1,
            Outcome::Held(_) => met.held += 1,
            Outcome::NotFinite => met.not_finite += 1,
        }
        met.pulse_held += u32::from(command.pulse_held());
    }
}

#[test]
fn a_limb_answers_as_its_leg_and_servos_do() {
    let mut sweep = Sweep::from_seed(61);
    let mut met = Met::default();
    let ranged = Limits::degrees([-35.0, 35.0], [-40.0, 90.0], [15.0, 155.0]).expect("ranges");
    for round in 0..rounds(20) {
        let limits = if round % 3 == 0 { Limits::FREE } else { ranged };
        let bend = |a, b| if round % 2 == 0 { a } else { b };
        let roll =
            Dimensions::roll_hip(31.5, 94.0, 107.0, bend(Bend::Forward, Bend::Backward)).expect("measures");
        let yaw = Dimensions::yaw_hip(42.5, 71.0, 118.0, bend(Bend::Up, Bend::Down)).expect("measures");
        macro_rules! both {
            ($($number:ty),*) => {$(
                check::<_, $number>(roll, limits, &mut sweep, &mut met);
                check::<_, $number>(yaw, limits, &mut sweep, &mut met);
            )*};
        }
        both!(Float32, Coarse, Fixed32, Short32, Fixed16, Float64);
    }
    println!("{met:?}");
    let Met { reached, moved, held, not_finite, pulse_held } = met;
    assert!([reached, moved, held, not_finite, pulse_held].iter().all(|met| *met > 100), "{met:?}");
}
