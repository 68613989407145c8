//! Compiler targets and emulators: asks `.ci/tools.sh` to provide them, and runs commands with them.

use std::{
    io,
    path::{Path, PathBuf},
    process::Command,
};

use crate::{
    arguments::{Way, name_of},
    chip::Chip,
    trouble::Trouble,
};

/// The exit code by which `.ci/tools.sh` says that it could not provide a tool.
const TOOL_MISSING: i32 = 3;

/// The folder `examples-embedded`.
pub fn workspace() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).parent().expect("a member of a workspace").to_owned()
}

/// Sees to it that there is a compiler for these chips, and their emulators.
pub fn set_up(way: Way, chips: &[Chip]) -> Result<(), Trouble> {
    if way == Way::None {
        return chips.iter().try_for_each(|chip| answers(chip.emulator().0));
    }
    let mut command = script(way, chips);
    // Without a command to run the script prints shell lines, which nobody needs here.
    command.args(["--", "true"]);
    match command.status() {
        Ok(status) if status.success() => Ok(()),
        Ok(status) if status.code() == Some(TOOL_MISSING) => Err(Trouble::ToolMissing {
            what: "a compiler target or the emulator".into(),
            remedy: "see the message above".into(),
        }),
        Ok(status) => {
            Err(Trouble::Io { what: ".ci/tools.sh".into(), source: io::Error::other(status.to_string()) })
        }
        Err(source) if source.kind() == io::ErrorKind::NotFound => Err(Trouble::ToolMissing {
            what: "bash, which runs .ci/tools.sh,".into(),
            remedy: "install it, or install compiler targets and emulator by hand and say --way none".into(),
        }),
        Err(source) => Err(Trouble::Io { what: ".ci/tools.sh".into(), source }),
    }
}

/// `cargo` with a compiler for this chip.
pub fn cargo(way: Way, chip: Chip) -> Command {
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
    command.arg(workspace().join("../.ci/tools.sh")).args(["--way", &name_of(&way)]);
    for chip in chips {
        command.args(["--target", chip.target()]);
    }
    command
}

fn answers(emulator: &str) -> Result<(), Trouble> {
    match Command::new(emulator).arg("--version").output() {
        Ok(output) if output.status.success() => Ok(()),
        _ => Err(Trouble::ToolMissing {
            what: format!("the emulator {emulator}"),
            remedy: "install your system's package of QEMU that has it".into(),
        }),
    }
}
