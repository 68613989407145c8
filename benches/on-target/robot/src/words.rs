//! How the words are laid out, written and read: little-endian, an `f64` as two words, the low one first.

/// The first word: what follows are words of this layout.
pub const MAGIC: u32 = 0x7065_6732;
/// The most points of a measured servo.
pub const POINTS: usize = ik_core::servo::MOST_POINTS;
/// Where the targets begin: three words each, the lengths of a foot on the body's frame, as the number system stores
/// them.
pub const TARGETS_AT: usize = 288;
/// So that all lie within 128 KB.
pub const MOST_TARGETS: usize = (128 * 1024 / 4 - TARGETS_AT) / 3;

/// What comes first.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Header {
    /// How many targets there are.
    pub targets: u32,
    /// The targets whose answers are told in full, from the first to before the second.
    pub tell: [u32; 2],
}

/// A leg, its place on the body, its servos and its output, as a sheet has them.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LegWords {
    /// Hip offset or coxa, thigh or femur, shank or tibia, mm.
    pub measures_mm: [f64; 3],
    /// Whether the knee bends backward or down.
    pub bends_back: bool,
    /// [least, most] of hip, thigh, knee, degrees.
    pub range_deg: [[f64; 2]; 3],
    /// The first joint's axis on the body, mm.
    pub at_mm: [f64; 3],
    /// Whether the leg is on the right.
    pub right: bool,
    /// Hip, thigh, knee.
    pub servos: [ServoWords; 3],
    /// Whether the servos hang on an expander, not on a timer.
    pub expander: bool,
    /// Its clock, Hz.
    pub clock_hz: u32,
    /// What it is divided by; 0 of a timer: the least with which a frame fits.
    pub divider: u32,
    /// Width of the counter, or resolution of the expander.
    pub bits: u32,
    /// Servo frames a second.
    pub frame_hz: f64,
}

/// A servo.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ServoWords {
    /// Centre, joint's angle there, gain; of a measured servo nothing.
    pub straight: [f64; 3],
    /// Whether a longer pulse makes the joint's angle smaller.
    pub against: bool,
    pub trim_us: f64,
    /// The shortest and the longest safe pulse, us.
    pub pulse_us: [f64; 2],
    /// How many points were measured; 0 of a straight servo.
    pub points: u32,
    /// Pulse, us, and joint's angle, degrees.
    pub measured: [[f64; 2]; POINTS],
}

/// Takes words.
pub trait Writer {
    /// Takes one.
    fn word(&mut self, word: u32);

    /// Takes some.
    fn words<const COUNT: usize>(&mut self, words: [u32; COUNT]) {
        for word in words {
            self.word(word);
        }
    }

    /// Takes numbers.
    fn numbers<const COUNT: usize>(&mut self, numbers: [f64; COUNT]) {
        for number in numbers {
            self.number(number);
        }
    }

    /// Takes a number.
    fn number(&mut self, number: f64) {
        let bits = number.to_bits();
        self.word(bits as u32);
        self.word((bits >> 32) as u32);
    }
}

/// Gives words back.
#[derive(Debug, Clone)]
pub struct Reader<'a>(&'a [u32]);

impl<'a> Reader<'a> {
    /// Of all words there are.
    pub fn new(words: &'a [u32]) -> Self {
        Self(words)
    }

    /// The next word; 0 behind the last.
    fn word(&mut self) -> u32 {
        match self.0 {
            [first, rest @ ..] => {
                self.0 = rest;
                *first
            }
            [] => 0,
        }
    }

    fn number(&mut self) -> f64 {
        let low = u64::from(self.word());
        f64::from_bits(low | u64::from(self.word()) << 32)
    }

    fn numbers<const COUNT: usize>(&mut self) -> [f64; COUNT] {
        core::array::from_fn(|_| self.number())
    }
}

impl Header {
    /// As words.
    pub fn write(&self, to: &mut impl Writer) {
        to.words([MAGIC, self.targets, self.tell[0], self.tell[1]]);
    }

    /// From words; `None` if they are of another layout.
    pub fn read(from: &mut Reader<'_>) -> Option<Self> {
        let is_ours = from.word() == MAGIC;
        let header = Self { targets: from.word(), tell: [from.word(), from.word()] };
        (is_ours && header.targets as usize <= MOST_TARGETS).then_some(header)
    }
}

impl LegWords {
    /// As words.
    pub fn write(&self, to: &mut impl Writer) {
        to.numbers(self.measures_mm);
        to.word(self.bends_back.into());
        for range in self.range_deg {
            to.numbers(range);
        }
        to.numbers(self.at_mm);
        to.word(self.right.into());
        for servo in &self.servos {
            to.numbers(servo.straight);
            to.word(servo.against.into());
            to.number(servo.trim_us);
            to.numbers(servo.pulse_us);
            to.word(servo.points);
            for point in servo.measured.iter().take(servo.points as usize) {
                to.numbers(*point);
            }
        }
        to.word(self.expander.into());
        to.words([self.clock_hz, self.divider, self.bits]);
        to.number(self.frame_hz);
    }

    /// From words.
    pub fn read(from: &mut Reader<'_>) -> Self {
        Self {
            measures_mm: from.numbers(),
            bends_back: from.word() != 0,
            range_deg: core::array::from_fn(|_| from.numbers()),
            at_mm: from.numbers(),
            right: from.word() != 0,
            servos: core::array::from_fn(|_| ServoWords::read(from)),
            expander: from.word() != 0,
            clock_hz: from.word(),
            divider: from.word(),
            bits: from.word(),
            frame_hz: from.number(),
        }
    }
}

impl ServoWords {
    fn read(from: &mut Reader<'_>) -> Self {
        let mut servo = Self {
            straight: from.numbers(),
            against: from.word() != 0,
            trim_us: from.number(),
            pulse_us: from.numbers(),
            points: from.word(),
            measured: [[0.0; 2]; POINTS],
        };
        for point in servo.measured.iter_mut().take(servo.points as usize) {
            *point = from.numbers();
        }
        servo
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    impl Writer for Vec<u32> {
        fn word(&mut self, word: u32) {
            self.push(word);
        }
    }

    #[test]
    fn what_is_written_is_read_back_and_leaves_room_for_the_targets() {
        let servo = |points: usize| ServoWords {
            straight: [points as f64, 0.1, 0.2],
            against: points > 2,
            trim_us: -3.5,
            pulse_us: [600.0, 2400.0],
            points: points as u32,
            measured: core::array::from_fn(|n| if n < points { [n as f64, -0.5] } else { [0.0; 2] }),
        };
        let leg = LegWords {
            measures_mm: [31.5, 94.0, 107.25],
            bends_back: true,
            range_deg: [[-1.0, 1.5], [-2.0, 2.5], [3.0, 3.5]],
            at_mm: [120.0, -52.0, 0.125],
            right: true,
            servos: [servo(POINTS), servo(POINTS), servo(POINTS)],
            expander: true,
            clock_hz: 48_000_000,
            divider: 15,
            bits: 16,
            frame_hz: 50.0,
        };
        let header = Header { targets: 7, tell: [2, 5] };
        let mut words = Vec::new();
        header.write(&mut words);
        leg.write(&mut words);
        assert!(words.len() <= TARGETS_AT, "{}", words.len());
        let mut reader = Reader::new(&words);
        assert_eq!(Header::read(&mut reader), Some(header));
        assert_eq!(LegWords::read(&mut reader), leg);
        assert_eq!(Header::read(&mut reader), None);
    }
}
