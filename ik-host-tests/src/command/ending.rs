//! How a command ends.

use std::io::{self, Write as _};
use std::process::ExitCode;

/// How a command ends.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) enum Ending {
    /// Done, and within what the sheet allows.
    Within,
    /// Done, and something is beyond what the sheet allows.
    Beyond,
    /// The input or the call is wrong: why, and what would be right.
    WrongInput(String),
    /// What was asked for could not be written.
    Failed(String),
}

impl Ending {
    pub(super) fn code(&self) -> ExitCode {
        ExitCode::from(match self {
            Self::Within => 0,
            Self::Beyond => 1,
            Self::WrongInput(_) | Self::Failed(_) => 2,
        })
    }
}

/// Writes to standard output. A reader that closes early (a pager, `head`) has what it wanted: no error.
pub(super) fn print(text: &str) -> Result<(), Ending> {
    let mut out = io::stdout().lock();
    match out.write_all(text.as_bytes()).and_then(|()| out.flush()) {
        Err(error) if error.kind() != io::ErrorKind::BrokenPipe => {
            Err(Ending::Failed(format!("toehold: cannot write to standard output: {error}")))
        }
        _ => Ok(()),
    }
}
