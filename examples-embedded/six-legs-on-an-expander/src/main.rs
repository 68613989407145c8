//! Six legs in 32-bit fixed point, their eighteen servos on a 12-bit PWM expander behind an I2C bus.
//!
//! The robot is the culvert walker. It lies on its belly, stands up within the slews of its servos, and takes a step of a
//! tripod gait: three feet on the ground move back while the other three swing forward. Then its planner falls silent, and
//! frame safety holds the legs and lets go of them at last. The counts of a frame go to the expander in one transaction.
#![no_std]
#![no_main]

mod bus;

use board::end;
use bus::LoggedBus;
use fixed::types::I16F16;
use ik_core::frame::{Conduct, FrameSafety, ServoBounds, StaleRule, counts_of};
use ik_core::output::hal::{ExpanderWriter, Layout, WordOrder};
use ik_core::robot::Robot;
use ik_core::{
    Bend, Channel, Dimensions, Expander as Counter, Fixed32, Foot, Leg, Limb, Limits, Mounting, Pulse,
    ServoSpec, Side, Turns, YawHip,
};

/// An impossible leg, servo or expander does not compile.
macro_rules! possible {
    ($checked:expr) => {
        match $checked {
            Ok(possible) => possible,
            Err(error) => panic!("{}", error.message()),
        }
    };
}

type Channels = [Channel<Fixed32>; 3];

const LEGS: usize = 6;
const CHANNELS: usize = 3 * LEGS;
const ADDRESS: u8 = 0x2A;
/// Made up, as the emulator has no expander: take yours from its data sheet.
const LAYOUT: Layout = Layout { first_register: 0x10, order: WordOrder::LowFirst, has_beginnings: false };

/// 12 bits a frame of about 20 ms, from an oscillator of 25 MHz.
const COUNTER: Counter = possible!(Counter::nearest(25_000_000, 12, 50.0));

const LEG: Leg<YawHip, Fixed32> = possible!(Leg::<YawHip, Fixed32>::new(
    possible!(Dimensions::yaw_hip(42.5, 71.0, 118.4, Bend::Up)),
    possible!(Limits::degrees([-50.0, 50.0], [-40.0, 90.0], [15.0, 155.0])),
));

/// Place, side and trims of each leg, left ones first, front to rear.
static LIMBS: [Limb<YawHip, Fixed32, Channels>; LEGS] = [
    limb(95, 58, Side::Left, [0.0, 5.0, -12.0]),
    limb(0, 76, Side::Left, [-7.0, 0.0, 9.0]),
    limb(-95, 58, Side::Left, [3.0, -14.0, 6.0]),
    limb(95, -58, Side::Right, [0.0, 11.0, 2.0]),
    limb(0, -76, Side::Right, [0.0; 3]),
    limb(-95, -58, Side::Right, [-4.0, 8.0, -15.0]),
];

const fn limb(x: i32, y: i32, side: Side, trim_us: [f64; 3]) -> Limb<YawHip, Fixed32, Channels> {
    Limb {
        leg: LEG,
        mounting: Mounting::new(mm(x, y, 0), side),
        servos: [
            channel(0.0, Turns::With, trim_us[0]),
            channel(25.0, Turns::Against, trim_us[1]),
            channel(85.0, Turns::With, trim_us[2]),
        ],
    }
}

const fn channel(at_centre: f64, turns: Turns, trim_us: f64) -> Channel<Fixed32> {
    let spec = ServoSpec {
        centre_us: 1500.0,
        joint_at_centre_deg: at_centre,
        us_per_degree: 11.1,
        turns,
        trim_us,
        pulse_us: [600.0, 2400.0],
    };
    possible!(Channel::<Fixed32>::new(spec, COUNTER.counting()))
}

/// What the servos stand at while the machine lies on its belly, its knees up: the first pulses that they get. Theirs is the
/// one motion that no slew limits.
const START_US: [f64; 3] = [1500.0, 1050.0, 2000.0];
/// Standing up: about half of what the servos can do.
static GENTLY: FrameSafety<CHANNELS> = safety(40.0);
/// Walking: what 0.16 s for 60 degrees comes to in a frame.
static SAFELY: FrameSafety<CHANNELS> = safety(83.0);

