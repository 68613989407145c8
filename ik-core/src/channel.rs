//! Channels: a servo on an output, from the joint's angle to whole counts at once.
//!
//! A pulse in microseconds is a detour for firmware whose timer wants ticks: everything between the angle and the tick is
//! one straight line (or one of a few, for a measured servo), and its two numbers are worked out while compiling.
//!
//! ```text
//! counts = ⌊slope · angle + start⌋        start = counts at no angle + ½
//! ```
//!
//! held within the whole counts that lie inside the pulse range: the ends are rounded inward, so that no count is ever
//! longer or shorter than what the servo's mechanics stand. 0 counts are no pulse at all, and are never commanded.
//!
//! | number system | counts are within |
//! | --- | --- |
//! | `Float32`, `Coarse` | ½ + 2⁻²³ · w |
//! | `Fixed32`, `Fixed16` | ½ + ¾ · 2⁻³⁰ · w |
//! | `Short32` | ½ + 1¾ · 2⁻³⁰ · w |
//!
//! of the exact line at the angle as the number system holds it (½ + 2⁻²² if that is more); w is the number of counts in a
//! turn of the servo, and in its pulse at the joint's zero, together. For a servo of 4000 µs a turn on a timer of 0.3125 µs,
//! w is 17 600: a count is within 0.503 of the exact one in floating point, and within 0.50002 in fixed point. An angle of
//! `Fixed16` is itself a whole number of 1/65536 turns, of which such a servo has five in a count; and a bend of a measured
//! servo lies at the nearest of them.

use crate::angle::Angle;
use crate::limits::End;
use crate::number::Number;
use crate::output::Counting;
use crate::servo::{Curve, ServoError, ServoSpec, Stretch};

/// A servo on an output, with room for so many bends between the ends of its curve: none if it is straight, n − 2 for n
/// measured points. A `const` one lives in flash.
///
/// ```
/// # #[cfg(not(feature = "fixed32"))]
/// # fn main() {}
/// # #[cfg(feature = "fixed32")]
/// # fn main() -> Result<(), &'static str> {
/// use ik_core::{Angle, Channel, End, Fixed32, ServoSpec, Timer};
///
/// const TIMER: Timer = match Timer::finest(48_000_000, 16, 50.0) {
///     Ok(timer) => timer,
///     Err(error) => panic!("{}", error.message()),
/// };
/// const HIP: Channel<Fixed32> = match Channel::<Fixed32>::new(ServoSpec::COMMON, TIMER.counting()) {
///     Ok(channel) => channel,
///     Err(error) => panic!("{}", error.message()),
/// };
/// // 9 degrees at 100/9 us per degree are 100 us; 1600 us are 5120 ticks of 0.3125 us.
/// let command = HIP.command(Angle::from_degrees(9.0).ok_or("angle")?);
/// assert_eq!((command.counts, command.held), (5120, None));
/// // 2000 us are the most that this servo stands.
/// let command = HIP.command(Angle::from_degrees(60.0).ok_or("angle")?);
/// assert_eq!((command.counts, command.held), (6400, Some(End::Most)));
/// # Ok(())
/// # }
/// ```
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Channel<N: Number, const BENDS: usize = 0> {
    /// By rising angle; places that are not needed hold the last piece.
    before: [Piece<N>; BENDS],
    last: Piece<N>,
    least: u32,
    most: u32,
}

/// A straight piece of a servo's curve, in counts.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Piece<N: Number> {
    line: N::Line,
    /// Its least count, and how many more its most is.
    least: u32,
    span: u32,
    /// The angle at which the next one begins.
    until: N::Angle,
}

impl<N: Number> Piece<N> {
    /// The counts for an angle, if they lie within.
    #[inline(always)]
    fn counts(&self, angle: Angle<N>) -> Option<u32> {
        let wanted = N::on_line(self.line, angle.0) as u32;
        // Below the least, this wraps far above.
        (wanted.wrapping_sub(self.least) <= self.span).then_some(wanted)
    }
}

