//! Thumb instructions of the M profile.

use capstone::{
    Capstone, RegId,
    arch::{
        BuildsCapstone, BuildsCapstoneExtraMode, DetailsArchInsn,
        arm::{ArchExtraMode, ArchMode, ArmInsn, ArmOperandType},
    },
};

use super::Decoded;
use crate::kind::Kind;

pub(super) struct Decoder(Capstone);

/// Thumb hints 8 and 9.
const OPENING: [u8; 2] = 0xBF80_u16.to_le_bytes();
const CLOSING: [u8; 2] = 0xBF90_u16.to_le_bytes();

impl Decoder {
    pub(super) fn new() -> Result<Self, capstone::Error> {
        Capstone::new()
            .arm()
            .mode(ArchMode::Thumb)
            .extra_mode([ArchExtraMode::MClass].into_iter())
            .detail(true)
            .build()
            .map(Self)
    }

    /// `None` if it cannot be decoded.
    pub(super) fn decode(&self, bytes: &[u8]) -> Option<Decoded> {
        let marker = |kind| Some(Decoded { kind, words: 0, length: 2 });
        match bytes.first_chunk() {
            Some(&OPENING) => marker(Kind::OpeningMarker),
            Some(&CLOSING) => marker(Kind::ClosingMarker),
            _ => self.by_library(bytes),
        }
    }

    fn by_library(&self, bytes: &[u8]) -> Option<Decoded> {
        let instructions = self.0.disasm_count(bytes, 0, 1).ok()?;
        let instruction = instructions.first()?;
        let detail = self.0.insn_detail(instruction).ok()?;
        let registers: Vec<u8> = detail
            .arch_detail()
            .arm()?
            .operands()
            .filter_map(|operand| match operand.op_type {
                ArmOperandType::Reg(register) => Some(self.words_of(register)),
                _ => None,
            })
            .collect();
        let (kind, words) = kind(ArmInsn::from(instruction.id().0), &registers);
        Some(Decoded { kind, words, length: u8::try_from(instruction.len()).ok()? })
    }

    fn words_of(&self, register: RegId) -> u8 {
        // D0 to D31 are the double ones.
        match self.0.reg_name(register) {
            Some(name) if name.starts_with('d') => 2,
            _ => 1,
        }
    }
}

