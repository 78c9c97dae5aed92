//! Who had to sign: every entry that names a signer, and everyone who was there at briefing and close.
//! A missing signature is named, never guessed; a person without a key counts as not verifiable.

use std::collections::{BTreeMap, BTreeSet};

use serde_json::Value;

use super::chain::Standing;
use super::kind::{Seal, find, needs_signer};
use super::line::ParsedLine;
use super::opening::Roster;
use super::sealed::{Keys, Sealed};

/// A signature that is required and missing.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub struct Missing {
    /// The entry, where one stands there.
    pub entry: Option<u64>,
    /// The kind of entry.
    pub kind: String,
    /// Who should have signed; empty where nobody is named.
    pub who: String,
    /// Why it counts as missing.
    pub why: String,
}

/// What the duties came to.
#[derive(Debug, Clone, Default)]
pub struct Duties {
    /// The missing signatures.
    pub missing: Vec<Missing>,
    /// People without a key whose acts stand on the leader's word.
    pub not_verifiable: BTreeSet<String>,
    /// Entries cut off from their signature by a torn write: they do not count.
    pub void: BTreeSet<u64>,
    /// The place of the signed close among the lines.
    pub closed_at: Option<usize>,
    /// Things a reader should know.
    pub notes: Vec<String>,
}

/// What the duties are judged by.
#[derive(Debug, Clone, Copy)]
pub struct Ground<'a> {
    /// The lines as they stand.
    pub lines: &'a [Standing],
    /// Line 0.
    pub roster: &'a Roster,
    /// Whose keys count.
    pub keys: &'a Keys,
    /// What was signed well.
    pub sealed: &'a Sealed,
}

/// The entries that a torn write cut off from their signature. They were never acknowledged: whoever
/// replays a record leaves them out.
pub fn cut_off(lines: &[ParsedLine]) -> BTreeSet<u64> {
    let names_signer = |line: &ParsedLine| matches!(line.signer(), Some(Some(_)));
    lines
        .windows(2)
        .filter(|pair| names_signer(&pair[0]) && mends_tear(&pair[1]))
        .map(|pair| pair[0].seq)
        .collect()
}

fn mends_tear(line: &ParsedLine) -> bool {
    line.kind == "recover" && line.text("how") == Some("torn")
}

/// Judges who had to sign.
pub fn judge(ground: Ground<'_>) -> Duties {
    let mut day = Day {
        ground,
        duties: Duties::default(),
        present: Presence::default(),
        brief: BTreeSet::new(),
        out: BTreeSet::new(),
        begun: false,
    };
    for (n, standing) in ground.lines.iter().enumerate() {
        if let Some(line) = standing.line.as_ref().filter(|line| line.sig.is_none()) {
            day.entry(n, standing.entry, line);
        }
    }
    day.everyone();
    day.duties
}

#[derive(Default)]
struct Presence {
    now: BTreeSet<String>,
    ever: BTreeSet<String>,
    absent: BTreeMap<String, u64>,
}

impl Presence {
    fn comes(&mut self, who: &str) {
        self.now.insert(who.to_owned());
        self.ever.insert(who.to_owned());
        self.absent.remove(who);
    }

    fn is_absent(&mut self, who: &str, entry: u64) {
        self.now.remove(who);
        self.absent.insert(who.to_owned(), entry);
    }
}

struct Day<'a> {
    ground: Ground<'a>,
    duties: Duties,
    present: Presence,
    brief: BTreeSet<String>,
    out: BTreeSet<String>,
    /// The briefing was signed by someone, or work began.
    begun: bool,
}

