//! Errors added up, the same in whatever order.

use super::measure::Measured;
use hdrhistogram::Histogram;
use ik_core::Outcome;

/// Histograms and sums count in units of 1e-12 mm: integers, so that a sum does not depend on its order.
const UNITS_PER_MM: f64 = 1e12;
/// The largest error that a histogram tells apart, mm.
const MOST_MM: f64 = 1e5;
/// Significant decimal digits of a percentile.
const DIGITS: u8 = 2;

/// The largest value, and the first target at which it was found.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Largest<T> {
    pub(super) value: f64,
    pub(super) index: u64,
    pub(super) at: T,
}

impl<T: Copy> Largest<T> {
    fn later(this: Option<Self>, that: Self) -> Self {
        match this {
            // Of equals the first target, whatever order they are met in.
            Some(this)
                if this.value > that.value || (this.value == that.value && this.index <= that.index) =>
            {
                this
            }
            _ => that,
        }
    }
}

/// One sort of error.
#[derive(Debug, Clone)]
pub(super) struct Spread {
    pub(super) largest: Option<Largest<[f64; 3]>>,
    sum: u128,
    pub(super) histogram: Histogram<u64>,
}

impl Default for Spread {
    fn default() -> Self {
        Self {
            largest: None,
            sum: 0,
            histogram: Histogram::new_with_bounds(1, (MOST_MM * UNITS_PER_MM) as u64, DIGITS)
                .expect("constant bounds are in order"),
        }
    }
}

impl Spread {
    fn add(&mut self, index: u64, at: [f64; 3], mm: f64) {
        // NaN would vanish in a histogram: it counts as the largest error there is.
        let mm = if mm.is_nan() { f64::INFINITY } else { mm };
        let found = Largest { value: mm, index, at };
        self.largest = Some(Largest::later(self.largest, found));
        let units = (mm * UNITS_PER_MM) as u64;
        self.sum += u128::from(units);
        self.histogram.saturating_record(units);
    }

    fn merge(&mut self, other: Self) {
        if let Some(theirs) = other.largest {
            self.largest = Some(Largest::later(self.largest, theirs));
        }
        self.sum += other.sum;
        self.histogram.add(&other.histogram).expect("both have the same bounds");
    }

    pub(super) fn mean_mm(&self) -> f64 {
        self.sum as f64 / self.histogram.len().max(1) as f64 / UNITS_PER_MM
    }

    /// The error that this share of the targets stays within, mm; never more than the largest.
    pub(super) fn quantile_mm(&self, share: f64) -> f64 {
        let largest = self.largest.map_or(0.0, |largest| largest.value);
        (self.histogram.value_at_quantile(share) as f64 / UNITS_PER_MM).min(largest)
    }
}

/// What came of the targets in one number system.
#[derive(Debug, Clone, Default)]
pub(super) struct Tally {
    pub(super) arithmetic: Spread,
    pub(super) pulse: Spread,
    pub(super) together: Spread,
    /// Radians; which joint, and the foot.
    pub(super) joint: Option<Largest<(usize, [f64; 3])>>,
    pub(super) clamping: Option<Largest<[f64; 3]>>,
    pub(super) reached: u64,
    pub(super) moved: u64,
    pub(super) held: u64,
    pub(super) not_finite: u64,
    pub(super) pulse_held: u64,
    /// Targets that stand for the work volume, and those of them that were not reached.
    pub(super) inner: u64,
    pub(super) inner_unreached: u64,
}

impl Tally {
    pub(super) fn add(&mut self, index: u64, inner: bool, measured: &Measured) {
        let at = measured.foot_mm;
        self.arithmetic.add(index, at, measured.arithmetic_mm);
        if let (Some(pulse), Some(together)) = (measured.pulse_mm, measured.together_mm) {
            self.pulse.add(index, at, pulse);
            self.together.add(index, at, together);
        }
        if let Some((value, joint)) = measured.joint {
            self.joint = Some(Largest::later(self.joint, Largest { value, index, at: (joint, at) }));
        }
        let clamping = Largest { value: measured.clamping_mm, index, at };
        self.clamping = Some(Largest::later(self.clamping, clamping));
        match measured.outcome {
            Outcome::Reached => self.reached += 1,
            Outcome::Moved => self.moved += 1,
            Outcome::Held(_) => self.held += 1,
            Outcome::NotFinite => self.not_finite += 1,
        }
        self.pulse_held += u64::from(measured.pulse_held);
        self.inner += u64::from(inner);
        self.inner_unreached +=
            u64::from(inner && (measured.outcome != Outcome::Reached || measured.pulse_held));
    }

    pub(super) fn merge(&mut self, other: Self) {
        self.arithmetic.merge(other.arithmetic);
        self.pulse.merge(other.pulse);
        self.together.merge(other.together);
        if let Some(theirs) = other.joint {
            self.joint = Some(Largest::later(self.joint, theirs));
        }
        if let Some(theirs) = other.clamping {
            self.clamping = Some(Largest::later(self.clamping, theirs));
        }
        self.reached += other.reached;
        self.moved += other.moved;
        self.held += other.held;
        self.not_finite += other.not_finite;
        self.pulse_held += other.pulse_held;
        self.inner += other.inner;
        self.inner_unreached += other.inner_unreached;
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_tally_does_not_depend_on_the_order() {
        let errors = [3e-6, 1e-3, 1e-3, 0.0, 7e-9];
        let spread = |order: &[usize]| {
            order.iter().fold(Spread::default(), |mut spread, i| {
                spread.add(*i as u64, [*i as f64; 3], errors[*i]);
                spread
            })
        };
        let (one, two) = (spread(&[0, 1, 2, 3, 4]), spread(&[4, 2, 0, 1, 3]));
        assert_eq!(one.largest, two.largest);
        assert_eq!(one.largest.unwrap().index, 1);
        assert_eq!(one.mean_mm().to_bits(), two.mean_mm().to_bits());
        let mut halves = spread(&[4, 2]);
        halves.merge(spread(&[3, 1, 0]));
        assert_eq!(halves.largest, one.largest);
        assert_eq!(halves.quantile_mm(0.5).to_bits(), one.quantile_mm(0.5).to_bits());
    }

    #[test]
    fn a_nan_is_the_largest_error_there_is() {
        let mut spread = Spread::default();
        spread.add(0, [0.0; 3], f64::NAN);
        spread.add(1, [0.0; 3], 1.0);
        assert_eq!(spread.largest.unwrap().value, f64::INFINITY);
    }
}
