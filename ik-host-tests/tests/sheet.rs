//! The promise of the sheet reader: a right sheet is read whole, a wrong one gets every complaint at
//! once, each with its line, its field, what is wrong and what would be right, and nothing panics.

use ik_host_tests::sheet::{
    self, Bend, Complaints, DEMOS, HipShape, KneeDrive, NumberSystem, Output, Robot, ServoCurve, SheetErrors,
    Side, Turns,
};

const CULVERT: &str = DEMOS[0].text;
const ORCHARD: &str = DEMOS[1].text;
const FIVE_FAULTS: &str = include_str!("sheets/five-faults.toml");
const NOT_TOML: &str = include_str!("sheets/not-toml.toml");

fn good(text: &str) -> Robot {
    sheet::parse("sheet.toml", text).unwrap_or_else(|complaints| panic!("{complaints}"))
}

fn wrong(text: &str) -> Complaints {
    match sheet::parse("sheet.toml", text) {
        Ok(robot) => panic!("read without complaint: {robot:?}"),
        Err(complaints) => complaints,
    }
}

/// The hip's centre and gain in the culvert walker's sheet.
const HIP_CURVE: &str = "\
centre_us = 1500                 # the pulse at which the servo stands in its middle
joint_at_centre_deg = 0          # the joint's angle then
us_per_degree = 11.1             # change of pulse for one degree: about 2000 us for 180 degrees
turns = \"with\"                   # a longer pulse makes the joint's angle larger; \"against\": smaller";

/// `text` with the first `from` in it replaced.
fn altered(text: &str, from: &str, to: &str) -> String {
    assert!(text.contains(from), "the sheet does not hold {from:?}");
    text.replacen(from, to, 1)
}

/// The line, from 1, on which `fragment` first stands.
fn line_of(text: &str, fragment: &str) -> usize {
    let before = text.find(fragment).unwrap_or_else(|| panic!("the sheet does not hold {fragment:?}"));
    1 + text[..before].matches('\n').count()
}

/// Where the first leg's header starts; comments speak of `[[leg]]` before it.
fn first_leg(text: &str) -> usize {
    1 + text.find("\n[[leg]]\n").unwrap()
}

#[test]
fn the_culvert_walker_is_read_as_it_is_written() {
    let robot = sheet::demo("culvert-walker").unwrap_or_else(|error| panic!("{error}"));
    assert_eq!(robot.name, "culvert walker");
    assert_eq!(robot.firmware.numbers, [NumberSystem::Fixed32]);
    assert_eq!(robot.firmware.frame_hz, 50.0);
    assert_eq!(
        robot.output,
        Output::Expander { oscillator_hz: 25_000_000, resolution_bits: 12, frame_hz: 50.0 }
    );
    let [kind] = &robot.kinds[..] else { panic!("{} kinds", robot.kinds.len()) };
    assert_eq!((kind.hip, kind.bend), (HipShape::Yaw, Bend::Up));
    assert_eq!(kind.joint_names(), ["hip", "femur", "knee"]);
    assert_eq!((kind.offset_mm, kind.thigh_mm, kind.shank_mm), (42.5, 71.0, 118.4));
    assert_eq!(kind.range_deg, [[-50.0, 50.0], [-40.0, 90.0], [15.0, 155.0]]);
    assert_eq!(kind.knee_drive, KneeDrive::Direct);
    let femur = &kind.servos[1];
    let curve = ServoCurve::Straight {
        centre_us: 1500.0,
        joint_at_centre_deg: 25.0,
        us_per_degree: 11.1,
        turns: Turns::Against,
    };
    assert_eq!(femur.curve, curve);
    assert_eq!(femur.pulse_us, [600.0, 2400.0]);
    assert_eq!(femur.dead_band_us, 4.0);
    assert_eq!(femur.speed_s_per_60_deg, Some(0.16));
    assert_eq!(femur.stall_torque_n_mm, Some(1200.0));
    assert_eq!(femur.slew_us_per_frame, Some(80.0));
    assert_eq!(femur.start_us, Some(1050.0));
    assert_eq!(kind.work.x_mm, [-60.0, 60.0]);
    assert_eq!(kind.work.y_mm, [90.0, 185.0]);
    assert_eq!(kind.work.z_mm, [-125.0, -30.0]);
    assert_eq!(robot.legs.len(), 6);
    assert_eq!(robot.legs[0].name, "left front");
    assert_eq!(robot.legs[0].at_mm, [95.0, 58.0, 0.0]);
    assert_eq!(robot.legs[0].trim_us, [0.0, 5.0, -12.0]);
    assert_eq!(robot.legs[4].trim_us, [0.0; 3]);
    assert_eq!(robot.legs[5].side, Side::Right);
    assert_eq!(robot.allowed.arithmetic_mm, 0.01);
    assert_eq!(robot.allowed.with_pulse_mm, 2.5);
    assert_eq!(robot.allowed.unreached_percent, 3.0);
}

#[test]
fn the_orchard_walker_is_read_as_it_is_written() {
    let robot = sheet::demo("orchard-walker").unwrap_or_else(|error| panic!("{error}"));
    assert_eq!(
        robot.output,
        Output::Timer { clock_hz: 48_000_000, counter_bits: 16, frame_hz: 50.0, prescaler: None }
    );
    // Left out of the sheet: as the output's.
    assert_eq!(robot.firmware.frame_hz, 50.0);
    let kind = &robot.kinds[0];
    assert_eq!((kind.hip, kind.bend), (HipShape::Roll, Bend::Forward));
    assert_eq!(kind.joint_names(), ["hip", "thigh", "knee"]);
    assert_eq!((kind.offset_mm, kind.thigh_mm, kind.shank_mm), (31.5, 94.0, 107.0));
    assert_eq!(robot.legs.len(), 4);
    assert_eq!(robot.legs[2].trim_us, [10.0, 2.5, -16.0]);
}

#[test]
fn the_demo_servos_can_go_wherever_their_joints_may() {
    for demo in DEMOS {
        let robot = good(demo.text);
        for leg in &robot.legs {
            let kind = &robot.kinds[leg.kind];
            for joint in 0..3 {
                let servo = &kind.servos[joint];
                let ServoCurve::Straight { centre_us, joint_at_centre_deg, us_per_degree, turns } =
                    servo.curve
                else {
                    panic!("the demo servos are straight");
                };
                for angle in kind.range_deg[joint] {
                    let swing = (angle - joint_at_centre_deg) * us_per_degree;
                    let pulse = leg.trim_us[joint]
                        + centre_us
                        + match turns {
                            Turns::With => swing,
                            Turns::Against => -swing,
                        };
                    let [least, most] = servo.pulse_us;
                    assert!(
                        (least..=most).contains(&pulse),
                        "{}, {}, joint {joint} at {angle}: {pulse} us",
                        robot.name,
                        leg.name
                    );
                }
            }
        }
    }
}

