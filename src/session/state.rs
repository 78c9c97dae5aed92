//! The state: what the facts so far add up to, and the ladder it shows.

use std::collections::BTreeMap;
use std::sync::Arc;

use super::fact::{Change, Fact, Said, Stamp, Value};
use super::stage::Stage;
use crate::briefing::{self, Card, Item, Job};

/// An item that was answered.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Done {
    /// The entry's number.
    pub seq: u64,
    /// The stage.
    pub stage: Stage,
    /// The tree.
    pub tree: Option<String>,
    /// The item's id.
    pub item: String,
    /// Its number on the ladder.
    pub number: u8,
    /// The rung and the call as shown.
    pub shown: String,
    /// The values.
    pub values: Vec<Value>,
    /// Who said it.
    pub said: Said,
    /// When.
    pub stamp: Stamp,
    /// Whether it still stands: not taken back, not asked again.
    pub stands: bool,
}

/// A first blind answer that is held.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Held {
    /// The item.
    pub item: String,
    /// The commitment on the record.
    pub commitment: String,
    /// Who said it.
    pub said: Said,
}

/// A stop.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Stopped {
    /// The stage whose place is kept.
    pub from: Stage,
    /// When.
    pub stamp: Stamp,
    /// Its entry's number.
    pub seq: u64,
    /// Who called it, once said.
    pub caller: Option<String>,
    /// Whether an answer since makes the crew talk again.
    pub talk_again: bool,
}

/// A talk again.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Talk {
    /// The stage whose place is kept.
    pub from: Stage,
    /// What changed.
    pub changes: Vec<Change>,
    /// Its entry's number.
    pub seq: u64,
}

/// A stretch under way: from the start of the committing cut until the tree says.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Stretch {
    /// The item.
    pub item: String,
    /// When it began.
    pub start: Stamp,
    /// How often STOP was called in it.
    pub stops: u32,
}

/// How work at a tree ended.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum TreeEnd {
    /// All clear was said.
    AllClear(String),
    /// Left standing with cuts in it.
    LeftStanding,
    /// Lodged, set back or split: worked on, and not down.
    Standing(String),
}

/// The state.
#[derive(Debug, Clone, PartialEq)]
pub struct Session {
    /// The job; it never changes.
    pub job: Arc<Job>,
    /// The stage.
    pub stage: Stage,
    /// The tree at hand.
    pub tree: Option<String>,
    /// Who answered at roll call.
    pub present: BTreeMap<String, bool>,
    /// Everything answered, in order.
    pub done: Vec<Done>,
    /// Hazards named, by whom.
    pub hazards: Vec<(String, String)>,
    /// The trees' cards.
    pub cards: BTreeMap<String, Card>,
    /// How trees ended.
    pub ends: BTreeMap<String, TreeEnd>,
    /// A held blind answer.
    pub held: Option<Held>,
    /// The answer that keeps the lit item open.
    pub kept_open: Option<(String, String)>,
    /// A stop.
    pub stopped: Option<Stopped>,
    /// A talk again.
    pub talk: Option<Talk>,
    /// A stretch.
    pub stretch: Option<Stretch>,
    /// How long the last stretch lasted, milliseconds.
    pub stretch_lasted_ms: Option<i64>,
    /// A tree that must be sized up before anything else, and why.
    pub size_up_due: Option<(String, String)>,
    /// Who has the keys.
    pub keyer: String,
    /// The last entry's stamp.
    pub last: Stamp,
    /// The last entry's number.
    pub seq: u64,
    /// How often the place was kept.
    pub places_kept: u32,
}

impl Session {
    /// The state before anything is on the record.
    pub fn new(job: Arc<Job>) -> Self {
        let keyer = job.leader.clone();
        Self {
            job,
            stage: Stage::RollCall,
            tree: None,
            present: BTreeMap::new(),
            done: vec![],
            hazards: vec![],
            cards: BTreeMap::new(),
            ends: BTreeMap::new(),
            held: None,
            kept_open: None,
            stopped: None,
            talk: None,
            stretch: None,
            stretch_lasted_ms: None,
            size_up_due: None,
            keyer,
            last: Stamp::default(),
            seq: 0,
            places_kept: 0,
        }
    }

