//! What an act means now: the facts it would put on the record, or why it is refused. A refused
//! act changes nothing.

use sha2::{Digest, Sha256};
use thiserror::Error;

use super::fact::{Answer, Fact, Heard, Look, Said, Stamp, StretchEnd, Value};
use super::stage::Stage;
use super::state::Session;
use crate::briefing::{Field, Form, Item, Kind, Option_, Signs};

/// What a person at the keys means.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Act {
    /// The lit item confirmed: its number, the answer, how it was heard.
    Confirm {
        /// The number keyed.
        number: u8,
        /// The answer.
        typed: Typed,
        /// How it was heard.
        heard: Heard,
        /// A fresh nonce, 32 hexadecimal digits, for a held answer.
        nonce: String,
        /// The first blind answer, where it is held at the keys.
        first: Option<HeldAnswer>,
    },
    /// STOP.
    Stop,
    /// The tree is down, within a stretch.
    Down,
    /// It is on the stump yet, within a stretch.
    OnStump,
    /// The last step taken back.
    TakeBack,
    /// The place kept.
    KeepPlace,
    /// The first blind answer is lost.
    LoseLook,
    /// The keys handed over.
    HandOver {
        /// To whom.
        to: String,
    },
    /// Keys refused so far.
    RefusedKeys {
        /// How many.
        count: i64,
    },
}

/// The first answer of a blind look, kept at the keys until the second is in.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct HeldAnswer {
    /// The value.
    pub value: i64,
    /// What was typed.
    pub typed: String,
    /// Its nonce.
    pub nonce: String,
}

/// A typed answer.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Typed {
    /// A digit.
    Digit(u8),
    /// One number a field, in the record's unit, with what was typed.
    Numbers(Vec<(i64, String)>),
    /// Words.
    Words(String),
    /// Nothing but the number: a signature or a start.
    Nothing,
}

/// Why an act is refused.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
pub enum Refusal {
    /// Nothing is lit.
    #[error("nothing is asked here")]
    NothingLit,
    /// Another number than the lit item's.
    #[error("that is not the lit step: step {lit} is asked")]
    WrongNumber {
        /// The lit number.
        lit: u8,
    },
    /// An answer of another form, or none.
    #[error("{wanted}")]
    WrongForm {
        /// What is wanted.
        wanted: String,
    },
    /// A number outside what a person could mean.
    #[error("{label}: outside what can be meant here; look at the number and its unit")]
    OutOfRange {
        /// The field.
        label: String,
    },
    /// The stretch runs.
    #[error("only d, o and SPACE count now")]
    InStretch,
    /// No stretch runs.
    #[error("no cut is under way")]
    NoStretch,
    /// The tree is being sized up again.
    #[error("the tree is being sized up again")]
    SizingUp,
    /// The first blind answer is not at the keys any more.
    #[error("the first answer is lost: both are asked again")]
    LookLost,
    /// Both blind answers from one person.
    #[error("the second look must come from somebody else")]
    SamePerson,
    /// Nothing to take back.
    #[error("nothing here can be taken back")]
    NothingToTakeBack,
    /// The day is closed.
    #[error("the day is closed")]
    Closed,
    /// Already stopped.
    #[error("it is stopped already")]
    AlreadyStopped,
    /// Nobody of that name is present.
    #[error("nobody present has that name")]
    Nobody,
}

/// SHA-256 over a nonce and a text, hexadecimal: what is written of a held answer.
pub fn commitment(nonce: &str, typed: &str) -> String {
    let mut hash = Sha256::new();
    hash.update(nonce.as_bytes());
    hash.update(b"\n");
    hash.update(typed.as_bytes());
    hash.finalize().iter().map(|b| format!("{b:02x}")).collect()
}

