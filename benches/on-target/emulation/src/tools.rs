//! Compiler targets and emulators: asks `.ci/tools.sh` to provide them, and runs commands with them.

use std::{
    io,
    path::{Path, PathBuf},
    process::Command,
};

use clap::ValueEnum;

use crate::{chip::Chip, trouble::Trouble};

/// The exit code by which `.ci/tools.sh` says that it could not provide a tool.
const TOOL_MISSING: i32 = 3;

/// Where the compiler for the chips comes from; all but `None` are explained in `.ci/tools.sh`.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum Way {
    /// The compiler in use if it has the targets, else rustup, else Debian's packages
    Auto,
    /// Add targets to the toolchain in use with rustup
    Rustup,
    /// Debian's compiler, with `core` built once
    Distro,
    /// Use what is there and install nothing (needs no bash)
    None,
}

/// The name by which the command line knows a value.
pub fn name_of(value: &impl ValueEnum) -> String {
    value.to_possible_value().map(|named| named.get_name().to_owned()).unwrap_or_default()
}

/// The folder `benches/on-target`.
pub fn workspace() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).parent().expect("a member of a workspace").to_owned()
}

/// Sees to it that there is a compiler for these chips, and emulators that take plugins.
pub fn set_up(way: Way, chips: &[Chip]) -> Result<(), Trouble> {
    if way != Way::None {
        let mut command = script(way, chips);
        // Without a command to run the script prints shell lines, which nobody needs here.
        command.args(["--", "true"]);
        match command.status() {
            Ok(status) if status.success() => {}
            Ok(status) if status.code() == Some(TOOL_MISSING) => {
                return Err(Trouble::ToolMissing {
                    what: "a compiler target or the emulator".into(),
                    remedy: "see the message above".into(),
                });
            }
            Ok(status) => {
                return Err(Trouble::io(".ci/tools.sh")(io::Error::other(status.to_string())));
            }
            Err(error) if error.kind() == io::ErrorKind::NotFound => {
                return Err(Trouble::ToolMissing {
                    what: "bash, which runs .ci/tools.sh,".into(),
                    remedy: "install it, or install compiler targets and emulator by hand and say --way none"
                        .into(),
                });
            }
            Err(error) => return Err(Trouble::io(".ci/tools.sh")(error)),
        }
    }
    chips.iter().try_for_each(|chip| takes_plugins(chip.emulator()))
}

/// `cargo` with a compiler for this chip.
pub(crate) fn cargo(way: Way, chip: Chip) -> Command {
    // Cargo by its name in PATH, not by the CARGO that started us: the script may choose another.
    if way == Way::None {
        return Command::new("cargo");
    }
    let mut command = script(way, &[chip]);
    command.args(["--no-emulator", "--", "cargo"]);
    command
}

fn script(way: Way, chips: &[Chip]) -> Command {
    let mut command = Command::new("bash");
    command.arg(workspace().join("../../.ci/tools.sh")).args(["--way", &name_of(&way)]);
    for chip in chips {
        command.args(["--target", chip.target()]);
    }
    command
}

fn takes_plugins(emulator: &str) -> Result<(), Trouble> {
    let help = Command::new(emulator).arg("--help").output().map_err(|_| Trouble::ToolMissing {
        what: format!("the emulator {emulator}"),
        remedy: "install your system's package of QEMU that has it".into(),
    })?;
    if String::from_utf8_lossy(&help.stdout).contains("-plugin") {
        return Ok(());
    }
    Err(Trouble::ToolMissing {
        what: format!("{emulator}'s option -plugin"),
        remedy: "this build of QEMU takes no plugins; Debian 12's (QEMU 7.2) does, or configure one with \
                 --enable-plugins"
            .into(),
    })
}
