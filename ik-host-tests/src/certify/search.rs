//! The worst box first: split until it gains no more.

use super::interval::Interval;
use super::leg::{Enclosed, Subject};
use super::{Ended, Proved};
use std::cmp::Ordering;
use std::collections::BinaryHeap;
use std::time::Instant;

/// A bound that is no more than this many times that of a single point in the worst box is narrow enough.
const NARROW: f64 = 1.02;
/// Boxes between two looks at the clock.
const TICK: u64 = 64;

struct Live {
    bound: f64,
    sides: [Interval; 3],
}

impl PartialEq for Live {
    fn eq(&self, other: &Self) -> bool {
        self.cmp(other) == Ordering::Equal
    }
}

impl Eq for Live {}

impl PartialOrd for Live {
    fn partial_cmp(&self, other: &Self) -> Option<Ordering> {
        Some(self.cmp(other))
    }
}

impl Ord for Live {
    fn cmp(&self, other: &Self) -> Ordering {
        self.bound.total_cmp(&other.bound)
    }
}

fn chosen(enclosed: Enclosed, together: bool) -> f64 {
    if together { enclosed.together_mm } else { enclosed.arithmetic_mm }
}

/// A bound on arithmetic, or on both together, over the work volume of a leg.
pub(super) fn search(subject: &Subject, together: bool, most: u64, until: Instant) -> Proved {
    let look = |sides: [Interval; 3]| Live { bound: chosen(subject.enclose(sides), together), sides };
    let mut live = BinaryHeap::from([look(subject.work())]);
    let (mut boxes, mut largest) = (1u64, 0.0f64);
    loop {
        let worst = live.peek().expect("the work volume is one box or more");
        let middle = worst.sides.map(|side| Interval::point(side.middle()));
        largest = largest.max(chosen(subject.enclose(middle), together));
        let ended = if worst.bound <= NARROW * largest {
            Ended::Narrow
        } else if boxes >= most {
            Ended::Boxes
        } else if boxes.is_multiple_of(TICK) && Instant::now() >= until {
            Ended::Time
        } else {
            let worst = live.pop().expect("it was just looked at");
            for half in halves(worst.sides) {
                // A part is no worse than the whole, whatever its own enclosure says.
                let part = look(half);
                live.push(Live { bound: part.bound.min(worst.bound), ..part });
                boxes += 1;
            }
            continue;
        };
        return Proved {
            mm: worst.bound,
            worst_mm: worst.sides.map(Interval::middle),
            box_mm: worst.sides.map(|side| side.high - side.low),
            boxes,
            ended,
        };
    }
}

/// Cut across its longest side.
fn halves(sides: [Interval; 3]) -> [[Interval; 3]; 2] {
    let length = |axis: usize| sides[axis].high - sides[axis].low;
    let axis = (1..3).fold(0, |longest, axis| if length(axis) > length(longest) { axis } else { longest });
    let middle = sides[axis].middle();
    let (mut below, mut above) = (sides, sides);
    below[axis].high = middle;
    above[axis].low = middle;
    [below, above]
}
