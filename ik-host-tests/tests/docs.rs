//! Promise: every `toehold` command that a chapter of ik-core shows works as it stands.

use assert_cmd::Command;
use std::path::Path;

/// The commands of the ```console blocks of a text: lines that begin with `$ `.
fn commands(text: &str) -> Vec<&str> {
    let mut in_console = false;
    text.lines()
        .filter_map(|line| {
            if line.starts_with("```") {
                in_console = line == "```console";
            }
            line.strip_prefix("$ ").filter(|_| in_console)
        })
        .collect()
}

#[test]
fn every_command_of_a_chapter_runs() {
    let chapters = Path::new(env!("CARGO_MANIFEST_DIR")).join("../ik-core/docs");
    // Commands may write reports where they are run.
    let elsewhere = tempfile::tempdir().expect("a folder for them");
    // What chapters are about: the demo's readings, and a sheet as `toehold sheet` prints it.
    let readings = Path::new(env!("CARGO_MANIFEST_DIR")).join("readings/culvert-femur.csv");
    std::fs::copy(readings, elsewhere.path().join("femur.csv")).expect("readings");
    let sheet = Path::new(env!("CARGO_MANIFEST_DIR")).join("robots/culvert-walker.toml");
    std::fs::copy(sheet, elsewhere.path().join("robot.toml")).expect("a sheet");
    let mut ran = 0;
    for chapter in chapters.read_dir().expect("ik-core has chapters") {
        let path = chapter.expect("a chapter").path();
        let text = std::fs::read_to_string(&path).expect("text");
        for command in commands(&text) {
            let mut words = command.split_whitespace();
            assert_eq!(words.next(), Some("toehold"), "{}: {command}", path.display());
            Command::cargo_bin("toehold")
                .expect("it is built")
                .current_dir(&elsewhere)
                .args(words)
                .assert()
                .success();
            ran += 1;
        }
    }
    assert!(ran >= 2, "{ran} commands were found");
}
