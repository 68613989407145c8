//! A survey as one self-contained HTML page: nothing is fetched, nothing needs a script.
//!
//! [`view`] says what the templates see, all figures already written out; the templates under `templates/` say where
//! it stands, one section each, and escape it: names come from sheets.

mod view;

use super::picture;
use crate::chips::Chips;
use crate::survey::Survey;
use minijinja::syntax::SyntaxConfig;
use minijinja::{Environment, UndefinedBehavior, Value, context};

/// The sections, each a template of its own; `page.html` puts them in order.
const TEMPLATES: [(&str, &str); 8] = [
    ("page.html", include_str!("page/templates/page.html")),
    ("answer.html", include_str!("page/templates/answer.html")),
    ("kind.html", include_str!("page/templates/kind.html")),
    ("errors.html", include_str!("page/templates/errors.html")),
    ("chips.html", include_str!("page/templates/chips.html")),
    ("picture.html", include_str!("page/templates/picture.html")),
    ("inputs.html", include_str!("page/templates/inputs.html")),
    ("words.html", include_str!("page/templates/words.html")),
];
const STYLE: &str = include_str!("page/templates/style.css");

/// A survey as one self-contained HTML page. `repeat` is the call that makes it again.
///
/// The same survey gives the same page, byte for byte.
pub(super) fn page(survey: &Survey, chips: Option<&Chips>, repeat: &str) -> String {
    let mut templates = Environment::new();
    templates.set_undefined_behavior(UndefinedBehavior::Strict);
    let syntax = SyntaxConfig::builder().trim_blocks(true).lstrip_blocks(true).build();
    templates.set_syntax(syntax.expect("the delimiters are the usual ones"));
    for (name, text) in TEMPLATES {
        templates.add_template(name, text).expect("a constant template");
    }
    let style = Value::from_safe_string(format!("{STYLE}\n{}", picture::palette_style()));
    templates
        .get_template("page.html")
        .and_then(|page| page.render(context! { style, ..view::of(survey, chips, repeat) }))
        .expect("constant templates over what they were written for")
}