#[test]
fn a_measured_servo_and_a_parallelogram_are_read_as_they_are_written() {
    let text = altered(CULVERT, HIP_CURVE, "measured = [[700, 70], [1500.5, 0], [2300, -75]]");
    let robot =
        good(&altered(&text, "knee_bends = \"up\"", "knee_bends = \"up\"\nknee_drive = \"parallelogram\""));
    let kind = &robot.kinds[0];
    assert_eq!(kind.knee_drive, KneeDrive::Parallelogram);
    let hip = &kind.servos[0];
    let measured = vec![[700.0, 70.0], [1500.5, 0.0], [2300.0, -75.0]];
    assert_eq!(hip.curve, ServoCurve::Measured { measured });
    assert_eq!(hip.pulse_us, [600.0, 2400.0]);
    // Nothing beyond the points, nothing beyond what is safe.
    assert_eq!(
        (hip.middle_us(), hip.sent_us(0.0), hip.sent_us(150.0)),
        (1500.0, [700.0, 2300.0], [850.0, 2400.0])
    );
    let json = serde_json::to_value(&robot).unwrap();
    assert_eq!(json["kinds"][0]["servos"][0]["measured"][1][0], 1500.5);
    assert_eq!(json["kinds"][0]["knee_drive"], "parallelogram");
}

#[test]
fn a_parallelogram_must_leave_the_thigh_something() {
    let text = altered(CULVERT, "knee_bends = \"up\"", "knee_bends = \"up\"\nknee_drive = \"parallelogram\"");
    good(&text);
    // A shank of at most -89 degrees and a knee of at least 15 would need the femur above 104.
    let text = altered(&text, "knee = [15, 155]", "knee = [15, 20]");
    let text = altered(&text, "joint_at_centre_deg = 85", "joint_at_centre_deg = -170");
    let complaints = wrong(&text);
    let shown = complaints.to_string();
    assert!(shown.contains("leg_kind.walker: with a parallelogram, no angle of the femur suits"), "{shown}");
    assert!(shown.contains("`servo.femur`"), "{shown}");
}

#[test]
fn a_trim_must_leave_a_measured_servo_pulses_to_send() {
    let text = altered(CULVERT, HIP_CURVE, "measured = [[2000, 0], [2300, 30]]");
    let text = altered(&text, "hip = -7", "hip = 450");
    let complaints = wrong(&text);
    let shown = complaints.to_string();
    assert!(shown.contains("moves every measured pulse outside `pulse_us`"), "{shown}");
}

#[test]
fn what_may_be_left_out_takes_its_stated_value() {
    let robot = good(&altered(ORCHARD, "counter_bits = 16 ", "# "));
    assert!(matches!(robot.output, Output::Timer { counter_bits: 16, .. }));
    let robot = good(&altered(CULVERT, "unreached_percent = 3.0", ""));
    assert_eq!(robot.allowed.unreached_percent, 100.0);
    let robot = good(&altered(CULVERT, "dead_band_us = 4 ", "# "));
    assert_eq!(robot.kinds[0].servos[0].dead_band_us, 0.0);
    let robot = good(&altered(CULVERT, "speed_s_per_60_deg = 0.16 ", "# "));
    assert_eq!(robot.kinds[0].servos[0].speed_s_per_60_deg, None);
    let robot = good(&altered(CULVERT, "slew_us_per_frame = 80 ", "# "));
    assert_eq!(robot.kinds[0].servos[0].slew_us_per_frame, None);
    let robot = good(&altered(CULVERT, "start_us = 1500 ", "# "));
    assert_eq!(robot.kinds[0].servos[0].start_us, None);
    let robot = good(&altered(CULVERT, "about = ", "# "));
    assert_eq!(robot.about, None);
}

#[test]
fn numbers_may_be_written_in_any_way_toml_has() {
    for clock in ["48000000", "48e6", "+48_000_000.0", "0x2DC6C00"] {
        let robot = good(&altered(ORCHARD, "48_000_000", clock));
        assert!(matches!(robot.output, Output::Timer { clock_hz: 48_000_000, .. }), "{clock}");
    }
}

#[test]
fn kinds_and_legs_keep_the_order_of_the_sheet() {
    // A second kind whose name sorts before the first one's, and which stands after it.
    let start = ORCHARD.find("[leg_kind.strider]").unwrap();
    let end = first_leg(ORCHARD);
    let second = ORCHARD[start..end].replace("leg_kind.strider", "leg_kind.ambler");
    let text = format!("{}{second}{}", &ORCHARD[..end], &ORCHARD[end..]);
    let rear = text.find("\"right rear\"").unwrap();
    let text = format!("{}{}", &text[..rear], text[rear..].replacen("\"strider\"", "\"ambler\"", 1));
    let robot = good(&text);
    let names: Vec<_> = robot.kinds.iter().map(|kind| kind.name.as_str()).collect();
    assert_eq!(names, ["strider", "ambler"]);
    let kinds: Vec<_> = robot.legs.iter().map(|leg| leg.kind).collect();
    assert_eq!(kinds, [0, 0, 0, 1]);
}

#[test]
fn five_faults_of_five_sorts_are_five_complaints_in_one_go() {
    let complaints = wrong(FIVE_FAULTS).complaints;
    let found: Vec<_> = complaints.iter().map(|c| (c.line, c.field.as_str(), c.value.as_deref())).collect();
    // The sheet itself marks where its faults are.
    let lines: Vec<_> = (1..=5).map(|fault| line_of(FIVE_FAULTS, &format!("# fault {fault}"))).collect();
    assert_eq!(
        found,
        [
            (lines[0], "output.frame_hz", Some("\"50\"")),
            (lines[1], "leg_kind.bench.shnk_mm", None),
            (lines[2], "leg_kind.bench.range_deg.knee", Some("[140, 10]")),
            (lines[3], "leg_kind.bench.servo.hip.centre_us", None),
            (lines[4], "leg[1].side", Some("\"port\"")),
        ]
    );
}

