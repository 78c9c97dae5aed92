//! Ways out: there, cleared, diagonal, long enough, not under the lean, quick enough. It walks
//! none of them.

use super::{Facts, Found, Rule, TreeFacts, cite, degrees, long, turn};
use crate::diagnostic::Place;
use crate::parts::RuleSet;
use crate::plan::WayOut;
use crate::source::Mark;
use crate::units::Angle;

const PARAGRAPH: &str = "29 CFR 1910.266(h)(2)(i)";

/// The rules of this family.
pub(super) const RULES: &[Rule] = &[
    Rule::us_logging(
        "LOG-15",
        (
            "way out planned and cleared",
            "Before felling starts, the sawyer plans a way out and clears it. Most of those hurt at the stump had not left it.",
        ),
        cite(PARAGRAPH, Mark::Memory),
        cleared,
    ),
    Rule::us_logging(
        "LOG-16",
        (
            "way out diagonal to the lay",
            "The way out leads diagonally away from the line of the fall: 45 degrees behind either side, which is 135 degrees from the lay. Straight behind is where a butt kicks back to. A way into the lay's own half is found by the plan's own check.",
        ),
        cite(PARAGRAPH, Mark::Opened),
        bearing,
    ),
    Rule::us_logging(
        "LOG-17",
        (
            "way out long enough",
            "Published guidance has 20 feet as the least distance, walked at once and without turning one's back; a standing tree to step behind is better still.",
        ),
        cite(PARAGRAPH, Mark::Opened),
        length,
    ),
    Rule::us_logging(
        "LOG-18",
        (
            "way out not under the lean",
            "A tree that leaves its lay goes where its weight is. A way out towards that side leads under it.",
        ),
        cite(PARAGRAPH, Mark::Judgement),
        under_lean,
    ),
    Rule::us_logging(
        "LOG-19",
        (
            "time to leave",
            "The size-up gives the shortest time of the fall and the time needed on the fastest way out. Where leaving takes longer, it must begin with the first movement, and nobody stays to look.",
        ),
        cite(PARAGRAPH, Mark::Derived),
        time,
    ),
];

fn is_cleared(way: &WayOut) -> bool {
    way.cleared.as_ref().is_some_and(|c| c.value)
}

fn at(way: &WayOut, place: Place, key: &str) -> (Place, String) {
    (place, format!("{}.{key}", way.route))
}

fn cleared(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees() {
        let ways = &tree.tree.ways_out;
        if !ways.iter().any(is_cleared) {
            let message = if ways.is_empty() {
                format!("{} has no way out", tree.tree.id.value)
            } else {
                format!("no way out of {} is cleared", tree.tree.id.value)
            };
            found.push(Found::stop(
                tree.at("ways_out"),
                message,
                "plan two ways out at 135 deg from the lay, clear them, and write `cleared: true`",
            ));
            continue;
        }
        for way in ways.iter().filter(|way| !is_cleared(way)) {
            let place = way.cleared.as_ref().map_or(way.id.place, |c| c.place);
            found.push(Found::caution(
                at(way, place, "cleared"),
                format!("way out {} is not cleared", way.id.value),
                "clear it and write `cleared: true`, or take it out of the plan",
            ));
        }
    }
    found
}

/// Each way out of each tree that has a lay.
fn each_with_lay<'a>(
    facts: &Facts<'a>,
) -> impl Iterator<Item = (TreeFacts<'a>, &'a WayOut, Angle)> {
    let trees: Vec<TreeFacts<'a>> = facts.trees().collect();
    trees.into_iter().flat_map(|tree| {
        let lay = tree.tree.lay.as_ref();
        let ways = tree.tree.ways_out.iter();
        lay.into_iter()
            .flat_map(move |lay| {
                ways.clone()
                    .map(move |way| (way, turn(lay.value, way.bearing.value)))
            })
            .map(move |(way, off)| (tree, way, off))
    })
}

fn bearing(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let (wanted, room) = (
        set.figures.way_out_turn.value.in_deg(),
        set.figures.way_out_tolerance.value.in_deg(),
    );
    let mut found = vec![];
    for (_, way, off) in each_with_lay(facts) {
        // Compared in tenths of a degree. The lay's own half is the plan's own contradiction.
        let off_tenths = (off.in_deg() * 10.0).round() / 10.0;
        if off_tenths < 90.0 || (off_tenths - wanted).abs() <= room {
            continue;
        }
        let whereabouts = if off_tenths > wanted {
            "too near to straight behind"
        } else {
            "too near to the side"
        };
        found.push(Found::stop(
            at(way, way.bearing.place, "bearing"),
            format!(
                "way out {} leads {} from the lay, {whereabouts}",
                way.id.value,
                degrees(off)
            ),
            &format!(
                "turn it to {wanted:.0} deg from the lay on either side, within {room:.0} deg"
            ),
        ));
    }
    found
}

fn length(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let least = set.figures.way_out_length.value;
    let mut found = vec![];
    for tree in facts.trees() {
        for way in &tree.tree.ways_out {
            // To the nearest millimetre.
            if (way.length.value().in_mm()).round() >= least.in_mm().round() {
                continue;
            }
            let units = facts.plan.units;
            found.push(Found::stop(
                at(way, way.length.place, "length"),
                format!(
                    "way out {} is {} long; at least {} is wanted",
                    way.id.value,
                    long(units, way.length.value()),
                    long(units, least)
                ),
                "clear it further, or choose one that is long enough",
            ));
        }
    }
    found
}

fn under_lean(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let figures = &set.figures;
    let mut found = vec![];
    for (tree, way, off_lay) in each_with_lay(facts) {
        let Some((lean, toward)) = tree.lean() else {
            continue;
        };
        let off = turn(way.bearing.value, toward);
        let counts = lean >= figures.lean_that_counts.value && off_lay.in_deg() >= 90.0;
        if counts && off < figures.way_out_off_lean.value {
            found.push(Found::caution(
                at(way, way.bearing.place, "bearing"),
                format!(
                    "way out {} leads under the side the tree leans to, {} away from it",
                    way.id.value,
                    degrees(off)
                ),
                "leave by the other side, or change the lay",
            ));
        }
    }
    found
}

fn time(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees() {
        let times = tree
            .size_up
            .and_then(|s| s.escape_seconds.zip(s.fall_seconds));
        if let Some((escape, fall)) = times
            && escape > fall
        {
            found.push(Found::note(
                tree.at("ways_out"),
                format!(
                    "leaving takes {:.1} s on the fastest way out; the shortest fall takes {:.1} s",
                    escape.value(),
                    fall.value()
                ),
                "leave with the first movement; clear the way out better, or stand where a tree covers you",
            ));
        }
    }
    found
}
