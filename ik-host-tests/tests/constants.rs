//! Promise: what `toehold constants` writes is the sheet's robot, bit for bit, compiles, and is never written silently of a
//! sheet that fails its own allowance.

use assert_cmd::Command;
use ik_core::drive::Drive;
use ik_core::{Counts, Fixed16, Fixed32, Float32, Foot, Hip, Joints, Leg, Limb, Number, Short32, Side};
use ik_host_tests::machine::{in_every_number, legs_of, roll_leg, servo_bounds, yaw_leg};
use ik_host_tests::sheet::{self, Robot};
use ik_host_tests::solve::solve;
use ik_host_tests::survey::{Plan, Targets};
use std::fs;
use std::path::{Path, PathBuf};

#[rustfmt::skip]
#[path = "../../examples-embedded/from-a-sheet/src/culvert_walker.rs"]
mod culvert_walker;
#[rustfmt::skip]
#[path = "../../examples-embedded/from-a-sheet/src/orchard_walker.rs"]
mod orchard_walker;
#[rustfmt::skip]
#[path = "constants/scarecrow_fixed16.rs"]
mod scarecrow_fixed16;
#[rustfmt::skip]
#[path = "constants/scarecrow_float32.rs"]
mod scarecrow_float32;
#[rustfmt::skip]
#[path = "constants/scarecrow_short32.rs"]
mod scarecrow_short32;

const TESTS: &str = concat!(env!("CARGO_MANIFEST_DIR"), "/tests/constants");
const IMAGE: &str = concat!(env!("CARGO_MANIFEST_DIR"), "/../examples-embedded");

fn toehold(arguments: &[&str]) -> std::process::Output {
    Command::cargo_bin("toehold").unwrap().current_dir(TESTS).args(arguments).output().unwrap()
}

fn text(bytes: &[u8]) -> String {
    String::from_utf8(bytes.to_vec()).unwrap()
}

fn scarecrow() -> Robot {
    sheet::read(format!("{TESTS}/scarecrow.toml")).unwrap()
}

/// Whether the checked-in file is what the program writes today.
fn is_as_written(sheet: &str, number: &str, file: &Path) {
    let folder = tempfile::tempdir().unwrap();
    let anew = folder.path().join("anew.rs");
    let call = ["constants", sheet, "--rust", "--number", number, "--targets", "20000"];
    let out = toehold(&[&call[..], &["--out", anew.to_str().unwrap()]].concat());
    assert_eq!(out.status.code(), Some(0), "{}", text(&out.stderr));
    let printed = toehold(&call);
    assert_eq!(text(&printed.stdout), fs::read_to_string(&anew).unwrap(), "--out and standard output");
    assert!(
        fs::read(file).unwrap() == fs::read(&anew).unwrap(),
        "{} is not what the sheet gives; in {TESTS}: toehold {} --out {}",
        file.display(),
        call.join(" "),
        file.display()
    );
}

#[test]
fn the_demo_robots_constants_are_as_written() {
    let images = Path::new(IMAGE).join("from-a-sheet/src");
    is_as_written("culvert-walker", "fixed32", &images.join("culvert_walker.rs"));
    is_as_written("orchard-walker", "fixed32", &images.join("orchard_walker.rs"));
}

#[test]
fn the_test_robots_constants_are_as_written() {
    for number in ["fixed16", "float32", "short32"] {
        let file = PathBuf::from(format!("{TESTS}/scarecrow_{number}.rs"));
        is_as_written("scarecrow.toml", number, &file);
    }
}

/// The constants of a kind against the sheet through the code that the survey judges.
fn are_the_sheets<H: Hip, N: Number, D: Drive<N, Sent = Counts>, const LEGS: usize>(
    robot: &Robot,
    kind: usize,
    leg: Leg<H, N>,
    limbs: &[Limb<H, N, D>; LEGS],
    names: [&str; LEGS],
) {
    let machines = in_every_number(robot, kind).unwrap();
    let machine = machines.iter().find(|machine| machine.number() == N::NAME).unwrap();
    let mounts: Vec<_> = legs_of(robot, kind).map(|leg| &robot.legs[leg]).collect();
    assert_eq!(mounts.len(), LEGS);
    let targets = Targets::of(&robot.kinds[kind], Plan { targets: 3000, seed: 5 });
    let mut held = 0;
    for (among, ((limb, mount), name)) in limbs.iter().zip(mounts).zip(names).enumerate() {
        assert_eq!((limb.leg, name), (leg, mount.name.as_str()));
        let [x, y, z] = mount.at_mm;
        assert_eq!(limb.mounting.leg_frame(Foot::from_mm(x, y, z)).mm(), [0.0; 3]);
        assert_eq!(limb.mounting.side() == Side::Right, mount.side == sheet::Side::Right);
        for (_, target, _) in targets.chunk(0, 3000) {
            let [x, y, z] = target;
            let answer = limb.leg.solve(Foot::from_mm(x, y, z), Joints::ZERO);
            let sent = limb.commands(&answer.joints);
            let sheets = machine.answer(among, target).unwrap();
            assert_eq!(answer.outcome, sheets.outcome);
            assert_eq!(
                (sent.counts, sent.held.as_array()),
                (sheets.counts, sheets.pulses_held),
                "{name} {target:?}"
            );
            held += usize::from(answer.outcome != ik_core::Outcome::Reached);
        }
    }
    assert!(held > 0, "some targets are at the edges");
}

