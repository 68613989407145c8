//! The pulses that the work volume asks of each servo.

use super::Subject;
use crate::survey::{Plan, Targets};

/// Targets that are tried in every leg of a kind; the corners of the work volume are among them.
pub(super) const TARGETS: u64 = 4_000;

/// The pulses of one joint's servo, over all legs of a kind, trims included.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(in super::super) struct UsedPulse {
    /// The joint.
    pub(in super::super) joint: &'static str,
    /// Least and most that was commanded, µs.
    pub(in super::super) used_us: [f64; 2],
    /// Mechanically safe, µs.
    pub(in super::super) safe_us: [f64; 2],
    /// In the middle, before trim, µs.
    pub(in super::super) centre_us: f64,
    /// Whether some pulse was held by the safe range.
    pub(in super::super) held: bool,
}

/// By joint, over what firmware commands in its number systems.
pub(super) fn of(subject: &Subject<'_>) -> Vec<UsedPulse> {
    let sheet = subject.sheet();
    let targets = Targets::of(sheet, Plan { targets: TARGETS, seed: subject.survey.seed });
    let mut used: Vec<_> = sheet
        .joint_names()
        .into_iter()
        .zip(&sheet.servos)
        .map(|(joint, servo)| UsedPulse {
            joint,
            used_us: [f64::INFINITY, f64::NEG_INFINITY],
            safe_us: servo.pulse_us,
            centre_us: servo.middle_us(),
            held: false,
        })
        .collect();
    for (_, machine) in subject.of_firmware() {
        for (_, target, _) in targets.chunk(0, TARGETS) {
            for answered in (0..subject.findings.legs.len()).filter_map(|leg| machine.answer(leg, target)) {
                for (joint, used) in used.iter_mut().enumerate() {
                    let pulse = answered.pulses_us[joint];
                    used.used_us = [used.used_us[0].min(pulse), used.used_us[1].max(pulse)];
                    used.held |= answered.pulses_held[joint].is_some();
                }
            }
        }
    }
    used
}
