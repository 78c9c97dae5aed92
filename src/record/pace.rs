//! What the stamps say about time: the laptop's word against the machine's own running clock.
//! It never says a time is true; only things outside the laptop bracket it.

use super::chain::Standing;
use super::line::Stamp;

/// A wall clock and a running clock may part by this much and still be the same clock.
/// Source: our judgement, two seconds for a correction at start.
const APART_MS: i64 = 2_000;
/// Slewing of the wall clock in parts per million. Source: from memory, common time services slew
/// by at most 500 ppm; 600 leaves a little.
const SLEW_PPM: i64 = 600;
/// A recorded clock step may differ from the observed one by this much. Source: our judgement.
const TOLD_MS: i64 = 1_000;

/// The notes on time.
pub fn notes(lines: &[Standing]) -> Vec<String> {
    let mut notes = Vec::new();
    let mut last: Option<Stamp> = None;
    let mut first: Option<Stamp> = None;
    let (mut steps, mut restarts, mut apart_max) = (0_u32, 0_u32, 0_i64);
    for standing in lines {
        let Some((line, stamp)) = standing.line.as_ref().and_then(|l| Some((l, l.stamp?))) else {
            continue;
        };
        first.get_or_insert(stamp);
        if let Some(before) = last {
            if before.boot != stamp.boot {
                restarts += 1;
            } else {
                let (moved, allowed) = apart(&before, &stamp);
                if stamp.up_ms < before.up_ms {
                    notes.push(format!(
                        "entry {}: the machine's own clock runs backwards within one start",
                        standing.entry
                    ));
                } else if moved.abs() > allowed {
                    steps += 1;
                    let told = line
                        .members
                        .get("moved_ms")
                        .and_then(serde_json::Value::as_i64);
                    let told = told.filter(|_| line.kind == "clock_step");
                    notes.push(step_note(standing.entry, moved, told));
                } else {
                    apart_max = apart_max.max(moved.abs());
                }
            }
        }
        last = Some(stamp);
    }
    if let (Some(first), Some(last)) = (first, last) {
        notes.push(format!(
            "times from {} to {} are this laptop's word; within one start of the machine they keep \
             to its own clock within {} s; clock steps: {steps}, restarts: {restarts}",
            first.utc(),
            last.utc(),
            seconds(apart_max)
        ));
    }
    notes
}

fn apart(before: &Stamp, now: &Stamp) -> (i64, i64) {
    let up = now.up_ms.saturating_sub(before.up_ms);
    let wall = now.utc_ms.saturating_sub(before.utc_ms);
    (
        wall.saturating_sub(up),
        APART_MS + up.saturating_abs() / 1_000_000 * SLEW_PPM + SLEW_PPM,
    )
}

fn step_note(entry: u64, moved: i64, told: Option<i64>) -> String {
    let recorded = match told {
        Some(told) if (told - moved).abs() <= TOLD_MS => "recorded",
        Some(_) => "recorded with another amount",
        None => "not recorded",
    };
    format!(
        "entry {entry}: the wall clock was moved by {} s ({recorded})",
        seconds(moved)
    )
}

fn seconds(ms: i64) -> String {
    let sign = if ms < 0 { "-" } else { "" };
    format!("{sign}{}.{:03}", ms.abs() / 1000, ms.abs() % 1000)
}
