//! Facts of the day to entries of format 1, and back. The members are fixed by the format's first
//! version; a fact read back is the fact that was written.

use serde_json::{Map, Value as Json, json};

use super::cards;
use super::draft::Draft;
use super::line::ParsedLine;
use crate::briefing::Kind;
use crate::parts::What;
use crate::session::{
    Answer, Change, Fact, Heard, Look, Recorded, Said, Stage, Stamp, StretchEnd, Value,
};

type Members = Map<String, Json>;

/// The draft of a fact, its texts in the form a record takes. `language` is the language of the
/// texts shown.
pub fn draft(fact: &Fact, language: &str) -> Draft {
    let mut draft = as_said(fact, language);
    for value in draft.members.values_mut() {
        clean(value);
    }
    draft
}

fn clean(json: &mut Json) {
    match json {
        Json::String(said) => *said = super::text::clean(said),
        Json::Array(items) => items.iter_mut().for_each(clean),
        Json::Object(members) => members.values_mut().for_each(clean),
        Json::Null | Json::Bool(_) | Json::Number(_) => {}
    }
}

fn as_said(fact: &Fact, language: &str) -> Draft {
    let mut m = Members::new();
    let kind = match fact {
        Fact::Answer(answer) => return answer_draft(answer, language),
        Fact::LookHeld {
            stage,
            tree,
            item,
            commitment,
            said,
        } => {
            place(&mut m, *stage, (Some(tree), item));
            put(&mut m, "commitment_sha256", commitment);
            said_by(&mut m, said);
            "second_look_held"
        }
        Fact::LookRevealed { .. } => {
            revealed(&mut m, fact);
            "second_look_revealed"
        }
        Fact::LookLost { item } => {
            put(&mut m, "item", item);
            "second_look_lost"
        }
        Fact::SizedUp {
            tree,
            card,
            because,
            changes,
        } => {
            put(&mut m, "tree", tree);
            put(&mut m, "because", because);
            m.insert("card".into(), cards::write(card));
            m.insert("changes".into(), changes_out(changes));
            "sized_up"
        }
        Fact::TakenBack {
            stage,
            tree,
            item,
            said,
        } => {
            place(&mut m, *stage, (tree.as_ref(), item));
            said_by(&mut m, said);
            "step_taken_back"
        }
        Fact::RefusedKeys { count } => {
            m.insert("count".into(), (*count).into());
            "refused_keys"
        }
        Fact::KeepPlace { keyed_by } => {
            put(&mut m, "keyed_by", keyed_by);
            "keep_place"
        }
        Fact::Stop { keyed_by } => {
            put(&mut m, "keyed_by", keyed_by);
            "stop"
        }
        Fact::Resumed => "resumed",
        Fact::Reopened => "reopened",
        Fact::TalkAgain { changes } => {
            m.insert("changes".into(), changes_out(changes));
            "talk_again"
        }
        Fact::StretchStart {
            tree,
            item,
            shown,
            said,
        } => {
            place(&mut m, Stage::Cuts, (Some(tree), item));
            put(&mut m, "shown", shown);
            said_by(&mut m, said);
            "brisk_start"
        }
        Fact::StretchStopCalled { keyed_by } => {
            put(&mut m, "keyed_by", keyed_by);
            "brisk_stop_called"
        }
        Fact::StretchEnd {
            tree,
            item,
            how,
            lasted_ms,
            said,
        } => {
            place(&mut m, Stage::Cuts, (Some(tree), item));
            put(&mut m, "outcome", end_word(*how));
            m.insert("took_ms".into(), (*lasted_ms).into());
            said_by(&mut m, said);
            "brisk_end"
        }
        Fact::HandOver { to } => {
            put(&mut m, "to", to);
            "hand_over"
        }
        Fact::ReceiptShown { shown_seq, code } => {
            m.insert("shown_seq".into(), (*shown_seq).into());
            put(&mut m, "code", code);
            "receipt_shown"
        }
    };
    Draft::unsigned(kind, m)
}

const fn end_word(how: StretchEnd) -> &'static str {
    match how {
        StretchEnd::Down => "down",
        StretchEnd::OnStump => "on-stump",
    }
}

fn put(m: &mut Members, name: &str, text: &str) {
    m.insert(name.into(), text.into());
}

