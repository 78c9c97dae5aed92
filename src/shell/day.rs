//! Runs the day: keys to acts, effects to the disk and back as facts. It decides nothing; what
//! may be done is the session's word, what is on disk is the record's.

use std::sync::Arc;

use super::beginning::{DayError, Ground, opening, resumed, unlock_open_keys};
use super::clock::Clock;
use super::entropy::{self};
use super::job_folder::{self};
use super::key_store::{KeyError, KeyStore};
use super::record_file::{RecordError, RecordFile};
use crate::briefing::{self, Job};
use crate::parts::What;
use crate::record::code::RecordCode;
use crate::record::draft::Written;
use crate::record::line::hex;
use crate::record::public_key::PublicKey;
use crate::record::{Draft, Stamp as FullStamp, facts};
use crate::session::{
    Act, Effect, Event, Fact, Recorded, Session, Stage, Stamp, outstanding, step,
};
use crate::tui::{Desk, Intent, Key, Overlay};

/// The day under way.
pub struct Day {
    ground: Ground,
    record: RecordFile,
    keys: KeyStore,
    clock: Clock,
    /// The state.
    pub session: Session,
    /// What is half typed.
    pub desk: Desk,
    code: String,
    code_seq: u64,
    waiting_for_key: Option<Act>,
    last_refused_ms: Option<i64>,
    last_stamp: FullStamp,
    /// Whether the record can take nothing more: only paper is left.
    pub on_paper: bool,
}

/// Called between drawing RECORDING and the write.
pub type Redraw<'a> = dyn FnMut(&Day) + 'a;

impl Day {
    /// Begins the day, or goes on where its record ends.
    ///
    /// # Errors
    /// [`DayError`]; nothing is then changed but what the error says.
    pub fn open(ground: Ground) -> Result<Self, DayError> {
        let clock = Clock::start()?;
        let now = clock.now();
        let job = Arc::new(Job::new(&ground.plan, ground.parts.clone()));
        let leader = ground.crew.iter().find(|c| c.id == job.leader);
        if leader.is_none_or(|l| l.key.is_none()) {
            return Err(DayError::LeaderWithoutKey(job.leader.clone()));
        }
        let mut keys = KeyStore::default();
        unlock_open_keys(&ground, &mut keys)?;
        let opening = opening(&ground, now)?;
        let (record, (code, code_seq), session) = match RecordFile::create(&ground.places, &opening)
        {
            Ok((record, first)) => (record, (first.code(), first.last_seq()), Session::new(job)),
            Err(RecordError::Exists(_)) => {
                let (record, lines) = RecordFile::resume(&ground.places, &now)?;
                let last = lines.last();
                let code = last.map_or(([0; 32], 0), |l| (l.hash, l.seq));
                (
                    record,
                    (RecordCode::of(&code.0), code.1),
                    resumed(&lines, &opening, job)?,
                )
            }
            Err(error) => return Err(error.into()),
        };
        let mut day = Self {
            ground,
            record,
            keys,
            clock,
            session,
            desk: Desk::default(),
            code: code.to_string(),
            code_seq,
            waiting_for_key: None,
            last_refused_ms: None,
            last_stamp: now,
            on_paper: false,
        };
        day.first_entries()?;
        day.desk.follow(&day.session);
        Ok(day)
    }

    /// What a new or reopened record begins with: every tree's card, or the word that it goes on.
    fn first_entries(&mut self) -> Result<(), DayError> {
        let mut facts = vec![];
        if self.session.seq > 0 || !self.session.cards.is_empty() {
            facts.push(Fact::Reopened);
            if let Some(held) = &self.session.held {
                facts.push(Fact::LookLost {
                    item: held.item.clone(),
                });
            }
        }
        for tree in &self.ground.plan.trees {
            let id = &tree.id.value;
            if !self.session.cards.contains_key(id) {
                let card = Box::new(self.card(id, &[]));
                facts.push(Fact::SizedUp {
                    tree: id.clone(),
                    card,
                    because: "as planned".to_owned(),
                    changes: vec![],
                });
            }
        }
        for fact in facts {
            self.write(vec![fact])?;
        }
        let due = outstanding(&self.session);
        self.run(due, &mut |_| {})
    }

