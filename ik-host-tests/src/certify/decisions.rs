//! What a comparison comes to when a box of targets leaves it open: both, one after the other.
//!
//! The solver is run again and again over the same box. Each run follows the decisions of the last one up to the last open
//! one that has not gone both ways, and goes the other way there. What a run decides against some exact values of the box,
//! because only rounding can have led there, is noted: it is by so much that the foot may be judged by the wrong side.

use std::cell::RefCell;

/// What a run decided although exact values of the box say otherwise.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub(super) struct Misjudged {
    /// The error of a square, mm².
    pub square_mm2: f64,
    /// The error of a length, mm.
    pub length_mm: f64,
    /// The errors of hip and thigh against a limit, radians.
    pub turns_rad: [f64; 2],
    /// The error of the knee against a limit, radians.
    pub knee_rad: f64,
    /// What a limit makes of the knee against the triangle that it shares with the thigh, radians.
    pub knee_own_rad: f64,
}

#[derive(Debug, Default)]
struct Run {
    /// The open decisions so far, and whether each has gone both ways.
    open: Vec<(bool, bool)>,
    next: usize,
    misjudged: Misjudged,
}

thread_local! {
    static RUN: RefCell<Run> = RefCell::default();
}

/// Runs `solve` once for every way in which its open comparisons can go; `false` if there are more than `most`.
pub(super) fn every_way(most: usize, mut solve: impl FnMut(&dyn Fn() -> Misjudged)) -> bool {
    RUN.with_borrow_mut(|run| *run = Run::default());
    for _ in 0..most {
        RUN.with_borrow_mut(|run| {
            run.next = 0;
            run.misjudged = Misjudged::default();
        });
        solve(&|| RUN.with_borrow(|run| run.misjudged));
        let done = RUN.with_borrow_mut(|run| {
            run.open.truncate(run.next);
            while run.open.last().is_some_and(|(_, both)| *both) {
                run.open.pop();
            }
            run.open.last_mut().map(|last| *last = (!last.0, true)).is_none()
        });
        if done {
            return true;
        }
    }
    false
}

/// A comparison that can come out as given.
pub(super) fn decide(can_be_true: bool, can_be_false: bool) -> bool {
    if !(can_be_true && can_be_false) {
        return can_be_true;
    }
    RUN.with_borrow_mut(|run| {
        let place = run.next;
        run.next += 1;
        if place == run.open.len() {
            run.open.push((true, false));
        }
        run.open[place].0
    })
}

/// Notes what was misjudged.
pub(super) fn note(note: impl FnOnce(&mut Misjudged)) {
    RUN.with_borrow_mut(|run| note(&mut run.misjudged));
}
