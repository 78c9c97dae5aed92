//! Signals, contact and calling for help, and the day's weather limit. It tests no radio.

use super::{Facts, Found, Rule, cite};
use crate::diagnostic::Place;
use crate::parts::RuleSet;
use crate::source::Mark;

/// The rules of this family.
pub(super) const RULES: &[Rule] = &[
    Rule::us_logging(
        "LOG-05",
        (
            "signals, with one for stop",
            "Where noise, distance or sight lines defeat speech, the crew has signals that everyone knows. Stop is the one that anyone may give, so a plan has it. The noise of a saw is no signal.",
        ),
        cite("29 CFR 1910.266(d)(7)", Mark::Opened),
        signals,
    ),
    Rule::us_logging(
        "LOG-06",
        (
            "nobody works alone",
            "Each person is in sight or hearing of another. A crew of one cannot be.",
        ),
        cite("29 CFR 1910.266(d)(6)(iii)", Mark::Memory),
        alone,
    ),
    Rule::us_logging(
        "LOG-07",
        (
            "contact made again and again",
            "Contact that is only supposed to be there is found missing too late. The plan says how often it is made.",
        ),
        cite("29 CFR 1910.266(d)(6)(iii)", Mark::Memory),
        check_in,
    ),
    Rule::us_logging(
        "LOG-08",
        (
            "number to call",
            "The plan has the number that brings help from this place.",
        ),
        cite("29 CFR 1910.266 Appendix A", Mark::Opened),
        number,
    ),
    Rule::us_logging(
        "LOG-09",
        (
            "place that can be told",
            "Whoever calls must be able to say where they are: coordinates, and directions by road for whoever comes. Without either, help does not arrive.",
        ),
        cite("29 CFR 1910.266 Appendix A", Mark::Opened),
        location,
    ),
    Rule::us_logging(
        "LOG-10",
        (
            "way to call, and a second one",
            "A radio or telephone that works at the site, and another for when it does not. An emergency plan with a dead radio is none.",
        ),
        cite("WAC 296-54-513(8)", Mark::Opened),
        channel,
    ),
    Rule::us_logging(
        "LOG-11",
        (
            "weather limit agreed",
            "Work stops when weather makes it hazardous. The rule has no figure for wind, so the crew agrees on its own before the day; without one, every gust is argued about at the stump.",
        ),
        cite("29 CFR 1910.266(d)(5)", Mark::Opened),
        weather,
    ),
];

/// The emergency plan's place, or the plan's end where there is none.
fn emergency_at(facts: &Facts<'_>, key: &str) -> (Place, String) {
    let place = facts.plan.emergency.as_ref().map(|e| e.place);
    let path = format!("emergency.{key}");
    (place.unwrap_or(facts.plan.place), path)
}

fn signals(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let signals = &facts.plan.signals;
    if signals.iter().any(|(name, _)| name == "stop") {
        return vec![];
    }
    let place = signals
        .first()
        .map_or(facts.plan.place, |(_, sign)| sign.place);
    vec![Found::stop(
        (place, "signals.stop".to_owned()),
        "no signal for stop is agreed".to_owned(),
        "add `signals: {stop: both arms crossed above the head}`, or the crew's own",
    )]
}

fn alone(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    match facts.plan.crew.as_slice() {
        [only] => vec![Found::stop(
            (only.id.place, "crew".to_owned()),
            "one person stands in the crew; each must be in sight or hearing of another".to_owned(),
            "bring a second person, and name them in `crew`",
        )],
        _ => vec![],
    }
}

fn check_in(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let emergency = facts.plan.emergency.as_ref();
    if emergency.is_some_and(|e| e.check_in.is_some()) {
        return vec![];
    }
    vec![Found::caution(
        emergency_at(facts, "check_in"),
        "nothing says how often contact is made".to_owned(),
        "add `check_in: 30 min`, or what the crew agrees on",
    )]
}

fn number(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let emergency = facts.plan.emergency.as_ref();
    if emergency.is_some_and(|e| e.number.is_some()) {
        return vec![];
    }
    vec![Found::stop(
        emergency_at(facts, "number"),
        "no number to call for help is written".to_owned(),
        "add `emergency: {number: \"…\"}` with the number that works at this place",
    )]
}

fn location(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let location = &facts.plan.job.location;
    let coordinates = location.latitude.is_some() && location.longitude.is_some();
    let at = (facts.plan.job.name.place, "job.place".to_owned());
    match (coordinates, location.directions.is_some()) {
        (true, true) => vec![],
        (false, false) => vec![Found::stop(
            at,
            "neither coordinates nor directions say where the job is".to_owned(),
            "add `place: {latitude: …, longitude: …, directions: \"…\"}`",
        )],
        (true, false) => vec![Found::caution(
            at,
            "no directions by road say how help gets here".to_owned(),
            "add `directions: \"…\"` to `place`, with the gate",
        )],
        (false, true) => vec![Found::caution(
            at,
            "no coordinates say where the job is".to_owned(),
            "add `latitude` and `longitude` to `place`, in decimal degrees",
        )],
    }
}

fn channel(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let emergency = facts.plan.emergency.as_ref();
    let channel = emergency.is_some_and(|e| e.channel.is_some());
    let backup = emergency.is_some_and(|e| e.backup.is_some());
    match (channel, backup) {
        (true, true) => vec![],
        (false, _) => vec![Found::stop(
            emergency_at(facts, "radio.channel"),
            "no radio channel or telephone to call from the site is named".to_owned(),
            "add `radio: {channel: \"…\", backup: \"…\"}`, and try it before the first cut",
        )],
        (true, false) => vec![Found::caution(
            emergency_at(facts, "radio.backup"),
            "no second way to call is named".to_owned(),
            "add `backup: \"…\"` to `radio`, such as a satellite telephone",
        )],
    }
}

fn weather(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    if facts.plan.limits.wind.is_some() {
        return vec![];
    }
    vec![Found::caution(
        (facts.plan.place, "limits.wind".to_owned()),
        "no wind is agreed at which the work stops".to_owned(),
        "add `limits: {wind: 8 m/s}`, or what the crew agrees on",
    )]
}
