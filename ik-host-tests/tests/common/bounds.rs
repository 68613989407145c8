//! What each number system promises, as it was measured.
//!
//! The property tests never find more. `property_round_trip.rs` and `property_servo.rs` besides find more than half
//! of the bounds of foot, angle and servo in fixed sweeps, so that these stay no larger than they need be; what they
//! find at most, over three million targets in each number system, is printed by
//! `TOEHOLD_LONG=1 cargo test --release -p ik-host-tests --test property_round_trip -- --nocapture`:
//!
//! | | own foot | foot | angle, rad |
//! | --- | --- | --- | --- |
//! | float32 | 8.7e-7 | 7.5e-7 | 5.9e-7 |
//! | coarse | 2.2e-2 | 2.0e-2 | 1.8e-2 |
//! | fixed32 | 6.6e-7 | 8.5e-7 | 1.1e-6 |
//! | short32 | 1.25e-6 | 1.58e-6 | 8.4e-6 |
//! | float64 | 2.1e-15 | 2.1e-15 | 1.4e-14 |
//!
//! The largest come of legs whose offset is longer than their links.

use super::solver::NumberSystem;

/// The bounds of a number system, over legs within sense (see `legs.rs`).
#[derive(Debug, Clone, Copy)]
pub struct Bounds {
    /// Target to the solver's own forward kinematics of its answer; fraction of the reach (thigh + shank).
    pub own_foot: f64,
    /// Target to the `f64` reference's forward kinematics of the answer; fraction of the reach.
    pub foot: f64,
    /// A leg folded until its foot is nearer to the thigh's axis than this fraction of the reach loses digits of the
    /// thigh, and its foot's error grows as the fraction shrinks. 0: it does not.
    pub folded_below: f64,
    /// A foot that had to be moved, to the closest point: fraction of the leg's size (offset too), because near the
    /// cylinder of a roll hip and on the axis of a yaw hip it is the offset that is rounded.
    pub moved: f64,
    /// A joint against the reference, away from singular places, rad.
    pub angle: f64,
    /// A knee near straight or folded, rad: what `angle` does not cover.
    pub straight: f64,
    /// A distance against `f64`, fraction of itself.
    pub distance: f64,
    /// A pulse against `f64`, fraction of the µs that the servo has in a radian.
    pub servo: f64,
}

impl Bounds {
    /// What the bounds of the foot are to be multiplied by with the foot `span` (fraction of the reach) from the
    /// thigh's axis.
    pub fn growth(&self, span: f64) -> f64 {
        (self.folded_below / span.max(1e-9)).max(1.0)
    }
}

impl NumberSystem {
    pub fn bounds(self) -> Bounds {
        match self {
            Self::Float32 => Bounds {
                own_foot: 9e-7,
                foot: 9e-7,
                folded_below: 0.0,
                moved: 1.5e-6,
                angle: 6.5e-7,
                straight: 7e-7,
                distance: 2.4e-7,
                servo: 9e-7,
            },
            Self::Coarse => Bounds {
                own_foot: 2.6e-2,
                foot: 2.4e-2,
                folded_below: 0.0,
                moved: 3e-2,
                angle: 2e-2,
                straight: 2e-2,
                distance: 4e-3,
                servo: 9e-7,
            },
            Self::Fixed32 => Bounds {
                own_foot: 8e-7,
                foot: 9.5e-7,
                folded_below: 0.0,
                moved: 9e-7,
                angle: 1.3e-6,
                straight: 1.3e-6,
                distance: 1e-7,
                servo: 8e-8,
            },
            Self::Short32 => Bounds {
                own_foot: 1.3e-6,
                foot: 1.7e-6,
                folded_below: 0.5,
                moved: 9e-7,
                angle: 9e-6,
                straight: 3e-4,
                distance: 1e-7,
                servo: 8e-8,
            },
            Self::Float64 => Bounds {
                own_foot: 2.5e-15,
                foot: 2.5e-15,
                folded_below: 0.25,
                moved: 2e-15,
                angle: 2.4e-14,
                straight: 2.4e-14,
                distance: 1e-15,
                servo: 1e-15,
            },
        }
    }
}
