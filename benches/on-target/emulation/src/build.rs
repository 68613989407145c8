//! Builds the plugin and the images, and says where they lie.

use std::{
    collections::BTreeMap,
    fs,
    io::BufReader,
    path::{Path, PathBuf},
    process::{Command, Stdio},
};

use cargo_metadata::{Artifact, Message};

use crate::{chip::Chip, tools, tools::Way, trouble::Trouble};

/// Images by their names.
pub type Images = BTreeMap<String, PathBuf>;

/// The plugin, for this PC.
pub fn plugin() -> Result<PathBuf, Trouble> {
    let mut cargo = Command::new("cargo");
    cargo.args(["build", "--release", "--package", "plugin"]);
    let artifacts = run(cargo, "the plugin")?;
    artifacts
        .into_iter()
        .filter(|artifact| artifact.target.name == "window_counter")
        .flat_map(|artifact| artifact.filenames)
        .find(|path| path.extension() == Some(std::env::consts::DLL_EXTENSION))
        .map(Into::into)
        .ok_or_else(|| Trouble::NotNamed("plugin".into()))
}

/// These images of a package, by their names.
///
/// # Errors
/// If one does not build.
pub fn images(way: Way, chip: Chip, package: &str, names: &[impl AsRef<str>]) -> Result<Images, Trouble> {
    images_with(way, chip, package, names, &[], None)
}

/// The same with some features of the package, and, for a self-test, with another ik-core than ours. They are copied to where those with other features do not replace them.
///
/// # Errors
/// If one does not build, or cannot be copied.
pub fn images_with(
    way: Way,
    chip: Chip,
    package: &str,
    names: &[impl AsRef<str>],
    features: &[&str],
    ik_core: Option<&Path>,
) -> Result<Images, Trouble> {
    let mut cargo = tools::cargo(way, chip);
    cargo.args(["build", "--profile", "chip", "--package", package, "--target", chip.target()]);
    if let Some(processor) = chip.optimised_for() {
        // A folder of its own, or each of the two would undo the other's work.
        cargo.args(["--target-dir", "target/tuned"]);
        cargo.arg("--config").arg(format!("target.{}.rustflags=['-Ctarget-cpu={processor}']", chip.target()));
    }
    if !features.is_empty() {
        cargo.args(["--features", &features.join(",")]);
    }
    if let Some(other) = ik_core {
        cargo.arg("--config").arg(format!("paths=['{}']", other.display()));
    }
    for name in names {
        cargo.args(["--bin", name.as_ref()]);
    }
    let mut images = Images::new();
    for artifact in run(cargo, "an image")? {
        let Some(executable) = artifact.executable else { continue };
        let mut path = PathBuf::from(executable);
        if !features.is_empty() {
            let copy = path.with_file_name(format!("{}-{}", artifact.target.name, features.join("-")));
            fs::copy(&path, &copy).map_err(Trouble::io(copy.display().to_string()))?;
            path = copy;
        }
        images.insert(artifact.target.name, path);
    }
    Ok(images)
}

fn run(mut cargo: Command, what: &'static str) -> Result<Vec<Artifact>, Trouble> {
    let mut running = cargo
        .current_dir(tools::workspace())
        .args(["--quiet", "--locked"])
        // Messages for people go to standard error, where cargo was built: also on a pipe.
        .arg("--message-format=json-render-diagnostics")
        // Flags meant for the PC's build would replace the image's own.
        .env_remove("RUSTFLAGS")
        .env_remove("CARGO_ENCODED_RUSTFLAGS")
        .stdout(Stdio::piped())
        .spawn()
        .map_err(Trouble::io("starting cargo"))?;
    let messages = running.stdout.take().expect("standard output is piped");
    let mut artifacts = Vec::new();
    for message in Message::parse_stream(BufReader::new(messages)) {
        if let Message::CompilerArtifact(artifact) =
            message.map_err(Trouble::io("reading what cargo says"))?
        {
            artifacts.push(artifact);
        }
    }
    if !running.wait().map_err(Trouble::io("waiting for cargo"))?.success() {
        return Err(Trouble::DidNotBuild { what });
    }
    Ok(artifacts)
}
