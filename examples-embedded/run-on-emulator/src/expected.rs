//! What a chip has to log, line for line, computed here by the same code.
//!
//! The lines follow the format strings in the image, `leg-by-timer/src/main.rs`.

use drill::{Answer, Event};

use crate::trouble::Trouble;

pub struct Line {
    pub text: String,
    /// What the line is about, for a message that names it.
    pub about: String,
    /// The answer that the line tells, if it is no heading.
    pub answer: Option<(u32, Answer)>,
}

pub fn lines() -> Vec<Line> {
    let mut lines = Vec::new();
    let mut heading = String::new();
    drill::go_through(&mut |event| {
        lines.push(match event {
            Event::Run { leg, numbers } => {
                heading = format!("{leg}, {numbers}");
                Line { text: heading.clone(), about: format!("the start of {heading}"), answer: None }
            }
            Event::Answered { number, target, answer } => Line {
                text: text_of(number, &answer),
                about: format!("{heading}, target {number} at {target}"),
                answer: Some((number, answer)),
            },
        });
    });
    lines
}

fn text_of(number: u32, answer: &Answer) -> String {
    let Answer { joints: [hip, thigh, knee], off_by, outcome, pulses_held, ticks } = answer;
    format!(
        "target {number}: joints {hip:08x} {thigh:08x} {knee:08x} {outcome:?} off by {off_by:08x} \
         ticks {ticks:?} pulses held {pulses_held:?}"
    )
}

/// Makes the expected answer to a target of the first run wrong by one bit of one joint.
pub fn spoil(lines: &mut [Line], target: u32) -> Result<(), Trouble> {
    for line in lines {
        if let Some((number, mut answer)) = line.answer
            && number == target
        {
            answer.joints[2] ^= 1;
            line.text = text_of(number, &answer);
            return Ok(());
        }
    }
    Err(Trouble::NoSuchTarget { target, targets: drill::TARGETS })
}
