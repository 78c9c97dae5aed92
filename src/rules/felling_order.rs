//! The order of felling: no tree onto another that stands, and uphill of what lies. It makes up no
//! order of its own.

use super::positions::sector;
use super::{Facts, Found, Rule, TreeFacts, cite};
use crate::parts::RuleSet;
use crate::source::Mark;

/// The rules of this family.
pub(super) const RULES: &[Rule] = &[
    Rule::us_logging(
        "LOG-28",
        (
            "no tree onto another that stands",
            "Cutting several trees part through and knocking them over with another is forbidden. A plan that lays a tree where another of its trees still stands ends there, with a tree pushed, hung or sprung. Which tree is down first is read from `after`.",
        ),
        cite("29 CFR 1910.266(h)(1)(ix)", Mark::Opened),
        onto_another,
    ),
    Rule::us_logging(
        "LOG-29",
        (
            "uphill of what is felled",
            "On a slope where stems roll or slide, a tree is cut uphill of or level with those already felled, so that nobody works below them. Trees near each other have an order written.",
        ),
        cite("29 CFR 1910.266(h)(1)(viii)", Mark::Memory),
        uphill,
    ),
];

fn onto_another(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let trees: Vec<TreeFacts<'_>> = facts.trees().collect();
    let mut found = vec![];
    for (index, tree) in trees.iter().enumerate() {
        let (Some(lay), Some(spot), Some(sector)) =
            (&tree.tree.lay, tree.spot(), sector(tree, set))
        else {
            continue;
        };
        let struck: Vec<&str> = trees
            .iter()
            .enumerate()
            .filter(|(other, _)| *other != index && !facts.order.is_before(*other, index))
            .filter(|(_, other)| other.spot().is_some_and(|at| spot.meets_spot(at, &sector)))
            .map(|(_, other)| other.tree.id.value.as_str())
            .collect();
        let Some(first) = struck.first() else {
            continue;
        };
        found.push(Found::stop(
            (lay.place, format!("{}.lay", tree.tree.route)),
            format!(
                "{} may come down on what still stands: {}",
                tree.tree.id.value,
                some(&struck)
            ),
            &format!("turn the lay, or fell the other first: `after: [{first}]`"),
        ));
    }
    found
}

fn uphill(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let figures = &set.figures;
    let slope = facts.plan.site.slope.as_ref();
    let Some(slope) = slope.filter(|s| s.angle.value() >= figures.roll_slope.value) else {
        return vec![];
    };
    let trees: Vec<TreeFacts<'_>> = facts.trees().collect();
    let mut found = vec![];
    for (index, tree) in trees.iter().enumerate() {
        let (Some(spot), Some(height)) = (tree.spot(), tree.height()) else {
            continue;
        };
        let (mut above, mut loose) = (vec![], vec![]);
        for (other_index, other) in trees.iter().enumerate() {
            let Some(at) = other.spot().filter(|_| other_index != index) else {
                continue;
            };
            let higher = at.above(spot, slope.downhill.value, slope.angle.value());
            let near = spot.to(at) <= height * figures.ring_tree_lengths_on_slope.value;
            if !near || higher <= figures.level_tolerance.value {
                continue;
            }
            if facts.order.is_before(other_index, index) {
                above.push(other.tree.id.value.as_str());
            } else if !facts.order.is_ordered(other_index, index) {
                loose.push(other.tree.id.value.as_str());
            }
        }
        if !above.is_empty() {
            found.push(Found::stop(
                tree.at("after"),
                format!(
                    "{} is felled below what lies already: {}",
                    tree.tree.id.value,
                    some(&above)
                ),
                "fell the lower tree first: turn the order in `after` round",
            ));
        }
        if let Some(first) = loose.first() {
            found.push(Found::caution(
                tree.at("after"),
                format!(
                    "no order is written between {} and what stands above it: {}",
                    tree.tree.id.value,
                    some(&loose)
                ),
                &format!(
                    "fell the lower tree first: give `{first}` an `after: [{}]`",
                    tree.tree.id.value
                ),
            ));
        }
    }
    found
}

/// Up to three names, and how many more.
fn some(names: &[&str]) -> String {
    let shown = names.iter().take(3).copied().collect::<Vec<_>>().join(", ");
    match names.len().saturating_sub(3) {
        0 => shown,
        more => format!("{shown} and {more} more"),
    }
}
