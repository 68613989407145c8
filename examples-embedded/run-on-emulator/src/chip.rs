//! The chip classes: which compiler target builds for one, which emulated machine has one.

use clap::ValueEnum;

#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum Chip {
    /// Cortex-M0: 32-bit multiply, no divide, no FPU
    M0,
    /// Cortex-M3: long multiply and divide, no FPU
    M3,
    /// Cortex-M4F: with a single-precision FPU
    M4f,
}

impl Chip {
    pub fn class(self) -> &'static str {
        match self {
            Self::M0 => "Cortex-M0",
            Self::M3 => "Cortex-M3",
            Self::M4f => "Cortex-M4F",
        }
    }

    pub fn target(self) -> &'static str {
        match self {
            Self::M0 => "thumbv6m-none-eabi",
            Self::M3 => "thumbv7m-none-eabi",
            Self::M4f => "thumbv7em-none-eabihf",
        }
    }

    /// QEMU's name of a machine with such a chip; its memory map is in `board/memory`.
    pub fn machine(self) -> &'static str {
        match self {
            Self::M0 => "microbit",
            Self::M3 => "mps2-an385",
            Self::M4f => "mps2-an386",
        }
    }
}
