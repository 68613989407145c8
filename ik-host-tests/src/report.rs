//! A survey for people and machines: text, JSON, and a page.

mod bounds;
mod chips;
mod number;
mod page;
mod picture;
mod solved;
mod text;
mod trimmed;

pub use bounds::bounds_text;
pub use chips::chips_text;
pub use number::millimetres;
pub use picture::trim_drawing;
pub use solved::solved_text;
pub use text::text;
pub use trimmed::trimmed_text;

use crate::chips::Chips;
use crate::survey::Survey;
use serde::Serialize;
use std::io::Write as _;
use std::path::{Path, PathBuf};
use std::{fmt, fs, io};

/// A report that could not be written: the file or folder, and why.
#[derive(Debug)]
pub struct WriteError {
    path: PathBuf,
    cause: io::Error,
}

impl fmt::Display for WriteError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "cannot write {}: {}", self.path.display(), self.cause)
    }
}

impl std::error::Error for WriteError {}

/// Data as JSON for people to read too, ending in a newline.
pub fn json(data: &impl Serialize) -> String {
    let mut text = serde_json::to_string_pretty(data).expect("plain data with string keys");
    text.push('\n');
    text
}

/// A survey with what the legs cost on the chips, if that is known.
#[derive(Serialize)]
struct WithChips<'a> {
    #[serde(flatten)]
    survey: &'a Survey,
    #[serde(skip_serializing_if = "Option::is_none")]
    chips: Option<&'a Chips>,
}

/// Writes `STEM.json` and `STEM.html` into a folder, which is made if it is not there. Each is written beside its
/// place and then moved there, so that an earlier report is replaced by a complete one or not at all.
///
/// # Errors
/// Names the file or folder and the cause.
pub fn write(
    folder: &Path,
    stem: &str,
    survey: &Survey,
    chips: Option<&Chips>,
    repeat: &str,
) -> Result<[PathBuf; 2], WriteError> {
    fs::create_dir_all(folder).map_err(|cause| WriteError { path: folder.to_owned(), cause })?;
    let place = |ending: &str, text: String| {
        let path = folder.join(format!("{stem}.{ending}"));
        replace_file(&path, &text).map(|()| path)
    };
    Ok([
        place("json", json(&WithChips { survey, chips }))?,
        place("html", page::page(survey, chips, repeat))?,
    ])
}

/// Where the figures of the chips lie beside a survey's report.
pub fn chips_place(folder: &Path, stem: &str) -> PathBuf {
    folder.join(format!("{stem}.chips.json"))
}

/// Writes `STEM.chips.json` into a folder, as [`write()`] does.
///
/// # Errors
/// Names the file or folder and the cause.
pub fn write_chips(folder: &Path, stem: &str, chips: &Chips) -> Result<PathBuf, WriteError> {
    fs::create_dir_all(folder).map_err(|cause| WriteError { path: folder.to_owned(), cause })?;
    let path = chips_place(folder, stem);
    replace_file(&path, &json(chips)).map(|()| path)
}

/// Whether a file can be new: that it is not there yet.
///
/// # Errors
/// If it is.
pub fn must_be_new(path: &Path) -> Result<(), WriteError> {
    let cause = || io::Error::other("it is there already; name a file that is not");
    if path.exists() { Err(WriteError { path: path.to_owned(), cause: cause() }) } else { Ok(()) }
}

/// Writes a file that must not be there yet.
///
/// # Errors
/// If it is, or cannot be written.
pub fn write_new(path: &Path, text: &str) -> Result<(), WriteError> {
    must_be_new(path)?;
    let failed = |cause| WriteError { path: path.to_owned(), cause };
    // One that came to be in between is not written over either.
    let mut file = fs::File::create_new(path).map_err(failed)?;
    file.write_all(text.as_bytes()).map_err(failed)
}

/// Replaces a file by a complete one, or not at all.
///
/// # Errors
/// If it cannot be written.
pub fn replace_file(path: &Path, text: &str) -> Result<(), WriteError> {
    let folder = path.parent().filter(|folder| !folder.as_os_str().is_empty()).unwrap_or(Path::new("."));
    replace(folder, path, text).map_err(|cause| WriteError { path: path.to_owned(), cause })
}

fn replace(folder: &Path, path: &Path, text: &str) -> io::Result<()> {
    let mut file = tempfile::Builder::new().prefix(".toehold-").tempfile_in(folder)?;
    file.write_all(text.as_bytes())?;
    file.as_file().sync_all()?;
    // Temporary files are private; a report is not.
    #[cfg(unix)]
    {
        use std::os::unix::fs::PermissionsExt as _;
        file.as_file().set_permissions(fs::Permissions::from_mode(0o644))?;
    }
    file.persist(path)?;
    Ok(())
}
