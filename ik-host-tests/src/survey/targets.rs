//! The feet that a survey asks for.

use super::Plan;
use super::edges;
use crate::sheet::{LegKind, WorkBox};
use rand::{Rng, RngExt, SeedableRng};
use rand_xoshiro::Xoshiro256PlusPlus;

/// The targets of a kind of leg: edges first, then a grid, then random ones. Any of them can be made from its index
/// alone, so that a survey is the same on any number of cores.
#[derive(Debug, Clone)]
pub struct Targets {
    work: WorkBox,
    edges: Vec<[f64; 3]>,
    /// Points of the grid along each side of the work volume.
    side: u64,
    count: u64,
    seed: u64,
}

/// The share of the targets that go to edges, at most, and how many at most, because they are found by trying.
const EDGE_SHARE: u64 = 8;
const MOST_EDGES: u64 = 150_000;
/// The share that goes to the grid.
const GRID_SHARE: u64 = 4;

impl Targets {
    /// For a kind of leg.
    pub fn of(kind: &LegKind, plan: Plan) -> Self {
        let mut random = Xoshiro256PlusPlus::seed_from_u64(plan.seed);
        let most = usize::try_from((plan.targets / EDGE_SHARE).min(MOST_EDGES)).unwrap_or(usize::MAX);
        let edges = edges::of(kind, most, &mut random);
        let left = plan.targets.saturating_sub(edges.len() as u64);
        // The largest cube that fits the grid's share.
        let mut side = 0;
        while (side + 1) * (side + 1) * (side + 1) <= left / GRID_SHARE {
            side += 1;
        }
        Self { work: kind.work.clone(), edges, side, count: plan.targets, seed: plan.seed }
    }

    /// How many there are.
    pub const fn count(&self) -> u64 {
        self.count
    }

    /// How many of them are edges.
    pub fn edges(&self) -> u64 {
        self.edges.len() as u64
    }

    /// How many of them are points of the grid.
    pub const fn grid(&self) -> u64 {
        self.side * self.side * self.side
    }

    /// Targets from `first` on, at most `most`: index, foot in mm, and whether it stands for the work volume (edges
    /// do not: they are where it is worst).
    pub fn chunk(&self, first: u64, most: u64) -> impl Iterator<Item = (u64, [f64; 3], bool)> + '_ {
        // A stream of its own for every chunk, whatever order they are taken in.
        let mut random =
            Xoshiro256PlusPlus::seed_from_u64(self.seed ^ first.wrapping_mul(0x9E37_79B9_7F4A_7C15));
        let (edges, grid) = (self.edges(), self.grid());
        (first..self.count.min(first.saturating_add(most))).map(move |index| {
            if index < edges {
                (index, self.edges[index as usize], false)
            } else if index < edges + grid {
                (index, self.on_grid(index - edges), true)
            } else {
                (index, within(&self.work, &mut random), true)
            }
        })
    }

    /// The corners, edges and faces of the work volume belong to the grid.
    fn on_grid(&self, number: u64) -> [f64; 3] {
        let place = |range: [f64; 2], step: u64| {
            let share = if self.side < 2 { 0.5 } else { step as f64 / (self.side - 1) as f64 };
            range[0] + (range[1] - range[0]) * share
        };
        let side = self.side;
        [
            place(self.work.x_mm, number % side),
            place(self.work.y_mm, number / side % side),
            place(self.work.z_mm, number / (side * side)),
        ]
    }
}

/// A random point of the work volume.
fn within(work: &WorkBox, random: &mut impl Rng) -> [f64; 3] {
    [work.x_mm, work.y_mm, work.z_mm].map(|[least, most]| least + (most - least) * random.random::<f64>())
}

/// Whether a point lies in the work volume.
pub(super) fn is_within(work: &WorkBox, [x, y, z]: [f64; 3]) -> bool {
    let inside = |v: f64, [least, most]: [f64; 2]| least <= v && v <= most;
    inside(x, work.x_mm) && inside(y, work.y_mm) && inside(z, work.z_mm)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::sheet;

    #[test]
    fn targets_are_the_same_however_they_are_cut_and_lie_in_the_work_volume() {
        for demo in sheet::DEMOS {
            let robot = sheet::demo(demo.name).unwrap();
            let targets = Targets::of(&robot.kinds[0], Plan { targets: 20_000, seed: 3 });
            let all = |chunk: u64| {
                (0..20_000u64.div_ceil(chunk))
                    .flat_map(|k| targets.chunk(k * chunk, chunk))
                    .collect::<Vec<_>>()
            };
            assert_eq!(all(8192), all(8192));
            let whole = all(8192);
            assert_eq!(whole.len(), 20_000);
            assert!(whole.iter().enumerate().all(|(i, (index, ..))| i as u64 == *index));
            assert!(whole.iter().all(|(_, target, _)| is_within(&robot.kinds[0].work, *target)));
            // The orchard walker's work volume keeps clear of nearly every edge.
            assert!(targets.edges() > 10 && targets.grid() > 1000, "{} {}", targets.edges(), targets.grid());
        }
    }
}
