//! Names of a sheet as names of constants.

use std::collections::HashSet;

/// Names that are in use.
#[derive(Debug, Default)]
pub(super) struct Names(HashSet<String>);

impl Names {
    /// Names of which some are taken.
    pub(super) fn without(taken: &[&str]) -> Self {
        Self(taken.iter().map(|name| (*name).to_owned()).collect())
    }

    /// A name of a sheet in capitals, each run of what is no ASCII letter or digit an underscore; with a number if another
    /// has come to the same, or to the same followed by `suffix`.
    pub(super) fn constant(&mut self, name: &str, suffix: &str) -> String {
        let mut capitals = String::new();
        for c in name.chars() {
            if c.is_ascii_alphanumeric() {
                capitals.push(c.to_ascii_uppercase());
            } else if !capitals.ends_with('_') && !capitals.is_empty() {
                capitals.push('_');
            }
        }
        let mut base = capitals.trim_end_matches('_').to_owned();
        if !base.starts_with(|c: char| c.is_ascii_alphabetic()) {
            base = format!("LEG_{base}").trim_end_matches('_').to_owned();
        }
        let numbered = (2..).map(|number| format!("{base}_{number}"));
        let free = std::iter::once(base.clone())
            .chain(numbered)
            .find(|name| !self.0.contains(name) && !self.0.contains(&format!("{name}{suffix}")))
            .unwrap_or(base);
        self.0.insert(free.clone());
        self.0.insert(format!("{free}{suffix}"));
        free
    }
}

/// Text for a comment: one line, whatever it is given.
pub(super) fn one_line(text: &str) -> String {
    text.chars()
        .flat_map(|c| {
            // Quotes and backslashes may stand; what is not printed may not.
            let written: Vec<char> =
                if matches!(c, '"' | '\'' | '\\') { vec![c] } else { c.escape_debug().collect() };
            written
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_become_constants_and_stay_apart() {
        let mut names = Names::without(&["ALL"]);
        let made = ["left front", "left-front", "3rd", "æ", "ö", "all", "a curves", "a", "a"]
            .map(|name| names.constant(name, "_CURVES"));
        assert_eq!(
            made,
            ["LEFT_FRONT", "LEFT_FRONT_2", "LEG_3RD", "LEG", "LEG_2", "ALL_2", "A_CURVES", "A_2", "A_3"]
        );
    }

    #[test]
    fn a_comment_cannot_end_early() {
        assert_eq!(one_line("a\nfn b\r\u{2028}\u{202e}\"é\\"), "a\\nfn b\\r\\u{2028}\\u{202e}\"é\\");
    }
}
