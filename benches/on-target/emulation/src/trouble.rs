//! Everything that can go wrong between cargo and emulator, and the exit code that tells it.

use std::{io, path::PathBuf, process::ExitStatus, time::Duration};

/// What went wrong.
#[derive(Debug, thiserror::Error)]
pub enum Trouble {
    #[error("{name}: at {address:#x} decoder and disassembler do not agree: {problem}")]
    DecoderDiffers { name: String, address: u64, problem: String },

    #[error("{what} is missing: {remedy}")]
    ToolMissing { what: String, remedy: String },

    #[error("{what} did not build (see the compiler's messages above)")]
    DidNotBuild { what: &'static str },

    #[error("cargo built, but named no {0}")]
    NotNamed(String),

    #[error("{path}: {problem}", path = path.display())]
    BadFile { path: PathBuf, problem: String },

    #[error("{what}: {source}")]
    Io { what: String, source: io::Error },

    #[error("{name}: still running after {} s and stopped; --time-limit gives it more", after.as_secs())]
    StillRunning { name: String, after: Duration },

    #[error("{name}: the emulator ended with {status}; the image logged {log:?}, the emulator said {said:?}")]
    BadEnding { name: String, status: ExitStatus, log: Vec<String>, said: String },
}

impl Trouble {
    pub fn io(what: impl Into<String>) -> impl FnOnce(io::Error) -> Self {
        let what = what.into();
        move |source| Self::Io { what, source }
    }

    pub fn exit_code(&self) -> u8 {
        match self {
            Self::ToolMissing { .. } => 3,
            _ => 1,
        }
    }
}
