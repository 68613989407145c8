//! What can be asked on the command line.

use std::time::Duration;

use clap::{Parser, ValueEnum};

use crate::chip::Chip;

/// Run the leg images on emulated chips and compare every answer with the PC's, bit for bit.
///
/// Sets itself up: compiler targets and emulator are installed where that is possible, else the
/// message says what to install. Exit codes: 0 all the same, 1 something differs or went wrong on a
/// chip, 2 wrong call, 3 a tool is missing.
#[derive(Debug, Parser)]
#[command(name = "run-on-emulator", version)]
pub struct Arguments {
    /// Chip class to run; may be given more than once [default: all]
    #[arg(long = "chip", value_enum, value_name = "CLASS")]
    chips: Vec<Chip>,

    /// Where the compiler for the chips comes from
    #[arg(long, value_enum, value_name = "WAY", default_value_t = Way::Auto)]
    pub way: Way,

    /// Seconds after which a run that has not ended is stopped, and has failed
    #[arg(long, value_name = "SECONDS", default_value_t = 60,
          value_parser = clap::value_parser!(u64).range(1..=3600))]
    time_limit: u64,

    /// Print every line that a chip logs
    #[arg(long)]
    pub log: bool,

    /// Write the golden files of the model images anew, from what they log
    #[arg(long)]
    pub rewrite_golden: bool,

    /// Check that faulty images and wrong answers are noticed (needs about a minute)
    #[arg(long, conflicts_with_all = ["go_wrong", "spoil", "log"])]
    pub self_test: bool,

    /// Self-test: build an image that goes wrong in this way
    #[arg(long, hide = true, value_enum)]
    pub go_wrong: Option<GoWrong>,

    /// Self-test: expect a wrong answer at this target of the first run
    #[arg(long, hide = true, value_name = "TARGET")]
    pub spoil: Option<u32>,
}

/// Where the compiler for the chips comes from; all but `None` are explained in `.ci/tools.sh`.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum Way {
    /// The compiler in use if it has the targets, else rustup, else Debian's packages
    Auto,
    /// Add targets to the toolchain in use with rustup
    Rustup,
    /// Debian's compiler, with `core` built once
    Distro,
    /// Use what is there and install nothing (needs no bash)
    None,
}

/// The image's features that make it fail on purpose.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum GoWrong {
    Panics,
    Faults,
    Hangs,
    StopsEarly,
}

/// The name by which the command line knows a value.
pub fn name_of(value: &impl ValueEnum) -> String {
    value.to_possible_value().map(|named| named.get_name().to_owned()).unwrap_or_default()
}

impl Arguments {
    pub fn chips(&self) -> Vec<Chip> {
        if self.chips.is_empty() { Chip::value_variants().to_vec() } else { self.chips.clone() }
    }

    pub fn chips_were_named(&self) -> bool {
        !self.chips.is_empty()
    }

    pub fn time_limit(&self) -> Duration {
        Duration::from_secs(self.time_limit)
    }
}
