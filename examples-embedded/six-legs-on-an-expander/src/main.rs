//! Six legs in 32-bit fixed point, their eighteen servos on a 12-bit PWM expander behind an I2C bus.
//!
//! The robot is the culvert walker. Its feet go through some frames of a tripod gait: three on the ground move back while
//! the other three swing forward. The counts of a frame go to the expander in one transaction.
#![no_std]
#![no_main]

mod bus;

use board::end;
use bus::LoggedBus;
use fixed::types::I16F16;
use ik_core::output::hal::{ExpanderWriter, Layout, WordOrder};
use ik_core::robot::Robot;
use ik_core::{
    Bend, Channel, Dimensions, Expander as Counter, Fixed32, Foot, Leg, Limb, Limits, Mounting, ServoSpec,
    Side, Turns, YawHip,
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
const FRAMES: i32 = 4;

/// The feet of a frame: legs 0, 2 and 4 swing while 1, 3 and 5 push.
fn feet(frame: i32) -> [Foot<Fixed32>; LEGS] {
    let along = STRIDE * frame / (FRAMES - 1) - STRIDE / 2;
    core::array::from_fn(|leg| {
        let [x, y] = STANDS[leg];
        let in_the_air = frame > 0 && frame < FRAMES - 1;
        match leg % 2 {
            0 => mm(x + along, y, GROUND + if in_the_air { LIFT } else { 0 }),
            _ => mm(x - along, y, GROUND),
        }
    })
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
    for frame in 0..FRAMES {
        let mut counts = [0; CHANNELS];
        for (leg, command) in counts.chunks_exact_mut(3).zip(&robot.frame(&feet(frame))) {
            leg.copy_from_slice(&command.counts());
        }
        defmt::println!("frame {=i32}", frame);
        if expander.send(&counts).is_err() {
            defmt::println!("the bus failed: the legs keep their poses");
        }
    }
    end::done()
}
