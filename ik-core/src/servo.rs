//! Servos: joint angle to pulse and back.
//!
//! ```text
//! pulse = centre + trim ± us_per_degree · (angle − joint at centre)
//! ```
//!
//! held within the pulse range, which is what the servo's mechanics stand; or straight from point to point, for a servo
//! that was measured ([`MeasuredServo`]). A pulse is the same type in every number system: microseconds in steps of
//! 1/65536. Firmware that only wants counts of its timer goes there at once, by a [`Channel`](crate::Channel).
//!
#![doc = include_str!("../docs/trimming-a-servo.md")]

mod curve;

pub(crate) use curve::Stretch;
pub use curve::{Curve, MOST_POINTS, MeasuredServo};

use crate::angle::Angle;
use crate::const_math::nearest_i32;
use crate::limits::End;
use crate::number::Number;
use core::fmt;
use fixed::types::U16F16;

/// Steps of a pulse in a microsecond.
const STEPS_PER_US: f64 = 65_536.0;
/// The longest pulse that a servo is given here, µs.
pub const LONGEST_PULSE_US: f64 = 32_767.0;
/// The largest gain of a servo, µs per degree.
pub const MOST_US_PER_DEGREE: f64 = 90.0;
/// The smallest.
pub const LEAST_US_PER_DEGREE: f64 = 0.1;

/// A pulse: microseconds, in steps of 1/65536 µs, below 65 536 µs.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Pulse(U16F16);

impl Pulse {
    /// From microseconds as `fixed` stores them.
    pub const fn from_fixed(us: U16F16) -> Self {
        Self(us)
    }

    /// Microseconds as `fixed` stores them.
    pub const fn fixed(self) -> U16F16 {
        self.0
    }

    /// From steps of 1/65536 µs.
    pub const fn from_steps(steps: u32) -> Self {
        Self(U16F16::from_bits(steps))
    }

    /// Steps of 1/65536 µs.
    pub const fn steps(self) -> u32 {
        self.0.to_bits()
    }

    /// From µs, rounded; 0 for NaN and below, saturating above.
    pub const fn from_us(us: f64) -> Self {
        Self::from_steps((us * STEPS_PER_US + 0.5) as u32)
    }

    /// In µs.
    pub fn us(self) -> f64 {
        f64::from(self.steps()) / STEPS_PER_US
    }
}

#[cfg(feature = "defmt")]
impl defmt::Format for Pulse {
    fn format(&self, f: defmt::Formatter<'_>) {
        let steps = self.steps();
        // The fraction in thousandths: below 2^16, so times 1000 stays within 32 bits.
        defmt::write!(f, "{=u32}.{=u32:03} us", steps >> 16, ((steps & 0xFFFF) * 1000) >> 16);
    }
}

/// Which way a servo turns its joint.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum Turns {
    /// A longer pulse makes the joint's angle larger.
    With,
    /// A longer pulse makes it smaller.
    Against,
}

/// A servo as it is measured and mounted.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ServoSpec {
    /// The pulse at which the servo stands in its middle, µs.
    pub centre_us: f64,
    /// The joint's angle then, degrees.
    pub joint_at_centre_deg: f64,
    /// Its gain, µs per degree; from 0.1 to 90.
    pub us_per_degree: f64,
    /// Its direction.
    pub turns: Turns,
    /// Added to every pulse: what this one servo's horn is off by, µs.
    pub trim_us: f64,
    /// The shortest and the longest pulse that are mechanically safe, µs.
    pub pulse_us: [f64; 2],
}

impl ServoSpec {
    /// A common servo: 1500 µs at joint angle 0, 0.09° per µs, 1000 µs to 2000 µs (common practice, no source).
    pub const COMMON: Self = Self {
        centre_us: 1500.0,
        joint_at_centre_deg: 0.0,
        us_per_degree: 100.0 / 9.0,
        turns: Turns::With,
        trim_us: 0.0,
        pulse_us: [1000.0, 2000.0],
    };
}

