//! `[leg_kind.NAME]`: the kinds of leg.

use super::limits;
use super::robot::{Bend, HipShape, KneeDrive, LegKind, Output, Servo, WorkBox};
use super::servo;
use super::table::{Item, Table};
use super::vocabulary::{ShapeWords, WORK, of_shape};

const HIPS: [(&str, HipShape); 2] = [("yaw", HipShape::Yaw), ("roll", HipShape::Roll)];
const KNEE_DRIVES: [(&str, KneeDrive); 2] =
    [("direct", KneeDrive::Direct), ("parallelogram", KneeDrive::Parallelogram)];

/// A kind as far as it could be read: enough to check the legs against, even when it is faulty.
pub(super) struct KnownKind<'s> {
    pub(super) name: &'s str,
    /// Its shape, guessed from its keys where `hip` does not tell.
    pub(super) shape: HipShape,
    /// The whole kind, when nothing is wrong with it.
    pub(super) kind: Option<LegKind>,
    pub(super) item: Item<'s>,
}

/// Reads every kind, in the order of the sheet.
pub(super) fn read_all<'s>(sheet: &Table<'s>, output: Option<&Output>) -> Vec<KnownKind<'s>> {
    let Some(item) = sheet.needed("leg_kind") else {
        return Vec::new();
    };
    let named = item.named_items().unwrap_or_default();
    named
        .into_iter()
        .map(|(name, item)| {
            let shape = shape_of(&item);
            KnownKind { name, shape, kind: read(name, &item, shape, output), item }
        })
        .collect()
}

/// The shape, which decides the right keys: as `hip` says, else the one with more keys of its own.
fn shape_of(item: &Item<'_>) -> HipShape {
    let Some(entries) = item.peek() else {
        return HipShape::Yaw;
    };
    let written = entries.get("hip").and_then(|hip| hip.get_ref().as_str());
    if let Some((_, shape)) = HIPS.iter().find(|(word, _)| Some(*word) == written) {
        return *shape;
    }
    let score = |shape| {
        let lengths = of_shape(shape).lengths;
        lengths.iter().filter(|k| entries.contains_key(**k)).count()
    };
    if score(HipShape::Roll) > score(HipShape::Yaw) { HipShape::Roll } else { HipShape::Yaw }
}

fn read(name: &str, item: &Item<'_>, shape: HipShape, output: Option<&Output>) -> Option<LegKind> {
    let words = of_shape(shape);
    let table = item.table(words.kind)?;
    let hip = table.needed("hip").and_then(|item| item.word(&HIPS));
    let lengths = lengths(&table, &words);
    let bend = table.needed("knee_bends").and_then(|item| bend(&item, shape));
    let knee_drive =
        table.optional("knee_drive").map_or(Some(KneeDrive::Direct), |item| item.word(&KNEE_DRIVES));
    let range_deg = ranges(&table, &words, shape);
    let servos = servos(&table, &words, shape, output);
    let work = table.needed("work").and_then(|item| work(&item));
    let [offset_mm, thigh_mm, shank_mm] = lengths?;
    Some(LegKind {
        name: name.to_owned(),
        hip: hip?,
        offset_mm,
        thigh_mm,
        shank_mm,
        bend: bend?,
        range_deg: range_deg?,
        knee_drive: knee_drive?,
        servos: servos?,
        work: work?,
    })
}

/// Offset, upper and lower link, each checked alone and then against one another.
fn lengths(table: &Table<'_>, words: &ShapeWords) -> Option<[f64; 3]> {
    let [offset_key, upper_key, lower_key] = words.lengths;
    let offset_item = table.needed(offset_key);
    let upper = table.needed(upper_key);
    let lower = table.needed(lower_key);
    let length = |item: &Option<Item<'_>>, bounds| item.as_ref().and_then(|i| i.within(bounds));
    let offset_mm = length(&offset_item, &limits::OFFSET_MM);
    let upper_mm = length(&upper, &limits::LINK_MM);
    let lower_mm = length(&lower, &limits::LINK_MM);
    let (upper_mm, lower_mm) = (upper_mm?, lower_mm?);

    let ratio = limits::LINK_RATIO;
    let shorter = if upper_mm < lower_mm { upper? } else { lower? };
    if upper_mm.max(lower_mm) > ratio * upper_mm.min(lower_mm) {
        shorter.complain(
            format!("one link is more than {ratio} times as long as the other"),
            format!(
                "such a leg can hardly lift its foot; are `{upper_key}` and `{lower_key}` in the \
                 same unit?"
            ),
        );
        return None;
    }
    let offset_mm = offset_mm?;
    let most = limits::OFFSET_RATIO * (upper_mm + lower_mm) / 2.0;
    if offset_mm > most {
        offset_item?.complain(
            format!("must not exceed {} times the mean of the links, {most} mm", limits::OFFSET_RATIO),
            format!("give it in millimetres, as `{upper_key}` and `{lower_key}`"),
        );
        return None;
    }
    Some([offset_mm, upper_mm, lower_mm])
}

fn bend(item: &Item<'_>, shape: HipShape) -> Option<Bend> {
    let yaw = [("up", Bend::Up), ("down", Bend::Down)];
    let roll = [("forward", Bend::Forward), ("backward", Bend::Backward)];
    let (ours, others, hip) = match shape {
        HipShape::Yaw => (yaw, roll, "yaw"),
        HipShape::Roll => (roll, yaw, "roll"),
    };
    let written = item.text()?;
    if others.iter().any(|(word, _)| *word == written) {
        let [(first, _), (second, _)] = ours;
        item.complain(
            format!("is not how the knee of a {hip}-hip leg bends"),
            format!("{first:?} or {second:?}, or another `hip`"),
        );
        return None;
    }
    item.word(&ours)
}

fn ranges(table: &Table<'_>, words: &ShapeWords, shape: HipShape) -> Option<[[f64; 2]; 3]> {
    let table = table.needed("range_deg")?.table(words.ranges)?;
    let [first, second, knee] =
        shape.joint_names().map(|joint| (joint, table.needed(joint))).map(|(joint, item)| {
            item?.range(match joint {
                "knee" => &limits::KNEE_DEG,
                _ => &limits::JOINT_DEG,
            })
        });
    Some([first?, second?, knee?])
}

fn servos(
    table: &Table<'_>,
    words: &ShapeWords,
    shape: HipShape,
    output: Option<&Output>,
) -> Option<[Servo; 3]> {
    let table = table.needed("servo")?.table(words.servos)?;
    let [first, second, knee] = shape.joint_names().map(|joint| servo::read(&table.needed(joint)?, output));
    Some([first?, second?, knee?])
}

fn work(item: &Item<'_>) -> Option<WorkBox> {
    let table = item.table(&WORK)?;
    let [x_mm, y_mm, z_mm] = ["x_mm", "y_mm", "z_mm"].map(|key| table.needed(key)?.range(&limits::PLACE_MM));
    Some(WorkBox { x_mm: x_mm?, y_mm: y_mm?, z_mm: z_mm? })
}