/// The facts an act would put on the record now.
///
/// # Errors
/// [`Refusal`], with the reason in words.
pub fn decide(session: &Session, act: &Act, now: &Stamp) -> Result<Vec<Fact>, Refusal> {
    if let Act::RefusedKeys { count } = act {
        return Ok(vec![Fact::RefusedKeys { count: *count }]);
    }
    if session.stage == Stage::Closed {
        return Err(Refusal::Closed);
    }
    if session.stretch.is_some() {
        return in_stretch(session, act, now);
    }
    let keyed_by = session.keyer.clone();
    match act {
        Act::Confirm { .. } => confirm(session, act),
        Act::Stop if session.stage == Stage::Stopped => Err(Refusal::AlreadyStopped),
        Act::Stop => Ok(vec![Fact::Stop { keyed_by }]),
        Act::Down | Act::OnStump => Err(Refusal::NoStretch),
        Act::TakeBack => take_back(session),
        Act::KeepPlace => Ok(vec![Fact::KeepPlace { keyed_by }]),
        Act::LoseLook => {
            let held = session.held.as_ref().ok_or(Refusal::NothingLit)?;
            Ok(vec![Fact::LookLost {
                item: held.item.clone(),
            }])
        }
        Act::HandOver { to } => {
            if !session.people_present().contains(to) {
                return Err(Refusal::Nobody);
            }
            Ok(vec![Fact::HandOver { to: to.clone() }])
        }
        Act::RefusedKeys { .. } => Ok(vec![]),
    }
}

/// Within a stretch only the tree ends it; STOP adds a line and the clock runs on.
fn in_stretch(session: &Session, act: &Act, now: &Stamp) -> Result<Vec<Fact>, Refusal> {
    let (Some(stretch), Some(tree)) = (&session.stretch, &session.tree) else {
        return Err(Refusal::NoStretch);
    };
    let how = match act {
        Act::Down => StretchEnd::Down,
        Act::OnStump => StretchEnd::OnStump,
        Act::Stop => {
            return Ok(vec![Fact::StretchStopCalled {
                keyed_by: session.keyer.clone(),
            }]);
        }
        Act::Confirm { .. }
        | Act::TakeBack
        | Act::KeepPlace
        | Act::LoseLook
        | Act::HandOver { .. }
        | Act::RefusedKeys { .. } => return Err(Refusal::InStretch),
    };
    let said = Said {
        told_by: session.keyer.clone(),
        keyed_by: session.keyer.clone(),
        heard: Heard::Voice,
    };
    let same_boot = now.boot == stretch.start.boot;
    let lasted_ms = same_boot.then(|| (now.up_ms - stretch.start.up_ms).max(0));
    Ok(vec![Fact::StretchEnd {
        tree: tree.clone(),
        item: stretch.item.clone(),
        how,
        lasted_ms,
        said,
    }])
}

fn confirm(session: &Session, act: &Act) -> Result<Vec<Fact>, Refusal> {
    let Act::Confirm {
        number,
        typed,
        heard,
        nonce,
        first,
    } = act
    else {
        return Err(Refusal::NothingLit);
    };
    if session.size_up_due.is_some() {
        return Err(Refusal::SizingUp);
    }
    let item = session.lit().ok_or(Refusal::NothingLit)?;
    if *number != item.number {
        return Err(Refusal::WrongNumber { lit: item.number });
    }
    if let Some(second) = &item.blind_with {
        return look(
            session,
            (&item, second),
            (typed, *heard, nonce, first.as_ref()),
        );
    }
    let told = |session: &Session| Said {
        told_by: item.asked_of.clone(),
        keyed_by: session.keyer.clone(),
        heard: *heard,
    };
    if item.form == Form::Start {
        let tree = session.tree.clone().ok_or(Refusal::NothingLit)?;
        if *typed != Typed::Nothing {
            return Err(Refusal::WrongForm {
                wanted: "the step's number alone starts it".to_owned(),
            });
        }
        let shown = shown(&item);
        return Ok(vec![Fact::StretchStart {
            tree,
            item: item.id,
            shown,
            said: told(session),
        }]);
    }
    let (values, option) = values_of(&item, typed)?;
    Ok(vec![Fact::Answer(Box::new(answer(
        session,
        (&item, told(session)),
        (values, option),
    )))])
}

