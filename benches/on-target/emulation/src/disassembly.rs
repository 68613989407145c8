//! Is the decoder right? Every instruction of an image is also read by a disassembler, LLVM's; the two must find the same
//! instructions, and the same kind of each by its name.

use std::{fs, path::Path, process::Command};

use object::{Object, ObjectSection};
use reckoning::{Core, Decoder, Kind};

use crate::{chip::Chip, trouble::Trouble};

/// The disassembler's names: plain, as Debian's package llvm has it, and as rustup's component llvm-tools has it.
const PROGRAM: &str = "llvm-objdump";

/// How many instructions the decoder and the disassembler agree on: all of the image's, or it is an error.
///
/// # Errors
/// If there is no disassembler, or the two differ.
pub fn agrees(chip: Chip, name: &str, image: &Path) -> Result<usize, Trouble> {
    let bad = |problem: String| Trouble::BadFile { path: image.to_owned(), problem };
    let data = fs::read(image).map_err(|error| bad(error.to_string()))?;
    let file = object::File::parse(&*data).map_err(|error| bad(error.to_string()))?;
    // Code stands in several sections.
    let sections: Vec<(u64, &[u8])> = file
        .sections()
        .filter(|section| section.address() != 0 || section.name() == Ok(".text"))
        .filter_map(|section| Some((section.address(), section.data().ok()?)))
        .collect();
    let bytes_at = |address: u64| {
        sections.iter().find_map(|(start, data)| {
            let at = usize::try_from(address.checked_sub(*start)?).ok()?;
            data.get(at..).filter(|rest| !rest.is_empty())
        })
    };
    let core = if chip == Chip::Rv32imc { Core::Rv32imc } else { Core::M4f };
    let decoder = Decoder::new(core).map_err(|error| bad(error.to_string()))?;
    let listing = listing(image)?;
    let differ =
        |address: u64, problem: String| Trouble::DecoderDiffers { name: name.into(), address, problem };
    let mut agreed = 0;
    for (line, (address, mnemonic)) in listing.iter().enumerate() {
        let Some(bytes) = bytes_at(*address) else {
            return Err(bad(format!("has no code at {address:#x}")));
        };
        let Some(mnemonic) = mnemonic else { continue };
        let decoded = decoder.decode(bytes.get(..4).unwrap_or(bytes));
        // Only the next line's address tells a length; between functions there may be nothing.
        if let Some((next, _)) = listing.get(line + 1)
            && matches!(next - address, 2 | 4)
            && u64::from(decoded.length) != next - address
        {
            return Err(differ(
                *address,
                format!("{mnemonic} has {} bytes, not {}", next - address, decoded.length),
            ));
        }
        let Some(kinds) = kinds(chip, mnemonic) else {
            return Err(differ(
                *address,
                format!("{mnemonic} is not in the list of names; see emulation/src/disassembly.rs"),
            ));
        };
        if !kinds.contains(&decoded.kind) {
            return Err(differ(*address, format!("{mnemonic} is one of {kinds:?}, not {:?}", decoded.kind)));
        }
        agreed += 1;
    }
    if agreed == 0 {
        return Err(bad(format!("{PROGRAM} lists no instruction of it")));
    }
    Ok(agreed)
}

/// Where every instruction stands, with its mnemonic, and every piece of data.
fn listing(image: &Path) -> Result<Vec<(u64, Option<String>)>, Trouble> {
    let output = Command::new(PROGRAM)
        .args(["--disassemble", "--no-show-raw-insn"])
        .arg(image)
        .output()
        .map_err(|_| Trouble::ToolMissing {
            what: format!("the disassembler {PROGRAM}"),
            remedy:
                "on Debian, as root: apt-get install llvm; elsewhere: your system's package of LLVM's tools"
                    .into(),
        })?;
    Ok(String::from_utf8_lossy(&output.stdout).lines().filter_map(listed).collect())
}

