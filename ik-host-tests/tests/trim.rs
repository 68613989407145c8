//! Promise: `toehold trim` finds centre, gain, points, backlash and a misread row, names what is wrong with a file, and
//! changes nothing in a sheet but the servo that it was told.

use assert_cmd::Command;
use ik_host_tests::machine;
use ik_host_tests::reference::{self, Pose, leg::distance};
use ik_host_tests::sheet::{self, Robot, ServoCurve};
use ik_host_tests::trim::{Approach, Block, FitError, Reading, Wanted, edited_sheet, fit, read};
use std::fs;
use std::path::{Path, PathBuf};
use std::process::Output;

const AS_READ: Wanted = Wanted { centre_us: 1500.0, keep_all: false };

fn toehold(folder: &Path, arguments: &[&str]) -> Output {
    Command::cargo_bin("toehold")
        .expect("it is built")
        .current_dir(folder)
        .args(arguments)
        .output()
        .expect("it runs")
}

fn demo(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("readings").join(name)
}

fn reading(line: u64, pulse_us: f64, angle_deg: f64) -> Reading {
    Reading { line, pulse_us, angle_deg, uncertainty_deg: 0.2, approach: None, note: String::new() }
}

/// A femur's servo whose horn bends its curve, degrees; what a bench would show of it.
fn bent(us: f64) -> f64 {
    let away = (us - 1500.0) / 900.0;
    25.0 - 81.0 * away + 4.5 * away * away - 2.2 * away * away * away
}

#[test]
fn twelve_readings_of_which_one_is_misread() {
    let folder = tempfile::tempdir().unwrap();
    let file = demo("culvert-femur.csv");
    let out = toehold(
        folder.path(),
        &["trim", file.to_str().unwrap(), "--out", "servo.toml", "--drawing", "fit.svg"],
    );
    let text = String::from_utf8(out.stdout).unwrap();
    assert!(out.status.success(), "{text}");
    assert!(text.contains("line 11 looks misread: +10."), "{text}");
    assert!(text.contains("measured points are worth it"), "{text}");
    let lines = fs::read_to_string(folder.path().join("servo.toml")).unwrap();
    assert!(lines.starts_with("measured = [[700, 102], ") && !lines.contains("1715"), "{lines}");
    let drawing = fs::read_to_string(folder.path().join("fit.svg")).unwrap();
    assert!(
        drawing.contains("<title>12 readings") && drawing.contains("looks misread: line 11"),
        "{drawing}"
    );
    // What is there is not written over.
    let again = toehold(folder.path(), &["trim", file.to_str().unwrap(), "--out", "servo.toml"]);
    assert_eq!(again.status.code(), Some(2));
    assert!(String::from_utf8_lossy(&again.stderr).contains("it is there already"));
    assert_eq!(fs::read_to_string(folder.path().join("servo.toml")).unwrap(), lines);
    // Counted all the same, it is still named.
    let all = toehold(folder.path(), &["trim", file.to_str().unwrap(), "--keep-all"]);
    assert!(String::from_utf8_lossy(&all.stdout).contains("looks misread: kept"));
}

#[test]
fn a_bend_is_not_taken_for_misread_rows_and_scatter_not_for_a_bend() {
    let rows: Vec<_> = (0..12).map(|i| (700.0 + 145.0 * f64::from(i), i)).collect();
    // Scatter without chance: thirds of the uncertainty, in no order.
    let scatter = |i: i32| [0.05, -0.06, 0.02, 0.07, -0.03, -0.07, 0.04][i as usize * 3 % 7];
    let bending: Vec<_> =
        rows.iter().map(|(us, i)| reading(*i as u64, *us, bent(*us) + scatter(*i))).collect();
    let found = fit(&bending, AS_READ).unwrap();
    assert!(found.rows.iter().all(|row| !row.misread), "{found:?}");
    assert!(found.points_are_worth_it && found.bend_deg > 2.0, "{found:?}");
    let straight: Vec<_> =
        rows.iter().map(|(us, i)| reading(*i as u64, *us, (us - 1500.0) / 11.1 + scatter(*i))).collect();
    let found = fit(&straight, AS_READ).unwrap();
    assert!(found.rows.iter().all(|row| !row.misread) && !found.points_are_worth_it, "{found:?}");
    let [gain, error] = found.us_per_degree;
    assert!((gain - 11.1).abs() < 3.0 * error && error < 0.02 && found.turns_with, "{found:?}");
}