#[test]
fn the_constants_are_the_sheets_legs_bit_for_bit() {
    let (culvert, orchard) = (sheet::demo("culvert-walker").unwrap(), sheet::demo("orchard-walker").unwrap());
    {
        use culvert_walker::walker_legs as made;
        assert_eq!(made::LEG, yaw_leg::<Fixed32>(&culvert, 0).unwrap());
        are_the_sheets(&culvert, 0, made::LEG, &made::ALL, made::NAMES);
    }
    {
        use orchard_walker::strider_legs as made;
        assert_eq!(made::LEG, roll_leg::<Fixed32>(&orchard, 0).unwrap());
        are_the_sheets(&orchard, 0, made::LEG, &made::ALL, made::NAMES);
    }
}

/// Both kinds of the test sheet in a number system.
macro_rules! scarecrow_is_the_sheets {
    ($module:ident, $number:ty) => {{
        let robot = scarecrow();
        {
            use $module::left_right_legs as made;
            assert_eq!(made::LEG, roll_leg::<$number>(&robot, 0).unwrap());
            are_the_sheets(&robot, 0, made::LEG, &made::ALL, made::NAMES);
        }
        {
            use $module::arm_legs as made;
            assert_eq!(made::LEG, yaw_leg::<$number>(&robot, 1).unwrap());
            are_the_sheets(&robot, 1, made::LEG, &made::ALL, made::NAMES);
        }
    }};
}

#[test]
fn so_they_are_with_parallelograms_and_measured_servos_in_other_number_systems() {
    scarecrow_is_the_sheets!(scarecrow_fixed16, Fixed16);
    scarecrow_is_the_sheets!(scarecrow_float32, Float32);
    scarecrow_is_the_sheets!(scarecrow_short32, Short32);
}

#[test]
fn bounds_of_pulses_are_the_sheets() {
    let of_sheet = |robot: &Robot, kind: usize| -> Vec<_> {
        legs_of(robot, kind).flat_map(|leg| servo_bounds(robot, leg).unwrap()).map(Option::unwrap).collect()
    };
    let culvert = sheet::demo("culvert-walker").unwrap();
    assert_eq!(culvert_walker::walker_legs::BOUNDS.to_vec(), of_sheet(&culvert, 0));
    assert_eq!(scarecrow_fixed16::left_right_legs::BOUNDS.to_vec(), of_sheet(&scarecrow(), 0));
}

/// What the image logs, which the emulator compares with this file, is what `toehold solve` says.
#[test]
fn the_images_counts_are_those_of_solve() {
    let golden = fs::read_to_string(format!("{IMAGE}/run-on-emulator/golden/from-a-sheet.txt")).unwrap();
    let robots = ["culvert-walker", "orchard-walker"].map(|name| sheet::demo(name).unwrap());
    let numbers = |text: &str| -> Vec<f64> {
        let list = text.split(['(', ')', '[', ']']).nth(1).unwrap();
        list.split(", ").map(|number| number.parse().unwrap()).collect()
    };
    let mut compared = 0;
    for line in golden.lines() {
        let [robot, leg, foot, counts] = line.split(": ").collect::<Vec<_>>()[..] else { panic!("{line}") };
        let robot = robots.iter().find(|known| known.name == robot).unwrap();
        let leg = robot.legs.iter().position(|known| known.name == leg).unwrap();
        let [x, y, z] = numbers(foot)[..] else { panic!("{line}") };
        let on_body = [x / 1e3, y / 1e3, z / 1e3];
        let solved = solve(robot, leg, ik_host_tests::solve::leg_frame(robot, leg, on_body), true).unwrap();
        let answer = solved.answers.iter().find(|answer| answer.number == "fixed32").unwrap();
        assert_eq!(answer.pose.unwrap().counts.map(f64::from).to_vec(), numbers(counts), "{line}");
        compared += 1;
    }
    assert_eq!(compared, 8 * (6 + 4));
}

