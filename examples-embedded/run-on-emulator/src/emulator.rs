//! Runs an image on an emulated chip, within a time limit.

use std::{
    io::Read,
    path::Path,
    process::{Command, ExitStatus, Stdio},
    thread,
    time::Duration,
};

use wait_timeout::ChildExt;

use crate::{chip::Chip, trouble::Trouble};

/// Exit codes of the image; they stand in `board/src/end.rs`.
const PANICKED: i32 = 101;
const FAULTED: i32 = 102;

/// What an image put out, and how it ended.
pub struct Run {
    pub output: Vec<u8>,
    pub ending: Ending,
}

pub enum Ending {
    Exit(ExitStatus),
    StillRunning { after: Duration },
}

#[derive(Debug, thiserror::Error)]
pub enum BadEnding {
    #[error("the image panicked: {last_words}")]
    Panicked { last_words: String },
    #[error("the chip took a hard fault: {last_words}")]
    Faulted { last_words: String },
    #[error("the image was still running after {} s and was stopped; its last line: {last_words}", after.as_secs())]
    StillRunning { after: Duration, last_words: String },
    #[error("the emulator ended with {status}; the image's last line: {last_words}")]
    Unknown { status: ExitStatus, last_words: String },
}

impl Ending {
    /// An error that says how the image ended, unless it ended by itself with code 0.
    pub fn in_good_order(&self, last_line: Option<&String>) -> Result<(), BadEnding> {
        let last_words = last_line.cloned().unwrap_or_else(|| "(it logged nothing)".into());
        match *self {
            Self::StillRunning { after } => Err(BadEnding::StillRunning { after, last_words }),
            Self::Exit(status) => match status.code() {
                Some(0) => Ok(()),
                Some(PANICKED) => Err(BadEnding::Panicked { last_words }),
                Some(FAULTED) => Err(BadEnding::Faulted { last_words }),
                _ => Err(BadEnding::Unknown { status, last_words }),
            },
        }
    }
}

/// Which clock an emulated chip has.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Clock {
    /// This PC's: as fast as it goes.
    OfThisPc,
    /// Its own: time goes by executed instructions, so that interrupts come at the same place in every run.
    ByInstructions,
}

pub fn run(chip: Chip, elf: &Path, clock: Clock, time_limit: Duration) -> Result<Run, Trouble> {
    let (program, more) = chip.emulator();
    let failed = |source| Trouble::Io { what: format!("running {program}"), source };
    let mut emulator = Command::new(program)
        .args(["-machine", chip.machine()])
        .args(more)
        .args(if clock == Clock::ByInstructions { &["-icount", "shift=4"][..] } else { &[] })
        // Nothing but the semihosting channel may write to standard output.
        .args(["-display", "none", "-serial", "none", "-monitor", "none"])
        .args(["-semihosting-config", "enable=on,target=native"])
        .arg("-kernel")
        .arg(elf)
        .stdin(Stdio::null())
        .stdout(Stdio::piped())
        .spawn()
        .map_err(failed)?;
    // Read at once: the emulator would stand still on a full pipe.
    let mut pipe = emulator.stdout.take().expect("standard output is piped");
    let reader = thread::spawn(move || {
        let mut output = Vec::new();
        pipe.read_to_end(&mut output).map(|_| output)
    });
    let ending = match emulator.wait_timeout(time_limit).map_err(failed)? {
        Some(status) => Ending::Exit(status),
        None => {
            emulator.kill().map_err(failed)?;
            emulator.wait().map_err(failed)?;
            Ending::StillRunning { after: time_limit }
        }
    };
    let output = reader.join().expect("reading does not panic").map_err(failed)?;
    Ok(Run { output, ending })
}
