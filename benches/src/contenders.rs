//! Everyone behind one face: a name, a run through all targets, and each answer in radians.

use crate::legs::Shape;
use crate::targets;
use crate::textbook::{on_cordic, on_libm, on_micromath};
use cordic::CordicNumber;
use fixed::traits::Fixed;
use fixed::types::{I16F16, I32F32};
use ik_core::{
    Angle, Bend, Channel, Coarse, Dimensions, Fixed32, Float32, Foot, Hip, Joints, Leg, Limb, Limits,
    Mounting, Number, ServoSpec, Side, Timer,
};
use std::hint::black_box;
use std::rc::Rc;

/// One who turns feet into joint angles.
pub struct Contender {
    name: String,
    accuracy: f64,
    run: Box<dyn Fn()>,
    joints: Box<dyn Fn(usize) -> [f64; 3]>,
}

impl Contender {
    /// `inputs` are the targets as this one takes them: turning millimetres into them is not timed.
    fn new<I: 'static, A: 'static>(
        name: impl Into<String>,
        accuracy: f64,
        inputs: Vec<I>,
        solve: impl Fn(&I) -> A + Copy + 'static,
        radians: impl Fn(A) -> [f64; 3] + 'static,
    ) -> Self {
        let inputs = Rc::new(inputs);
        let timed = Rc::clone(&inputs);
        Self {
            name: name.into(),
            accuracy,
            run: Box::new(move || {
                for input in timed.iter() {
                    black_box(solve(black_box(input)));
                }
            }),
            joints: Box::new(move |i| radians(solve(&inputs[i]))),
        }
    }

    /// What it is.
    pub fn name(&self) -> &str {
        &self.name
    }

    /// How far its angles may be from the true ones, rad.
    pub fn accuracy(&self) -> f64 {
        self.accuracy
    }

    /// Solves all [`targets::COUNT`] targets once.
    pub fn run(&self) {
        (self.run)();
    }

    /// Hip, thigh and knee for one target, rad.
    pub fn joints(&self, target: usize) -> [f64; 3] {
        (self.joints)(target)
    }
}

/// The name of the contender that ratios are to.
pub const YARDSTICK: &str = "textbook on libm f32";

/// Everyone, for the demo leg of this shape.
pub fn contenders(shape: Shape) -> Vec<Contender> {
    let mut all = Vec::new();
    for (ticks, what) in [(false, "joints"), (true, "ticks")] {
        all.push(core::<Float32>(shape, ticks, what, 1e-6));
        all.push(core::<Fixed32>(shape, ticks, what, 1e-6));
        all.push(core::<Coarse>(shape, ticks, what, 2e-2));
    }
    all.push(textbook_f32(YARDSTICK, 2e-6, shape, on_libm::roll_hip, on_libm::yaw_hip));
    all.push(textbook_f32(
        "textbook on micromath",
        7e-1,
        shape,
        on_micromath::roll_hip,
        on_micromath::yaw_hip,
    ));
    all.push(textbook_fixed::<I16F16>("textbook on cordic I16F16", 6e-4, shape));
    all.push(textbook_fixed::<I32F32>("textbook on cordic I32F32", 3e-8, shape));
    all
}

/// ik-core: to three joint angles with their outcome, or on to three ticks.
fn core<N: Number>(shape: Shape, ticks: bool, what: &str, accuracy: f64) -> Contender {
    let [offset, thigh, shank] = shape.leg();
    match shape {
        Shape::RollHip => {
            let measures = Dimensions::roll_hip(offset, thigh, shank, Bend::Forward);
            core_of::<_, N>(measures.expect("the orchard walker's leg"), shape, ticks, what, accuracy)
        }
        Shape::YawHip => {
            let measures = Dimensions::yaw_hip(offset, thigh, shank, Bend::Up);
            core_of::<_, N>(measures.expect("the culvert walker's leg"), shape, ticks, what, accuracy)
        }
    }
}

fn core_of<H: Hip, N: Number>(
    measures: Dimensions<H>,
    shape: Shape,
    ticks: bool,
    what: &str,
    accuracy: f64,
) -> Contender {
    let leg = Leg::<H, N>::from_dimensions(measures, Limits::FREE).expect("a leg");
    let feet: Vec<Foot<N>> =
        targets::feet(shape).into_iter().map(|[x, y, z]| Foot::from_mm(x, y, z)).collect();
    let name = format!("ik-core {} to {what}", N::NAME);
    let radians = |joints: Joints<N>| joints.as_array().map(Angle::radians);
    if !ticks {
        let solve = move |foot: &Foot<N>| leg.solve(*foot, Joints::ZERO);
        return Contender::new(name, accuracy, feet, solve, move |answer| radians(answer.joints));
    }
    let timer = Timer::finest(48_000_000, 16, 50.0).expect("a timer");
    let servos = [Channel::from_spec(ServoSpec::COMMON, timer.counting()).expect("a servo"); 3];
    let limb = Limb { leg, mounting: Mounting::new(Foot::ORIGIN, Side::Left), servos };
    let solve = move |foot: &Foot<N>| limb.command(*foot, Joints::ZERO);
    Contender::new(name, accuracy, feet, solve, move |command| radians(command.answer.joints))
}

fn textbook_f32(
    name: &str,
    accuracy: f64,
    shape: Shape,
    roll: impl Fn([f32; 3], [f32; 3]) -> [f32; 3] + Copy + 'static,
    yaw: impl Fn([f32; 3], [f32; 3]) -> [f32; 3] + Copy + 'static,
) -> Contender {
    let leg = shape.leg().map(|mm| mm as f32);
    let feet: Vec<[f32; 3]> = targets::feet(shape).into_iter().map(|foot| foot.map(|mm| mm as f32)).collect();
    let radians = |joints: [f32; 3]| joints.map(f64::from);
    match shape {
        Shape::RollHip => {
            Contender::new(name, accuracy, feet, move |foot| roll(black_box(leg), *foot), radians)
        }
        Shape::YawHip => {
            Contender::new(name, accuracy, feet, move |foot| yaw(black_box(leg), *foot), radians)
        }
    }
}

fn textbook_fixed<T: Fixed + CordicNumber>(name: &str, accuracy: f64, shape: Shape) -> Contender {
    let length = |mm: f64| T::from_num(mm / on_cordic::UNIT_MM);
    let leg = shape.leg().map(length);
    let feet: Vec<[T; 3]> = targets::feet(shape).into_iter().map(|foot| foot.map(length)).collect();
    let radians = |joints: [T; 3]| joints.map(|angle| angle.to_num::<f64>());
    match shape {
        Shape::RollHip => Contender::new(
            name,
            accuracy,
            feet,
            move |foot| on_cordic::roll_hip(black_box(leg), *foot),
            radians,
        ),
        Shape::YawHip => Contender::new(
            name,
            accuracy,
            feet,
            move |foot| on_cordic::yaw_hip(black_box(leg), *foot),
            radians,
        ),
    }
}