/// The rung and the call as shown.
fn shown(item: &Item) -> String {
    format!("{}: {}", item.name, item.call)
}

fn answer(
    session: &Session,
    (item, said): (&Item, Said),
    (values, option): (Vec<Value>, Option<Option_>),
) -> Answer {
    let leaves = option.as_ref().is_some_and(|o| o.leaves);
    let holds = option.as_ref().is_some_and(|o| o.holds.is_some());
    let signer = match item.signs {
        _ if holds => None,
        Signs::Nobody if leaves => Some(session.keyer.clone()),
        Signs::Nobody => None,
        Signs::Asked => Some(item.asked_of.clone()),
        Signs::Keyer => Some(session.keyer.clone()),
    };
    let has_key = |id: &String| session.job.people.iter().any(|p| p.id == *id && p.has_key);
    let named_by = signer
        .as_ref()
        .filter(|s| !has_key(s))
        .map(|_| session.job.leader.clone());
    Answer {
        kind: kind_said(item, option.as_ref()),
        stage: session.stage,
        tree: session
            .tree
            .clone()
            .filter(|_| session.stage.at_tree() || session.stage == Stage::Stopped),
        item: item.id.clone(),
        number: item.number,
        shown: shown(item),
        sentence: item.sentence.clone().filter(|_| !holds),
        values,
        holds: option.as_ref().and_then(|o| o.holds.clone()),
        talk_again: option.is_some_and(|o| o.talk_again),
        said,
        signer: signer.filter(has_key),
        named_by,
    }
}

/// What an answer is on the record: one that keeps the item open is no go, no all clear and no
/// sign-off.
fn kind_said(item: &Item, option: Option<&Option_>) -> Kind {
    match (item.kind, option) {
        (_, Some(option)) if option.leaves => Kind::LeftStanding,
        (Kind::Go, Some(option)) if option.holds.is_some() => Kind::HoldItem,
        (Kind::AllClear | Kind::TreeChosen | Kind::StepDone, Some(option))
            if option.holds.is_some() =>
        {
            Kind::Checked
        }
        (kind, _) => kind,
    }
}

/// The values of an answer, refused unless they are of the item's own form.
fn values_of(item: &Item, typed: &Typed) -> Result<(Vec<Value>, Option<Option_>), Refusal> {
    let wrong = |wanted: &str| {
        Err(Refusal::WrongForm {
            wanted: wanted.to_owned(),
        })
    };
    match (&item.form, typed) {
        (Form::Choose(options), Typed::Digit(digit)) => {
            let index = usize::from(*digit).checked_sub(1);
            let Some(option) = index.and_then(|i| options.get(i)) else {
                return wrong("choose what was seen, by its digit");
            };
            let value = Value::Chosen {
                digit: *digit,
                say: option.say.clone(),
                stands_for: option.stands_for.clone(),
            };
            Ok((vec![value], Some(option.clone())))
        }
        (Form::Choose(_), _) => wrong("choose what was seen, by its digit"),
        (Form::Measure(fields), Typed::Numbers(numbers)) if fields.len() == numbers.len() => {
            let values = fields
                .iter()
                .zip(numbers)
                .map(|(field, number)| measured(field, number));
            Ok((values.collect::<Result<_, _>>()?, None))
        }
        (Form::Measure(fields), _) => {
            let labels: Vec<&str> = fields.iter().map(|f| f.label.as_str()).collect();
            wrong(&format!("a number is wanted: {}", labels.join(", ")))
        }
        (Form::Words(_), Typed::Words(words)) if is_more_than_a_tick(words) => {
            Ok((vec![Value::Words(words.trim().to_owned())], None))
        }
        (Form::Words(_), _) => wrong("say it in words; `ok` or `yes` says nothing"),
        (Form::Sign, Typed::Nothing) => Ok((vec![Value::Signed], None)),
        (Form::Sign, _) => wrong("the step's number alone signs"),
        (Form::Start, _) => wrong("the step's number alone starts it"),
    }
}

