//! What was found, beside what is stated.

use super::{
    Found, LEGS, LegBound, LegFound, NearFound, Verdict, measured, near_singular_places, of_legs, stated,
};
use crate::machine::Refused;
use crate::sheet::{NumberSystem, Robot};
use rayon::prelude::*;
use serde::Serialize;

/// Every primitive of every number system and every leg, measured and judged.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Judged {
    /// Random arguments per primitive, and poses per leg.
    pub rounds: u32,
    /// Where they started.
    pub seed: u64,
    /// By number system, in the order of [`Quantity::ALL`](super::Quantity::ALL).
    pub primitives: Vec<JudgedPrimitive>,
    /// By leg and number system.
    pub legs: Vec<JudgedLeg>,
    /// By leg, number system and place.
    pub near_singular_places: Vec<NearFound>,
}

/// A primitive.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct JudgedPrimitive {
    /// Whose it is.
    pub number: NumberSystem,
    /// What was found.
    #[serde(flatten)]
    pub found: Found,
    /// What is stated.
    pub bound: f64,
    /// How the two go together.
    pub verdict: Verdict,
}

/// A leg in a number system.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct JudgedLeg {
    /// What was found.
    #[serde(flatten)]
    pub found: LegFound,
    /// What is stated; nothing of `f64`, which shows the method's own error.
    pub bound: Option<LegBound>,
    /// How the two go together: of several legs one need not come near a bound.
    pub verdict: Option<Verdict>,
}

impl Judged {
    /// Measures everything.
    ///
    /// # Errors
    /// What ik-core refuses.
    pub fn of(robots: &[Robot], rounds: u32, seed: u64) -> Result<Self, Refused> {
        let primitives = NumberSystem::ALL.into_par_iter().flat_map(|number| {
            let pairs = measured(number, rounds, seed).into_iter().zip(stated(number));
            let judged = pairs.map(|(found, stated)| {
                let verdict = Verdict::of(stated.bound, found.largest);
                JudgedPrimitive { number, found, bound: stated.bound, verdict }
            });
            judged.collect::<Vec<_>>()
        });
        let primitives = primitives.collect();
        let legs = robots.iter().map(|robot| of_legs(robot, rounds, seed)).collect::<Result<Vec<_>, _>>()?;
        let legs = legs.into_iter().flatten().map(|found| {
            let bound = LEGS.into_iter().find(|bound| bound.number.name() == found.number);
            let verdict =
                bound.map(|bound| if found.is_within(&bound) { Verdict::Holds } else { Verdict::Exceeded });
            JudgedLeg { found, bound, verdict }
        });
        let legs = legs.collect();
        let near = robots
            .iter()
            .map(|robot| near_singular_places(robot, rounds / 20, seed))
            .collect::<Result<Vec<_>, _>>()?;
        let near_singular_places = near.into_iter().flatten().collect();
        Ok(Self { rounds, seed, primitives, legs, near_singular_places })
    }

    /// Whether every bound holds, and none of a primitive is slack.
    pub fn all_hold(&self) -> bool {
        self.primitives.iter().all(|primitive| primitive.verdict == Verdict::Holds)
            && self.legs.iter().all(|leg| leg.verdict != Some(Verdict::Exceeded))
    }
}