/// `     1d4: <tab>movs<tab>r0, #1`; data is listed with its bytes, which are no mnemonic.
fn listed(line: &str) -> Option<(u64, Option<String>)> {
    let (address, rest) = line.split_once(':')?;
    let address = u64::from_str_radix(address.trim(), 16).ok()?;
    let first = rest.split_whitespace().next()?;
    let is_data = first.len() == 2 && first.chars().all(|c| c.is_ascii_hexdigit()) || first.starts_with('.');
    Some((address, (!is_data).then(|| first.to_owned())))
}

/// What an instruction of this name may be; `None` for a name that is not in the lists.
fn kinds(chip: Chip, mnemonic: &str) -> Option<&'static [Kind]> {
    if chip == Chip::Rv32imc {
        return named(RISC_V, mnemonic);
    }
    // Without `.w`, `.f32` and the like; without a condition; without the `s` that sets flags.
    let plain = mnemonic.split('.').next().unwrap_or(mnemonic);
    let unconditional = CONDITIONS.iter().find_map(|condition| plain.strip_suffix(condition));
    [
        Some(plain),
        unconditional,
        plain.strip_suffix('s'),
        unconditional.and_then(|plain| plain.strip_suffix('s')),
    ]
    .into_iter()
    .flatten()
    .find_map(|name| named(THUMB, name))
}

