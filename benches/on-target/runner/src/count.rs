//! From the windows of a run to what a leg costs.

use contenders::To;
use emulation::Run;
use reckoning::{Kind, Window};
use serde::Serialize;

use crate::{expected::Expected, trouble::Trouble};

/// Least, mean, most over the targets.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Spread {
    pub least: f64,
    pub mean: f64,
    pub most: f64,
}

/// What one contender costs on one chip, the call itself subtracted.
#[derive(Debug, Clone, Serialize)]
pub struct Cost {
    pub name: &'static str,
    pub what: &'static str,
    pub ours: bool,
    pub hip: &'static str,
    pub to: &'static str,
    /// Executed, per leg.
    pub instructions: Spread,
    /// From, to, on average: estimated from published tables, zero wait states, not measured on silicon.
    pub cycles: [f64; 2],
    /// Code, constants and tables beyond what the image without a solver has, bytes.
    pub flash: i64,
    /// Deepest, bytes below the caller's.
    pub stack: u64,
    /// The deepest that it can come to, whatever it is given, if there is a bound.
    pub stack_bound: Option<u64>,
    /// How far the foot is from where it was asked to be, at most, mm.
    pub largest_foot_error_mm: f64,
    /// The same as a share of thigh and shank together.
    pub largest_foot_error: f64,
    /// How far a joint is from where it should be, at most, radians.
    pub largest_joint_error_rad: f64,
    /// Instructions by kind, on average.
    pub kinds: Vec<(Kind, f64)>,
}

/// What the call alone costs.
#[derive(Debug, Clone, Copy)]
pub struct CallAlone {
    pub instructions: u64,
    pub cycles: [u64; 2],
    pub flash: u64,
}

/// The run must have solved every target, with the PC's answers.
pub fn check(expected: &Expected, run: &Run) -> Result<(), Trouble> {
    let name = || expected.name.to_owned();
    if run.log != [expected.line.as_str()] {
        return Err(Trouble::Differs {
            name: name(),
            logged: run.log.clone(),
            expected: expected.line.clone(),
        });
    }
    if run.windows.len() != expected.targets {
        return Err(Trouble::WindowsMissing {
            name: name(),
            windows: run.windows.len(),
            targets: expected.targets,
        });
    }
    match run.windows.iter().find_map(|window| window.unknown_at) {
        None => Ok(()),
        Some(address) => Err(Trouble::UnknownInstruction { name: name(), address }),
    }
}

/// Both ways of counting must find the same in every window.
pub fn compare(expected: &Expected, windows: &[Window], again: &[u64]) -> Result<(), Trouble> {
    let counted: Vec<u64> = windows.iter().map(|window| window.instructions).collect();
    if counted == again {
        return Ok(());
    }
    let first = counted.iter().zip(again).position(|(one, other)| one != other);
    Err(Trouble::CountsDiffer {
        name: expected.name.into(),
        window: first.unwrap_or(counted.len().min(again.len())),
        windows: [counted.len(), again.len()],
    })
}

/// The call alone takes the same every time.
pub fn call_alone(windows: &[Window], flash: u64) -> CallAlone {
    let instructions = windows.iter().map(|window| window.instructions).min().unwrap_or(0);
    let cycles = [0, 1].map(|end| windows.iter().map(|window| window.cycles[end]).min().unwrap_or(0));
    CallAlone { instructions, cycles, flash }
}

