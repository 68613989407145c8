//! Compares what a chip logged with what was expected, and names the first line that differs.

use crate::expected::Line;

#[derive(Debug, thiserror::Error, PartialEq, Eq)]
pub enum Difference {
    #[error("{about}\n  the chip says: {chip}\n  the PC says:   {pc}")]
    Differs { about: String, chip: String, pc: String },
    #[error("the log ends after {logged} of {expected} lines, before {about}")]
    EndsEarly { logged: usize, expected: usize, about: String },
    #[error("the log goes on after all {expected} lines: {surplus}")]
    GoesOn { expected: usize, surplus: String },
}

pub fn compare(expected: &[Line], log: &[String]) -> Result<(), Difference> {
    if let Some((pc, chip)) = expected.iter().zip(log).find(|(pc, chip)| pc.text != **chip) {
        return Err(Difference::Differs { about: pc.about.clone(), chip: chip.clone(), pc: pc.text.clone() });
    }
    if let Some(next) = expected.get(log.len()) {
        return Err(Difference::EndsEarly {
            logged: log.len(),
            expected: expected.len(),
            about: next.about.clone(),
        });
    }
    match log.get(expected.len()) {
        Some(surplus) => Err(Difference::GoesOn { expected: expected.len(), surplus: surplus.clone() }),
        None => Ok(()),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn expected() -> Vec<Line> {
        ["run a", "target 0: 5", "digest 7"]
            .map(|text| Line { text: text.into(), about: format!("about {text}"), answer: None })
            .into()
    }

    fn log(lines: &[&str]) -> Vec<String> {
        lines.iter().map(|&line| line.to_owned()).collect()
    }

    #[test]
    fn the_same_lines_are_the_same() {
        assert_eq!(compare(&expected(), &log(&["run a", "target 0: 5", "digest 7"])), Ok(()));
    }

    #[test]
    fn the_first_line_that_differs_is_named_with_both_values() {
        let difference = compare(&expected(), &log(&["run a", "target 0: 6", "digest 8"]));
        assert_eq!(
            difference.unwrap_err().to_string(),
            "about target 0: 5\n  the chip says: target 0: 6\n  the PC says:   target 0: 5"
        );
    }

    #[test]
    fn a_log_that_ends_early_is_a_difference() {
        let difference = compare(&expected(), &log(&["run a", "target 0: 5"]));
        let text = difference.unwrap_err().to_string();
        assert_eq!(text, "the log ends after 2 of 3 lines, before about digest 7");
    }

    #[test]
    fn a_log_that_goes_on_is_a_difference() {
        let difference = compare(&expected(), &log(&["run a", "target 0: 5", "digest 7", "more"]));
        assert_eq!(difference.unwrap_err().to_string(), "the log goes on after all 3 lines: more");
    }

    #[test]
    fn an_empty_log_is_a_difference() {
        assert!(compare(&expected(), &[]).is_err());
    }
}
