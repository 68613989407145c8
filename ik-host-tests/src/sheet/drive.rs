//! What servos and drives come to, in plain f64 from the sheet alone: the angle at a pulse, and the thigh's range beside a
//! parallelogram.

use super::leg_kind::KnownKind;
use super::robot::{Bend, KneeDrive, LegKind, LegMount, Servo, ServoCurve, Turns};

impl Servo {
    /// The angle of an ideal servo at a pulse, degrees: straight beyond its ends.
    pub fn degrees_at(&self, trim_us: f64, pulse_us: f64) -> f64 {
        let us = pulse_us - trim_us;
        match &self.curve {
            ServoCurve::Straight { centre_us, joint_at_centre_deg, us_per_degree, turns } => {
                let swing = (us - centre_us) / us_per_degree;
                joint_at_centre_deg + if *turns == Turns::With { swing } else { -swing }
            }
            ServoCurve::Measured { measured } => {
                // The last stretch whose start lies at or below the pulse, or the first one.
                let mut stretch = None;
                for pair in measured.windows(2) {
                    if stretch.is_none() || pair.first().is_some_and(|[start, _]| *start <= us) {
                        stretch = Some(pair);
                    }
                }
                match stretch {
                    Some(&[[from_us, from_deg], [to_us, to_deg]]) => {
                        from_deg + (us - from_us) * (to_deg - from_deg) / (to_us - from_us)
                    }
                    _ => f64::NAN, // no sheet has fewer than two points
                }
            }
        }
    }

    /// The angles that the servo can take, `[least, most]` in degrees.
    pub fn range_deg(&self, trim_us: f64) -> [f64; 2] {
        let [a, b] = self.sent_us(trim_us).map(|us| self.degrees_at(trim_us, us));
        [a.min(b), a.max(b)]
    }
}

impl LegKind {
    /// The joint ranges as they are kept in legs with these trims, `[least, most]` in degrees. Beside a parallelogram, the
    /// thigh's is what its servo can take in every one of them, and what leaves the shank's servo an angle of the knee's
    /// range; it is empty if nothing is left.
    pub fn kept_range_deg(&self, trims_us: impl Iterator<Item = [f64; 3]>) -> [[f64; 2]; 3] {
        let [hip, mut thigh, knee] = self.range_deg;
        if self.knee_drive == KneeDrive::Parallelogram {
            let [_, thigh_servo, shank_servo] = &self.servos;
            for [_, thigh_trim, shank_trim] in trims_us {
                let [thigh_least, thigh_most] = thigh_servo.range_deg(thigh_trim);
                let [shank_least, shank_most] = shank_servo.range_deg(shank_trim);
                // A shank's angle is held at half a turn.
                let (shank_least, shank_most) = (shank_least.max(-180.0), shank_most.min(180.0));
                let left = match self.bend {
                    Bend::Backward | Bend::Down => [shank_least - knee[1], shank_most - knee[0]],
                    Bend::Forward | Bend::Up => [knee[0] - shank_most, knee[1] - shank_least],
                };
                thigh = [thigh[0].max(thigh_least).max(left[0]), thigh[1].min(thigh_most).min(left[1])];
            }
        }
        [hip, thigh, knee]
    }
}

/// Complains of kinds whose parallelogram leaves the thigh nothing.
pub(super) fn check(kinds: &[KnownKind<'_>], legs: &[LegMount]) {
    for (index, known) in kinds.iter().enumerate() {
        let Some(kind) = &known.kind else { continue };
        let trims = legs.iter().filter(|leg| leg.kind == index).map(|leg| leg.trim_us);
        let [_, [least, most], _] = kind.kept_range_deg(trims);
        if least >= most {
            let [_, thigh, knee] = kind.joint_names();
            known.item.complain(
                format!(
                    "with a parallelogram, no angle of the {thigh} suits its range, its servo and what the shank's \
                     servo leaves of the knee's range: it would have to be from {least:.2} to {most:.2} degrees"
                ),
                format!("the angles in `servo.{knee}` are the shank's: compare them with `range_deg` and `servo.{thigh}`"),
            );
        }
    }
}
