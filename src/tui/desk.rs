//! The desk: what is half typed and what lies open on the screen. Not part of the day's state,
//! never on the record. A key against the desk gives the next desk and, at most, an intent.

use tui_textarea::{Input, Key as AreaKey, TextArea};

use super::answer;
use super::key::Key;
use crate::briefing::{Form, Item};
use crate::session::{Act, Heard, HeldAnswer, Session, Stage, Typed};

/// What lies over the work screen.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Overlay {
    /// Nothing.
    None,
    /// The help of this screen.
    Help,
    /// Words being written; SPACE is a letter here.
    Words,
    /// A passphrase being typed for a person's key.
    Passphrase {
        /// Whose key.
        person: String,
        /// What is typed; shown as stars.
        typed: String,
    },
    /// The record's code for everyone to carry away.
    Receipt,
    /// Whether to leave the program.
    Leave,
}

/// What a key meant beyond the desk.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Intent {
    /// An act for the session.
    Act(Act),
    /// A key to unlock: the person and the passphrase.
    Unlock(String, String),
    /// Leave the program; the place is kept.
    Leave,
}

/// The desk.
#[derive(Debug, Clone)]
pub struct Desk {
    /// The item the fields belong to.
    item: String,
    /// Typed fields.
    pub(super) fields: Vec<String>,
    /// The field with the caret; past the last field it is the step's number.
    pub(super) focus: usize,
    /// The step's number as typed.
    pub(super) number: String,
    /// How answers are heard.
    pub(super) heard: Heard,
    /// The last refusal or news.
    pub(super) message: String,
    /// What lies over the screen.
    pub overlay: Overlay,
    /// The words.
    pub(super) area: TextArea<'static>,
    /// A first blind answer, until the second is in.
    pub first: Option<HeldAnswer>,
    /// Whether a write is under way.
    pub recording: bool,
    /// Refused keys not yet on the record.
    pub refused: i64,
    /// Which picture stands at the right.
    pub(super) picture: Picture,
}

/// The pictures that can be chosen.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Picture {
    /// The step itself.
    Step,
    /// The figures of the tree.
    Figures,
}

impl Default for Desk {
    fn default() -> Self {
        Self {
            item: String::new(),
            fields: vec![],
            focus: 0,
            number: String::new(),
            heard: Heard::Voice,
            message: String::new(),
            overlay: Overlay::None,
            area: TextArea::default(),
            first: None,
            recording: false,
            refused: 0,
            picture: Picture::Step,
        }
    }
}

impl Desk {
    /// Sets the desk to the lit item: empty fields where the item is another one.
    pub fn follow(&mut self, session: &Session) {
        let lit = session.lit();
        let key = lit.as_ref().map_or(String::new(), |i| key_of(session, i));
        if key != self.item {
            self.item = key;
            self.clear();
            self.area = TextArea::default();
            self.fields = lit.map_or(vec![], |i| {
                vec![String::new(); answer::slots(&i, session.job.units).len()]
            });
            if self.overlay == Overlay::Words {
                self.overlay = Overlay::None;
            }
        }
        if session.held.is_none() {
            self.first = None;
        }
    }

    /// Says something in the message line.
    pub fn say(&mut self, words: impl Into<String>) {
        self.message = words.into();
    }

    fn clear(&mut self) {
        for field in &mut self.fields {
            field.clear();
        }
        self.number.clear();
        self.focus = 0;
    }

    /// The words written so far.
    pub(super) fn words(&self) -> String {
        self.area.lines().join("\n")
    }

    /// Takes a key.
    pub fn on_key(&mut self, session: &Session, key: &Key) -> Option<Intent> {
        if session.stretch.is_some() {
            self.overlay = Overlay::None;
            return self.in_stretch(key);
        }
        match self.overlay.clone() {
            Overlay::None => self.on_work_screen(session, key),
            Overlay::Help | Overlay::Receipt => {
                if *key == Key::Char(' ') || *key == Key::Interrupt {
                    return self.stop(session);
                }
                self.overlay = Overlay::None;
                None
            }
            Overlay::Words => {
                self.on_words(key);
                None
            }
            Overlay::Passphrase { person, typed } => self.on_passphrase(key, person, typed),
            Overlay::Leave => {
                if *key == Key::Char(' ') {
                    return self.stop(session);
                }
                self.overlay = Overlay::None;
                (*key == Key::Enter).then_some(Intent::Leave)
            }
        }
    }

