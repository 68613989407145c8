//! Where Toehold's source tree is.

use std::path::{Path, PathBuf};
use std::{env, fmt};

/// The workspace that measures, seen from the root of the source tree.
pub(super) const WORKSPACE: &str = "benches/on-target/Cargo.toml";

/// There is no source tree.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct NoSource {
    asked: Option<PathBuf>,
}

impl fmt::Display for NoSource {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match &self.asked {
            Some(folder) => {
                write!(f, "{} is not Toehold's source tree (it has no {WORKSPACE})", folder.display())
            }
            None => write!(
                f,
                "images for the chips are built of Toehold's source tree, and none is here: run this within the \
                 repository, or name its folder with --source"
            ),
        }
    }
}

impl std::error::Error for NoSource {}

/// The root of the source tree: the folder that is named; else one that holds the current folder; else the one that
/// this program was built of, if it is still there.
///
/// # Errors
/// If there is none.
pub fn source_tree(named: Option<&Path>) -> Result<PathBuf, NoSource> {
    let is_it =
        |folder: &Path| folder.join(WORKSPACE).is_file() && folder.join("ik-core/Cargo.toml").is_file();
    if let Some(folder) = named {
        return if is_it(folder) {
            Ok(folder.to_owned())
        } else {
            Err(NoSource { asked: Some(folder.to_owned()) })
        };
    }
    let here = env::current_dir().unwrap_or_default();
    let built = Path::new(env!("CARGO_MANIFEST_DIR")).parent();
    let found = here.ancestors().chain(built).find(|folder| is_it(folder));
    found.map(Path::to_owned).ok_or(NoSource { asked: None })
}
