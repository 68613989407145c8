//! How large each number of a sheet may be, and why.
//!
//! The bounds are wider than any servo-driven machine needs: they catch a wrong unit or a slip of the
//! pen, not an unusual design. Where a reason speaks of what servos do, it is common practice, no
//! source.

use std::fmt;

/// The numbers that are allowed, with the reason that a complaint gives.
pub(super) struct Bounds {
    least: f64,
    /// Whether `least` itself is allowed.
    least_included: bool,
    most: f64,
    /// What follows the numbers in a message, with its leading space where it needs one.
    unit: &'static str,
    /// Why, as a clause that stands alone.
    pub(super) because: &'static str,
}

impl Bounds {
    const fn from(least: f64, most: f64, unit: &'static str, because: &'static str) -> Self {
        Self { least, least_included: true, most, unit, because }
    }

    const fn above(least: f64, most: f64, unit: &'static str, because: &'static str) -> Self {
        Self { least, least_included: false, most, unit, because }
    }

    /// Whether `number` is allowed. NaN never is.
    pub(super) fn hold(&self, number: f64) -> bool {
        let high_enough = if self.least_included { number >= self.least } else { number > self.least };
        high_enough && number <= self.most
    }
}

impl fmt::Display for Bounds {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let (least, most, unit) = (self.least, self.most, self.unit);
        if self.least_included {
            write!(f, "from {least} to {most}{unit}")
        } else {
            write!(f, "above {least} and at most {most}{unit}")
        }
    }
}

/// Longest name of a robot, a kind or a leg, in characters.
pub(super) const NAME_LETTERS: usize = 80;
/// Most legs on a robot.
pub(super) const LEGS: usize = 16;
/// A link may be this many times as long as the other, not more.
pub(super) const LINK_RATIO: f64 = 8.0;
/// Coxa or hip offset against the mean of the two links.
pub(super) const OFFSET_RATIO: f64 = 1.5;
/// How far an expander's real frame rate may lie from the one asked for.
pub(super) const FRAME_SLACK: f64 = 0.1;

pub(super) const FRAME_HZ: Bounds =
    Bounds::from(20.0, 500.0, " Hz", "servos take 20 to 500 pulses a second, most of them 50");
pub(super) const CLOCK_HZ: Bounds =
    Bounds::from(1e3, 1e9, " Hz", "write the clock in hertz, as it enters the prescaler");
pub(super) const COUNTER_BITS: Bounds = Bounds::from(8.0, 32.0, " bits", "timers count in 8 to 32 bits");
pub(super) const RESOLUTION_BITS: Bounds = Bounds::from(8.0, 16.0, " bits", "expanders resolve 8 to 16 bits");
pub(super) const PRESCALER: Bounds = Bounds::from(
    1.0,
    65536.0,
    "",
    "it is what the clock is divided by, not the register's value, which is often one less",
);
pub(super) const LINK_MM: Bounds =
    Bounds::from(1.0, 1000.0, " mm", "lengths are in millimetres, from joint to joint");
pub(super) const OFFSET_MM: Bounds =
    Bounds::from(0.0, 1000.0, " mm", "lengths are in millimetres; 0 means that there is none");
pub(super) const JOINT_DEG: Bounds =
    Bounds::from(-180.0, 180.0, " degrees", "a joint's angle is within half a turn of its zero");
pub(super) const KNEE_DEG: Bounds = Bounds::from(
    0.0,
    180.0,
    " degrees",
    "a knee's angle is its flexion: 0 is straight, and `knee_bends` gives the side",
);
pub(super) const PULSE_US: Bounds = Bounds::from(
    100.0,
    3000.0,
    " us",
    "servo pulses are in microseconds, 500 to 2500 or less for nearly all",
);
pub(super) const US_PER_DEGREE: Bounds = Bounds::from(
    0.1,
    90.0,
    " us per degree",
    "it is about 11.1 for a servo that takes 2000 us for 180 degrees; `turns` gives the sense",
);
pub(super) const MEASURED_POINTS: Bounds = Bounds::from(
    2.0,
    16.0,
    " points",
    "two give a straight line; more than 16 follow the reading errors, not the servo",
);
pub(super) const MEASURED_US_PER_DEGREE: Bounds = Bounds::from(
    0.1,
    90.0,
    " us per degree",
    "it is about 11.1 for a servo that takes 2000 us for 180 degrees: is a point misread?",
);
pub(super) const DEAD_BAND_US: Bounds =
    Bounds::from(0.0, 100.0, " us", "a dead band is a few microseconds, and 0 when it is not known");
pub(super) const SPEED_S: Bounds = Bounds::above(
    0.0,
    10.0,
    " s",
    "it is the time for 60 degrees, a tenth or two of a second for most servos",
);
pub(super) const SLEW_US: Bounds = Bounds::above(
    0.0,
    3000.0,
    " us",
    "it is how far a pulse may go in a frame: 0.16 s for 60 degrees of 11.1 us each is 83 us in 20 ms",
);
pub(super) const TORQUE_N_MM: Bounds =
    Bounds::above(0.0, 1e6, " N mm", "torque is in newton millimetres; 1 kgf cm is 98.1 N mm");
pub(super) const PLACE_MM: Bounds =
    Bounds::from(-5000.0, 5000.0, " mm", "places are in millimetres from the frame's origin");
pub(super) const TRIM_US: Bounds = Bounds::from(
    -500.0,
    500.0,
    " us",
    "a trim makes good for a tooth of the horn's spline; more means a wrong `centre_us`",
);
pub(super) const ALLOWED_MM: Bounds =
    Bounds::above(0.0, 1000.0, " mm", "no arithmetic is exact, so an allowance of 0 would always fail");
pub(super) const PERCENT: Bounds =
    Bounds::from(0.0, 100.0, " percent", "0 asks that the whole work volume be reached, 100 asks nothing");
