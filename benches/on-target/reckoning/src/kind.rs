//! The kinds of instruction that the cycle tables tell apart.

use serde::{Deserialize, Serialize};

/// A kind of instruction.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum Kind {
    /// Opens a window; not part of it.
    OpeningMarker,
    /// Closes it.
    ClosingMarker,
    /// Arithmetic, logic, moves, shifts, bit fields, extensions, saturation, no-operation.
    Simple,
    /// One word or less from memory.
    Load,
    /// One word or less to memory.
    Store,
    /// Several words from or to memory, of either register file.
    Multiple,
    /// A jump within reach, conditional or not, also on zero.
    Branch,
    /// A call within reach.
    Call,
    /// A jump or call to an address in a register.
    Exchange,
    /// A jump through a table of offsets.
    TableBranch,
    /// 32 bits times 32 bits, the low half.
    Multiply,
    /// The same, accumulated.
    MultiplyAccumulate,
    /// 32 bits times 32 bits, all 64.
    LongMultiply,
    /// The same, accumulated.
    LongMultiplyAccumulate,
    /// Signed or unsigned division.
    Divide,
    /// Condition for up to four instructions that follow.
    IfThen,
    /// To or from a special register (the compiler saves flags so).
    SpecialRegister,
    /// Floating point: add, subtract, multiply, convert.
    FloatArithmetic,
    /// Floating point: compare, absolute value, negate, move, flags.
    FloatSimple,
    /// Floating point: multiply and accumulate, fused or not.
    FloatMultiplyAccumulate,
    /// Floating point: division.
    FloatDivide,
    /// Floating point: square root.
    FloatRoot,
    /// Floating point: one word from memory.
    FloatLoad,
    /// Floating point: one word to memory.
    FloatStore,
    /// Two words between the register files.
    FloatMovePair,
    /// Not in any table here, or not decoded: the cycles of such a window are not to be trusted.
    Unknown,
}