    /// The people present, in the plan's order.
    pub fn people_present(&self) -> Vec<String> {
        let here = |id: &String| self.present.get(id).copied().unwrap_or(false);
        self.job
            .people
            .iter()
            .map(|p| p.id.clone())
            .filter(here)
            .collect()
    }

    /// The ladder of the present stage: every item, numbered within pages of nine.
    pub fn items(&self) -> Vec<Item> {
        let present = self.people_present();
        let mut items = self.unpaged(&present);
        let page_of_first_open = items
            .iter()
            .position(|i| !self.is_done(i))
            .map_or(0, |p| p / 9);
        items = items
            .into_iter()
            .skip(page_of_first_open * 9)
            .take(9)
            .collect();
        for (number, item) in (1..).zip(items.iter_mut()) {
            item.number = number;
        }
        items
    }

    /// Every item of the present stage, on whatever page.
    pub fn every_item(&self) -> Vec<Item> {
        self.unpaged(&self.people_present())
    }

    fn unpaged(&self, present: &[String]) -> Vec<Item> {
        let job = &self.job;
        let tree = self.tree.as_deref().and_then(|id| job.tree(id));
        match (self.stage, tree) {
            (Stage::RollCall, _) => briefing::roll_call(job),
            (Stage::OwnHazards, _) => briefing::own_hazards(job, present),
            (Stage::Questions, _) => briefing::questions(job, present),
            (Stage::Signing, _) => briefing::signing(job, present),
            (Stage::Choose, _) => briefing::choose(job, &self.open_trees()),
            (Stage::Closing, _) => briefing::closing(job, present),
            (Stage::TalkAgain, _) => briefing::talk_again(job, present),
            (Stage::Closed, _) => vec![],
            (Stage::Stopped, tree) => {
                let caller = self.stopped.as_ref().and_then(|s| s.caller.as_deref());
                let tree = tree.or(job.trees.first());
                tree.map_or(vec![], |t| {
                    briefing::list(job, present, (&job.parts.stopped, t, caller))
                })
            }
            (Stage::WalkUp | Stage::Cuts | Stage::HoldLine, Some(tree)) if self.blocked() => {
                vec![briefing::held_back(
                    job,
                    tree,
                    &self.held_back().unwrap_or_default(),
                )]
            }
            (Stage::ShortTalk, Some(tree)) => {
                briefing::list(job, present, (&job.parts.short_talk, tree, None))
            }
            (Stage::WalkUp, Some(tree)) => {
                briefing::list(job, present, (&job.parts.walk_up, tree, None))
            }
            (Stage::AllClear, Some(tree)) => {
                briefing::list(job, present, (&job.parts.all_clear, tree, None))
            }
            (Stage::HoldLine, Some(tree)) => briefing::hold_line(job, present, tree),
            (Stage::Cuts, Some(tree)) => self
                .cards
                .get(&tree.id)
                .map_or(vec![], |card| briefing::cuts(job, present, (tree, card))),
            (
                Stage::ShortTalk | Stage::WalkUp | Stage::AllClear | Stage::HoldLine | Stage::Cuts,
                None,
            ) => vec![],
        }
    }

    /// Trees not ended, with what keeps each from being begun.
    fn open_trees(&self) -> Vec<(String, Option<String>)> {
        let waits = |tree: &briefing::JobTree| {
            let first = tree
                .after
                .iter()
                .find(|id| !matches!(self.ends.get(*id), Some(TreeEnd::AllClear(_))));
            if let Some(first) = first {
                return Some(match self.ends.get(first) {
                    Some(TreeEnd::Standing(how)) => format!("{first} is not down: {how}."),
                    Some(TreeEnd::LeftStanding) => format!("{first} was left standing."),
                    Some(TreeEnd::AllClear(_)) | None => format!("{first} must be down first."),
                });
            }
            let here = |id: &String| self.present.get(id).copied().unwrap_or(false);
            if let Some(sawyer) = tree.sawyer.as_ref().filter(|id| !here(id)) {
                let name = self.job.name_of(sawyer);
                return Some(format!(
                    "{name} is not here: plan it anew for a sawyer who is."
                ));
            }
            let card = self.cards.get(&tree.id)?;
            if card.method.is_none() {
                let ask = self
                    .job
                    .qualified
                    .as_ref()
                    .map_or("the qualified person".to_owned(), |(n, r)| {
                        format!("{n}, {r}")
                    });
                return Some(format!(
                    "Not with a chainsaw alone as it stands. Ask {ask}."
                ));
            }
            if !card.stops.is_empty() {
                return Some(format!(
                    "The plan has stop findings for it: {}.",
                    card.stops.join(", ")
                ));
            }
            None
        };
        self.job
            .trees
            .iter()
            .filter(|t| !self.ends.contains_key(&t.id))
            .map(|t| (t.id.clone(), waits(t)))
            .collect()
    }