    fn in_stretch(&mut self, key: &Key) -> Option<Intent> {
        match key {
            Key::Char(' ') | Key::Interrupt => Some(Intent::Act(Act::Stop)),
            Key::Char('d') => Some(Intent::Act(Act::Down)),
            Key::Char('o') => Some(Intent::Act(Act::OnStump)),
            Key::Char(_)
            | Key::Enter
            | Key::Esc
            | Key::Tab
            | Key::Backspace
            | Key::Up
            | Key::Down
            | Key::Left
            | Key::Right
            | Key::Paste(_) => {
                self.refused += 1;
                None
            }
        }
    }

    fn stop(&mut self, session: &Session) -> Option<Intent> {
        self.overlay = Overlay::None;
        if matches!(session.stage, Stage::Stopped | Stage::Closed) {
            return None;
        }
        Some(Intent::Act(Act::Stop))
    }

    fn on_work_screen(&mut self, session: &Session, key: &Key) -> Option<Intent> {
        // The figures cover the step: nothing is answered unseen, any key brings the step back.
        let passes = matches!(key, Key::Char(' ' | 'v' | '?' | 'q') | Key::Interrupt);
        if self.picture == Picture::Figures && session.card().is_some() && !passes {
            self.picture = Picture::Step;
            return None;
        }
        match key {
            Key::Char(' ') => return self.stop(session),
            Key::Interrupt if matches!(session.stage, Stage::Stopped | Stage::Closed) => {
                self.overlay = Overlay::Leave;
            }
            Key::Interrupt => return self.stop(session),
            Key::Char(digit) if digit.is_ascii_digit() => self.digit(*digit),
            Key::Backspace => {
                self.edited().pop();
            }
            Key::Esc => {
                self.clear();
                self.message.clear();
            }
            Key::Tab | Key::Down | Key::Right => {
                self.focus = (self.focus + 1) % (self.fields.len() + 1)
            }
            Key::Up | Key::Left => {
                self.focus = (self.focus + self.fields.len()) % (self.fields.len() + 1)
            }
            Key::Enter => return self.enter(session),
            Key::Char('u') => return Some(Intent::Act(Act::TakeBack)),
            Key::Char('m') => return Some(Intent::Act(Act::KeepPlace)),
            Key::Char('h') => self.heard = self.heard.next(),
            Key::Char('v') => {
                self.picture = match self.picture {
                    Picture::Step => Picture::Figures,
                    Picture::Figures => Picture::Step,
                };
            }
            Key::Char('w')
                if session
                    .lit()
                    .is_some_and(|i| matches!(i.form, Form::Words(_))) =>
            {
                self.overlay = Overlay::Words;
            }
            Key::Char('q') => self.overlay = Overlay::Leave,
            Key::Char('?') => self.overlay = Overlay::Help,
            Key::Char(_) | Key::Paste(_) => self.refused += 1,
        }
        None
    }

    fn edited(&mut self) -> &mut String {
        match self.fields.get_mut(self.focus) {
            Some(field) => field,
            None => &mut self.number,
        }
    }

    fn digit(&mut self, digit: char) {
        let most = if self.focus < self.fields.len() { 5 } else { 1 };
        let field = self.edited();
        if field.len() < most {
            field.push(digit);
        }
    }

    fn enter(&mut self, session: &Session) -> Option<Intent> {
        let item = session.lit()?;
        if self.focus < self.fields.len() {
            self.focus += 1;
            return None;
        }
        let words = self.words();
        let Ok(number) = self.number.parse::<u8>() else {
            self.refused += 1;
            self.say(format!(
                "key the step's own number, {}, then Enter",
                item.number
            ));
            return None;
        };
        let Some(typed) = answer::typed(&item, &self.fields, &words, session.job.units) else {
            self.refused += 1;
            self.say(wanted(&item));
            self.focus = 0;
            return None;
        };
        self.number.clear();
        self.message.clear();
        Some(Intent::Act(Act::Confirm {
            number,
            typed,
            heard: self.heard,
            nonce: String::new(),
            first: self.first.clone(),
        }))
    }

