//! A servo on an output: from an angle to whole counts.

use super::ensure;
use crate::common::channel::{AnyOutput, ChannelModel, Measured};
use ik_core::End;

/// The counts of a turn of the servo, and of its pulse at the joint's zero, together.
pub fn width(servo: &Measured, output: &AnyOutput) -> f64 {
    let per_us = 1.0 / output.as_output().count_us();
    let steepest = 360.0 * servo.steepest();
    // The lines of all stretches, extended to the joint's zero.
    let at_zero = servo.points.windows(2).fold(0.0f64, |most, pair| {
        let [[us, degrees], [next_us, next_degrees]] = [pair[0], pair[1]];
        most.max((us + servo.trim_us - degrees * (next_us - us) / (next_degrees - degrees)).abs())
    });
    (steepest + at_zero) * per_us
}

/// How far counts are from the exact ones at the angle as the number system holds it, held within the range.
pub fn off(channel: &dyn ChannelModel, servo: &Measured, output: &AnyOutput, degrees: f64) -> f64 {
    let degrees = channel.quantised(degrees);
    let [least, most] = channel.range().map(f64::from);
    let exact = (servo.us_at(degrees) / output.as_output().count_us()).clamp(least, most);
    (f64::from(channel.command(degrees).0) - exact).abs()
}

/// The bend of a curve lies at the nearest angle that the number system has: up to half of its step away.
fn at_a_bend(channel: &dyn ChannelModel, servo: &Measured, output: &AnyOutput, degrees: f64) -> f64 {
    let half_a_step = if channel.name() == "fixed16" { 180.0 / 65_536.0 } else { 0.0 };
    let near = servo.points.iter().any(|[_, bend]| (degrees - bend).abs() <= 2.0 * half_a_step);
    if near { half_a_step * servo.steepest() / output.as_output().count_us() } else { 0.0 }
}

/// Counts are right, within the range, and said to be held if and only if they were.
pub fn check(
    channel: &dyn ChannelModel,
    servo: &Measured,
    output: &AnyOutput,
    degrees: f64,
) -> Result<(), String> {
    let degrees = channel.quantised(degrees);
    let (counts, held) = channel.command(degrees);
    let [least, most] = channel.range();
    let case = format!("{}: {servo:?} {output:?} {degrees} degrees: {counts}, {held:?}", channel.name());
    ensure!((least..=most).contains(&counts), "{case}: beyond {least} to {most}");
    let slack = 2f64.powi(-22).max(channel.bound() * width(servo, output))
        + at_a_bend(channel, servo, output, degrees);
    let off = off(channel, servo, output, degrees);
    ensure!(off <= 0.5 + slack, "{case}: off by {off}");
    // Where rounding decides, either word may be true.
    let exact = servo.us_at(degrees) / output.as_output().count_us();
    let (below, above) = (exact - (f64::from(least) - 0.5), exact - (f64::from(most) + 0.5));
    ensure!((held == Some(End::Least)) == (below < 0.0) || below.abs() <= slack, "{case}: held?");
    ensure!((held == Some(End::Most)) == (above > 0.0) || above.abs() <= slack, "{case}: held?");
    ensure!(
        held.is_none() || counts == if held == Some(End::Least) { least } else { most },
        "{case}: held elsewhere"
    );
    Ok(())
}

/// No count of the range is a pulse outside those that may be sent, by whole numbers; and one more would be.
pub fn check_ends(channel: &dyn ChannelModel, servo: &Measured, output: &AnyOutput) -> Result<(), String> {
    let [least, most] = channel.range().map(u128::from);
    let [shortest, longest] = servo.sent_us();
    let counting = output.counting();
    // Microseconds as a whole number of 2^-40 of them, exact for what is tested; counts are pulses of divider/hz.
    let (hz, divider) = match output {
        AnyOutput::Timer(timer) => (hz_of(counting.counts_per_us(), timer.divider()), timer.divider()),
        AnyOutput::Expander(expander) => {
            (hz_of(counting.counts_per_us(), expander.divider()), expander.divider())
        }
    };
    let scaled = |us: f64| (us * 2f64.powi(40)) as u128 * hz;
    let pulse = |counts: u128| (counts * u128::from(divider) * 1_000_000) << 40;
    let case = format!("{}: {servo:?} {output:?}: {least} to {most}", channel.name());
    // A whole number of 2^-40 µs is at most one short.
    ensure!(pulse(least) + hz >= scaled(shortest), "{case}: the least is too short");
    ensure!(pulse(most) <= scaled(longest) + hz, "{case}: the most is too long");
    // Pulses are looked at in steps of 1/65536 µs.
    let step = hz << 24;
    ensure!(least == 1 || pulse(least - 1) < scaled(shortest) + hz + step, "{case}: the least could be less");
    ensure!(
        most == u128::from(counting.most_counts()) || pulse(most + 1) + step > scaled(longest),
        "{case}: the most could be more"
    );
    Ok(())
}

fn hz_of(counts_per_us: f64, divider: u32) -> u128 {
    (counts_per_us * f64::from(divider) * 1e6).round() as u128
}

/// A larger angle has no fewer counts, or no more if the curve falls.
pub fn check_monotone(channel: &dyn ChannelModel, servo: &Measured, a: f64, b: f64) -> Result<(), String> {
    let (a, b) = (channel.quantised(a.min(b)), channel.quantised(a.max(b)));
    let (first, second) = (channel.command(a).0, channel.command(b).0);
    let (least, most) = if servo.falls() { (second, first) } else { (first, second) };
    ensure!(least <= most, "{}: {servo:?}: {a} has {first} counts, {b} has {second}", channel.name());
    Ok(())
}

/// Counts → angle → counts: the same, or one off where the number system's angles are coarser than the counts.
pub fn check_back(
    channel: &dyn ChannelModel,
    servo: &Measured,
    output: &AnyOutput,
    counts: u32,
) -> Result<(), String> {
    let degrees = channel.back(counts);
    let back = channel.command(degrees).0;
    let counts_per_degree = servo.steepest() / output.as_output().count_us();
    let coarsest = if channel.name() == "fixed16" { 360.0 / 65_536.0 } else { 0.0 };
    let allowed = u32::from(coarsest * counts_per_degree > 0.35);
    ensure!(
        back.abs_diff(counts) <= allowed,
        "{}: {servo:?} {output:?}: {counts} counts come back as {back} through {degrees} degrees",
        channel.name()
    );
    Ok(())
}
