//! The servo's lines of a sheet.

use super::fit::Fit;
use crate::sheet::{self, SheetErrors};
use ik_core::servo::MOST_POINTS;
use toml_edit::{Array, DocumentMut, Item, Table, Value, value};

/// A servo as a sheet has it.
#[derive(Debug, Clone, PartialEq)]
pub enum Block {
    /// Centre and gain.
    Straight {
        /// µs.
        centre_us: f64,
        /// Degrees.
        joint_at_centre_deg: f64,
        /// µs.
        us_per_degree: f64,
        /// Whether a longer pulse makes the angle larger.
        turns_with: bool,
    },
    /// Measured points, [µs, degrees].
    Measured(Vec<[f64; 2]>),
}

/// A thousandth of a unit is far below what was read.
fn rounded(value: f64) -> f64 {
    (value * 1000.0).round() / 1000.0
}

impl Block {
    /// Centre and gain of a fit.
    pub fn straight(fit: &Fit) -> Self {
        Self::Straight {
            centre_us: rounded(fit.centre_us),
            joint_at_centre_deg: rounded(fit.joint_at_centre_deg[0]),
            us_per_degree: rounded(fit.us_per_degree[0]),
            turns_with: fit.turns_with,
        }
    }

    /// The points of a fit: all of them, or as many as a servo may have, the ends among them.
    pub fn measured(fit: &Fit) -> Self {
        let (points, most) = (&fit.points, MOST_POINTS);
        let chosen = if points.len() <= most {
            points.clone()
        } else {
            (0..most).map(|i| points[i * (points.len() - 1) / (most - 1)]).collect()
        };
        Self::Measured(chosen.into_iter().map(|point| point.map(rounded)).collect())
    }

    /// The joint's angle at a pulse, degrees: straight from point to point, and beyond the ends as between the last two.
    pub fn angle_deg(&self, us: f64) -> f64 {
        match self {
            Self::Straight { centre_us, joint_at_centre_deg, us_per_degree, turns_with } => {
                let turned = (us - centre_us) / us_per_degree;
                joint_at_centre_deg + if *turns_with { turned } else { -turned }
            }
            Self::Measured(points) => {
                let after = points.iter().position(|[at, _]| *at >= us).unwrap_or(points.len());
                let after = after.clamp(1, points.len().max(2) - 1);
                let ([from_us, from], [to_us, to]) = (points[after - 1], points[after]);
                from + (to - from) * (us - from_us) / (to_us - from_us)
            }
        }
    }

    /// The keys and their values.
    fn keys(&self) -> Vec<(&'static str, Value)> {
        match self {
            Self::Straight { centre_us, joint_at_centre_deg, us_per_degree, turns_with } => vec![
                ("centre_us", number(*centre_us)),
                ("joint_at_centre_deg", number(*joint_at_centre_deg)),
                ("us_per_degree", number(*us_per_degree)),
                ("turns", if *turns_with { "with" } else { "against" }.into()),
            ],
            Self::Measured(points) => {
                let pair =
                    |point: &[f64; 2]| Value::from(point.iter().map(|v| number(*v)).collect::<Array>());
                vec![("measured", points.iter().map(pair).collect::<Array>().into())]
            }
        }
    }

    /// Its lines, to be pasted into a sheet.
    pub fn lines(&self) -> String {
        let mut table = Table::new();
        for (key, of_it) in self.keys() {
            table[key] = value(of_it);
        }
        table.to_string()
    }
}

/// A whole number without its point, as people write it.
fn number(of: f64) -> Value {
    if of == of.trunc() && of.abs() < 1e9 { Value::from(of as i64) } else { Value::from(of) }
}

/// Keys that say where the servo goes, one way or the other.
const KEYS: [&str; 5] = ["centre_us", "joint_at_centre_deg", "us_per_degree", "turns", "measured"];

/// A sheet's text with the servo of a joint replaced, everything else in it untouched, comments too.
///
/// # Errors
/// What is wrong: with the sheet as it was, with the place that was named, or with the sheet as it would be.
pub fn edited_sheet(
    file: &str,
    text: &str,
    [kind, joint]: [&str; 2],
    block: &Block,
) -> Result<String, String> {
    let rendered = |complaints: sheet::Complaints| SheetErrors::Faulty(complaints).render(false);
    sheet::parse(file, text).map_err(rendered)?;
    let mut document: DocumentMut =
        text.parse().map_err(|error: toml_edit::TomlError| format!("{file}: {error}"))?;
    let names = |item: Option<&Item>| {
        let table = item.and_then(Item::as_table_like);
        table
            .map(|table| table.iter().map(|(name, _)| name.to_owned()).collect::<Vec<_>>())
            .unwrap_or_default()
    };
    let kinds = names(document.get("leg_kind"));
    if !kinds.iter().any(|name| name == kind) {
        return Err(format!("{file}: there is no leg_kind.{kind}; there are {}", kinds.join(", ")));
    }
    let servos =
        names(document.get("leg_kind").and_then(|kinds| kinds.get(kind)).and_then(|kind| kind.get("servo")));
    if !servos.iter().any(|name| name == joint) {
        return Err(format!(
            "{file}: there is no leg_kind.{kind}.servo.{joint}; there are {}",
            servos.join(", ")
        ));
    }
    let servo = document["leg_kind"][kind]["servo"][joint]
        .as_table_like_mut()
        .ok_or_else(|| format!("{file}: leg_kind.{kind}.servo.{joint} is no table"))?;
    let keys = block.keys();
    for key in KEYS.iter().filter(|key| !keys.iter().any(|(kept, _)| kept == *key)) {
        servo.remove(key);
    }
    for (key, mut of_it) in keys {
        match servo.get_mut(key).and_then(Item::as_value_mut) {
            // The comment behind a value stays.
            Some(old) => {
                *of_it.decor_mut() = old.decor().clone();
                *old = of_it;
            }
            None => {
                servo.insert(key, value(of_it));
            }
        }
    }
    let edited = document.to_string();
    sheet::parse(file, &edited).map_err(|complaints| {
        format!(
            "the sheet would not be right with this servo, so nothing was written:\n{}",
            rendered(complaints)
        )
    })?;
    Ok(edited)
}
