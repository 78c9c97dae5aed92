//! What every check of the plan against itself is given, and the naming of people and things. It
//! finds nothing itself.

use std::collections::BTreeSet;

use super::Ground;
use crate::diagnostic::Place;
use crate::plan::{Partial, Person, Plan, Saw, Spanned, nearest};
use crate::rules::{Facts, Found, TreeFacts};

/// What a check is given.
pub(super) struct Look<'a> {
    /// The facts.
    pub(super) facts: &'a Facts<'a>,
    /// The plan as far as it could be read.
    pub(super) partial: &'a Partial,
    /// What it is held against.
    pub(super) ground: &'a Ground<'a>,
}

/// A check: every finding with its code.
pub(super) type Check = fn(&Look<'_>) -> Vec<(&'static str, Found)>;

/// A list of the plan whose entries have ids.
#[derive(Clone, Copy)]
pub(super) enum List {
    /// The crew.
    Crew,
    /// The saws.
    Saws,
    /// The trees.
    Trees,
}

impl List {
    const fn route(self) -> &'static str {
        match self {
            Self::Crew => "crew",
            Self::Saws => "saws",
            Self::Trees => "trees",
        }
    }

    const fn one(self) -> &'static str {
        match self {
            Self::Crew => "person",
            Self::Saws => "saw",
            Self::Trees => "tree",
        }
    }
}

impl<'a> Look<'a> {
    /// The plan.
    pub(super) const fn plan(&self) -> &'a Plan {
        &self.partial.plan
    }

    /// The trees.
    pub(super) fn trees(&self) -> Vec<TreeFacts<'a>> {
        self.facts.trees().collect()
    }

    /// A person of the crew.
    pub(super) fn person(&self, id: &Spanned<String>) -> Option<&'a Person> {
        self.plan().crew.iter().find(|p| p.id.value == id.value)
    }

    /// A saw.
    pub(super) fn saw(&self, id: &Spanned<String>) -> Option<&'a Saw> {
        self.plan().saws.iter().find(|s| s.id.value == id.value)
    }

    /// A finding where an id names nobody and nothing in a list that could be read whole.
    pub(super) fn unknown(
        &self,
        list: List,
        id: &Spanned<String>,
        path: String,
    ) -> Option<(&'static str, Found)> {
        let known = self.ids(list);
        let there = known.contains(id.value.as_str()) || self.partial.unread.contains(&id.value);
        if there || self.partial.is_open(list.route()) {
            return None;
        }
        let message = format!("`{}` is the id of no {} in the plan", id.value, list.one());
        let help = match nearest(&id.value, known.iter().copied()) {
            Some(near) => format!("did you mean `{near}`?"),
            None if known.is_empty() => format!("add it to `{}`", list.route()),
            None => format!(
                "ids there: {}",
                known.iter().take(8).copied().collect::<Vec<_>>().join(", ")
            ),
        };
        Some(("JOB-01", Found::stop((id.place, path), message, &help)))
    }

    fn ids(&self, list: List) -> BTreeSet<&'a str> {
        let plan = self.plan();
        match list {
            List::Crew => plan.crew.iter().map(|p| p.id.value.as_str()).collect(),
            List::Saws => plan.saws.iter().map(|s| s.id.value.as_str()).collect(),
            List::Trees => plan.trees.iter().map(|t| t.id.value.as_str()).collect(),
        }
    }
}

/// A key's place and route within an entry.
pub(super) fn within(place: Place, route: &str, key: &str) -> (Place, String) {
    (place, format!("{route}.{key}"))
}
