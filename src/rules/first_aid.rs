//! First aid: who can give it and where the kits are. It does not look into a kit.

use chrono::NaiveDate;

use super::{Facts, Found, Rule, cite};
use crate::parts::{KitPlace, RuleSet};
use crate::plan::{Person, Spanned};
use crate::source::Mark;

/// The rules of this family.
pub(super) const RULES: &[Rule] = &[
    Rule::us_logging(
        "LOG-01",
        (
            "first aid current",
            "Everyone on a logging job, supervisors too, has first-aid training that is valid on the day. Help from outside is far away, so the person beside the casualty is the first aider.",
        ),
        cite("29 CFR 1910.266(i)(7)", Mark::Opened),
        first_aid,
    ),
    Rule::us_logging(
        "LOG-02",
        (
            "CPR current",
            "Everyone on a logging job has CPR training that is valid on the day.",
        ),
        cite("29 CFR 1910.266(i)(7)", Mark::Opened),
        cpr,
    ),
    Rule::us_logging(
        "LOG-03",
        (
            "first-aid kits at each place",
            "A kit is at each place where trees are cut, at each active landing and in each vehicle that carries the crew. The check reads the places named under `emergency.kits` and looks for a word of each kind.",
        ),
        cite("29 CFR 1910.266(d)(2)(i)", Mark::Opened),
        kits,
    ),
    Rule::us_logging(
        "LOG-04",
        (
            "first aiders named",
            "Everyone is trained, and somebody is named who sees to it: in the first minute nobody should have to ask who goes.",
        ),
        cite("29 CFR 1910.266(i)(7)", Mark::Derived),
        first_aiders,
    ),
];

fn first_aid(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let of = |person: &Person| person.first_aid_until.clone();
    current(facts, ("first aid", "first_aid_until"), of)
}

fn cpr(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let of = |person: &Person| person.cpr_until.clone();
    current(facts, ("CPR", "cpr_until"), of)
}

fn current(
    facts: &Facts<'_>,
    (what, key): (&str, &str),
    of: impl Fn(&Person) -> Option<Spanned<NaiveDate>>,
) -> Vec<Found> {
    let mut found = vec![];
    for person in &facts.plan.crew {
        let name = &person.name.value;
        let path = format!("{}.{key}", person.route);
        match (of(person), facts.date) {
            (None, _) => found.push(Found::stop(
                (person.id.place, path),
                format!("no date says until when {name}'s {what} training is valid"),
                &format!("add `{key}: year-month-day` from the certificate"),
            )),
            (Some(until), Some(date)) if until.value < date => found.push(Found::stop(
                (until.place, path),
                format!("{name}'s {what} training ran out before the job's day, {date}"),
                "renew it before the day, or plan without this person",
            )),
            (Some(_), Some(_) | None) => {}
        }
    }
    found
}

fn kits(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let plan = facts.plan;
    let (place, kits) = plan
        .emergency
        .as_ref()
        .map_or((plan.place, [].as_slice()), |e| (e.place, &e.kits));
    let there = |wanted: &KitPlace| {
        kits.iter().any(|kit| {
            let kit = kit.value.to_lowercase();
            wanted.words.iter().any(|word| kit.contains(word.as_str()))
        })
    };
    let needed = |wanted: &&KitPlace| {
        wanted.feature.as_ref().is_none_or(|kind| {
            let features = &plan.site.features;
            features.iter().any(|f| f.kind.value.word() == kind)
        })
    };
    let missing: Vec<&str> = set
        .kits
        .iter()
        .filter(needed)
        .filter(|wanted| !there(wanted))
        .map(|wanted| wanted.place.as_str())
        .collect();
    if missing.is_empty() {
        return vec![];
    }
    let message = format!("no first-aid kit is named for: {}", missing.join(", "));
    vec![Found::stop(
        (place, "emergency.kits".to_owned()),
        message,
        "name the places, such as `kits: [cutting site, truck, landing]`, and put the kits there",
    )]
}

fn first_aiders(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let plan = facts.plan;
    let emergency = plan.emergency.as_ref();
    if emergency.is_some_and(|e| !e.first_aiders.is_empty()) {
        return vec![];
    }
    vec![Found::stop(
        (
            emergency.map_or(plan.place, |e| e.place),
            "emergency.first_aiders".to_owned(),
        ),
        "no first aider is named".to_owned(),
        "add `first_aiders: [id]` with the ids of those who go to a casualty",
    )]
}