fn named(lists: &'static [(&'static [Kind], &'static str)], name: &str) -> Option<&'static [Kind]> {
    lists.iter().find(|(_, names)| names.split_whitespace().any(|one| one == name)).map(|(kinds, _)| *kinds)
}

const CONDITIONS: [&str; 14] =
    ["eq", "ne", "hs", "lo", "mi", "pl", "vs", "vc", "hi", "ls", "ge", "lt", "gt", "le"];

/// By the Armv6-M and Armv7-M architecture reference manuals' names (from memory).
const THUMB: &[(&[Kind], &str)] = &[
    (&[Kind::OpeningMarker, Kind::ClosingMarker, Kind::Simple], "hint nop"),
    (
        &[Kind::Simple],
        "adc add addw adr and asr bfc bfi bic clz cmn cmp eor lsl lsr mov movt movw mvn neg orn orr pkhbt pkhtb rbit rev \
         rev16 revsh ror rrx rsb sbc sbfx ssat sub subw sxtab sxtah sxtb sxth teq tst ubfx usat uxtab uxtah uxtb uxth",
    ),
    (
        &[Kind::Simple],
        "qadd qsub qdadd qdsub qadd16 qadd8 qsub16 qsub8 sadd16 sadd8 ssub16 ssub8 uadd16 uadd8 usub16 usub8 sel ssat16 \
         usat16 sxtab16 uxtab16 sxtb16 uxtb16 usad8",
    ),
    (&[Kind::Load], "ldr ldrb ldrh ldrsb ldrsh"),
    (&[Kind::Store], "str strb strh"),
    (&[Kind::Multiple], "ldrd strd push pop ldm ldmdb stm stmdb vpush vpop vldmia vstmia vldmdb vstmdb"),
    (&[Kind::Branch], "b cbz cbnz"),
    (&[Kind::Call], "bl"),
    (&[Kind::Exchange], "bx blx"),
    (&[Kind::TableBranch], "tbb tbh"),
    (&[Kind::Multiply], "mul"),
    (&[Kind::MultiplyAccumulate], "mla mls"),
    (&[Kind::LongMultiply], "smull umull smulbb smulbt smultb smultt smulwb smulwt smmul smmulr"),
    (
        &[Kind::LongMultiplyAccumulate],
        "smlal umlal umaal smlabb smlabt smlatb smlatt smmla smmlar smmls smmlsr",
    ),
    (&[Kind::Divide], "sdiv udiv"),
    (&[Kind::SpecialRegister], "mrs msr"),
    (&[Kind::IfThen], "it itt ite ittt itte itet itee itttt ittte ittet ittee itett itete iteet iteee"),
    (&[Kind::FloatArithmetic], "vadd vsub vmul vnmul vcvt vcvtr"),
    (&[Kind::FloatSimple], "vcmp vcmpe vabs vneg vmrs vmsr"),
    (&[Kind::FloatSimple, Kind::FloatMovePair], "vmov"),
    (&[Kind::FloatMultiplyAccumulate], "vmla vmls vnmla vnmls vfma vfms vfnma vfnms"),
    (&[Kind::FloatDivide], "vdiv"),
    (&[Kind::FloatRoot], "vsqrt"),
    (&[Kind::FloatLoad, Kind::Multiple], "vldr"),
    (&[Kind::FloatStore, Kind::Multiple], "vstr"),
    // Start-up, faults and semihosting, never within a window.
    (&[Kind::Unknown, Kind::Simple], "bkpt udf trap isb dsb dmb cps cpsid cpsie wfi wfe sev svc"),
];

/// By the RISC-V unprivileged and privileged specifications' names, pseudo-instructions included (from memory).
const RISC_V: &[(&[Kind], &str)] = &[
    (&[Kind::OpeningMarker, Kind::ClosingMarker, Kind::Simple], "slti"),
    (
        &[Kind::Simple],
        "add addi and andi auipc lui or ori sll slli slt sltiu sltu sra srai srl srli sub xor xori mv li nop not neg seqz \
         snez sltz sgtz",
    ),
    (&[Kind::Load], "lb lbu lh lhu lw"),
    (&[Kind::Store], "sb sh sw"),
    (&[Kind::Branch], "beq bne blt bge bltu bgeu beqz bnez bltz bgez bgtz blez"),
    (&[Kind::Branch, Kind::Call], "j jal"),
    (&[Kind::Exchange], "jr jalr ret"),
    (&[Kind::Multiply], "mul"),
    (&[Kind::LongMultiply], "mulh mulhu mulhsu"),
    (&[Kind::Divide], "div divu rem remu"),
    (
        &[Kind::SpecialRegister],
        "csrr csrw csrs csrc csrwi csrsi csrci csrrw csrrs csrrc csrrwi csrrsi csrrci",
    ),
    (&[Kind::Unknown, Kind::Simple], "ebreak ecall mret wfi unimp fence fence.i"),
];

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn instructions_are_told_from_data() {
        assert_eq!(listed("     1d4:      \tmovs\tr0, #1"), Some((0x1d4, Some("movs".into()))));
        assert_eq!(listed("     b0a: \tadds.w\tr3, r4, r5, lsl #8"), Some((0xb0a, Some("adds.w".into()))));
        assert_eq!(listed("     418:\tb0 23 00 00\t.word\t0x000023b0"), Some((0x418, None)));
        for line in ["000001d4 <image::entry>:", "$d:", ""] {
            assert_eq!(listed(line), None, "{line}");
        }
    }

    #[test]
    fn a_name_is_found_without_its_endings() {
        for (mnemonic, kind) in [
            ("bls", Kind::Branch),
            ("ble.w", Kind::Branch),
            ("bl", Kind::Call),
            ("blx", Kind::Exchange),
            ("movs", Kind::Simple),
            ("sbcs.w", Kind::Simple),
            ("mls", Kind::MultiplyAccumulate),
            ("muls", Kind::Multiply),
            ("ldrhi.w", Kind::Load),
            ("vaddgt.f32", Kind::FloatArithmetic),
            ("popgt", Kind::Multiple),
        ] {
            assert_eq!(kinds(Chip::M3, mnemonic), Some(&[kind][..]), "{mnemonic}");
        }
        assert_eq!(kinds(Chip::M3, "frobnicate"), None);
        assert_eq!(kinds(Chip::Rv32imc, "movs"), None);
    }
}
