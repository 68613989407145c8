//! The checked reader: walks the spanned tree and writes down what is wrong, without ever stopping.
//!
//! Every reading function gives `None` when it has complained (or when an optional key is absent), so
//! that its caller can go on to the next key and put a result together only when all of it is there.

use std::cell::RefCell;
use std::ops::Range;

use toml::de::{DeTable, DeValue};

use super::complaint::Complaint;
use super::limits::{Bounds, NAME_LETTERS};
use super::nearest::nearest;
use super::vocabulary::Vocabulary;

/// Where complaints are gathered.
pub(super) struct Ledger<'t> {
    text: &'t str,
    complaints: RefCell<Vec<Complaint>>,
}

impl<'t> Ledger<'t> {
    pub(super) fn new(text: &'t str) -> Self {
        Self { text, complaints: RefCell::default() }
    }

    pub(super) fn into_complaints(self) -> Vec<Complaint> {
        self.complaints.into_inner()
    }

    /// The text of a span.
    fn written(&self, span: &Range<usize>) -> &'t str {
        self.text.get(span.clone()).unwrap_or_default()
    }

    fn line_of(&self, span: &Range<usize>) -> usize {
        let before = self.text.get(..span.start).unwrap_or_default();
        1 + before.matches('\n').count()
    }

    fn add(
        &self,
        span: &Range<usize>,
        field: &str,
        value: Option<&str>,
        problem: impl Into<String>,
        remedy: impl Into<String>,
    ) {
        let field = field.to_owned();
        let (problem, remedy) = (problem.into(), remedy.into());
        let complaint = Complaint::new(self.text, span, field, value, problem, remedy);
        self.complaints.borrow_mut().push(complaint);
    }
}

/// A key as TOML would write it in a dotted path.
fn path_part(key: &str) -> String {
    let bare = |c: char| c.is_ascii_alphanumeric() || c == '_' || c == '-';
    if !key.is_empty() && key.chars().all(bare) { key.to_owned() } else { format!("{key:?}") }
}

fn joined(path: &str, key: &str) -> String {
    let part = path_part(key);
    if path.is_empty() { part } else { format!("{path}.{part}") }
}

/// A table whose keys have been checked against its vocabulary.
pub(super) struct Table<'s> {
    ledger: &'s Ledger<'s>,
    entries: &'s DeTable<'s>,
    /// Dotted path from the top; empty there.
    path: String,
    /// What to underline when something is missing: the header, or the inline table.
    header: Range<usize>,
    vocabulary: &'static Vocabulary,
    /// Keys that a misspelt or stray one seems to stand for: complained about already.
    excused: Vec<&'static str>,
}

impl<'s> Table<'s> {
    /// Opens a table, and complains of every key that `vocabulary` does not know.
    pub(super) fn open(
        ledger: &'s Ledger<'s>,
        entries: &'s DeTable<'s>,
        path: String,
        header: Range<usize>,
        vocabulary: &'static Vocabulary,
    ) -> Self {
        let mut table = Self { ledger, entries, path, header, vocabulary, excused: Vec::new() };
        for key in entries.keys() {
            let name: &str = key.get_ref();
            if vocabulary.names().all(|known| known != name) {
                table.unknown(name, &key.span());
            }
        }
        table
    }

    fn unknown(&mut self, name: &str, span: &Range<usize>) {
        let field = joined(&self.path, name);
        let stray = self.vocabulary.strays.iter().find(|s| s.name == name);
        if let Some(stray) = stray {
            let remedy = match stray.instead {
                Some(instead) if !self.entries.contains_key(instead) => {
                    self.excused.push(instead);
                    format!("here it is called `{instead}`")
                }
                _ => "take it out".to_owned(),
            };
            self.ledger.add(span, &field, None, stray.belongs, remedy);
            return;
        }
        let absent = |known: &&str| !self.entries.contains_key(*known);
        // A word that is still missing is the likelier meaning.
        let near = nearest(name, self.vocabulary.names().filter(absent))
            .or_else(|| nearest(name, self.vocabulary.names()));
        let meant = near.map_or_else(String::new, |near| format!("did you mean `{near}`? "));
        let known: Vec<_> = self.vocabulary.names().collect();
        self.ledger.add(
            span,
            &field,
            None,
            format!("is not a key of {}", self.vocabulary.table),
            format!("{meant}its keys are {}", known.join(", ")),
        );
        self.excused.extend(near);
    }

    fn item(&self, key: &str) -> Option<Item<'s>> {
        let (written_key, value) = self.entries.get_key_value(key)?;
        let span = value.span();
        Some(Item {
            ledger: self.ledger,
            value: value.get_ref(),
            span: if span.is_empty() { written_key.span() } else { span },
            path: joined(&self.path, key),
            example: self.vocabulary.example(key),
        })
    }

    /// The value of a key that may be absent.
    pub(super) fn optional(&self, key: &str) -> Option<Item<'s>> {
        self.item(key)
    }

    /// The value of a key that must be there.
    pub(super) fn needed(&self, key: &str) -> Option<Item<'s>> {
        let item = self.item(key);
        if item.is_none() && !self.excused.contains(&key) {
            let field = joined(&self.path, key);
            let example = self.vocabulary.example(key);
            let remedy = if example.starts_with('[') && self.path.is_empty() {
                format!("add a table `{example}`")
            } else if example.starts_with('[') {
                format!("add a table `[{field}]`")
            } else {
                format!("add a line such as `{example}`")
            };
            let problem = format!("is missing from {}", self.vocabulary.table);
            self.ledger.add(&self.header, &field, None, problem, remedy);
        }
        item
    }
}

