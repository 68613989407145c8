//! What is wrong with a sheet: as data, and as text with the line shown.

use std::fmt;
use std::ops::Range;

use codespan_reporting::diagnostic::{Diagnostic, Label};
use codespan_reporting::files::SimpleFile;
use codespan_reporting::term;
use codespan_reporting::term::termcolor::Ansi;
use serde::Serialize;

/// One thing that is wrong with a sheet.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Complaint {
    /// Line in the file, from 1.
    pub line: usize,
    /// Column in that line, from 1, counted in characters.
    pub column: usize,
    /// Where in the sheet, as a dotted path: `leg_kind.walker.femur_mm`. Legs are counted from 1 in
    /// the order of the file: `leg[2].side`. Empty when the text is not TOML there.
    pub field: String,
    /// The value as the sheet writes it, shortened when long; `None` when it is missing.
    pub value: Option<String>,
    /// What is wrong, as a clause about the field.
    pub problem: String,
    /// What would be right.
    pub remedy: String,
    /// The bytes of the text to underline; they lie in one line.
    #[serde(skip)]
    span: Range<usize>,
}

/// The longest value that a complaint repeats, in characters.
const VALUE_LETTERS: usize = 60;

impl Complaint {
    /// A complaint about the bytes `span` of `text`. The span may be anything: it is brought into the
    /// text and into one line.
    pub(super) fn new(
        text: &str,
        span: &Range<usize>,
        field: String,
        value: Option<&str>,
        problem: String,
        remedy: String,
    ) -> Self {
        let span = within_a_line(text, span);
        let before = text.get(..span.start).unwrap_or_default();
        let line_start = before.rfind('\n').map_or(0, |newline| newline + 1);
        let indent = before.get(line_start..).unwrap_or_default();
        Self {
            line: 1 + before.matches('\n').count(),
            column: 1 + indent.chars().count(),
            field,
            value: value.map(shortened),
            problem,
            remedy,
            span,
        }
    }

    /// Where the complaint starts, in bytes from the start of the text.
    pub(super) fn start(&self) -> usize {
        self.span.start
    }

    /// The line above the source: what is wrong.
    fn headline(&self) -> String {
        match (self.field.as_str(), &self.value) {
            ("", _) => self.problem.clone(),
            (field, Some(value)) => format!("{field} = {value}: {}", self.problem),
            (field, None) => format!("{field}: {}", self.problem),
        }
    }

    fn diagnostic(&self) -> Diagnostic<()> {
        Diagnostic::error()
            .with_message(self.headline())
            .with_label(Label::primary((), self.span.clone()))
            .with_note(&self.remedy)
    }
}

/// One line without the file's name: `12:9: leg[1].side = "port": must be ... (remedy)`.
impl fmt::Display for Complaint {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let (line, column) = (self.line, self.column);
        write!(f, "{line}:{column}: {} ({})", self.headline(), self.remedy)
    }
}

/// A value fit for a message: one line, no control characters, not too long.
fn shortened(value: &str) -> String {
    let mut letters = value.chars();
    let mut short: String = letters
        .by_ref()
        .take(VALUE_LETTERS)
        .map(|letter| if letter.is_control() { ' ' } else { letter })
        .collect();
    if letters.next().is_some() {
        short.push_str("...");
    }
    short
}

/// Brings a span into the text, onto whole characters and into the line where it starts. A place
/// after the last line becomes the end of the last line that holds anything.
fn within_a_line(text: &str, span: &Range<usize>) -> Range<usize> {
    let last = text.trim_end().len();
    let mut start = span.start.min(last);
    while !text.is_char_boundary(start) {
        start -= 1;
    }
    let rest = text.get(start..).unwrap_or_default();
    let line_end = start + rest.find(['\n', '\r']).unwrap_or(rest.len());
    let mut end = span.end.clamp(start, line_end);
    while !text.is_char_boundary(end) {
        end -= 1;
    }
    start..end
}

/// Everything that is wrong with a sheet, in the order of its lines. Never empty.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Complaints {
    /// The file's name as it was given.
    pub file: String,
    /// The complaints.
    pub complaints: Vec<Complaint>,
    #[serde(skip)]
    text: String,
}

impl Complaints {
    pub(super) fn new(file: &str, text: &str, mut complaints: Vec<Complaint>) -> Self {
        // Stable: complaints about one place keep the order in which they were found.
        complaints.sort_by_key(Complaint::start);
        Self { file: file.to_owned(), complaints, text: text.to_owned() }
    }

    /// The complaints as text, each with its `file:line:column`, its line and what would be right;
    /// `colour` adds ANSI escapes.
    pub fn render(&self, colour: bool) -> String {
        let file = SimpleFile::new(self.file.as_str(), self.text.as_str());
        let config = term::Config::default();
        let mut shown = String::new();
        for complaint in &self.complaints {
            let diagnostic = complaint.diagnostic();
            let rendered = if colour {
                let mut ansi = Ansi::new(Vec::new());
                term::emit_to_write_style(&mut ansi, &config, &file, &diagnostic)
                    .map(|()| String::from_utf8_lossy(&ansi.into_inner()).into_owned())
            } else {
                term::emit_into_string(&config, &file, &diagnostic)
            };
            // Writing to memory does not fail; were it to, the complaint must still be seen.
            shown += &rendered.unwrap_or_else(|_| format!("error: {}:{complaint}\n", self.file));
        }
        let count = self.complaints.len();
        let things = if count == 1 { "thing" } else { "things" };
        shown += &format!("{}: {count} {things} to put right\n", self.file);
        shown
    }
}

impl fmt::Display for Complaints {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.render(false))
    }
}

impl std::error::Error for Complaints {}

/// Why there is no robot.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
#[serde(tag = "error", rename_all = "snake_case")]
pub enum SheetErrors {
    /// The file could not be read.
    Unreadable {
        /// The path as it was given.
        path: String,
        /// Why not.
        cause: String,
    },
    /// The file was read, and is wrong.
    Faulty(Complaints),
    /// There is no demo robot of that name.
    NoSuchDemo {
        /// The name that was asked for.
        name: String,
        /// The names there are.
        known: Vec<String>,
    },
}

impl SheetErrors {
    /// The error as text that ends its last line; `colour` adds ANSI escapes to complaints.
    pub fn render(&self, colour: bool) -> String {
        match self {
            Self::Faulty(complaints) => complaints.render(colour),
            Self::Unreadable { path, cause } => {
                let demos = super::DEMOS.map(|demo| demo.name).join(", ");
                format!(
                    "error: cannot read the robot sheet `{path}`: {cause} (the demo robots are: {demos})\n"
                )
            }
            Self::NoSuchDemo { name, known } => {
                let meant = super::nearest::nearest(name, known.iter().map(String::as_str))
                    .map(|near| format!(" Did you mean `{near}`?"))
                    .unwrap_or_default();
                let known = known.join(", ");
                format!("error: no demo robot is called `{name}`.{meant} There are: {known}\n")
            }
        }
    }
}

impl fmt::Display for SheetErrors {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.render(false))
    }
}

impl std::error::Error for SheetErrors {}

impl From<Complaints> for SheetErrors {
    fn from(complaints: Complaints) -> Self {
        Self::Faulty(complaints)
    }
}
