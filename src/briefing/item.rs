//! One item of a ladder: the rung, the call, the form of the answer, who signs it.

use crate::parts::What;

/// What an answered item is on the record.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Kind {
    /// Who is here.
    RollCall,
    /// A hazard somebody named.
    OwnHazard,
    /// A question answered at the tailgate.
    Question,
    /// The plan, signed by its author.
    PlanSigned,
    /// The briefing, signed.
    BriefSigned,
    /// Signed again after a change.
    SignedAgain,
    /// The tree to work on.
    TreeChosen,
    /// An item of the short talk or the walk-up.
    Checked,
    /// An item of the hold line.
    HoldItem,
    /// Somebody's own call.
    OwnCall,
    /// A go.
    Go,
    /// A step of the cuts.
    StepDone,
    /// What the tree did.
    Outcome,
    /// The stump, measured.
    StumpMeasured,
    /// A head count.
    HeadCount,
    /// A sentence of the talk afterwards.
    Note,
    /// All clear.
    AllClear,
    /// Why it was stopped.
    StopReason,
    /// A question on the way back from a stop.
    BackFromStop,
    /// The tree left standing with cuts in it, the ring guarded.
    LeftStanding,
    /// Signed out.
    SignOut,
    /// The day, closed.
    Close,
}

/// Who signs an answered item.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Signs {
    /// Nobody: the chain covers it.
    Nobody,
    /// The person it is asked of, with a key of their own.
    Asked,
    /// The person at the keys, for what was reported.
    Keyer,
}

/// One answer to choose.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Option_ {
    /// What is said.
    pub say: String,
    /// Where it keeps the item open: what to do.
    pub holds: Option<String>,
    /// Whether it makes the crew talk again.
    pub talk_again: bool,
    /// What it stands for, where it names a person or a tree.
    pub stands_for: Option<String>,
    /// Whether it leaves the tree standing with cuts in it.
    pub leaves: bool,
}

impl Option_ {
    /// A plain answer.
    pub fn plain(say: impl Into<String>) -> Self {
        Self {
            say: say.into(),
            holds: None,
            talk_again: false,
            stands_for: None,
            leaves: false,
        }
    }
}

/// One number to give, in the record's own integer unit.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Field {
    /// Its name.
    pub label: String,
    /// What is measured.
    pub what: What,
    /// The planned value, where there is one.
    pub planned: Option<AskedValue>,
    /// Smallest value taken.
    pub least: i64,
    /// Largest value taken.
    pub most: i64,
}

/// A planned value with the tolerance it is held to.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct AskedValue {
    /// The value.
    pub value: i64,
    /// Plus or minus.
    pub tolerance: i64,
}

/// The form of an answer.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Form {
    /// One of up to nine answers, by digit.
    Choose(Vec<Option_>),
    /// One or two whole numbers.
    Measure(Vec<Field>),
    /// Words; what is wanted.
    Words(String),
    /// A signature under a sentence.
    Sign,
    /// The start of a stretch that only the tree ends.
    Start,
}

/// One item.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Item {
    /// Its id within its stage.
    pub id: String,
    /// Its number on the ladder, 1 to 9.
    pub number: u8,
    /// Its rung.
    pub name: String,
    /// The call as spoken.
    pub call: String,
    /// The person it is asked of.
    pub asked_of: String,
    /// The second person, who answers blind.
    pub blind_with: Option<String>,
    /// The form of the answer.
    pub form: Form,
    /// What it is on the record.
    pub kind: Kind,
    /// Who signs it.
    pub signs: Signs,
    /// The sentence signed.
    pub sentence: Option<String>,
    /// Alert word and caution.
    pub caution: Option<(String, String)>,
    /// The timing note shown with it.
    pub timing: Option<String>,
}
