//! What each number system promises, as it was measured.
//!
//! Every bound is asserted from both sides: by the property tests, which never find more; and by
//! `property_round_trip.rs`, `property_reach.rs` and `property_servo.rs`, whose fixed sweeps find more than half
//! of it, so that no bound stays larger than it need be. The `measured` lines come of
//! `TOEHOLD_LONG=1 cargo test --release -p ik-host-tests --test property_round_trip -- --nocapture` and alike.

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
    /// A joint against the reference, away from singular places, rad.
    pub angle: f64,
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
                folded_below: 0.25,
                angle: 1.8e-6,
                distance: 2.4e-7,
                servo: 8e-7,
            },
            Self::Coarse => Bounds {
                own_foot: 2.6e-2,
                foot: 3.3e-2,
                folded_below: 0.0,
                angle: 2e-2,
                distance: 4e-3,
                servo: 8e-7,
            },
            Self::Fixed32 => Bounds {
                own_foot: 1e-7,
                foot: 1.4e-7,
                folded_below: 0.03,
                angle: 1.2e-7,
                distance: 1e-7,
                servo: 6e-8,
            },
            Self::Float64 => Bounds {
                own_foot: 2e-15,
                foot: 2e-15,
                folded_below: 0.25,
                angle: 2.4e-14,
                distance: 1e-15,
                servo: 1e-15,
            },
        }
    }
}