#[test]
fn complaints_show_the_line_and_the_remedy() {
    let shown = sheet::parse("five-faults.toml", FIVE_FAULTS).unwrap_err().to_string();
    insta::assert_snapshot!(shown, @r#"
    error: output.frame_hz = "50": must be a number, not a piece of text
       ┌─ five-faults.toml:10:12
       │
    10 │ frame_hz = "50"                  # fault 1: text where a number belongs
       │            ^^^^
       │
       = write it as in `frame_hz = 50`

    error: leg_kind.bench.shnk_mm: is not a key of a roll-hip leg kind
       ┌─ five-faults.toml:16:1
       │
    16 │ shnk_mm = 100                    # fault 2: a key that does not exist
       │ ^^^^^^^
       │
       = did you mean `shank_mm`? its keys are hip, hip_offset_mm, thigh_mm, shank_mm, knee_bends, knee_drive, range_deg, servo, work

    error: leg_kind.bench.range_deg.knee = [140, 10]: the first number must be less than the second
       ┌─ five-faults.toml:22:8
       │
    22 │ knee = [140, 10]                 # fault 3: the wrong way round
       │        ^^^^^^^^^
       │
       = the least comes first: [10, 140]

    error: leg_kind.bench.servo.hip.centre_us: is missing from a servo
       ┌─ five-faults.toml:24:1
       │
    24 │ [leg_kind.bench.servo.hip]       # fault 4: centre_us is missing
       │ ^^^^^^^^^^^^^^^^^^^^^^^^^^
       │
       = add a line such as `centre_us = 1500`

    error: leg[1].side = "port": must be "left" or "right"
       ┌─ five-faults.toml:52:8
       │
    52 │ side = "port"                    # fault 5: not one of the words
       │        ^^^^^^
       │
       = write it as in `side = "left"`

    five-faults.toml: 5 things to put right
    "#);
}

#[test]
fn text_that_is_not_toml_gets_complaints_of_the_same_look() {
    let complaints = wrong(NOT_TOML);
    let lines: Vec<_> = complaints.complaints.iter().map(|c| c.line).collect();
    assert_eq!(lines, [2, 5, 6]);
    for complaint in &complaints.complaints {
        assert!(complaint.problem.starts_with("not TOML: "), "{complaint}");
        assert!(!complaint.remedy.is_empty());
    }
    assert!(complaints.render(false).contains("sheet.toml:5:1\n"));
}

#[test]
fn colour_adds_escapes_and_nothing_else() {
    let complaints = wrong(FIVE_FAULTS);
    let coloured = complaints.render(true);
    assert!(coloured.contains("\x1b["));
    let mut plain = String::new();
    let mut pieces = coloured.split("\x1b[");
    plain += pieces.next().unwrap();
    for piece in pieces {
        plain += piece.split_once('m').unwrap().1;
    }
    assert_eq!(plain, complaints.render(false));
}

#[test]
fn complaints_are_data_as_well() {
    let json = serde_json::to_value(SheetErrors::from(wrong(FIVE_FAULTS))).unwrap();
    assert_eq!(json["error"], "faulty");
    assert_eq!(json["file"], "sheet.toml");
    let first = &json["complaints"][0];
    assert_eq!(first["line"], 10);
    assert_eq!(first["column"], 12);
    assert_eq!(first["field"], "output.frame_hz");
    assert_eq!(first["value"], "\"50\"");
    assert_eq!(first["problem"], "must be a number, not a piece of text");
    assert_eq!(first["remedy"], "write it as in `frame_hz = 50`");
    assert!(first.get("span").is_none());
}

#[test]
fn a_robot_is_data_as_well() {
    let json = serde_json::to_value(good(CULVERT)).unwrap();
    assert_eq!(json["output"]["kind"], "expander");
    assert_eq!(json["firmware"]["numbers"][0], "fixed32");
    assert_eq!(json["kinds"][0]["hip"], "yaw");
    assert_eq!(json["kinds"][0]["servos"][1]["turns"], "against");
    assert_eq!(json["legs"][3]["side"], "right");
}

/// One fault and the one complaint that it must bring.
struct Fault {
    demo: &'static str,
    from: &'static str,
    to: &'static str,
    /// A fragment of the altered sheet; the complaint must be on its line.
    at: &'static str,
    field: &'static str,
    problem: &'static str,
    remedy: &'static str,
}

macro_rules! faults {
    ($($demo:ident: $from:expr => $to:literal, at $at:literal,
       $field:literal: $problem:literal, $remedy:literal;)*) => {
        &[$(Fault { demo: $demo, from: $from, to: $to, at: $at,
            field: $field, problem: $problem, remedy: $remedy }),*]
    };
}

#[rustfmt::skip]
const FAULTS: &[Fault] = faults![
    // Names and text.
    CULVERT: "name = \"culvert walker\"" => "name = \"\"", at "name = \"\"",
        "name": "must not be empty", "name = \"culvert walker\"";
    CULVERT: "name = \"culvert walker\"" => "name = \"a\\nb\"", at "name = \"a",
        "name": "control characters", "write it as in";
    CULVERT: "name = \"culvert walker\"" => "name = 5", at "name = 5",
        "name": "must be text in quotation marks, not a number", "write it as in";
    CULVERT: "name = \"left front\" " => "name = \"0123456789012345678901234567890123456789012345678901234567890123456789012345678901\" ",
        at "name = \"01234", "leg[1].name": "longer than 80", "write it as in";
    CULVERT: "about = " => "about = true #", at "about = true",
        "about": "not true or false", "write it as in";
    // Unknown, misspelt, misplaced and missing keys.
    CULVERT: "femur_mm = 71.0" => "femr_mm = 71.0", at "femr_mm",
        "leg_kind.walker.femr_mm": "is not a key of a yaw-hip leg kind", "did you mean `femur_mm`? its keys are hip, coxa_mm";
    CULVERT: "[allowed]" => "[allowed]\ncolour = 3", at "colour",
        "allowed.colour": "is not a key", "its keys are arithmetic_mm, with_pulse_mm, unreached_percent";
    CULVERT: "[allowed]" => "[allowd]", at "[allowd]",
        "allowd": "is not a key of a robot sheet", "did you mean `allowed`?";
    CULVERT: "coxa_mm = 42.5" => "hip_offset_mm = 42.5", at "hip_offset_mm",
        "leg_kind.walker.hip_offset_mm": "belongs to a roll-hip leg", "here it is called `coxa_mm`";
    ORCHARD: "shank_mm = 107.0" => "shank_mm = 107.0\ntibia_mm = 107.0", at "tibia_mm",
        "leg_kind.strider.tibia_mm": "belongs to a yaw-hip leg", "take it out";
    ORCHARD: "thigh = [-25, 85]" => "femur = [-25, 85]", at "femur = [",
        "leg_kind.strider.range_deg.femur": "belongs to a yaw-hip leg", "`thigh`";
    CULVERT: "[leg_kind.walker.servo.femur]" => "[leg_kind.walker.servo.thigh]", at "servo.thigh]",
        "leg_kind.walker.servo.thigh": "belongs to a roll-hip leg", "`femur`";
    ORCHARD: "thigh = -9" => "femur = -9", at "femur = -9",
        "leg[1].trim_us.femur": "belongs to a yaw-hip leg", "`thigh`";
    CULVERT: "oscillator_hz = 25_000_000" => "clock_hz = 25_000_000", at "clock_hz",
        "output.clock_hz": "belongs to a timer", "here it is called `oscillator_hz`";
    ORCHARD: "counter_bits = 16" => "resolution_bits = 12", at "resolution_bits",
        "output.resolution_bits": "belongs to an expander", "`counter_bits`";
    CULVERT: "resolution_bits = 12" => "resolution_bits = 12\nprescaler = 121", at "prescaler = 121",
        "output.prescaler": "an expander's follows from its oscillator", "take it out";
    CULVERT: "coxa_mm = 42.5" => "", at "[leg_kind.walker]",
        "leg_kind.walker.coxa_mm": "is missing from a yaw-hip leg kind", "`coxa_mm = 42.0`";
    CULVERT: "[leg_kind.walker.work]" => "[leg_kind.walker.wrk]", at "wrk]",
        "leg_kind.walker.wrk": "is not a key", "did you mean `work`?";
    CULVERT: "knee_bends = \"up\"" => "", at "[leg_kind.walker]",
        "leg_kind.walker.knee_bends": "is missing", "`knee_bends = \"up\"`";
    // Tables written as something else.
    CULVERT: "[firmware]" => "[[firmware]]", at "[[firmware]]",
        "firmware": "must be one table, not a list", "`[firmware]`, with single brackets";
    ORCHARD: "trim_us = { hip = 6, thigh = -9, knee = 4 }" => "trim_us = 6", at "trim_us = 6",
        "leg[1].trim_us": "must be a table, not a number", "trim_us = { hip = 8 }";
    // Firmware.
    CULVERT: "numbers = [\"fixed32\"]" => "numbers = []", at "numbers = []",
        "firmware.numbers": "at least one number system", "numbers = [\"fixed32\"]";
    CULVERT: "numbers = [\"fixed32\"]" => "numbers = \"fixed32\"", at "numbers = \"",
        "firmware.numbers": "must be a list", "numbers = [\"fixed32\"]";
    CULVERT: "numbers = [\"fixed32\"]" => "numbers = [\"fixed23\"]", at "fixed23",
        "firmware.numbers": "must be \"float32\" or \"coarse\" or \"fixed32\" or \"short32\" or \"fixed16\"", "did you mean \"fixed32\"?";
    CULVERT: "numbers = [\"fixed32\"]" => "numbers = [\"coarse\", \"coarse\"]", at "\"coarse\", ",
        "firmware.numbers": "named twice", "once";
    CULVERT: "frame_hz = 50" => "frame_hz = 5", at "frame_hz = 5\n",
        "firmware.frame_hz": "must be from 20 to 500 Hz", "servos take 20 to 500";
    // Output.
    ORCHARD: "kind = \"timer\"" => "kind = \"timr\"", at "timr",
        "output.kind": "must be \"timer\" or \"expander\"", "did you mean \"timer\"?";
    CULVERT: "kind = \"expander\"" => "kind = \"chip\"", at "\"chip\"",
        "output.kind": "must be \"timer\" or \"expander\"", "write it as in";
    ORCHARD: "48_000_000" => "999", at "clock_hz = 999",
        "output.clock_hz": "must be from 1000 to 1000000000 Hz", "in hertz";
    ORCHARD: "48_000_000" => "48e6.5", at "48e6.5",
        "": "not TOML", "";
    ORCHARD: "48_000_000" => "48000000.5", at "48000000.5",
        "output.clock_hz": "must be a whole number", "clock_hz = 48_000_000";
    ORCHARD: "48_000_000" => "99999999999999999999999999999999999999999999999999", at "clock_hz = 9999",
        "output.clock_hz": "must be a finite number", "clock_hz";
    ORCHARD: "counter_bits = 16" => "counter_bits = 33", at "counter_bits = 33",
        "output.counter_bits": "must be from 8 to 32 bits", "counter_bits = 16";
    ORCHARD: "# prescaler = 15 " => "prescaler = 14 ", at "prescaler = 14",
        "output.prescaler": "overflows a counter of 16 bits", "15 or more";
    ORCHARD: "# prescaler = 15 " => "prescaler = 0 ", at "prescaler = 0",
        "output.prescaler": "must be from 1 to 65536", "not the register's value";
    ORCHARD: "clock_hz = 48_000_000            # the clock that enters the timer's prescaler, 1 kHz to 1 GHz\ncounter_bits = 16"
        => "clock_hz = 1_000_000_000\ncounter_bits = 8", at "clock_hz = 1_000",
        "output.clock_hz": "too fast for a counter of 8 bits", "a wider counter";
    CULVERT: "resolution_bits = 12" => "resolution_bits = 17", at "resolution_bits = 17",
        "output.resolution_bits": "must be from 8 to 16 bits", "resolution_bits = 12";
    CULVERT: "25_000_000" => "25_000", at "25_000",
        "output.oscillator_hz": "no nearer to 50 Hz than 6.1 Hz", "in hertz";
    // Leg kinds.
    CULVERT: "hip = \"yaw\"" => "hip = \"yawn\"", at "yawn",
        "leg_kind.walker.hip": "must be \"yaw\" or \"roll\"", "did you mean \"yaw\"?";
    ORCHARD: "hip = \"roll\"" => "hip = 3", at "hip = 3",
        "leg_kind.strider.hip": "must be text in quotation marks", "write it as in";
    CULVERT: "femur_mm = 71.0" => "femur_mm = -71.0", at "-71.0",
        "leg_kind.walker.femur_mm": "must be from 1 to 1000 mm", "in millimetres";
    CULVERT: "femur_mm = 71.0" => "femur_mm = \"71\"", at "\"71\"",
        "leg_kind.walker.femur_mm": "must be a number, not a piece of text", "femur_mm = 71.0";
    CULVERT: "femur_mm = 71.0" => "femur_mm = inf", at "= inf",
        "leg_kind.walker.femur_mm": "must be a finite number", "femur_mm = 71.0";
    CULVERT: "femur_mm = 71.0" => "femur_mm = 1979-05-27", at "1979",
        "leg_kind.walker.femur_mm": "not a date or time", "femur_mm = 71.0";
    CULVERT: "femur_mm = 71.0" => "femur_mm = 14.0", at "femur_mm = 14.0",
        "leg_kind.walker.femur_mm": "more than 8 times as long", "same unit";
    CULVERT: "tibia_mm = 118.4" => "tibia_mm = 8.0", at "tibia_mm = 8.0",
        "leg_kind.walker.tibia_mm": "more than 8 times as long", "same unit";
    CULVERT: "coxa_mm = 42.5" => "coxa_mm = 143", at "coxa_mm = 143",
        "leg_kind.walker.coxa_mm": "1.5 times the mean of the links, 142.05", "millimetres";
    CULVERT: "coxa_mm = 42.5" => "coxa_mm = -1", at "coxa_mm = -1",
        "leg_kind.walker.coxa_mm": "must be from 0 to 1000 mm", "0 means that there is none";
    CULVERT: "knee_bends = \"up\"" => "knee_bends = \"forward\"", at "\"forward\"",
        "leg_kind.walker.knee_bends": "not how the knee of a yaw-hip leg bends", "\"up\" or \"down\"";
    ORCHARD: "knee_bends = \"forward\"" => "knee_bends = \"forwards\"", at "\"forwards\"",
        "leg_kind.strider.knee_bends": "must be \"forward\" or \"backward\"", "did you mean \"forward\"?";
    // Ranges.
    CULVERT: "hip = [-50, 50]" => "hip = [-50]", at "[-50]",
        "leg_kind.walker.range_deg.hip": "must be 2 numbers, not 1", "hip = [-50, 50]";
    CULVERT: "hip = [-50, 50]" => "hip = [50, -50]", at "[50, -50]",
        "leg_kind.walker.range_deg.hip": "must be less than the second", "[-50, 50]";
    CULVERT: "hip = [-50, 50]" => "hip = [10, 10]", at "[10, 10]",
        "leg_kind.walker.range_deg.hip": "must be less than the second", "some width";
    CULVERT: "hip = [-50, 50]" => "hip = [-190, 50]", at "-190",
        "leg_kind.walker.range_deg.hip": "from -180 to 180 degrees", "half a turn";
    CULVERT: "knee = [15, 155]" => "knee = [-15, 155]", at "[-15, 155]",
        "leg_kind.walker.range_deg.knee": "from 0 to 180 degrees", "`knee_bends` gives the side";
    // Servos.
    CULVERT: "centre_us = 1500" => "centre_us = 99", at "centre_us = 99",
        "leg_kind.walker.servo.hip.centre_us": "from 100 to 3000 us", "microseconds";
    CULVERT: "centre_us = 1500" => "centre_us = 2500", at "centre_us = 2500",
        "leg_kind.walker.servo.hip.centre_us": "must lie within the safe pulses", "from 600 to 2400";
    CULVERT: "joint_at_centre_deg = 0" => "joint_at_centre_deg = 270", at "= 270",
        "leg_kind.walker.servo.hip.joint_at_centre_deg": "from -180 to 180 degrees", "half a turn";
    CULVERT: "us_per_degree = 11.1" => "us_per_degree = 0", at "us_per_degree = 0",
        "leg_kind.walker.servo.hip.us_per_degree": "from 0.1 to 90 us per degree", "`turns` gives the sense";
    CULVERT: "knee_bends = \"up\"" => "knee_bends = \"up\"\nknee_drive = \"paralelogram\"", at "paralelogram",
        "leg_kind.walker.knee_drive": "must be \"direct\" or \"parallelogram\"", "did you mean \"parallelogram\"?";
    // Measured servos.
    CULVERT: HIP_CURVE => "measured = [[700, -70], [1500, 0], [2300, 75]]\nturns = \"with\"", at "turns = \"with\"\n",
        "leg_kind.walker.servo.hip.turns": "belongs to a servo without `measured`", "take it out";
    CULVERT: HIP_CURVE => "measured = [[700, -70]]", at "[[700, -70]]",
        "leg_kind.walker.servo.hip.measured": "from 2 to 16 points, not 1", "two give a straight line";
    CULVERT: HIP_CURVE => "measured = [[700, -70], [1500, 0, 0]]", at "[1500, 0, 0]",
        "leg_kind.walker.servo.hip.measured[2]": "must be 2 numbers, not 3", "[[600, -79.5], [1500, 0]";
    CULVERT: HIP_CURVE => "measured = [[700, -70], 1500]", at "1500]",
        "leg_kind.walker.servo.hip.measured[2]": "must be a list, not a number", "[[600, -79.5], [1500, 0]";
    CULVERT: HIP_CURVE => "measured = [[700, -70], [3200, 70]]", at "3200, 70",
        "leg_kind.walker.servo.hip.measured[2]": "from 100 to 3000 us", "microseconds";
    CULVERT: HIP_CURVE => "measured = [[500, -90], [1500, 0]]", at "[500, -90]",
        "leg_kind.walker.servo.hip.measured[1]": "within the safe pulses of `pulse_us`", "from 600 to 2400";
    CULVERT: HIP_CURVE => "measured = [[700, -70], [1500, 0], [1500, 5]]", at "[1500, 5]",
        "leg_kind.walker.servo.hip.measured[3]": "longer than the one before it, 1500 us", "sort the points";
    CULVERT: HIP_CURVE => "measured = [[700, -70], [1500, 0], [1600, -5], [2300, 70]]", at "[1600, -5]",
        "leg_kind.walker.servo.hip.measured[3]": "larger than the one before it, 0 degrees", "misread point";
    CULVERT: HIP_CURVE => "measured = [[700, 70], [1500, 0], [1600, 0], [2300, -70]]", at "[1600, 0]",
        "leg_kind.walker.servo.hip.measured[3]": "smaller than the one before it, 0 degrees", "misread point";
    CULVERT: HIP_CURVE => "measured = [[700, -70], [1500, -69], [2300, 70]]", at "[1500, -69]",
        "leg_kind.walker.servo.hip.measured[2]": "would take 800.000 us per degree", "misread?";
    CULVERT: "turns = \"with\"" => "turns = \"againts\"", at "againts",
        "leg_kind.walker.servo.hip.turns": "must be \"with\" or \"against\"", "did you mean \"against\"?";
    CULVERT: "pulse_us = [600, 2400]" => "pulse_us = [600, 3001]", at "3001",
        "leg_kind.walker.servo.hip.pulse_us": "from 100 to 3000 us", "microseconds";
    CULVERT: "pulse_us = [600, 2400]" => "pulse_us = [2400, 600]", at "[2400, 600]",
        "leg_kind.walker.servo.hip.pulse_us": "must be less than the second", "[600, 2400]";
    CULVERT: "dead_band_us = 4" => "dead_band_us = -4", at "= -4 ",
        "leg_kind.walker.servo.hip.dead_band_us": "from 0 to 100 us", "few microseconds";
    CULVERT: "speed_s_per_60_deg = 0.16" => "speed_s_per_60_deg = 0", at "60_deg = 0 ",
        "leg_kind.walker.servo.hip.speed_s_per_60_deg": "above 0 and at most 10 s", "60 degrees";
    CULVERT: "stall_torque_n_mm = 1200" => "stall_torque_n_mm = -1", at "n_mm = -1",
        "leg_kind.walker.servo.hip.stall_torque_n_mm": "above 0", "newton millimetres";
    CULVERT: "slew_us_per_frame = 80" => "slew_us_per_frame = 0", at "frame = 0 ",
        "leg_kind.walker.servo.hip.slew_us_per_frame": "above 0 and at most 3000 us", "83 us in 20 ms";
    CULVERT: "slew_us_per_frame = 80" => "slew_us_per_frame = 4.87", at "4.87",
        "leg_kind.walker.servo.hip.slew_us_per_frame": "less than a count of the output, 4.8800 us", "at least that";
    ORCHARD: "slew_us_per_frame = 90" => "slew_us_per_frame = 0.3", at "frame = 0.3 ",
        "leg_kind.strider.servo.hip.slew_us_per_frame": "less than a count of the output, 0.3125 us", "at least that";
    CULVERT: "slew_us_per_frame = 80" => "slew_us_per_frame = nan", at "frame = nan",
        "leg_kind.walker.servo.hip.slew_us_per_frame": "must be a finite number", "slew_us_per_frame = 80";
    CULVERT: "start_us = 1500" => "start_us = 599", at "start_us = 599",
        "leg_kind.walker.servo.hip.start_us": "within the safe pulses", "from 600 to 2400";
    CULVERT: "[leg_kind.walker.servo.hip]" => "[leg_kind.walker.servo.hop]", at "servo.hop]",
        "leg_kind.walker.servo.hop": "is not a key of the servos of a yaw-hip leg", "did you mean `hip`?";
    // Work volume.
    CULVERT: "x_mm = [-60, 60]" => "x_mm = [60, -60]", at "[60, -60]",
        "leg_kind.walker.work.x_mm": "must be less than the second", "[-60, 60]";
    CULVERT: "x_mm = [-60, 60]" => "x_mm = [-60, 6e9]", at "6e9",
        "leg_kind.walker.work.x_mm": "from -5000 to 5000 mm", "millimetres";
    // Legs.
    CULVERT: "name = \"left middle\"" => "name = \"left front\"", at "name = \"left front\"\n",
        "leg[2].name": "another leg has this name, on line ", "a name of its own";
    CULVERT: "kind = \"walker\" " => "kind = \"walkr\" ", at "walkr",
        "leg[1].kind": "no leg kind has this name", "did you mean \"walker\"? the kinds are \"walker\"";
    CULVERT: "side = \"left\" " => "side = \"lft\" ", at "\"lft\"",
        "leg[1].side": "must be \"left\" or \"right\"", "did you mean \"left\"?";
    CULVERT: "at_mm = [95.0, 58.0, 0.0]" => "at_mm = [95.0, 58.0]", at "58.0] ",
        "leg[1].at_mm": "must be 3 numbers, not 2", "at_mm = [90.0, 60.0, 0.0]";
    CULVERT: "at_mm = [95.0, 58.0, 0.0]" => "at_mm = [95.0, true, 0.0]", at "true",
        "leg[1].at_mm": "must be a number, not true or false", "at_mm = [";
    CULVERT: "trim_us = { hip = 0, femur = 5, knee = -12 }" => "trim_us = { hip = 501 }", at "501",
        "leg[1].trim_us.hip": "from -500 to 500 us", "wrong `centre_us`";
    ORCHARD: "trim_us = { hip = 6, thigh = -9, knee = 4 }"
        => "trim_us = { hip = -500.5, thigh = -9, knee = 4 }", at "-500.5",
        "leg[1].trim_us.hip": "from -500 to 500 us", "spline";
    ORCHARD: "pulse_us = [1000, 2000] " => "pulse_us = [1400, 1505] ", at "hip = 6,",
        "leg[1].trim_us.hip": "moves the centre to 1506 us", "from -100 to 5";
    // What is allowed.
    CULVERT: "arithmetic_mm = 0.01" => "arithmetic_mm = 0", at "arithmetic_mm = 0 ",
        "allowed.arithmetic_mm": "above 0 and at most 1000 mm", "no arithmetic is exact";
    CULVERT: "with_pulse_mm = 2.5" => "with_pulse_mm = -2.5", at "= -2.5",
        "allowed.with_pulse_mm": "above 0", "allowance";
    CULVERT: "unreached_percent = 3.0" => "unreached_percent = 101", at "= 101",
        "allowed.unreached_percent": "from 0 to 100 percent", "100 asks nothing";
];

#[test]
fn every_fault_brings_its_own_complaint() {
    for fault in FAULTS {
        let text = altered(fault.demo, fault.from, fault.to);
        let complaints = wrong(&text);
        let case = format!("{:?} => {:?} gave\n{complaints}", fault.from, fault.to);
        // A trim can leave more than one leg's centre outside; all else is one fault, one complaint.
        let first = &complaints.complaints[0];
        let alike = complaints
            .complaints
            .iter()
            .filter(|c| c.field.contains("trim_us") && first.field.contains("trim_us"))
            .count();
        assert_eq!(complaints.complaints.len(), alike.max(1), "{case}");
        assert_eq!(first.line, line_of(&text, fault.at), "{case}");
        assert_eq!(first.field, fault.field, "{case}");
        assert!(first.problem.contains(fault.problem), "{case}");
        assert!(first.remedy.contains(fault.remedy), "{case}");
        let place = format!("sheet.toml:{}:{}", first.line, first.column);
        assert!(complaints.to_string().contains(&place), "{case}");
    }
}

/// Faults that cannot be made by changing one fragment.
mod of_the_whole_sheet {
    use super::*;

    /// `text` up to its first leg.
    fn without_legs(text: &str) -> &str {
        &text[..first_leg(text)]
    }

    fn after_legs(text: &str) -> &str {
        &text[text.find("\n[allowed]\n").unwrap()..]
    }

    fn only_complaint(text: &str) -> (String, String, String) {
        let complaints = wrong(text);
        let [only] = &complaints.complaints[..] else { panic!("more than one:\n{complaints}") };
        (only.field.clone(), only.problem.clone(), only.remedy.clone())
    }

    #[test]
    fn an_empty_sheet_lacks_every_table() {
        for text in ["", "\n\n", "# nothing yet\n"] {
            let complaints = wrong(text).complaints;
            let fields: Vec<_> = complaints.iter().map(|c| c.field.as_str()).collect();
            assert_eq!(fields, ["name", "output", "firmware", "leg_kind", "leg", "allowed"]);
            assert!(complaints.iter().all(|c| c.line == 1));
        }
    }

    #[test]
    fn a_robot_has_1_to_16_legs() {
        let text = format!("{}{}", without_legs(CULVERT), after_legs(CULVERT));
        let (field, problem, remedy) = only_complaint(&text);
        assert_eq!(field, "leg");
        assert!(problem.contains("is missing"), "{problem}");
        assert!(remedy.contains("add a table `[[leg]]`"), "{remedy}");

        let legs = |count: usize| {
            let leg = |n| {
                format!("[[leg]]\nname = \"{n}\"\nkind = \"walker\"\nside = \"left\"\nat_mm = [0, 0, 0]\n")
            };
            let legs: String = (0..count).map(leg).collect();
            format!("{}{legs}{}", without_legs(CULVERT), after_legs(CULVERT))
        };
        assert_eq!(good(&legs(16)).legs.len(), 16);
        let (field, problem, _) = only_complaint(&legs(17));
        assert_eq!(field, "leg");
        assert_eq!(problem, "must be 1 to 16 legs, not 17");
    }

    #[test]
    fn a_repeated_name_says_where_it_was_first() {
        let text = altered(CULVERT, "name = \"right rear\"", "name = \"right front\"");
        let (field, problem, _) = only_complaint(&text);
        let first = line_of(CULVERT, "name = \"right front\"");
        assert_eq!(field, "leg[6].name");
        assert_eq!(problem, format!("another leg has this name, on line {first}"));
    }

    #[test]
    fn legs_take_double_brackets() {
        let text = format!("{}[leg]\nname = \"only\"\n{}", without_legs(CULVERT), after_legs(CULVERT));
        let (field, problem, remedy) = only_complaint(&text);
        assert_eq!(field, "leg");
        assert!(problem.contains("not one table"), "{problem}");
        assert!(remedy.contains("`[[leg]]`, with double brackets"), "{remedy}");
    }

    #[test]
    fn a_kind_that_no_leg_uses_is_a_complaint() {
        let start = CULVERT.find("[leg_kind.walker]").unwrap();
        let end = first_leg(CULVERT);
        let spare = CULVERT[start..end].replace("leg_kind.walker", "leg_kind.spare");
        let text = format!("{CULVERT}\n{spare}");
        let (field, problem, remedy) = only_complaint(&text);
        assert_eq!(field, "leg_kind.spare");
        assert_eq!(problem, "no leg uses this kind");
        assert!(remedy.contains("kind = \"spare\""), "{remedy}");
    }

    #[test]
    fn a_kind_needs_a_name_and_a_table() {
        let text =
            CULVERT.replace("[leg_kind.walker", "[leg_kind.\"\"").replace("kind = \"walker\"", "kind = \"\"");
        let (field, problem, _) = only_complaint(&text);
        assert_eq!(field, "leg_kind.\"\"");
        assert_eq!(problem, "its name must not be empty");

        let text = altered(CULVERT, "[leg_kind.walker]", "[leg_kind]\nrate = 3\n[leg_kind.walker]");
        let complaints = wrong(&text).complaints;
        assert_eq!(complaints[0].field, "leg_kind.rate");
        assert_eq!(complaints[0].problem, "must be a table, not a number");
        assert!(complaints[0].remedy.contains("`[leg_kind.walker]`"));
    }

    #[test]
    fn the_longest_pulse_must_fit_in_the_frame() {
        // 500 Hz leaves 2000 us; the thigh's and the knee's pulses go to 2200.
        let text = ORCHARD.replace("frame_hz = 50 ", "frame_hz = 500 ");
        let complaints = wrong(&text).complaints;
        let fields: Vec<_> = complaints.iter().map(|c| c.field.as_str()).collect();
        let of = |joint| format!("leg_kind.strider.servo.{joint}.pulse_us");
        assert_eq!(fields, [of("hip"), of("thigh"), of("knee")]);
        assert_eq!(complaints[1].problem, "a pulse of 2200 us does not fit in the output's frame of 2000 us");
        // An expander's frame is what its prescaler makes of it: 25 MHz / (13 * 4096) = 469.5 Hz for
        // 480 Hz, so that a pulse just longer than 1/480 s fits.
        let text = CULVERT
            .replace("frame_hz = 50 ", "frame_hz = 480 ")
            .replace("pulse_us = [600, 2400]", "pulse_us = [600, 2120]");
        good(&text);
    }
}

#[test]
fn what_a_complaint_advises_is_accepted() {
    // Takes each line out in turn; where it was needed, puts in the line that the complaint shows.
    let mut advised = 0;
    for demo in DEMOS {
        let lines: Vec<_> = demo.text.lines().collect();
        for (index, line) in lines.iter().enumerate() {
            let Some((key, _)) = line.split_once(" = ") else {
                continue;
            };
            if line.starts_with('#') {
                continue;
            }
            let with = |replacement: &str| {
                let mut lines = lines.clone();
                lines[index] = replacement;
                lines.join("\n")
            };
            let Err(complaints) = sheet::parse(demo.file_name, &with("")) else {
                continue; // optional
            };
            let missing: Vec<_> =
                complaints.complaints.iter().filter(|c| c.problem.contains("is missing")).collect();
            let [missing] = missing[..] else { panic!("without {line:?}:\n{complaints}") };
            let field_end = missing.field.rsplit('.').next();
            assert_eq!(field_end, Some(key), "without {line:?}:\n{complaints}");
            let (_, example) = missing.remedy.split_once('`').unwrap();
            let text = with(example.trim_end_matches('`'));
            if let Err(complaints) = sheet::parse(demo.file_name, &text) {
                // An example cannot know this sheet's own names, nor which end of another's range.
                for complaint in complaints.complaints {
                    assert!(
                        ["another leg has this name", "no leg kind has this name"]
                            .iter()
                            .any(|known| complaint.problem.starts_with(known)),
                        "with {example}: {complaint}"
                    );
                }
            }
            advised += 1;
        }
    }
    assert!(advised > 60, "only {advised} lines were tried");
}

mod files {
    use super::*;
    use std::io::Write as _;

    fn cause_of(path: &std::path::Path) -> String {
        match sheet::read(path) {
            Err(SheetErrors::Unreadable { path: named, cause }) => {
                assert_eq!(named, path.display().to_string());
                cause
            }
            other => panic!("{other:?}"),
        }
    }

    fn file_of(bytes: &[u8]) -> tempfile::NamedTempFile {
        let mut file = tempfile::NamedTempFile::new().unwrap();
        file.write_all(bytes).unwrap();
        file
    }

    #[test]
    fn a_good_file_is_read() {
        let file = file_of(CULVERT.as_bytes());
        assert_eq!(sheet::read(file.path()), Ok(good(CULVERT)));
    }

    #[test]
    fn line_ends_and_byte_order_marks_of_other_systems_are_taken() {
        let windows = format!("\u{feff}{}", CULVERT.replace('\n', "\r\n"));
        assert_eq!(good(&windows), good(CULVERT));
        let faulty = altered(&windows, "femur_mm = 71.0", "femur_mm = 0.0");
        let complaints = wrong(&faulty);
        assert_eq!(complaints.complaints[0].line, line_of(CULVERT, "femur_mm = 71.0"));
    }

    #[test]
    fn a_faulty_file_is_named_in_its_complaints() {
        let file = file_of(FIVE_FAULTS.as_bytes());
        let shown = sheet::read(file.path()).unwrap_err().render(false);
        let place = format!("{}:10:12\n", file.path().display());
        assert!(shown.contains(&place), "{shown}");
    }

    #[test]
    fn a_file_that_cannot_be_read_is_named_with_the_cause() {
        let folder = tempfile::tempdir().unwrap();
        let absent = folder.path().join("absent.toml");
        let cause = cause_of(&absent);
        let shown = sheet::read(&absent).unwrap_err().to_string();
        assert!(shown.contains("absent.toml") && shown.contains(&cause));
        assert!(!cause.is_empty());
        assert!(!cause_of(folder.path()).is_empty());
    }

    #[test]
    fn a_file_that_is_not_text_or_far_too_long_is_refused() {
        let cause = cause_of(file_of(b"name = \"a\"\nabout = \"\xff\"\n").path());
        assert!(cause.contains("not UTF-8 text (first seen on line 2)"), "{cause}");
        let long = vec![b'#'; sheet::LARGEST_SHEET_BYTES as usize + 1];
        assert!(cause_of(file_of(&long).path()).contains("longer than"));
    }

    #[test]
    fn an_unknown_demo_gets_the_nearest_and_the_list() {
        let shown = sheet::demo("culvert walkr").unwrap_err().to_string();
        assert!(shown.contains("Did you mean `culvert-walker`?"), "{shown}");
        assert!(shown.contains("culvert-walker, orchard-walker"), "{shown}");
    }
}

/// Whatever is done to a sheet, it parses or gets complaints that point into it.
mod mutations {
    use super::*;
    use proptest::prelude::*;
    use proptest::sample::Index;

    #[derive(Debug, Clone)]
    enum Mutation {
        DropLine(Index),
        RepeatLine(Index),
        SwapLines(Index, Index),
        ChangeValue(Index, String),
        Splice(Index, String),
        Cut(Index, Index),
    }

    fn value() -> impl Strategy<Value = String> {
        prop_oneof![
            any::<f64>().prop_map(|number| number.to_string()),
            any::<i64>().prop_map(|number| number.to_string()),
            "\"[a-z \u{e9}\\\\n]{0,12}\"",
            prop::sample::select(vec![
                "",
                "[]",
                "{}",
                "[[]]",
                "true",
                "nan",
                "-inf",
                "1e999",
                "0x7f",
                "-0.0",
                "[1, 2]",
                "[2, 1]",
                "[1, 2, 3]",
                "[[1, 2], 3]",
                "{ hip = 1 }",
                "{ a.b.c = [] }",
                "\"\"",
                "\"yaw\"",
                "\"roll\"",
                "\"timer\"",
                "\"expander\"",
                "\"\"\"\nx\n\"\"\"",
                "[\n1,\n2\n]",
                "1979-05-27T07:32:00Z",
                "340282366920938463463374607431768211456",
            ])
            .prop_map(str::to_owned),
        ]
    }

    fn mutation() -> impl Strategy<Value = Mutation> {
        let index = any::<Index>;
        prop_oneof![
            index().prop_map(Mutation::DropLine),
            index().prop_map(Mutation::RepeatLine),
            (index(), index()).prop_map(|(a, b)| Mutation::SwapLines(a, b)),
            (index(), value()).prop_map(|(at, to)| Mutation::ChangeValue(at, to)),
            (index(), "\\PC{0,8}|[\\[\\]{}\"'=.#\n\r\t\0]{1,6}")
                .prop_map(|(at, text)| Mutation::Splice(at, text)),
            (index(), index()).prop_map(|(at, to)| Mutation::Cut(at, to)),
        ]
    }

    /// A place between characters.
    fn place(text: &str, index: &Index) -> usize {
        let places: Vec<_> = text.char_indices().map(|(at, _)| at).collect();
        if places.is_empty() { 0 } else { *index.get(&places) }
    }

    fn mutated(text: &str, mutation: &Mutation) -> String {
        let mut lines: Vec<_> = text.lines().map(str::to_owned).collect();
        if lines.is_empty() {
            return text.to_owned();
        }
        match mutation {
            Mutation::DropLine(at) => {
                lines.remove(at.index(lines.len()));
            }
            Mutation::RepeatLine(at) => {
                let at = at.index(lines.len());
                lines.insert(at, lines[at].clone());
            }
            Mutation::SwapLines(a, b) => {
                let (a, b) = (a.index(lines.len()), b.index(lines.len()));
                lines.swap(a, b);
            }
            Mutation::ChangeValue(at, to) => {
                // Only lines that give a value, so that most mutations get past the parser.
                let giving: Vec<_> = (0..lines.len())
                    .filter(|n| lines[*n].contains(" = ") && !lines[*n].starts_with('#'))
                    .collect();
                if !giving.is_empty() {
                    let line = &mut lines[*at.get(&giving)];
                    let key = line.split(" = ").next().unwrap_or_default().to_owned();
                    *line = format!("{key} = {to}");
                }
            }
            Mutation::Splice(at, piece) => {
                let at = place(text, at);
                return format!("{}{piece}{}", &text[..at], &text[at..]);
            }
            Mutation::Cut(from, to) => {
                let (a, b) = (place(text, from), place(text, to));
                let (a, b) = (a.min(b), a.max(b).min(a.min(b) + 200));
                let b = (b..=text.len()).find(|b| text.is_char_boundary(*b)).unwrap();
                return format!("{}{}", &text[..a], &text[b..]);
            }
        }
        lines.join("\n") + "\n"
    }

    /// What holds of any text at all.
    fn holds(text: &str) -> Result<(), TestCaseError> {
        let Err(complaints) = sheet::parse("any.toml", text) else {
            return Ok(());
        };
        prop_assert!(!complaints.complaints.is_empty());
        let plain = complaints.render(false);
        prop_assert!(complaints.render(true).len() > plain.len());
        let lines: Vec<_> = text.split('\n').collect();
        for complaint in &complaints.complaints {
            let line = complaint.line.checked_sub(1).and_then(|n| lines.get(n));
            let length = line.map(|line| line.chars().count());
            prop_assert!(
                length.is_some_and(|length| (1..=length + 1).contains(&complaint.column)),
                "points outside: {complaint}"
            );
            prop_assert!(!complaint.problem.is_empty() && !complaint.remedy.is_empty());
            let place = format!("any.toml:{}:{}\n", complaint.line, complaint.column);
            prop_assert!(plain.contains(&place), "{place} is not shown in\n{plain}");
        }
        Ok(())
    }

    proptest! {
        #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::default() })]

        #[test]
        fn a_mutated_sheet_is_read_or_complained_of(
            demo in prop::sample::select(vec![CULVERT, ORCHARD, FIVE_FAULTS]),
            mutations in prop::collection::vec(mutation(), 1..5),
        ) {
            let text = mutations.iter().fold(demo.to_owned(), |text, m| mutated(&text, m));
            holds(&text)?;
        }

        #[test]
        fn any_text_is_read_or_complained_of(text in any::<String>()) {
            holds(&text)?;
        }

        #[test]
        fn any_toml_like_text_is_read_or_complained_of(
            text in "(\\[{0,2}(leg|leg_kind|output|allowed)?(\\.x)?\\]{0,2}\n|(name|kind|hip|servo)\\.?(hip)? = (\\[1\\]|\\{\\}|\"yaw\"|7)\n){0,12}"
        ) {
            holds(&text)?;
        }
    }

    #[test]
    fn deep_nesting_is_complained_of() {
        for text in [
            format!("name = {}", "[".repeat(50_000)),
            format!("name = {}", "{a=".repeat(50_000)),
            format!("{}b = 1", "a.".repeat(50_000)),
            format!("[{}b]", "a.".repeat(50_000)),
        ] {
            holds(&text).unwrap();
        }
    }
}
