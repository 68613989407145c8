//! The stream of foot targets: first the awkward ones, then ordinary and far ones at random.

use core::fmt;

use ik_core::Foot;

use crate::numbers::Bits;

/// How many targets there are in the stream.
pub const TARGETS: u32 = AWKWARD.len() as u32 + AT_RANDOM;

const AT_RANDOM: u32 = 400;

/// A foot target in a leg's frame (x forward, y outboard, z up), the same for every number system.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Target([Coordinate; 3]);

/// One coordinate of it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Coordinate {
    /// Steps of 1/64 mm: exact in every number system.
    Steps(i32),
    /// The greatest finite length there is.
    Greatest,
    /// The least.
    Least,
    /// Infinity; in fixed point, which has none, the greatest length.
    Infinite,
    /// NaN; in fixed point, which has none, the least length.
    NotANumber,
}

impl Coordinate {
    pub(crate) const STEPS_PER_MM: i32 = 64;
}

impl Target {
    pub(crate) fn foot<N: Bits>(self) -> Foot<N> {
        let [x, y, z] = self.0.map(N::coordinate);
        Foot::new(x, y, z)
    }
}

impl fmt::Display for Target {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let [x, y, z] = self.0;
        write!(f, "({x}, {y}, {z}) mm")
    }
}

impl fmt::Display for Coordinate {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Steps(steps) => write!(f, "{}", f64::from(*steps) / f64::from(Self::STEPS_PER_MM)),
            Self::Greatest => f.write_str("the greatest length"),
            Self::Least => f.write_str("the least length"),
            Self::Infinite => f.write_str("infinite"),
            Self::NotANumber => f.write_str("NaN"),
        }
    }
}

/// All targets, in order; the same at every call and on every machine.
pub(crate) fn stream() -> impl Iterator<Item = Target> {
    AWKWARD.into_iter().chain(at_random())
}

use Coordinate::{Greatest, Infinite, Least, NotANumber, Steps};

/// A whole number of 1/64 mm.
const fn at(x: i32, y: i32, z: i32) -> Target {
    Target([Steps(x), Steps(y), Steps(z)])
}

const MM: i32 = Coordinate::STEPS_PER_MM;

/// Where a solver is tried hardest. "Orchard": hip offset 31.5 mm, thigh 94 mm, shank 107 mm, zero pose
/// hanging down. "Culvert": coxa 42.5 mm, femur 71 mm, tibia 118.4 mm, zero pose stretched outboard.
const AWKWARD: [Target; 44] = [
    // No number before any pose was solved, in each coordinate.
    Target([NotANumber, Steps(0), Steps(0)]),
    Target([Steps(0), NotANumber, Steps(0)]),
    Target([Steps(0), Steps(0), NotANumber]),
    // The origin; on the first joint's axis, of either hip.
    at(0, 0, 0),
    at(60 * MM, 0, 0),
    at(-120 * MM, 0, 0),
    at(201 * MM, 0, 0),
    at(230 * MM, 0, 0),
    at(0, 0, -100 * MM),
    at(0, 0, 100 * MM),
    // One step beside it.
    at(60 * MM, 1, 0),
    at(60 * MM, 0, -1),
    at(1, 0, -100 * MM),
    at(0, -1, -100 * MM),
    // Orchard: on and within the cylinder that the offset keeps free.
    at(0, 2016, 0),
    at(50 * MM, 0, -2016),
    at(50 * MM, 0, 2016),
    at(50 * MM, -2016, 0),
    at(40 * MM, 2016, -1),
    at(0, 10 * MM, 5 * MM),
    // Orchard: straight, one step short, one step beyond; folded, one step on either side.
    at(0, 2016, -201 * MM),
    at(0, 2016, -201 * MM + 1),
    at(0, 2016, -201 * MM - 1),
    at(0, 2016, -13 * MM),
    at(0, 2016, -13 * MM - 1),
    at(0, 2016, -13 * MM + 1),
    at(0, 2016, -5 * MM),
    // Culvert: on the femur's joint; straight and folded, one step on either side.
    at(0, 2720, 0),
    at(0, 2720, 1),
    at(0, 14841, 0),
    at(0, 14842, 0),
    at(0, 14843, 0),
    at(0, 5753, 0),
    at(0, 5754, 0),
    at(0, 2720, 3034),
    // Behind the hip, above it.
    at(0, -100 * MM, -50 * MM),
    at(10 * MM, 120 * MM, 150 * MM),
    // Far, farther, as far as there is; no number again, now with a pose to hold.
    at(0, 300 * MM, -300 * MM),
    at(-30_000 * MM, 30_000 * MM, -30_000 * MM),
    Target([Greatest, Steps(0), Steps(0)]),
    Target([Greatest, Greatest, Least]),
    Target([Steps(0), Least, Least]),
    Target([Infinite, Steps(64), Steps(-6400)]),
    Target([NotANumber, Infinite, Least]),
];

/// By turns: where either walker's foot works, anywhere in reach and somewhat beyond, near the hip.
fn at_random() -> impl Iterator<Item = Target> {
    const BOXES: [[[i32; 2]; 3]; 4] = [
        [[-60, 60], [0, 70], [-180, -110]],
        [[-60, 60], [90, 185], [-125, -30]],
        [[-260, 260], [-260, 260], [-260, 260]],
        [[-200, 200], [-45, 45], [-45, 45]],
    ];
    // A generator whose sequence is the same on every machine; the seed is any number.
    let mut random = oorandom::Rand32::new(2026);
    let mut within = move |[least, most]: [i32; 2]| {
        let steps = (most - least) * MM + 1;
        Steps(least * MM + random.rand_range(0..steps as u32) as i32)
    };
    (0..AT_RANDOM).map(move |number| Target(BOXES[number as usize % BOXES.len()].map(&mut within)))
}