    fn card(&self, tree: &str, measured: &[(What, i64)]) -> briefing::Card {
        let mut card = briefing::size_up(&self.ground.plan, tree, (measured, &self.ground.parts));
        for code in self.ground.stops.get(tree).into_iter().flatten() {
            if !card.stops.contains(code) {
                card.stops.push(code.clone());
            }
        }
        card
    }

    /// The record's code now.
    pub fn code(&self) -> &str {
        &self.code
    }

    /// Now, for drawing.
    pub fn now(&self) -> (Stamp, i32) {
        let now = self.clock.now();
        (short(&now), now.off_min)
    }

    /// Whether anybody's key is one for demonstrations.
    pub fn demo(&self) -> bool {
        self.ground
            .crew
            .iter()
            .filter_map(|c| c.key.as_ref())
            .any(PublicKey::is_demo)
    }

    /// Takes a key; true where the program is to be left.
    ///
    /// # Errors
    /// [`DayError`] where something other than the write of an act fails.
    pub fn on_key(&mut self, key: &Key, redraw: &mut Redraw<'_>) -> Result<bool, DayError> {
        let before = self.desk.refused;
        let intent = self.desk.on_key(&self.session, key);
        match intent {
            None => {}
            Some(Intent::Leave) => return Ok(true),
            Some(Intent::Unlock(person, passphrase)) => {
                self.unlock(&person, &passphrase, redraw)?
            }
            Some(Intent::Act(act)) => self.act(act, redraw)?,
        }
        if self.desk.refused > before {
            self.last_refused_ms = Some(self.clock.now().up_ms);
        }
        Ok(false)
    }

    /// What a quiet second brings: refused keys go on the record.
    ///
    /// # Errors
    /// [`DayError`] where the write fails and no other place takes it.
    pub fn on_quiet(&mut self) -> Result<(), DayError> {
        let quiet = self
            .last_refused_ms
            .is_some_and(|at| self.clock.now().up_ms - at >= 1_000);
        if quiet && !self.on_paper && self.session.stage != Stage::Closed {
            let facts = self.refused_keys();
            // What is half typed stays: nobody answered anything.
            match self.write(facts) {
                Ok(_) => {}
                Err(RecordError::NotRecorded { seq, source }) => self.not_recorded(seq, &source),
                Err(error) => return Err(error.into()),
            }
        }
        Ok(())
    }

    fn refused_keys(&mut self) -> Vec<Fact> {
        self.last_refused_ms = None;
        match std::mem::take(&mut self.desk.refused) {
            0 => vec![],
            count => vec![Fact::RefusedKeys { count }],
        }
    }

    fn unlock(
        &mut self,
        person: &str,
        passphrase: &str,
        redraw: &mut Redraw<'_>,
    ) -> Result<(), DayError> {
        let path = job_folder::private_key(&self.ground.plan, &self.ground.plan_path, person);
        let Some(path) = path else { return Ok(()) };
        match self.keys.unlock(person, &path, Some(passphrase)) {
            Ok(public) if self.is_the_key_of(person, &public) => {
                match self.waiting_for_key.take() {
                    Some(act) => self.act(act, redraw),
                    None => Ok(()),
                }
            }
            Ok(_) => {
                self.keys.lock(person);
                self.desk.say(format!(
                    "not signed: {} is not the key the plan names",
                    path.display()
                ));
                Ok(())
            }
            Err(KeyError::WrongPassphrase(_)) => {
                self.desk.say("wrong passphrase: not signed, not written");
                Ok(())
            }
            Err(error) => {
                self.desk.say(format!("not signed: {error}"));
                Ok(())
            }
        }
    }

