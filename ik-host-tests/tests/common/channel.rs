//! ik-core's channels (a servo on an output) behind plain `f64`, so that a wrong one can take its place; and what they
//! must come to, from the servo's points alone.

use super::legs::Sweep;
use ik_core::output::Output;
use ik_core::servo::MOST_POINTS;
use ik_core::{
    Angle, Channel, Coarse, Counting, Curve, End, Expander, Fixed16, Fixed32, Float32, MeasuredServo, Number,
    Servo, ServoError, Short32, Timer,
};
use ik_host_tests::numbers::Float64;

/// Bends of a servo with as many points as one may have.
pub const BENDS: usize = MOST_POINTS - 2;

/// A servo as it was measured, with its trim and its safe pulses.
#[derive(Debug, Clone, PartialEq)]
pub struct Measured {
    pub points: Vec<[f64; 2]>,
    pub trim_us: f64,
    pub pulse_us: [f64; 2],
}

impl Measured {
    pub fn curve(&self) -> Result<Curve, ServoError> {
        MeasuredServo { points: &self.points, trim_us: self.trim_us, pulse_us: self.pulse_us }.curve()
    }

    pub fn falls(&self) -> bool {
        self.points[1][1] < self.points[0][1]
    }

    /// The pulses that may be sent.
    pub fn sent_us(&self) -> [f64; 2] {
        let (first, last) = (self.points[0][0], self.points[self.points.len() - 1][0]);
        [self.pulse_us[0].max(first + self.trim_us), self.pulse_us[1].min(last + self.trim_us)]
    }

    /// The pulse for an angle, not held: straight beyond the ends.
    pub fn us_at(&self, degrees: f64) -> f64 {
        let falls = self.falls();
        let starts_before = |pair: &[[f64; 2]]| {
            let start = pair[0][1];
            if falls { degrees <= start } else { degrees >= start }
        };
        let at = self.points.windows(2).rposition(starts_before).unwrap_or(0);
        let [[us, from], [next_us, to]] = [self.points[at], self.points[at + 1]];
        us + (degrees - from) * (next_us - us) / (to - from) + self.trim_us
    }

    /// The angle at a pulse, degrees: straight beyond the ends.
    pub fn degrees_at(&self, us: f64) -> f64 {
        let us = us - self.trim_us;
        let at = self.points.windows(2).rposition(|pair| pair[0][0] <= us).unwrap_or(0);
        let [[from_us, from], [to_us, to]] = [self.points[at], self.points[at + 1]];
        from + (us - from_us) * (to - from) / (to_us - from_us)
    }

    /// The largest µs per degree between any two points.
    pub fn steepest(&self) -> f64 {
        self.points
            .windows(2)
            .fold(0.0, |most, pair| most.max(((pair[1][0] - pair[0][0]) / (pair[1][1] - pair[0][1])).abs()))
    }

    /// A servo of 2 to 16 points with a bent curve.
    pub fn random(sweep: &mut Sweep) -> Self {
        let count = 2 + (sweep.bits() % 15) as usize;
        let falls = sweep.bits() & 1 == 0;
        let (mut us, mut degrees) = (sweep.within(300.0, 900.0), sweep.within(-120.0, -60.0));
        let points: Vec<_> = (0..count)
            .map(|_| {
                let point = [us, if falls { -degrees } else { degrees }];
                let turn = sweep.within(2.0, 240.0 / count as f64);
                degrees += turn;
                us += turn * sweep.within(5.0, 15.0);
                point
            })
            .collect();
        let (first, last) = (points[0][0], points[count - 1][0]);
        // Safe pulses that cut into the points as often as not, and never leave less than half of them.
        let cut = (last - first) / 4.0;
        Self {
            points,
            trim_us: sweep.within(-0.2, 0.2) * cut.min(200.0),
            pulse_us: [
                (first + cut * sweep.within(-1.0, 1.0)).max(1.0),
                last + cut * sweep.within(-1.0, 1.0),
            ],
        }
    }
}

