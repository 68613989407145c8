//! Is the plugin right? A Cortex-M's system timer goes by the same clock as the instructions, so many a tick; many calls
//! timed together come to what the plugin counted for one, and what is around it, which takes the same every time.

use emulation::Run;
use reckoning::Window;

use crate::{expected::Expected, trouble::Trouble};

/// More than this around a window is no call any more.
const MOST_AROUND: f64 = 60.0;

/// How many instructions lie around each window, least and most; an error if they differ by more than the timer's reading may
/// be off. `per_tick` is what the emulated machine's clock makes of an instruction.
pub fn compare(
    expected: &Expected,
    windows: &[Window],
    run: &Run,
    per_tick: f64,
) -> Result<[f64; 2], Trouble> {
    let differs = |problem: String| Trouble::OwnCounterDiffers { name: expected.name.into(), problem };
    let timed: Option<Vec<(f64, f64)>> = run
        .log
        .iter()
        .filter_map(|line| line.strip_prefix("ticks "))
        .map(|line| {
            let (ticks, calls) = line.split_once(' ')?;
            let calls: f64 = calls.parse().ok()?;
            // A reading is off by up to a tick at either end.
            Some((ticks.parse::<f64>().ok()? * per_tick / calls, 2.0 * per_tick / calls))
        })
        .collect();
    let timed = timed.ok_or_else(|| differs("the image logged what are no ticks".into()))?;
    if timed.len() != windows.len() || timed.is_empty() {
        return Err(differs(format!("{} timings, {} windows", timed.len(), windows.len())));
    }
    let mut around = [f64::INFINITY, 0.0f64];
    for (window, (instructions, off)) in timed.iter().enumerate() {
        let more = instructions - windows[window].instructions as f64;
        around = [around[0].min(more), around[1].max(more)];
        if !(0.0..=MOST_AROUND).contains(&more) || around[1] - around[0] > *off {
            return Err(differs(format!(
                "window {window}: {instructions:.1} by the system timer, {} counted; between {:.1} and {:.1} more so far",
                windows[window].instructions, around[0], around[1]
            )));
        }
    }
    Ok(around)
}

#[cfg(test)]
mod tests {

    use super::*;

    fn compared(ticks: [u64; 2], windows: [u64; 2]) -> Result<[f64; 2], Trouble> {
        let log = ticks.iter().map(|ticks| format!("ticks {ticks} 64")).collect();
        let windows = windows.map(|instructions| Window { instructions, ..Window::default() });
        compare(&Expected::of_two_targets(), &windows, &Run { log, windows: vec![] }, 40.0)
    }

    #[test]
    fn the_same_around_every_window_passes_and_nothing_else() {
        // 64 · (300 + 20) / 40 = 512 ticks.
        assert_eq!(compared([512, 512], [300, 300]).ok(), Some([20.0, 20.0]));
        assert!(compared([512, 513], [300, 300]).is_ok());
        for (ticks, windows) in [
            ([512, 512], [300, 302]),
            ([512, 515], [300, 300]),
            ([470, 470], [300, 300]),
            ([900, 900], [300, 300]),
        ] {
            assert!(compared(ticks, windows).is_err(), "{ticks:?} {windows:?}");
        }
    }
}
