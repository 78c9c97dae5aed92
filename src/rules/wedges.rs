//! How far a back leaner may lean for wedges alone. It computes no force on a wedge.

use super::{Facts, Found, Rule, cite, long, turn};
use crate::parts::RuleSet;
use crate::source::Mark;
use crate::units::Length;

/// The rules of this family.
pub(super) const RULES: &[Rule] = &[Rule::us_logging(
    "LOG-40",
    (
        "back lean within reach of wedges",
        "Published guidance has a table of the largest back lean, measured at the top, that two inches of wedging lift over, by height over diameter. Past it, or on a stem stouter than the table's first row, wedges alone do not bring the tree over its lay: it takes a line.",
    ),
    cite("29 CFR 1910.266(h)(2)(ii)", Mark::Opened),
    back_lean,
)];

fn back_lean(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let units = facts.plan.units;
    let mut found = vec![];
    for tree in facts.trees().filter(|t| t.tree.line.is_none()) {
        let (Some((lean, toward)), Some(lay), Some(height)) =
            (tree.lean(), &tree.tree.lay, tree.height())
        else {
            continue;
        };
        if lean < set.figures.lean_that_counts.value {
            continue;
        }
        let off = turn(lay.value, toward);
        let back = -libm::cos(off.value()) * libm::tan(lean.value()) * height.value();
        if back <= 0.0 || off.in_deg() <= 90.0 {
            continue;
        }
        let back = Length::m(back);
        let diameter = tree.tree.dbh.as_ref().unwrap_or(&tree.tree.stump).value();
        let most = set.wedges.back_lean_most(height / diameter);
        if most.is_some_and(|most| back <= most) {
            continue;
        }
        let limit = most.map_or("the table has no row for so stout a stem".to_owned(), |m| {
            format!("wedges alone reach {}", long(units, m))
        });
        found.push(Found::stop(
            (lay.place, format!("{}.lay", tree.tree.route)),
            format!(
                "the top leans {} back from the lay; {limit}",
                long(units, back)
            ),
            "set a line and add `line: {height: …, anchor: […]}`, or lay the tree with its lean",
        ));
    }
    found
}
