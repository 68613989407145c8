//! What a servo does, as it was measured: pulse against joint angle, straight or straight from point to point.
//!
//! All of it runs while compiling; firmware carries what a number system makes of it.

use super::{LEAST_US_PER_DEGREE, LONGEST_PULSE_US, MOST_US_PER_DEGREE, ServoError, ServoSpec, Turns};
use crate::const_math::magnitude;

/// The most points of a measured servo.
pub const MOST_POINTS: usize = 16;
const MOST_STRETCHES: usize = MOST_POINTS - 1;

/// A servo as it was measured: straight between the points.
///
/// ```
/// # #[cfg(feature = "fixed32")] {
/// use ik_core::{Fixed32, MeasuredServo, Pulse, Servo};
///
/// // A servo that is a little slower at the ends of its travel. Four points: two bends.
/// const KNEE: Servo<Fixed32, 2> = {
///     let measured = MeasuredServo {
///         points: &[[700.0, 2.5], [1100.0, 41.0], [1900.0, 115.0], [2300.0, 150.0]],
///         trim_us: 6.0,
///         pulse_us: [750.0, 2300.0],
///     };
///     let Ok(curve) = measured.curve() else { panic!("curve") };
///     let Ok(servo) = Servo::<Fixed32, 2>::of(&curve) else { panic!("servo") };
///     servo
/// };
/// assert!((KNEE.angle(Pulse::from_us(1106.0)).degrees() - 41.0).abs() < 1e-4);
/// assert!((KNEE.angle(Pulse::from_us(1506.0)).degrees() - 78.0).abs() < 1e-4);
/// # }
/// ```
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct MeasuredServo<'a> {
    /// Points [pulse in µs, joint angle in degrees]: 2 to 16, the pulses rising, the angles all rising or all falling.
    pub points: &'a [[f64; 2]],
    /// Added to every pulse: what this one servo's horn is off by, µs.
    pub trim_us: f64,
    /// The shortest and the longest pulse that are mechanically safe, µs. What lies beyond the measured points is not
    /// used either: nobody knows what the servo does there.
    pub pulse_us: [f64; 2],
}

/// A straight stretch of a curve: pulse = at + µs per turn · (angle − angle there).
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Stretch {
    /// A point on it.
    pub(crate) us: f64,
    pub(crate) turns: f64,
    pub(crate) us_per_turn: f64,
    /// The joint's angle at which it ends and the next begins.
    pub(crate) until_turns: f64,
    /// Its pulses, [shortest, longest].
    pub(crate) pulse_us: [f64; 2],
}

impl Stretch {
    /// Its line's pulse at the joint's zero, µs.
    pub(crate) const fn us_at_zero(&self) -> f64 {
        self.us - self.turns * self.us_per_turn
    }
}

/// A servo's pulse against its joint's angle, checked: from [`ServoSpec::curve`] or [`MeasuredServo::curve`].
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Curve {
    /// By rising angle of the joint; those from `count` on are not used.
    stretches: [Stretch; MOST_STRETCHES],
    count: usize,
    pulse_us: [f64; 2],
}

impl Curve {
    /// How many bends it has between its ends.
    pub const fn bends(&self) -> usize {
        self.count - 1
    }

    /// The pulses that are ever sent, [shortest, longest] in µs: the safe ones, and no more than was measured.
    pub const fn pulse_us(&self) -> [f64; 2] {
        self.pulse_us
    }

    /// The joint's angles at the ends of those pulses, [least, most] in degrees; of a straight curve they may lie beyond
    /// half a turn.
    pub const fn joint_deg(&self) -> [f64; 2] {
        let [shortest, longest] = self.pulse_us;
        let (first, last) = (self.stretch(0), self.stretch(self.count - 1));
        let (low, high) = if first.us_per_turn > 0.0 { (shortest, longest) } else { (longest, shortest) };
        [
            360.0 * (first.turns + (low - first.us) / first.us_per_turn),
            360.0 * (last.turns + (high - last.us) / last.us_per_turn),
        ]
    }

    /// Whether a longer pulse makes the joint's angle smaller.
    pub(crate) const fn falls(&self) -> bool {
        self.stretches[0].us_per_turn < 0.0
    }

