//! The supervisor's approval of unusually hazardous trees. It gives none itself.

use super::{Facts, Found, Rule, TreeFacts, cite, degrees, long, short, turn};
use crate::parts::RuleSet;
use crate::plan::step::MethodName;
use crate::source::Mark;

const PARAGRAPH: &str = "29 CFR 1910.266(h)(1)(ii)";

/// The rules of this family.
pub(super) const RULES: &[Rule] = &[
    Rule::us_logging(
        "LOG-24",
        (
            "supervisor's approval",
            "Before cutting starts in unfamiliar or unusually hazardous conditions the supervisor is consulted and approves. Among them are a lean that makes the wanted direction hard to reach, very large and very tall trees, and trees of doubtful soundness. Where a lean becomes heavy is our own figure: no source gives degrees.",
        ),
        cite(PARAGRAPH, Mark::Opened),
        approved,
    ),
    Rule::us_logging(
        "LOG-25",
        (
            "approval by somebody else",
            "The approval is a second look at the sawyer's own judgement, so it does not come from the sawyer.",
        ),
        cite(PARAGRAPH, Mark::Judgement),
        by_another,
    ),
];

fn approved(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees().filter(|t| t.tree.approval.is_none()) {
        let reasons = reasons(facts, set, &tree);
        if !reasons.is_empty() {
            found.push(Found::stop(
                tree.at("approval"),
                format!(
                    "{} needs the supervisor's approval: {}",
                    tree.tree.id.value,
                    reasons.join(", ")
                ),
                "ask before the day, and add `approval: id` of whoever approved",
            ));
        }
    }
    found
}

/// What makes a tree unusually hazardous, each in a few words.
fn reasons(facts: &Facts<'_>, set: &RuleSet, tree: &TreeFacts<'_>) -> Vec<String> {
    let (figures, units) = (&set.figures, facts.plan.units);
    let mut reasons = vec![];
    if let Some((lean, toward)) = tree.lean() {
        let against = tree
            .tree
            .lay
            .as_ref()
            .is_some_and(|lay| turn(lay.value, toward).in_deg() > 90.0);
        if lean >= figures.heavy_lean.value {
            reasons.push(format!("it leans {}", degrees(lean)));
        } else if lean >= figures.lean_that_counts.value && against {
            reasons.push("it leans away from its lay".to_owned());
        }
    }
    if tree.is_danger_tree() {
        reasons.push(format!("it is {}", tree.danger()));
    }
    if tree.tree.stump.value() >= figures.large_stump.value {
        reasons.push(format!(
            "its stump has {}",
            short(units, tree.tree.stump.value())
        ));
    }
    if let Some(height) = tree.height().filter(|h| *h >= figures.tall_tree.value) {
        reasons.push(format!("it is {} tall", long(units, height)));
    }
    let method = tree.tree.method.as_ref().map(|m| m.value);
    if method.or(tree.size_up.and_then(|s| s.method)) == Some(MethodName::RiggedBackCut) {
        reasons.push("it is pulled over".to_owned());
    }
    reasons
}

fn by_another(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees() {
        let (Some(approval), Some(sawyer)) = (&tree.tree.approval, &tree.tree.sawyer) else {
            continue;
        };
        if approval.value == sawyer.value {
            found.push(Found::stop(
                (approval.place, format!("{}.approval", tree.tree.route)),
                format!("`{}` fells this tree and approves it", approval.value),
                "have somebody else look at the tree and approve it",
            ));
        }
    }
    found
}
