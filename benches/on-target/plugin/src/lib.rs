//! A plugin for QEMU (system emulation, plugin API version 1) that counts what is executed between two marker
//! instructions and writes one line of JSON per window.
//!
//! Arguments: `core=m0|m0plus|m3|m4f|m7|rv32imc`, whose cycle table to use, and `out=FILE`. All that is not talking to the emulator
//! is in the crate `reckoning`.

mod emulator;

use std::{
    ffi::{CStr, c_int, c_uint, c_void},
    fs::File,
    io::{BufWriter, Write},
    path::PathBuf,
    slice,
    sync::{Mutex, OnceLock, PoisonError},
};

use emulator::*;
use reckoning::{Core, Decoder, Step, Windows};

/// What `core` can be.
const CORES: &str = "m0|m0plus|m3|m4f|m7|rv32imc";

struct Counter {
    decoder: Decoder,
    windows: Windows,
    out: PathBuf,
}

// SAFETY: capstone's handle may be used from any thread, by one at a time, which the mutex sees to.
unsafe impl Send for Counter {}

static COUNTER: OnceLock<Mutex<Counter>> = OnceLock::new();

fn with_counter<R>(what: impl FnOnce(&mut Counter) -> R) -> Option<R> {
    let counter = COUNTER.get()?;
    Some(what(&mut counter.lock().unwrap_or_else(PoisonError::into_inner)))
}

/// The emulator calls this once, at its start.
///
/// # Safety
/// `arguments` must point at `count` strings that end with NUL, as the emulator's do.
// SAFETY: the emulator looks for a function of this name and signature.
#[unsafe(no_mangle)]
pub unsafe extern "C" fn qemu_plugin_install(
    id: Id,
    _information: *const c_void,
    count: c_int,
    arguments: Arguments,
) -> c_int {
    let arguments = (0..usize::try_from(count).unwrap_or(0)).map(|index| {
        // SAFETY: by this function's contract there are `count` of them.
        unsafe { CStr::from_ptr(*arguments.add(index)) }.to_string_lossy().into_owned()
    });
    match counter(arguments) {
        Ok(counter) => {
            let _ = COUNTER.set(Mutex::new(counter));
            // SAFETY: `id` is the emulator's, and both callbacks have the signatures it asks for.
            unsafe {
                qemu_plugin_register_vcpu_tb_trans_cb(id, translated);
                qemu_plugin_register_atexit_cb(id, ended, std::ptr::null_mut());
            }
            0
        }
        Err(complaint) => {
            eprintln!("window counter: {complaint}");
            1
        }
    }
}

fn counter(arguments: impl Iterator<Item = String>) -> Result<Counter, String> {
    let (mut core, mut out) = (None, None);
    for argument in arguments {
        match argument.split_once('=') {
            Some(("core", name)) => {
                core = Some(Core::named(name).ok_or(format!("core={name}: must be one of {CORES}"))?);
            }
            Some(("out", path)) => out = Some(PathBuf::from(path)),
            _ => return Err(format!("unknown argument {argument:?}: there are core={CORES} and out=FILE")),
        }
    }
    let core = core.ok_or(format!("an argument core={CORES} is needed"))?;
    let out = out.ok_or("an argument out=FILE is needed")?;
    let decoder = Decoder::new(core).map_err(|error| error.to_string())?;
    Ok(Counter { decoder, windows: Windows::new(core), out })
}

/// A block of instructions was translated: each of them is to report when it is executed.
extern "C" fn translated(_id: Id, block: *mut Block) {
    with_counter(|counter| {
        // SAFETY: `block` is valid during this call.
        let count = unsafe { qemu_plugin_tb_n_insns(block) };
        for index in 0..count {
            // SAFETY: `index` is below the number of instructions; the instruction is valid during this call, and so
            // are `length` bytes of its data.
            let (instruction, address, bytes) = unsafe {
                let instruction = qemu_plugin_tb_get_insn(block, index);
                let length = qemu_plugin_insn_size(instruction);
                let bytes = slice::from_raw_parts(qemu_plugin_insn_data(instruction).cast::<u8>(), length);
                (instruction, qemu_plugin_insn_vaddr(instruction), bytes)
            };
            let step = Step { address, decoded: counter.decoder.decode(bytes) };
            // The emulator keeps the address as long as it runs: so the step is never freed.
            let step: *mut Step = Box::leak(Box::new(step));
            // SAFETY: the callbacks have the signatures that the emulator asks for, and `executed` gets what it
            // expects.
            unsafe {
                qemu_plugin_register_vcpu_insn_exec_cb(instruction, executed, NO_REGISTERS, step.cast());
                qemu_plugin_register_vcpu_mem_cb(
                    instruction,
                    stored,
                    NO_REGISTERS,
                    STORES,
                    std::ptr::null_mut(),
                );
            }
        }
    });
}

extern "C" fn executed(_processor: c_uint, step: *mut c_void) {
    // SAFETY: `translated` registered it with a step that is never freed and never changed.
    let step = unsafe { *step.cast::<Step>() };
    with_counter(|counter| counter.windows.execute(step));
}

extern "C" fn stored(_processor: c_uint, information: u32, address: u64, _data: *mut c_void) {
    // SAFETY: a function without side effects, of a value that the emulator has just given. Asking for stores only
    // is not enough: QEMU 7.2 tells of some loads as well.
    if !unsafe { qemu_plugin_mem_is_store(information) } {
        return;
    }
    with_counter(|counter| counter.windows.store(address));
}

extern "C" fn ended(_id: Id, _data: *mut c_void) {
    with_counter(|counter| {
        if let Err(error) = write(counter) {
            eprintln!("window counter: {}: {error}", counter.out.display());
        }
    });
}

fn write(counter: &Counter) -> std::io::Result<()> {
    let mut out = BufWriter::new(File::create(&counter.out)?);
    for window in counter.windows.closed() {
        serde_json::to_writer(&mut out, window)?;
        writeln!(out)?;
    }
    out.flush()
}