pub fn cost(expected: &Expected, windows: &[Window], flash: u64, call: CallAlone) -> Cost {
    let mean = |of: &dyn Fn(&Window) -> u64| {
        windows.iter().map(of).sum::<u64>() as f64 / windows.len().max(1) as f64
    };
    let instructions = |window: &Window| window.instructions - call.instructions;
    let mut kinds: Vec<Kind> = windows.iter().flat_map(|window| window.kinds.keys().copied()).collect();
    kinds.sort();
    kinds.dedup();
    Cost {
        name: expected.name,
        what: expected.what,
        ours: expected.ours,
        hip: expected.hip,
        to: match expected.to {
            To::Nothing => "nothing",
            To::Joints => "joints",
            To::Ticks => "ticks",
        },
        instructions: Spread {
            least: windows.iter().map(instructions).min().unwrap_or(0) as f64,
            mean: mean(&instructions),
            most: windows.iter().map(instructions).max().unwrap_or(0) as f64,
        },
        cycles: [0, 1].map(|end| mean(&|window| window.cycles[end]) - call.cycles[end] as f64),
        flash: flash as i64 - call.flash as i64,
        stack_bound: None,
        stack: windows.iter().map(|window| window.stack).max().unwrap_or(0),
        largest_foot_error_mm: expected.largest_foot_error_mm,
        largest_foot_error: expected.largest_foot_error,
        largest_joint_error_rad: expected.largest_joint_error_rad,
        kinds: kinds
            .into_iter()
            .map(|kind| (kind, mean(&|window| window.kinds.get(&kind).copied().unwrap_or(0))))
            .collect(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn window(instructions: u64, cycles: [u64; 2], stack: u64) -> Window {
        Window {
            instructions,
            cycles,
            stack,
            kinds: [(Kind::Simple, instructions)].into(),
            ..Window::default()
        }
    }

    fn run() -> Run {
        Run {
            log: vec!["some-roll 2 77".into()],
            windows: vec![window(104, [150, 160], 40), window(110, [160, 180], 24)],
        }
    }

    #[test]
    fn the_call_is_subtracted() {
        let call = CallAlone { instructions: 4, cycles: [10, 14], flash: 9000 };
        let cost = cost(&Expected::of_two_targets(), &run().windows, 9500, call);
        assert_eq!(cost.instructions, Spread { least: 100.0, mean: 103.0, most: 106.0 });
        assert_eq!(cost.cycles, [145.0, 156.0]);
        assert_eq!((cost.flash, cost.stack), (500, 40));
        assert_eq!(cost.kinds, [(Kind::Simple, 107.0)]);
    }

    #[test]
    fn a_sound_run_passes() {
        assert!(check(&Expected::of_two_targets(), &run()).is_ok());
    }

    #[test]
    fn another_answer_than_the_pcs_is_noticed() {
        let other = Run { log: vec!["some-roll 2 78".into()], ..run() };
        let complaint = check(&Expected::of_two_targets(), &other).expect_err("it differs").to_string();
        assert!(complaint.contains("some-roll 2 78") && complaint.contains("some-roll 2 77"), "{complaint}");
    }

    #[test]
    fn a_run_that_logged_nothing_is_noticed() {
        assert!(matches!(
            check(&Expected::of_two_targets(), &Run { log: vec![], ..run() }),
            Err(Trouble::Differs { .. })
        ));
    }

    #[test]
    fn a_missing_window_is_noticed() {
        let mut short = run();
        short.windows.pop();
        assert!(matches!(
            check(&Expected::of_two_targets(), &short),
            Err(Trouble::WindowsMissing { windows: 1, targets: 2, .. })
        ));
    }

    #[test]
    fn two_counts_that_differ_are_noticed() {
        let windows = run().windows;
        assert!(compare(&Expected::of_two_targets(), &windows, &[104, 110]).is_ok());
        for (again, at) in [(&[104, 111][..], 1), (&[104], 1), (&[104, 110, 1], 2), (&[], 0)] {
            assert!(matches!(
                compare(&Expected::of_two_targets(), &windows, again),
                Err(Trouble::CountsDiffer { window, .. }) if window == at
            ));
        }
    }

    #[test]
    fn an_instruction_without_a_price_is_noticed() {
        let mut odd = run();
        odd.windows[1].unknown_at = Some(0x814);
        let complaint = check(&Expected::of_two_targets(), &odd).expect_err("it has no price").to_string();
        assert!(complaint.contains("0x814"), "{complaint}");
    }
}
