//! The program as its users meet it: what it prints, and how it ends.

use assert_cmd::Command;
use serde_json::Value;
use std::fs;
use std::path::PathBuf;

fn toehold(arguments: &[&str]) -> std::process::Output {
    Command::cargo_bin("toehold").unwrap().args(arguments).output().unwrap()
}

fn text(bytes: &[u8]) -> String {
    String::from_utf8(bytes.to_vec()).unwrap()
}

/// A demo sheet with one line changed, in a folder of its own.
fn changed(demo: &str, from: &str, to: &str) -> (tempfile::TempDir, PathBuf) {
    let sheet = text(&toehold(&["sheet", demo]).stdout);
    assert_eq!(sheet.matches(from).count(), 1, "{from:?} must stand once in the demo");
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("changed.toml");
    fs::write(&path, sheet.replace(from, to)).unwrap();
    (folder, path)
}

#[test]
fn a_survey_of_the_demo_robots_is_within_and_writes_its_reports() {
    let folder = tempfile::tempdir().unwrap();
    let report = folder.path().join("reports");
    let out = toehold(&["survey", "--targets", "20000", "--report", report.to_str().unwrap()]);
    assert_eq!(out.status.code(), Some(0), "{}", text(&out.stderr));
    let shown = text(&out.stdout);
    for word in ["culvert walker", "orchard walker", "yaw-hip", "roll-hip", "float32", "fixed32", "within"] {
        assert!(shown.contains(word), "{word} in\n{shown}");
    }
    let mut names: Vec<_> = fs::read_dir(&report)
        .unwrap()
        .map(|entry| entry.unwrap().file_name().into_string().unwrap())
        .collect();
    names.sort();
    assert_eq!(
        names,
        ["culvert-walker.html", "culvert-walker.json", "orchard-walker.html", "orchard-walker.json"]
    );
}

#[test]
fn a_demo_robot_is_known_by_its_name() {
    let out = toehold(&["solve", "orchard-walker", "--foot", "40,31.5,-160"]);
    assert_eq!(out.status.code(), Some(0), "{}", text(&out.stderr));
    assert!(text(&out.stdout).contains("orchard walker, leg"), "{}", text(&out.stdout));
    let out = toehold(&["solve", "orchad-walker", "--foot", "40,31.5,-160"]);
    assert_eq!(out.status.code(), Some(2));
    assert!(
        text(&out.stderr).contains("the demo robots are: culvert-walker, orchard-walker"),
        "{}",
        text(&out.stderr)
    );
}

#[test]
fn fixed_and_float_stay_below_a_hundredth_of_a_millimetre_on_both_demo_robots() {
    let out = toehold(&["survey", "--targets", "50000", "--no-report", "--json"]);
    let json: Value = serde_json::from_slice(&out.stdout).unwrap();
    let surveys = json["surveys"].as_array().unwrap();
    assert_eq!(surveys.len(), 2);
    for survey in surveys {
        for number in survey["kinds"][0]["numbers"].as_array().unwrap() {
            let largest = number["arithmetic"]["largest"]["mm"].as_f64().unwrap();
            let name = number["number"].as_str().unwrap();
            match name {
                "float32" | "fixed32" | "short32" => assert!(largest < 0.01, "{name}: {largest}"),
                // A step of its lengths is 1/64 mm.
                "fixed16" => assert!(largest < 0.05 && largest > 0.01, "{name}: {largest}"),
                // The yardsticks: the same solver in f64 is exact, the coarse functions are not.
                "float64" => assert!(largest < 1e-9, "{largest}"),
                "coarse" => assert!(largest > 0.01, "{largest}"),
                other => panic!("unknown number system {other}"),
            }
        }
    }
}

#[test]
fn the_same_seed_gives_the_same_survey_to_the_byte_and_another_does_not() {
    let run = |seed: &str| {
        let call = ["survey", "--targets", "30000", "--no-report", "--json", "--seed", seed];
        toehold(&call).stdout
    };
    assert_eq!(run("7"), run("7"));
    assert_ne!(run("7"), run("8"));
}

#[test]
fn a_sheet_that_allows_a_billionth_of_a_millimetre_fails_the_check() {
    let (_folder, path) = changed("orchard-walker", "arithmetic_mm = 0.01", "arithmetic_mm = 1e-9");
    let out = toehold(&["survey", path.to_str().unwrap(), "--targets", "5000", "--no-report"]);
    assert_eq!(out.status.code(), Some(1));
    assert!(text(&out.stdout).contains("no: arithmetic"), "{}", text(&out.stdout));
}

#[test]
fn a_sheet_with_five_faults_gets_five_complaints_in_one_run() {
    let sheet = concat!(env!("CARGO_MANIFEST_DIR"), "/tests/sheets/five-faults.toml");
    let out = toehold(&["survey", sheet]);
    assert_eq!(out.status.code(), Some(2));
    assert!(out.stdout.is_empty());
    let complaints = text(&out.stderr);
    let places = complaints.lines().filter(|line| line.starts_with("error: ")).count();
    assert_eq!(places, 5, "{complaints}");
}

