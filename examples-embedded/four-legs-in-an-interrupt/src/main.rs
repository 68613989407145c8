//! Four legs in f32: the main loop plans feet and queues them, the frame interrupt takes the feet of its frame from the
//! queue, solves the legs and sends what frame safety lets pass. The queue has one sender and one receiver and needs no lock.
//!
//! The robot is the orchard walker. SysTick is the frame interrupt here; on a board it is the update interrupt of the timer
//! that the servos hang on. If the main loop is late, the servos go on to the last feet; if it stays silent they hold, and
//! at last are let go of.
#![no_std]
#![no_main]

use core::cell::RefCell;

use board::end;
use cortex_m::peripheral::{SYST, syst::SystClkSource};
use cortex_m_rt::exception;
use critical_section::Mutex;
use ik_core::frame::{FrameSafety, FrameState, ServoBounds, StaleRule, counts_of};
use ik_core::queue::{FootQueue, FootReceiver};
use ik_core::robot::Robot;
use ik_core::{
    Bend, Channel, Dimensions, Float32, Foot, Leg, Limb, Limits, Mounting, Pulse, RollHip, ServoSpec, Side,
    Timer, Turns,
};

/// An impossible leg, servo or timer does not compile.
macro_rules! possible {
    ($checked:expr) => {
        match $checked {
            Ok(possible) => possible,
            Err(error) => panic!("{}", error.message()),
        }
    };
}

type Channels = [Channel<Float32>; 3];
type Walker = Robot<RollHip, Float32, LEGS, Channels>;

const LEGS: usize = 4;
const SERVOS: usize = 3 * LEGS;
/// One more than frames that can wait.
const SLOTS: usize = 4;
/// Frames that are planned, and those that are run: the last ones show what happens when the planner is silent.
const PLANNED: u32 = 9;
const FRAMES: u32 = 17;
/// Clock ticks of a frame; on a board, 20 ms.
const FRAME_TICKS: u32 = 200_000;

const TIMER: Timer = possible!(Timer::finest(48_000_000, 16, 50.0));

const LEG: Leg<RollHip, Float32> = possible!(Leg::<RollHip, Float32>::new(
    possible!(Dimensions::roll_hip(31.5, 94.0, 107.0, Bend::Forward)),
    possible!(Limits::degrees([-35.0, 35.0], [-25.0, 85.0], [15.0, 130.0])),
));

static LIMBS: [Limb<RollHip, Float32, Channels>; LEGS] = [
    limb(120.0, 52.0, Side::Left, [6.0, -9.0, 4.0]),
    limb(120.0, -52.0, Side::Right, [-3.0, 12.0, -7.0]),
    limb(-120.0, 52.0, Side::Left, [10.0, 2.5, -16.0]),
    limb(-120.0, -52.0, Side::Right, [0.0, -5.0, 13.0]),
];

const fn limb(x: f32, y: f32, side: Side, trim_us: [f64; 3]) -> Limb<RollHip, Float32, Channels> {
    Limb {
        leg: LEG,
        mounting: Mounting::new(Foot::new(x, y, 0.0), side),
        servos: [
            channel(0.0, Turns::With, trim_us[0], [1000.0, 2000.0]),
            channel(30.0, Turns::With, trim_us[1], [800.0, 2200.0]),
            channel(72.5, Turns::Against, trim_us[2], [800.0, 2200.0]),
        ],
    }
}

const fn channel(at_centre: f64, turns: Turns, trim_us: f64, pulse_us: [f64; 2]) -> Channel<Float32> {
    let spec = ServoSpec {
        centre_us: 1500.0,
        joint_at_centre_deg: at_centre,
        us_per_degree: 11.1,
        turns,
        trim_us,
        pulse_us,
    };
    possible!(Channel::<Float32>::new(spec, TIMER.counting()))
}

/// What the servos stand at while the machine lies on its belly: the first pulses that they get. Theirs is the one motion
/// that no slew limits.
const START_US: [f64; 3] = [1500.0, 1850.0, 1150.0];
/// In a frame: what 0.14 s for 60 degrees comes to.
const SLEW_US: f64 = 95.0;

