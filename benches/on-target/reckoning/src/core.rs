//! The processors, and what their instructions take.
//!
//! Sources: Cortex-M0 Technical Reference Manual (Arm DDI 0432C, table 3-1), Cortex-M0+ (DDI 0484C, table 3-1),
//! Cortex-M3 (Arm 100165, table 3-1, and DDI 0337), Cortex-M4 (Arm 100166, tables 3-1 and 7-1, and DDI 0439).
//! From memory or at second hand: M0+'s branches, M4's loads and branches, all of the FPU, all of RISC-V.
//! Arm publishes no table for the Cortex-M7, which may issue two instructions at once: its range is from half a cycle
//! an instruction to what the M4 takes at most. RISC-V prescribes no timing either: the range spans the variants of a
//! small in-order core of two stages, after the "Pipeline Details" of the Ibex core's documentation (from memory).

use crate::{decode::Decoded, kind::Kind};

/// A processor, as far as cycles go.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Core {
    /// Cortex-M0 with the multiplier of one cycle; the small one takes 31 more for each `MUL`.
    M0,
    /// Cortex-M0+, likewise.
    M0Plus,
    /// Cortex-M3.
    M3,
    /// Cortex-M4 with its FPU.
    M4f,
    /// Cortex-M7 with an FPU.
    M7,
    /// RISC-V, RV32IMC.
    Rv32imc,
}

/// From, to.
pub type Cycles = [u64; 2];

impl Core {
    /// By the name on the plugin's command line.
    pub fn named(name: &str) -> Option<Self> {
        match name {
            "m0" => Some(Self::M0),
            "m0plus" => Some(Self::M0Plus),
            "m3" => Some(Self::M3),
            "m4f" => Some(Self::M4f),
            "m7" => Some(Self::M7),
            "rv32imc" => Some(Self::Rv32imc),
            _ => None,
        }
    }

    /// What an instruction takes, without what a jump adds.
    pub(crate) fn cycles(self, instruction: Decoded, after_access: bool) -> Cycles {
        match self {
            Self::M0 => small(instruction, 4),
            Self::M0Plus => small(instruction, 3),
            Self::M3 => large(instruction, after_access, false),
            Self::M4f | Self::M7 => large(instruction, after_access, true),
            Self::Rv32imc => risc_v(instruction),
        }
    }

    /// What it adds if the next instruction is not the one that follows in memory.
    pub(crate) fn jump(self) -> Cycles {
        match self {
            // A taken branch: 3 on M0, 2 on M0+.
            Self::M0 => [2, 2],
            Self::M0Plus => [1, 1],
            // P, the refill of the pipeline: 1 to 3.
            Self::M3 | Self::M4f | Self::M7 => [1, 3],
            // 2 in all, 3 for a conditional one where no branch unit works it out ahead.
            Self::Rv32imc => [1, 2],
        }
    }

    /// The range of a window, for a processor that may issue two instructions at once.
    pub(crate) fn overlapped(self, [least, most]: Cycles, instructions: u64) -> Cycles {
        match self {
            Self::M7 => [instructions.div_ceil(2), most],
            _ => [least, most],
        }
    }
}

/// M0 and M0+; what a special register takes is from memory.
fn small(Decoded { kind, words, .. }: Decoded, special_register: u64) -> Cycles {
    let cycles = match kind {
        Kind::Load | Kind::Store => 2,
        // 1 + N. With the program counter in the list 4 + N at most, jump included: the tables can be read to count
        // it in N or not.
        Kind::Multiple => 1 + u64::from(words),
        Kind::SpecialRegister => special_register,
        // BL: 4 on M0, 3 on M0+, jump included.
        Kind::Call => 2,
        _ => 1,
    };
    [cycles; 2]
}

fn risc_v(Decoded { kind, .. }: Decoded) -> Cycles {
    match kind {
        Kind::Load | Kind::Store => [2, 2],
        // The multiplier of one cycle, and the one of three and four.
        Kind::Multiply => [1, 3],
        Kind::LongMultiply => [2, 4],
        Kind::Divide => [37, 37],
        _ => [1, 1],
    }
}

