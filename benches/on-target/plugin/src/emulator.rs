//! The emulator's functions that a plugin may call: what is used of QEMU's plugin API, version 1 ("QEMU TCG
//! Plugins" in the emulator's documentation).

use std::ffi::{c_char, c_int, c_uint, c_void};

/// Tells the emulator which version of its interface the plugin was written for.
// SAFETY: the emulator looks for a C `int` of this name.
#[unsafe(no_mangle)]
pub static qemu_plugin_version: c_int = 1;

pub(crate) type Id = u64;

/// `struct qemu_plugin_tb`, the emulator's own: a block of instructions being translated.
pub(crate) enum Block {}
/// `struct qemu_plugin_insn`, the emulator's own: an instruction of it.
pub(crate) enum Instruction {}

/// The callback does not look at registers.
pub(crate) const NO_REGISTERS: c_int = 0;
/// Only stores are of interest.
pub(crate) const STORES: c_int = 2;

unsafe extern "C" {
    pub(crate) fn qemu_plugin_register_vcpu_tb_trans_cb(id: Id, callback: extern "C" fn(Id, *mut Block));
    pub(crate) fn qemu_plugin_register_vcpu_insn_exec_cb(
        instruction: *mut Instruction,
        callback: extern "C" fn(c_uint, *mut c_void),
        flags: c_int,
        data: *mut c_void,
    );
    pub(crate) fn qemu_plugin_register_vcpu_mem_cb(
        instruction: *mut Instruction,
        callback: extern "C" fn(c_uint, u32, u64, *mut c_void),
        flags: c_int,
        which: c_int,
        data: *mut c_void,
    );
    pub(crate) fn qemu_plugin_register_atexit_cb(
        id: Id,
        callback: extern "C" fn(Id, *mut c_void),
        data: *mut c_void,
    );
    pub(crate) fn qemu_plugin_mem_is_store(information: u32) -> bool;
    pub(crate) fn qemu_plugin_tb_n_insns(block: *const Block) -> usize;
    pub(crate) fn qemu_plugin_tb_get_insn(block: *const Block, index: usize) -> *mut Instruction;
    pub(crate) fn qemu_plugin_insn_data(instruction: *const Instruction) -> *const c_void;
    pub(crate) fn qemu_plugin_insn_size(instruction: *const Instruction) -> usize;
    pub(crate) fn qemu_plugin_insn_vaddr(instruction: *const Instruction) -> u64;
}

/// The arguments as the emulator hands them over.
pub(crate) type Arguments = *const *const c_char;