/// A value and where it stands.
pub(super) struct Item<'s> {
    ledger: &'s Ledger<'s>,
    value: &'s DeValue<'s>,
    span: Range<usize>,
    path: String,
    /// A line that gives the key rightly.
    example: &'static str,
}

impl<'s> Item<'s> {
    /// A complaint about this value.
    pub(super) fn complain(&self, problem: impl Into<String>, remedy: impl Into<String>) {
        // A table's span is its header, which says nothing that its path does not.
        let value = match self.value {
            DeValue::Table(_) => None,
            _ => Some(self.ledger.written(&self.span)),
        };
        self.ledger.add(&self.span, &self.path, value, problem, remedy);
    }

    pub(super) fn line(&self) -> usize {
        self.ledger.line_of(&self.span)
    }

    fn wrong_type(&self, wanted: &str) {
        let is = match self.value {
            DeValue::String(_) => "a piece of text",
            DeValue::Integer(_) | DeValue::Float(_) => "a number",
            DeValue::Boolean(_) => "true or false",
            DeValue::Datetime(_) => "a date or time",
            DeValue::Array(_) => "a list",
            DeValue::Table(_) => "a table",
        };
        let remedy = if self.example.is_empty() {
            format!("give {wanted}")
        } else {
            format!("write it as in `{}`", self.example)
        };
        self.complain(format!("must be {wanted}, not {is}"), remedy);
    }

    /// A finite number, written as integer or float.
    fn number(&self) -> Option<f64> {
        let number = match self.value {
            DeValue::Integer(written) => i128::from_str_radix(written.as_str(), written.radix())
                .map(|whole| whole as f64)
                .unwrap_or(f64::INFINITY),
            DeValue::Float(written) => written.as_str().parse().unwrap_or(f64::NAN),
            _ => {
                self.wrong_type("a number");
                return None;
            }
        };
        if !number.is_finite() {
            let remedy = format!("write it as in `{}`", self.example);
            self.complain("must be a finite number", remedy);
            return None;
        }
        Some(number)
    }

    /// A number within bounds.
    pub(super) fn within(&self, bounds: &Bounds) -> Option<f64> {
        let number = self.number()?;
        if !bounds.hold(number) {
            let (because, example) = (bounds.because, self.example);
            let problem = format!("must be {bounds}");
            self.complain(problem, format!("{because}; for example `{example}`"));
            return None;
        }
        Some(number)
    }

    /// A whole number within bounds; the bounds must lie within those of `u32`.
    pub(super) fn whole_within(&self, bounds: &Bounds) -> Option<u32> {
        let number = self.within(bounds)?;
        if number.fract() != 0.0 {
            let remedy = format!("write it as in `{}`", self.example);
            self.complain("must be a whole number", remedy);
            return None;
        }
        // In range by the check above; `as` saturates were it not.
        Some(number as u32)
    }

