//! The promise of the report: a page that holds all that was found, needs nothing but itself, cannot be broken by a
//! name, is the same every time, and replaces an earlier one whole or not at all.

use ik_host_tests::report;
use ik_host_tests::sheet::{self, DEMOS, NumberSystem};
use ik_host_tests::survey::{Plan, Survey, Verdict, survey};
use indicatif::ProgressBar;
use std::fs;
use std::path::Path;
use std::sync::LazyLock;

const PLAN: Plan = Plan { targets: 2_000, seed: 7 };
const REPEAT: &str = "toehold survey robot.toml --targets 2000 --seed 7";

/// Demo robots as their sheets say, and one whose firmware uses every number system and is allowed next to nothing.
static SURVEYS: LazyLock<Vec<Survey>> = LazyLock::new(|| {
    let mut robots: Vec<_> = DEMOS.iter().map(|demo| sheet::demo(demo.name).unwrap()).collect();
    let mut strict = robots[1].clone();
    strict.firmware.numbers = NumberSystem::ALL.to_vec();
    strict.allowed.with_pulse_mm = 1e-3;
    strict.allowed.arithmetic_mm = 1e-3;
    robots.push(strict);
    robots.iter().map(|robot| survey(robot, PLAN, &ProgressBar::hidden()).unwrap()).collect()
});

fn page(survey: &Survey) -> String {
    let folder = tempfile::tempdir().unwrap();
    let [_, html] = report::write(folder.path(), "robot", survey, None, REPEAT).unwrap();
    fs::read_to_string(html).unwrap()
}

/// The insides of the pictures, in order.
fn pictures(page: &str) -> Vec<&str> {
    let start = "<svg class=\"picture\"";
    page.split(start).skip(1).map(|rest| rest.split_once("</svg>").unwrap().0).collect()
}

fn names(folder: &Path) -> Vec<String> {
    let mut names: Vec<_> = fs::read_dir(folder)
        .unwrap()
        .map(|entry| entry.unwrap().file_name().into_string().unwrap())
        .collect();
    names.sort();
    names
}

#[test]
fn the_answer_comes_first_and_every_figure_of_the_firmware_is_there() {
    for survey in SURVEYS.iter() {
        let page = page(survey);
        let (answer, rest) = page.split_once("</header>").unwrap();
        assert!(answer.contains(&format!("<h1>{}</h1>", survey.robot.name)));
        let (said, unsaid) = match survey.verdict {
            Verdict::Within => ("✓ Within", "✗"),
            Verdict::Beyond => ("✗ Beyond", "✓ Within"),
        };
        assert!(answer.contains(said) && !answer.contains(unsaid), "{said}");
        for number in survey.kinds[0].numbers.iter().filter(|number| number.firmware) {
            for errors in [&number.arithmetic, &number.together] {
                let [x, y, z] = errors.largest.foot_mm;
                assert!(answer.contains(&format!("({x:.3}, {y:.3}, {z:.3})")), "{}", number.number);
                assert!(answer.contains(&report::millimetres(errors.largest.mm)), "{}", number.number);
            }
        }
        for number in &survey.kinds[0].numbers {
            for errors in [&number.arithmetic, &number.pulse, &number.together] {
                for mm in [errors.largest.mm, errors.p99_mm, errors.mean_mm] {
                    assert!(rest.contains(&format!(">{}</td>", report::millimetres(mm))), "{mm}");
                }
            }
        }
        for words in [REPEAT, "<dd>7</dd>", survey.toehold, "&quot;thigh_mm&quot;: ", "none worse was found"]
        {
            assert!(page.contains(words), "{words}");
        }
        for words in ["backlash", "dead band", "current limit", "cut the servos’ power", "off the ground"] {
            assert!(rest.contains(words), "{words}");
        }
    }
    let verdicts: Vec<_> = SURVEYS.iter().map(|survey| survey.verdict).collect();
    assert_eq!(verdicts, [Verdict::Within, Verdict::Within, Verdict::Beyond]);
}

#[test]
fn every_picture_is_drawn_and_says_what_it_shows() {
    for survey in SURVEYS.iter() {
        let page = page(survey);
        let pictures = pictures(&page);
        // The leg, two maps for each number system of the firmware, two spreads, the pulses.
        assert_eq!(pictures.len(), 4 + 2 * survey.robot.firmware.numbers.len());
        assert_eq!(page.matches("<figcaption>").count(), pictures.len());
        for picture in &pictures {
            let (head, body) = picture.split_once('>').unwrap();
            assert!(head.contains("role=\"img\"") && head.contains("viewBox=\"0 0 1760 "), "{head}");
            let alternative = head.split_once("aria-label=\"").unwrap().1.split_once('"').unwrap().0;
            assert!(alternative.len() > 40, "{alternative}");
            let shapes = ["<path", "<polyline", "<polygon", "<circle"].map(|tag| body.matches(tag).count());
            assert!(shapes.iter().sum::<usize>() > 2 && body.matches("<text").count() > 4, "{head}");
            assert!(!body.contains("NaN") && !body.contains("inf"), "{head}");
        }
        // A map shows more than one colour of the scale; a spread a curve for each number system.
        for map in pictures.iter().filter(|picture| picture.contains("Map of the foot error")) {
            let scale = ["EAF3F8", "CFE2EF", "AFCDE3", "8BB5D5", "6699C2", "467BA9", "2B5C89", "14375A"];
            let cells = map.lines().filter(|line| line.starts_with("<path") && line.matches('M').count() > 1);
            let cells: String = cells.collect();
            assert!(scale.iter().filter(|colour| cells.contains(*colour)).count() >= 2, "a flat map");
        }
        for spread in pictures.iter().filter(|picture| picture.contains("Curves of the share")) {
            for colour in ["0072B2", "D55E00", "009E73", "7A6800", "8A4F9E", "B9BEC4"] {
                assert!(spread.contains(&format!("stroke=\"#{colour}\"")), "{colour}");
            }
        }
    }
}

