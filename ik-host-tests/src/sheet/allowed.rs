//! `[allowed]`: what the gate allows.

use super::limits;
use super::robot::Allowed;
use super::table::Table;
use super::vocabulary::ALLOWED;

/// Share of the work volume that may be unreached when the sheet does not say: all of it.
const UNREACHED_PERCENT: f64 = 100.0;

/// Reads the table.
pub(super) fn read(sheet: &Table<'_>) -> Option<Allowed> {
    let table = sheet.needed("allowed")?.table(&ALLOWED)?;
    let [arithmetic_mm, with_pulse_mm] =
        ["arithmetic_mm", "with_pulse_mm"].map(|key| table.needed(key)?.within(&limits::ALLOWED_MM));
    let unreached_percent = table
        .optional("unreached_percent")
        .map_or(Some(UNREACHED_PERCENT), |item| item.within(&limits::PERCENT));
    Some(Allowed {
        arithmetic_mm: arithmetic_mm?,
        with_pulse_mm: with_pulse_mm?,
        unreached_percent: unreached_percent?,
    })
}
