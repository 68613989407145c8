//! Does the runner notice what it is there to notice? It starts itself with images that fail on
//! purpose and with a wrong expectation, and looks at exit code and message.

use std::{
    env, io,
    process::{Command, Output},
};

use crate::{
    arguments::{Arguments, name_of},
    chip::Chip,
    tools,
    trouble::Trouble,
};

struct Case {
    promise: &'static str,
    arguments: &'static [&'static str],
    exit_code: i32,
    /// What standard error must say.
    says: &'static str,
}

const CASES: [Case; 7] = [
    Case { promise: "a sound image passes", arguments: &[], exit_code: 0, says: "running it on" },
    Case {
        promise: "an image that panics is noticed",
        arguments: &["--go-wrong", "panics"],
        exit_code: 1,
        says: "the image panicked: panicked at leg-by-timer",
    },
    Case {
        promise: "an image that faults is noticed",
        arguments: &["--go-wrong", "faults"],
        exit_code: 1,
        says: "the chip took a hard fault: hard fault at pc ",
    },
    Case {
        promise: "an image that hangs is stopped",
        arguments: &["--go-wrong", "hangs", "--time-limit", "3"],
        exit_code: 1,
        says: "still running after 3 s",
    },
    Case {
        promise: "an image that stops early is noticed",
        arguments: &["--go-wrong", "stops-early"],
        exit_code: 1,
        says: "the log ends after ",
    },
    Case {
        promise: "one wrong bit is noticed, and its target named",
        arguments: &["--spoil", "17"],
        exit_code: 1,
        says: ", target 17 at ",
    },
    Case {
        promise: "a target that does not exist is a wrong call",
        arguments: &["--spoil", "4000000000"],
        exit_code: 2,
        says: "must be below",
    },
];

pub fn run(arguments: &Arguments) -> Result<(), Trouble> {
    let chips = if arguments.chips_were_named() { arguments.chips() } else { vec![Chip::M0] };
    let (mut failed, mut of) = (0, 0);
    let mut judge = |promise: &str, complaint: Option<String>| {
        of += 1;
        match complaint {
            None => println!("ok      {promise}"),
            Some(complaint) => {
                failed += 1;
                println!("FAILED  {promise}: {complaint}");
            }
        }
    };
    for &chip in &chips {
        for case in &CASES {
            let output = start_runner(arguments, chip, case)?;
            judge(&format!("{}: {}", chip.class(), case.promise), case.complaint(&output));
        }
    }
    judge("a compiler target that nobody has is a missing tool", complaint_about_tools()?);
    if failed == 0 { Ok(()) } else { Err(Trouble::SelfTestsFailed { failed, of }) }
}

fn start_runner(arguments: &Arguments, chip: Chip, case: &Case) -> Result<Output, Trouble> {
    let failed = |source: io::Error| Trouble::Io { what: "starting the runner".into(), source };
    Command::new(env::current_exe().map_err(failed)?)
        .args(["--way", &name_of(&arguments.way), "--chip", &name_of(&chip)])
        .args(case.arguments)
        .output()
        .map_err(failed)
}

impl Case {
    fn complaint(&self, output: &Output) -> Option<String> {
        complaint(output, self.exit_code, self.says)
    }
}

fn complaint(output: &Output, exit_code: i32, says: &str) -> Option<String> {
    let errors = String::from_utf8_lossy(&output.stderr);
    if output.status.code() != Some(exit_code) {
        Some(format!("wanted exit code {exit_code}, got {}; it said:\n{errors}", output.status))
    } else if !errors.contains(says) {
        Some(format!("wanted it to say {says:?}; it said:\n{errors}"))
    } else {
        None
    }
}

fn complaint_about_tools() -> Result<Option<String>, Trouble> {
    let output = Command::new("bash")
        .arg(tools::workspace().join("../.ci/tools.sh"))
        .args(["--way", "rustup", "--target", "no-such-chip", "--", "true"])
        .output()
        .map_err(|source| Trouble::Io { what: ".ci/tools.sh".into(), source })?;
    Ok(complaint(&output, 3, "rustup target add no-such-chip"))
}
