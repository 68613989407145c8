//! Is the plugin right? The same run is counted a second time, without the plugin, from the emulator's own log of every
//! instruction that it executes; each window must come to the same number.

use std::{
    fs,
    io::{BufRead, BufReader},
    path::Path,
    process::{Command, Stdio},
    time::Duration,
};

use object::{Object, ObjectSection, ObjectSymbol};
use wait_timeout::ChildExt;

use crate::{chip::Chip, emulator, trouble::Trouble};

/// The image's function that holds the markers, and their bytes.
const FUNCTION: &str = "call_in_window";
const THUMB: [&[u8]; 2] = [&[0x80, 0xbf], &[0x90, 0xbf]];
const RISC_V: [&[u8]; 2] = [&[0x13, 0x20, 0x80, 0x00], &[0x13, 0x20, 0x90, 0x00]];

/// Instructions in each window, by the emulator's log.
pub fn instructions(chip: Chip, name: &str, elf: &Path, limit: Duration) -> Result<Vec<u64>, Trouble> {
    let log = elf.with_extension("executed.log");
    let failed = || Trouble::io(format!("running {}", chip.emulator()));
    let mut emulator = Command::new(chip.emulator())
        .args(emulator::MACHINE_ALONE)
        .args(["-machine", chip.machine()])
        .args(chip.processor())
        // One instruction a block, every block logged.
        .args(["-singlestep", "-d", "exec,nochain", "-D"])
        .arg(&log)
        .arg("-kernel")
        .arg(elf)
        .stdin(Stdio::null())
        .stdout(Stdio::null())
        .spawn()
        .map_err(failed())?;
    let Some(status) = emulator.wait_timeout(limit).map_err(failed())? else {
        emulator.kill().map_err(failed())?;
        emulator.wait().map_err(failed())?;
        return Err(Trouble::StillRunning { name: name.into(), after: limit });
    };
    if !status.success() {
        return Err(Trouble::BadEnding { name: name.into(), status, log: vec![], said: String::new() });
    }
    let markers = markers(elf, if chip == Chip::Rv32imc { RISC_V } else { THUMB })?;
    let file = fs::File::open(&log).map_err(Trouble::io(log.display().to_string()))?;
    let mut windows = Vec::new();
    let mut open = None;
    for line in BufReader::new(file).lines() {
        let line = line.map_err(Trouble::io(log.display().to_string()))?;
        let Some(address) = address(&line) else { continue };
        if address == markers[0] {
            open = Some(0);
        } else if address == markers[1] {
            windows.extend(open.take());
        } else if let Some(count) = &mut open {
            *count += 1;
        }
    }
    // Tens of megabytes that nobody needs any more.
    fs::remove_file(&log).map_err(Trouble::io(log.display().to_string()))?;
    Ok(windows)
}

/// `Trace 0: 0x7f86ec000100 [00800400/00001e96/00000110/ff000201] name`: the second of the four is the address.
fn address(line: &str) -> Option<u64> {
    let (_, fields) = line.strip_prefix("Trace ")?.split_once('[')?;
    u64::from_str_radix(fields.split('/').nth(1)?, 16).ok()
}

/// The addresses of the opening and the closing marker.
fn markers(image: &Path, [opening, closing]: [&[u8]; 2]) -> Result<[u64; 2], Trouble> {
    let bad = |problem: String| Trouble::BadFile { path: image.to_owned(), problem };
    let data = fs::read(image).map_err(|error| bad(error.to_string()))?;
    let file = object::File::parse(&*data).map_err(|error| bad(error.to_string()))?;
    let found = file.symbols().find_map(|symbol| {
        let is_it = symbol.name().is_ok_and(|name| name.contains(FUNCTION));
        let section = file.section_by_index(symbol.section_index().filter(|_| is_it)?).ok()?;
        // The lowest bit of a Thumb function's address is not part of it.
        let start = symbol.address() & !1;
        let code = section.data_range(start, symbol.size()).ok()??;
        let at = |marker: &[u8]| {
            let halfword = (0..code.len() / 2).position(|half| code[2 * half..].starts_with(marker))?;
            Some(start + 2 * halfword as u64)
        };
        Some([at(opening)?, at(closing)?])
    });
    found.ok_or_else(|| bad(format!("has no function {FUNCTION} with the markers")))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_address_is_the_second_field() {
        let line = "Trace 0: 0x7f86ec000240 [00800400/00001e96/00000110/ff000201] DefaultPreInit";
        assert_eq!(address(line), Some(0x1e96));
        assert_eq!(address("Linking TBs 0x7f86ec000100 [00000400] index 1"), None);
        assert_eq!(address(""), None);
    }
}
