//! Danger trees: dealt with first, and looked over. It finds no danger that nobody wrote down.

use super::{Facts, Found, Rule, TreeFacts, cite, long};
use crate::parts::RuleSet;
use crate::source::Mark;

/// The rules of this family.
pub(super) const RULES: &[Rule] = &[
    Rule::us_logging(
        "LOG-26",
        (
            "danger trees dealt with first",
            "A dead, split, hung or decayed tree is felled first, or marked and kept away from: nobody works within two tree lengths of it meanwhile. In a plan that means: trees within two of its lengths come `after` it.",
        ),
        cite("29 CFR 1910.266(h)(1)(vi)", Mark::Opened),
        first,
    ),
    Rule::us_logging(
        "LOG-27",
        (
            "danger tree looked over",
            "Before a danger tree is felled it is looked over for loose bark, broken limbs and other damage, and what can come down is removed or kept away from. The plan has a hazard with its control for it.",
        ),
        cite("29 CFR 1910.266(h)(1)(vii)", Mark::Opened),
        looked_over,
    ),
];

fn first(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let lengths = set.figures.danger_tree_lengths.value;
    let trees: Vec<TreeFacts<'_>> = facts.trees().collect();
    let mut found = vec![];
    for (index, tree) in trees.iter().enumerate() {
        let near = trees.iter().enumerate().find(|(other, danger)| {
            // Of two danger trees either may be first; the later in the plan is asked to wait.
            let first_itself =
                tree.is_danger_tree() && (facts.order.is_before(index, *other) || index < *other);
            let waits = facts.order.is_before(*other, index) || first_itself;
            *other != index && danger.is_danger_tree() && !waits && {
                let reach = danger.height().map(|h| h * lengths);
                let distance = tree.spot().zip(danger.spot()).map(|(a, b)| a.to(b));
                distance.zip(reach).is_some_and(|(d, r)| d < r)
            }
        });
        let Some((_, danger)) = near else {
            continue;
        };
        let distance = tree.spot().zip(danger.spot()).map(|(a, b)| a.to(b));
        let away = distance.map_or(String::new(), |d| {
            format!(", {} away,", long(facts.plan.units, d))
        });
        found.push(Found::stop(
            tree.at("after"),
            format!(
                "{}{away} is {} and still stands when {} is felled",
                danger.tree.id.value,
                danger.danger(),
                tree.tree.id.value
            ),
            &format!(
                "add `after: [{}]`, or keep two tree lengths away from it",
                danger.tree.id.value
            ),
        ));
    }
    found
}

fn looked_over(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees().filter(TreeFacts::is_danger_tree) {
        if tree.tree.hazards.is_empty() {
            found.push(Found::caution(
                tree.at("hazards"),
                format!(
                    "{} is {} and has no hazard written",
                    tree.tree.id.value,
                    tree.danger()
                ),
                "look it over for loose bark, broken limbs and damage; add `hazards: [{id: H1, what: …, control: …, owner: …}]`",
            ));
        }
    }
    found
}