/// Why a servo cannot be.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
#[non_exhaustive]
pub enum ServoError {
    /// The pulse range is not [shortest, longest] within 0 µs to 32 767 µs.
    PulseRange,
    /// Centre and trim together, or all measured pulses, lie outside the pulse range, or are NaN.
    Centre,
    /// The gain is not within 0.1 µs to 90 µs per degree.
    Gain,
    /// The joint's angle at the centre, or at a measured point, is not within ±180°.
    JointAtCentre,
    /// The measured points are not 2 to 16 with rising pulses and with angles that all rise or all fall, 0.1 µs to 90 µs
    /// per degree.
    Points,
    /// The curve has more bends than there is room for.
    Bends,
    /// No whole count of the output lies within the pulse range.
    Counts,
}

impl ServoError {
    /// What is wrong, and what would be right.
    pub const fn message(&self) -> &'static str {
        match self {
            Self::PulseRange => "the pulse range must be [shortest, longest] within 0 to 32767 us",
            Self::Centre => {
                "centre and trim together, or some of the measured pulses, must lie within the pulse range"
            }
            Self::Gain => "the gain must lie within 0.1 to 90 us per degree",
            Self::JointAtCentre => {
                "the joint's angle at the centre or a measured point must lie within -180 to 180 degrees"
            }
            Self::Points => {
                "there must be 2 to 16 measured points, their pulses rising, their angles all rising or all falling, \
                 0.1 to 90 us per degree"
            }
            Self::Bends => "the curve has more bends than there is room for: a curve of n points has n - 2",
            Self::Counts => "no whole count of the output lies within the pulse range",
        }
    }
}

impl fmt::Display for ServoError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.message())
    }
}

impl core::error::Error for ServoError {}

/// A servo in a number system, with room for so many bends between the ends of its curve: none if it is straight,
/// n − 2 for n measured points.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Servo<N: Number, const BENDS: usize = 0> {
    /// By rising angle; places that are not needed hold the last piece.
    before: [Piece<N>; BENDS],
    last: Piece<N>,
    /// Whether a longer pulse makes the angle smaller.
    falls: bool,
    shortest: i32,
    longest: i32,
}

/// A straight piece of a servo's curve.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Piece<N: Number> {
    /// The angle at which the next one begins.
    until: N::Angle,
    /// A point on it.
    at: N::Angle,
    /// The pulse there, with trim, in steps of 1/65536 µs; below 2^31.
    centre: i32,
    /// Its pulses.
    shortest: i32,
    longest: i32,
    gain: N::Gain,
    swing: N::Swing,
}

/// What a servo is commanded.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Command {
    /// The pulse, always within the servo's range.
    pub pulse: Pulse,
    /// The end of the range at which it was held, if it was.
    pub held: Option<End>,
}

/// One text for `const fn` and for generic code; see `geometry::constants`.
macro_rules! piece {
    ($number:ty, $stretch:expr) => {{
        let stretch: Stretch = $stretch;
        Piece {
            until: <$number>::angle_from_turns(stretch.until_turns),
            at: <$number>::angle_from_turns(stretch.turns),
            centre: nearest_i32(stretch.us * STEPS_PER_US),
            shortest: nearest_i32(stretch.pulse_us[0] * STEPS_PER_US),
            longest: nearest_i32(stretch.pulse_us[1] * STEPS_PER_US),
            gain: <$number>::gain_from(stretch.us_per_turn),
            swing: <$number>::swing_from(1.0 / stretch.us_per_turn),
        }
    }};
}

macro_rules! servo {
    ($number:ty, $bends:ident, $curve:expr) => {{
        let curve: &Curve = $curve;
        if curve.bends() > $bends {
            Err(ServoError::Bends)
        } else {
            let mut before = [piece!($number, curve.stretch(curve.bends())); $bends];
            let mut number = 0;
            while number < $bends && number < curve.bends() {
                before[number] = piece!($number, curve.stretch(number));
                number += 1;
            }
            let [shortest, longest] = curve.pulse_us();
            Ok(Servo {
                before,
                last: piece!($number, curve.stretch(curve.bends())),
                falls: curve.falls(),
                shortest: nearest_i32(shortest * STEPS_PER_US),
                longest: nearest_i32(longest * STEPS_PER_US),
            })
        }
    }};
}

