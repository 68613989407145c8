//! Runs an image on an emulated chip, with the plugin, within a time limit.

use std::{
    fs,
    io::Read,
    path::Path,
    process::{Command, Stdio},
    thread,
    time::Duration,
};

use defmt_decoder::{DecodeError, Table};
use reckoning::Window;
use wait_timeout::ChildExt;

use crate::{chip::Chip, trouble::Trouble};

/// Nothing but the semihosting channel may write to standard output.
pub(crate) const MACHINE_ALONE: [&str; 8] = [
    "-display",
    "none",
    "-serial",
    "none",
    "-monitor",
    "none",
    "-semihosting-config",
    "enable=on,target=native",
];

/// What an image is run with.
#[derive(Debug, Clone, Copy)]
pub struct Setting<'a> {
    /// The chip.
    pub chip: Chip,
    /// The plugin, if what is executed is to be counted.
    pub plugin: Option<&'a Path>,
    /// A file that is to lie in memory, at [`Chip::data_at`].
    pub data: Option<&'a Path>,
    /// Whether the chip's own clock and counters go by executed instructions, one each.
    pub by_instructions: bool,
    /// When a run that has not ended is stopped, and has failed.
    pub time_limit: Duration,
}

/// What a run gave.
#[derive(Debug, Clone, PartialEq)]
pub struct Run {
    /// What the image logged.
    pub log: Vec<String>,
    /// What the plugin counted.
    pub windows: Vec<Window>,
}

/// Runs an image, which has a name for messages, to its end.
///
/// # Errors
/// If it does not end in good order within its time, or if its log or its counts cannot be read.
pub fn run(name: &str, elf: &Path, setting: Setting<'_>) -> Result<Run, Trouble> {
    let Setting { chip, plugin, data, by_instructions, time_limit } = setting;
    let failed = || Trouble::io(format!("running {}", chip.emulator()));
    let counts = elf.with_extension("windows.jsonl");
    // What an earlier run left must not pass for this one's.
    if counts.exists() {
        fs::remove_file(&counts).map_err(Trouble::io(counts.display().to_string()))?;
    }
    let mut command = Command::new(chip.emulator());
    command.args(MACHINE_ALONE).args(["-machine", chip.machine()]).args(chip.processor());
    if let Some(plugin) = plugin {
        let (plugin, out) = (doubled_commas(plugin), doubled_commas(&counts));
        command.arg("-plugin").arg(format!("{plugin},core={},out={out}", chip.cycle_table()));
    }
    if by_instructions {
        command.args(["-icount", "shift=0"]);
    }
    if let Some(data) = data {
        let (data, at) = (doubled_commas(data), chip.data_at());
        command.arg("-device").arg(format!("loader,file={data},addr={at:#x},force-raw=on"));
    }
    let mut emulator = command
        .arg("-kernel")
        .arg(elf)
        .stdin(Stdio::null())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .map_err(failed())?;
    // Read at once: the emulator would stand still on a full pipe.
    let output = read_all(emulator.stdout.take().expect("standard output is piped"));
    let said = read_all(emulator.stderr.take().expect("standard error is piped"));
    let Some(status) = emulator.wait_timeout(time_limit).map_err(failed())? else {
        emulator.kill().map_err(failed())?;
        emulator.wait().map_err(failed())?;
        return Err(Trouble::StillRunning { name: name.into(), after: time_limit });
    };
    let output = output.join().expect("reading does not panic").map_err(failed())?;
    let said = said.join().expect("reading does not panic").map_err(failed())?;
    let log = decode(elf, &output)?;
    if !status.success() {
        let said = String::from_utf8_lossy(&said).trim().to_owned();
        return Err(Trouble::BadEnding { name: name.into(), status, log, said });
    }
    Ok(Run { log, windows: if plugin.is_some() { windows(&counts)? } else { Vec::new() } })
}

/// A comma in a path is doubled for QEMU's option parser.
fn doubled_commas(path: &Path) -> String {
    path.display().to_string().replace(',', ",,")
}

fn read_all(mut pipe: impl Read + Send + 'static) -> thread::JoinHandle<std::io::Result<Vec<u8>>> {
    thread::spawn(move || {
        let mut output = Vec::new();
        pipe.read_to_end(&mut output).map(|_| output)
    })
}

fn windows(counts: &Path) -> Result<Vec<Window>, Trouble> {
    let bad = |problem: String| Trouble::BadFile { path: counts.to_owned(), problem };
    let text = fs::read_to_string(counts).map_err(|error| bad(error.to_string()))?;
    text.lines()
        .enumerate()
        .map(|(index, line)| {
            serde_json::from_str(line).map_err(|error| bad(format!("line {}: {error}", index + 1)))
        })
        .collect()
}

/// Turns the bytes that an image logged into lines, by the format strings in its ELF file.
fn decode(elf: &Path, bytes: &[u8]) -> Result<Vec<String>, Trouble> {
    let bad = |problem: String| Trouble::BadFile { path: elf.to_owned(), problem };
    let image = fs::read(elf).map_err(|error| bad(error.to_string()))?;
    let table = Table::parse(&image)
        .map_err(|error| bad(error.to_string()))?
        .ok_or_else(|| bad("has no defmt section, so its log cannot be read".into()))?;
    let mut decoder = table.new_stream_decoder();
    decoder.received(bytes);
    let mut lines = Vec::new();
    loop {
        match decoder.decode() {
            Ok(frame) => lines.push(frame.display_message().to_string()),
            Err(DecodeError::UnexpectedEof) => return Ok(lines),
            Err(DecodeError::Malformed) => {
                return Err(bad(format!("its log is damaged after line {}", lines.len())));
            }
        }
    }
}
