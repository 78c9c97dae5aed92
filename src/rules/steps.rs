//! Steps written by hand: what stands before the first cut and after the last. Steps left to the
//! size-up have both.

use super::face::steps_at;
use super::{Facts, Found, Rule, cite};
use crate::parts::RuleSet;
use crate::plan::step::{StepAct, Task};
use crate::source::Mark;

/// The rules of this family.
pub(super) const RULES: &[Rule] = &[
    Rule::us_logging(
        "LOG-38",
        (
            "cleared before the first cut",
            "Brush and obstacles are cleared from the place of the cut and from the ways out before felling. Steps written by hand have it as a step.",
        ),
        cite("29 CFR 1910.266(e)(2)(xi)", Mark::Opened),
        clear,
    ),
    Rule::us_logging(
        "LOG-39",
        (
            "retreat after the last cut",
            "As soon as the last cut is made the sawyer leaves by the way out. Steps written by hand end with it.",
        ),
        cite("29 CFR 1910.266(h)(2)(i)", Mark::Memory),
        retreat,
    ),
];

fn clear(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    look(facts, |acts| {
        let first_cut = acts.iter().position(is_cut)?;
        let cleared = acts
            .iter()
            .take(first_cut)
            .any(|act| **act == StepAct::Do(Task::Clear));
        (!cleared).then_some((
            "no step clears the stump and the ways out before the first cut",
            "begin with `do: clear`",
        ))
    })
}

fn retreat(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    look(facts, |acts| {
        let last_cut = acts.iter().rposition(is_cut)?;
        let left = acts
            .iter()
            .skip(last_cut)
            .any(|act| **act == StepAct::Do(Task::Retreat));
        (!left).then_some((
            "no step leads away from the stump after the last cut",
            "end with `do: retreat`",
        ))
    })
}

fn is_cut(act: &&StepAct) -> bool {
    matches!(act, StepAct::Cut(_))
}

fn look(
    facts: &Facts<'_>,
    wrong: impl Fn(&[&StepAct]) -> Option<(&'static str, &'static str)>,
) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees() {
        let Some(steps) = &tree.tree.steps else {
            continue;
        };
        let acts: Vec<&StepAct> = steps.iter().map(|s| &s.value.act).collect();
        if let Some((message, help)) = wrong(&acts) {
            found.push(Found::caution(steps_at(&tree), message.to_owned(), help));
        }
    }
    found
}
