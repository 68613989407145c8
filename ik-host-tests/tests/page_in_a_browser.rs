//! The promise of the page's layout, in a real browser: readable on a phone and on a desk, light and dark.
//!
//! Not run by default, because it needs a browser. With Debian's package `chromium` installed:
//!
//! ```text
//! cargo test -p ik-host-tests --release --test page_in_a_browser -- --ignored
//! ```
//!
//! `TOEHOLD_BROWSER` names another Chromium program; screenshots go to the folder `TOEHOLD_SCREENSHOTS`, if given.

use ik_host_tests::report;
use ik_host_tests::sheet::{self, DEMOS};
use ik_host_tests::survey::{Plan, survey};
use indicatif::ProgressBar;
use serde_json::Value;
use std::path::{Path, PathBuf};
use std::process::Command;
use std::{env, fs};

/// Put at the end of a copy of the page: measures it and tells the page around it.
const MEASURE: &str = r##"<script>
const inner = document.documentElement.clientWidth;
const boxOf = (element) => element.getBoundingClientRect();
// A line of text is taller than its letters.
const letters = ({ left, right, top, bottom }, turned) => {
  const [aside, above] = turned ? [(right - left) * 0.18, 0] : [0, (bottom - top) * 0.18];
  return { left: left + aside, right: right - aside, top: top + above, bottom: bottom - above };
};
const overlaps = (a, b) => Math.min(a.right, b.right) - Math.max(a.left, b.left) > 0.5
  && Math.min(a.bottom, b.bottom) - Math.max(a.top, b.top) > 0.5;
const pictures = [...document.querySelectorAll("svg.picture")].map((svg) => {
  const frame = boxOf(svg);
  const texts = [...svg.querySelectorAll("text")];
  const boxes = texts.map((text) => ({ text: text.textContent.trim(), box: letters(boxOf(text), text.hasAttribute("transform")) }));
  return {
    alternative: svg.getAttribute("aria-label"), width: frame.width, height: frame.height,
    smallest: Math.min(...texts.map((text) => parseFloat(getComputedStyle(text).fontSize)))
      * frame.width / svg.viewBox.baseVal.width,
    outside: boxes.filter(({ box }) => box.left < frame.left - 1 || box.right > frame.right + 1
      || box.top < frame.top - 1 || box.bottom > frame.bottom + 1).map(({ text }) => text),
    overlapping: boxes.flatMap((one, at) => boxes.slice(at + 1)
      .filter((other) => overlaps(one.box, other.box)).map((other) => one.text + " / " + other.text)),
  };
});
const wide = [...document.querySelectorAll("body *")].filter((element) =>
  !element.closest(".scroll > *") && !element.closest("svg") && boxOf(element).right > inner + 0.5);
parent.postMessage(JSON.stringify({
  inner, scroll: document.documentElement.scrollWidth, height: document.documentElement.scrollHeight,
  dark: matchMedia("(prefers-color-scheme: dark)").matches,
  paper: getComputedStyle(document.body).backgroundColor, ink: getComputedStyle(document.body).color,
  wide: wide.map((element) => element.outerHTML.slice(0, 80)), pictures,
}), "*");
</script>"##;

/// Around the copy, because a window is never narrower than 500 px: puts the findings into an element.
fn around(width: u32, page: &str) -> String {
    format!(
        r#"<!DOCTYPE html><html style="color-scheme: light dark"><meta charset="utf-8"><script>
addEventListener("message", (event) => {{
  const out = document.createElement("pre");
  out.id = "measured";
  out.textContent = event.data;
  document.body.append(out);
}});
</script><body><iframe src="{page}" style="width: {width}px; height: 900px; border: 0"></iframe></body></html>"#
    )
}

fn browser() -> PathBuf {
    if let Some(named) = env::var_os("TOEHOLD_BROWSER") {
        return named.into();
    }
    let path = env::var_os("PATH").unwrap_or_default();
    env::split_paths(&path)
        .flat_map(|folder| ["chromium", "chromium-browser"].map(|name| folder.join(name)))
        .find(|program| program.is_file())
        .expect(
            "no browser: install Debian's package chromium, or name a Chromium program in TOEHOLD_BROWSER",
        )
}

