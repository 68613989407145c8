//! The reachable set of a leg whose knee has a range.
//!
//! The reference knows legs whose reach their links end. It depends on the links only by their sum and difference,
//! the ends of the line from thigh's axis to foot; so a knee's range is that of a leg with other links.

use super::sensitivity::span;
use ik_core::End;
use ik_host_tests::reference::{Leg, Range, Verdict, closed_form};

/// The point of the reachable set that is closest to a target.
#[derive(Debug, Clone, Copy)]
pub struct Closest {
    pub point: [f64; 3],
    /// mm.
    pub far: f64,
    pub verdict: Verdict,
    /// From the thigh's axis to the point, and the ends that the knee's range sets to it: shortest, longest, mm.
    pub span: f64,
    pub ends: [f64; 2],
}

impl Closest {
    /// Whether the point lies within `slack` of where the knee is at this end of its range.
    pub fn at(&self, end: End, slack: f64) -> bool {
        let [shortest, longest] = self.ends;
        match end {
            End::Least => self.span >= longest - slack,
            End::Most => self.span <= shortest + slack,
        }
    }
}

/// The closest point with the knee within its range (rad).
pub fn closest(leg: &Leg, knee: Range, target: [f64; 3]) -> Closest {
    let span_at = |knee: f64| {
        let half_sine = (0.5 * knee).sin();
        let fold = 4.0 * leg.thigh * leg.shank * half_sine * half_sine;
        ((leg.thigh + leg.shank).powi(2) - fold).max(0.0).sqrt()
    };
    let stops = knee.min > 0.0 || knee.max.to_degrees() < 179.9999;
    let (leg, ends) = if stops {
        let (longest, shortest) = (span_at(knee.min), span_at(knee.max));
        let links = Leg { thigh: 0.5 * (longest + shortest), shank: 0.5 * (longest - shortest), ..*leg };
        (links, [shortest, longest])
    } else {
        (*leg, [(leg.thigh - leg.shank).abs(), leg.thigh + leg.shank])
    };
    let (point, far, verdict) = closed_form::closest(&leg, target);
    Closest { point, far, verdict, span: span(&leg, point), ends }
}