    /// Any text.
    pub(super) fn text(&self) -> Option<&'s str> {
        if let DeValue::String(text) = self.value {
            return Some(text);
        }
        self.wrong_type("text in quotation marks");
        None
    }

    /// Text that can stand as a name: something in it, one line, not too long.
    pub(super) fn name(&self) -> Option<&'s str> {
        let text = self.text()?;
        match fault_of_name(text) {
            None => Some(text),
            Some(fault) => {
                self.complain(fault, format!("write it as in `{}`", self.example));
                None
            }
        }
    }

    /// One of a few words, with what each stands for.
    pub(super) fn word<T: Copy>(&self, words: &[(&str, T)]) -> Option<T> {
        let written = self.text()?;
        let found = words.iter().find(|(word, _)| *word == written);
        if let Some((_, meaning)) = found {
            return Some(*meaning);
        }
        let quoted: Vec<_> = words.iter().map(|(word, _)| format!("{word:?}")).collect();
        let problem = format!("must be {}", quoted.join(" or "));
        let remedy = match nearest(written, words.iter().map(|(word, _)| *word)) {
            Some(near) => format!("did you mean {near:?}?"),
            None => format!("write it as in `{}`", self.example),
        };
        self.complain(problem, remedy);
        None
    }

    /// The values of a list.
    pub(super) fn list(&self) -> Option<Vec<Item<'s>>> {
        let DeValue::Array(array) = self.value else {
            self.wrong_type("a list");
            return None;
        };
        let item = |value: &'s toml::Spanned<DeValue<'s>>| Item {
            ledger: self.ledger,
            value: value.get_ref(),
            span: value.span(),
            path: self.path.clone(),
            example: self.example,
        };
        Some(array.iter().map(item).collect())
    }

    /// The values of a list, counted from 1 in their paths.
    pub(super) fn numbered_list(&self) -> Option<Vec<Item<'s>>> {
        let mut items = self.list()?;
        for (number, item) in (1..).zip(&mut items) {
            item.path = format!("{}[{number}]", self.path);
        }
        Some(items)
    }

    /// A list of two numbers, each within bounds of its own.
    pub(super) fn pair(&self, bounds: [&Bounds; 2]) -> Option<[f64; 2]> {
        let list = self.list()?;
        let [first, second] = &list[..] else {
            let remedy = format!("write it as in `{}`", self.example);
            self.complain(format!("must be 2 numbers, not {}", list.len()), remedy);
            return None;
        };
        let (first, second) = (first.within(bounds[0]), second.within(bounds[1]));
        Some([first?, second?])
    }

    /// A list of exactly `N` numbers, each within bounds.
    pub(super) fn numbers<const N: usize>(&self, bounds: &Bounds) -> Option<[f64; N]> {
        let list = self.list()?;
        if list.len() != N {
            let remedy = format!("write it as in `{}`", self.example);
            self.complain(format!("must be {N} numbers, not {}", list.len()), remedy);
            return None;
        }
        // All of them are read before any `?`, so that each wrong one is named.
        let read: Vec<_> = list.iter().map(|item| item.within(bounds)).collect();
        let good: Vec<f64> = read.into_iter().flatten().collect();
        good.try_into().ok()
    }

    /// `[least, most]`, each within bounds and the first below the second.
    pub(super) fn range(&self, bounds: &Bounds) -> Option<[f64; 2]> {
        let [least, most] = self.numbers(bounds)?;
        if least < most {
            return Some([least, most]);
        }
        let remedy = if least > most {
            format!("the least comes first: [{most}, {least}]")
        } else {
            format!("give it some width, as in `{}`", self.example)
        };
        self.complain("the first number must be less than the second", remedy);
        None
    }

    /// A table with the keys of `vocabulary`.
    pub(super) fn table(&self, vocabulary: &'static Vocabulary) -> Option<Table<'s>> {
        let entries = self.entries()?;
        let (path, span) = (self.path.clone(), self.span.clone());
        Some(Table::open(self.ledger, entries, path, span, vocabulary))
    }

    /// The entries, where it is a table at all; no complaint where it is not.
    pub(super) fn peek(&self) -> Option<&'s DeTable<'s>> {
        match self.value {
            DeValue::Table(entries) => Some(entries),
            _ => None,
        }
    }

    /// The entries of a table, unchecked.
    pub(super) fn entries(&self) -> Option<&'s DeTable<'s>> {
        match self.value {
            DeValue::Table(entries) => Some(entries),
            DeValue::Array(array)
                if matches!(self.example.as_bytes(), [b'[', not, ..] if *not != b'[')
                    && array.iter().any(|value| value.get_ref().is_table()) =>
            {
                let remedy = format!("write `{}`, with single brackets", self.example);
                self.complain("must be one table, not a list of tables", remedy);
                None
            }
            _ => {
                self.wrong_type("a table");
                None
            }
        }
    }

    /// The entries of a table that names its own keys, in the order of the file.
    pub(super) fn named_items(&self) -> Option<Vec<(&'s str, Item<'s>)>> {
        let entries = self.entries()?;
        let mut items: Vec<_> = entries
            .iter()
            .map(|(key, value)| {
                let name: &str = key.get_ref();
                let (key_span, span) = (key.span(), value.span());
                let item = Item {
                    ledger: self.ledger,
                    value: value.get_ref(),
                    span: if span.is_empty() { key_span } else { span },
                    path: joined(&self.path, name),
                    example: self.example,
                };
                if let Some(fault) = fault_of_name(name) {
                    item.complain(format!("its name {fault}"), "give it a short plain name");
                }
                (name, item)
            })
            .collect();
        items.sort_by_key(|(_, item)| item.span.start);
        Some(items)
    }

    /// The tables of `[[...]]`, counted from 1 in their paths.
    pub(super) fn tables(&self, vocabulary: &'static Vocabulary) -> Option<Vec<Table<'s>>> {
        if matches!(self.value, DeValue::Table(_)) {
            let remedy = format!("write `{}`, with double brackets, for each", self.example);
            self.complain("must be a list of tables, not one table", remedy);
            return None;
        }
        let items = self.numbered_list()?;
        // Every one is opened, so that each wrong one is named.
        Some(items.iter().filter_map(|item| item.table(vocabulary)).collect())
    }
}

/// What is wrong with a name, as a clause, if anything is.
fn fault_of_name(name: &str) -> Option<String> {
    if name.trim().is_empty() {
        Some("must not be empty".to_owned())
    } else if name.chars().any(char::is_control) {
        Some("must be one line without control characters".to_owned())
    } else if name.chars().count() > NAME_LETTERS {
        Some(format!("must not be longer than {NAME_LETTERS} characters"))
    } else {
        None
    }
}