/// What the browser prints of a page; what it fails with, if it does.
fn run(width: u32, height: u32, dark: bool, page: &Path, more: &[String]) -> String {
    let profile = tempfile::tempdir().unwrap();
    let mut command = Command::new(browser());
    command
        .args(["--headless", "--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run"])
        .args(["--disable-background-networking", "--disable-component-update", "--disable-sync"])
        .args(["--hide-scrollbars", "--virtual-time-budget=2000"])
        .arg(format!("--user-data-dir={}", profile.path().display()))
        .arg(format!("--window-size={width},{height}"))
        // Blink's own numbers: 0 is dark, 1 is light.
        .arg(format!("--blink-settings=preferredColorScheme={}", u8::from(!dark)))
        .args(more)
        .arg(format!("file://{}", page.display()));
    let output = command.output().unwrap_or_else(|error| panic!("{command:?}: {error}"));
    let errors = String::from_utf8_lossy(&output.stderr);
    assert!(output.status.success(), "{command:?}: {}\n{errors}", output.status);
    String::from_utf8(output.stdout).unwrap()
}

fn measure(page: &Path, width: u32, dark: bool) -> Value {
    let text = fs::read_to_string(page).unwrap();
    let measuring = page.with_extension("measuring.html");
    fs::write(&measuring, text.replace("</body>", &format!("{MEASURE}\n</body>"))).unwrap();
    let outer = page.with_extension("around.html");
    let name = measuring.file_name().unwrap().to_str().unwrap();
    fs::write(&outer, around(width, name)).unwrap();
    let dom = run(width + 100, 1000, dark, &outer, &["--dump-dom".into()]);
    let measured = dom.split_once("<pre id=\"measured\">").and_then(|(_, rest)| rest.split_once("</pre>"));
    let (json, _) = measured.unwrap_or_else(|| panic!("the page was not measured:\n{dom}"));
    let json = json.replace("&lt;", "<").replace("&gt;", ">").replace("&nbsp;", " ").replace("&amp;", "&");
    serde_json::from_str(&json).unwrap_or_else(|error| panic!("{error}:\n{json}"))
}

/// The mean of the channels of `rgb(…)`.
fn lightness(colour: &Value) -> f64 {
    let text = colour.as_str().unwrap();
    let channels: Vec<f64> = text
        .trim_start_matches("rgb(")
        .trim_end_matches(')')
        .split(", ")
        .map(|v| v.parse().unwrap())
        .collect();
    channels.iter().sum::<f64>() / channels.len() as f64
}

#[test]
#[ignore = "needs a browser"]
fn the_page_fits_a_phone_and_a_desk_light_and_dark() {
    let folder = tempfile::tempdir().unwrap();
    for demo in DEMOS {
        let robot = sheet::demo(demo.name).unwrap();
        let survey = survey(&robot, Plan { targets: 100_000, seed: 1 }, &ProgressBar::hidden()).unwrap();
        let [_, page] = report::write(folder.path(), demo.name, &survey, None, "toehold survey").unwrap();
        for (width, dark) in [(390, false), (390, true), (1280, false), (1280, true)] {
            let found = measure(&page, width, dark);
            let scheme = if dark { "dark" } else { "light" };
            let told = format!("{} at {width} px, {scheme}: {found:#}", demo.name);
            assert_eq!(found["inner"], width, "{told}");
            assert_eq!(found["dark"], dark, "{told}");
            assert!(found["scroll"].as_u64().unwrap() <= u64::from(width), "overflows: {told}");
            assert_eq!(found["wide"].as_array().unwrap().len(), 0, "{told}");
            let (paper, ink) = (lightness(&found["paper"]), lightness(&found["ink"]));
            assert!(if dark { paper < 60.0 && ink > 180.0 } else { paper > 230.0 && ink < 80.0 }, "{told}");
            let pictures = found["pictures"].as_array().unwrap();
            assert_eq!(pictures.len(), 6, "{told}");
            for picture in pictures {
                let size = |name: &str| picture[name].as_f64().unwrap();
                assert!(size("width") >= 300.0 && size("height") >= 150.0, "{picture:#}");
                assert!(size("smallest") >= 11.0, "text is too small: {picture:#}");
                assert_eq!(picture["outside"].as_array().unwrap().len(), 0, "{picture:#}");
                assert_eq!(picture["overlapping"].as_array().unwrap().len(), 0, "{picture:#}");
            }
            if let Some(shots) = env::var_os("TOEHOLD_SCREENSHOTS") {
                fs::create_dir_all(&shots).unwrap();
                let shot = Path::new(&shots).join(format!("{}-{width}-{scheme}.png", demo.name));
                let height = u32::try_from(found["height"].as_u64().unwrap()).unwrap();
                run(width, height, dark, &page, &[format!("--screenshot={}", shot.display())]);
                assert!(fs::metadata(&shot).unwrap().len() > 10_000, "{}", shot.display());
            }
        }
    }
}
