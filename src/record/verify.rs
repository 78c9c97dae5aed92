//! The verdict on a record: every line, every signature, every duty, then three words.
//! Bytes in, report out. It never says who pressed a key, that an open record is complete, or that
//! a time is true.

use std::collections::BTreeSet;

use rayon::iter::{IntoParallelRefIterator, ParallelIterator};
use serde_json::Value;

use super::chain::{self, Bad, Standing, Walk};
use super::code::RecordCode;
use super::duty::{self, Duties, Ground, Missing};
use super::opening::Roster;
use super::pace;
use super::sealed::{self, Keys, Sealed};
use super::signers::Signer;
use super::text;

/// Whose crew list is used.
#[derive(Debug, Clone)]
pub enum Trust {
    /// The one in the record's own first line: a leader could have shortened it.
    Roster,
    /// One from outside, of exactly this job's crew.
    Crew(Vec<Signer>),
}

/// What else the record is held against.
#[derive(Debug, Clone, Default)]
pub struct Options {
    /// Record codes that people carried away: each must be of a line in this record.
    pub codes: Vec<RecordCode>,
}

/// The three words.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Verdict {
    /// Everything fits, everyone signed, and the leader's close is the end.
    ClosedOk,
    /// Everything that is there fits, but the end or a signature may be missing.
    Open,
    /// Something does not fit.
    Fail,
}

impl Verdict {
    /// The word of the machine output.
    pub const fn word(self) -> &'static str {
        match self {
            Self::ClosedOk => "closed-ok",
            Self::Open => "open",
            Self::Fail => "fail",
        }
    }
}

/// Whether the last write is all there.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Tail {
    /// The file ends with a newline.
    Whole,
    /// The last line is cut short.
    Torn,
}

impl Tail {
    /// The word of the machine output.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Whole => "whole",
            Self::Torn => "torn",
        }
    }
}

/// Everything found.
#[derive(Debug, Clone)]
pub struct Report {
    /// The lines of the record.
    pub entries: usize,
    /// Those nothing is wrong with.
    pub good: usize,
    /// What is wrong, in the order of the entries.
    pub bad: Vec<Bad>,
    /// Fingerprints of keys that are not the named person's.
    pub unknown_keys: BTreeSet<String>,
    /// Whether the last write is all there.
    pub tail: Tail,
    /// The SHA-256 of the last line.
    pub head: [u8; 32],
    /// Crew ids with at least one good signature.
    pub signers: BTreeSet<String>,
    /// Signatures that are required and missing.
    pub unsigned_required: Vec<Missing>,
    /// People whose acts stand on the leader's word alone.
    pub not_verifiable: BTreeSet<String>,
    /// The verdict.
    pub verdict: Verdict,
    /// What a reader should know.
    pub notes: Vec<String>,
}

impl Report {
    /// The record code of the last line.
    pub fn code(&self) -> RecordCode {
        RecordCode::of(&self.head)
    }
}

/// What every report says about how far it can be trusted.
pub const LIMITS: &[&str] = &[
    "A signature shows that a key was used, never who pressed it.",
    "People who hold all the keys together can write another record; a record code carried away, or an office's counter-signature, is what stops them.",
    "Without a close, or a code from outside, nothing shows that the end is there.",
    "Times are this laptop's word; only what came from outside brackets them.",
];

/// Verifies a record.
pub fn verify(bytes: &[u8], trust: &Trust, options: &Options) -> Report {
    let walk = chain::walk(bytes);
    let first = walk
        .lines
        .first()
        .and_then(|standing| standing.line.as_ref());
    let roster = first.map(Roster::read);
    let mut findings = Findings {
        bad: walk.bad.clone(),
        notes: Vec::new(),
    };
    let (duties, sealed) = match roster {
        Some(Ok(roster)) => judge(bytes, &walk, &roster, (trust, &mut findings)),
        Some(Err(fault)) => {
            findings.say(0, fault.to_string());
            (Duties::default(), Sealed::default())
        }
        None => {
            if walk.bad.is_empty() {
                findings.say(0, "there is no whole line in this file".to_owned());
            }
            (Duties::default(), Sealed::default())
        }
    };
    findings.structure(&walk, &duties);
    findings.codes(&walk.lines, options);
    finish(walk, findings, (duties, sealed))
}

