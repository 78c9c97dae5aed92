//! The day: limits, dates, hazards, what STOP means. It reads no clock.

use super::look::{Look, within};
use crate::rules::Found;

type Coded = Vec<(&'static str, Found)>;

/// A wind expected at which the work would stop.
pub(super) fn wind_expected(look: &Look<'_>) -> Coded {
    let limits = &look.plan().limits;
    let (Some(expected), Some(wind)) = (&limits.expected, &limits.wind) else {
        return vec![];
    };
    if expected.value() <= wind.value() {
        return vec![];
    }
    let message = format!(
        "the wind expected, {}, is above the wind that stops the work, {}",
        expected.typed, wind.typed
    );
    let at = (expected.place, "limits.expected".to_owned());
    let help = "choose another day, or correct the figure";
    vec![("JOB-25", Found::stop(at, message, help))]
}

/// A limit for gusts below the one for the mean wind.
pub(super) fn gust_below_wind(look: &Look<'_>) -> Coded {
    let limits = &look.plan().limits;
    let (Some(gust), Some(wind)) = (&limits.gust, &limits.wind) else {
        return vec![];
    };
    if gust.value() >= wind.value() {
        return vec![];
    }
    let message = format!(
        "the limit for gusts, {}, is below the one for the wind, {}",
        gust.typed, wind.typed
    );
    let at = (gust.place, "limits.gust".to_owned());
    let help = "a gust is at least the mean wind; are the two exchanged?";
    vec![("JOB-26", Found::caution(at, message, help))]
}

/// Training after the day it is for.
pub(super) fn trained_later(look: &Look<'_>) -> Coded {
    let Some(date) = look.facts.date else {
        return vec![];
    };
    let mut found = vec![];
    for person in &look.plan().crew {
        for (name, day) in &person.trained {
            if day.value > date {
                let message = format!(
                    "{} is trained in {name} only after the job's day, {date}",
                    person.name.value
                );
                let at = within(day.place, &person.route, &format!("trained.{name}"));
                let help = "correct the date, or plan without this training";
                found.push(("JOB-27", Found::stop(at, message, help)));
            }
        }
    }
    found
}

/// Hazards that nobody does anything about.
pub(super) fn uncontrolled_hazard(look: &Look<'_>) -> Coded {
    let mut found = vec![];
    for tree in &look.plan().trees {
        for hazard in &tree.hazards {
            let (key, message) = match (&hazard.control, &hazard.owner) {
                (Some(_), Some(_)) => continue,
                (None, Some(_)) => ("control", "nothing is done about"),
                (Some(_), None) => ("owner", "nobody sees to"),
                (None, None) => ("control", "nothing is done and nobody sees to"),
            };
            let message = format!("{message} the hazard: {}", hazard.what.value);
            let at = within(hazard.id.place, &hazard.route, key);
            let help = "add `control: …` and `owner: id`";
            found.push(("JOB-28", Found::caution(at, message, help)));
        }
    }
    found
}

/// What STOP means past the hold line.
pub(super) fn stop_means(look: &Look<'_>) -> Coded {
    let plan = look.plan();
    if plan.stop_means.is_some() {
        return vec![];
    }
    let message = "what STOP means past the hold line is not written".to_owned();
    let help = "without it: everyone else stays out; the sawyer alone chooses finish or leave";
    let at = (plan.place, "stop_means".to_owned());
    vec![("JOB-29", Found::note(at, message, help))]
}
