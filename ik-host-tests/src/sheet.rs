//! The robot sheet: one TOML file per robot, read strictly, every complaint gathered at once.
//!
//! # What a sheet holds
//!
//! | table | keys |
//! | --- | --- |
//! | (top) | `name`; `about` (optional) |
//! | `[firmware]` | `numbers`: which of `float32`, `coarse`, `fixed32`, `short32`, `fixed16` the firmware uses; `frame_hz` (optional, as `output.frame_hz`) |
//! | `[output]`, `kind = "timer"` | `clock_hz`, `frame_hz`; optional `counter_bits` (16), `prescaler` (the finest that fits a frame) |
//! | `[output]`, `kind = "expander"` | `oscillator_hz`, `resolution_bits`, `frame_hz` |
//! | `[leg_kind.NAME]` | `hip = "yaw"` with `coxa_mm`, `femur_mm`, `tibia_mm`, or `hip = "roll"` with `hip_offset_mm`, `thigh_mm`, `shank_mm`; `knee_bends`; optional `knee_drive` (`"direct"`, or `"parallelogram"`) |
//! | `[leg_kind.NAME.range_deg]` | `hip`, `femur` or `thigh`, `knee`: `[least, most]` in degrees |
//! | `[leg_kind.NAME.servo.JOINT]` | `centre_us`, `joint_at_centre_deg`, `us_per_degree`, `turns`, or in place of these four `measured`; `pulse_us`; optional `dead_band_us` (0), `speed_s_per_60_deg`, `stall_torque_n_mm`, `slew_us_per_frame`, `start_us` |
//! | `[leg_kind.NAME.work]` | `x_mm`, `y_mm`, `z_mm`: the work volume, a box in the leg's frame |
//! | `[[leg]]` | `name`, `kind`, `side`, `at_mm`; optional `trim_us` |
//! | `[allowed]` | `arithmetic_mm`, `with_pulse_mm`; optional `unreached_percent` (100) |
//!
//! `measured` is a list of 2 to 16 points `[pulse_us, joint_deg]`, the pulses rising, the angles all rising or all falling;
//! between them the servo is taken to be straight, beyond them it is never sent. With `knee_drive = "parallelogram"` the
//! angles in `servo.knee` are the shank's: see [`KneeDrive`].
//!
//! The two demo sheets ([`DEMOS`]) explain every key in a comment and are meant to be copied.
//! Frames: the body's x points forward, y left, z up; a leg's x forward, y outboard, z up, with the
//! origin on its first joint's axis.
//!
//! # How it is read
//!
//! The text becomes a tree that remembers where each value stands, and a checked reader walks it. An
//! unknown key is a complaint, never ignored: a misspelt key that silently kept its default would end
//! as a servo driven past its stop. Reading does not end at the first complaint; only a file that is
//! not TOML at all is judged by its syntax alone, because what was recovered from it is a guess.
//!
//! Nothing here panics, whatever the text.

mod allowed;
mod complaint;
mod demos;
mod drive;
mod firmware;
mod leg;
mod leg_kind;
mod limits;
mod nearest;
mod output;
mod robot;
mod servo;
mod table;
mod vocabulary;
mod whole;

use std::io::Read as _;
use std::path::Path;

pub use complaint::{Complaint, Complaints, SheetErrors};
pub use demos::{DEMOS, Demo};
pub use robot::{
    Allowed, Bend, Firmware, HipShape, KneeDrive, LegKind, LegMount, NumberSystem, Output, Robot, Servo,
    ServoCurve, Side, Turns, WorkBox,
};

/// The largest sheet that is read, in bytes. A sheet is a few kilobytes; anything near this is
/// another kind of file given by mistake.
pub const LARGEST_SHEET_BYTES: u64 = 1 << 20;

/// Reads and checks the sheet at `path`.
///
/// # Errors
///
/// [`SheetErrors::Unreadable`] when there is no such file, it may not be read, is longer than
/// [`LARGEST_SHEET_BYTES`] or is not UTF-8 text; [`SheetErrors::Faulty`] with every complaint when it
/// was read and is wrong.
pub fn read(path: impl AsRef<Path>) -> Result<Robot, SheetErrors> {
    read_with_text(path).map(|(robot, _)| robot)
}

/// Like [`read`], and with the very text that was read.
///
/// # Errors
///
/// As [`read`].
pub fn read_with_text(path: impl AsRef<Path>) -> Result<(Robot, String), SheetErrors> {
    let path = path.as_ref();
    let shown = path.display().to_string();
    match text_of(path) {
        Ok(text) => match parse(&shown, &text) {
            Ok(robot) => Ok((robot, text)),
            Err(complaints) => Err(SheetErrors::Faulty(complaints)),
        },
        Err(cause) => Err(SheetErrors::Unreadable { path: shown, cause }),
    }
}

/// Checks the text of a sheet. `file_name` only labels the complaints.
///
/// # Errors
///
/// Every complaint about the text, in the order of its lines.
pub fn parse(file_name: &str, text: &str) -> Result<Robot, Complaints> {
    whole::robot(text).map_err(|found| Complaints::new(file_name, text, found))
}

/// The demo robot called `name`; [`DEMOS`] lists them.
///
/// # Errors
///
/// [`SheetErrors::NoSuchDemo`], which names the nearest and lists all.
pub fn demo(name: &str) -> Result<Robot, SheetErrors> {
    match DEMOS.iter().find(|demo| demo.name == name) {
        Some(demo) => parse(demo.file_name, demo.text).map_err(SheetErrors::Faulty),
        None => Err(SheetErrors::NoSuchDemo {
            name: name.to_owned(),
            known: DEMOS.iter().map(|demo| demo.name.to_owned()).collect(),
        }),
    }
}

/// The text of a file, or why it cannot be had.
fn text_of(path: &Path) -> Result<String, String> {
    let file = std::fs::File::open(path).map_err(|error| error.to_string())?;
    let mut bytes = Vec::new();
    file.take(LARGEST_SHEET_BYTES + 1).read_to_end(&mut bytes).map_err(|error| error.to_string())?;
    if bytes.len() as u64 > LARGEST_SHEET_BYTES {
        return Err(format!("longer than {LARGEST_SHEET_BYTES} bytes, which no robot sheet is"));
    }
    String::from_utf8(bytes).map_err(|error| {
        let good = error.utf8_error().valid_up_to();
        let before = error.as_bytes().get(..good).unwrap_or_default();
        let line = 1 + before.iter().filter(|byte| **byte == b'\n').count();
        format!("not UTF-8 text (first seen on line {line}); save it as UTF-8")
    })
}
