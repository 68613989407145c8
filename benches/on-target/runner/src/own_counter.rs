//! Is the plugin right? RISC-V chips count the instructions that they execute themselves; between two readings of that
//! counter lie a window and what is around it, which takes the same every time.

use emulation::Run;

use crate::{expected::Expected, trouble::Trouble};

/// More than this around a window is no call any more.
const MOST_AROUND: u64 = 40;

/// How many instructions lie around each window; an error if it is not the same for all.
pub fn compare(expected: &Expected, run: &Run) -> Result<u64, Trouble> {
    let differs = |problem: String| Trouble::OwnCounterDiffers { name: expected.name.into(), problem };
    let counts: Option<Vec<u64>> = run
        .log
        .iter()
        .filter_map(|line| line.strip_prefix("counter "))
        .map(|count| count.parse().ok())
        .collect();
    let counts = counts.ok_or_else(|| differs("the image logged what is no count".into()))?;
    if counts.len() != expected.targets || run.windows.len() != expected.targets {
        let (counts, windows) = (counts.len(), run.windows.len());
        return Err(differs(format!("{counts} counts, {windows} windows, {} targets", expected.targets)));
    }
    let around =
        counts.iter().zip(&run.windows).map(|(count, window)| count.checked_sub(window.instructions));
    let around: Vec<Option<u64>> = around.collect();
    match around.first() {
        Some(&Some(first)) if first <= MOST_AROUND => match around
            .iter()
            .position(|more| *more != Some(first))
        {
            None => Ok(first),
            Some(window) => Err(differs(format!("window {window}: {:?} more, not {first}", around[window]))),
        },
        first => Err(differs(format!("window 0: {first:?} more"))),
    }
}

#[cfg(test)]
mod tests {
    use reckoning::Window;

    use super::*;

    fn run(counts: [u64; 2], windows: [u64; 2]) -> Result<u64, Trouble> {
        let log =
            counts.iter().map(|count| format!("counter {count}")).chain(["some-roll 2 7".into()]).collect();
        let windows =
            windows.iter().map(|&instructions| Window { instructions, ..Window::default() }).collect();
        compare(&Expected::of_two_targets(), &Run { log, windows })
    }

    #[test]
    fn the_same_around_every_window_passes_and_nothing_else() {
        assert_eq!(run([112, 212], [100, 200]).ok(), Some(12));
        for (counts, windows) in [([112, 213], [100, 200]), ([99, 199], [100, 200]), ([200, 300], [100, 200])]
        {
            assert!(run(counts, windows).is_err(), "{counts:?} {windows:?}");
        }
    }
}