    fn on_words(&mut self, key: &Key) {
        let input = |key| Input {
            key,
            ctrl: false,
            alt: false,
            shift: false,
        };
        match key {
            Key::Esc | Key::Tab | Key::Interrupt => self.overlay = Overlay::None,
            Key::Char(c) => drop(self.area.input(input(AreaKey::Char(*c)))),
            Key::Enter => drop(self.area.input(input(AreaKey::Enter))),
            Key::Backspace => drop(self.area.input(input(AreaKey::Backspace))),
            Key::Up => drop(self.area.input(input(AreaKey::Up))),
            Key::Down => drop(self.area.input(input(AreaKey::Down))),
            Key::Left => drop(self.area.input(input(AreaKey::Left))),
            Key::Right => drop(self.area.input(input(AreaKey::Right))),
            Key::Paste(text) => drop(self.area.insert_str(text)),
        }
        const MOST: usize = 2_000;
        let words = self.words();
        if words.chars().count() > MOST {
            let kept: String = words.chars().take(MOST).collect();
            self.area = TextArea::from(kept.lines());
            self.area.move_cursor(tui_textarea::CursorMove::Bottom);
            self.area.move_cursor(tui_textarea::CursorMove::End);
            self.say("two thousand letters are the most");
        }
    }

    fn on_passphrase(&mut self, key: &Key, person: String, mut typed: String) -> Option<Intent> {
        match key {
            Key::Enter => {
                self.overlay = Overlay::None;
                return Some(Intent::Unlock(person, typed));
            }
            Key::Esc | Key::Interrupt => {
                self.overlay = Overlay::None;
                self.say("not signed; nothing was written");
                return None;
            }
            Key::Backspace => {
                typed.pop();
            }
            Key::Char(c) => typed.push(*c),
            Key::Paste(text) => typed.push_str(text.trim_end_matches(['\n', '\r'])),
            Key::Tab | Key::Up | Key::Down | Key::Left | Key::Right => {}
        }
        self.overlay = Overlay::Passphrase { person, typed };
        None
    }

    /// What happened to an act: a refusal is said and counted.
    pub fn refused(&mut self, words: String) {
        self.refused += 1;
        self.say(words);
    }

    /// The act's answer is on disk: fields are emptied for whatever is lit now.
    pub fn recorded(&mut self, session: &Session) {
        self.recording = false;
        self.clear();
        self.follow(session);
    }

    /// The number of the held first answer, taken from a confirm that became a commitment.
    pub fn hold(&mut self, typed: &Typed, nonce: String) {
        if let Typed::Numbers(numbers) = typed
            && let [(value, text)] = numbers.as_slice()
        {
            self.first = Some(HeldAnswer {
                value: *value,
                typed: text.clone(),
                nonce,
            });
        }
    }
}

/// The key of an item: its stage, tree, id and whether the second look is asked.
fn key_of(session: &Session, item: &Item) -> String {
    let held = session.held.as_ref().is_some_and(|h| h.item == item.id);
    format!(
        "{}/{}/{}/{held}",
        session.stage.word(),
        session.tree.as_deref().unwrap_or(""),
        item.id
    )
}

/// What an item wants, in words.
fn wanted(item: &Item) -> String {
    match &item.form {
        Form::Choose(_) => "choose what was seen, by its digit".to_owned(),
        Form::Measure(fields) => {
            let labels: Vec<&str> = fields.iter().map(|f| f.label.as_str()).collect();
            format!("whole numbers are wanted: {}", labels.join(", "))
        }
        Form::Words(wanted) => format!("words are wanted: {wanted}"),
        Form::Sign | Form::Start => "the step's number alone".to_owned(),
    }
}
