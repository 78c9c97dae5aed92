//! Who and what is named: ids that name nobody, roles that do not fit, circles in the order. It
//! corrects no name.

use std::collections::BTreeSet;

use super::look::{List, Look, within};
use crate::plan::step::StepAct;
use crate::plan::{Person, Role, Spanned};
use crate::rules::Found;

type Coded = Vec<(&'static str, Found)>;

/// Ids that name nobody and nothing.
pub(super) fn unknown_ids(look: &Look<'_>) -> Coded {
    let plan = look.plan();
    let mut found: Coded = vec![];
    found.extend(look.unknown(List::Crew, &plan.job.leader, "job.leader".to_owned()));
    if let Some(emergency) = &plan.emergency {
        for (index, id) in emergency.first_aiders.iter().enumerate() {
            let path = format!("emergency.first_aiders[{index}]");
            found.extend(look.unknown(List::Crew, id, path));
        }
        let rescue = emergency.rescue_sawyer.as_ref();
        found.extend(rescue.and_then(|id| {
            let path = "emergency.rescue_sawyer".to_owned();
            look.unknown(List::Crew, id, path)
        }));
    }
    for tree in &plan.trees {
        let named = [
            (List::Crew, "sawyer", &tree.sawyer),
            (List::Saws, "saw", &tree.saw),
            (List::Crew, "approval", &tree.approval),
        ];
        for (list, key, id) in named {
            let path = format!("{}.{key}", tree.route);
            found.extend(id.as_ref().and_then(|id| look.unknown(list, id, path)));
        }
        for (index, id) in tree.after.iter().enumerate() {
            let path = format!("{}.after[{index}]", tree.route);
            found.extend(look.unknown(List::Trees, id, path));
        }
        for hazard in &tree.hazards {
            let path = format!("{}.owner", hazard.route);
            let owner = hazard.owner.as_ref();
            found.extend(owner.and_then(|id| look.unknown(List::Crew, id, path)));
        }
        found.extend(holders(look, tree));
    }
    found
}

/// Who must say go at a hold is a role or a person.
fn holders(look: &Look<'_>, tree: &crate::plan::Tree) -> Coded {
    let mut found = vec![];
    for (index, step) in tree.steps.iter().flatten().enumerate() {
        let StepAct::Hold { who } = &step.value.act else {
            continue;
        };
        for name in who {
            if Role::ALL.iter().any(|role| role.word() == name) {
                continue;
            }
            let id = Spanned {
                value: name.clone(),
                place: step.place,
            };
            let path = format!("{}.steps[{index}].hold", tree.route);
            found.extend(look.unknown(List::Crew, &id, path));
        }
    }
    found
}

/// Trees that wait for each other in a circle; each circle once.
pub(super) fn cycles(look: &Look<'_>) -> Coded {
    let trees = &look.plan().trees;
    let order = &look.facts.order;
    let mut said = BTreeSet::new();
    let mut found = vec![];
    for (index, tree) in trees.iter().enumerate() {
        if !order.is_before(index, index) || said.contains(&index) {
            continue;
        }
        let round: Vec<usize> = (0..trees.len())
            .filter(|other| order.is_before(*other, index) && order.is_before(index, *other))
            .collect();
        let names: Vec<&str> = round
            .iter()
            .filter_map(|i| trees.get(*i))
            .map(|t| t.id.value.as_str())
            .collect();
        said.extend(round.iter().copied());
        let place = tree.after.first().map_or(tree.id.place, |id| id.place);
        let message = if let [only] = names.as_slice() {
            format!("{only} waits for itself")
        } else {
            format!("these trees wait for each other: {}", names.join(", "))
        };
        let help = "take out one `after`, so that some tree can be the first";
        let at = within(place, &tree.route, "after");
        found.push(("JOB-02", Found::stop(at, message, help)));
    }
    found
}

fn has_role(person: &Person, role: Role) -> bool {
    person.roles.iter().any(|r| r.value == role)
}

/// The leader is written as one.
pub(super) fn leader_role(look: &Look<'_>) -> Coded {
    let leader = &look.plan().job.leader;
    let Some(person) = look.person(leader).filter(|p| !has_role(p, Role::Leader)) else {
        return vec![];
    };
    if look.partial.is_spoiled(&format!("{}.roles", person.route)) {
        return vec![];
    }
    let message = format!("{} leads the job without the role", person.name.value);
    let help = "add `leader` to this person's `roles`, or name another leader";
    let at = (leader.place, "job.leader".to_owned());
    vec![("JOB-03", Found::stop(at, message, help))]
}

/// Each tree's sawyer is written as one.
pub(super) fn sawyer_role(look: &Look<'_>) -> Coded {
    let mut found = vec![];
    for tree in &look.plan().trees {
        let Some(id) = &tree.sawyer else { continue };
        let Some(person) = look.person(id).filter(|p| !has_role(p, Role::Sawyer)) else {
            continue;
        };
        if look.partial.is_spoiled(&format!("{}.roles", person.route)) {
            continue;
        }
        let message = format!("{} is no sawyer", person.name.value);
        let help = "name a sawyer, or add `sawyer` to this person's `roles`";
        let at = within(id.place, &tree.route, "sawyer");
        found.push(("JOB-04", Found::stop(at, message, help)));
    }
    found
}

/// Whoever frees a trapped sawyer is not the sawyer.
pub(super) fn rescue_sawyer(look: &Look<'_>) -> Coded {
    let plan = look.plan();
    let rescue = plan
        .emergency
        .as_ref()
        .and_then(|e| e.rescue_sawyer.as_ref());
    let Some(rescue) = rescue else { return vec![] };
    let fells = |tree: &&crate::plan::Tree| {
        let sawyer = tree.sawyer.as_ref();
        sawyer.is_some_and(|id| id.value == rescue.value)
    };
    let felled: Vec<&str> = plan
        .trees
        .iter()
        .filter(fells)
        .take(3)
        .map(|t| t.id.value.as_str())
        .collect();
    if felled.is_empty() {
        return vec![];
    }
    let message = format!(
        "`{}` is to free a trapped sawyer and fells {}",
        rescue.value,
        felled.join(", ")
    );
    let help = "name somebody else who can free a sawyer from under a tree";
    let at = (rescue.place, "emergency.rescue_sawyer".to_owned());
    vec![("JOB-05", Found::caution(at, message, help))]
}

/// Ids that stand twice where they must tell things apart.
pub(super) fn double_ids(look: &Look<'_>) -> Coded {
    let plan = look.plan();
    let mut found = vec![];
    let saws = plan.saws.iter().map(|s| (&s.id, s.route.as_str()));
    found.extend(doubles(saws, "saws"));
    let features = plan.site.features.iter();
    found.extend(doubles(
        features.map(|f| (&f.id, f.route.as_str())),
        "features",
    ));
    for tree in &plan.trees {
        let ways = tree.ways_out.iter().map(|w| (&w.id, w.route.as_str()));
        found.extend(doubles(ways, "ways out of this tree"));
        let hazards = tree.hazards.iter().map(|h| (&h.id, h.route.as_str()));
        found.extend(doubles(hazards, "hazards of this tree"));
    }
    found
}

fn doubles<'a>(ids: impl Iterator<Item = (&'a Spanned<String>, &'a str)>, among: &str) -> Coded {
    let mut seen = BTreeSet::new();
    let mut found = vec![];
    for (id, route) in ids {
        if !seen.insert(id.value.as_str()) {
            let message = format!("the id `{}` stands twice among the {among}", id.value);
            let at = within(id.place, route, "id");
            found.push((
                "JOB-06",
                Found::stop(at, message, "give each an id of its own"),
            ));
        }
    }
    found
}
