//! Builds the image for a chip and says where it lies.

use std::{io::BufReader, path::PathBuf, process::Stdio};

use cargo_metadata::Message;

use crate::{
    arguments::{GoWrong, Way, name_of},
    chip::Chip,
    tools,
    trouble::Trouble,
};

/// The image that goes through the drill.
pub const DRILL: &str = "leg-by-timer";

pub fn build(way: Way, chip: Chip, package: &str, go_wrong: Option<GoWrong>) -> Result<PathBuf, Trouble> {
    let failed = |source| Trouble::Io { what: "starting cargo".into(), source };
    let mut cargo = tools::cargo(way, chip);
    cargo
        .current_dir(tools::workspace())
        .args(["build", "--quiet", "--locked", "--profile", "chip", "--package", package])
        .args(["--target", chip.target()])
        // Messages for people go to standard error, where cargo was built: also on a pipe.
        .arg("--message-format=json-render-diagnostics")
        // Flags meant for the PC's build would replace the image's own.
        .env_remove("RUSTFLAGS")
        .env_remove("CARGO_ENCODED_RUSTFLAGS")
        .stdout(Stdio::piped());
    if let Some(way) = go_wrong {
        cargo.args(["--features", &name_of(&way)]);
    }
    let mut running = cargo.spawn().map_err(failed)?;
    let messages = running.stdout.take().expect("standard output is piped");
    let mut image = None;
    for message in Message::parse_stream(BufReader::new(messages)) {
        if let Message::CompilerArtifact(artifact) = message.map_err(failed)?
            && artifact.target.name == package
        {
            image = artifact.executable.or(image);
        }
    }
    if !running.wait().map_err(failed)?.success() {
        return Err(Trouble::ImageDidNotBuild);
    }
    image.map(Into::into).ok_or(Trouble::NoImage(package.into()))
}
