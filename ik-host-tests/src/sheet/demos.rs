//! The demo robots, built into the program so that it can be tried without a sheet.

/// A demo robot.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Demo {
    /// What it is asked for by.
    pub name: &'static str,
    /// The name of its file.
    pub file_name: &'static str,
    /// The text of its sheet.
    pub text: &'static str,
}

/// Every demo robot; the first is the one to show when none is named.
pub const DEMOS: [Demo; 2] = [
    Demo {
        name: "culvert-walker",
        file_name: "culvert-walker.toml",
        text: include_str!("../../robots/culvert-walker.toml"),
    },
    Demo {
        name: "orchard-walker",
        file_name: "orchard-walker.toml",
        text: include_str!("../../robots/orchard-walker.toml"),
    },
];
