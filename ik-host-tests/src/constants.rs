//! A sheet's legs as constants for firmware: what `toehold constants` writes.
//!
//! [`rust`] makes the text of a Rust module. Its measures go through ik-core's own `const` constructors, so that the compiler
//! works out the very numbers that the survey judged; places on the body and bounds of pulses stand there as the number
//! system and the output hold them.

mod digest;
mod lengths;
mod names;
mod view;

pub use digest::sha256;

use crate::machine::Refused;
use crate::sheet::{NumberSystem, Robot};
use crate::survey::Survey;
use minijinja::syntax::SyntaxConfig;
use minijinja::value::Serde;
use minijinja::{Environment, UndefinedBehavior};

/// Where constants come from, for their header.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Origin {
    /// The sheet, as the call named it.
    pub sheet: String,
    /// The SHA-256 of its text, in hexadecimal.
    pub sha256: String,
    /// The call that makes the same text again.
    pub command: String,
}

/// The constants of every leg of a robot in a number system as a Rust module. `survey` is of this robot, with this number
/// system as the firmware's: its figures go into the header, and whether they are beyond what the sheet allows.
///
/// The same input gives the same text, byte for byte.
///
/// # Errors
/// What ik-core or the number system refuses, and why.
pub fn rust(
    robot: &Robot,
    number: NumberSystem,
    survey: &Survey,
    origin: &Origin,
) -> Result<String, Refused> {
    let view = view::of(robot, number, survey, origin)?;
    let mut templates = Environment::new();
    templates.set_undefined_behavior(UndefinedBehavior::Strict);
    let syntax = SyntaxConfig::builder().trim_blocks(true).lstrip_blocks(true).build();
    templates.set_syntax(syntax.expect("the delimiters are the usual ones"));
    templates
        .add_template("rust.txt", include_str!("constants/templates/rust.txt"))
        .expect("a constant template");
    let text = templates
        .get_template("rust.txt")
        .and_then(|template| template.render(Serde(&view)))
        .expect("a constant template over what it was written for");
    // A template ends without its last newline.
    Ok(format!("{}\n", text.trim_end()))
}
