//! Everything that can go wrong, and the exit code that tells it.

use std::{io, path::PathBuf};

use crate::{comparison::Difference, emulator::BadEnding};

#[derive(Debug, thiserror::Error)]
pub enum Trouble {
    #[error("{what} is missing: {remedy}")]
    ToolMissing { what: String, remedy: String },

    #[error("--spoil {target}: must be below {targets}, the number of targets")]
    NoSuchTarget { target: u32, targets: u32 },

    #[error("the image did not build (see the compiler's messages above)")]
    ImageDidNotBuild,

    #[error("cargo built, but named no image `{0}`")]
    NoImage(String),

    #[error("{path}: {problem}", path = path.display())]
    BadImage { path: PathBuf, problem: String },

    #[error("{what}: {source}")]
    Io { what: String, source: io::Error },

    #[error("the log cannot be decoded after line {good_lines}: the data are damaged")]
    DamagedLog { good_lines: usize },

    #[error(transparent)]
    BadEnding(#[from] BadEnding),

    #[error(transparent)]
    Difference(#[from] Difference),

    #[error("failed: {}; if its log is meant to be another, `cargo on-target --rewrite-golden`", models.join(", "))]
    ModelsFailed { models: Vec<&'static str> },

    #[error("{failed} of {of} chip classes failed")]
    ChipsFailed { failed: usize, of: usize },

    #[error("{failed} of {of} self-tests failed")]
    SelfTestsFailed { failed: usize, of: usize },
}

impl Trouble {
    pub fn exit_code(&self) -> u8 {
        match self {
            Self::ToolMissing { .. } => 3,
            Self::NoSuchTarget { .. } => 2,
            _ => 1,
        }
    }
}
