//! The site against itself: sawyers in each other's way, lines without voltage, trees without a
//! position. Distances to others are published rules and stand in the room `rules`.

use super::look::{Look, within};
use crate::plan::FeatureKind;
use crate::rules::{Found, TreeFacts};

type Coded = Vec<(&'static str, Found)>;

/// Nobody comes nearer to a tree being felled than this many of its lengths (29 CFR
/// 1910.266(h)(1)(iv), read in a citation that restates it).
const RING_TREE_LENGTHS: f64 = 2.0;

/// Two sawyers who may fell within each other's rings at the same time.
pub(super) fn two_sawyers(look: &Look<'_>) -> Coded {
    let trees = look.trees();
    let mut found = vec![];
    for (index, tree) in trees.iter().enumerate() {
        let Some(sawyer) = &tree.tree.sawyer else {
            continue;
        };
        let others: Vec<&str> = trees
            .iter()
            .enumerate()
            .take(index)
            .filter(|(other, _)| !look.facts.order.is_ordered(*other, index))
            .filter(|(_, other)| {
                let theirs = other.tree.sawyer.as_ref();
                theirs.is_some_and(|id| id.value != sawyer.value) && is_near(tree, other)
            })
            .map(|(_, other)| other.tree.id.value.as_str())
            .take(3)
            .collect();
        let Some(first) = others.first() else {
            continue;
        };
        let message = format!(
            "{} and {} have two sawyers within two tree lengths and no order",
            others.join(", "),
            tree.tree.id.value
        );
        let help = format!("add `after: [{first}]`, or give both to one sawyer");
        let at = within(sawyer.place, &tree.tree.route, "after");
        found.push(("JOB-30", Found::stop(at, message, &help)));
    }
    found
}

fn is_near(one: &TreeFacts<'_>, other: &TreeFacts<'_>) -> bool {
    let distance = one.spot().zip(other.spot()).map(|(a, b)| a.to(b));
    let height = match (one.height(), other.height()) {
        (Some(a), Some(b)) => Some(a.max(b)),
        (a, b) => a.or(b),
    };
    let ring = height.map(|h| h * RING_TREE_LENGTHS);
    distance.zip(ring).is_some_and(|(d, r)| d < r)
}

/// A power line whose voltage nobody wrote.
pub(super) fn no_voltage(look: &Look<'_>) -> Coded {
    let features = look.plan().site.features.iter();
    features
        .filter(|f| f.kind.value == FeatureKind::PowerLine && f.voltage.is_none())
        .map(|feature| {
            let message = format!("the power line `{}` has no voltage", feature.id.value);
            let at = within(feature.id.place, &feature.route, "voltage");
            let help =
                "ask the line's owner and add `voltage: 12.5 kV`; until then no distance is enough";
            ("JOB-31", Found::stop(at, message, help))
        })
        .collect()
}

/// Trees whose distances to anything nobody can say.
pub(super) fn no_position(look: &Look<'_>) -> Coded {
    let plan = look.plan();
    if plan.site.features.is_empty() && plan.trees.len() < 2 {
        return vec![];
    }
    look.trees()
        .iter()
        .filter(|tree| tree.tree.at.is_none())
        .map(|tree| {
            let message = format!(
                "{} has no position, so no distance to it was looked at",
                tree.tree.id.value
            );
            let help = "add `at: [12 m, -4 m]`: east and north of the plan's origin";
            ("JOB-32", Found::caution(tree.at("at"), message, help))
        })
        .collect()
}