fn place(m: &mut Members, stage: Stage, (tree, item): (Option<&String>, &str)) {
    if let Some(tree) = tree {
        put(m, "tree", tree);
    }
    put(m, "stage", stage.word());
    put(m, "item", item);
}

fn said_by(m: &mut Members, said: &Said) {
    put(m, "told_by", &said.told_by);
    put(m, "keyed_by", &said.keyed_by);
    put(m, "heard", said.heard.word());
}

fn changes_out(changes: &[Change]) -> Json {
    let one = |c: &Change| json!({"what": c.what, "old": c.old, "new": c.new});
    changes.iter().map(one).collect::<Vec<_>>().into()
}

/// The kinds an answer can be, by the session's word for it.
const ANSWERS: &[(Kind, &str)] = &[
    (Kind::OwnHazard, "own_hazard"),
    (Kind::Question, "answered"),
    (Kind::PlanSigned, "plan_signed"),
    (Kind::BriefSigned, "brief_signed"),
    (Kind::SignedAgain, "signed_again"),
    (Kind::TreeChosen, "tree_chosen"),
    (Kind::Checked, "item_answered"),
    (Kind::HoldItem, "hold_item"),
    (Kind::OwnCall, "own_call"),
    (Kind::Go, "go"),
    (Kind::StepDone, "step_done"),
    (Kind::Outcome, "outcome"),
    (Kind::StumpMeasured, "stump_measured"),
    (Kind::HeadCount, "head_count"),
    (Kind::Note, "note"),
    (Kind::AllClear, "all_clear"),
    (Kind::StopReason, "stop_reason"),
    (Kind::LeftStanding, "left_standing"),
    (Kind::SignOut, "sign_out"),
    (Kind::Close, "close"),
];

fn answer_kind(answer: &Answer) -> &'static str {
    if answer.kind == Kind::RollCall {
        let here = matches!(answer.values.first(), Some(Value::Chosen { digit: 1, .. }));
        return if here { "present" } else { "absent" };
    }
    ANSWERS
        .iter()
        .find(|(kind, _)| *kind == answer.kind)
        .map_or("item_answered", |(_, word)| word)
}

fn answer_draft(answer: &Answer, language: &str) -> Draft {
    let mut m = Members::new();
    put(&mut m, "who", &answer.said.told_by);
    place(&mut m, answer.stage, (answer.tree.as_ref(), &answer.item));
    m.insert("number".into(), answer.number.into());
    put(&mut m, "shown", &answer.shown);
    if let Some(sentence) = &answer.sentence {
        put(&mut m, "said", sentence);
    }
    put(&mut m, "language", language);
    m.insert(
        "values".into(),
        answer
            .values
            .iter()
            .map(value_out)
            .collect::<Vec<_>>()
            .into(),
    );
    if let Some(holds) = &answer.holds {
        put(&mut m, "holds", holds);
    }
    if answer.talk_again {
        m.insert("talk_again".into(), true.into());
    }
    said_by(&mut m, &answer.said);
    let kind = answer_kind(answer);
    match (&answer.signer, &answer.named_by) {
        (Some(signer), _) => Draft::signed(kind, m, signer),
        (None, Some(leader)) => Draft::named_by(kind, m, leader),
        (None, None) => Draft::unsigned(kind, m),
    }
}

/// The word of what is measured, and the ending of its members.
const WHATS: &[(What, &str, &str)] = &[
    (What::Wind, "wind", "mm_s"),
    (What::Stump, "stump", "um"),
    (What::Lean, "lean", "mdeg"),
    (What::Count, "count", "people"),
    (What::Hinge, "hinge", "um"),
    (What::FaceDepth, "face-depth", "um"),
    (What::Strap, "strap", "um"),
    (What::BackCutHeight, "back-cut-height", "um"),
    (What::Bypass, "bypass", "um"),
    (What::BehindHinge, "behind-hinge", "um"),
    (What::BackCutDepth, "back-cut-depth", "um"),
];

fn what_words(what: What) -> (&'static str, &'static str) {
    WHATS
        .iter()
        .find(|(w, _, _)| *w == what)
        .map_or(("count", "people"), |(_, word, unit)| (word, unit))
}

