//! The textbook form of a leg: right triangle at the hip, law of cosines at knee and thigh; common practice, no
//! source. As an engineer would write it down over a library at hand: no limits, no outcome, in reach only.
//!
//! ```text
//! roll-hip   D = √(y² + z² − a²)   hip = atan2(z, y) + atan2(D, a)   X = x
//! yaw-hip    D = √(x² + y²) − c    hip = atan2(x, y)                 X = z
//! G² = D² + X²
//! knee  = π − acos((L1² + L2² − G²) / (2·L1·L2))
//! thigh = atan2(X, D) + acos((L1² + G² − L2²) / (2·L1·G))
//! ```
//!
//! | contender | within, over the targets here | why |
//! | --- | --- | --- |
//! | [`on_libm`] | 2e-6 rad | arccosines lose digits towards a straight knee |
//! | [`on_micromath`] | 7e-1 rad | its root is off by up to 6 %, which stretches a bent leg straight |
//! | [`on_cordic`], `I16F16` | 6e-4 rad | 16 bits of fraction, in units of 128 mm |
//! | [`on_cordic`], `I32F32` | 3e-8 rad | 32 bits of fraction |
//!
//! `cargo test -p benches` holds each to its figure, so that nothing is timed that computes nonsense.

pub mod on_cordic;
pub mod on_libm;
pub mod on_micromath;

/// An angle of less than three half-turns, in (−π, π].
fn wrapped(angle: f32) -> f32 {
    use core::f32::consts::{PI, TAU};
    if angle > PI {
        angle - TAU
    } else if angle <= -PI {
        angle + TAU
    } else {
        angle
    }
}
