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
    /// Cortex-M7: runs what is built for M4F
    M7,
    /// RV32IMC: RISC-V with long multiply and divide, no FPU
    Rv32imc,
}

impl Chip {
    pub fn class(self) -> &'static str {
        match self {
            Self::M0 => "Cortex-M0",
            Self::M3 => "Cortex-M3",
            Self::M4f => "Cortex-M4F",
            Self::M7 => "Cortex-M7",
            Self::Rv32imc => "RV32IMC",
        }
    }

    pub fn target(self) -> &'static str {
        match self {
            Self::M0 => "thumbv6m-none-eabi",
            Self::M3 => "thumbv7m-none-eabi",
            Self::M4f | Self::M7 => "thumbv7em-none-eabihf",
            Self::Rv32imc => "riscv32imc-unknown-none-elf",
        }
    }

    /// QEMU's name of a machine with such a chip; its memory map is in `board/memory`.
    pub fn machine(self) -> &'static str {
        match self {
            Self::M0 => "microbit",
            Self::M3 => "mps2-an385",
            Self::M4f => "mps2-an386",
            Self::M7 => "mps2-an500",
            Self::Rv32imc => "virt",
        }
    }

    /// QEMU's program that emulates it, and what it must be told beyond the machine.
    pub fn emulator(self) -> (&'static str, &'static [&'static str]) {
        match self {
            Self::M0 | Self::M3 | Self::M4f | Self::M7 => ("qemu-system-arm", &[]),
            // No floating point and no atomics, so that an image which has them ends in a fault.
            Self::Rv32imc => {
                ("qemu-system-riscv32", &["-bios", "none", "-cpu", "rv32,f=false,d=false,a=false"])
            }
        }
    }
}