fn value_out(value: &Value) -> Json {
    match value {
        Value::Chosen {
            digit,
            say,
            stands_for,
        } => {
            let mut m = Members::new();
            m.insert("digit".into(), (*digit).into());
            put(&mut m, "say", say);
            if let Some(id) = stands_for {
                put(&mut m, "stands_for", id);
            }
            m.into()
        }
        Value::Measured {
            label,
            what,
            value,
            planned,
            typed,
        } => {
            let (word, unit) = what_words(*what);
            let mut m = Members::new();
            put(&mut m, "label", label);
            put(&mut m, "what", word);
            m.insert(format!("measured_{unit}"), (*value).into());
            if let Some(planned) = planned {
                m.insert(format!("planned_{unit}"), (*planned).into());
            }
            put(&mut m, "typed", typed);
            m.into()
        }
        Value::Words(words) => json!({"words": words}),
        Value::Signed => json!({"signed": true}),
    }
}

fn revealed(m: &mut Members, fact: &Fact) {
    let Fact::LookRevealed {
        stage,
        tree,
        item,
        number,
        shown,
        what,
        planned,
        nonce,
        first,
        second,
        equal,
    } = fact
    else {
        return;
    };
    place(m, *stage, (Some(tree), item));
    m.insert("number".into(), (*number).into());
    put(m, "shown", shown);
    let (word, unit) = what_words(*what);
    put(m, "what", word);
    if let Some(planned) = planned {
        m.insert(format!("planned_{unit}"), (*planned).into());
    }
    put(m, "nonce", nonce);
    for (name, look) in [("first", first), ("second", second)] {
        let mut l = Members::new();
        l.insert(format!("measured_{unit}"), look.value.into());
        put(&mut l, "typed", &look.typed);
        said_by(&mut l, &look.said);
        m.insert(name.into(), l.into());
    }
    m.insert("equal".into(), (*equal).into());
    // Two people at one keyboard can only be blind by their word.
    put(m, "blind", "by word only");
}

/// The fact an entry holds; nothing for entries that change no state, such as the opening.
pub fn fact(line: &ParsedLine) -> Option<Recorded> {
    let stamp = line.stamp?;
    let fact = read(line.kind.as_str(), &line.members)?;
    Some(Recorded {
        seq: line.seq,
        stamp: Stamp {
            utc_ms: stamp.utc_ms,
            up_ms: stamp.up_ms,
            boot: stamp.boot.0,
        },
        fact,
    })
}

fn read(kind: &str, m: &Members) -> Option<Fact> {
    let text = |name: &str| m.get(name).and_then(Json::as_str).map(str::to_owned);
    let whole = |name: &str| m.get(name).and_then(Json::as_i64);
    let stage = || text("stage").and_then(|s| Stage::of(&s));
    Some(match kind {
        "second_look_held" => Fact::LookHeld {
            stage: stage()?,
            tree: text("tree")?,
            item: text("item")?,
            commitment: text("commitment_sha256")?,
            said: said_in(m)?,
        },
        "second_look_revealed" => revealed_in(m)?,
        "second_look_lost" => Fact::LookLost {
            item: text("item")?,
        },
        "sized_up" => Fact::SizedUp {
            tree: text("tree")?,
            card: Box::new(cards::read(m.get("card")?)?),
            because: text("because")?,
            changes: changes_in(m.get("changes")?)?,
        },
        "step_taken_back" => Fact::TakenBack {
            stage: stage()?,
            tree: text("tree"),
            item: text("item")?,
            said: said_in(m)?,
        },
        "refused_keys" => Fact::RefusedKeys {
            count: whole("count")?,
        },
        "keep_place" => Fact::KeepPlace {
            keyed_by: text("keyed_by")?,
        },
        "stop" => Fact::Stop {
            keyed_by: text("keyed_by")?,
        },
        "resumed" => Fact::Resumed,
        "reopened" => Fact::Reopened,
        "talk_again" => Fact::TalkAgain {
            changes: changes_in(m.get("changes")?)?,
        },
        "brisk_start" => Fact::StretchStart {
            tree: text("tree")?,
            item: text("item")?,
            shown: text("shown")?,
            said: said_in(m)?,
        },
        "brisk_stop_called" => Fact::StretchStopCalled {
            keyed_by: text("keyed_by")?,
        },
        "brisk_end" => Fact::StretchEnd {
            tree: text("tree")?,
            item: text("item")?,
            how: if text("outcome")? == "down" {
                StretchEnd::Down
            } else {
                StretchEnd::OnStump
            },
            lasted_ms: whole("took_ms"),
            said: said_in(m)?,
        },
        "hand_over" => Fact::HandOver { to: text("to")? },
        "receipt_shown" => Fact::ReceiptShown {
            shown_seq: u64::try_from(whole("shown_seq")?).ok()?,
            code: text("code")?,
        },
        other => return answer_in(other, m).map(|a| Fact::Answer(Box::new(a))),
    })
}