/// Words that answer: not empty, not a mere tick.
fn is_more_than_a_tick(words: &str) -> bool {
    let word = words.trim().trim_end_matches('.').to_lowercase();
    word.chars().count() >= 3 && !matches!(word.as_str(), "yes" | "okay" | "fine" | "n/a" | "none")
}

fn measured(field: &Field, (value, typed): &(i64, String)) -> Result<Value, Refusal> {
    if !(field.least..=field.most).contains(value) {
        return Err(Refusal::OutOfRange {
            label: field.label.clone(),
        });
    }
    Ok(Value::Measured {
        label: field.label.clone(),
        what: field.what,
        value: *value,
        planned: field.planned.map(|p| p.value),
        typed: typed.clone(),
    })
}

/// A blind look: the first answer becomes a commitment, the second reveals both.
fn look(
    session: &Session,
    (item, second): (&Item, &str),
    (typed, heard, nonce, first): (&Typed, Heard, &str, Option<&HeldAnswer>),
) -> Result<Vec<Fact>, Refusal> {
    let (Form::Measure(fields), Typed::Numbers(numbers), Some(tree)) =
        (&item.form, typed, &session.tree)
    else {
        return Err(Refusal::WrongForm {
            wanted: "a number is wanted".to_owned(),
        });
    };
    let ([field], [number]) = (fields.as_slice(), numbers.as_slice()) else {
        return Err(Refusal::WrongForm {
            wanted: "one number is wanted".to_owned(),
        });
    };
    measured(field, number)?;
    let keyed_by = session.keyer.clone();
    let Some(held) = session.held.as_ref().filter(|h| h.item == item.id) else {
        return Ok(vec![Fact::LookHeld {
            stage: session.stage,
            tree: tree.clone(),
            item: item.id.clone(),
            commitment: commitment(nonce, &number.1),
            said: Said {
                told_by: item.asked_of.clone(),
                keyed_by,
                heard,
            },
        }]);
    };
    let first = first.ok_or(Refusal::LookLost)?;
    if commitment(&first.nonce, &first.typed) != held.commitment {
        return Err(Refusal::LookLost);
    }
    if held.said.told_by == second {
        return Err(Refusal::SamePerson);
    }
    let tolerance = field.planned.map_or(0, |p| p.tolerance);
    Ok(vec![Fact::LookRevealed {
        stage: session.stage,
        tree: tree.clone(),
        item: item.id.clone(),
        number: item.number,
        shown: shown(item),
        what: field.what,
        planned: field.planned.map(|p| p.value),
        nonce: first.nonce.clone(),
        first: Look {
            said: held.said.clone(),
            value: first.value,
            typed: first.typed.clone(),
        },
        second: Look {
            said: Said {
                told_by: second.to_owned(),
                keyed_by,
                heard,
            },
            value: number.0,
            typed: number.1.clone(),
        },
        equal: (first.value - number.0).abs() <= tolerance,
    }])
}

/// The last step of the present stage, unless a go stands: no way back over the hold line.
fn take_back(session: &Session) -> Result<Vec<Fact>, Refusal> {
    let stages = [Stage::ShortTalk, Stage::WalkUp, Stage::Cuts];
    if !stages.contains(&session.stage)
        || session.hold_line_passed()
        || session.size_up_due.is_some()
    {
        return Err(Refusal::NothingToTakeBack);
    }
    let last = session
        .done_here()
        .last()
        .copied()
        .cloned()
        .ok_or(Refusal::NothingToTakeBack)?;
    let keyed_by = session.keyer.clone();
    Ok(vec![Fact::TakenBack {
        stage: last.stage,
        tree: last.tree,
        item: last.item,
        said: Said {
            told_by: keyed_by.clone(),
            keyed_by,
            heard: Heard::Voice,
        },
    }])
}