/// `new` and `of` as `const fn` for each number system, which a trait cannot give.
macro_rules! servo_while_compiling {
    ($(#[$feature:meta] [$($generics:tt)*] $number:ty;)*) => {$(
        #[$feature]
        impl<$($generics)*> Servo<$number> {
            /// A straight servo from its measures.
            ///
            /// # Errors
            /// Says which measure cannot be.
            pub const fn new(spec: ServoSpec) -> Result<Self, ServoError> {
                match spec.curve() {
                    Ok(curve) => Self::of(&curve),
                    Err(error) => Err(error),
                }
            }
        }

        #[$feature]
        impl<$($generics)* const BENDS: usize> Servo<$number, BENDS> {
            /// A servo from its curve.
            ///
            /// # Errors
            /// If there is no room for its bends.
            pub const fn of(curve: &Curve) -> Result<Self, ServoError> {
                servo!($number, BENDS, curve)
            }
        }
    )*};
}

servo_while_compiling! {
    #[cfg(feature = "fixed16")] [] crate::Fixed16;
    #[cfg(feature = "fixed32")] [] crate::Fixed32;
    #[cfg(feature = "short32")] [] crate::Short32;
    #[cfg(any(feature = "float32", feature = "coarse"))]
    [M: crate::number::float::FloatMaths,] crate::number::float::Float<M>;
}

impl<N: Number> Servo<N> {
    /// Like `new`, for any number system, while running.
    ///
    /// # Errors
    /// Says which measure cannot be.
    pub fn from_spec(spec: ServoSpec) -> Result<Self, ServoError> {
        spec.curve().and_then(|curve| Self::from_curve(&curve))
    }
}

impl<N: Number, const BENDS: usize> Servo<N, BENDS> {
    /// Like `of`, for any number system, while running.
    ///
    /// # Errors
    /// If there is no room for its bends.
    pub fn from_curve(curve: &Curve) -> Result<Self, ServoError> {
        servo!(N, BENDS, curve)
    }

    /// The pulse that puts the joint at `angle`, held within the pulse range; monotone in the angle.
    #[inline]
    pub fn command(&self, angle: Angle<N>) -> Command {
        let mut piece = &self.last;
        for earlier in self.before.iter().rev() {
            if angle.0 <= earlier.until {
                piece = earlier;
            }
        }
        let wanted = piece.centre.saturating_add(N::travel(angle.0, piece.at, piece.gain));
        let held = if wanted < self.shortest {
            Some(End::Least)
        } else if wanted > self.longest {
            Some(End::Most)
        } else {
            None
        };
        // Within the piece: rounding must not make the pulse step back where two meet.
        let steps = wanted.max(piece.shortest).min(piece.longest);
        Command { pulse: Pulse::from_steps(steps.max(0) as u32), held }
    }

    /// The joint's angle at `pulse`, which is taken as it is; saturates at half a turn.
    pub fn angle(&self, pulse: Pulse) -> Angle<N> {
        let steps = pulse.steps().min(i32::MAX as u32) as i32;
        let mut piece = &self.last;
        for earlier in self.before.iter().rev() {
            if if self.falls { steps >= earlier.shortest } else { steps <= earlier.longest } {
                piece = earlier;
            }
        }
        Angle(N::swing_to(steps.saturating_sub(piece.centre), piece.at, piece.swing))
    }

    /// The shortest and the longest pulse.
    pub const fn pulse_range(&self) -> [Pulse; 2] {
        [Pulse::from_steps(self.shortest as u32), Pulse::from_steps(self.longest as u32)]
    }
}
