//! Pulses follow angles, within their range, and back.

use super::ensure;
use crate::common::servo::ServoModel;
use ik_core::{End, Pulse, Turns};
use std::f64::consts::PI;

/// The exact pulse for an angle, µs, before its range holds it: centre + trim ± gain·(angle − joint at centre).
fn wanted_us(servo: &dyn ServoModel, radians: f64) -> f64 {
    let spec = servo.spec();
    let swing = radians.to_degrees() - spec.joint_at_centre_deg;
    let travel = swing * spec.us_per_degree;
    spec.centre_us + spec.trim_us + if spec.turns == Turns::With { travel } else { -travel }
}

/// How far the pulse for an angle is from the exact one, fraction of the gain's µs per radian.
pub fn pulse_error(servo: &dyn ServoModel, radians: f64) -> f64 {
    let radians = servo.quantised(radians);
    let [shortest, longest] = servo.spec().pulse_us;
    let exact = wanted_us(servo, radians).clamp(shortest, longest);
    (servo.command(radians).0.us() - exact).abs() / us_per_radian(servo)
}

/// How far pulse → angle → pulse is from where it began, in the same unit; `None` where half a turn ends it or
/// the pulse is not within the range.
pub fn there_and_back(servo: &dyn ServoModel, pulse: Pulse) -> Option<f64> {
    let [shortest, longest] = servo.pulse_range();
    let angle = servo.angle(pulse);
    // Where half a turn ends the way back, it ends it exactly.
    let turns_freely = angle.abs() < PI - 1e-5;
    ((shortest..=longest).contains(&pulse) && turns_freely)
        .then(|| (servo.command(angle).0.us() - pulse.us()).abs() / us_per_radian(servo))
}

fn us_per_radian(servo: &dyn ServoModel) -> f64 {
    servo.spec().us_per_degree.to_degrees()
}

/// Within the range and said to be held exactly if it was; and where it should be.
pub fn check(servo: &dyn ServoModel, radians: f64) -> Result<(), String> {
    let radians = servo.quantised(radians);
    let (pulse, held) = servo.command(radians);
    let [shortest, longest] = servo.pulse_range();
    let bounds = servo.number().bounds();
    let case =
        format!("{:?}: {:?}, {radians} rad: {} us, {held:?}", servo.number(), servo.spec(), pulse.us());
    ensure!((shortest..=longest).contains(&pulse), "{case}: beyond the range");
    match held {
        Some(End::Least) => ensure!(pulse == shortest, "{case}: held elsewhere"),
        Some(End::Most) => ensure!(pulse == longest, "{case}: held elsewhere"),
        None => {}
    }
    let wanted = wanted_us(servo, radians);
    // A step of the pulse, and the angle's rounding; at the very end of the range either word may be true.
    let slack = bounds.servo * us_per_radian(servo) + 2.0 / 65_536.0;
    let [least, most] = servo.spec().pulse_us;
    ensure!(
        (held == Some(End::Least)) == (wanted < least) || (wanted - least).abs() <= slack,
        "{case}: held?"
    );
    ensure!((held == Some(End::Most)) == (wanted > most) || (wanted - most).abs() <= slack, "{case}: held?");
    let off = (pulse.us() - wanted.clamp(least, most)).abs();
    ensure!(off <= slack, "{case}: {wanted} us wanted, {off:e} us off");
    Ok(())
}

/// The pulse for an angle comes back through its angle within the number system's bound, or `slack_us` if that is
/// more.
pub fn check_back(servo: &dyn ServoModel, radians: f64, slack_us: f64) -> Result<(), String> {
    let pulse = servo.command(servo.quantised(radians)).0;
    let slack = servo.number().bounds().servo * us_per_radian(servo) + 2.0 / 65_536.0;
    if let Some(back) = there_and_back(servo, pulse) {
        let back = back * us_per_radian(servo);
        ensure!(
            back <= slack.max(slack_us),
            "{:?}: {:?}: {} us come back {back} us off",
            servo.number(),
            servo.spec(),
            pulse.us()
        );
    }
    Ok(())
}

/// A larger angle has a pulse no shorter, or no longer if the servo turns against.
pub fn check_monotone(servo: &dyn ServoModel, a: f64, b: f64) -> Result<(), String> {
    let (a, b) = (servo.quantised(a.min(b)), servo.quantised(a.max(b)));
    let (first, second) = (servo.command(a).0, servo.command(b).0);
    let (least, most) = match servo.spec().turns {
        Turns::With => (first, second),
        Turns::Against => (second, first),
    };
    ensure!(
        least <= most,
        "{:?}: {:?}: {a} rad has {} us, {b} rad {} us",
        servo.number(),
        servo.spec(),
        first.us(),
        second.us()
    );
    Ok(())
}