#[test]
fn play_is_told_from_a_misread_row() {
    let readings = read(&demo("orchard-hip.csv")).unwrap();
    let found = fit(&readings, AS_READ).unwrap();
    let backlash = found.backlash.unwrap();
    // The readings were made with 1.1 degrees.
    assert!(backlash.is_real && (backlash.gap_deg - 1.1).abs() < 3.0 * backlash.error_deg, "{backlash:?}");
    assert!(found.rows.iter().all(|row| !row.misread), "{found:?}");
    // The same servo the other way round has the same play.
    let turned: Vec<_> =
        readings.iter().map(|row| Reading { angle_deg: -row.angle_deg, ..row.clone() }).collect();
    let other = fit(&turned, AS_READ).unwrap().backlash.unwrap();
    assert!((other.gap_deg - backlash.gap_deg).abs() < 1e-9, "{other:?}");
    // Without both sides nothing is known of it.
    let from_one_side: Vec<_> =
        readings.iter().filter(|row| row.approach == Some(Approach::Up)).cloned().collect();
    assert_eq!(fit(&from_one_side, AS_READ).unwrap().backlash, None);
}

#[test]
fn a_point_of_one_side_alone_lies_in_the_middle_of_the_play() {
    let mut readings = read(&demo("orchard-hip.csv")).unwrap();
    let with_both = fit(&readings, AS_READ).unwrap();
    let place = readings
        .iter()
        .position(|row| row.pulse_us == 1500.0 && row.approach == Some(Approach::Down))
        .unwrap();
    readings[place].angle_deg += 11.5;
    let found = fit(&readings, AS_READ).unwrap();
    assert!(
        found.rows[place].left_out && found.rows.iter().filter(|row| row.misread).count() == 1,
        "{found:?}"
    );
    let at_1500 =
        |fit: &ik_host_tests::trim::Fit| fit.points.iter().find(|[us, _]| *us == 1500.0).unwrap()[1];
    assert!((at_1500(&found) - at_1500(&with_both)).abs() < 0.5, "{found:?}");
}

#[test]
fn what_goes_into_the_sheet_is_what_is_allowed_and_json_stays_json() {
    let folder = tempfile::tempdir().unwrap();
    let mut rows = String::from("pulse_us,angle_deg,uncertainty_deg\n");
    for i in 0..31 {
        let us = 600.0 + 60.0 * f64::from(i);
        let angle = 25.0 - 81.0 * (us - 1500.0) / 900.0 + 2.0 * (0.9 * f64::from(i)).sin();
        rows += &format!("{us},{angle:.2},0.2\n");
    }
    fs::write(folder.path().join("many.csv"), rows).unwrap();
    // Sixteen points of thirty-one leave the others off.
    let call = ["trim", "many.csv", "--as", "measured", "--json", "--allow", "0.05", "--out", "servo.toml"];
    let out = toehold(folder.path(), &call);
    assert_eq!(out.status.code(), Some(1), "{}", String::from_utf8_lossy(&out.stderr));
    let json: serde_json::Value = serde_json::from_slice(&out.stdout).unwrap();
    assert!(json["largest_off_deg"].as_f64().unwrap() > 0.05);
    assert!(!folder.path().join("servo.toml").exists());
    // What is refused leaves nothing behind.
    fs::write(folder.path().join("there.toml"), "").unwrap();
    let call = ["trim", "many.csv", "--drawing", "new.svg", "--out", "there.toml"];
    assert_eq!(toehold(folder.path(), &call).status.code(), Some(2));
    assert!(!folder.path().join("new.svg").exists());
}