    fn is_the_key_of(&self, person: &str, public: &PublicKey) -> bool {
        let named = self
            .ground
            .crew
            .iter()
            .find(|c| c.id == person)
            .and_then(|c| c.key.as_ref());
        named.is_some_and(|key| key.fingerprint() == public.fingerprint())
    }

    fn act(&mut self, mut act: Act, redraw: &mut Redraw<'_>) -> Result<(), DayError> {
        if self.on_paper {
            self.desk.say("NOT RECORDED: go on on paper");
            return Ok(());
        }
        if let Act::Confirm { nonce, .. } = &mut act {
            *nonce = hex(&entropy::bytes::<16>()?);
        }
        let now = self.clock.now();
        let event = Event::Act {
            act: act.clone(),
            now: short(&now),
        };
        let effects = match step(&self.session, &event) {
            Ok(step) => step.effects,
            Err(refusal) => {
                self.desk.refused(refusal.to_string());
                return Ok(());
            }
        };
        if let Some(person) = self.locked_signer(&effects) {
            self.waiting_for_key = Some(act);
            self.desk.overlay = Overlay::Passphrase {
                person,
                typed: String::new(),
            };
            return Ok(());
        }
        let before = self.session.stage;
        let held_before = self.session.held.is_some();
        self.run(effects, redraw)?;
        if let (Act::Confirm { typed, nonce, .. }, false, true) =
            (&act, held_before, self.session.held.is_some())
        {
            self.desk.hold(typed, nonce.clone());
        }
        self.show_code(before, redraw)
    }

    /// The code is carried away after the briefing and after any bad result.
    fn show_code(&mut self, before: Stage, redraw: &mut Redraw<'_>) -> Result<(), DayError> {
        let briefed = before == Stage::Signing && self.session.stage == Stage::Choose;
        let bad = self.session.done.last().is_some_and(|d| {
            d.stage == Stage::AllClear
                && d.item == "outcome"
                && d.seq + 2 >= self.session.seq
                && !matches!(
                    d.values.first(),
                    Some(crate::session::Value::Chosen { digit: 1, .. })
                )
        });
        let show = briefed || (bad && before == Stage::AllClear);
        if !show {
            return Ok(());
        }
        let code = self.code.clone();
        self.record_facts(
            vec![Fact::ReceiptShown {
                shown_seq: self.code_seq,
                code,
            }],
            redraw,
        )?;
        self.desk.overlay = Overlay::Receipt;
        Ok(())
    }

    fn locked_signer(&self, effects: &[Effect]) -> Option<String> {
        effects
            .iter()
            .flat_map(|effect| match effect {
                Effect::Record(facts) => facts.as_slice(),
                Effect::SizeUp { .. } => &[],
            })
            .find_map(|fact| {
                let Fact::Answer(answer) = fact else {
                    return None;
                };
                answer
                    .signer
                    .clone()
                    .filter(|id| !self.keys.is_unlocked(id))
            })
    }

    /// Carries effects out until none is left.
    fn run(&mut self, effects: Vec<Effect>, redraw: &mut Redraw<'_>) -> Result<(), DayError> {
        let mut due: std::collections::VecDeque<Effect> = effects.into();
        while let Some(effect) = due.pop_front() {
            match effect {
                Effect::Record(facts) => due.extend(self.record_facts(facts, redraw)?),
                Effect::SizeUp {
                    tree,
                    because,
                    measured,
                } => {
                    redraw(self);
                    let card = Box::new(self.card(&tree, &measured));
                    let sized = Event::SizedUp {
                        tree,
                        card,
                        because,
                    };
                    if let Ok(step) = step(&self.session, &sized) {
                        due.extend(step.effects);
                    }
                }
            }
        }
        Ok(())
    }

