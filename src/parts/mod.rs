//! The texts and data of `plans/`, embedded in the program and read into types. This room never
//! opens a file: an override folder's texts are handed in.

mod checklist;
mod method;
mod rule_set;
mod tailgate;

use std::collections::BTreeMap;

use sha2::{Digest, Sha256};
use thiserror::Error;

pub use checklist::{Caution, Checklist, Choice, ListItem, Measure, What, capital};
pub use method::{CutWords, MethodWords, StepWords};
pub use rule_set::{
    Figure, FigureValue, Figures, KitPlace, RuleLine, RuleSet, WedgeRow, WedgeTable,
};
pub use tailgate::{Everyone, Question, Tailgate};

/// The built-in texts, by their names below `plans/`.
pub const BUILT_IN: &[(&str, &str)] = &[
    (
        "texts/tailgate.yaml",
        include_str!("../../plans/texts/tailgate.yaml"),
    ),
    (
        "texts/cuts.yaml",
        include_str!("../../plans/texts/cuts.yaml"),
    ),
    (
        "checklists/short-talk.yaml",
        include_str!("../../plans/checklists/short-talk.yaml"),
    ),
    (
        "checklists/walk-up.yaml",
        include_str!("../../plans/checklists/walk-up.yaml"),
    ),
    (
        "checklists/hold-line.yaml",
        include_str!("../../plans/checklists/hold-line.yaml"),
    ),
    (
        "checklists/all-clear.yaml",
        include_str!("../../plans/checklists/all-clear.yaml"),
    ),
    (
        "checklists/stopped.yaml",
        include_str!("../../plans/checklists/stopped.yaml"),
    ),
    (
        "rules/us-logging.yaml",
        include_str!("../../plans/rules/us-logging.yaml"),
    ),
];

/// A part that cannot be used.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
pub enum PartsError {
    /// A part does not read as its type.
    #[error("{name}: {why}")]
    Unreadable {
        /// The part's name below `plans/`.
        name: String,
        /// What the reader said.
        why: String,
    },
    /// A part has a list longer than a ladder shows.
    #[error("{name}: {items} items; a ladder stage has at most 9")]
    TooLong {
        /// The part's name.
        name: String,
        /// How many items it has.
        items: usize,
    },
    /// A part is missing.
    #[error("{name} is missing")]
    Missing {
        /// The part's name.
        name: String,
    },
}

/// Every part, read.
#[derive(Debug, Clone, PartialEq)]
pub struct Parts {
    /// What is said at the tailgate.
    pub tailgate: Tailgate,
    /// Wording of cuts and methods.
    pub cuts: CutWords,
    /// The short talk at a tree.
    pub short_talk: Checklist,
    /// The walk-up.
    pub walk_up: Checklist,
    /// The hold line.
    pub hold_line: Checklist,
    /// All clear.
    pub all_clear: Checklist,
    /// After a stop.
    pub stopped: Checklist,
    /// The rule sets by name.
    pub rule_sets: BTreeMap<String, RuleSet>,
    /// SHA-256 of each part's bytes, by name.
    pub hashes: BTreeMap<String, String>,
}

impl Parts {
    /// The built-in parts.
    ///
    /// # Panics
    /// Where a built-in part does not read, which a test rules out.
    pub fn built_in() -> Self {
        Self::from_texts(&BTreeMap::new()).expect("the built-in parts read: a test reads them")
    }

    /// The built-in parts with some replaced by texts from an override folder.
    ///
    /// # Errors
    /// [`PartsError`], naming the part.
    pub fn from_texts(overrides: &BTreeMap<String, String>) -> Result<Self, PartsError> {
        let mut texts: BTreeMap<&str, &str> = BUILT_IN.iter().copied().collect();
        for (name, text) in overrides {
            texts.insert(name, text);
        }
        let hash = |text: &str| hex(&Sha256::digest(text.as_bytes()));
        let hashes = texts
            .iter()
            .map(|(name, text)| ((*name).to_owned(), hash(text)))
            .collect();
        Ok(Self {
            tailgate: read(&texts, "texts/tailgate.yaml")?,
            cuts: read(&texts, "texts/cuts.yaml")?,
            short_talk: list(&texts, "checklists/short-talk.yaml")?,
            walk_up: list(&texts, "checklists/walk-up.yaml")?,
            hold_line: list(&texts, "checklists/hold-line.yaml")?,
            all_clear: list(&texts, "checklists/all-clear.yaml")?,
            stopped: list(&texts, "checklists/stopped.yaml")?,
            rule_sets: rule_sets(&texts)?,
            hashes,
        })
    }
}

fn read<T: serde::de::DeserializeOwned>(
    texts: &BTreeMap<&str, &str>,
    name: &str,
) -> Result<T, PartsError> {
    let text = texts.get(name).ok_or_else(|| PartsError::Missing {
        name: name.to_owned(),
    })?;
    crate::document::read_part(text).map_err(|why| PartsError::Unreadable {
        name: name.to_owned(),
        why,
    })
}

/// Every text below `rules/`; a set's name is its file's name.
fn rule_sets(texts: &BTreeMap<&str, &str>) -> Result<BTreeMap<String, RuleSet>, PartsError> {
    let mut sets = BTreeMap::new();
    for name in texts.keys().filter(|name| name.starts_with("rules/")) {
        let set: RuleSet = read(texts, name)?;
        if format!("rules/{}.yaml", set.set) != **name {
            return Err(PartsError::Unreadable {
                name: (*name).to_owned(),
                why: format!("it calls itself `{}`", set.set),
            });
        }
        sets.insert(set.set.clone(), set);
    }
    Ok(sets)
}

fn list(texts: &BTreeMap<&str, &str>, name: &str) -> Result<Checklist, PartsError> {
    let list: Checklist = read(texts, name)?;
    if list.items.len() > 9 {
        return Err(PartsError::TooLong {
            name: name.to_owned(),
            items: list.items.len(),
        });
    }
    Ok(list)
}

/// Lower-case hexadecimal.
fn hex(bytes: &[u8]) -> String {
    bytes.iter().map(|b| format!("{b:02x}")).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn built_in_parts_read_and_keep_the_ladder_rules() {
        let parts = Parts::from_texts(&BTreeMap::new()).unwrap();
        for list in [
            &parts.short_talk,
            &parts.walk_up,
            &parts.hold_line,
            &parts.all_clear,
            &parts.stopped,
        ] {
            assert!(list.items.len() <= 9, "{}", list.list);
            let killers: Vec<bool> = list.items.iter().map(|i| i.killer).collect();
            let first_other = killers.iter().position(|k| !k).unwrap_or(killers.len());
            assert!(
                killers[first_other..].iter().all(|k| !k),
                "killer items first in {}",
                list.list
            );
            for item in &list.items {
                assert!(item.name.split_whitespace().count() <= 7, "{}", item.name);
                if let Some(caution) = &item.caution {
                    assert!(
                        caution.line().split_whitespace().count() <= 25,
                        "{}",
                        caution.line()
                    );
                }
            }
        }
    }
}