    /// A stretch; the last one for what lies beyond.
    pub(crate) const fn stretch(&self, number: usize) -> Stretch {
        let last = self.count.saturating_sub(1);
        let number = if number < last { number } else { last };
        // So that the compiler sees it: the count never leaves 1 to the most.
        self.stretches[if number < MOST_STRETCHES { number } else { MOST_STRETCHES - 1 }]
    }
}

const fn range_is_possible([shortest, longest]: [f64; 2]) -> bool {
    // Each comparison is written so that NaN fails it.
    shortest >= 0.0 && longest <= LONGEST_PULSE_US && shortest <= longest
}

const fn gain_is_possible(us_per_degree: f64) -> bool {
    us_per_degree >= LEAST_US_PER_DEGREE && us_per_degree <= MOST_US_PER_DEGREE
}

impl ServoSpec {
    /// The curve of this servo: one straight stretch.
    ///
    /// # Errors
    /// Says which measure cannot be.
    pub const fn curve(&self) -> Result<Curve, ServoError> {
        let [shortest, longest] = self.pulse_us;
        let centre = self.centre_us + self.trim_us;
        if !range_is_possible(self.pulse_us) {
            return Err(ServoError::PulseRange);
        }
        if !(centre >= shortest && centre <= longest) {
            return Err(ServoError::Centre);
        }
        if !gain_is_possible(self.us_per_degree) {
            return Err(ServoError::Gain);
        }
        if !(magnitude(self.joint_at_centre_deg) <= 180.0) {
            return Err(ServoError::JointAtCentre);
        }
        let gain = if let Turns::With = self.turns { self.us_per_degree } else { -self.us_per_degree };
        let stretch = Stretch {
            us: centre,
            turns: self.joint_at_centre_deg / 360.0,
            us_per_turn: 360.0 * gain,
            until_turns: 0.5,
            pulse_us: self.pulse_us,
        };
        Ok(Curve { stretches: [stretch; MOST_STRETCHES], count: 1, pulse_us: self.pulse_us })
    }
}