/// The kind, and how many words go to or from memory. `registers` are the words of each register operand.
fn kind(id: ArmInsn, registers: &[u8]) -> (Kind, u8) {
    use ArmInsn::*;

    let only = |kind| (kind, 0);
    let several = |registers: &[u8]| (Kind::Multiple, registers.iter().sum());
    let is_double = registers.first() == Some(&2);
    match id {
        ARM_INS_LDR | ARM_INS_LDRB | ARM_INS_LDRH | ARM_INS_LDRSB | ARM_INS_LDRSH => only(Kind::Load),
        ARM_INS_STR | ARM_INS_STRB | ARM_INS_STRH => only(Kind::Store),
        ARM_INS_LDRD | ARM_INS_STRD => (Kind::Multiple, 2),
        ARM_INS_PUSH | ARM_INS_POP | ARM_INS_VPUSH | ARM_INS_VPOP => several(registers),
        // The first register is the address.
        ARM_INS_LDM | ARM_INS_LDMDB | ARM_INS_STM | ARM_INS_STMDB | ARM_INS_VLDMIA | ARM_INS_VLDMDB
        | ARM_INS_VSTMIA | ARM_INS_VSTMDB => several(registers.get(1..).unwrap_or(&[])),
        ARM_INS_B | ARM_INS_CBZ | ARM_INS_CBNZ => only(Kind::Branch),
        ARM_INS_BL => only(Kind::Call),
        ARM_INS_BX | ARM_INS_BLX => only(Kind::Exchange),
        ARM_INS_TBB | ARM_INS_TBH => only(Kind::TableBranch),
        ARM_INS_MUL => only(Kind::Multiply),
        ARM_INS_MLA | ARM_INS_MLS => only(Kind::MultiplyAccumulate),
        ARM_INS_SMULL | ARM_INS_UMULL => only(Kind::LongMultiply),
        ARM_INS_SMLAL | ARM_INS_UMLAL | ARM_INS_UMAAL => only(Kind::LongMultiplyAccumulate),
        // Only chips with the DSP extension (M4) have these, and there they take one cycle like the others.
        ARM_INS_SMULBB | ARM_INS_SMULBT | ARM_INS_SMULTB | ARM_INS_SMULTT | ARM_INS_SMULWB
        | ARM_INS_SMULWT | ARM_INS_SMMUL | ARM_INS_SMMULR | ARM_INS_SMUAD | ARM_INS_SMUSD => {
            only(Kind::LongMultiply)
        }
        ARM_INS_SMLABB | ARM_INS_SMLABT | ARM_INS_SMLATB | ARM_INS_SMLATT | ARM_INS_SMLAWB
        | ARM_INS_SMLAWT | ARM_INS_SMMLA | ARM_INS_SMMLAR | ARM_INS_SMMLS | ARM_INS_SMMLSR
        | ARM_INS_SMLALBB | ARM_INS_SMLALBT | ARM_INS_SMLALTB | ARM_INS_SMLALTT | ARM_INS_SMLAD
        | ARM_INS_SMLSD => only(Kind::LongMultiplyAccumulate),
        // Two or four additions at once, likewise.
        ARM_INS_QADD16 | ARM_INS_QADD8 | ARM_INS_QSUB16 | ARM_INS_QSUB8 | ARM_INS_QASX | ARM_INS_QSAX
        | ARM_INS_SADD16 | ARM_INS_SADD8 | ARM_INS_SSUB16 | ARM_INS_SSUB8 | ARM_INS_SASX | ARM_INS_SSAX
        | ARM_INS_SHADD16 | ARM_INS_SHADD8 | ARM_INS_SHSUB16 | ARM_INS_SHSUB8 | ARM_INS_SHASX
        | ARM_INS_SHSAX | ARM_INS_UADD16 | ARM_INS_UADD8 | ARM_INS_USUB16 | ARM_INS_USUB8 | ARM_INS_UASX
        | ARM_INS_USAX | ARM_INS_UHADD16 | ARM_INS_UHADD8 | ARM_INS_UHSUB16 | ARM_INS_UHSUB8
        | ARM_INS_UHASX | ARM_INS_UHSAX | ARM_INS_UQADD16 | ARM_INS_UQADD8 | ARM_INS_UQSUB16
        | ARM_INS_UQSUB8 | ARM_INS_UQASX | ARM_INS_UQSAX | ARM_INS_SSAT16 | ARM_INS_USAT16
        | ARM_INS_SXTAB16 | ARM_INS_UXTAB16 | ARM_INS_SXTB16 | ARM_INS_UXTB16 | ARM_INS_USAD8 => {
            only(Kind::Simple)
        }
        ARM_INS_SDIV | ARM_INS_UDIV => only(Kind::Divide),
        ARM_INS_MRS | ARM_INS_MSR => only(Kind::SpecialRegister),
        ARM_INS_IT => only(Kind::IfThen),
        ARM_INS_ADC | ARM_INS_ADD | ARM_INS_ADDW | ARM_INS_ADR | ARM_INS_AND | ARM_INS_ASR | ARM_INS_BFC
        | ARM_INS_BFI | ARM_INS_BIC | ARM_INS_CLZ | ARM_INS_CMN | ARM_INS_CMP | ARM_INS_EOR | ARM_INS_LSL
        | ARM_INS_LSR | ARM_INS_MOV | ARM_INS_MOVS | ARM_INS_MOVT | ARM_INS_MOVW | ARM_INS_MVN
        | ARM_INS_NEG | ARM_INS_NOP | ARM_INS_HINT | ARM_INS_ORN | ARM_INS_ORR | ARM_INS_PKHBT
        | ARM_INS_PKHTB | ARM_INS_QADD | ARM_INS_QSUB | ARM_INS_QDADD | ARM_INS_QDSUB | ARM_INS_RBIT
        | ARM_INS_REV | ARM_INS_REV16 | ARM_INS_REVSH | ARM_INS_ROR | ARM_INS_RRX | ARM_INS_RSB
        | ARM_INS_SBC | ARM_INS_SBFX | ARM_INS_SEL | ARM_INS_SSAT | ARM_INS_SUB | ARM_INS_SUBW
        | ARM_INS_SXTAB | ARM_INS_SXTAH | ARM_INS_SXTB | ARM_INS_SXTH | ARM_INS_TEQ | ARM_INS_TST
        | ARM_INS_UBFX | ARM_INS_USAT | ARM_INS_UXTAB | ARM_INS_UXTAH | ARM_INS_UXTB | ARM_INS_UXTH => {
            only(Kind::Simple)
        }
        ARM_INS_VADD | ARM_INS_VSUB | ARM_INS_VMUL | ARM_INS_VNMUL | ARM_INS_VCVT | ARM_INS_VCVTR => {
            only(Kind::FloatArithmetic)
        }
        ARM_INS_VABS | ARM_INS_VNEG | ARM_INS_VCMP | ARM_INS_VCMPE | ARM_INS_VMRS | ARM_INS_VMSR
        | ARM_INS_FMSTAT | ARM_INS_FCONSTS => only(Kind::FloatSimple),
        // Two core registers and two single ones or one double.
        ARM_INS_VMOV if registers.len() > 2 => only(Kind::FloatMovePair),
        ARM_INS_VMOV => only(Kind::FloatSimple),
        ARM_INS_VMLA | ARM_INS_VMLS | ARM_INS_VNMLA | ARM_INS_VNMLS | ARM_INS_VFMA | ARM_INS_VFMS
        | ARM_INS_VFNMA | ARM_INS_VFNMS => only(Kind::FloatMultiplyAccumulate),
        ARM_INS_VDIV => only(Kind::FloatDivide),
        ARM_INS_VSQRT => only(Kind::FloatRoot),
        ARM_INS_VLDR | ARM_INS_VSTR if is_double => (Kind::Multiple, 2),
        ARM_INS_VLDR => only(Kind::FloatLoad),
        ARM_INS_VSTR => only(Kind::FloatStore),
        _ => only(Kind::Unknown),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use Kind::*;

    /// Halfwords as LLVM's assembler (llvm-mc 14, `-triple=thumbv7em-none-eabihf -mcpu=cortex-m4`) encodes the text; the
    /// kinds by hand, after the instruction descriptions of the ARMv7-M Architecture Reference Manual (Arm DDI 0403).
    #[rustfmt::skip]
    const KNOWN: &[(&str, &[u16], Kind, u8)] = &[
        ("hint 8", &[0xbf80], OpeningMarker, 0),
        ("hint 9", &[0xbf90], ClosingMarker, 0),
        ("movs r0, #1", &[0x2001], Simple, 0),
        ("adds r0, r1, r2", &[0x1888], Simple, 0),
        ("add sp, #8", &[0xb002], Simple, 0),
        ("lsls r0, r1, #3", &[0x00c8], Simple, 0),
        ("mov.w r8, r1", &[0xea4f, 0x0801], Simple, 0),
        ("movw r0, #4660", &[0xf241, 0x2034], Simple, 0),
        ("clz r0, r1", &[0xfab1, 0xf081], Simple, 0),
        ("usat r0, #8, r1", &[0xf381, 0x0008], Simple, 0),
        ("sbcs.w r2, r1, r8", &[0xeb71, 0x0208], Simple, 0),
        ("bfi r0, r1, #2, #5", &[0xf361, 0x0086], Simple, 0),
        ("ubfx r0, r1, #2, #5", &[0xf3c1, 0x0084], Simple, 0),
        ("rsbs r0, r0, #0", &[0x4240], Simple, 0),
        ("rbit r0, r1", &[0xfa91, 0xf0a1], Simple, 0),
        ("uxtb r0, r1", &[0xb2c8], Simple, 0),
        ("addw r0, r1, #4000", &[0xf601, 0x70a0], Simple, 0),
        ("cmp.w lr, #1", &[0xf1be, 0x0f01], Simple, 0),
        ("asrs r0, r1", &[0x4108], Simple, 0),
        ("qsub16 r4, r3, r4", &[0xfad3, 0xf414], Simple, 0),
        ("uadd8 r0, r1, r2", &[0xfa81, 0xf042], Simple, 0),
        ("ssat16 r0, #8, r1", &[0xf321, 0x0007], Simple, 0),
        ("smuad r0, r1, r2", &[0xfb21, 0xf002], LongMultiply, 0),
        ("nop", &[0xbf00], Simple, 0),
        ("ldr r0, [r1]", &[0x6808], Load, 0),
        ("ldr r0, [pc, #8]", &[0x4802], Load, 0),
        ("ldrb r0, [r1, #1]", &[0x7848], Load, 0),
        ("ldrsh.w r0, [r1, #2]", &[0xf9b1, 0x0002], Load, 0),
        ("ldr.w r0, [r1, r2, lsl #2]", &[0xf851, 0x0022], Load, 0),
        ("str r0, [sp, #4]", &[0x9001], Store, 0),
        ("strh r0, [r1]", &[0x8008], Store, 0),
        ("ldrd r0, r1, [r2, #16]", &[0xe9d2, 0x0104], Multiple, 2),
        ("strd r0, r1, [sp, #16]", &[0xe9cd, 0x0104], Multiple, 2),
        ("push {r4, r5, lr}", &[0xb530], Multiple, 3),
        ("pop {r4, pc}", &[0xbd10], Multiple, 2),
        ("push.w {r4, r5, r8, r9, lr}", &[0xe92d, 0x4330], Multiple, 5),
        ("ldm r0!, {r1, r2, r3}", &[0xc80e], Multiple, 3),
        ("stm r0!, {r1, r2}", &[0xc006], Multiple, 2),
        ("ldm.w r0, {r1, r8}", &[0xe890, 0x0102], Multiple, 2),
        ("stmdb r0!, {r1, r8}", &[0xe920, 0x0102], Multiple, 2),
        ("b #100", &[0xe032], Branch, 0),
        ("bne #20", &[0xd10a], Branch, 0),
        ("beq.w #2000", &[0xf000, 0x83e8], Branch, 0),
        ("cbz r0, #8", &[0xb120], Branch, 0),
        ("cbnz r0, #8", &[0xb920], Branch, 0),
        ("bl #1000", &[0xf000, 0xf9f4], Call, 0),
        ("bx lr", &[0x4770], Exchange, 0),
        ("blx r3", &[0x4798], Exchange, 0),
        ("tbb [pc, r0]", &[0xe8df, 0xf000], TableBranch, 0),
        ("tbh [pc, r0, lsl #1]", &[0xe8df, 0xf010], TableBranch, 0),
        ("muls r0, r1, r0", &[0x4348], Multiply, 0),
        ("mul r8, r1, r2", &[0xfb01, 0xf802], Multiply, 0),
        ("mla r0, r1, r2, r3", &[0xfb01, 0x3002], MultiplyAccumulate, 0),
        ("mls r0, r1, r2, r3", &[0xfb01, 0x3012], MultiplyAccumulate, 0),
        ("umull r0, r1, r2, r3", &[0xfba2, 0x0103], LongMultiply, 0),
        ("smull r0, r1, r2, r3", &[0xfb82, 0x0103], LongMultiply, 0),
        ("smlal r0, r1, r2, r3", &[0xfbc2, 0x0103], LongMultiplyAccumulate, 0),
        ("umlal r0, r1, r2, r3", &[0xfbe2, 0x0103], LongMultiplyAccumulate, 0),
        ("umaal r0, r1, r2, r3", &[0xfbe2, 0x0163], LongMultiplyAccumulate, 0),
        ("smmul r0, r1, r2", &[0xfb51, 0xf002], LongMultiply, 0),
        ("smmla r0, r1, r2, r3", &[0xfb51, 0x3002], LongMultiplyAccumulate, 0),
        ("smlabb r0, r1, r2, r3", &[0xfb11, 0x3002], LongMultiplyAccumulate, 0),
        ("udiv r0, r1, r2", &[0xfbb1, 0xf0f2], Divide, 0),
        ("sdiv r0, r1, r2", &[0xfb91, 0xf0f2], Divide, 0),
        ("it eq", &[0xbf08], IfThen, 0),
        ("mrs r2, apsr", &[0xf3ef, 0x8200], SpecialRegister, 0),
        ("msr apsr_nzcvq, r0", &[0xf380, 0x8800], SpecialRegister, 0),
        ("vadd.f32 s0, s1, s2", &[0xee30, 0x0a81], FloatArithmetic, 0),
        ("vsub.f32 s0, s1, s2", &[0xee30, 0x0ac1], FloatArithmetic, 0),
        ("vmul.f32 s0, s1, s2", &[0xee20, 0x0a81], FloatArithmetic, 0),
        ("vnmul.f32 s0, s1, s2", &[0xee20, 0x0ac1], FloatArithmetic, 0),
        ("vcvt.s32.f32 s0, s1", &[0xeebd, 0x0ae0], FloatArithmetic, 0),
        ("vcvt.f32.s32 s0, s1", &[0xeeb8, 0x0ae0], FloatArithmetic, 0),
        ("vcvt.f32.u32 s0, s1", &[0xeeb8, 0x0a60], FloatArithmetic, 0),
        ("vabs.f32 s0, s1", &[0xeeb0, 0x0ae0], FloatSimple, 0),
        ("vneg.f32 s0, s1", &[0xeeb1, 0x0a60], FloatSimple, 0),
        ("vcmp.f32 s0, s1", &[0xeeb4, 0x0a60], FloatSimple, 0),
        ("vcmpe.f32 s0, #0", &[0xeeb5, 0x0ac0], FloatSimple, 0),
        ("vmrs APSR_nzcv, fpscr", &[0xeef1, 0xfa10], FloatSimple, 0),
        ("vmov.f32 s0, s1", &[0xeeb0, 0x0a60], FloatSimple, 0),
        ("vmov.f32 s0, #1.000000e+00", &[0xeeb7, 0x0a00], FloatSimple, 0),
        ("vmov r0, s1", &[0xee10, 0x0a90], FloatSimple, 0),
        ("vmov s1, r0", &[0xee00, 0x0a90], FloatSimple, 0),
        ("vmov r0, r1, d3", &[0xec51, 0x0b13], FloatMovePair, 0),
        ("vmov d3, r0, r1", &[0xec41, 0x0b13], FloatMovePair, 0),
        ("vmla.f32 s0, s1, s2", &[0xee00, 0x0a81], FloatMultiplyAccumulate, 0),
        ("vmls.f32 s0, s1, s2", &[0xee00, 0x0ac1], FloatMultiplyAccumulate, 0),
        ("vnmla.f32 s0, s1, s2", &[0xee10, 0x0ac1], FloatMultiplyAccumulate, 0),
        ("vnmls.f32 s0, s1, s2", &[0xee10, 0x0a81], FloatMultiplyAccumulate, 0),
        ("vfma.f32 s0, s1, s2", &[0xeea0, 0x0a81], FloatMultiplyAccumulate, 0),
        ("vfnms.f32 s0, s1, s2", &[0xee90, 0x0a81], FloatMultiplyAccumulate, 0),
        ("vdiv.f32 s0, s1, s2", &[0xee80, 0x0a81], FloatDivide, 0),
        ("vsqrt.f32 s0, s1", &[0xeeb1, 0x0ae0], FloatRoot, 0),
        ("vldr s0, [r0, #4]", &[0xed90, 0x0a01], FloatLoad, 0),
        ("vldr d0, [r0, #8]", &[0xed90, 0x0b02], Multiple, 2),
        ("vstr s0, [r0, #4]", &[0xed80, 0x0a01], FloatStore, 0),
        ("vstr d0, [r0, #8]", &[0xed80, 0x0b02], Multiple, 2),
        ("vpush {d8, d9}", &[0xed2d, 0x8b04], Multiple, 4),
        ("vpop {s16, s17, s18}", &[0xecbd, 0x8a03], Multiple, 3),
        ("vldmia r0!, {s0, s1, s2}", &[0xecb0, 0x0a03], Multiple, 3),
        ("vstmia r0, {s0, s1}", &[0xec80, 0x0a02], Multiple, 2),
        ("svc #0", &[0xdf00], Unknown, 0),
    ];

    fn bytes(halfwords: &[u16]) -> Vec<u8> {
        halfwords.iter().flat_map(|half| half.to_le_bytes()).collect()
    }

    #[test]
    fn kinds_of_known_instructions() {
        let decoder = crate::Decoder::new(crate::Core::M4f).expect("capstone");
        for &(text, halfwords, kind, words) in KNOWN {
            let length = 2 * halfwords.len() as u8;
            assert_eq!(decoder.decode(&bytes(halfwords)), Decoded { kind, words, length }, "{text}");
        }
    }

    #[test]
    fn what_follows_an_instruction_does_not_change_it() {
        let decoder = crate::Decoder::new(crate::Core::M4f).expect("capstone");
        for &(text, halfwords, ..) in KNOWN {
            let alone = bytes(halfwords);
            let with_more = [&*alone, &[0x70, 0x47]].concat();
            // What is not known keeps all that there is.
            if decoder.decode(&alone).kind != Unknown {
                assert_eq!(decoder.decode(&with_more), decoder.decode(&alone), "{text}");
            }
        }
    }

    #[test]
    fn what_is_no_instruction_is_unknown() {
        let decoder = crate::Decoder::new(crate::Core::M4f).expect("capstone");
        assert_eq!(decoder.decode(&[]).kind, Unknown);
        assert_eq!(decoder.decode(&[0x00]).kind, Unknown);
        // Half of a 32-bit instruction.
        assert_eq!(decoder.decode(&bytes(&[0xf000])).kind, Unknown);
    }
}
