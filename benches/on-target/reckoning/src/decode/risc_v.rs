//! RISC-V instructions: RV32I with M and C.

use capstone::{
    Capstone,
    arch::{
        BuildsCapstone, BuildsCapstoneExtraMode,
        riscv::{ArchExtraMode, ArchMode, RiscVInsn},
    },
};

use super::Decoded;
use crate::kind::Kind;

pub(super) struct Decoder(Capstone);

/// `slti x0, x0, 8` and `slti x0, x0, 9`: hints, for they write to the register that is always 0.
const OPENING: [u8; 4] = 0x0080_2013_u32.to_le_bytes();
const CLOSING: [u8; 4] = 0x0090_2013_u32.to_le_bytes();

impl Decoder {
    pub(super) fn new() -> Result<Self, capstone::Error> {
        Capstone::new()
            .riscv()
            .mode(ArchMode::RiscV32)
            .extra_mode([ArchExtraMode::RiscVC].into_iter())
            .build()
            .map(Self)
    }

    /// `None` if it cannot be decoded.
    pub(super) fn decode(&self, bytes: &[u8]) -> Option<Decoded> {
        let marker = |kind| Some(Decoded { kind, words: 0, length: 4 });
        match bytes.first_chunk() {
            Some(&OPENING) => return marker(Kind::OpeningMarker),
            Some(&CLOSING) => return marker(Kind::ClosingMarker),
            _ => {}
        }
        let instructions = self.0.disasm_count(bytes, 0, 1).ok()?;
        let instruction = instructions.first()?;
        let length = u8::try_from(instruction.len()).ok()?;
        Some(Decoded { kind: kind(RiscVInsn::from(instruction.id().0)), words: 0, length })
    }
}