impl MeasuredServo<'_> {
    /// The curve of this servo: a stretch between each point and the next. Stretches that lie outside the safe pulses
    /// altogether are left out.
    ///
    /// # Errors
    /// Says what cannot be.
    pub const fn curve(&self) -> Result<Curve, ServoError> {
        let points = self.points;
        if points.len() < 2 || points.len() > MOST_POINTS {
            return Err(ServoError::Points);
        }
        let (first, last) = (points[0], points[points.len() - 1]);
        let (first_us, last_us) = (first[0] + self.trim_us, last[0] + self.trim_us);
        if !range_is_possible(self.pulse_us) || !range_is_possible([first_us, last_us]) {
            return Err(ServoError::PulseRange);
        }
        let [safe_shortest, safe_longest] = self.pulse_us;
        let shortest = if first_us > safe_shortest { first_us } else { safe_shortest };
        let longest = if last_us < safe_longest { last_us } else { safe_longest };
        let falls = last[1] < first[1];
        let nothing =
            Stretch { us: 0.0, turns: 0.0, us_per_turn: 1.0, until_turns: 0.5, pulse_us: [0.0, 0.0] };
        let mut stretches = [nothing; MOST_STRETCHES];
        let mut count = 0;
        let mut number = 1;
        while number < points.len() && count < MOST_STRETCHES {
            // By rising angle of the joint.
            let at = if falls { points.len() - number } else { number };
            // Never; but so the compiler sees that no index is out of bounds.
            if at == 0 || at >= points.len() {
                return Err(ServoError::Points);
            }
            let (before, after) = (points[at - 1], points[at]);
            let (us, next_us) = (before[0] + self.trim_us, after[0] + self.trim_us);
            if !(magnitude(before[1]) <= 180.0 && magnitude(after[1]) <= 180.0) {
                return Err(ServoError::JointAtCentre);
            }
            let us_per_degree = (next_us - us) / (after[1] - before[1]);
            if !(next_us > us && gain_is_possible(if falls { -us_per_degree } else { us_per_degree })) {
                return Err(ServoError::Points);
            }
            if us < longest && next_us > shortest {
                stretches[count] = Stretch {
                    us,
                    turns: before[1] / 360.0,
                    us_per_turn: 360.0 * us_per_degree,
                    until_turns: if falls { before[1] } else { after[1] } / 360.0,
                    pulse_us: [
                        if us > shortest { us } else { shortest },
                        if next_us < longest { next_us } else { longest },
                    ],
                };
                count += 1;
            }
            number += 1;
        }
        if count == 0 {
            return Err(ServoError::Centre);
        }
        Ok(Curve { stretches, count, pulse_us: [shortest, longest] })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const BENT: [[f64; 2]; 4] = [[700.0, 2.5], [1100.0, 41.0], [1900.0, 115.0], [2300.0, 150.0]];

    fn curve(points: &[[f64; 2]], trim_us: f64, pulse_us: [f64; 2]) -> Result<Curve, ServoError> {
        MeasuredServo { points, trim_us, pulse_us }.curve()
    }

    #[test]
    fn a_curve_ends_where_its_points_or_the_safe_pulses_end() {
        let whole = curve(&BENT, 0.0, [500.0, 2500.0]).expect("a curve");
        assert_eq!((whole.bends(), whole.pulse_us(), whole.joint_deg()), (2, [700.0, 2300.0], [2.5, 150.0]));
        let [least, most] = curve(&BENT, 10.0, [1010.0, 1910.0]).expect("a curve").joint_deg();
        assert!(
            (least - (2.5 + 38.5 * 0.75)).abs() < 1e-12 && (most - 115.0).abs() < 1e-12,
            "{least} {most}"
        );
        // What lies outside the safe pulses is left out.
        assert_eq!(curve(&BENT, 10.0, [1110.0, 1910.0]).expect("a curve").bends(), 0);
    }

    #[test]
    fn a_falling_curve_is_told_from_its_least_angle_on() {
        let falling = BENT.map(|[us, degrees]| [us, -degrees]);
        let curve = curve(&falling, 0.0, [500.0, 2500.0]).expect("a curve");
        assert_eq!(curve.joint_deg(), [-150.0, -2.5]);
        assert!(curve.falls());
        assert_eq!(curve.stretch(0).pulse_us, [1900.0, 2300.0]);
    }

    #[test]
    fn a_straight_curve_is_what_its_measures_say() {
        let curve = ServoSpec::COMMON.curve().expect("a curve");
        let [least, most] = curve.joint_deg();
        assert!((least + 45.0).abs() < 1e-12 && (most - 45.0).abs() < 1e-12, "{least} {most}");
        assert_eq!(curve.bends(), 0);
    }

    #[test]
    fn points_that_cannot_be_are_refused() {
        let nan = f64::NAN;
        let wide = [500.0, 2500.0];
        let refused = |points: &[[f64; 2]], pulse_us| curve(points, 0.0, pulse_us).expect_err("it cannot be");
        assert_eq!(refused(&BENT[..1], wide), ServoError::Points);
        assert_eq!(refused(&[[1000.0, 0.0]; 17], wide), ServoError::Points);
        assert_eq!(refused(&[[1000.0, 0.0], [1000.0, 10.0]], wide), ServoError::Points);
        assert_eq!(refused(&[[1000.0, 0.0], [1200.0, 10.0], [1100.0, 20.0]], wide), ServoError::Points);
        assert_eq!(refused(&[[1000.0, 0.0], [1200.0, 20.0], [1400.0, 10.0]], wide), ServoError::Points);
        assert_eq!(refused(&[[1000.0, 0.0], [1200.0, 0.0]], wide), ServoError::Points);
        assert_eq!(refused(&[[1000.0, 0.0], [1200.0, nan]], wide), ServoError::JointAtCentre);
        assert_eq!(refused(&[[1000.0, 0.0], [1200.0, 181.0]], wide), ServoError::JointAtCentre);
        assert_eq!(refused(&[[nan, 0.0], [1200.0, 10.0]], wide), ServoError::PulseRange);
        assert_eq!(refused(&BENT, [nan, 2000.0]), ServoError::PulseRange);
        assert_eq!(refused(&BENT, [2400.0, 2500.0]), ServoError::Centre);
        assert_eq!(curve(&BENT, nan, wide).expect_err("it cannot be"), ServoError::PulseRange);
    }
}