/// The orchard walker, which allows itself next to nothing, in a folder of its own.
fn too_strict() -> (tempfile::TempDir, String, String) {
    let folder = tempfile::tempdir().unwrap();
    let sheet = text(&toehold(&["sheet", "orchard-walker"]).stdout);
    let strict = sheet.replace("arithmetic_mm = 0.01", "arithmetic_mm = 1e-6");
    assert_ne!(sheet, strict);
    let path = |name: &str| folder.path().join(name).to_str().unwrap().to_owned();
    let (sheet, out) = (path("strict.toml"), path("out.rs"));
    fs::write(&sheet, strict).unwrap();
    (folder, sheet, out)
}

#[test]
fn a_sheet_that_fails_its_own_allowance_is_written_only_if_asked_for_and_says_so() {
    let (folder, sheet, file) = too_strict();
    let call = ["constants", &sheet, "--rust", "--targets", "2000", "--out", &file];
    fs::write(&file, "what was there").unwrap();
    let out = toehold(&call);
    assert_eq!(out.status.code(), Some(1));
    assert!(text(&out.stderr).contains("arithmetic"), "{}", text(&out.stderr));
    assert!(out.stdout.is_empty());
    assert_eq!(fs::read_to_string(&file).unwrap(), "what was there");
    assert!(toehold(&call[..5]).stdout.is_empty());

    let out = toehold(&[&call[..], &["--although-beyond"]].concat());
    assert_eq!(out.status.code(), Some(0), "{}", text(&out.stderr));
    assert!(text(&out.stderr).contains("although beyond"), "{}", text(&out.stderr));
    let written = fs::read_to_string(&file).unwrap();
    assert!(written.contains("BEYOND WHAT THE SHEET ALLOWS"), "{written}");
    assert!(written.contains("--although-beyond"), "{written}");
    // Nothing is left beside it.
    assert_eq!(fs::read_dir(folder.path()).unwrap().count(), 2);
}

#[test]
fn a_sheet_within_its_allowance_does_not_say_beyond() {
    let written = text(&toehold(&["constants", "--rust", "--targets", "2000", "--although-beyond"]).stdout);
    assert!(written.contains("culvert walker") && !written.contains("BEYOND"), "{written}");
}

#[test]
fn what_is_certified_is_told_and_judged() {
    let call = ["constants", "orchard-walker", "--rust", "--targets", "2000"];
    let found = text(&toehold(&call).stdout);
    let certified = text(&toehold(&[&call[..], &["--certify"]].concat()).stdout);
    assert!(
        !found.contains("ertified") && certified.contains("--seed 1 --certify\n"),
        "{found}\n{certified}"
    );
    // | kind | what | found | certified | allowed | verdict |
    let row = certified.lines().find(|line| line.contains("| arithmetic |")).unwrap();
    let mm = |cell: usize| -> f64 {
        row.split('|').nth(cell).unwrap().trim().strip_suffix(" mm").unwrap().parse().unwrap()
    };
    assert!(mm(3) < mm(4) && mm(4) < mm(5), "{row}");
    assert!(row.ends_with("| within |"), "{row}");
}

#[test]
fn wrong_calls_and_impossible_constants_say_what_is_wrong() {
    let folder = tempfile::tempdir().unwrap();
    let sheet = fs::read_to_string(format!("{TESTS}/scarecrow.toml")).unwrap();
    let far = folder.path().join("far.toml");
    fs::write(&far, sheet.replace("at_mm = [50, 30, 80]", "at_mm = [650, 30, 80]")).unwrap();
    let far = far.to_str().unwrap();
    for (arguments, words) in [
        (&["constants"][..], "--rust"),
        (&["constants", "--rust", "--number", "fixed64"], "fixed32"),
        (&["constants", "no-such.toml", "--rust"], "no-such.toml"),
        (&["constants", far, "--rust", "--targets", "1000", "--number", "fixed16"], "\"1st arm\": at_mm"),
        (&["constants", "--rust", "--targets", "1000", "--out", "no-such-folder/out.rs"], "no-such-folder"),
    ] {
        let out = toehold(arguments);
        assert_eq!(out.status.code(), Some(2), "{arguments:?}");
        assert!(text(&out.stderr).contains(words), "{arguments:?}:\n{}", text(&out.stderr));
    }
}