/// What a channel is commanded.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Count {
    /// Ticks of a timer or counts of an expander, always within the channel's range.
    pub counts: u32,
    /// The end of the range at which they were held, if they were.
    pub held: Option<End>,
}

/// What the three channels of a leg are commanded.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Counts {
    /// Hip, thigh (femur), knee: ticks of a timer or counts of an expander, always within their ranges.
    pub counts: [u32; 3],
    /// Which were held by their ranges, and at which end.
    pub held: PulsesHeld,
}

/// Which pulses of a leg were held by their ranges, and at which end: a byte, for it is stored with every answer.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Default)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct PulsesHeld(u8);

impl PulsesHeld {
    /// No pulse.
    pub const NONE: Self = Self(0);

    /// Hip, thigh (femur), knee.
    pub const fn of(ends: [Option<End>; 3]) -> Self {
        let [hip, thigh, knee] = ends;
        Self(Self::bits(hip) | (Self::bits(thigh) << 2) | (Self::bits(knee) << 4))
    }

    const fn bits(end: Option<End>) -> u8 {
        match end {
            None => 0,
            Some(End::Least) => 1,
            Some(End::Most) => 2,
        }
    }

    /// Whether any pulse was held.
    pub const fn any(self) -> bool {
        self.0 != 0
    }

    /// Hip, thigh (femur), knee.
    pub const fn as_array(self) -> [Option<End>; 3] {
        [Self::end(self.0), Self::end(self.0 >> 2), Self::end(self.0 >> 4)]
    }

    const fn end(bits: u8) -> Option<End> {
        match bits & 3 {
            1 => Some(End::Least),
            2 => Some(End::Most),
            _ => None,
        }
    }
}

/// One text for `const fn` and for generic code; see `geometry::constants`.
macro_rules! piece {
    ($number:ty, $stretch:expr, $counting:expr, $ends:expr) => {{
        let stretch: Stretch = $stretch;
        let counting: Counting = $counting;
        let [least, most] = counting.nearest_between(stretch.pulse_us, $ends);
        Piece {
            line: <$number>::line_from(
                stretch.us_per_turn * counting.counts_per_us(),
                stretch.us_at_zero() * counting.counts_per_us(),
            ),
            least,
            span: most - least,
            until: <$number>::angle_from_turns(stretch.until_turns),
        }
    }};
}

macro_rules! channel {
    ($number:ty, $bends:ident, $curve:expr, $counting:expr) => {{
        let (curve, counting): (&Curve, Counting) = ($curve, $counting);
        match counting.within(curve.pulse_us()) {
            None => Err(ServoError::Counts),
            Some(_) if curve.bends() > $bends => Err(ServoError::Bends),
            Some(ends) => {
                let last = piece!($number, curve.stretch(curve.bends()), counting, ends);
                let mut before = [last; $bends];
                let mut number = 0;
                while number < $bends && number < curve.bends() {
                    before[number] = piece!($number, curve.stretch(number), counting, ends);
                    number += 1;
                }
                Ok(Channel { before, last, least: ends[0], most: ends[1] })
            }
        }
    }};
}

/// `new` and `of` as `const fn` for each number system, which a trait cannot give.
macro_rules! channel_while_compiling {
    ($(#[$feature:meta] [$($generics:tt)*] $number:ty;)*) => {$(
        #[$feature]
        impl<$($generics)*> Channel<$number> {
            /// A straight servo on an output: [`Timer::counting`](crate::Timer::counting) or
            /// [`Expander::counting`](crate::Expander::counting).
            ///
            /// # Errors
            /// Says which measure of the servo cannot be, or that no whole count lies within its pulse range.
            pub const fn new(spec: ServoSpec, counting: Counting) -> Result<Self, ServoError> {
                match spec.curve() {
                    Ok(curve) => Self::of(&curve, counting),
                    Err(error) => Err(error),
                }
            }
        }

        #[$feature]
        impl<$($generics)* const BENDS: usize> Channel<$number, BENDS> {
            /// A servo with this curve on an output.
            ///
            /// # Errors
            /// If there is no room for its bends, or no whole count within its pulse range.
            pub const fn of(curve: &Curve, counting: Counting) -> Result<Self, ServoError> {
                channel!($number, BENDS, curve, counting)
            }
        }
    )*};
}