    /// Whether an item of the present stage is answered and still stands.
    pub fn is_done(&self, item: &Item) -> bool {
        self.done
            .iter()
            .any(|d| self.counts(d) && d.item == item.id)
    }

    /// Whether an answer belongs to the present stage, tree and round, and still stands.
    fn counts(&self, done: &Done) -> bool {
        let since = match self.stage {
            Stage::Stopped => self.stopped.as_ref().map_or(0, |s| s.seq),
            Stage::TalkAgain => self.talk.as_ref().map_or(0, |t| t.seq),
            Stage::RollCall
            | Stage::OwnHazards
            | Stage::Questions
            | Stage::Signing
            | Stage::Choose
            | Stage::ShortTalk
            | Stage::WalkUp
            | Stage::Cuts
            | Stage::HoldLine
            | Stage::AllClear
            | Stage::Closing
            | Stage::Closed => 0,
        };
        let same_tree = !self.stage.at_tree() || done.tree == self.tree;
        done.stands && done.stage == self.stage && same_tree && done.seq >= since
    }

    /// The lit item: the first that is not answered.
    pub fn lit(&self) -> Option<Item> {
        self.items().into_iter().find(|i| !self.is_done(i))
    }

    /// The answers of the present stage that stand, in order.
    pub fn done_here(&self) -> Vec<&Done> {
        self.done.iter().filter(|d| self.counts(d)).collect()
    }

    /// Whether the hold line of the tree at hand stands passed.
    pub fn hold_line_passed(&self) -> bool {
        let Some(tree) = self.tree.as_deref().and_then(|id| self.job.tree(id)) else {
            return false;
        };
        let present = self.people_present();
        let standing = |id: &str| {
            self.done.iter().any(|d| {
                d.stands
                    && d.stage == Stage::HoldLine
                    && d.tree.as_deref() == Some(tree.id.as_str())
                    && d.item == id
            })
        };
        briefing::hold_line(&self.job, &present, tree)
            .iter()
            .all(|i| standing(&i.id))
    }

    /// Why nothing may be cut at the tree at hand as it stands now.
    pub fn held_back(&self) -> Option<String> {
        let card = self.card()?;
        if card.method.is_none() {
            let why = card
                .refused
                .first()
                .map_or("no method is proposed", String::as_str);
            return Some(format!("Not with a chainsaw alone as it stands: {why}"));
        }
        let stops = card.stops.join(", ");
        (!stops.is_empty()).then(|| format!("Stop findings stand against it: {stops}"))
    }

    /// Whether the ladder gives way to what holds the tree back.
    fn blocked(&self) -> bool {
        self.stretch.is_none()
            && !self.committed()
            && self.size_up_due.is_none()
            && self.held_back().is_some()
    }

    /// Whether a committing cut was begun at the tree at hand: from then on only the tree decides.
    pub fn committed(&self) -> bool {
        let of_tree = |d: &Done| d.stands && d.stage == Stage::Cuts && d.tree == self.tree;
        self.done.iter().any(|d| of_tree(d) && d.shown.is_empty())
    }

    /// The card of the tree at hand.
    pub fn card(&self) -> Option<&Card> {
        self.tree.as_ref().and_then(|id| self.cards.get(id))
    }

    /// Whether a fact may be folded into this state at all; a closed day takes nothing but
    /// receipts.
    pub(super) fn takes(&self, fact: &Fact) -> bool {
        self.stage != Stage::Closed || matches!(fact, Fact::ReceiptShown { .. } | Fact::Reopened)
    }
}
