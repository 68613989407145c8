//! A survey with certificates: what was found is held against them, and the sheet's allowances are judged by them.

use super::SurveyError;
use super::findings::{KindFindings, NumberFindings, Survey, Verdict, verdict};
use crate::certify::{Certified, Effort, certify};
use crate::sheet::Allowed;

impl Survey {
    /// Certifies every kind of leg in every number system, and judges by that what can be certified. The time is shared out
    /// evenly among the kinds.
    ///
    /// # Errors
    /// If a target that was surveyed exceeds what is certified.
    pub fn certify(&mut self, effort: Effort) -> Result<(), SurveyError> {
        let kinds = u32::try_from(self.kinds.len().max(1)).unwrap_or(u32::MAX);
        let each = Effort { time: effort.time / kinds, ..effort };
        let (robot, allowed) = (&self.robot, &self.robot.allowed);
        for (number, kind) in self.kinds.iter_mut().enumerate() {
            let names: Vec<_> = kind.numbers.iter().map(|number| number.number).collect();
            let certified = certify(robot, number, &names, each)?;
            let KindFindings { kind, numbers, .. } = kind;
            for (findings, certified) in numbers.iter_mut().zip(certified) {
                findings
                    .take(certified, allowed)
                    .map_err(|why| SurveyError::Exceeded(format!("leg_kind.{kind}: {why}")))?;
            }
        }
        self.verdict = verdict(&self.kinds);
        Ok(())
    }
}

impl NumberFindings {
    fn take(&mut self, certified: Certified, allowed: &Allowed) -> Result<(), String> {
        if let Some(bound) = certified.bound() {
            for (what, found, bound) in [
                ("arithmetic", &self.arithmetic, bound.arithmetic.mm),
                ("arithmetic and pulse together", &self.together, bound.together.mm),
            ] {
                if found.largest.mm > bound {
                    return Err(format!(
                        "{}: {what} put the foot {:e} mm off at {:?}, and {bound:e} mm is certified; one of the two \
                         is wrong, which is a fault of this program",
                        self.number, found.largest.mm, found.largest.foot_mm
                    ));
                }
            }
            self.arithmetic_verdict = Verdict::from_within(bound.arithmetic.mm <= allowed.arithmetic_mm);
            self.together_verdict = Verdict::from_within(bound.together.mm <= allowed.with_pulse_mm);
        }
        self.certified = Some(certified);
        Ok(())
    }
}