fn kind(id: RiscVInsn) -> Kind {
    use RiscVInsn::*;

    match id {
        RISCV_INS_LB | RISCV_INS_LBU | RISCV_INS_LH | RISCV_INS_LHU | RISCV_INS_LW | RISCV_INS_C_LW
        | RISCV_INS_C_LWSP => Kind::Load,
        RISCV_INS_SB | RISCV_INS_SH | RISCV_INS_SW | RISCV_INS_C_SW | RISCV_INS_C_SWSP => Kind::Store,
        RISCV_INS_BEQ | RISCV_INS_BNE | RISCV_INS_BLT | RISCV_INS_BGE | RISCV_INS_BLTU | RISCV_INS_BGEU
        | RISCV_INS_C_BEQZ | RISCV_INS_C_BNEZ | RISCV_INS_C_J => Kind::Branch,
        // With x0 for the return address it is a jump; both take the same.
        RISCV_INS_JAL | RISCV_INS_C_JAL => Kind::Call,
        RISCV_INS_JALR | RISCV_INS_C_JR | RISCV_INS_C_JALR => Kind::Exchange,
        RISCV_INS_MUL => Kind::Multiply,
        RISCV_INS_MULH | RISCV_INS_MULHSU | RISCV_INS_MULHU => Kind::LongMultiply,
        RISCV_INS_DIV | RISCV_INS_DIVU | RISCV_INS_REM | RISCV_INS_REMU => Kind::Divide,
        RISCV_INS_CSRRW | RISCV_INS_CSRRS | RISCV_INS_CSRRC | RISCV_INS_CSRRWI | RISCV_INS_CSRRSI
        | RISCV_INS_CSRRCI => Kind::SpecialRegister,
        RISCV_INS_ADD | RISCV_INS_ADDI | RISCV_INS_AND | RISCV_INS_ANDI | RISCV_INS_AUIPC | RISCV_INS_LUI
        | RISCV_INS_OR | RISCV_INS_ORI | RISCV_INS_SLL | RISCV_INS_SLLI | RISCV_INS_SLT | RISCV_INS_SLTI
        | RISCV_INS_SLTIU | RISCV_INS_SLTU | RISCV_INS_SRA | RISCV_INS_SRAI | RISCV_INS_SRL
        | RISCV_INS_SRLI | RISCV_INS_SUB | RISCV_INS_XOR | RISCV_INS_XORI | RISCV_INS_C_ADD
        | RISCV_INS_C_ADDI | RISCV_INS_C_ADDI16SP | RISCV_INS_C_ADDI4SPN | RISCV_INS_C_AND
        | RISCV_INS_C_ANDI | RISCV_INS_C_LI | RISCV_INS_C_LUI | RISCV_INS_C_MV | RISCV_INS_C_NOP
        | RISCV_INS_C_OR | RISCV_INS_C_SLLI | RISCV_INS_C_SRAI | RISCV_INS_C_SRLI | RISCV_INS_C_SUB
        | RISCV_INS_C_XOR => Kind::Simple,
        _ => Kind::Unknown,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use Kind::*;

    /// Words as LLVM's assembler (llvm-mc 14, `-triple=riscv32 -mattr=+m,+c`) encodes the text; the kinds by hand, after
    /// "The RISC-V Instruction Set Manual, Volume I".
    #[rustfmt::skip]
    const KNOWN: &[(&str, &[u8], Kind)] = &[
        ("slti zero, zero, 8", &[0x13, 0x20, 0x80, 0x00], OpeningMarker),
        ("slti zero, zero, 9", &[0x13, 0x20, 0x90, 0x00], ClosingMarker),
        ("addi a0, a1, 100", &[0x13, 0x85, 0x45, 0x06], Simple),
        ("slti a0, a1, 8", &[0x13, 0xa5, 0x85, 0x00], Simple),
        ("add a0, a1, a2", &[0x33, 0x85, 0xc5, 0x00], Simple),
        ("sltu a0, a1, a2", &[0x33, 0xb5, 0xc5, 0x00], Simple),
        ("lui a0, 74565", &[0x37, 0x55, 0x34, 0x12], Simple),
        ("auipc a0, 3", &[0x17, 0x35, 0x00, 0x00], Simple),
        ("srai a0, a1, 7", &[0x13, 0xd5, 0x75, 0x40], Simple),
        ("sub a0, a1, a2", &[0x33, 0x85, 0xc5, 0x40], Simple),
        ("xori a0, a1, -1", &[0x13, 0xc5, 0xf5, 0xff], Simple),
        ("c.mv a0, a1", &[0x2e, 0x85], Simple),
        ("c.add a0, a1", &[0x2e, 0x95], Simple),
        ("c.li a0, 5", &[0x15, 0x45], Simple),
        ("c.addi16sp sp, -64", &[0x39, 0x71], Simple),
        ("c.addi4spn a0, sp, 16", &[0x08, 0x08], Simple),
        ("c.srli a0, 3", &[0x0d, 0x81], Simple),
        ("c.nop", &[0x01, 0x00], Simple),
        ("lw a0, 4(a1)", &[0xc8, 0x41], Load),
        ("lbu a0, 1(a1)", &[0x03, 0xc5, 0x15, 0x00], Load),
        ("lh a0, 2(a1)", &[0x03, 0x95, 0x25, 0x00], Load),
        ("c.lw a0, 8(a1)", &[0x88, 0x45], Load),
        ("c.lwsp a0, 12(sp)", &[0x32, 0x45], Load),
        ("sw a0, 4(a1)", &[0xc8, 0xc1], Store),
        ("sb a0, 1(a1)", &[0xa3, 0x80, 0xa5, 0x00], Store),
        ("c.sw a0, 8(a1)", &[0x88, 0xc5], Store),
        ("c.swsp a0, 12(sp)", &[0x2a, 0xc6], Store),
        ("beq a0, a1, 16", &[0x63, 0x08, 0xb5, 0x00], Branch),
        ("bgeu a0, a1, 16", &[0x63, 0x78, 0xb5, 0x00], Branch),
        ("c.beqz a0, 16", &[0x01, 0xc9], Branch),
        ("c.bnez a0, 16", &[0x01, 0xe9], Branch),
        ("c.j 16", &[0x01, 0xa8], Branch),
        ("jal ra, 1024", &[0x01, 0x21], Call),
        ("c.jal 16", &[0x01, 0x28], Call),
        ("jalr ra, 8(a0)", &[0xe7, 0x00, 0x85, 0x00], Exchange),
        ("c.jr ra", &[0x82, 0x80], Exchange),
        ("c.jalr a0", &[0x02, 0x95], Exchange),
        ("mul a0, a1, a2", &[0x33, 0x85, 0xc5, 0x02], Multiply),
        ("mulh a0, a1, a2", &[0x33, 0x95, 0xc5, 0x02], LongMultiply),
        ("mulhu a0, a1, a2", &[0x33, 0xb5, 0xc5, 0x02], LongMultiply),
        ("mulhsu a0, a1, a2", &[0x33, 0xa5, 0xc5, 0x02], LongMultiply),
        ("div a0, a1, a2", &[0x33, 0xc5, 0xc5, 0x02], Divide),
        ("remu a0, a1, a2", &[0x33, 0xf5, 0xc5, 0x02], Divide),
        ("csrrs a0, mepc, zero", &[0x73, 0x25, 0x10, 0x34], SpecialRegister),
        ("ecall", &[0x73, 0x00, 0x00, 0x00], Unknown),
        ("wfi", &[0x73, 0x00, 0x50, 0x10], Unknown),
    ];

    #[test]
    fn kinds_of_known_instructions() {
        let decoder = crate::Decoder::new(crate::Core::Rv32imc).expect("capstone");
        for &(text, bytes, kind) in KNOWN {
            let decoded = Decoded { kind, words: 0, length: bytes.len() as u8 };
            assert_eq!(decoder.decode(bytes), decoded, "{text}");
            // What follows an instruction does not change it.
            if kind != Unknown {
                assert_eq!(decoder.decode(&[bytes, &[0x13, 0x00]].concat()), decoded, "{text} and more");
            }
        }
    }
}
