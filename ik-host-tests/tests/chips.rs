//! What `toehold chips` found goes into a survey's report, and what is not of its sheet does not. (That the figures
//! themselves are right is checked where they are made, in benches/on-target, with compiler targets and an emulator.)

use assert_cmd::Command;
use ik_host_tests::sheet;
use serde_json::{Value, json};
use std::fs;
use std::path::Path;

fn toehold(arguments: &[&str]) -> std::process::Output {
    Command::cargo_bin("toehold").unwrap().args(arguments).output().unwrap()
}

fn text(bytes: &[u8]) -> String {
    String::from_utf8(bytes.to_vec()).unwrap()
}

/// Figures of a demo robot, as `toehold chips` writes them.
fn figures(demo: &str) -> Value {
    let row = |class: &str, found: Value| {
        let mut row = json!({
            "chip": "m3", "class": class, "target": "thumbv7m-none-eabi", "machine": "mps2-an385", "number": "fixed32",
            "firmware": true, "cycles_from": "a table", "clock_hz": 72e6, "times": null
        });
        row.as_object_mut().unwrap().extend(found.as_object().unwrap().clone());
        row
    };
    let measured = json!({
        "state": "measured", "counted": 1000, "compared": 10000, "instructions": [201.0, 203.5, 1234.0],
        "cycles": [301.0, 302.0], "most_cycles": [1500.0, 1600.0], "flash": 4321, "stack": 160, "stack_bound": 208,
        "times": {"leg_us": [4.1, 4.2], "most_leg_us": [20.0, 21.0], "frame_percent": [0.4, 0.5]}
    });
    let missing = json!({"state": "not-measured", "why": "the emulator is <missing>"});
    json!({
        "toehold": env!("CARGO_PKG_VERSION"),
        "robot": sheet::demo(demo).unwrap(),
        "name": "some robot",
        "frame_hz": 50.0,
        "kinds": [{
            "kind": "strider", "leg": "left front", "legs": 4,
            "rows": [row("Cortex-M3", measured), row("RV32IMC", missing)]
        }],
        "left_out": [{"class": "AVR", "why": "no core"}]
    })
}

fn survey(report: &Path, more: &[&str]) -> std::process::Output {
    let report = report.to_str().unwrap();
    toehold(&[&["survey", "orchard-walker", "--targets", "1000", "--report", report], more].concat())
}

#[test]
fn figures_beside_the_report_become_a_section_of_it() {
    let folder = tempfile::tempdir().unwrap();
    let place = folder.path().join("orchard-walker.chips.json");
    fs::write(&place, figures("orchard-walker").to_string()).unwrap();
    let out = survey(folder.path(), &[]);
    assert_eq!(out.status.code(), Some(0), "{}", text(&out.stderr));
    let page = fs::read_to_string(folder.path().join("orchard-walker.html")).unwrap();
    for shown in [
        "What a leg costs on a chip",
        "<td>1234</td>",
        "<td>4321</td>",
        "<td>208</td>",
        "<td>301-302</td>",
        "RV32IMC, fixed32: the emulator is &lt;missing&gt;",
        "Not measured: AVR: no core",
        "NO SILICON WAS MEASURED",
    ] {
        assert!(page.contains(shown), "{shown}");
    }
    let json: Value =
        serde_json::from_slice(&fs::read(folder.path().join("orchard-walker.json")).unwrap()).unwrap();
    assert_eq!(json["chips"]["kinds"][0]["rows"][0]["stack"], 160);
}

#[test]
fn without_figures_there_is_no_section() {
    let folder = tempfile::tempdir().unwrap();
    let out = survey(folder.path(), &[]);
    assert_eq!(out.status.code(), Some(0), "{}", text(&out.stderr));
    let page = fs::read_to_string(folder.path().join("orchard-walker.html")).unwrap();
    assert!(!page.contains("What a leg costs on a chip"));
}

#[test]
fn figures_of_another_sheet_are_left_out_with_a_word_and_refused_if_they_are_named() {
    let folder = tempfile::tempdir().unwrap();
    let place = folder.path().join("orchard-walker.chips.json");
    fs::write(&place, figures("culvert-walker").to_string()).unwrap();
    let out = survey(folder.path(), &[]);
    assert_eq!(out.status.code(), Some(0), "{}", text(&out.stderr));
    assert!(text(&out.stderr).contains("of another sheet"), "{}", text(&out.stderr));
    let page = fs::read_to_string(folder.path().join("orchard-walker.html")).unwrap();
    assert!(!page.contains("What a leg costs on a chip"));

    let out = survey(folder.path(), &["--chips", place.to_str().unwrap()]);
    assert_eq!(out.status.code(), Some(2));
    assert!(text(&out.stderr).contains("of another sheet"), "{}", text(&out.stderr));

    fs::write(&place, "{}").unwrap();
    let out = survey(folder.path(), &["--chips", place.to_str().unwrap()]);
    assert_eq!(out.status.code(), Some(2));
    assert!(text(&out.stderr).contains("`toehold chips` makes such a file"), "{}", text(&out.stderr));
}

#[test]
fn wrong_calls_say_what_would_be_right() {
    for (arguments, says) in [
        (&["chips", "--source", "no-such-folder"][..], "is not Toehold's source tree"),
        (&["chips", "--chip", "z80"], "rv32imc"),
        (&["chips", "--number", "float64"], "fixed32"),
        (&["chips", "--clock", "fast"], "64MHz would be"),
        (&["chips", "--clock", "z80=4MHz"], "the classes are m0"),
        (&["chips", "no-such-sheet.toml"], "no-such-sheet.toml"),
    ] {
        let out = toehold(arguments);
        assert_eq!(out.status.code(), Some(2), "{arguments:?}: {}", text(&out.stderr));
        assert!(text(&out.stderr).contains(says), "{arguments:?}: {}", text(&out.stderr));
    }
}