impl Day<'_> {
    fn entry(&mut self, n: usize, entry: u64, line: &ParsedLine) {
        self.presence(entry, line);
        let begins = [
            "brief_signed",
            "go",
            "step_done",
            "brisk_start",
            "sign_out",
            "close",
        ];
        self.begun |= begins.contains(&line.kind.as_str());
        if find(&line.kind).is_none() {
            self.duties.notes.push(format!(
                "entry {entry}: the kind \"{}\" is unknown to this program; it is kept and chained",
                line.kind
            ));
        }
        match line.signer() {
            Some(Some(signer)) => self.signed_entry(n, entry, (line, signer)),
            Some(None) => self.named_entry(entry, line),
            None if needs_signer(&line.kind) => {
                let who = line.text("who").unwrap_or_default();
                self.missing(Some(entry), (&line.kind, who), "the entry names no signer");
            }
            None => {}
        }
    }

    fn signed_entry(&mut self, n: usize, entry: u64, (line, signer): (&ParsedLine, &str)) {
        let next = self
            .ground
            .lines
            .get(n + 1)
            .and_then(|next| next.line.as_ref());
        if self
            .ground
            .sealed
            .signed
            .get(&n)
            .is_none_or(|who| who != signer)
        {
            if next.is_some_and(mends_tear) {
                self.duties.void.insert(entry);
                self.duties.notes.push(format!(
                    "entry {entry} ({}) was cut off from its signature by a torn write; it does not count",
                    line.kind
                ));
            } else {
                self.missing(
                    Some(entry),
                    (&line.kind, signer),
                    "no good signature follows it",
                );
            }
            return;
        }
        match find(&line.kind).map_or(Seal::Free, |kind| kind.seal) {
            Seal::Free | Seal::Person => {}
            Seal::EachPresent => self.own_signature(entry, (line, signer)),
            Seal::Leader if signer == self.ground.roster.leader => self.duties.closed_at = Some(n),
            Seal::Leader => {
                let leader = self.ground.roster.leader.clone();
                self.missing(
                    Some(entry),
                    (&line.kind, &leader),
                    "only the leader closes a record",
                );
            }
        }
        let speaker = line.text("who").unwrap_or(signer);
        if speaker != signer {
            let kind = &line.kind;
            self.duties.notes.push(format!(
                "entry {entry} ({kind}): relayed, not signed by {speaker}; signed by {signer}"
            ));
        }
    }

    fn own_signature(&mut self, entry: u64, (line, signer): (&ParsedLine, &str)) {
        let who = line.text("who").unwrap_or_default();
        if who != signer {
            self.missing(
                Some(entry),
                (&line.kind, who),
                "each person signs this for themselves",
            );
        } else if line.kind == "brief_signed" {
            self.brief.insert(who.to_owned());
        } else {
            self.out.insert(who.to_owned());
        }
    }

    fn named_entry(&mut self, entry: u64, line: &ParsedLine) {
        let who = line.text("who").unwrap_or_default();
        let kind = line.kind.as_str();
        if line.text("named_by") != Some(self.ground.roster.leader.as_str()) {
            self.missing(
                Some(entry),
                (kind, who),
                "only the leader names a person without a key",
            );
        } else if who.is_empty() {
            self.missing(Some(entry), (kind, who), "it names nobody");
        } else if self.ground.keys.has(who) {
            self.missing(
                Some(entry),
                (kind, who),
                "this person has a key and did not sign",
            );
        } else if find(kind).is_some_and(|kind| kind.seal == Seal::Leader) {
            self.missing(
                Some(entry),
                (kind, who),
                "a record is closed with a key only",
            );
        } else {
            self.duties.not_verifiable.insert(who.to_owned());
        }
    }

    fn presence(&mut self, entry: u64, line: &ParsedLine) {
        let list = |name: &str| -> Vec<String> {
            let items = line.members.get(name).and_then(Value::as_array);
            let texts = items.into_iter().flatten().filter_map(Value::as_str);
            texts.map(str::to_owned).collect()
        };
        let who = line.text("who").unwrap_or_default();
        match line.kind.as_str() {
            "roll_call" => {
                list("present")
                    .iter()
                    .for_each(|who| self.present.comes(who));
                list("absent")
                    .iter()
                    .for_each(|who| self.present.is_absent(who, entry));
            }
            "present" | "join" => self.present.comes(who),
            "absent" => self.present.is_absent(who, entry),
            "leave" => {
                self.present.now.remove(who);
                let signed = matches!(line.signer(), Some(Some(_)));
                let how = if signed { "signed" } else { "not signed" };
                self.duties
                    .notes
                    .push(format!("entry {entry}: {who} left the job ({how})"));
            }
            _ => {}
        }
    }

    /// Briefing and close need everyone who was there; who is never called absent was there.
    fn everyone(&mut self) {
        for (who, entry) in &self.present.absent {
            self.duties.notes.push(format!(
                "entry {entry}: {who} is absent by the keyer's word"
            ));
        }
        if !self.begun {
            return;
        }
        let keys = self.ground.keys;
        let unmentioned = keys.people().filter(|id| {
            !self.present.ever.contains(*id) && !self.present.absent.contains_key(*id)
        });
        let unmentioned: BTreeSet<String> = unmentioned.map(str::to_owned).collect();
        let with_key = |id: &&String| keys.has(id);
        let brief: Vec<String> = self
            .present
            .ever
            .union(&unmentioned)
            .filter(with_key)
            .cloned()
            .collect();
        let out: Vec<String> = self
            .present
            .now
            .union(&unmentioned)
            .filter(with_key)
            .cloned()
            .collect();
        for who in brief.iter().filter(|who| !self.brief.contains(*who)) {
            self.duties.missing.push(missing_for(who, "brief_signed"));
        }
        let kind_seen = |kind: &str| {
            self.ground
                .lines
                .iter()
                .any(|s| s.line.as_ref().is_some_and(|line| line.kind == kind))
        };
        if kind_seen("close") || kind_seen("sign_out") {
            for who in out.iter().filter(|who| !self.out.contains(*who)) {
                self.duties.missing.push(missing_for(who, "sign_out"));
            }
        }
        let keyless = self.present.ever.iter().filter(|id| !keys.has(id)).cloned();
        self.duties.not_verifiable.extend(keyless);
    }

    fn missing(&mut self, entry: Option<u64>, (kind, who): (&str, &str), why: &str) {
        self.duties.missing.push(Missing {
            entry,
            kind: kind.to_owned(),
            who: who.to_owned(),
            why: why.to_owned(),
        });
    }
}

fn missing_for(who: &str, kind: &str) -> Missing {
    let why = match kind {
        "sign_out" => "there at the close, and no good signature of theirs",
        _ => "there at the briefing, and no good signature of theirs",
    };
    Missing {
        entry: None,
        kind: kind.to_owned(),
        who: who.to_owned(),
        why: why.to_owned(),
    }
}