#[test]
fn what_makes_no_servo_is_said() {
    let still: Vec<_> =
        (0..8).map(|i| reading(i, 1000.0 + 100.0 * i as f64, 20.0 + 0.1 * (i % 2) as f64)).collect();
    assert_eq!(fit(&still, AS_READ), Err(FitError::NoGain));
    let angles = [0.0, 10.0, 20.0, 18.0, 40.0, 50.0, 60.0];
    let back: Vec<_> =
        angles.iter().zip(0..).map(|(a, i)| reading(i, 1000.0 + 200.0 * i as f64, *a)).collect();
    assert_eq!(fit(&back, Wanted { keep_all: true, ..AS_READ }), Err(FitError::TurnsBack([1600.0, 18.0])));
    let folder = tempfile::tempdir().unwrap();
    fs::write(
        folder.path().join("still.csv"),
        "pulse_us,angle_deg\n1000,20\n1200,20.1\n1400,20\n1600,20.1\n",
    )
    .unwrap();
    let out = toehold(folder.path(), &["trim", "still.csv"]);
    assert_eq!(out.status.code(), Some(1));
    assert!(String::from_utf8_lossy(&out.stderr).contains("the angle does not change with the pulse"));
}

#[test]
fn every_wrong_row_is_named_with_its_line_field_and_value() {
    let folder = tempfile::tempdir().unwrap();
    let text = "# a comment\npulse_us,angle_deg,approach\n700,sixty,up\n50,10,up\n900,20,sideways\n1000,\n";
    fs::write(folder.path().join("wrong.csv"), text).unwrap();
    let out = toehold(folder.path(), &["trim", "wrong.csv"]);
    assert_eq!(out.status.code(), Some(2));
    let said = String::from_utf8(out.stderr).unwrap();
    for part in [
        "wrong.csv:3: angle_deg = sixty: must be a number from -360 to 360",
        "wrong.csv:4: pulse_us = 50: must be a number from 100 to 10000",
        "wrong.csv:5: approach = sideways: must be up",
        "wrong.csv:6: ",
    ] {
        assert!(said.contains(part), "{part} is not in\n{said}");
    }
    for (text, part) in [
        ("pulse,angle_deg\n1,2\n", "column \"pulse\" is not known"),
        ("pulse_us\n1500\n", "there is no column angle_deg"),
        ("pulse_us,pulse_us,angle_deg\n1500,1500,0\n", "column pulse_us is there twice"),
        ("pulse_us,angle_deg\n1500,0\n1600,9\n", "2 readings at 2 pulses"),
    ] {
        fs::write(folder.path().join("wrong.csv"), text).unwrap();
        let said = String::from_utf8(toehold(folder.path(), &["trim", "wrong.csv"]).stderr).unwrap();
        assert!(said.contains(part), "{part} is not in\n{said}");
    }
    assert_eq!(toehold(folder.path(), &["trim", "none.csv"]).status.code(), Some(2));
}

