//! Counts are the exactly rounded quotient of pulse and tick.

use super::ensure;
use ik_core::Pulse;
use ik_core::output::Output;

/// What the output is made of.
#[derive(Debug, Clone, Copy)]
pub struct Hardware {
    pub clock_hz: u32,
    pub divider: u32,
    /// The largest count.
    pub most: u32,
    /// Counts in a frame.
    pub frame: u32,
}

/// The nearest count to a pulse, halves upwards, by 128-bit integers: pulse·clock/(65536·10⁶·divider).
fn exact_counts(hardware: &Hardware, pulse: Pulse) -> u128 {
    let dividend = u128::from(pulse.steps()) * u128::from(hardware.clock_hz);
    let divisor = 65_536 * 1_000_000 * u128::from(hardware.divider);
    ((2 * dividend + divisor) / (2 * divisor)).min(u128::from(hardware.most))
}

/// That a pulse has its exact count, a longer one no fewer.
pub fn check(output: &dyn Output, hardware: &Hardware, pulse: Pulse) -> Result<(), String> {
    let counts = output.counts(pulse);
    let exact = exact_counts(hardware, pulse);
    ensure!(u128::from(counts) == exact, "{hardware:?}: {} us: {counts} counts, not {exact}", pulse.us());
    let longer = output.counts(Pulse::from_steps(pulse.steps().saturating_add(1)));
    ensure!(counts <= longer, "{hardware:?}: {} us and a step: {longer} after {counts}", pulse.us());
    ensure!(counts <= output.most_counts(), "{hardware:?}: {} us: {counts} counts", pulse.us());
    Ok(())
}

/// That counts within a frame have the nearest pulse there is, and come back as they were.
pub fn check_back(output: &dyn Output, hardware: &Hardware, counts: u32) -> Result<(), String> {
    let counts = counts.min(hardware.most);
    let pulse = output.pulse(counts);
    // counts·65536·10⁶·divider/clock, halves upwards.
    let clock = u128::from(hardware.clock_hz);
    let dividend = u128::from(counts) * 65_536 * 1_000_000 * u128::from(hardware.divider);
    let exact = (2 * dividend + clock) / (2 * clock);
    // Counts beyond the longest pulse saturate, and cannot come back.
    if exact <= u128::from(u32::MAX) {
        ensure!(u128::from(pulse.steps()) == exact, "{hardware:?}: {counts} counts: {} us", pulse.us());
        let back = output.counts(pulse);
        ensure!(back == counts, "{hardware:?}: {counts} counts: {} us: {back} counts", pulse.us());
    } else {
        let short = u128::from(u32::MAX - pulse.steps());
        // Less than a count short of the longest pulse.
        let count = dividend.div_ceil(clock * u128::from(counts.max(1)));
        ensure!(short <= count, "{hardware:?}: {counts} counts: {} us", pulse.us());
    }
    Ok(())
}

/// That a count and a frame last as long as clock and divider say.
pub fn check_period(output: &dyn Output, hardware: &Hardware) -> Result<(), String> {
    let count_us = f64::from(hardware.divider) * 1e6 / f64::from(hardware.clock_hz);
    let frame_us = count_us * f64::from(hardware.frame);
    ensure!((output.count_us() / count_us - 1.0).abs() < 1e-15, "{hardware:?}: {} us", output.count_us());
    ensure!((output.frame_us() / frame_us - 1.0).abs() < 1e-15, "{hardware:?}: {} us", output.frame_us());
    ensure!(output.most_counts() == hardware.most, "{hardware:?}: {} counts", output.most_counts());
    Ok(())
}
