//! Wording of the cuts: rung, call, answer form, caution and timing note of each kind of step.

use std::collections::BTreeMap;

use serde::Deserialize;

use super::checklist::{Caution, Measure};

/// Wording by step word.
#[derive(Debug, Clone, PartialEq, Eq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct CutWords {
    /// By step word, such as `face-slope` or `wedge`.
    pub steps: BTreeMap<String, StepWords>,
    /// By method name: what it is, in one sentence for the crew.
    pub methods: BTreeMap<String, MethodWords>,
}

/// Wording of one kind of step.
#[derive(Debug, Clone, PartialEq, Eq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct StepWords {
    /// The rung, at most seven words.
    pub name: String,
    /// The call.
    pub call: String,
    /// What is measured when it is done.
    #[serde(default)]
    pub measure: Vec<Measure>,
    /// What is seen when it is done, where nothing is measured.
    #[serde(default)]
    pub choose: Vec<super::checklist::Choice>,
    /// A caution.
    pub caution: Option<Caution>,
}

/// Wording of one method.
#[derive(Debug, Clone, PartialEq, Eq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct MethodWords {
    /// What it is, in one sentence for the crew.
    pub what: String,
    /// The step word before which the hold line stands: the committing cut.
    pub commits: String,
}
