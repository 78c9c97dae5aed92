//! Who may do what: training, supervision, the sawyer's own limit. It judges no one's skill.

use super::{Facts, Found, Rule, cite, short};
use crate::parts::RuleSet;
use crate::plan::{Person, Role, Spanned, Tree};
use crate::source::Mark;

/// The rules of this family.
pub(super) const RULES: &[Rule] = &[
    Rule::us_logging(
        "LOG-12",
        (
            "training recorded",
            "Training is certified in writing, with name and date, before the work it is for. A sawyer without a date stops the plan; for others it is looked at.",
        ),
        cite("29 CFR 1910.266(i)(10)", Mark::Opened),
        recorded,
    ),
    Rule::us_logging(
        "LOG-13",
        (
            "trainee under supervision",
            "A new or retrained person works under the close eye of someone who knows the work. A tree whose sawyer is a trainee has somebody else's approval.",
        ),
        cite("29 CFR 1910.266(i)(6)", Mark::Memory),
        trainee,
    ),
    Rule::us_logging(
        "LOG-14",
        (
            "tree within the sawyer's limit",
            "A duty goes to someone with the knowledge, training and experience for it. The plan says up to which stump each sawyer fells, and no tree is larger.",
        ),
        cite("29 CFR 1910.266(c), designated person", Mark::Opened),
        limit,
    ),
];

fn person<'a>(facts: &Facts<'a>, id: &Spanned<String>) -> Option<&'a Person> {
    facts.plan.crew.iter().find(|p| p.id.value == id.value)
}

fn sawyer<'a>(facts: &Facts<'a>, tree: &Tree) -> Option<&'a Person> {
    tree.sawyer.as_ref().and_then(|id| person(facts, id))
}

fn has_role(person: &Person, role: Role) -> bool {
    person.roles.iter().any(|r| r.value == role)
}

fn recorded(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for person in facts.plan.crew.iter().filter(|p| p.trained.is_empty()) {
        let at = (person.id.place, format!("{}.trained", person.route));
        let message = format!("no training of {} is recorded", person.name.value);
        let help = "add `trained: {leaning-trees: year-month-day}` from the certificate";
        found.push(if has_role(person, Role::Sawyer) {
            Found::stop(at, message, help)
        } else {
            Found::caution(at, message, help)
        });
    }
    found
}

fn trainee(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees() {
        let Some(sawyer) = sawyer(facts, tree.tree) else {
            continue;
        };
        let approver = tree.tree.approval.as_ref();
        let by_another = approver.is_some_and(|id| id.value != sawyer.id.value);
        if has_role(sawyer, Role::Trainee) && !by_another {
            found.push(Found::stop(
                tree.at("approval"),
                format!(
                    "{} is a trainee and fells {} without anyone who supervises",
                    sawyer.name.value, tree.tree.id.value
                ),
                "add `approval: id` of the person who stands by, or give the tree to another sawyer",
            ));
        }
    }
    found
}

fn limit(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let units = facts.plan.units;
    let mut found = vec![];
    for tree in facts.trees() {
        let Some(sawyer) = sawyer(facts, tree.tree) else {
            continue;
        };
        let across = tree.tree.stump_across.as_ref();
        let stump = across.map_or(tree.tree.stump.value(), |across| {
            across.value().max(tree.tree.stump.value())
        });
        match &sawyer.fells_up_to {
            Some(most) if stump > most.value() => {
                let path = format!("{}.sawyer", tree.tree.route);
                let place = tree
                    .tree
                    .sawyer
                    .as_ref()
                    .map_or(tree.tree.id.place, |s| s.place);
                let message = format!(
                    "{} fells up to {}; this stump has {}",
                    sawyer.name.value,
                    short(units, most.value()),
                    short(units, stump)
                );
                let help = "give the tree to a sawyer whose limit it is within";
                found.push(Found::stop((place, path), message, help));
            }
            Some(_) | None => {}
        }
    }
    for person in &facts.plan.crew {
        if has_role(person, Role::Sawyer) && person.fells_up_to.is_none() {
            found.push(Found::caution(
                (person.id.place, format!("{}.fells_up_to", person.route)),
                format!("nothing says up to which stump {} fells", person.name.value),
                "add `fells_up_to: 70 cm`, or what the training covers",
            ));
        }
    }
    found
}
