//! What can be asked on the command line.

use std::{path::PathBuf, time::Duration};

use clap::Parser;
use emulation::{Chip, Way};

/// Count what the legs of a robot's sheet cost on emulated chips; `toehold chips` starts this with a job from a sheet.
#[derive(Debug, Parser)]
#[command(name = "robot-cost", version)]
pub struct Arguments {
    /// The job, as `toehold chips` writes it
    pub job: PathBuf,

    /// Chip class to count on; may be given more than once [default: all]
    #[arg(long = "chip", value_enum, value_name = "CLASS")]
    chips: Vec<Chip>,

    /// Where the compiler for the chips comes from
    #[arg(long, value_enum, value_name = "WAY", default_value_t = Way::Auto)]
    pub way: Way,

    /// Seconds after which a run that has not ended is stopped, and has failed
    #[arg(long, value_name = "SECONDS", default_value_t = 120,
          value_parser = clap::value_parser!(u64).range(1..=3600))]
    time_limit: u64,

    /// Self-test: expect a wrong answer at this target
    #[arg(long, hide = true, value_name = "TARGET")]
    pub spoil: Option<u32>,

    /// Self-test: build the images with the ik-core in this folder
    #[arg(long, hide = true, value_name = "FOLDER")]
    pub ik_core: Option<PathBuf>,
}

impl Arguments {
    pub fn chips(&self) -> Vec<Chip> {
        if self.chips.is_empty() { Chip::CLASSES.to_vec() } else { self.chips.clone() }
    }

    pub fn time_limit(&self) -> Duration {
        Duration::from_secs(self.time_limit)
    }
}
