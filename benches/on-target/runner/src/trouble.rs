//! Everything that can go wrong, and the exit code that tells it.

#[derive(Debug, thiserror::Error)]
pub enum Trouble {
    #[error(transparent)]
    Emulation(#[from] emulation::Trouble),

    #[error("--only {only}: no contender has that in its name; there are {names}")]
    NoSuchContender { only: String, names: String },

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

    #[error("{name}: plugin and the chip's own counter do not agree: {problem}")]
    OwnCounterDiffers { name: String, problem: String },

    #[error("{name}: the stack went {measured} bytes deep, beyond its bound of {bound}: the bound is wrong")]
    BeyondTheBound { name: String, measured: u64, bound: u64 },

    #[error("{path}: {problem}; `cargo leg-cost --rewrite-guard` writes it anew", path = path.display())]
    Guard { path: std::path::PathBuf, problem: String },

    #[error("{excesses} figures are beyond guard.toml; if that is meant, `cargo leg-cost --rewrite-guard`")]
    Beyond { excesses: usize },
}

impl Trouble {
    pub fn exit_code(&self) -> u8 {
        match self {
            Self::Emulation(trouble) => trouble.exit_code(),
            Self::NoSuchContender { .. } => 2,
            _ => 1,
        }
    }
}
