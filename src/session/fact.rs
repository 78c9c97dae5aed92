//! Facts: what goes on the record and what the state is folded from. Plain values, whole numbers.

use super::stage::Stage;
use crate::briefing::{Card, Kind};
use crate::parts::What;

/// When something was recorded.
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub struct Stamp {
    /// Milliseconds since 1970, UTC, by this laptop's clock.
    pub utc_ms: i64,
    /// Milliseconds since boot, sleep included.
    pub up_ms: i64,
    /// Which start of the machine; clocks since boot mean nothing across two.
    pub boot: [u8; 4],
}

/// How an answer was heard.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Heard {
    /// By voice.
    Voice,
    /// By radio.
    Radio,
    /// By hand sign.
    Hand,
}

impl Heard {
    /// The word on screen and record.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Voice => "voice",
            Self::Radio => "radio",
            Self::Hand => "hand",
        }
    }

    /// The next one round.
    pub const fn next(self) -> Self {
        match self {
            Self::Voice => Self::Radio,
            Self::Radio => Self::Hand,
            Self::Hand => Self::Voice,
        }
    }

    /// From its word.
    pub fn of(word: &str) -> Option<Self> {
        [Self::Voice, Self::Radio, Self::Hand]
            .into_iter()
            .find(|h| h.word() == word)
    }
}

/// Who said it, who keyed it, how it was heard.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Said {
    /// Who told it.
    pub told_by: String,
    /// Who keyed it.
    pub keyed_by: String,
    /// How it was heard.
    pub heard: Heard,
}

/// One value of an answer.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Value {
    /// The answer chosen: its digit, what was said, what it stands for.
    Chosen {
        /// The digit.
        digit: u8,
        /// What was said.
        say: String,
        /// A person or tree it stands for.
        stands_for: Option<String>,
    },
    /// A number measured.
    Measured {
        /// The field's name.
        label: String,
        /// What was measured.
        what: What,
        /// The value in the record's unit.
        value: i64,
        /// The planned value, where there was one.
        planned: Option<i64>,
        /// What was typed.
        typed: String,
    },
    /// Words.
    Words(String),
    /// A signature under the sentence.
    Signed,
}

/// An answered item.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Answer {
    /// What it is on the record.
    pub kind: Kind,
    /// The stage it belongs to.
    pub stage: Stage,
    /// The tree, where at one.
    pub tree: Option<String>,
    /// The item's id.
    pub item: String,
    /// Its number.
    pub number: u8,
    /// The rung and the call as shown.
    pub shown: String,
    /// The sentence signed.
    pub sentence: Option<String>,
    /// The values.
    pub values: Vec<Value>,
    /// Where the answer keeps the item open: what to do.
    pub holds: Option<String>,
    /// Whether it makes the crew talk again.
    pub talk_again: bool,
    /// Who said it.
    pub said: Said,
    /// Who signs it.
    pub signer: Option<String>,
    /// Who named the signer, where that person has no key.
    pub named_by: Option<String>,
}

/// One answer of a blind look.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Look {
    /// Who said it, and so on.
    pub said: Said,
    /// The value.
    pub value: i64,
    /// What was typed.
    pub typed: String,
}

/// Something that changed, old and new.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Change {
    /// What changed.
    pub what: String,
    /// What it was.
    pub old: String,
    /// What it is.
    pub new: String,
}

/// How a stretch ended.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum StretchEnd {
    /// The tree is down.
    Down,
    /// It is on the stump yet, or sat back.
    OnStump,
}

/// A fact.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Fact {
    /// An item answered.
    Answer(Box<Answer>),
    /// The first answer of a blind look, as a commitment only.
    LookHeld {
        /// The stage.
        stage: Stage,
        /// The tree.
        tree: String,
        /// The item.
        item: String,
        /// SHA-256 over nonce and text, hexadecimal.
        commitment: String,
        /// Who said it.
        said: Said,
    },
    /// Both answers of a blind look.
    LookRevealed {
        /// The stage.
        stage: Stage,
        /// The tree.
        tree: String,
        /// The item.
        item: String,
        /// The item's number.
        number: u8,
        /// The rung and the call as shown.
        shown: String,
        /// What was measured.
        what: What,
        /// The planned value.
        planned: Option<i64>,
        /// The nonce of the first, hexadecimal.
        nonce: String,
        /// First answer.
        first: Look,
        /// Second answer.
        second: Look,
        /// Whether they agree within the tolerance.
        equal: bool,
    },
    /// The first answer of a blind look was lost before the second was in.
    LookLost {
        /// The item.
        item: String,
    },
    /// A tree sized up, with its card as shown.
    SizedUp {
        /// The tree.
        tree: String,
        /// The card.
        card: Box<Card>,
        /// Why.
        because: String,
        /// What changed past its tolerance; the crew talks again.
        changes: Vec<Change>,
    },
    /// The last step taken back.
    TakenBack {
        /// The stage.
        stage: Stage,
        /// The tree.
        tree: Option<String>,
        /// The item.
        item: String,
        /// Who.
        said: Said,
    },
    /// Keys refused since the last entry.
    RefusedKeys {
        /// How many.
        count: i64,
    },
    /// The place kept before turning away.
    KeepPlace {
        /// Who keyed it.
        keyed_by: String,
    },
    /// STOP.
    Stop {
        /// Who keyed it.
        keyed_by: String,
    },
    /// Gone on after a stop.
    Resumed,
    /// The crew talks again.
    TalkAgain {
        /// What changed.
        changes: Vec<Change>,
    },
    /// A stretch began: the committing cut.
    StretchStart {
        /// The tree.
        tree: String,
        /// The item.
        item: String,
        /// The rung and the call as shown.
        shown: String,
        /// Who.
        said: Said,
    },
    /// STOP called within a stretch.
    StretchStopCalled {
        /// Who keyed it.
        keyed_by: String,
    },
    /// The stretch ended.
    StretchEnd {
        /// The tree.
        tree: String,
        /// The item.
        item: String,
        /// How.
        how: StretchEnd,
        /// Milliseconds from its start, by the boot-time clock; not known after another start of
        /// the machine.
        lasted_ms: Option<i64>,
        /// Who.
        said: Said,
    },
    /// The laptop handed over.
    HandOver {
        /// To whom.
        to: String,
    },
    /// The program went on with a record begun earlier.
    Reopened,
    /// The record's code shown to the crew.
    ReceiptShown {
        /// The entry whose code it is.
        shown_seq: u64,
        /// The code.
        code: String,
    },
}

/// A fact with its place on the record.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Recorded {
    /// The entry's number.
    pub seq: u64,
    /// When.
    pub stamp: Stamp,
    /// The fact.
    pub fact: Fact,
}
