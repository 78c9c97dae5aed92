//! Folds recorded facts into the state, live and in replay. Only what is here changes a session.

use std::sync::Arc;

use super::fact::{Answer, Change, Fact, Recorded, StretchEnd, Value};
use super::stage::Stage;
use super::state::{Done, Held, Session, Stopped, Stretch, Talk, TreeEnd};
use crate::briefing::{Job, Kind};
use crate::parts::What;

/// The state that a record's facts add up to.
pub fn replay<'a>(job: Arc<Job>, facts: impl IntoIterator<Item = &'a Recorded>) -> Session {
    facts
        .into_iter()
        .fold(Session::new(job), |session, fact| apply(&session, fact))
}

/// The state after one recorded fact.
pub fn apply(session: &Session, recorded: &Recorded) -> Session {
    let mut next = session.clone();
    next.seq = recorded.seq;
    next.last = recorded.stamp.clone();
    if !session.takes(&recorded.fact) {
        return next;
    }
    match &recorded.fact {
        Fact::Answer(answer) => answered(&mut next, answer, recorded),
        Fact::LookHeld {
            item,
            commitment,
            said,
            ..
        } => {
            next.held = Some(Held {
                item: item.clone(),
                commitment: commitment.clone(),
                said: said.clone(),
            });
            next.kept_open = None;
        }
        Fact::LookRevealed { .. } => revealed(&mut next, recorded),
        Fact::LookLost { .. } => next.held = None,
        Fact::SizedUp {
            tree,
            card,
            changes,
            ..
        } => {
            next.cards.insert(tree.clone(), (**card).clone());
            if next
                .size_up_due
                .as_ref()
                .is_some_and(|(due, _)| due == tree)
            {
                next.size_up_due = None;
            }
            if changes.is_empty() {
                advance(&mut next);
            } else {
                talk(&mut next, changes.clone(), recorded.seq);
            }
        }
        Fact::TakenBack { .. } => taken_back(&mut next, &recorded.fact),
        Fact::Stop { .. } => stop(&mut next, recorded),
        Fact::Resumed => resume(&mut next),
        Fact::TalkAgain { changes } => talk(&mut next, changes.clone(), recorded.seq),
        Fact::StretchStart { item, .. } => {
            next.stretch = Some(Stretch {
                item: item.clone(),
                start: recorded.stamp.clone(),
                stops: 0,
            });
        }
        Fact::StretchStopCalled { .. } => {
            if let Some(stretch) = &mut next.stretch {
                stretch.stops += 1;
            }
        }
        Fact::StretchEnd { .. } => stretch_end(&mut next, recorded),
        Fact::HandOver { to } => next.keyer.clone_from(to),
        Fact::KeepPlace { .. } => next.places_kept += 1,
        Fact::Reopened => reopened(&mut next),
        Fact::RefusedKeys { .. } | Fact::ReceiptShown { .. } => {}
    }
    next
}

/// The answer no longer stands; what was sized up from it is sized up again without it.
fn taken_back(next: &mut Session, fact: &Fact) {
    let Fact::TakenBack {
        stage, tree, item, ..
    } = fact
    else {
        return;
    };
    let same = |d: &&mut Done| d.stands && d.stage == *stage && d.tree == *tree && d.item == *item;
    let Some(done) = next.done.iter_mut().rev().find(same) else {
        return;
    };
    done.stands = false;
    let measured = done
        .values
        .iter()
        .any(|v| matches!(v, Value::Measured { .. }));
    if let (true, Some(tree)) = (measured, &next.tree) {
        next.size_up_due = Some((tree.clone(), "an answer was taken back".to_owned()));
    }
}

fn push_done(next: &mut Session, answer: &Answer, recorded: &Recorded) {
    next.done.push(Done {
        seq: recorded.seq,
        stage: answer.stage,
        tree: answer.tree.clone(),
        item: answer.item.clone(),
        number: answer.number,
        shown: answer.shown.clone(),
        values: answer.values.clone(),
        said: answer.said.clone(),
        stamp: recorded.stamp.clone(),
        stands: true,
    });
}

