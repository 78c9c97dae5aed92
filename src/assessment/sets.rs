//! The rule sets a plan names. It takes no set for another.

use super::look::Look;
use crate::parts::Parts;
use crate::plan::nearest;
use crate::rules::{self, Found};

type Coded = Vec<(&'static str, Found)>;

/// Sets that there are none of.
pub(super) fn unknown_set(look: &Look<'_>) -> Coded {
    let known = &look.ground.parts.rule_sets;
    let mut found = vec![];
    for (index, named) in look.plan().job.rules.iter().enumerate() {
        if known.contains_key(&named.value) {
            continue;
        }
        let names: Vec<&str> = known.keys().map(String::as_str).collect();
        let help = match nearest(&named.value, names.iter().copied()) {
            Some(near) => format!("did you mean `{near}`?"),
            None => format!("rule sets: {}", names.join(", ")),
        };
        let message = format!("there is no rule set `{}`", named.value);
        let at = (named.place, format!("job.rules[{index}]"));
        found.push(("JOB-07", Found::stop(at, message, &help)));
    }
    found
}

/// No set at all.
pub(super) fn no_set(look: &Look<'_>) -> Coded {
    let plan = look.plan();
    if !plan.job.rules.is_empty() {
        return vec![];
    }
    let names: Vec<&str> = look
        .ground
        .parts
        .rule_sets
        .keys()
        .map(String::as_str)
        .collect();
    let message = "no rule set is named, so no published rule was looked at".to_owned();
    let help = format!("add `rules: [{}]` to the job", names.join(", "));
    let at = (plan.job.name.place, "job.rules".to_owned());
    vec![("JOB-08", Found::caution(at, message, &help))]
}

/// A set from the plan's own folder that names rules there are none of.
pub(super) fn unknown_rules(look: &Look<'_>) -> Coded {
    each_named(look, |name| {
        let set = look.ground.parts.rule_sets.get(name)?;
        let unknown = rules::unknown_codes(set);
        (!unknown.is_empty()).then(|| {
            let message = format!(
                "the rule set `{name}` switches on rules that this program does not have: {}",
                unknown.join(", ")
            );
            (message, "correct the codes in the parts folder's rule set")
        })
    })
    .into_iter()
    .map(|(at, (message, help))| ("JOB-09", Found::stop(at, message, help)))
    .collect()
}

/// A set from the plan's own folder in the place of a built-in one.
pub(super) fn replaced_set(look: &Look<'_>) -> Coded {
    let built_in = Parts::built_in().hashes;
    each_named(look, |name| {
        let part = format!("rules/{name}.yaml");
        let ours = built_in.get(&part)?;
        let used = look.ground.parts.hashes.get(&part)?;
        (ours != used).then(|| {
            let message = format!("the rule set `{name}` is the parts folder's own");
            (message, "look at what it changes before you rely on it")
        })
    })
    .into_iter()
    .map(|(at, (message, help))| ("JOB-10", Found::note(at, message, help)))
    .collect()
}

type At = (crate::diagnostic::Place, String);

fn each_named<T>(look: &Look<'_>, wrong: impl Fn(&str) -> Option<T>) -> Vec<(At, T)> {
    let named = look.plan().job.rules.iter().enumerate();
    named
        .filter_map(|(index, set)| {
            let at = (set.place, format!("job.rules[{index}]"));
            wrong(&set.value).map(|words| (at, words))
        })
        .collect()
}
