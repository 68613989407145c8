//! `[output]`: what turns a pulse into whole counts.

use super::limits;
use super::robot::Output;
use super::table::{Item, Table};
use super::vocabulary::{EXPANDER, TIMER};

#[derive(Clone, Copy)]
enum Kind {
    Timer,
    Expander,
}

const KINDS: [(&str, Kind); 2] = [("timer", Kind::Timer), ("expander", Kind::Expander)];

/// Width of a counter that the sheet does not give.
const COUNTER_BITS: u32 = 16;

/// Reads the table.
pub(super) fn read(sheet: &Table<'_>) -> Option<Output> {
    let item = sheet.needed("output")?;
    let entries = item.entries()?;
    // The kind decides which keys are right, so it is looked at before the table is opened. Where it
    // is wrong, the other keys tell what was meant, so that they are checked all the same.
    let written = entries.get("kind").and_then(|kind| kind.get_ref().as_str());
    let kind = KINDS.iter().find(|(word, _)| Some(*word) == written).map_or_else(
        || {
            let expanders = ["oscillator_hz", "resolution_bits"];
            if expanders.iter().any(|key| entries.contains_key(*key)) { Kind::Expander } else { Kind::Timer }
        },
        |(_, kind)| *kind,
    );
    match kind {
        Kind::Timer => timer(&item.table(&TIMER)?),
        Kind::Expander => expander(&item.table(&EXPANDER)?),
    }
}

fn timer(table: &Table<'_>) -> Option<Output> {
    let kind = table.needed("kind").and_then(|item| item.word(&KINDS));
    let clock = table.needed("clock_hz");
    let clock_hz = clock.as_ref().and_then(|i| i.whole_within(&limits::CLOCK_HZ));
    let counter_bits = table
        .optional("counter_bits")
        .map_or(Some(COUNTER_BITS), |item| item.whole_within(&limits::COUNTER_BITS));
    let frame_hz = frame_hz(table);
    let divider = table.optional("prescaler");
    let prescaler = divider.as_ref().map(|i| i.whole_within(&limits::PRESCALER));
    let (clock_hz, counter_bits, frame_hz) = (clock_hz?, counter_bits?, frame_hz?);
    let prescaler = match prescaler {
        Some(given) => Some(given?),
        None => None,
    };
    kind?;

    let counter_bits = u8::try_from(counter_bits).ok()?;
    let finest = finest(f64::from(clock_hz), counter_bits, frame_hz);
    let fits = prescaler.is_none_or(|given| f64::from(given) >= finest);
    if !limits::PRESCALER.hold(finest) {
        clock?.complain(
            format!(
                "too fast for a counter of {counter_bits} bits: a frame of {frame_hz} Hz would need \
                 a prescaler of {finest}, and 65536 is the most"
            ),
            "give the clock that enters this timer, or a wider counter",
        );
        return None;
    }
    if !fits {
        divider?.complain(
            format!("a frame of {frame_hz} Hz overflows a counter of {counter_bits} bits"),
            format!("{finest} or more; leave it out to have the finest that fits"),
        );
        return None;
    }
    Some(Output::Timer { clock_hz, counter_bits, frame_hz, prescaler })
}

fn expander(table: &Table<'_>) -> Option<Output> {
    let kind = table.needed("kind").and_then(|item| item.word(&KINDS));
    let oscillator = table.needed("oscillator_hz");
    let oscillator_hz = oscillator.as_ref().and_then(|item| item.whole_within(&limits::CLOCK_HZ));
    let resolution_bits =
        table.needed("resolution_bits").and_then(|item| item.whole_within(&limits::RESOLUTION_BITS));
    let frame_hz = frame_hz(table);
    let (oscillator_hz, resolution_bits, frame_hz) = (oscillator_hz?, resolution_bits?, frame_hz?);
    kind?;

    let real_hz = expander_frame_hz(oscillator_hz, resolution_bits, frame_hz);
    if ((real_hz - frame_hz) / frame_hz).abs() > limits::FRAME_SLACK {
        oscillator?.complain(
            format!(
                "whole prescalers with {resolution_bits} bits come no nearer to {frame_hz} Hz than \
                 {real_hz:.1} Hz"
            ),
            "give the oscillator's rate in hertz, a lower `frame_hz` or fewer `resolution_bits`",
        );
        return None;
    }
    Some(Output::Expander { oscillator_hz, resolution_bits: u8::try_from(resolution_bits).ok()?, frame_hz })
}

fn frame_hz(table: &Table<'_>) -> Option<f64> {
    let item: Item<'_> = table.needed("frame_hz")?;
    item.within(&limits::FRAME_HZ)
}

/// The frame rate that an expander's whole-number prescaler makes of the one asked for.
fn expander_frame_hz(oscillator_hz: u32, resolution_bits: u32, frame_hz: f64) -> f64 {
    let frames = f64::from(oscillator_hz) / 2_f64.powi(resolution_bits as i32);
    frames / (frames / frame_hz).round().max(1.0)
}

/// How long a count really lasts, in microseconds.
pub(super) fn count_us(output: &Output) -> f64 {
    match output {
        Output::Timer { clock_hz, counter_bits, frame_hz, prescaler } => {
            let clock_hz = f64::from(*clock_hz);
            let divider = prescaler.map_or_else(|| finest(clock_hz, *counter_bits, *frame_hz), f64::from);
            1e6 * divider / clock_hz
        }
        Output::Expander { resolution_bits, .. } => {
            frame_us(output) / 2_f64.powi(i32::from(*resolution_bits))
        }
    }
}

/// The least prescaler with which a frame fits the counter.
fn finest(clock_hz: f64, counter_bits: u8, frame_hz: f64) -> f64 {
    (clock_hz / (frame_hz * 2_f64.powi(i32::from(counter_bits)))).ceil().max(1.0)
}

/// How long a frame really lasts, in microseconds: no pulse can be longer.
pub(super) fn frame_us(output: &Output) -> f64 {
    match output {
        Output::Timer { frame_hz, .. } => 1e6 / frame_hz,
        Output::Expander { oscillator_hz, resolution_bits, frame_hz } => {
            1e6 / expander_frame_hz(*oscillator_hz, u32::from(*resolution_bits), *frame_hz)
        }
    }
}
