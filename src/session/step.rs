//! The one transition: an event against the state gives the next state and what is to be done.

use super::apply::apply;
use super::decide::{Act, Refusal, decide};
use super::fact::{Change, Fact, Recorded, Stamp, Value};
use super::stage::Stage;
use super::state::Session;
use crate::briefing::Card;
use crate::parts::What;

/// Something that happened.
#[derive(Debug, Clone, PartialEq)]
pub enum Event {
    /// Somebody at the keys meant something.
    Act {
        /// What.
        act: Act,
        /// When.
        now: Stamp,
    },
    /// Facts are on disk.
    Recorded(Vec<Recorded>),
    /// A tree was sized up again.
    SizedUp {
        /// The tree.
        tree: String,
        /// Its card.
        card: Box<Card>,
        /// Why.
        because: String,
    },
}

/// Something to be done.
#[derive(Debug, Clone, PartialEq)]
pub enum Effect {
    /// Put these on the record, in one write.
    Record(Vec<Fact>),
    /// Size a tree up with values as measured.
    SizeUp {
        /// The tree.
        tree: String,
        /// Why.
        because: String,
        /// What was measured, in the record's units.
        measured: Vec<(What, i64)>,
    },
}

/// The next state with its effects.
#[derive(Debug, Clone, PartialEq)]
pub struct Step {
    /// The next state.
    pub next: Session,
    /// What is to be done.
    pub effects: Vec<Effect>,
}

/// Takes one event.
///
/// # Errors
/// [`Refusal`] where an act means nothing now; the state is then as it was.
pub fn step(session: &Session, event: &Event) -> Result<Step, Refusal> {
    match event {
        Event::Act { act, now } => {
            let facts = decide(session, act, now)?;
            Ok(Step {
                next: session.clone(),
                effects: vec![Effect::Record(facts)],
            })
        }
        Event::Recorded(recorded) => {
            let next = recorded.iter().fold(session.clone(), |s, r| apply(&s, r));
            let effects = outstanding(&next);
            Ok(Step { next, effects })
        }
        Event::SizedUp {
            tree,
            card,
            because,
        } => {
            let changes = changes(session, tree, card);
            let fact = Fact::SizedUp {
                tree: tree.clone(),
                card: card.clone(),
                because: because.clone(),
                changes,
            };
            Ok(Step {
                next: session.clone(),
                effects: vec![Effect::Record(vec![fact])],
            })
        }
    }
}

/// What the state itself asks for: it is the same after a restart.
pub fn outstanding(session: &Session) -> Vec<Effect> {
    if let Some((tree, because)) = &session.size_up_due {
        return vec![Effect::SizeUp {
            tree: tree.clone(),
            because: because.clone(),
            measured: measured(session, tree),
        }];
    }
    let answered = session.stage == Stage::Stopped && session.lit().is_none();
    if answered {
        vec![Effect::Record(vec![Fact::Resumed])]
    } else {
        vec![]
    }
}

/// What was measured at a tree and still stands; of several, the last.
fn measured(session: &Session, tree: &str) -> Vec<(What, i64)> {
    let mut all: Vec<(What, i64)> = vec![];
    let standing = session
        .done
        .iter()
        .filter(|d| d.stands && d.tree.as_deref() == Some(tree));
    for done in standing {
        // Of two ends of one thing the lesser counts, as everywhere the guarded side; of a hinge
        // both do.
        let mut of_item: Vec<(What, Vec<i64>)> = vec![];
        for value in &done.values {
            let Value::Measured { what, value, .. } = value else {
                continue;
            };
            match of_item.iter_mut().find(|(w, _)| w == what) {
                Some((What::Hinge, ends)) => ends.push(*value),
                Some((_, ends)) => ends[0] = ends[0].min(*value),
                None => of_item.push((*what, vec![*value])),
            }
        }
        for (what, ends) in of_item {
            all.retain(|(w, _)| *w != what);
            all.extend(ends.into_iter().map(|value| (what, value)));
        }
    }
    all
}

/// What changed past its tolerance since the crew last signed.
fn changes(session: &Session, tree: &str, card: &Card) -> Vec<Change> {
    let Some(old) = session.cards.get(tree) else {
        return vec![];
    };
    if !session.stage.at_tree() {
        return vec![];
    }
    let mut changes = vec![];
    let mut changed = |what: &str, old: String, new: String| {
        if old != new {
            changes.push(Change {
                what: what.to_owned(),
                old,
                new,
            });
        }
    };
    let method = |card: &Card| {
        card.method
            .clone()
            .unwrap_or_else(|| "not with a chainsaw alone".to_owned())
    };
    changed("method", method(old), method(card));
    changed("state", old.state.clone(), card.state.clone());
    changed("stop findings", old.stops.join(", "), card.stops.join(", "));
    changes.extend(past_tolerance(session));
    changes
}

/// The last answer's values that lie outside their tolerance, and a wind over the limit.
fn past_tolerance(session: &Session) -> Vec<Change> {
    let Some(last) = session.done_here().last().copied().cloned() else {
        return vec![];
    };
    let items = session.every_item();
    let item = items.iter().find(|i| i.id == last.item);
    let tolerance = |label: &str| {
        item.and_then(|i| match &i.form {
            crate::briefing::Form::Measure(fields) => fields
                .iter()
                .find(|f| f.label == label)
                .and_then(|f| f.planned)
                .map(|p| p.tolerance),
            crate::briefing::Form::Choose(_)
            | crate::briefing::Form::Words(_)
            | crate::briefing::Form::Sign
            | crate::briefing::Form::Start => None,
        })
    };
    let mut changes = vec![];
    for value in &last.values {
        let Value::Measured {
            label,
            what,
            value,
            planned,
            typed,
        } = value
        else {
            continue;
        };
        if let (What::Wind, Some(limit)) = (what, session.job.wind_limit_mm_s)
            && *value > limit
        {
            changes.push(Change {
                what: "wind over the plan's limit: wait, or leave it".to_owned(),
                old: in_words(*what, limit),
                new: typed.clone(),
            });
        }
        if let (Some(planned), Some(tolerance)) = (planned, tolerance(label))
            && (value - planned).abs() > tolerance
        {
            changes.push(Change {
                what: label.clone(),
                old: in_words(*what, *planned),
                new: typed.clone(),
            });
        }
    }
    changes
}

/// A value of the record with its unit, for what the crew reads and signs.
fn in_words(what: What, value: i64) -> String {
    match what {
        What::Count => format!("{value} people"),
        What::Lean => format!("{} deg", value / 1_000),
        What::Wind => format!("{} km/h", (value * 36 + 5_000) / 10_000),
        What::Stump
        | What::Hinge
        | What::FaceDepth
        | What::Strap
        | What::BackCutHeight
        | What::Bypass
        | What::BehindHinge
        | What::BackCutDepth => format!("{} mm", value / 1_000),
    }
}
