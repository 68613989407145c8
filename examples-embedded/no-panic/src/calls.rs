//! Every public function of ik-core, in a number system, with opaque values.

use ik_core::channel::PulsesHeld;
use ik_core::drive::{Drive, Sent, Servos};
use ik_core::limits::End;
use ik_core::output::{Counting, Output};
use ik_core::servo::MOST_POINTS;
use ik_core::{
    Angle, Answer, Bend, Channel, Curve, Dimensions, Expander, Foot, Hip, Joints, Leg, Limb, Limits,
    MeasuredServo, Mounting, Number, Outcome, Parallelogram, Pulse, Servo, ServoError, ServoSpec, Side,
    Timer, Turns,
};

use crate::frame;
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
            limits.through_parallelogram(bend(), two(), two()).unwrap_or(limits)
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

fn pulses() {
    use_up((pulse().steps(), pulse().us(), Pulse::from_us(number()), Pulse::from_fixed(pulse().fixed())));
}

/// A value that could be made.
fn made<T>(mut make: impl FnMut() -> Result<T, ServoError>) -> T {
    loop {
        match make() {
            Ok(made) => return made,
            Err(error) => use_up(error.message()),
        }
    }
}

fn spec() -> ServoSpec {
    ServoSpec {
        centre_us: number(),
        joint_at_centre_deg: number(),
        us_per_degree: number(),
        turns: if truth() { Turns::With } else { Turns::Against },
        trim_us: number(),
        pulse_us: two(),
    }
}

fn curve() -> Curve {
    let mut points = [[0.0; 2]; MOST_POINTS + 2];
    for point in &mut points {
        *point = two();
    }
    let points = points.get(..word() as usize).unwrap_or(&[]);
    let measured = made(|| MeasuredServo { points, trim_us: number(), pulse_us: two() }.curve());
    let curve = if truth() { made(|| spec().curve()) } else { measured };
    use_up((curve.bends(), curve.pulse_us(), curve.joint_deg()));
    curve
}

fn counting() -> Counting {
    loop {
        let counting = match word() & 3 {
            0 => Timer::finest(word(), word() as u8, number()).map(|timer| timer.counting()),
            1 => {
                let dividers = [word(), word(), word(), word()];
                let dividers = dividers.get(..word() as usize).unwrap_or(&[]);
                Timer::finest_of(dividers, word(), word() as u8, number()).map(|timer| timer.counting())
            }
            2 => Expander::nearest(word(), word() as u8, number()).map(|expander| expander.counting()),
            _ => Counting::of_duty(word() as u16, word()),
        };
        if let Ok(counting) = counting {
            use_up((counting.counts_per_us(), counting.most_counts()));
            return counting;
        }
    }
}

/// Servos and channels, straight and with room for some bends.
fn servos<N: Opaque>() -> [Servo<N>; 3] {
    let servo = made(|| Servo::<N>::from_spec(spec()));
    use_up((servo.command(angle()), servo.angle(pulse()), servo.pulse_range()));
    let bent = made(|| Servo::<N, 4>::from_curve(&curve()));
    use_up((bent.command(angle()), bent.angle(pulse()), bent.pulse_range()));
    use_up([bent; 3].turn([angle(), angle(), angle()]));
    let channel = made(|| Channel::<N, 4>::from_curve(&curve(), counting()));
    use_up((channel.command(angle()), channel.range()));
    frame::all(&channel, &servo, counting());
    let counts = [channel; 3].turn([angle(), angle(), angle()]);
    let held = PulsesHeld::of(counts.held.as_array());
    use_up((counts.is_held(), held.any(), [channel; 3].turn_quickly([angle(), angle(), angle()])));
    [servo; 3]
}

/// A leg with what drives it.
fn driven<H: Hip, N: Opaque, D: Drive<N>>(leg: Leg<H, N>, servos: D) {
    let limb = Limb { leg, mounting: Mounting::new(foot(), Side::Right), servos };
    let command = limb.command(foot(), joints());
    answer(command.answer);
    use_up((limb.commands(&joints()), command.pulse_held(), command.commands));
    use_up((servos.send(&joints(), truth()), servos.send_quickly(&joints(), truth())));
    #[cfg(feature = "heapless")]
    robot(limb);
}

fn output(output: &impl Output) {
    use_up((output.counts(pulse()), output.pulse(word()), output.most_counts()));
    use_up((output.count_us(), output.frame_us()));
}

fn outputs() {
    let bits = || word() as u8;
    pulses();
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
        use_up(N::is_well_within(N::any_angle(), &range));
    }
    use_up(ranges.hold(joints()));
    answer(leg.solve(foot(), joints()));
    use_up(leg.forward(&joints()));

    let limb = Limb { leg, mounting: Mounting::new(foot(), Side::Right), servos };
    if let Ok(timer) = Timer::finest(word(), 16, number()) {
        use_up(limb.command(foot(), joints()).counts(&timer));
    }
    let channel = made(|| Channel::<N>::from_spec(spec(), counting()));
    let bent = made(|| Channel::<N, 4>::from_curve(&curve(), counting()));
    let command = Limb { leg, mounting: limb.mounting, servos: [channel; 3] }.command(foot(), joints());
    use_up(command.counts());
    frame::targets([command; 6].get(..word() as usize).unwrap_or(&[]));
    driven(leg, servos);
    driven(leg, [channel; 3]);
    driven(leg, [bent; 3]);
    driven(leg, Parallelogram([channel; 3]));
    driven(leg, Parallelogram(servos));
    use_up(Parallelogram::<()>::shank(&joints::<N>(), truth()));
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
fn robot<H: Hip, N: Opaque, D: Drive<N>>(limb: Limb<H, N, D>) {
    let mut robot = ik_core::robot::Robot::<H, N, 6, D>::new();
    for _ in 0..word() {
        use_up(robot.add(limb).is_ok());
    }
    use_up(robot.legs());
    use_up(ik_core::robot::Robot::<H, N, 2, D>::of([limb; 2]).legs());
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
            use_up((receiver.next(), receiver.fresh()));
        }
    }
}
