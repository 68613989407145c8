//! `[firmware]`: what the firmware computes with, and how often.

use super::limits;
use super::robot::{Firmware, NumberSystem, Output};
use super::table::{Item, Table};
use super::vocabulary::FIRMWARE;

/// Reads the table. Where it gives no frame rate, the output's holds.
pub(super) fn read(sheet: &Table<'_>, output: Option<&Output>) -> Option<Firmware> {
    let table = sheet.needed("firmware")?.table(&FIRMWARE)?;
    let numbers = table.needed("numbers").and_then(|item| numbers(&item));
    let frame_hz = match table.optional("frame_hz") {
        Some(item) => item.within(&limits::FRAME_HZ),
        None => output.map(Output::frame_hz),
    };
    Some(Firmware { numbers: numbers?, frame_hz: frame_hz? })
}

fn numbers(item: &Item<'_>) -> Option<Vec<NumberSystem>> {
    let words = NumberSystem::ALL.map(|system| (system.name(), system));
    let list = item.list()?;
    if list.is_empty() {
        item.complain(
            "must name at least one number system",
            "the gate judges those named here; for example `numbers = [\"fixed32\"]`",
        );
    }
    let mut numbers = Vec::new();
    for entry in &list {
        let Some(system) = entry.word(&words) else {
            continue;
        };
        if numbers.contains(&system) {
            entry.complain("is named twice", "name each number system once");
        } else {
            numbers.push(system);
        }
    }
    Some(numbers)
}