fn large(Decoded { kind, words, .. }: Decoded, after_access: bool, is_m4: bool) -> Cycles {
    match kind {
        // 2, or 1 behind another access, into whose second cycle its address phase falls.
        Kind::Load => [if after_access { 1 } else { 2 }, 2],
        // 2, or 1 where the write buffer takes it.
        Kind::Store => [1, 2],
        Kind::Multiple => [1 + u64::from(words), 1 + u64::from(words)],
        Kind::TableBranch => [2, 2],
        Kind::MultiplyAccumulate => {
            if is_m4 {
                [1, 1]
            } else {
                [2, 2]
            }
        }
        Kind::LongMultiply => {
            if is_m4 {
                [1, 1]
            } else {
                [3, 5]
            }
        }
        Kind::LongMultiplyAccumulate => {
            if is_m4 {
                [1, 1]
            } else {
                [4, 7]
            }
        }
        Kind::Divide => [2, 12],
        // From memory.
        Kind::SpecialRegister => [1, 2],
        // Nothing if it is folded into the instruction before.
        Kind::IfThen => [0, 1],
        // One more if the next instruction waits for the result.
        Kind::FloatArithmetic => [1, 2],
        Kind::FloatMultiplyAccumulate => [3, 4],
        Kind::FloatDivide | Kind::FloatRoot => [14, 15],
        Kind::FloatLoad | Kind::FloatStore | Kind::FloatMovePair => [2, 2],
        _ => [1, 1],
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn of(kind: Kind, words: u8) -> Decoded {
        Decoded { kind, words, length: 2 }
    }

    /// What the tables print for an instruction that jumps: the two parts together.
    fn jumping(core: Core, instruction: Decoded) -> Cycles {
        let (own, jump) = (core.cycles(instruction, false), core.jump());
        [own[0] + jump[0], own[1] + jump[1]]
    }

    /// DDI 0432C (M0) and DDI 0484C (M0+), table 3-1 of both; see the module for what is from memory.
    #[test]
    fn the_small_table() {
        let cycles = |kind, words| Core::M0.cycles(of(kind, words), true);
        for (kind, words) in [(Kind::Simple, 0), (Kind::Load, 0), (Kind::Multiple, 5), (Kind::Call, 0)] {
            assert_eq!(Core::M0Plus.cycles(of(kind, words), false), cycles(kind, words), "{kind:?}");
        }
        assert_eq!(cycles(Kind::Simple, 0), [1, 1]);
        assert_eq!(cycles(Kind::Multiply, 0), [1, 1]);
        assert_eq!(cycles(Kind::Load, 0), [2, 2]);
        assert_eq!(cycles(Kind::Store, 0), [2, 2]);
        assert_eq!(cycles(Kind::Multiple, 4), [5, 5]);
        assert_eq!(cycles(Kind::Branch, 0), [1, 1]);
        for (kind, m0, m0_plus) in [(Kind::Branch, 3, 2), (Kind::Call, 4, 3), (Kind::Exchange, 3, 2)] {
            assert_eq!(jumping(Core::M0, of(kind, 0)), [m0; 2], "{kind:?}");
            assert_eq!(jumping(Core::M0Plus, of(kind, 0)), [m0_plus; 2], "{kind:?}");
        }
    }

    /// Arm 100165 (M3), table 3-1, and 100166 (M4), table 3-1; see the module for what is from memory.
    #[test]
    fn the_large_tables() {
        for (kind, m3, m4) in [
            (Kind::Simple, [1, 1], [1, 1]),
            (Kind::Multiply, [1, 1], [1, 1]),
            (Kind::MultiplyAccumulate, [2, 2], [1, 1]),
            (Kind::LongMultiply, [3, 5], [1, 1]),
            (Kind::LongMultiplyAccumulate, [4, 7], [1, 1]),
            (Kind::Divide, [2, 12], [2, 12]),
            (Kind::Load, [2, 2], [2, 2]),
        ] {
            assert_eq!(Core::M3.cycles(of(kind, 0), false), m3, "{kind:?}");
            assert_eq!(Core::M4f.cycles(of(kind, 0), false), m4, "{kind:?}");
        }
        assert_eq!(Core::M3.cycles(of(Kind::Load, 0), true), [1, 2]);
        assert_eq!(Core::M4f.cycles(of(Kind::Multiple, 3), false), [4, 4]);
        // 1 + P and 2 + P, P from 1 to 3.
        assert_eq!(jumping(Core::M3, of(Kind::Branch, 0)), [2, 4]);
        assert_eq!(jumping(Core::M3, of(Kind::TableBranch, 0)), [3, 5]);
        // The FPU: from memory.
        assert_eq!(Core::M4f.cycles(of(Kind::FloatArithmetic, 0), false)[0], 1);
        assert_eq!(Core::M4f.cycles(of(Kind::FloatMultiplyAccumulate, 0), false)[0], 3);
        assert_eq!(Core::M4f.cycles(of(Kind::FloatDivide, 0), false)[0], 14);
        assert_eq!(Core::M4f.cycles(of(Kind::FloatRoot, 0), false)[0], 14);
    }

    #[test]
    fn a_range_is_never_upside_down() {
        for core in [Core::M0, Core::M0Plus, Core::M3, Core::M4f, Core::M7, Core::Rv32imc] {
            for kind in [Kind::Load, Kind::Store, Kind::IfThen, Kind::Divide, Kind::SpecialRegister] {
                for after_access in [false, true] {
                    let [least, most] = core.cycles(of(kind, 0), after_access);
                    assert!(least <= most, "{core:?} {kind:?}");
                }
            }
        }
    }

    #[test]
    fn two_at_once_halve_the_least_and_leave_the_most() {
        assert_eq!(Core::M7.overlapped([9, 12], 7), [4, 12]);
        assert_eq!(Core::M4f.overlapped([9, 12], 7), [9, 12]);
    }
}
