//! The deepest that a function can go on the stack, whatever it is given: from the disassembly of the linked image, every
//! way down the call graph added up. What moves the stack pointer in a way that is not understood, a call through a
//! register, or recursion is an error: no bound is better than a wrong one.

use std::{
    collections::{BTreeMap, BTreeSet},
    fs,
    path::Path,
};

use capstone::{
    Capstone, Insn, RegId,
    arch::{
        BuildsCapstone, BuildsCapstoneExtraMode, DetailsArchInsn,
        arm::{self, ArmInsn, ArmOperandType},
        riscv::{self, RiscVInsn, RiscVOperand},
    },
};
use object::{Object, ObjectSection, ObjectSymbol, SectionKind, SymbolKind};

use crate::trouble::Trouble;

/// What a function does with the stack, and whom it calls.
#[derive(Debug, Default, Clone, PartialEq, Eq)]
struct Frame {
    bytes: u64,
    calls: BTreeSet<u64>,
}

/// What is counted in every image: the function `entry`, by its mangled name.
const ENTRY: &str = "5entry";

/// Bytes below the caller's stack pointer that what is counted in an image can come to.
///
/// # Errors
/// If there is no such function, or no bound can be given.
pub fn stack_bound(image: &Path) -> Result<u64, Trouble> {
    let bad = |problem: String| Trouble::BadFile { path: image.to_owned(), problem };
    let data = fs::read(image).map_err(|error| bad(error.to_string()))?;
    bound_of(&data).map_err(bad)
}

fn bound_of(image: &[u8]) -> Result<u64, String> {
    let code = Code::of(image)?;
    let root = code.named(ENTRY).ok_or("has no function `entry`")?;
    code.depth(root, &mut Vec::new(), &mut BTreeMap::new())
}

struct Code<'d> {
    file: object::File<'d>,
    /// Start and size by name's order; the lowest bit of a Thumb function's address is not part of it.
    functions: BTreeMap<u64, (u64, String)>,
    /// Where data lie between instructions: from, to.
    pools: Vec<[u64; 2]>,
    capstone: Capstone,
    is_thumb: bool,
}

impl<'d> Code<'d> {
    fn of(data: &'d [u8]) -> Result<Self, String> {
        let file = object::File::parse(data).map_err(|error| error.to_string())?;
        let is_thumb = file.architecture() == object::Architecture::Arm;
        let capstone = if is_thumb {
            let thumb = Capstone::new().arm().mode(arm::ArchMode::Thumb);
            thumb.extra_mode([arm::ArchExtraMode::MClass].into_iter()).detail(true).build()
        } else {
            let risc_v = Capstone::new().riscv().mode(riscv::ArchMode::RiscV32);
            risc_v.extra_mode([riscv::ArchExtraMode::RiscVC].into_iter()).detail(true).build()
        }
        .map_err(|error| error.to_string())?;
        let even = |address: u64| if is_thumb { address & !1 } else { address };
        let mut functions = BTreeMap::new();
        let mut marks = BTreeMap::new();
        for symbol in file.symbols() {
            let name = symbol.name().unwrap_or_default();
            if symbol.kind() == SymbolKind::Text && symbol.size() > 0 {
                functions.insert(even(symbol.address()), (symbol.size(), name.to_owned()));
            } else if name.starts_with("$d") || name.starts_with("$t") || name.starts_with("$x") {
                marks.insert(symbol.address(), name.starts_with("$d"));
            }
        }
        let ends = marks.keys().skip(1).copied().chain([u64::MAX]);
        let pools = marks.iter().zip(ends).filter(|((_, is_data), _)| **is_data);
        let pools = pools.map(|((start, _), end)| [*start, end]).collect();
        Ok(Self { file, functions, pools, capstone, is_thumb })
    }

    fn named(&self, word: &str) -> Option<u64> {
        self.functions.iter().find(|(_, (_, name))| name.contains(word)).map(|(start, _)| *start)
    }

    /// The function that holds an address.
    fn holding(&self, address: u64) -> Option<u64> {
        let (start, (size, _)) = self.functions.range(..=address).next_back()?;
        (address < start + size).then_some(*start)
    }