fn said_in(m: &Members) -> Option<Said> {
    let text = |name: &str| m.get(name).and_then(Json::as_str).map(str::to_owned);
    Some(Said {
        told_by: text("told_by")?,
        keyed_by: text("keyed_by")?,
        heard: Heard::of(&text("heard")?)?,
    })
}

fn changes_in(json: &Json) -> Option<Vec<Change>> {
    let one = |c: &Json| {
        let text = |name: &str| c.get(name).and_then(Json::as_str).map(str::to_owned);
        Some(Change {
            what: text("what")?,
            old: text("old")?,
            new: text("new")?,
        })
    };
    json.as_array()?.iter().map(one).collect()
}

fn answer_in(kind: &str, m: &Members) -> Option<Answer> {
    let text = |name: &str| m.get(name).and_then(Json::as_str).map(str::to_owned);
    let kind = match kind {
        "present" | "absent" => Kind::RollCall,
        other => ANSWERS
            .iter()
            .find(|(_, word)| *word == other)
            .map(|(kind, _)| *kind)?,
    };
    Some(Answer {
        kind,
        stage: Stage::of(&text("stage")?)?,
        tree: text("tree"),
        item: text("item")?,
        number: u8::try_from(m.get("number")?.as_i64()?).ok()?,
        shown: text("shown")?,
        sentence: text("said"),
        values: m
            .get("values")?
            .as_array()?
            .iter()
            .map(value_in)
            .collect::<Option<_>>()?,
        holds: text("holds"),
        talk_again: m.get("talk_again").and_then(Json::as_bool).unwrap_or(false),
        said: said_in(m)?,
        signer: text("signer"),
        named_by: text("named_by"),
    })
}

fn value_in(json: &Json) -> Option<Value> {
    let m = json.as_object()?;
    let text = |name: &str| m.get(name).and_then(Json::as_str).map(str::to_owned);
    if let Some(words) = text("words") {
        return Some(Value::Words(words));
    }
    if m.contains_key("signed") {
        return Some(Value::Signed);
    }
    if let Some(digit) = m.get("digit") {
        let digit = u8::try_from(digit.as_i64()?).ok()?;
        return Some(Value::Chosen {
            digit,
            say: text("say")?,
            stands_for: text("stands_for"),
        });
    }
    let word = text("what")?;
    let (what, _, unit) = WHATS.iter().find(|(_, w, _)| *w == word)?;
    Some(Value::Measured {
        label: text("label")?,
        what: *what,
        value: m.get(&format!("measured_{unit}"))?.as_i64()?,
        planned: m.get(&format!("planned_{unit}")).and_then(Json::as_i64),
        typed: text("typed")?,
    })
}

fn revealed_in(m: &Members) -> Option<Fact> {
    let text = |name: &str| m.get(name).and_then(Json::as_str).map(str::to_owned);
    let word = text("what")?;
    let (what, _, unit) = WHATS.iter().find(|(_, w, _)| *w == word)?;
    let look = |name: &str| {
        let l = m.get(name)?.as_object()?;
        Some(Look {
            said: said_in(l)?,
            value: l.get(&format!("measured_{unit}"))?.as_i64()?,
            typed: l.get("typed")?.as_str()?.to_owned(),
        })
    };
    Some(Fact::LookRevealed {
        stage: Stage::of(&text("stage")?)?,
        tree: text("tree")?,
        item: text("item")?,
        number: u8::try_from(m.get("number")?.as_i64()?).ok()?,
        shown: text("shown")?,
        what: *what,
        planned: m.get(&format!("planned_{unit}")).and_then(Json::as_i64),
        nonce: text("nonce")?,
        first: look("first")?,
        second: look("second")?,
        equal: m.get("equal")?.as_bool()?,
    })
}