#[test]
fn a_sheet_that_is_not_there_is_wrong_input() {
    let out = toehold(&["survey", "no-such-sheet.toml"]);
    assert_eq!(out.status.code(), Some(2));
    assert!(text(&out.stderr).contains("no-such-sheet.toml"));
}

#[test]
fn hard_feet_get_a_clear_answer_each() {
    for (foot, words) in [
        ("0,120,-60", "reached"),
        ("900,0,0", "held at its most"),
        ("nan,0,0", "not finite"),
        ("inf,0,0", "not finite"),
        ("0,0,-60", "culvert walker"),
    ] {
        let out = toehold(&["solve", "--foot", foot]);
        assert_eq!(out.status.code(), Some(0), "{foot}");
        assert!(text(&out.stdout).contains(words), "{foot}:\n{}", text(&out.stdout));
    }
}

#[test]
fn a_foot_on_the_hip_axis_is_solved_in_every_number_system_alike() {
    for (sheet, foot) in [("culvert-walker", "0,0,-100"), ("orchard-walker", "0,0,0")] {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("robot.toml");
        fs::write(&path, toehold(&["sheet", sheet]).stdout).unwrap();
        let out = toehold(&["solve", path.to_str().unwrap(), "--foot", foot, "--json"]);
        let json: Value = serde_json::from_slice(&out.stdout).unwrap();
        let wanted = json["reference"]["joints_deg"].as_array().unwrap().clone();
        for answer in json["answers"].as_array().unwrap() {
            let tolerance = match answer["number"].as_str().unwrap() {
                "coarse" => 3.0,
                "fixed16" => 0.02,
                _ => 1e-3,
            };
            for (joint, want) in answer["pose"]["joints_deg"].as_array().unwrap().iter().zip(&wanted) {
                let difference = (joint.as_f64().unwrap() - want.as_f64().unwrap()).abs();
                assert!(difference < tolerance, "{sheet}: {answer}");
            }
        }
    }
}

#[test]
fn a_foot_on_the_body_is_the_mirrored_foot_of_the_leg() {
    // Left and right front legs of the culvert walker sit at the same place on either side.
    let joints = |leg: &str, foot: &str| {
        let out = toehold(&["solve", "--leg", leg, "--foot", foot, "--on-body", "--json"]);
        let json: Value = serde_json::from_slice(&out.stdout).unwrap();
        json["answers"][2]["pose"]["joints_deg"].clone()
    };
    assert_eq!(joints("left front", "100,190,-60"), joints("right front", "100,-190,-60"));
}

#[test]
fn wrong_calls_say_what_would_be_right() {
    for (arguments, words) in [
        (&["solve", "--foot", "1,2"][..], "three are wanted"),
        (&["solve", "--foot", "1,two,3"], "y is \"two\""),
        (&["solve", "--leg", "tail", "--foot", "1,2,3"], "its legs are \"left front\""),
        (&["survey", "--targets", "3"], "1000"),
        (&["sheet", "no-such-demo"], "culvert-walker"),
        (&["walk"], "Usage"),
    ] {
        let out = toehold(arguments);
        assert_eq!(out.status.code(), Some(2), "{arguments:?}");
        assert!(text(&out.stderr).contains(words), "{arguments:?}:\n{}", text(&out.stderr));
    }
}

#[test]
fn help_and_version_are_no_errors() {
    for arguments in [&["--help"][..], &["--version"], &["survey", "--help"], &["solve", "--help"]] {
        let out = toehold(arguments);
        assert_eq!(out.status.code(), Some(0), "{arguments:?}");
        assert!(!out.stdout.is_empty());
    }
}

#[test]
fn a_folder_that_cannot_be_made_is_named() {
    let folder = tempfile::tempdir().unwrap();
    let file = folder.path().join("a-file");
    fs::write(&file, "not a folder").unwrap();
    let call = ["survey", "--targets", "1000", "--report", file.to_str().unwrap()];
    let out = toehold(&call);
    assert_eq!(out.status.code(), Some(2));
    assert!(text(&out.stderr).contains("a-file"), "{}", text(&out.stderr));
    assert_eq!(fs::read_to_string(&file).unwrap(), "not a folder");
}

#[test]
fn bounds_are_printed_and_hold() {
    let out = toehold(&["bounds", "--rounds", "50000"]);
    let text = String::from_utf8(out.stdout).unwrap();
    assert!(out.status.success(), "{text}");
    for part in ["turn between two vectors", "knee from straight, rad", "short32", "fixed16", "roll-hip"] {
        assert!(text.contains(part), "{part} is not in\n{text}");
    }
    assert!(!text.contains("EXCEEDED"), "{text}");
}