/// Verifies many records at once, on as many cores as there are; the order is kept.
pub fn verify_many<B: AsRef<[u8]> + Sync>(
    records: &[B],
    trust: &Trust,
    options: &Options,
) -> Vec<Report> {
    records
        .par_iter()
        .map(|bytes| verify(bytes.as_ref(), trust, options))
        .collect()
}

fn judge(
    bytes: &[u8],
    walk: &Walk,
    roster: &Roster,
    (trust, findings): (&Trust, &mut Findings),
) -> (Duties, Sealed) {
    let keys = match trust {
        Trust::Roster => Keys::of_roster(roster),
        Trust::Crew(crew) => Keys::of_crew(crew),
    };
    findings.crew(roster, (trust, &keys));
    let sealed = sealed::check(bytes, &walk.lines, &keys);
    let ground = Ground {
        lines: &walk.lines,
        roster,
        keys: &keys,
        sealed: &sealed,
    };
    let mut duties = duty::judge(ground);
    findings.bad.extend(sealed.bad.iter().cloned());
    findings.notes.append(&mut duties.notes);
    let last_signed = sealed.signed.keys().next_back().map_or(0, |n| n + 2);
    let unsigned = walk.lines.len().saturating_sub(last_signed);
    if unsigned > 0 {
        findings.notes.push(format!(
            "unsigned entries at the end: {unsigned}; anyone who has the file could have changed them"
        ));
    }
    for who in &duties.not_verifiable {
        findings
            .notes
            .push(format!("not verifiable: {who} has no key"));
    }
    (duties, sealed)
}

fn finish(walk: Walk, mut findings: Findings, (duties, sealed): (Duties, Sealed)) -> Report {
    findings.bad.sort_by_key(|bad| bad.entry);
    findings.bad.dedup();
    findings.notes.extend(pace::notes(&walk.lines));
    let wrong: BTreeSet<u64> = findings.bad.iter().map(|bad| bad.entry).collect();
    let good = walk
        .lines
        .iter()
        .filter(|standing| !wrong.contains(&standing.entry))
        .count();
    let verdict = if !findings.bad.is_empty() {
        Verdict::Fail
    } else if duties.closed_at.is_some() && duties.missing.is_empty() {
        Verdict::ClosedOk
    } else {
        Verdict::Open
    };
    Report {
        entries: walk.lines.len(),
        good,
        bad: findings.bad,
        unknown_keys: sealed.unknown_keys,
        tail: if walk.rest.is_empty() {
            Tail::Whole
        } else {
            Tail::Torn
        },
        head: walk.head,
        signers: sealed.signed.into_values().collect(),
        unsigned_required: duties.missing,
        not_verifiable: duties.not_verifiable,
        verdict,
        notes: findings.notes,
    }
}

struct Findings {
    bad: Vec<Bad>,
    notes: Vec<String>,
}

impl Findings {
    fn say(&mut self, entry: u64, why: String) {
        self.bad.push(Bad { entry, why });
    }

    /// Holds the record's own crew against a list from outside.
    fn crew(&mut self, roster: &Roster, (trust, keys): (&Trust, &Keys)) {
        let demo_outside = match trust {
            Trust::Roster => {
                self.notes.push(
                    "the crew list is the record's own; give --crew with one from outside, because \
                     a leader could shorten his own"
                        .to_owned(),
                );
                false
            }
            Trust::Crew(crew) => crew.iter().any(|signer| signer.key.is_demo()),
        };
        if roster.demo_keys || demo_outside {
            self.notes.insert(0, "DEMO KEYS: PROVES NOTHING".to_owned());
        }
        let strangers = keys.people().filter(|id| !roster.people.contains_key(*id));
        for id in strangers {
            self.bad.push(Bad {
                entry: 0,
                why: format!("the crew list names {id}, the record does not"),
            });
        }
        for (id, person) in &roster.people {
            let Some(fingerprint) = &person.fingerprint else {
                continue;
            };
            if !keys.has(id) {
                self.say(
                    0,
                    format!("the record names a key of {id}, the crew list does not"),
                );
            } else if !keys.has_fingerprint(id, fingerprint) {
                self.say(
                    0,
                    format!("the record names another key of {id} than the crew list"),
                );
            }
        }
    }