#[test]
fn the_page_needs_nothing_but_itself() {
    for survey in SURVEYS.iter() {
        let page = page(survey);
        for outside in ["http", "//", "<script", "<link rel=\"stylesheet", "@import", "src=", "url(\""] {
            assert!(!page.contains(outside), "{outside}");
        }
        let ids: Vec<_> = page.split(" id=\"").skip(1).map(|rest| rest.split_once('"').unwrap().0).collect();
        for (at, id) in ids.iter().enumerate() {
            assert!(!ids[..at].contains(id), "{id} stands for two elements");
        }
        for target in page.split("href=\"#").skip(1).map(|rest| rest.split_once('"').unwrap().0) {
            assert!(ids.contains(&target), "#{target} leads nowhere");
        }
    }
}

#[test]
fn names_from_a_sheet_cannot_break_the_page() {
    let evil = "<b>&\"'</style></svg><script>";
    let mut survey = SURVEYS[0].clone();
    survey.robot.name = format!("robot {evil}");
    survey.robot.about = Some(format!("about {evil}"));
    survey.robot.kinds[0].name = format!("kind {evil}");
    survey.kinds[0].kind = format!("kind {evil}");
    survey.kinds[0].legs[0] = format!("leg {evil}");
    let folder = tempfile::tempdir().unwrap();
    let repeat = format!("toehold survey '{evil}.toml'");
    let [_, html] = report::write(folder.path(), "robot", &survey, None, &repeat).unwrap();
    let broken = fs::read_to_string(html).unwrap();
    let good = page(&SURVEYS[0]);
    // The same elements, one for one: whatever the names hold, they are text.
    for tag in ["<b>", "<script", "<svg", "</svg>", "</style>", "<section", "<td", "<figure>"] {
        assert_eq!(broken.matches(tag).count(), good.matches(tag).count(), "{tag}");
    }
    assert_eq!(broken.matches('<').count(), good.matches('<').count());
    assert_eq!(broken.matches('>').count(), good.matches('>').count());
    assert!(broken.contains("<h1>robot &lt;b&gt;&amp;&quot;"));
}

#[test]
fn the_same_survey_gives_the_same_page_on_any_number_of_cores() {
    for survey in SURVEYS.iter() {
        let on = |threads: usize| {
            rayon::ThreadPoolBuilder::new().num_threads(threads).build().unwrap().install(|| page(survey))
        };
        let one = on(1);
        assert!(one == on(3), "{}", survey.robot.name);
    }
}

#[test]
fn a_report_is_two_files_and_nothing_is_left_beside_them() {
    let folder = tempfile::tempdir().unwrap();
    let inner = folder.path().join("made/on/the/way");
    for _ in 0..2 {
        let [json, html] = report::write(&inner, "robot", &SURVEYS[0], None, REPEAT).unwrap();
        assert_eq!((json, html), (inner.join("robot.json"), inner.join("robot.html")));
        assert_eq!(names(&inner), ["robot.html", "robot.json"]);
    }
}

#[test]
fn an_earlier_report_is_replaced_not_written_over() {
    let folder = tempfile::tempdir().unwrap();
    let (page, kept) = (folder.path().join("robot.html"), folder.path().join("kept.html"));
    fs::write(&page, "the earlier page").unwrap();
    // Another name for the same file: were it written over, this would change too.
    fs::hard_link(&page, &kept).unwrap();
    report::write(folder.path(), "robot", &SURVEYS[0], None, REPEAT).unwrap();
    assert_eq!(fs::read_to_string(&kept).unwrap(), "the earlier page");
    let new = fs::read_to_string(&page).unwrap();
    assert!(new.starts_with("<!DOCTYPE html>") && new.trim_end().ends_with("</html>"));
}

#[test]
fn a_report_that_cannot_be_placed_leaves_what_was_there_and_no_other_file() {
    let folder = tempfile::tempdir().unwrap();
    // A folder stands where the page should go: it cannot be replaced by a file.
    let place = folder.path().join("robot.html");
    fs::create_dir(&place).unwrap();
    fs::write(place.join("inside"), "kept").unwrap();
    let error = report::write(folder.path(), "robot", &SURVEYS[0], None, REPEAT).unwrap_err().to_string();
    assert!(error.contains(&place.display().to_string()), "{error}");
    assert_eq!(fs::read_to_string(place.join("inside")).unwrap(), "kept");
    assert_eq!(names(folder.path()), ["robot.html", "robot.json"]);
}

#[test]
fn a_folder_that_cannot_be_made_is_named() {
    let folder = tempfile::tempdir().unwrap();
    let file = folder.path().join("file");
    fs::write(&file, "kept").unwrap();
    let inside = file.join("reports");
    let error = report::write(&inside, "robot", &SURVEYS[0], None, REPEAT).unwrap_err().to_string();
    assert!(error.contains("cannot write") && error.contains(&inside.display().to_string()), "{error}");
    assert_eq!(fs::read_to_string(&file).unwrap(), "kept");
}