/// An output: a timer from the coarsest to the finest that servos hang on, or an expander.
#[derive(Debug, Clone, Copy)]
pub enum AnyOutput {
    Timer(Timer),
    Expander(Expander),
}

impl AnyOutput {
    pub fn random(sweep: &mut Sweep) -> Self {
        let frame_hz = sweep.within(50.0, 125.0);
        if sweep.bits() & 3 == 0 {
            let oscillator_hz = sweep.within(20e6, 30e6) as u32;
            Self::Expander(Expander::nearest(oscillator_hz, 12, frame_hz).expect("an expander"))
        } else {
            let clock_hz = 10f64.powf(sweep.within(6.0, 8.4)) as u32;
            Self::Timer(Timer::finest(clock_hz, 16, frame_hz).expect("a timer"))
        }
    }

    pub fn counting(&self) -> Counting {
        match self {
            Self::Timer(timer) => timer.counting(),
            Self::Expander(expander) => expander.counting(),
        }
    }

    pub fn as_output(&self) -> &dyn Output {
        match self {
            Self::Timer(timer) => timer,
            Self::Expander(expander) => expander,
        }
    }
}

/// A channel: ik-core's, or a wrong one that must be found out.
pub trait ChannelModel {
    fn name(&self) -> &'static str;
    /// An angle as the number system holds it, degrees; and the number system's step there.
    fn quantised(&self, degrees: f64) -> f64;
    fn command(&self, degrees: f64) -> (u32, Option<End>);
    /// The angle that the servo takes for so many counts, degrees.
    fn back(&self, counts: u32) -> f64;
    fn range(&self) -> [u32; 2];
    /// What counts are off by at most beyond a half, in parts of w: see the docs of `channel`.
    fn bound(&self) -> f64;
}

struct Core<N: Number> {
    channel: Channel<N, BENDS>,
    servo: Servo<N, BENDS>,
    output: AnyOutput,
    bound: f64,
}

fn angle<N: Number>(degrees: f64) -> Angle<N> {
    Angle::from_degrees(degrees.clamp(-180.0, 180.0)).expect("within half a turn")
}

impl<N: Number> ChannelModel for Core<N> {
    fn name(&self) -> &'static str {
        N::NAME
    }
    fn quantised(&self, degrees: f64) -> f64 {
        angle::<N>(degrees).degrees()
    }
    fn command(&self, degrees: f64) -> (u32, Option<End>) {
        let command = self.channel.command(angle(degrees));
        (command.counts, command.held)
    }
    fn back(&self, counts: u32) -> f64 {
        self.servo.angle(self.output.as_output().pulse(counts)).degrees()
    }
    fn range(&self) -> [u32; 2] {
        self.channel.range()
    }
    fn bound(&self) -> f64 {
        self.bound
    }
}

fn core<N: Number>(
    servo: &Measured,
    output: AnyOutput,
    bound: f64,
) -> Result<Box<dyn ChannelModel>, ServoError> {
    let curve = servo.curve()?;
    Ok(Box::new(Core::<N> {
        channel: Channel::from_curve(&curve, output.counting())?,
        servo: Servo::from_curve(&curve)?,
        output,
        bound,
    }))
}

/// The servo on the output in every number system.
pub fn in_every_number(
    servo: &Measured,
    output: AnyOutput,
) -> Result<Vec<Box<dyn ChannelModel>>, ServoError> {
    let (float, fixed) = (2f64.powi(-23), 0.75 * 2f64.powi(-30));
    // What the halves of a product lose.
    let short = 1.75 * 2f64.powi(-30);
    [
        core::<Float32>(servo, output, float),
        core::<Coarse>(servo, output, float),
        core::<Fixed32>(servo, output, fixed),
        core::<Short32>(servo, output, short),
        core::<Fixed16>(servo, output, fixed),
        core::<Float64>(servo, output, 1e-14),
    ]
    .into_iter()
    .collect()
}
