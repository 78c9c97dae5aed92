//! What is said at the tailgate.

use serde::Deserialize;

/// The tailgate's texts.
#[derive(Debug, Clone, PartialEq, Eq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Tailgate {
    /// Language of the texts.
    pub language: String,
    /// Prompts shown after everyone named their own hazards.
    pub kinds_of_energy: Vec<String>,
    /// Questions to named people.
    pub questions: Vec<Question>,
    /// The question for whoever was asked nothing else.
    pub for_everyone_else: Everyone,
    /// Questions on what STOP means.
    pub stop: Vec<Question>,
    /// What the sums leave out and who decides.
    pub cautions: Vec<String>,
    /// The sentence each person signs.
    pub signing: String,
    /// The sentence signed after a change.
    pub signing_again: String,
    /// The sentence the leader signs the plan with.
    pub plan_signing: String,
    /// The sentence each person signs out with.
    pub sign_out: String,
    /// The leader's closing sentence.
    pub closing: String,
}

/// A question to a role.
#[derive(Debug, Clone, PartialEq, Eq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Question {
    /// Its id.
    pub id: String,
    /// The role it is asked of.
    pub to: String,
    /// Its rung.
    pub name: String,
    /// The question.
    pub ask: String,
}

/// The question for everyone else.
#[derive(Debug, Clone, PartialEq, Eq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Everyone {
    /// Its id.
    pub id: String,
    /// Its rung.
    pub name: String,
    /// The question.
    pub ask: String,
}