    fn structure(&mut self, walk: &Walk, duties: &Duties) {
        if !walk.rest.is_empty() {
            let bytes = walk.rest.len();
            self.say(
                walk.next_seq,
                format!("the last line is cut short: {bytes} bytes without a line end"),
            );
        }
        for recovery in &walk.recoveries {
            self.notes.push(format!(
                "entry {}: writing went on after a torn write; bytes of junk before it: {}",
                recovery.entry, recovery.junk
            ));
        }
        for (n, standing) in walk.lines.iter().enumerate() {
            let Some(line) = &standing.line else { continue };
            if line.kind == "open" && n > 0 {
                self.say(standing.entry, "a record is opened only once".to_owned());
            }
            if duties.closed_at.is_some_and(|closed| n > closed + 1) {
                self.say(standing.entry, "it stands after the close".to_owned());
            }
            if line.kind == "receipt_shown" {
                self.receipt(standing, &walk.lines);
            }
            if line.kind == "recover" && line.text("how") == Some("rebuilt") {
                self.notes.push(format!(
                    "entry {}: a write failed on this laptop and the record went on in a new file",
                    standing.entry
                ));
            }
            if line.members.values().any(unseen) {
                self.notes.push(format!(
                    "entry {}: it holds characters nobody sees",
                    standing.entry
                ));
            }
        }
        self.earlier_close(walk, duties);
    }

    /// A close that is not the end was followed by something, signed or not.
    fn earlier_close(&mut self, walk: &Walk, duties: &Duties) {
        for (n, standing) in walk.lines.iter().enumerate() {
            let closes = standing
                .line
                .as_ref()
                .is_some_and(|line| line.kind == "close");
            let last = n + 2 >= walk.lines.len();
            if closes
                && !last
                && duties.closed_at != Some(n)
                && !duties.void.contains(&standing.entry)
            {
                self.say(
                    standing.entry,
                    "a close that is not the end of the record".to_owned(),
                );
            }
        }
    }

    fn receipt(&mut self, standing: &Standing, lines: &[Standing]) {
        let Some(line) = &standing.line else { return };
        let shown = line.members.get("shown_seq").and_then(Value::as_u64);
        let told = line.text("code").and_then(RecordCode::read);
        let Some((shown, told)) = shown.zip(told) else {
            self.say(
                standing.entry,
                "a receipt holds \"shown_seq\" and a record code".to_owned(),
            );
            return;
        };
        let of_line = lines
            .binary_search_by_key(&shown, |standing| standing.entry)
            .ok()
            .and_then(|n| lines[n].line.as_ref())
            .map(|line| RecordCode::of(&line.hash));
        if of_line != Some(told) || shown >= standing.entry {
            self.say(
                standing.entry,
                format!("the record code it shows is not entry {shown}'s"),
            );
        }
    }

    fn codes(&mut self, lines: &[Standing], options: &Options) {
        let last = lines.last().map_or(0, |standing| standing.entry);
        let lines = lines.iter().filter_map(|standing| standing.line.as_ref());
        let known: BTreeSet<RecordCode> = lines.map(|line| RecordCode::of(&line.hash)).collect();
        for code in &options.codes {
            if known.contains(code) {
                self.notes.push(format!(
                    "the record code {code} from outside is in this record"
                ));
            } else {
                let why =
                    format!("the record code {code} from outside is of no entry of this record");
                self.say(last, why);
            }
        }
    }
}

fn unseen(value: &Value) -> bool {
    match value {
        Value::Null | Value::Bool(_) | Value::Number(_) => false,
        Value::String(value) => text::holds_unseen(value),
        Value::Array(items) => items.iter().any(unseen),
        Value::Object(members) => members
            .iter()
            .any(|(name, value)| text::holds_unseen(name) || unseen(value)),
    }
}
