//! From the text of a sheet to a robot, or to everything that is wrong with the text.

use toml::de::DeTable;

use super::complaint::Complaint;
use super::robot::Robot;
use super::table::{Ledger, Table};
use super::vocabulary::SHEET;
use super::{allowed, drive, firmware, leg, leg_kind, output};

/// Reads and checks a sheet.
pub(super) fn robot(text: &str) -> Result<Robot, Vec<Complaint>> {
    let (tree, syntax) = DeTable::parse_recoverable(text);
    if !syntax.is_empty() {
        return Err(syntax_complaints(text, &syntax));
    }
    let ledger = Ledger::new(text);
    let robot = checked(&ledger, tree.get_ref());
    let complaints = ledger.into_complaints();
    match robot {
        Some(robot) if complaints.is_empty() => Ok(robot),
        _ => Err(complaints),
    }
}

fn checked<'s>(ledger: &'s Ledger<'s>, tree: &'s DeTable<'s>) -> Option<Robot> {
    let sheet = Table::open(ledger, tree, String::new(), 0..0, &SHEET);
    let name = sheet.needed("name").and_then(|item| item.name());
    let about = sheet.optional("about").map(|item| item.text());
    let output = output::read(&sheet);
    let firmware = firmware::read(&sheet, output.as_ref());
    let kinds = leg_kind::read_all(&sheet, output.as_ref());
    let legs = leg::read_all(&sheet, &kinds);
    if let Some(legs) = &legs {
        drive::check(&kinds, legs);
    }
    let allowed = allowed::read(&sheet);
    Some(Robot {
        name: name?.to_owned(),
        about: match about {
            Some(text) => Some(text?.to_owned()),
            None => None,
        },
        firmware: firmware?,
        output: output?,
        kinds: kinds.into_iter().map(|known| known.kind).collect::<Option<_>>()?,
        legs: legs?,
        allowed: allowed?,
    })
}

/// What the parser complains of, in the look of the other complaints: the first of each line, since
/// what follows on a line is mostly its echo.
fn syntax_complaints(text: &str, errors: &[toml::de::Error]) -> Vec<Complaint> {
    let mut complaints: Vec<_> = errors
        .iter()
        .map(|error| {
            let span = error.span().unwrap_or(0..0);
            Complaint::new(
                text,
                &span,
                String::new(),
                None,
                format!("not TOML: {}", error.message()),
                remedy(error.message()).to_owned(),
            )
        })
        .collect();
    complaints.sort_by_key(Complaint::start);
    complaints.dedup_by_key(|complaint| complaint.line);
    complaints
}

/// What would be right, told from the parser's message; the general rule when it tells nothing.
fn remedy(message: &str) -> &'static str {
    if message.contains("duplicate key") {
        "a key or table may be given once: take one out, or rename it"
    } else if message.contains("unclosed") {
        "close what was opened: each [ needs its ], each { its }"
    } else if message.contains("string values must be quoted") {
        "give a value after `=`: a number, \"text\", or a list such as [-50, 50]"
    } else if message.contains("key with no value") {
        "write each line as `key = value`, each table as `[name]`, each comment after `#`"
    } else if message.contains("literal string") || message.contains("basic string") {
        "end the text with the quotation mark it began with, on the same line"
    } else {
        "a sheet is TOML: `key = value` lines, `[table]` headers, comments after `#`"
    }
}
