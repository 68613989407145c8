//! Every public function of ik-core, in a number system, with opaque values.

use ik_core::limits::End;
use ik_core::output::Output;
use ik_core::{
    Angle, Answer, Bend, Dimensions, Expander, Foot, Hip, Joints, Leg, Limb, Limits, Mounting, Number,
    Outcome, Pulse, Servo, ServoSpec, Side, Timer, Turns,
};

use crate::numbers::{Opaque, every_primitive};
use crate::opaque::{number, three, truth, two, use_up, word};

/// Every function.
pub fn all<N: Opaque>() {
    every_primitive::<N>();
    angles::<N>();
    feet::<N>();
    outputs();
    let (servo, limits) = (servos::<N>(), limits());
    if let Ok(dimensions) = Dimensions::roll_hip(number(), number(), number(), bend()) {
        legs::<_, N>(dimensions, limits, servo);
    }
    if let Ok(dimensions) = Dimensions::yaw_hip(number(), number(), number(), bend()) {
        legs::<_, N>(dimensions, limits, servo);
    }
}

fn bend() -> Bend {
    match word() & 3 {
        0 => Bend::Forward,
        1 => Bend::Backward,
        2 => Bend::Up,
        _ => Bend::Down,
    }
}

fn angle<N: Opaque>() -> Angle<N> {
    Angle::from_raw(N::any_angle()).unwrap_or(Angle::ZERO)
}

fn joints<N: Opaque>() -> Joints<N> {
    Joints { hip: angle(), thigh: angle(), knee: angle() }
}

fn foot<N: Opaque>() -> Foot<N> {
    Foot::new(N::any_length(), N::any_length(), N::any_length())
}

fn angles<N: Opaque>() {
    use_up(angle::<N>().raw());
    use_up(Angle::<N>::from_degrees(number()));
    use_up(Angle::<N>::from_radians(number()));
    use_up([angle::<N>().turns(), angle::<N>().degrees(), angle::<N>().radians()]);
    use_up(joints::<N>().as_array());
}

fn feet<N: Opaque>() {
    let [x, y, z] = three();
    use_up(Foot::<N>::from_mm(x, y, z));
    use_up(Foot::<N>::try_from_mm(x, y, z));
    use_up((foot::<N>().mm(), foot::<N>().lengths()));
    let side = if truth() { Side::Left } else { Side::Right };
    let mounting = Mounting::new(foot::<N>(), side);
    use_up((mounting.side(), mounting.leg_frame(foot()), mounting.body_frame(foot())));
}

fn limits() -> Limits {
    match Limits::degrees(two(), two(), two()) {
        Ok(limits) => {
            use_up([limits.hip_deg(), limits.thigh_deg(), limits.knee_deg()]);
            limits
        }
        Err(error) => {
            use_up(error.message());
            Limits::FREE
        }
    }
}

fn pulse() -> Pulse {
    Pulse::from_steps(word())
}

fn servos<N: Opaque>() -> [Servo<N>; 3] {
    use_up((pulse().steps(), pulse().us(), Pulse::from_us(number()), Pulse::from_fixed(pulse().fixed())));
    let spec = || ServoSpec {
        centre_us: number(),
        joint_at_centre_deg: number(),
        us_per_degree: number(),
        turns: if truth() { Turns::With } else { Turns::Against },
        trim_us: number(),
        pulse_us: two(),
    };
    let servo = loop {
        match Servo::<N>::from_spec(spec()) {
            Ok(servo) => break servo,
            Err(error) => use_up(error.message()),
        }
    };
    use_up((servo.command(angle()), servo.angle(pulse()), servo.pulse_range()));
    [servo; 3]
}

fn output(output: &impl Output) {
    use_up((output.counts(pulse()), output.pulse(word()), output.most_counts()));
    use_up((output.count_us(), output.frame_us()));
}

fn outputs() {
    let bits = || word() as u8;
    for timer in [Timer::new(word(), word(), bits(), number()), Timer::finest(word(), bits(), number())] {
        match timer {
            Ok(timer) => {
                output(&timer);
                use_up((timer.divider(), timer.frame_ticks()));
            }
            Err(error) => use_up(error.message()),
        }
    }
    for expander in [Expander::new(word(), word(), bits()), Expander::nearest(word(), bits(), number())] {
        match expander {
            Ok(expander) => {
                output(&expander);
                use_up((expander.divider(), expander.frame_counts()));
            }
            Err(error) => use_up(error.message()),
        }
    }
}

fn legs<H: Hip, N: Opaque>(dimensions: Dimensions<H>, limits: Limits, servos: [Servo<N>; 3]) {
    use_up((dimensions.offset_mm(), dimensions.thigh_mm(), dimensions.shank_mm(), dimensions.bend()));
    let leg = match Leg::<H, N>::from_dimensions(dimensions, limits) {
        Ok(leg) => leg,
        Err(error) => {
            use_up(error.message());
            return;
        }
    };
    let ranges = leg.ranges();
    for range in [ranges.hip(), ranges.thigh(), ranges.knee()] {
        use_up((range.least(), range.most(), range.hold(angle())));
    }
    use_up(ranges.hold(joints()));
    answer(leg.solve(foot(), joints()));
    use_up(leg.forward(&joints()));

    let limb = Limb { leg, mounting: Mounting::new(foot(), Side::Right), servos };
    let command = limb.command(foot(), joints());
    answer(command.answer);
    use_up((limb.commands(&joints()), command.pulse_held()));
    if let Ok(timer) = Timer::finest(word(), 16, number()) {
        use_up(command.counts(&timer));
    }
    #[cfg(feature = "heapless")]
    robot(limb);
    #[cfg(feature = "queue")]
    queue::<N>();
}

fn answer<N: Number>(answer: Answer<N>) {
    if let Outcome::Held(held) = answer.outcome {
        let ends: [Option<End>; 3] = held.as_array();
        use_up((held.any(), ends));
    }
    use_up(answer);
}

#[cfg(feature = "heapless")]
fn robot<H: Hip, N: Opaque>(limb: Limb<H, N>) {
    let mut robot = ik_core::robot::Robot::<H, N, 6>::new();
    for _ in 0..word() {
        use_up(robot.add(limb).is_ok());
    }
    use_up(robot.legs());
    let feet = [foot::<N>(); 8];
    use_up(robot.frame(feet.get(..word() as usize).unwrap_or(&[])));
}

#[cfg(feature = "queue")]
fn queue<N: Opaque>() {
    let mut queue = ik_core::queue::FootQueue::<N, 4, 8>::new();
    let (mut sender, mut receiver) = queue.split();
    for _ in 0..word() {
        use_up((sender.ready(), sender.send([foot(); 4]).is_ok()));
        if truth() {
            use_up(receiver.next());
        }
    }
}