fn answered(next: &mut Session, answer: &Answer, recorded: &Recorded) {
    if let Some(todo) = &answer.holds {
        next.kept_open = Some((answer.item.clone(), todo.clone()));
        return;
    }
    next.kept_open = None;
    push_done(next, answer, recorded);
    let chosen = answer.values.iter().find_map(|v| match v {
        Value::Chosen {
            digit, stands_for, ..
        } => Some((*digit, stands_for.clone())),
        Value::Measured { .. } | Value::Words(_) | Value::Signed => None,
    });
    match (answer.kind, chosen) {
        (Kind::RollCall, Some((digit, _))) => {
            next.present.insert(answer.said.told_by.clone(), digit == 1);
        }
        (Kind::OwnHazard, _) => {
            if let Some(Value::Words(words)) = answer.values.first() {
                next.hazards
                    .push((answer.said.told_by.clone(), words.clone()));
            }
        }
        (Kind::TreeChosen, Some((_, tree))) => {
            next.stage = if tree.is_some() {
                Stage::ShortTalk
            } else {
                Stage::Closing
            };
            next.tree = tree;
            return;
        }
        (Kind::LeftStanding, _) if next.tree.is_some() => {
            next.stopped = None;
            next.talk = None;
            if let Some(tree) = next.tree.take() {
                next.ends.insert(tree, TreeEnd::LeftStanding);
            }
            to_choose(next);
            return;
        }
        _ => {}
    }
    if answer.stage == Stage::Stopped
        && let Some(stopped) = &mut next.stopped
    {
        stopped.talk_again |= answer.talk_again;
        if answer.item == "who" {
            stopped.caller = answer.values.iter().find_map(|v| match v {
                Value::Chosen { stands_for, .. } => stands_for.clone(),
                Value::Measured { .. } | Value::Words(_) | Value::Signed => None,
            });
        }
    }
    size_up_if_changed(next, &answer.values);
    advance(next);
}

/// A measured value that is not the planned one has the tree sized up before anything else.
fn size_up_if_changed(next: &mut Session, values: &[Value]) {
    let Some(tree) = next.tree.clone() else {
        return;
    };
    if !matches!(next.stage, Stage::WalkUp | Stage::Cuts | Stage::HoldLine) {
        return;
    }
    let changed = values.iter().find_map(|v| match v {
        Value::Measured {
            what: What::Wind,
            typed,
            ..
        } => Some(format!("wind read: {typed}")),
        Value::Measured {
            what: What::Count, ..
        } => None,
        Value::Measured {
            label,
            value,
            planned: Some(planned),
            typed,
            ..
        } if value != planned => Some(format!("{label} measured: {typed}")),
        Value::Measured { .. } | Value::Chosen { .. } | Value::Words(_) | Value::Signed => None,
    });
    if let Some(because) = changed {
        next.size_up_due = Some((tree, because));
    }
}

fn revealed(next: &mut Session, recorded: &Recorded) {
    let Fact::LookRevealed {
        stage,
        tree,
        item,
        number,
        shown,
        what,
        planned,
        first,
        second,
        equal,
        ..
    } = &recorded.fact
    else {
        return;
    };
    next.held = None;
    if !equal {
        let todo = format!(
            "{}: {}, {}: {}. Look again together, then both answer again.",
            first.said.told_by, first.typed, second.said.told_by, second.typed
        );
        next.kept_open = Some((item.clone(), todo));
        return;
    }
    if *what == What::Count && second.value != 1 {
        let todo = format!(
            "{} inside: only the sawyer may be. Bring everyone else out, count again.",
            second.typed
        );
        next.kept_open = Some((item.clone(), todo));
        return;
    }
    next.kept_open = None;
    // Of two answers that agree, the greater goes on: of a lean and of a count the guarded side.
    let further = if second.value > first.value {
        second
    } else {
        first
    };
    let value = Value::Measured {
        label: item.clone(),
        what: *what,
        value: further.value,
        planned: *planned,
        typed: further.typed.clone(),
    };
    next.done.push(Done {
        seq: recorded.seq,
        stage: *stage,
        tree: Some(tree.clone()),
        item: item.clone(),
        number: *number,
        shown: shown.clone(),
        values: vec![value.clone()],
        said: second.said.clone(),
        stamp: recorded.stamp.clone(),
        stands: true,
    });
    size_up_if_changed(next, &[value]);
    advance(next);
}

fn stop(next: &mut Session, recorded: &Recorded) {
    // A stop during a talk keeps the place the talk kept.
    let from = next.talk.as_ref().map_or(next.stage, |t| t.from);
    next.held = None;
    next.kept_open = None;
    next.stopped = Some(Stopped {
        from,
        stamp: recorded.stamp.clone(),
        seq: recorded.seq,
        caller: None,
        talk_again: next.talk.is_some(),
    });
    next.stage = Stage::Stopped;
}

/// Back to the place kept; the hold line's items are asked again.
fn resume(next: &mut Session) {
    let Some(stopped) = next.stopped.take() else {
        return;
    };
    next.stage = stopped.from;
    ask_hold_line_again(next);
    if stopped.talk_again {
        let changes = next.talk.take().map_or(
            vec![Change {
                what: "said on the way back from the stop".to_owned(),
                old: "as briefed".to_owned(),
                new: "changed".to_owned(),
            }],
            |t| t.changes,
        );
        talk(next, changes, next.seq);
    } else {
        advance(next);
    }
}

