//! The output of a sheet as ik-core's.

use super::Refused;
use crate::sheet::{self, Robot};
use ik_core::output::Output;
use ik_core::{Counting, Expander, OutputError, Pulse, Timer};

/// A timer or an expander.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Counter {
    /// A timer of the microcontroller.
    Timer(Timer),
    /// A PWM expander.
    Expander(Expander),
}

impl Counter {
    /// The output of a sheet.
    ///
    /// # Errors
    /// What the hardware cannot do.
    pub fn of(output: &sheet::Output) -> Result<Self, OutputError> {
        match *output {
            sheet::Output::Timer { clock_hz, counter_bits, frame_hz, prescaler } => match prescaler {
                Some(divider) => Timer::new(clock_hz, divider, counter_bits, frame_hz),
                None => Timer::finest(clock_hz, counter_bits, frame_hz),
            }
            .map(Self::Timer),
            sheet::Output::Expander { oscillator_hz, resolution_bits, frame_hz } => {
                Expander::nearest(oscillator_hz, resolution_bits, frame_hz).map(Self::Expander)
            }
        }
    }

    /// The output of a robot, for a kind of leg.
    ///
    /// # Errors
    /// What the hardware cannot do, as what is refused of that kind.
    pub fn of_kind(robot: &Robot, kind: usize) -> Result<Self, Refused> {
        Self::of(&robot.output).map_err(|error| Refused {
            kind: robot.kinds[kind].name.clone(),
            what: "output".into(),
            why: error.to_string(),
        })
    }

    fn inner(&self) -> &dyn Output {
        match self {
            Self::Timer(timer) => timer,
            Self::Expander(expander) => expander,
        }
    }

    /// How it counts.
    pub const fn counting(&self) -> Counting {
        match self {
            Self::Timer(timer) => timer.counting(),
            Self::Expander(expander) => expander.counting(),
        }
    }

    /// What its counts are called.
    pub const fn unit(&self) -> &'static str {
        match self {
            Self::Timer(_) => "ticks",
            Self::Expander(_) => "counts",
        }
    }

    /// One line about it: what divides, what a count is, how long a frame really is.
    pub fn summary(&self) -> String {
        let (what, divider) = match self {
            Self::Timer(timer) => ("timer", timer.divider()),
            Self::Expander(expander) => ("expander", expander.divider()),
        };
        format!(
            "{what}: clock divided by {divider}, {:.4} µs a {}, frames of {:.3} ms ({:.3} Hz)",
            self.count_us(),
            self.unit().trim_end_matches('s'),
            self.frame_us() / 1e3,
            1e6 / self.frame_us()
        )
    }
}

impl Output for Counter {
    fn counts(&self, pulse: Pulse) -> u32 {
        self.inner().counts(pulse)
    }
    fn pulse(&self, counts: u32) -> Pulse {
        self.inner().pulse(counts)
    }
    fn most_counts(&self) -> u32 {
        self.inner().most_counts()
    }
    fn count_us(&self) -> f64 {
        self.inner().count_us()
    }
    fn frame_us(&self) -> f64 {
        self.inner().frame_us()
    }
}
