//! Which robot a command is about: a sheet's, or a demo's.

use super::ending::Ending;
use crate::sheet::{self, DEMOS, Robot};
use std::io::IsTerminal as _;
use std::path::{Path, PathBuf};

/// Where a robot comes from.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) enum Source {
    /// A sheet.
    File(PathBuf),
    /// A demo that is built in.
    Demo(&'static str),
}

impl Source {
    /// A file of that name if there is one; else the demo robot of that name.
    fn named(path: &Path) -> Self {
        let demo = DEMOS.iter().find(|demo| Path::new(demo.name) == path);
        match demo {
            Some(demo) if !path.exists() => Self::Demo(demo.name),
            _ => Self::File(path.to_owned()),
        }
    }

    /// How a call names it.
    pub(super) fn shown(&self) -> String {
        match self {
            Self::File(path) => path.display().to_string(),
            Self::Demo(name) => format!("demo robot {name}"),
        }
    }

    /// The robot.
    pub(super) fn robot(&self) -> Result<Robot, Ending> {
        match self {
            Self::File(path) => sheet::read(path),
            Self::Demo(name) => sheet::demo(name),
        }
        .map_err(|errors| Ending::WrongInput(errors.render(std::io::stderr().is_terminal())))
    }

    /// The robot, and the very text that it was read from.
    pub(super) fn robot_and_text(&self) -> Result<(Robot, String), Ending> {
        match self {
            Self::File(path) => sheet::read_with_text(path),
            Self::Demo(name) => sheet::demo(name).map(|robot| {
                let demo = DEMOS.iter().find(|demo| demo.name == *name);
                (robot, demo.map_or_else(String::new, |demo| demo.text.to_owned()))
            }),
        }
        .map_err(|errors| Ending::WrongInput(errors.render(std::io::stderr().is_terminal())))
    }

    /// A name for files about it: letters, digits and hyphens.
    pub(super) fn stem(&self) -> String {
        let stem = match self {
            Self::File(path) => path.file_stem().map(|stem| stem.to_string_lossy().into_owned()),
            Self::Demo(name) => Some((*name).to_owned()),
        };
        stem.filter(|stem| !stem.is_empty()).unwrap_or_else(|| "robot".to_owned())
    }
}

/// The sheet or demo robot that was named, or every demo robot.
pub(super) fn named_or_all_demos(sheet: Option<&PathBuf>) -> Vec<Source> {
    match sheet {
        Some(path) => vec![Source::named(path)],
        None => DEMOS.iter().map(|demo| Source::Demo(demo.name)).collect(),
    }
}

/// The sheet or demo robot that was named, or the first demo robot.
pub(super) fn named_or_first_demo(sheet: Option<&PathBuf>) -> Source {
    sheet.map_or(Source::Demo(DEMOS[0].name), |path| Source::named(path))
}
