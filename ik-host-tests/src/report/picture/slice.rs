//! Foot errors over a slice of the work volume, cell by cell.

use crate::machine::Machine;
use crate::sheet::{HipShape, LegKind};
use crate::survey::{Judge, Measured};
use ik_core::Outcome;
use rayon::prelude::*;

/// About how many cells a slice has, and the most along a side.
const CELLS: f64 = 3600.0;
const MOST_ALONG: f64 = 120.0;
/// Points computed along each side of a cell, in every leg of the kind.
pub(super) const POINTS: usize = 2;

/// What is cut, and where.
pub(super) struct Slice {
    /// The axis across, and up: 0 for x, 1 for y, 2 for z.
    pub(super) axes: [usize; 2],
    /// The axis that the slice cuts, and where, mm.
    pub(super) cut: (usize, f64),
    /// Ranges across and up, mm.
    pub(super) ranges: [[f64; 2]; 2],
    /// Cells across and up.
    pub(super) counts: [usize; 2],
    /// Row by row from below.
    pub(super) cells: Vec<Cell>,
}

/// A cell of a slice.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub(super) struct Cell {
    /// The largest error of its points that are reached as asked; `None` if none is.
    pub(super) largest_mm: Option<f64>,
    /// Whether some point is not.
    pub(super) unreached: bool,
}

/// A slice of the work volume through a foot: x and z of a roll-hip leg, y and z of a yaw-hip leg.
pub(super) fn through(
    foot: [f64; 3],
    kind: &LegKind,
    (machine, judge, legs): (&dyn Machine, &Judge, usize),
    error: impl Fn(&Measured) -> Option<f64> + Sync,
) -> Slice {
    let (across, cut) = match kind.hip {
        HipShape::Roll => (0, 1),
        HipShape::Yaw => (1, 0),
    };
    let axes = [across, 2];
    let work = [kind.work.x_mm, kind.work.y_mm, kind.work.z_mm];
    let ranges = axes.map(|axis| work[axis]);
    let [width, height] = ranges.map(|[least, most]| most - least);
    let side = (width * height / CELLS).sqrt();
    let counts = [width, height].map(|length| (length / side).round().clamp(1.0, MOST_ALONG) as usize);
    let mut slice = Slice {
        axes,
        cut: (cut, foot[cut].max(work[cut][0]).min(work[cut][1])),
        ranges,
        counts,
        cells: vec![Cell::default(); counts[0] * counts[1]],
    };
    let cells = (0..slice.cells.len())
        .into_par_iter()
        .map(|index| {
            let mut cell = Cell::default();
            for point in slice.points(index) {
                cell.add_all(point, (machine, judge, legs), &error);
            }
            cell
        })
        .collect();
    slice.cells = cells;
    // The foot itself too, so that the map shows what the survey found there.
    let at = slice.cell_of(foot);
    slice.cells[at].add_all(foot, (machine, judge, legs), &error);
    slice
}

impl Slice {
    /// The largest error in it, mm.
    pub(super) fn largest_mm(&self) -> f64 {
        self.cells.iter().filter_map(|cell| cell.largest_mm).fold(0.0, f64::max)
    }

    /// Where a cell begins or the one before it ends, mm.
    pub(super) fn edge(&self, side: usize, number: usize) -> f64 {
        let [least, most] = self.ranges[side];
        least + (most - least) * number as f64 / self.counts[side] as f64
    }

    fn points(&self, index: usize) -> impl Iterator<Item = [f64; 3]> {
        let cell = [index % self.counts[0], index / self.counts[0]];
        (0..POINTS * POINTS).map(move |number| {
            let inner = [number % POINTS, number / POINTS];
            let mut point = [0.0; 3];
            point[self.cut.0] = self.cut.1;
            for side in 0..2 {
                let from = self.edge(side, cell[side]);
                let step = self.edge(side, cell[side] + 1) - from;
                point[self.axes[side]] = from + step * (inner[side] as f64 + 0.5) / POINTS as f64;
            }
            point
        })
    }

    fn cell_of(&self, foot: [f64; 3]) -> usize {
        let place = |side: usize| {
            let [least, most] = self.ranges[side];
            let share = (foot[self.axes[side]] - least) / (most - least);
            ((share * self.counts[side] as f64) as usize).min(self.counts[side] - 1)
        };
        place(0) + place(1) * self.counts[0]
    }
}

impl Cell {
    fn add_all(
        &mut self,
        point: [f64; 3],
        (machine, judge, legs): (&dyn Machine, &Judge, usize),
        error: &impl Fn(&Measured) -> Option<f64>,
    ) {
        for leg in 0..legs {
            let measured = machine.answer(leg, point).map(|answered| judge.measure(leg, &answered));
            let reached = measured.filter(|m| m.outcome == Outcome::Reached && !m.pulse_held);
            match reached.and_then(|measured| error(&measured)) {
                Some(mm) => self.largest_mm = Some(self.largest_mm.map_or(mm, |largest| largest.max(mm))),
                None => self.unreached = true,
            }
        }
    }
}