    fn depth(&self, at: u64, way: &mut Vec<u64>, known: &mut BTreeMap<u64, u64>) -> Result<u64, String> {
        if let Some(depth) = known.get(&at) {
            return Ok(*depth);
        }
        let name = || self.functions.get(&at).map_or_else(|| format!("{at:#x}"), |(_, name)| name.clone());
        if way.contains(&at) {
            return Err(format!("{} calls itself: no bound for the stack", name()));
        }
        way.push(at);
        let frame = self.frame(at).map_err(|problem| format!("{}: {problem}", name()))?;
        let mut deepest = 0;
        for call in &frame.calls {
            deepest = deepest.max(self.depth(*call, way, known)?);
        }
        way.pop();
        known.insert(at, frame.bytes + deepest);
        Ok(frame.bytes + deepest)
    }

    fn bytes(&self, address: u64, length: u64) -> Option<&'d [u8]> {
        let sections = self.file.sections();
        let mut sections = sections.filter(|section| {
            matches!(section.kind(), SectionKind::Text | SectionKind::ReadOnlyData | SectionKind::Data)
        });
        sections.find_map(|section| section.data_range(address, length).ok()?)
    }

    fn frame(&self, start: u64) -> Result<Frame, String> {
        let (size, _) = self.functions.get(&start).ok_or("is no function with a size")?;
        let end = start + size;
        let mut frame = Frame::default();
        let (mut literals, mut far) = (BTreeMap::new(), None);
        let mut at = start;
        while at < end {
            if let Some([_, after]) = self.pools.iter().find(|[from, to]| (*from..*to).contains(&at)) {
                at = *after;
                continue;
            }
            let code = self.bytes(at, (end - at).min(4)).ok_or("lies outside of the image")?;
            let instructions = self.capstone.disasm_count(code, at, 1).map_err(|error| error.to_string())?;
            let instruction = instructions.first().ok_or_else(|| format!("no instruction at {at:#x}"))?;
            if self.is_thumb {
                self.thumb(instruction, &mut frame, &mut literals)
            } else {
                self.risc_v(instruction, &mut frame, &mut far)
            }
            .map_err(|problem| format!("{instruction}: {problem}"))?;
            at += instruction.len() as u64;
        }
        // A jump to a place within is no call.
        frame.calls.retain(|call| !(start..end).contains(call));
        let calls = frame
            .calls
            .iter()
            .map(|call| self.holding(*call).ok_or(format!("calls {call:#x}, which is none")));
        frame.calls = calls.collect::<Result<_, _>>()?;
        Ok(frame)
    }

    fn thumb(
        &self,
        instruction: &Insn<'_>,
        frame: &mut Frame,
        literals: &mut BTreeMap<u16, i64>,
    ) -> Result<(), String> {
        use ArmInsn::*;

        let detail = self.capstone.insn_detail(instruction).map_err(|error| error.to_string())?;
        let arch = detail.arch_detail();
        let operands: Vec<ArmOperandType> =
            arch.arm().ok_or("no operands")?.operands().map(|operand| operand.op_type).collect();
        let is_sp = |register: &RegId| u32::from(register.0) == arm::ArmReg::ARM_REG_SP;
        let register = |operand: Option<&ArmOperandType>| match operand {
            Some(ArmOperandType::Reg(register)) => Some(*register),
            _ => None,
        };
        let first_is_sp = register(operands.first()).is_some_and(|first| is_sp(&first));
        let immediate = operands.iter().find_map(|operand| match operand {
            ArmOperandType::Imm(value) => Some(i64::from(*value)),
            _ => None,
        });
        let registers = |skip: usize| -> u64 {
            let saved = operands.iter().skip(skip).filter_map(|operand| register(Some(operand)));
            saved
                .map(|saved| {
                    self.capstone.reg_name(saved).map_or(8, |name| if name.starts_with('d') { 8 } else { 4 })
                })
                .sum()
        };
        match ArmInsn::from(instruction.id().0) {
            ARM_INS_PUSH | ARM_INS_VPUSH => frame.bytes += registers(0),
            ARM_INS_STMDB | ARM_INS_VSTMDB if first_is_sp => frame.bytes += registers(1),
            ARM_INS_SUB | ARM_INS_SUBW if first_is_sp => {
                frame.bytes += immediate
                    .and_then(|value| u64::try_from(value).ok())
                    .ok_or("moves the stack by what?")?;
            }
            ARM_INS_ADD if first_is_sp && immediate.is_none() => {
                // Large frames of the small chip: the negative size comes from a literal.
                let by = register(operands.last()).and_then(|by| literals.get(&by.0));
                frame.bytes += by.ok_or("moves the stack by what?")?.min(&0).unsigned_abs();
            }
            ARM_INS_LDR => {
                if let (Some(to), Some(ArmOperandType::Mem(from))) =
                    (register(operands.first()), operands.get(1))
                {
                    let value = (u32::from(from.base().0) == arm::ArmReg::ARM_REG_PC)
                        .then(|| ((instruction.address() + 4) & !3).wrapping_add_signed(from.disp().into()))
                        .and_then(|address| self.bytes(address, 4)?.first_chunk().copied())
                        .map(|bytes| i64::from(i32::from_le_bytes(bytes)));
                    match value {
                        Some(value) => literals.insert(to.0, value),
                        None => literals.remove(&to.0),
                    };
                }
            }
            ARM_INS_STR | ARM_INS_STRD => {
                let down = operands.iter().find_map(|operand| match operand {
                    ArmOperandType::Mem(to) if is_sp(&to.base()) && to.disp() < 0 => {
                        Some(to.disp().unsigned_abs())
                    }
                    _ => None,
                });
                frame.bytes += u64::from(down.unwrap_or(0));
            }
            ARM_INS_BL => {
                frame.calls.insert(immediate.ok_or("calls whom?")? as u64 & 0xFFFF_FFFF);
            }
            ARM_INS_B => {
                frame.calls.insert(immediate.ok_or("jumps where?")? as u64 & 0xFFFF_FFFF);
            }
            ARM_INS_BLX => return Err("a call through a register".into()),
            ARM_INS_BX
                if register(operands.first()).map(|to| u32::from(to.0)) != Some(arm::ArmReg::ARM_REG_LR) =>
            {
                return Err("a jump through a register".into());
            }
            ARM_INS_MOV | ARM_INS_MOVS if first_is_sp => return Err("moves the stack to where?".into()),
            _ => {}
        }
        Ok(())
    }

    /// `far` is the register and the address that the instruction before, `auipc`, has made for a far call.
    fn risc_v(
        &self,
        instruction: &Insn<'_>,
        frame: &mut Frame,
        far: &mut Option<(String, u64)>,
    ) -> Result<(), String> {
        use RiscVInsn::*;

        let detail = self.capstone.insn_detail(instruction).map_err(|error| error.to_string())?;
        let arch = detail.arch_detail();
        let operands: Vec<RiscVOperand> = arch.riscv().ok_or("no operands")?.operands().collect();
        let register = |operand: Option<&RiscVOperand>| match operand {
            Some(RiscVOperand::Reg(register)) => self.capstone.reg_name(*register),
            _ => None,
        };
        let first = register(operands.first());
        let immediate = operands.iter().find_map(|operand| match operand {
            RiscVOperand::Imm(value) => Some(*value),
            _ => None,
        });
        let target =
            || immediate.map(|offset| instruction.address().wrapping_add_signed(offset) & 0xFFFF_FFFF);
        match RiscVInsn::from(instruction.id().0) {
            RISCV_INS_ADDI | RISCV_INS_C_ADDI | RISCV_INS_C_ADDI16SP if first.as_deref() == Some("sp") => {
                frame.bytes += immediate.ok_or("moves the stack by what?")?.min(0).unsigned_abs();
            }
            RISCV_INS_ADD | RISCV_INS_SUB | RISCV_INS_C_ADD | RISCV_INS_C_MV
                if first.as_deref() == Some("sp") =>
            {
                return Err("moves the stack by what?".into());
            }
            RISCV_INS_JAL | RISCV_INS_C_JAL | RISCV_INS_C_J => {
                frame.calls.insert(target().ok_or("calls whom?")?);
            }
            RISCV_INS_AUIPC => {
                let page = immediate.ok_or("an address of what?")? << 12;
                let address = instruction.address().wrapping_add_signed(page) & 0xFFFF_FFFF;
                *far = first.map(|register| (register, address));
                return Ok(());
            }
            RISCV_INS_JALR => {
                // The last register is the one that holds the address; a jump writes no return address, but is a call here.
                let by = operands.iter().rev().find_map(|operand| register(Some(operand)));
                match (far.take(), by) {
                    (Some((register, address)), Some(by)) if register == by => {
                        let target = address.wrapping_add_signed(immediate.unwrap_or(0)) & 0xFFFF_FFFF;
                        frame.calls.insert(target);
                    }
                    _ => return Err("a call through a register".into()),
                }
            }
            RISCV_INS_C_JALR => return Err("a call through a register".into()),
            RISCV_INS_C_JR if first.as_deref() != Some("ra") => {
                return Err("a jump through a register".into());
            }
            _ => {}
        }
        *far = None;
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    use object::write::{Object, StandardSection, Symbol, SymbolSection};
    use object::{Architecture, BinaryFormat, Endianness, SymbolFlags, SymbolScope};

    use super::*;

    /// An object file with two functions, the second one called `leaf`. All code as LLVM's assembler encodes the text.
    fn image(architecture: Architecture, entry: &[u8], leaf: &[u8]) -> Vec<u8> {
        let mut object = Object::new(BinaryFormat::Elf, architecture, Endianness::Little);
        let text = object.section_id(StandardSection::Text);
        for (name, code) in [("_ZN5image5entry17h0E", entry), ("leaf", leaf)] {
            let symbol = object.add_symbol(Symbol {
                name: name.into(),
                value: 0,
                size: code.len() as u64,
                kind: SymbolKind::Text,
                scope: SymbolScope::Linkage,
                weak: false,
                section: SymbolSection::Undefined,
                flags: SymbolFlags::None,
            });
            object.add_symbol_data(symbol, text, code, 2);
        }
        object.write().expect("a small object file")
    }

    fn thumb(entry: &[u16], leaf: &[u16]) -> Result<u64, String> {
        let bytes =
            |halfwords: &[u16]| halfwords.iter().flat_map(|half| half.to_le_bytes()).collect::<Vec<_>>();
        bound_of(&image(Architecture::Arm, &bytes(entry), &bytes(leaf)))
    }

    /// push {r4, lr}; sub sp, #16; bl leaf; add sp, #16; pop {r4, pc}
    const ENTRY_CODE: [u16; 6] = [0xb510, 0xb084, 0xf000, 0xf802, 0xb004, 0xbd10];

    #[test]
    fn frames_add_up_along_the_deepest_way() {
        // push {r4, r5, r6, r7, lr}; pop {r4, r5, r6, r7, pc}
        assert_eq!(thumb(&ENTRY_CODE, &[0xb5f0, 0xbdf0]), Ok(8 + 16 + 20));
        // bx lr
        assert_eq!(thumb(&ENTRY_CODE, &[0x4770]), Ok(8 + 16));
        // vpush {d8, d9}; bx lr
        assert_eq!(thumb(&ENTRY_CODE, &[0xed2d, 0x8b04, 0x4770]), Ok(8 + 16 + 16));
    }

    #[test]
    fn what_has_no_bound_gets_none() {
        // push {r4, lr}; bl entry; pop {r4, pc}
        let recursive = thumb(&ENTRY_CODE, &[0xb510, 0xf7ff, 0xfff7, 0xbd10]);
        assert!(recursive.is_err_and(|why| why.contains("calls itself")));
        // blx r3; bx lr
        let by_register = thumb(&ENTRY_CODE, &[0x4798, 0x4770]);
        assert!(by_register.is_err_and(|why| why.contains("through a register")));
        // mov sp, r4; bx lr
        let moved = thumb(&ENTRY_CODE, &[0x46a5, 0x4770]);
        assert!(moved.is_err_and(|why| why.contains("moves the stack")));
        assert!(bound_of(&image(Architecture::Riscv32, &[], &[])).is_err());
    }

    #[test]
    fn far_calls_of_risc_v_are_followed() {
        // addi sp, sp, -32; auipc ra, 0; jalr 12(ra); addi sp, sp, 32; ret
        let entry = [0x01, 0x11, 0x97, 0x00, 0x00, 0x00, 0xe7, 0x80, 0xc0, 0x00, 0x05, 0x61, 0x82, 0x80];
        // addi sp, sp, -16; addi sp, sp, 16; ret
        let leaf = [0x41, 0x11, 0x41, 0x01, 0x82, 0x80];
        assert_eq!(bound_of(&image(Architecture::Riscv32, &entry, &leaf)), Ok(32 + 16));
        // jalr a3: a call through a register that no `auipc` has filled.
        assert!(bound_of(&image(Architecture::Riscv32, &[0x82, 0x96], &leaf)).is_err());
    }
}
