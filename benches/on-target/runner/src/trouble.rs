//! Everything that can go wrong, and the exit code that tells it.

use std::{io, path::PathBuf, process::ExitStatus, time::Duration};

#[derive(Debug, thiserror::Error)]
pub enum Trouble {
    #[error("{what} is missing: {remedy}")]
    ToolMissing { what: String, remedy: String },

    #[error("--only {only}: no contender has that in its name; there are {names}")]
    NoSuchContender { only: String, names: String },

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

    #[error(
        "{name}: the image logged {logged:?}; by what the PC computes it has to log {expected:?} (if a source file changed while this ran, run it again)"
    )]
    Differs { name: String, logged: Vec<String>, expected: String },

    #[error("{name}: {windows} windows were counted, not {targets}, one for each target")]
    WindowsMissing { name: String, windows: usize, targets: usize },

    #[error(
        "{name}: plugin and execution log do not agree from window {window} on (they have {} and {} windows)",
        windows[0], windows[1]
    )]
    CountsDiffer { name: String, window: usize, windows: [usize; 2] },

    #[error(
        "{name}: the instruction at {address:#x} is of no kind that the cycle tables have; see reckoning/src/decode.rs"
    )]
    UnknownInstruction { name: String, address: u64 },
}

impl Trouble {
    pub fn io(what: impl Into<String>) -> impl FnOnce(io::Error) -> Self {
        let what = what.into();
        move |source| Self::Io { what, source }
    }

    pub fn exit_code(&self) -> u8 {
        match self {
            Self::ToolMissing { .. } => 3,
            Self::NoSuchContender { .. } => 2,
            _ => 1,
        }
    }
}
