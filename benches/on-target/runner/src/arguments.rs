//! What can be asked on the command line.

use std::time::Duration;

use clap::Parser;
use emulation::{Chip, Way};

/// Count what a leg costs on emulated chips, for every contender.
///
/// Instructions, stack and flash are exact; cycles are estimated from published tables, zero wait states, not
/// measured on silicon. Sets itself up: compiler targets and emulator are installed where that is possible, else
/// the message says what to install. Exit codes: 0 counted, 1 an answer differs from the PC's or an image went wrong,
/// 2 wrong call, 3 a tool is missing.
#[derive(Debug, Parser)]
#[command(name = "leg-cost", version)]
pub struct Arguments {
    /// Chip class to count on; may be given more than once [default: m0, m3, m4f; with the guard rv32imc as well]
    #[arg(long = "chip", value_enum, value_name = "CLASS")]
    chips: Vec<Chip>,

    /// Count only contenders whose name contains this; may be given more than once
    #[arg(long, value_name = "PART OF NAME")]
    only: Vec<String>,

    /// List the contenders' names and count nothing
    #[arg(long)]
    pub list: bool,

    /// Print JSON instead of tables
    #[arg(long)]
    pub json: bool,

    /// Count every window a second time, from the emulator's own log of executed instructions; it must be the same
    /// (slow: choose some by --only)
    #[arg(long)]
    pub count_twice: bool,

    /// Compare the decoder with LLVM's disassembler over every instruction of the images
    #[arg(long)]
    pub against_disassembler: bool,

    /// Compare what ik-core's own cost with the checked-in table, guard.toml: up to 3 % more pass, else exit code 1
    #[arg(long, conflicts_with_all = ["list", "rewrite_guard"])]
    pub guard: bool,

    /// Write that table anew
    #[arg(long, conflicts_with_all = ["list", "only"])]
    pub rewrite_guard: bool,

    /// Self-test of the guard: take so many percent more instructions as counted
    #[arg(long, hide = true, value_name = "PERCENT", requires = "guard", default_value_t = 0)]
    pub pretend_more: u64,

    /// Where the compiler for the chips comes from
    #[arg(long, value_enum, value_name = "WAY", default_value_t = Way::Auto)]
    pub way: Way,

    /// Seconds after which a run that has not ended is stopped, and has failed
    #[arg(long, value_name = "SECONDS", default_value_t = 120,
          value_parser = clap::value_parser!(u64).range(1..=3600))]
    time_limit: u64,
}

impl Arguments {
    pub fn chips(&self) -> Vec<Chip> {
        match (self.chips.is_empty(), self.guard || self.rewrite_guard) {
            (true, false) => Chip::CONTENDED.to_vec(),
            (true, true) => Chip::GUARDED.to_vec(),
            (false, _) => self.chips.clone(),
        }
    }

    /// Whether a contender of this name is wanted.
    pub fn wants(&self, name: &str, ours: bool) -> bool {
        if (self.guard || self.rewrite_guard) && !ours {
            return false;
        }
        self.only.is_empty() || self.only.iter().any(|part| name.contains(part.as_str()))
    }

    pub fn only(&self) -> &[String] {
        &self.only
    }

    pub fn time_limit(&self) -> Duration {
        Duration::from_secs(self.time_limit)
    }
}