    /// Draws RECORDING, writes, and only then folds the facts into the state.
    fn record_facts(
        &mut self,
        facts: Vec<Fact>,
        redraw: &mut Redraw<'_>,
    ) -> Result<Vec<Effect>, DayError> {
        if facts.is_empty() {
            return Ok(vec![]);
        }
        let mut all = self.refused_keys();
        all.extend(facts);
        self.desk.recording = true;
        redraw(self);
        match self.write(all) {
            Ok(effects) => {
                self.desk.recorded(&self.session);
                Ok(effects)
            }
            Err(RecordError::NotRecorded { seq, source }) => {
                self.desk.recording = false;
                self.not_recorded(seq, &source);
                // What the state itself asks for is done all the same, in the new file.
                Ok(if self.on_paper {
                    vec![]
                } else {
                    outstanding(&self.session)
                })
            }
            Err(error @ (RecordError::NearlyFull | RecordError::Draft(_))) => {
                self.desk.recording = false;
                self.desk.say(format!("NOT RECORDED: {error}"));
                Ok(vec![])
            }
            Err(error) => Err(error.into()),
        }
    }

    /// A failed write: the act is lost and said to be; the acknowledged lines go to a new file.
    fn not_recorded(&mut self, seq: u64, source: &std::io::Error) {
        let now = self.clock.now();
        match self.record.rebuild(&now) {
            Ok(line) => {
                self.code = RecordCode::of(&line.hash).to_string();
                self.code_seq = line.seq;
                self.desk.say(format!(
                    "NOT RECORDED: entry {seq} ({source}). Goes on in {}. Do it again.",
                    self.record.path().display()
                ));
            }
            Err(_) => {
                self.on_paper = true;
                self.desk.say(format!(
                    "NOT RECORDED: entry {seq} ({source}). Go on on paper. Code {}",
                    self.code
                ));
            }
        }
    }

    fn write(&mut self, facts: Vec<Fact>) -> Result<Vec<Effect>, RecordError> {
        let stamp = self.clock.now();
        let language = self.ground.parts.tailgate.language.clone();
        let mut drafts: Vec<Draft> = self.clock_step(&stamp).into_iter().collect();
        let ahead = drafts.len();
        drafts.extend(facts.iter().map(|fact| facts::draft(fact, &language)));
        let written = self.record.append(&drafts, &stamp, &self.keys)?;
        if let Some(last) = written.last() {
            self.code = last.code().to_string();
            self.code_seq = last.last_seq();
        }
        self.last_stamp = stamp;
        let at = short(&stamp);
        // The state is folded from the entry as it stands on disk, so that live equals replayed.
        let place = |(fact, written): (Fact, &Written)| {
            facts::fact(&written.entry).unwrap_or(Recorded {
                seq: written.entry.seq,
                stamp: at.clone(),
                fact,
            })
        };
        let recorded: Vec<Recorded> = facts
            .into_iter()
            .zip(&written[ahead..])
            .map(place)
            .collect();
        // Recorded facts are never refused: they have happened.
        let Ok(step) = step(&self.session, &Event::Recorded(recorded)) else {
            return Ok(vec![]);
        };
        self.session = step.next;
        Ok(step.effects)
    }

    /// An entry where the wall clock moved against the running clock by more than two seconds and
    /// what a clock may drift.
    fn clock_step(&self, now: &FullStamp) -> Option<Draft> {
        if now.boot != self.last_stamp.boot {
            return None;
        }
        let ran = now.up_ms - self.last_stamp.up_ms;
        let moved = now.utc_ms - self.last_stamp.utc_ms - ran;
        let drift = 2_000 + ran.abs() * 600 / 1_000_000;
        (moved.abs() > drift).then(|| {
            let mut members = serde_json::Map::new();
            members.insert("moved_ms".into(), moved.into());
            Draft::unsigned("clock_step", members)
        })
    }
}

/// The session's part of a stamp.
const fn short(stamp: &FullStamp) -> Stamp {
    Stamp {
        utc_ms: stamp.utc_ms,
        up_ms: stamp.up_ms,
        boot: stamp.boot.0,
    }
}
