//! The `toehold` program.

use std::process::ExitCode;

fn main() -> ExitCode {
    ik_host_tests::command::run()
}
