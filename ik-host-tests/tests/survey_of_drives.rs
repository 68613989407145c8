//! Promise: the survey knows servos that were measured and knees that are driven through a parallelogram.

use ik_core::{End, Outcome};
use ik_host_tests::machine;
use ik_host_tests::reference::{self, Pose};
use ik_host_tests::sheet::{self, DEMOS, Robot};
use ik_host_tests::survey::{Judge, NumberFindings, Plan, Verdict, survey};
use indicatif::ProgressBar;

const CULVERT: &str = DEMOS[0].text;
const PLAN: Plan = Plan { targets: 20_000, seed: 3 };

/// The first of each `from` replaced.
fn robot(changes: &[(&str, &str)]) -> Robot {
    let text = changes.iter().fold(CULVERT.to_owned(), |text, (from, to)| {
        assert!(text.contains(from), "the sheet does not hold {from:?}");
        text.replacen(from, to, 1)
    });
    sheet::parse("sheet.toml", &text).unwrap_or_else(|complaints| panic!("{complaints}"))
}

fn found(robot: &Robot) -> (Verdict, NumberFindings) {
    let survey = survey(robot, PLAN, &ProgressBar::hidden()).expect("a survey");
    let findings = survey.kinds[0].numbers.iter().find(|found| found.number == "fixed32").expect("fixed32");
    (survey.verdict, findings.clone())
}

/// The femur's servo: centre, joint at the centre, gain and direction in the sheet.
const FEMUR: &str =
    "joint_at_centre_deg = 25         # horn set so that the middle of the range is the middle of the servo
us_per_degree = 11.1
turns = \"against\"
";
const FEMUR_TABLE: &str = "[leg_kind.walker.servo.femur]\ncentre_us = 1500\n";

/// Points on the very line of the femur's servo.
fn measured() -> String {
    let points: Vec<_> = [600.0, 900.0, 1500.0, 2100.0, 2400.0]
        .map(|us| format!("[{us:.1}, {:.9}]", 25.0 - (us - 1500.0) / 11.1))
        .to_vec();
    format!("[leg_kind.walker.servo.femur]\nmeasured = [{}]\n", points.join(", "))
}

#[test]
fn points_on_a_straight_line_survey_like_the_line() {
    let straight = found(&robot(&[]));
    let pointed = found(&robot(&[(FEMUR_TABLE, &measured()), (FEMUR, "")]));
    assert_eq!(straight.0, Verdict::Within);
    assert_eq!(pointed.0, Verdict::Within);
    // A trimmed leg loses a few pulses at an end: nothing is measured there.
    let largest = |found: &NumberFindings| found.together.largest.mm;
    assert!((largest(&straight.1) - largest(&pointed.1)).abs() < 0.05, "{straight:?} {pointed:?}");
}

/// A bent servo, and a knee driven from the body: the legs still go where they are asked to within what the counts allow.
#[test]
fn a_bent_servo_and_a_parallelogram_are_within_what_the_counts_allow() {
    let bent = "[leg_kind.walker.servo.femur]\nmeasured = [[600, 104], [900, 78.5], [1500, 25], [2100, -31], [2400, -61]]\n";
    let changes = [
        (FEMUR_TABLE, bent),
        (FEMUR, ""),
        ("knee_bends = \"up\"", "knee_bends = \"up\"\nknee_drive = \"parallelogram\""),
        ("joint_at_centre_deg = 85", "joint_at_centre_deg = 60"),
    ];
    let (verdict, findings) = found(&robot(&changes));
    assert_eq!(verdict, Verdict::Within, "{findings:?}");
    // It must not pass for want of targets.
    assert!(findings.pulse.largest.mm > 0.5, "{findings:?}");
}

/// The judge puts the joints where a parallelogram puts them: by the counts of the very channels, thigh and knee come back.
#[test]
fn counts_of_a_parallelogram_come_back_as_thigh_and_knee() {
    let robot = robot(&[
        ("knee_bends = \"up\"", "knee_bends = \"up\"\nknee_drive = \"parallelogram\""),
        ("joint_at_centre_deg = 85", "joint_at_centre_deg = 60"),
    ]);
    let judge = Judge::of(&robot, 0).expect("a judge");
    for machine in machine::in_every_number(&robot, 0).expect("machines") {
        let mut looked_at = 0;
        for step in 0..200 {
            let at = f64::from(step) / 200.0;
            let foot = [120.0 * at - 60.0, 100.0 + 80.0 * at, -40.0 - 80.0 * (7.0 * at).fract()];
            let answered = machine.answer(step as usize, foot).expect("a foot");
            if answered.pulses_held.iter().all(Option::is_none) {
                looked_at += 1;
                let measured = judge.measure(step as usize, &answered);
                // Half a count in each of three joints, 0.22 degrees at up to 190 mm, and the knee off by two of them.
                let off = measured.pulse_mm.expect("no pulse is held");
                assert!(off < 2.5, "{}: {foot:?}: {off} mm", machine.number());
            }
        }
        assert!(looked_at > 100, "{}: {looked_at}", machine.number());
    }
}

/// A thigh that its servo cannot take is held by its range, not found out by a pulse that is held.
#[test]
fn the_thighs_range_is_what_its_servo_and_the_shanks_leave() {
    let robot = robot(&[
        ("knee_bends = \"up\"", "knee_bends = \"up\"\nknee_drive = \"parallelogram\""),
        // The shank's servo takes 60 degrees at 1500 us and 100 us more, less what the trims of the six legs take: 9 us.
        // With the knee at 40 degrees or more, the femur cannot go lower than that shank lets it.
        ("knee = [15, 155]", "knee = [40, 155]"),
        ("joint_at_centre_deg = 85", "joint_at_centre_deg = 60"),
        (
            "pulse_us = [600, 2400]\ndead_band_us = 4\nspeed_s_per_60_deg = 0.16\nstall_torque_n_mm = 1200\nslew_us_per_frame = 80\nstart_us = 2000\n\n[leg_kind.walker.work]",
            "pulse_us = [600, 1600]\n\n[leg_kind.walker.work]",
        ),
    ]);
    let thigh = machine::judged_ranges(&robot, 0).thigh;
    let least = 40.0 - (60.0 + (100.0 - 9.0) / 11.1);
    assert!(
        (thigh.min.to_degrees() - least).abs() < 1e-9 && (thigh.max.to_degrees() - 90.0).abs() < 1e-9,
        "{thigh:?}"
    );
    let judge = Judge::of(&robot, 0).expect("a judge");
    let [hip, femur, knee] = [0.0, -35.0, 50.0].map(f64::to_radians);
    let foot = reference::foot(judge.leg(), &Pose { hip, thigh: femur, knee });
    for machine in machine::in_every_number(&robot, 0).expect("machines") {
        let answered = machine.answer(0, foot).expect("a foot");
        assert!(
            matches!(answered.outcome, Outcome::Held(held) if held.thigh == Some(End::Least)),
            "{answered:?}"
        );
        assert!((answered.pose.thigh.to_degrees() - least).abs() < 0.01, "{answered:?}");
        // The judge says the same, and so finds no error in it.
        let bound = if machine.number() == "coarse" { 5.0 } else { 0.1 };
        assert!(judge.measure(0, &answered).arithmetic_mm < bound, "{answered:?}");
    }
}