/// Hold when there was no target for 3 frames, let go after 6. Short, so that the log shows it; a machine waits longer.
static SAFETY: FrameSafety<SERVOS> = {
    let mut servos = [bounds(0, 0); SERVOS];
    let mut servo = 0;
    while servo < SERVOS {
        servos[servo] = bounds(servo / 3, servo % 3);
        servo += 1;
    }
    FrameSafety::new(servos, possible!(StaleRule::hold_then_release(3, 6)))
};

const fn bounds(leg: usize, joint: usize) -> ServoBounds {
    let (start, slew) = (Pulse::from_us(START_US[joint]), Pulse::from_us(SLEW_US));
    possible!(ServoBounds::on_channel(&LIMBS[leg].servos[joint], TIMER.counting(), start, slew))
}

/// What the frame interrupt owns once the main loop has handed it over.
struct Frame {
    walker: Walker,
    feet: FootReceiver<'static, Float32, LEGS>,
    safety: FrameState<SERVOS>,
    number: u32,
}

static FRAME: Mutex<RefCell<Option<Frame>>> = Mutex::new(RefCell::new(None));

/// The body sinks a little every frame.
fn feet(frame: u32) -> [Foot<Float32>; LEGS] {
    let z = -160.0 + 2.0 * frame as f32;
    [
        Foot::new(130.0, 84.0, z),
        Foot::new(130.0, -84.0, z),
        Foot::new(-110.0, 84.0, z),
        Foot::new(-110.0, -84.0, z),
    ]
}

#[board::entry]
fn main() -> ! {
    let queue = cortex_m::singleton!(: FootQueue<Float32, LEGS, SLOTS> = FootQueue::new());
    let (Some(queue), Some(mut core)) = (queue, cortex_m::Peripherals::take()) else {
        panic!("main runs once")
    };
    let (mut planner, receiver) = queue.split();
    let mut walker = Walker::new();
    for limb in LIMBS {
        // There is room for four.
        let _ = walker.add(limb);
    }
    let mut safety = SAFETY.start();
    // On a board: in the frame interrupt, when a person presses a button, hands off the machine.
    safety.engage();
    critical_section::with(|section| {
        FRAME.borrow_ref_mut(section).replace(Frame { walker, feet: receiver, safety, number: 0 });
    });
    // Feet first, frames then: nothing moves before it is known where to.
    let mut planned = 0;
    while planner.send(feet(planned)).is_ok() {
        planned += 1;
    }
    start(&mut core.SYST);
    loop {
        // Plans ahead whenever there is room, and sleeps otherwise.
        if planned < PLANNED && planner.ready() {
            let _ = planner.send(feet(planned));
            planned += 1;
        } else {
            cortex_m::asm::wfi();
        }
    }
}

fn start(frame_timer: &mut SYST) {
    frame_timer.set_clock_source(SystClkSource::Core);
    frame_timer.set_reload(FRAME_TICKS - 1);
    frame_timer.clear_current();
    frame_timer.enable_interrupt();
    frame_timer.enable_counter();
}

/// The frame interrupt.
#[exception]
fn SysTick() {
    critical_section::with(|section| {
        if let Some(frame) = FRAME.borrow_ref_mut(section).as_mut() {
            frame.run();
        }
    });
}

impl Frame {
    /// The feet of this frame to pulses. A firmware writes them to the timer; this one logs them.
    fn run(&mut self) {
        let new = self.feet.fresh().and_then(|feet| counts_of(&self.walker.frame(&feet)));
        match SAFETY.frame(&mut self.safety, new.as_ref()).copied() {
            Some(ticks) => {
                defmt::println!("frame {=u32}: {}", self.number, self.safety.conduct());
                for leg in ticks.as_chunks::<3>().0 {
                    defmt::println!("ticks {}", leg);
                }
            }
            None => defmt::println!("frame {=u32}: no pulses", self.number),
        }
        self.number += 1;
        if self.number == FRAMES {
            end::done()
        }
    }
}
