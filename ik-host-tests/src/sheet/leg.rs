//! `[[leg]]`: the legs as they sit on the body.

use super::leg_kind::KnownKind;
use super::limits;
use super::nearest::nearest;
use super::robot::{LegMount, Servo, ServoCurve, Side};
use super::table::{Item, Table};
use super::vocabulary::{LEG, of_shape};

/// Reads every leg, and complains of kinds that none of them uses.
pub(super) fn read_all(sheet: &Table<'_>, kinds: &[KnownKind<'_>]) -> Option<Vec<LegMount>> {
    let list = sheet.needed("leg")?;
    let tables = list.tables(&LEG)?;
    if tables.is_empty() || tables.len() > limits::LEGS {
        list.complain(
            format!("must be 1 to {} legs, not {}", limits::LEGS, tables.len()),
            "give each leg a table `[[leg]]`",
        );
    }
    let mut names = Vec::new();
    let mut uses = Uses::of(kinds);
    let mounts: Vec<_> = tables.iter().map(|table| read(table, kinds, &mut names, &mut uses)).collect();
    uses.complain(kinds);
    mounts.into_iter().collect()
}

fn read<'s>(
    table: &Table<'s>,
    kinds: &[KnownKind<'_>],
    names: &mut Vec<(&'s str, usize)>,
    uses: &mut Uses,
) -> Option<LegMount> {
    let name = table.needed("name").and_then(|item| unique_name(&item, names));
    let kind = table.needed("kind").and_then(|item| index_of_kind(&item, kinds, uses));
    if kind.is_none() {
        // What it was to use cannot be told, so no kind can be called unused.
        uses.told = false;
    }
    let side =
        table.needed("side").and_then(|item| item.word(&[("left", Side::Left), ("right", Side::Right)]));
    let at_mm = table.needed("at_mm").and_then(|item| item.numbers(&limits::PLACE_MM));
    let trim_us = match (table.optional("trim_us"), kind) {
        (None, _) => Some([0.0; 3]),
        (Some(item), Some(kind)) => kinds.get(kind).and_then(|kind| trims(&item, kind)),
        // Without a kind nobody knows what its joints are called.
        (Some(_), None) => None,
    };
    Some(LegMount { name: name?.to_owned(), kind: kind?, side: side?, at_mm: at_mm?, trim_us: trim_us? })
}

fn unique_name<'s>(item: &Item<'s>, names: &mut Vec<(&'s str, usize)>) -> Option<&'s str> {
    let name = item.name()?;
    if let Some((_, line)) = names.iter().find(|(other, _)| *other == name) {
        item.complain(
            format!("another leg has this name, on line {line}"),
            "give each leg a name of its own",
        );
        return None;
    }
    names.push((name, item.line()));
    Some(name)
}

fn index_of_kind(item: &Item<'_>, kinds: &[KnownKind<'_>], uses: &mut Uses) -> Option<usize> {
    let written = item.text()?;
    if let Some(index) = kinds.iter().position(|kind| kind.name == written) {
        if let Some(used) = uses.used.get_mut(index) {
            *used = true;
        }
        return Some(index);
    }
    let names = || kinds.iter().map(|kind| kind.name);
    let meant = nearest(written, names()).map_or_else(String::new, |near| format!("did you mean {near:?}? "));
    let known: Vec<_> = names().map(|name| format!("{name:?}")).collect();
    let remedy = if known.is_empty() {
        format!("add a table `[leg_kind.{written}]`")
    } else {
        format!("{meant}the kinds are {}", known.join(", "))
    };
    item.complain("no leg kind has this name", remedy);
    None
}

/// Trims by joint; absent ones are 0.
fn trims(item: &Item<'_>, kind: &KnownKind<'_>) -> Option<[f64; 3]> {
    let table = item.table(of_shape(kind.shape).trims)?;
    let mut good = true;
    let mut trims = [0.0; 3];
    let joints = kind.shape.joint_names();
    for (index, (joint, trim)) in joints.into_iter().zip(&mut trims).enumerate() {
        let Some(item) = table.optional(joint) else {
            continue;
        };
        let Some(written) = item.within(&limits::TRIM_US) else {
            good = false;
            continue;
        };
        *trim = written;
        let servo = kind.kind.as_ref().and_then(|kind| kind.servos.get(index));
        let Some(servo) = servo else {
            continue; // complained of already
        };
        good &= is_safe(&item, servo, written);
    }
    good.then_some(trims)
}

/// Whether a trim leaves the servo pulses to send.
fn is_safe(item: &Item<'_>, servo: &Servo, trim: f64) -> bool {
    let [least, most] = servo.pulse_us;
    match &servo.curve {
        ServoCurve::Straight { centre_us: centre, .. } => {
            let safe = (least..=most).contains(&(centre + trim));
            if !safe {
                item.complain(
                    format!("moves the centre to {} us, outside `pulse_us`", centre + trim),
                    format!("from {} to {}", least - centre, most - centre),
                );
            }
            safe
        }
        ServoCurve::Measured { .. } => {
            let [first, last] = servo.sent_us(trim);
            let safe = first < last;
            if !safe {
                item.complain(
                    "moves every measured pulse outside `pulse_us`",
                    "a trim is a few microseconds: measure the servo anew",
                );
            }
            safe
        }
    }
}

/// Which kinds are used.
struct Uses {
    used: Vec<bool>,
    /// Whether every leg told its kind.
    told: bool,
}

impl Uses {
    fn of(kinds: &[KnownKind<'_>]) -> Self {
        Self { used: vec![false; kinds.len()], told: true }
    }

    fn complain(&self, kinds: &[KnownKind<'_>]) {
        if !self.told {
            return;
        }
        for (kind, used) in kinds.iter().zip(&self.used) {
            if !used {
                kind.item.complain(
                    "no leg uses this kind",
                    format!("give a leg `kind = {:?}`, or take the kind out", kind.name),
                );
            }
        }
    }
}
