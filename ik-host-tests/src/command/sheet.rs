//! `toehold sheet`: a sheet to start from.

use super::ending::{Ending, print};
use crate::sheet::DEMOS;

/// Prints a demo robot's sheet, in which every key is explained.
#[derive(Debug, clap::Args)]
pub(super) struct Call {
    /// The demo robot
    #[arg(value_name = "DEMO", default_value = DEMOS[0].name, value_parser = DEMOS.map(|demo| demo.name))]
    demo: String,
}

impl Call {
    pub(super) fn run(&self) -> Ending {
        let text = DEMOS.iter().find(|demo| demo.name == self.demo).map_or("", |demo| demo.text);
        print(text).err().unwrap_or(Ending::Within)
    }
}