#[test]
fn a_sheet_is_changed_where_it_is_told_and_nowhere_else() {
    let folder = tempfile::tempdir().unwrap();
    let before = String::from_utf8(toehold(folder.path(), &["sheet", "culvert-walker"]).stdout).unwrap();
    fs::write(folder.path().join("robot.toml"), &before).unwrap();
    let file = demo("orchard-hip.csv");
    let call = ["trim", file.to_str().unwrap(), "--write", "robot.toml", "--leg-kind", "walker", "--joint"];
    let out = toehold(folder.path(), &[&call[..], &["hip"]].concat());
    assert!(out.status.success(), "{}", String::from_utf8_lossy(&out.stderr));
    let after = fs::read_to_string(folder.path().join("robot.toml")).unwrap();
    let changed: Vec<_> = before.lines().zip(after.lines()).filter(|(old, new)| old != new).collect();
    assert_eq!(before.lines().count(), after.lines().count());
    let keys: Vec<_> = changed.iter().map(|(old, _)| old.split(' ').next().unwrap()).collect();
    assert_eq!(keys, ["joint_at_centre_deg", "us_per_degree"], "{changed:?}");
    for (old, new) in changed {
        assert_eq!(
            old.split_once('#').map(|(_, comment)| comment),
            new.split_once('#').map(|(_, comment)| comment)
        );
    }
    // A place that is not there, and a servo that would not be right, leave it as it is.
    let out = toehold(folder.path(), &[&call[..], &["elbow"]].concat());
    assert_eq!(out.status.code(), Some(2));
    let said = String::from_utf8(out.stderr).unwrap();
    assert!(said.contains("there is no leg_kind.walker.servo.elbow; there are hip, femur, knee"), "{said}");
    let beyond = Block::Measured(vec![[300.0, -60.0], [2300.0, 60.0]]);
    let said = edited_sheet("robot.toml", &after, ["walker", "hip"], &beyond).unwrap_err();
    assert!(said.contains("nothing was written") && said.contains("pulse"), "{said}");
    assert_eq!(fs::read_to_string(folder.path().join("robot.toml")).unwrap(), after);
}

/// A demo robot whose femur has this servo.
fn with_femur(block: &Block) -> Robot {
    let demo = sheet::DEMOS.iter().find(|demo| demo.name == "culvert-walker").unwrap();
    let text = edited_sheet(demo.file_name, demo.text, ["walker", "femur"], block).unwrap();
    sheet::parse(demo.file_name, &text).unwrap()
}

#[test]
fn the_foot_of_a_bent_servo_is_nearer_with_its_points_than_with_centre_and_gain() {
    // The servo turns the other way than the demo's in angle; its curve is what counts.
    let readings: Vec<_> = (0..12)
        .map(|i| 620.0 + 160.0 * f64::from(i))
        .map(|us| reading(0, us, (4.0 * bent(us)).round() / 4.0))
        .collect();
    let found = fit(&readings, AS_READ).unwrap();
    let largest = |block: &Block| {
        let robot = with_femur(block);
        let measured = matches!(robot.kinds[0].servos[1].curve, ServoCurve::Measured { .. });
        assert_eq!(measured, matches!(block, Block::Measured(_)));
        let leg = machine::judged_leg(&robot.kinds[0]);
        let machines = machine::in_every_number(&robot, 0).unwrap();
        let float32 = machines.iter().find(|machine| machine.number() == "float32").unwrap();
        let (mut worst, mut seen) = (0.0f64, 0);
        for step in 0..900 {
            let (a, b) = (f64::from(step % 30) / 29.0, f64::from(step / 30) / 29.0);
            let pose = Pose {
                hip: 0.2,
                thigh: (-20.0 + 75.0 * a).to_radians(),
                knee: (40.0 + 70.0 * b).to_radians(),
            };
            let asked = reference::foot(&leg, &pose);
            let answer = float32.answer(0, asked).unwrap();
            // The real femur stands where its real curve puts it; a trim of its leg is taken off again.
            let us = answer.pulses_us[1] - robot.legs[machine::legs_of(&robot, 0).next().unwrap()].trim_us[1];
            if answer.pulses_held != [None; 3] || answer.outcome != ik_core::Outcome::Reached {
                continue;
            }
            let real = Pose { thigh: bent(us).to_radians(), ..answer.pose };
            worst = worst.max(distance(reference::foot(&leg, &real), asked));
            seen += 1;
        }
        assert!(seen > 300, "{seen}");
        worst
    };
    let (straight, points) = (largest(&Block::straight(&found)), largest(&Block::measured(&found)));
    println!("largest foot error: {straight:.2} mm with centre and gain, {points:.2} mm with points");
    assert!(points < 0.5 * straight, "{points} mm with points, {straight} mm without");
}
