//! Checklists: what is asked at the tree, of whom, and in which form it is answered.

use serde::Deserialize;

/// A checklist; at most nine items.
#[derive(Debug, Clone, PartialEq, Eq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Checklist {
    /// Its name.
    pub list: String,
    /// How it is worked: "do, then confirm" or "read, do".
    pub kind: String,
    /// Title on the screen.
    pub title: String,
    /// The items in order; killer items come first.
    pub items: Vec<ListItem>,
}

/// One item.
#[derive(Debug, Clone, PartialEq, Eq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct ListItem {
    /// Its id within the list.
    pub id: String,
    /// Its rung on the ladder, at most seven words.
    pub name: String,
    /// Whom it is asked of: a role, or `caller`.
    pub to: String,
    /// The question as spoken.
    pub call: String,
    /// Whether missing it kills; such items stand first.
    #[serde(default)]
    pub killer: bool,
    /// Whether a second person answers without seeing the first answer.
    #[serde(default)]
    pub blind: bool,
    /// Answers to choose from.
    #[serde(default)]
    pub choose: Vec<Choice>,
    /// Numbers to give.
    #[serde(default)]
    pub measure: Vec<Measure>,
    /// Free words to give; what is wanted.
    pub words: Option<String>,
    /// The answer is one of the people present.
    #[serde(default)]
    pub people: bool,
    /// The item is somebody's own call, made before the gauge is shown.
    #[serde(default)]
    pub own_call: bool,
    /// The item is a go.
    #[serde(default)]
    pub go: bool,
    /// The item tells what the tree did.
    #[serde(default)]
    pub outcome: bool,
    /// The item is the all clear.
    #[serde(default)]
    pub all_clear: bool,
    /// The item is the reason of a stop.
    #[serde(default)]
    pub stop_reason: bool,
    /// A caution that belongs to it.
    pub caution: Option<Caution>,
}

/// One answer to choose.
#[derive(Debug, Clone, PartialEq, Eq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Choice {
    /// What is said.
    pub say: String,
    /// Where this answer keeps the item open: what to do.
    pub holds: Option<String>,
    /// Whether this answer makes the crew talk again.
    #[serde(default)]
    pub talk_again: bool,
    /// Whether this answer leaves the tree standing with cuts in it.
    #[serde(default)]
    pub leaves: bool,
}

/// One number to give.
#[derive(Debug, Clone, PartialEq, Eq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Measure {
    /// Its name beside the field.
    pub label: String,
    /// What is measured.
    pub what: What,
    /// Smallest number taken, where the item sets its own.
    pub least: Option<i64>,
    /// Largest number taken.
    pub most: Option<i64>,
}

/// What a number measures; it fixes the unit, the range and the planned value.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum What {
    /// Wind speed.
    Wind,
    /// Diameter of the wood at the cut.
    Stump,
    /// Lean of the stem.
    Lean,
    /// A count of people.
    Count,
    /// Hinge thickness.
    Hinge,
    /// Face depth.
    FaceDepth,
    /// Strap thickness.
    Strap,
    /// Height of the back cut above the face's apex.
    BackCutHeight,
    /// Overlap of the two face cuts.
    Bypass,
    /// How far a slot or cut lies behind the face's apex.
    BehindHinge,
    /// Depth of a back cut from the rear.
    BackCutDepth,
}

/// A caution: kind of hazard, what happens, how to avoid it.
#[derive(Debug, Clone, PartialEq, Eq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Caution {
    /// DANGER, WARNING or CAUTION.
    pub word: String,
    /// The hazard.
    pub hazard: String,
    /// What happens.
    pub consequence: String,
    /// How to avoid it.
    pub avoid: String,
}

impl Caution {
    /// The caution in one line of words.
    pub fn line(&self) -> String {
        format!(
            "{} {}. {}.",
            self.hazard,
            self.consequence,
            capital(&self.avoid)
        )
    }
}

/// A text with its first letter large.
pub fn capital(text: &str) -> String {
    let mut chars = text.chars();
    chars
        .next()
        .map_or(String::new(), |c| c.to_uppercase().chain(chars).collect())
}