/// No farther than a slew in a frame. Without a target: hold after 3 frames, let go after 6. Short, so that the log shows
/// it; a machine waits longer.
const fn safety(slew_us: f64) -> FrameSafety<CHANNELS> {
    let mut servos = [bounds(0, slew_us); CHANNELS];
    let mut servo = 0;
    while servo < CHANNELS {
        servos[servo] = bounds(servo, slew_us);
        servo += 1;
    }
    FrameSafety::new(servos, possible!(StaleRule::hold_then_release(3, 6)))
}

const fn bounds(servo: usize, slew_us: f64) -> ServoBounds {
    let (leg, joint) = (servo / 3, servo % 3);
    let (start, slew) = (Pulse::from_us(START_US[joint]), Pulse::from_us(slew_us));
    possible!(ServoBounds::on_channel(&LIMBS[leg].servos[joint], COUNTER.counting(), start, slew))
}

/// A foot in whole mm.
const fn mm(x: i32, y: i32, z: i32) -> Foot<Fixed32> {
    const fn length(mm: i32) -> I16F16 {
        I16F16::from_bits(mm << 16)
    }
    Foot::new(length(x), length(y), length(z))
}

/// Where the feet stand, on the body's frame.
const STANDS: [[i32; 2]; LEGS] = [[110, 200], [0, 220], [-110, 200], [110, -200], [0, -220], [-110, -200]];
const GROUND: i32 = -80;
const LIFT: i32 = 25;
const STRIDE: i32 = 20;

/// When the step begins and ends, and the last frame.
const STEP: [i32; 2] = [17, 27];
const FRAMES: i32 = 35;

/// What the planner wants in a frame, if it says anything: to stand, and a step in which legs 0, 2 and 4 swing while 1, 3
/// and 5 push.
fn feet(frame: i32) -> Option<[Foot<Fixed32>; LEGS]> {
    let [from, to] = STEP;
    if frame > to {
        return None;
    }
    let along = STRIDE * (frame - from).max(0) / (to - from) - STRIDE / 2;
    Some(core::array::from_fn(|leg| {
        let [x, y] = STANDS[leg];
        // Up to the middle of the step, and down again.
        let up = LIFT * (frame - from).min(to - frame).max(0) * 2 / (to - from);
        match leg % 2 {
            0 => mm(x + along, y, GROUND + up),
            _ => mm(x - along, y, GROUND),
        }
    }))
}

#[board::entry]
fn main() -> ! {
    let Ok(mut expander) = ExpanderWriter::<_, CHANNELS>::new(LoggedBus, ADDRESS, LAYOUT, COUNTER) else {
        panic!("the channels' registers do not fit")
    };
    let mut robot = Robot::<YawHip, Fixed32, LEGS, Channels>::new();
    for limb in LIMBS {
        // There is room for six.
        let _ = robot.add(limb);
    }
    let (mut state, mut stands) = (GENTLY.start(), false);
    for frame in 0..FRAMES {
        // On a board: when a person presses a button, hands off the machine.
        if frame == 1 {
            state.engage();
        }
        let new = feet(frame).and_then(|feet| counts_of(&robot.frame(&feet)));
        let stage = if stands { &SAFELY } else { &GENTLY };
        let counts = *stage.frame(&mut state, new.as_ref()).unwrap_or(&[0; CHANNELS]);
        stands |= state.conduct() == Conduct::Following && state.behind() == 0;
        defmt::println!(
            "frame {=i32}: {}, {=usize} servos on their way",
            frame,
            state.conduct(),
            state.behind()
        );
        // The same frame again if the bus fails: the next one would be farther from the last that was taken.
        if !(0..3).any(|_| expander.send(&counts).is_ok()) {
            defmt::println!("the bus failed: cut the servos' power");
            break;
        }
    }
    end::done()
}
