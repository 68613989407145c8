//! `toehold survey --certify`: the same twice, in JSON and in the table, and what the sheet allows is judged by it.

use assert_cmd::Command;
use ik_host_tests::certify::Effort;
use ik_host_tests::sheet;
use ik_host_tests::survey::{Plan, Verdict, survey};

fn survey_of(arguments: &[&str]) -> String {
    let mut command = Command::cargo_bin("toehold").expect("the program");
    let output = command
        .args(["survey", "culvert-walker", "--targets", "2000", "--no-report"])
        .args(arguments)
        .output()
        .expect("it runs");
    assert!(output.status.success(), "{}", String::from_utf8_lossy(&output.stderr));
    String::from_utf8(output.stdout).expect("text")
}

#[test]
fn json_carries_the_certificate_and_is_the_same_twice() {
    let json = survey_of(&["--certify", "--json"]);
    assert_eq!(json, survey_of(&["--certify", "--json"]));
    let survey: serde_json::Value = serde_json::from_str(&json).expect("JSON");
    let numbers = survey["surveys"][0]["kinds"][0]["numbers"].as_array().expect("number systems");
    for number in numbers {
        let (name, certified) = (&number["number"], &number["certified"]);
        if name == "float64" {
            assert!(certified["nothing"]["why"].is_string(), "{certified}");
            continue;
        }
        let (found, bound) =
            (&number["arithmetic"]["largest"]["mm"], &certified["bound"]["arithmetic"]["mm"]);
        assert!(found.as_f64() < bound.as_f64() && bound.as_f64().is_some(), "{name}: {found} {bound}");
    }
    assert!(!survey_of(&["--json"]).contains("certified"));
}

#[test]
fn the_table_says_what_is_certified_and_what_is_not_covered() {
    let text = survey_of(&["--certify"]);
    for words in ["certified, mm: no target", "float64 is not certified", "not covered: link lengths"] {
        assert!(text.contains(words), "{words}: {text}");
    }
}

#[test]
fn the_sheet_is_judged_by_what_is_certified() {
    let mut robot = sheet::demo("culvert-walker").unwrap();
    let found = survey(&robot, Plan { targets: 2000, seed: 1 }, &indicatif::ProgressBar::hidden()).unwrap();
    let largest = found.kinds[0].numbers.iter().find(|number| number.firmware).unwrap().arithmetic.largest.mm;
    // None so bad was found, but it cannot be certified.
    robot.allowed.arithmetic_mm = 1.2 * largest;
    let mut survey =
        survey(&robot, Plan { targets: 2000, seed: 1 }, &indicatif::ProgressBar::hidden()).unwrap();
    assert_eq!(survey.verdict, Verdict::Within);
    survey.certify(Effort::default()).unwrap();
    assert_eq!(survey.verdict, Verdict::Beyond);
}

#[test]
fn a_work_volume_beyond_the_bounds_is_not_certified() {
    let mut robot = sheet::demo("culvert-walker").unwrap();
    robot.kinds[0].work.x_mm = [-60.0, 400.0];
    let certified = ik_host_tests::certify::certify(&robot, 0, &["fixed32"], Effort::default()).unwrap();
    assert!(format!("{certified:?}").contains("beyond 231.9 mm"), "{certified:?}");
}
