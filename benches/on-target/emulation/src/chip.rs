//! The chip classes: which compiler target builds for one, which emulated machine has one, whose cycle table prices
//! it.

use clap::ValueEnum;
use serde::Serialize;

/// A chip class.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum, Serialize)]
#[serde(rename_all = "kebab-case")]
pub enum Chip {
    /// Cortex-M0: 32-bit multiply, no divide, no FPU
    M0,
    /// Cortex-M0+: runs what is built for M0, with shorter branches
    #[value(name = "m0plus")]
    #[serde(rename = "m0plus")]
    M0Plus,
    /// Cortex-M3: long multiply and divide, no FPU
    M3,
    /// Cortex-M4F: with a single-precision FPU
    M4f,
    /// Cortex-M4F with code that the compiler optimised for it (-Ctarget-cpu=cortex-m4); only if asked for
    M4fTuned,
    /// Cortex-M7: runs what is built for M4F
    M7,
    /// RV32IMC: RISC-V with long multiply and divide, no FPU
    Rv32imc,
}

impl Chip {
    /// What the published table of contenders is for.
    pub const CONTENDED: [Self; 3] = [Self::M0, Self::M3, Self::M4f];
    /// What the guard is about: one for every compiler target.
    pub const GUARDED: [Self; 4] = [Self::M0, Self::M3, Self::M4f, Self::Rv32imc];
    /// What a robot is counted on if no chip is named.
    pub const CLASSES: [Self; 6] = [Self::M0, Self::M0Plus, Self::M3, Self::M4f, Self::M7, Self::Rv32imc];

    /// Its name for people.
    pub fn class(self) -> &'static str {
        match self {
            Self::M0 => "Cortex-M0",
            Self::M0Plus => "Cortex-M0+",
            Self::M3 => "Cortex-M3",
            Self::M4f => "Cortex-M4F",
            Self::M4fTuned => "Cortex-M4F, -Ctarget-cpu=cortex-m4",
            Self::M7 => "Cortex-M7",
            Self::Rv32imc => "RV32IMC",
        }
    }

    /// The compiler's.
    pub fn target(self) -> &'static str {
        match self {
            Self::M0 | Self::M0Plus => "thumbv6m-none-eabi",
            Self::M3 => "thumbv7m-none-eabi",
            Self::M4f | Self::M4fTuned | Self::M7 => "thumbv7em-none-eabihf",
            Self::Rv32imc => "riscv32imc-unknown-none-elf",
        }
    }

    /// The compiler's name of the processor to optimise for, where that is not the target's own choice.
    pub fn optimised_for(self) -> Option<&'static str> {
        (self == Self::M4fTuned).then_some("cortex-m4")
    }

    /// The program that emulates it.
    pub fn emulator(self) -> &'static str {
        if self == Self::Rv32imc { "qemu-system-riscv32" } else { "qemu-system-arm" }
    }

    /// QEMU's name of a machine with such a chip; its memory map is the board's. There is no machine with an M0+; an
    /// M0 executes the same instructions.
    pub fn machine(self) -> &'static str {
        match self {
            Self::M0 | Self::M0Plus => "microbit",
            Self::M3 => "mps2-an385",
            Self::M4f | Self::M4fTuned => "mps2-an386",
            Self::M7 => "mps2-an500",
            Self::Rv32imc => "virt",
        }
    }

    /// What QEMU must be told beyond the machine.
    pub(crate) fn processor(self) -> &'static [&'static str] {
        match self {
            // No floating point and no atomics, so that an image which has them ends in a fault.
            Self::Rv32imc => &["-bios", "none", "-cpu", "rv32,f=false,d=false,a=false"],
            _ => &[],
        }
    }

    /// Where in the emulated memory there is room behind an image for 128 KB of data.
    pub fn data_at(self) -> u32 {
        match self {
            Self::M0 | Self::M0Plus => 0x2_0000,
            Self::M3 | Self::M4f | Self::M4fTuned | Self::M7 => 0x2_0000,
            Self::Rv32imc => 0x8002_0000,
        }
    }

    /// How many instructions a tick of its system timer is, when the emulator's clock goes by instructions, a nanosecond each;
    /// `None` if it has none, but a counter of instructions.
    pub fn instructions_per_tick(self) -> Option<f64> {
        match self {
            // By the machine's clock: 16 MHz, 25 MHz.
            Self::M0 | Self::M0Plus => Some(62.5),
            Self::M3 | Self::M4f | Self::M4fTuned | Self::M7 => Some(40.0),
            Self::Rv32imc => None,
        }
    }

    /// The plugin's name of its cycle table.
    pub(crate) fn cycle_table(self) -> &'static str {
        match self {
            Self::M0 => "m0",
            Self::M0Plus => "m0plus",
            Self::M3 => "m3",
            Self::M4f | Self::M4fTuned => "m4f",
            Self::M7 => "m7",
            Self::Rv32imc => "rv32imc",
        }
    }

    /// Where its cycles come from; what of it is from memory stands in `reckoning/src/core.rs`.
    pub fn cycles_from(self) -> &'static str {
        match self {
            Self::M0 => "Cortex-M0 TRM (DDI 0432C), table 3-1, multiplier of one cycle",
            Self::M0Plus => "Cortex-M0+ TRM (DDI 0484C), table 3-1, multiplier of one cycle",
            Self::M3 => "Cortex-M3 TRM (Arm 100165), table 3-1",
            Self::M4f | Self::M4fTuned => "Cortex-M4 TRM (Arm 100166), tables 3-1 and 7-1",
            Self::M7 => "no table is published: from half a cycle an instruction to the Cortex-M4's most",
            Self::Rv32imc => {
                "a small two-stage core, after the Ibex core's documentation (from memory); RISC-V prescribes no timing"
            }
        }
    }

    /// A clock that is usual for the class, Hz: common practice, no source.
    pub fn usual_clock_hz(self) -> f64 {
        match self {
            Self::M0 | Self::M0Plus => 48e6,
            Self::M3 => 72e6,
            Self::M4f | Self::M4fTuned => 168e6,
            Self::M7 => 216e6,
            Self::Rv32imc => 160e6,
        }
    }
}