fn talk(next: &mut Session, changes: Vec<Change>, seq: u64) {
    let from = match (&next.talk, next.stage) {
        (Some(talk), Stage::TalkAgain) => talk.from,
        // The line stands before the committing cut of whatever is cut now.
        (_, Stage::HoldLine) => Stage::Cuts,
        (_, stage) => stage,
    };
    ask_hold_line_again(next);
    next.held = None;
    next.talk = Some(Talk { from, changes, seq });
    next.stage = Stage::TalkAgain;
    // Before anybody answered the roll there is nobody to sign again.
    advance(next);
}

fn ask_hold_line_again(next: &mut Session) {
    for done in &mut next.done {
        if done.stage == Stage::HoldLine && done.tree == next.tree {
            done.stands = false;
        }
    }
}

/// After a restart the hold line is asked again. Within a stretch nobody but the tree can say what
/// happened meanwhile: it stays open until somebody says.
fn reopened(next: &mut Session) {
    if next.stretch.is_none() {
        ask_hold_line_again(next);
        if next.stage == Stage::Cuts {
            advance(next);
        }
    }
}

fn stretch_end(next: &mut Session, recorded: &Recorded) {
    let Fact::StretchEnd {
        tree,
        item,
        how,
        lasted_ms,
        said,
    } = &recorded.fact
    else {
        return;
    };
    next.stretch = None;
    next.stretch_lasted_ms = *lasted_ms;
    next.done.push(Done {
        seq: recorded.seq,
        stage: Stage::Cuts,
        tree: Some(tree.clone()),
        item: item.clone(),
        number: 0,
        shown: String::new(),
        values: vec![],
        said: said.clone(),
        stamp: recorded.stamp.clone(),
        stands: true,
    });
    match how {
        StretchEnd::Down => next.stage = Stage::AllClear,
        StretchEnd::OnStump => advance(next),
    }
}

/// Moves on from a stage whose items are all answered, and to the hold line before the
/// committing cut.
fn advance(next: &mut Session) {
    if next.size_up_due.is_some() {
        return;
    }
    let working = matches!(next.stage, Stage::WalkUp | Stage::Cuts | Stage::HoldLine);
    if working && next.stretch.is_none() && next.held_back().is_some() {
        // Nothing may be cut as it stands: the ladder asks to leave it or to measure again.
        return;
    }
    let lit = next.lit();
    if next.stage == Stage::Cuts
        && lit.as_ref().is_some_and(|i| commits(next, &i.id))
        && !next.hold_line_passed()
    {
        next.stage = Stage::HoldLine;
        return;
    }
    if lit.is_some() {
        return;
    }
    match next.stage {
        Stage::RollCall => next.stage = Stage::OwnHazards,
        Stage::OwnHazards => next.stage = Stage::Questions,
        Stage::Questions => next.stage = Stage::Signing,
        Stage::Signing => to_choose(next),
        Stage::ShortTalk => next.stage = Stage::WalkUp,
        Stage::WalkUp => {
            next.stage = Stage::Cuts;
            advance(next);
        }
        Stage::HoldLine => next.stage = Stage::Cuts,
        // Only the tree ends the cuts: down, or on the stump with no rung left.
        Stage::Cuts => {
            if next.committed() {
                next.stage = Stage::AllClear;
            }
        }
        Stage::AllClear => {
            if let Some(tree) = next.tree.clone() {
                let outcome = outcome(next);
                let down = DOWN.contains(&outcome.as_str());
                let end = if down {
                    TreeEnd::AllClear(outcome)
                } else {
                    TreeEnd::Standing(outcome)
                };
                next.ends.insert(tree, end);
            }
            to_choose(next);
        }
        Stage::Closing => next.stage = Stage::Closed,
        Stage::TalkAgain => {
            if let Some(talk) = next.talk.take() {
                next.stage = talk.from;
                advance(next);
            }
        }
        Stage::Stopped | Stage::Choose | Stage::Closed => {}
    }
}

/// Whether the committing cut is this item or stands before it.
fn commits(next: &Session, item: &str) -> bool {
    let Some(card) = next.card() else {
        return false;
    };
    let mut committed = false;
    for rung in &card.rungs {
        committed |= rung.commits;
        if format!("step.{}", rung.id) == item {
            return committed;
        }
    }
    false
}

/// The outcomes after which a tree is down; after any other it still hangs or stands.
const DOWN: [&str; 2] = ["down in its lay", "down beside its lay"];

fn to_choose(next: &mut Session) {
    next.stage = Stage::Choose;
    next.tree = None;
    for done in &mut next.done {
        if done.stage == Stage::Choose {
            done.stands = false;
        }
    }
}

fn outcome(next: &Session) -> String {
    let found = next
        .done
        .iter()
        .rev()
        .find(|d| d.stage == Stage::AllClear && d.item == "outcome" && d.tree == next.tree);
    match found.and_then(|d| d.values.first()) {
        Some(Value::Chosen { say, .. }) => say.clone(),
        Some(Value::Measured { .. } | Value::Words(_) | Value::Signed) | None => String::new(),
    }
}
