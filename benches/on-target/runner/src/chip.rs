//! The chip classes: which compiler target builds for one, which emulated machine has one, whose cycle table prices
//! it.

use clap::ValueEnum;
use serde::Serialize;

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum, Serialize)]
#[serde(rename_all = "kebab-case")]
pub enum Chip {
    /// Cortex-M0: 32-bit multiply, no divide, no FPU
    M0,
    /// Cortex-M3: long multiply and divide, no FPU
    M3,
    /// Cortex-M4F: with a single-precision FPU
    M4f,
    /// Cortex-M4F with code that the compiler optimised for it (-Ctarget-cpu=cortex-m4); only if asked for
    M4fTuned,
}

impl Chip {
    /// What is counted if no chip is named.
    pub const USUAL: [Self; 3] = [Self::M0, Self::M3, Self::M4f];

    pub fn class(self) -> &'static str {
        match self {
            Self::M0 => "Cortex-M0",
            Self::M3 => "Cortex-M3",
            Self::M4f => "Cortex-M4F",
            Self::M4fTuned => "Cortex-M4F, -Ctarget-cpu=cortex-m4",
        }
    }

    pub fn target(self) -> &'static str {
        match self {
            Self::M0 => "thumbv6m-none-eabi",
            Self::M3 => "thumbv7m-none-eabi",
            Self::M4f | Self::M4fTuned => "thumbv7em-none-eabihf",
        }
    }

    /// The compiler's name of the processor to optimise for, where that is not the target's own choice.
    pub fn optimised_for(self) -> Option<&'static str> {
        (self == Self::M4fTuned).then_some("cortex-m4")
    }

    /// QEMU's name of a machine with such a chip; its memory map is the board's.
    pub fn machine(self) -> &'static str {
        match self {
            Self::M0 => "microbit",
            Self::M3 => "mps2-an385",
            Self::M4f | Self::M4fTuned => "mps2-an386",
        }
    }

    /// The plugin's name of its cycle table.
    pub fn cycle_table(self) -> &'static str {
        match self {
            Self::M0 => "m0",
            Self::M3 => "m3",
            Self::M4f | Self::M4fTuned => "m4f",
        }
    }

    /// What the cycles are those of.
    pub fn cycles_of(self) -> &'static str {
        match self {
            Self::M0 => "from M0+ to M0, multiplier of one cycle",
            Self::M3 => "M3",
            Self::M4f | Self::M4fTuned => "M4 with FPU",
        }
    }
}
