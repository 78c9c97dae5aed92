//! Numbers as words for the screen, in the plan's units.

use crate::parts::What;
use crate::plan::DisplayUnits;

/// A measured value of the record, in words with its unit.
pub(super) fn measured(what: What, value: i64, units: DisplayUnits) -> String {
    match (what, units) {
        (What::Count, _) => format!("{value}"),
        (What::Lean, _) => format!("{} deg", rounded(value, 1_000)),
        (What::Wind, DisplayUnits::Metric) => format!("{} km/h", rounded(value * 36, 10_000)),
        (What::Wind, DisplayUnits::Us) => format!("{} mph", rounded(value * 1_000, 447_040)),
        (_, units) => length(value, units),
    }
}

/// A length of micrometres: whole millimetres, or inches and sixteenths.
pub(super) fn length(um: i64, units: DisplayUnits) -> String {
    match units {
        DisplayUnits::Metric => format!("{} mm", rounded(um, 1_000)),
        DisplayUnits::Us => {
            let sixteenths = rounded(um * 16, 25_400);
            format!("{} in {}/16", sixteenths / 16, sixteenths % 16)
        }
    }
}

/// A long length: metres or feet.
pub(super) fn distance(um: i64, units: DisplayUnits) -> String {
    match units {
        DisplayUnits::Metric => format!("{} m", rounded(um, 1_000_000)),
        DisplayUnits::Us => format!("{} ft", rounded(um, 304_800)),
    }
}

/// Rounded division, half away from zero.
pub(super) const fn rounded(value: i64, by: i64) -> i64 {
    let half = by / 2;
    if value >= 0 {
        (value + half) / by
    } else {
        (value - half) / by
    }
}

/// A time of day, from UTC milliseconds and the offset in minutes.
pub(super) fn clock(utc_ms: i64, offset_min: i32) -> String {
    let seconds = (utc_ms / 1_000 + i64::from(offset_min) * 60).rem_euclid(86_400);
    format!(
        "{:02}:{:02}:{:02}",
        seconds / 3_600,
        seconds / 60 % 60,
        seconds % 60
    )
}

/// An age in words.
pub(super) fn age(ms: i64) -> String {
    match ms / 60_000 {
        0 => "now".to_owned(),
        minutes @ 1..=119 => format!("{minutes} min"),
        minutes => format!("{} h", minutes / 60),
    }
}