channel_while_compiling! {
    #[cfg(feature = "fixed16")] [] crate::Fixed16;
    #[cfg(feature = "fixed32")] [] crate::Fixed32;
    #[cfg(feature = "short32")] [] crate::Short32;
    #[cfg(any(feature = "float32", feature = "coarse"))]
    [M: crate::number::float::FloatMaths,] crate::number::float::Float<M>;
}

impl<N: Number> Channel<N> {
    /// Like `new`, for any number system, while running.
    ///
    /// # Errors
    /// Says which measure of the servo cannot be, or that no whole count lies within its pulse range.
    pub fn from_spec(spec: ServoSpec, counting: Counting) -> Result<Self, ServoError> {
        spec.curve().and_then(|curve| Self::from_curve(&curve, counting))
    }
}

impl<N: Number, const BENDS: usize> Channel<N, BENDS> {
    /// Like `of`, for any number system, while running.
    ///
    /// # Errors
    /// If there is no room for its bends, or no whole count within its pulse range.
    pub fn from_curve(curve: &Curve, counting: Counting) -> Result<Self, ServoError> {
        channel!(N, BENDS, curve, counting)
    }

    /// The counts that put the joint at `angle`, held within the range; monotone in the angle.
    #[inline]
    pub fn command(&self, angle: Angle<N>) -> Count {
        let piece = self.piece(angle);
        match piece.counts(angle) {
            Some(counts) => Count { counts, held: None },
            None => self.held(angle),
        }
    }

    /// The piece for an angle.
    #[inline(always)]
    fn piece(&self, angle: Angle<N>) -> &Piece<N> {
        let mut piece = &self.last;
        for earlier in self.before.iter().rev() {
            if angle.0 <= earlier.until {
                piece = earlier;
            }
        }
        piece
    }

    /// Counts that leave their piece: by rounding where two meet, or by leaving the range.
    #[cold]
    #[inline(never)]
    fn held(&self, angle: Angle<N>) -> Count {
        let piece = self.piece(angle);
        let wanted = i64::from(N::on_line(piece.line, angle.0));
        let (least, most) = (i64::from(piece.least), i64::from(piece.least) + i64::from(piece.span));
        let held = if wanted < i64::from(self.least) {
            Some(End::Least)
        } else if wanted > i64::from(self.most) {
            Some(End::Most)
        } else {
            None
        };
        Count { counts: wanted.max(least).min(most) as u32, held }
    }

    /// The least and the most counts that are ever commanded.
    pub const fn range(&self) -> [u32; 2] {
        [self.least, self.most]
    }
}

/// The counts of three channels, if none of them leaves its piece.
#[inline(always)]
pub(crate) fn three_within<N: Number, const BENDS: usize>(
    [hip, thigh, knee]: &[Channel<N, BENDS>; 3],
    [hip_angle, thigh_angle, knee_angle]: [Angle<N>; 3],
) -> Option<Counts> {
    let hip = hip.piece(hip_angle).counts(hip_angle)?;
    let thigh = thigh.piece(thigh_angle).counts(thigh_angle)?;
    let knee = knee.piece(knee_angle).counts(knee_angle)?;
    Some(Counts { counts: [hip, thigh, knee], held: PulsesHeld::NONE })
}

/// The counts of three channels.
pub(crate) fn three<N: Number, const BENDS: usize>(
    [hip, thigh, knee]: &[Channel<N, BENDS>; 3],
    [hip_angle, thigh_angle, knee_angle]: [Angle<N>; 3],
) -> Counts {
    let (hip, thigh, knee) = (hip.command(hip_angle), thigh.command(thigh_angle), knee.command(knee_angle));
    Counts {
        counts: [hip.counts, thigh.counts, knee.counts],
        held: PulsesHeld::of([hip.held, thigh.held, knee.held]),
    }
}
