//! Acts on their way into the record: drafts become the bytes of one write, each signed entry with
//! its signature directly behind it. Whoever holds the keys hands in the signing; none are held here.

use serde_json::{Map, Value};

use super::kind::{Seal, find, needs_signer};
use super::line::{self, LineFault, ParsedLine, Place, Sig, Stamp};
use super::opening::Roster;
use super::{BATCH_BYTES_MAX, code::RecordCode};

/// One act to be written.
#[derive(Debug, Clone, PartialEq)]
pub struct Draft {
    /// Its kind.
    pub kind: String,
    /// Its members in their order, without `signer`.
    pub members: Map<String, Value>,
    /// Whose signature follows it.
    pub signer: Option<String>,
}

impl Draft {
    /// An act nobody signs.
    pub fn unsigned(kind: &str, members: Map<String, Value>) -> Self {
        Self {
            kind: kind.to_owned(),
            members,
            signer: None,
        }
    }

    /// An act a person signs.
    pub fn signed(kind: &str, members: Map<String, Value>, signer: &str) -> Self {
        Self {
            kind: kind.to_owned(),
            members,
            signer: Some(signer.to_owned()),
        }
    }

    /// An act of a person without a key: the leader names them, and it is not verifiable.
    pub fn named_by(kind: &str, mut members: Map<String, Value>, leader: &str) -> Self {
        members.insert("signer".into(), Value::Null);
        members.insert("named_by".into(), leader.into());
        Self {
            kind: kind.to_owned(),
            members,
            signer: None,
        }
    }
}

/// What became of one draft.
#[derive(Debug, Clone, PartialEq)]
pub struct Written {
    /// The entry as it stands in the record.
    pub entry: ParsedLine,
    /// The signature line behind it.
    pub signature: Option<ParsedLine>,
}

impl Written {
    /// The hash of the last of its lines.
    pub fn hash(&self) -> &[u8; 32] {
        self.signature
            .as_ref()
            .map_or(&self.entry.hash, |line| &line.hash)
    }

    /// The number of the last of its lines.
    pub fn last_seq(&self) -> u64 {
        self.signature
            .as_ref()
            .map_or(self.entry.seq, |line| line.seq)
    }

    /// The record code to carry away after it.
    pub fn code(&self) -> RecordCode {
        RecordCode::of(self.hash())
    }
}

/// Why an act would make the record fail or stay open, so that it is not taken.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum DutyFault {
    /// The signer has no key in the record's first line.
    #[error("{0} has no key in this record")]
    NoKey(String),
    /// Each person signs this for themselves.
    #[error("an entry \"{kind}\" of {who} is signed by {who}, not by {signer}")]
    NotOwn {
        /// The kind of entry.
        kind: String,
        /// Whose act it is.
        who: String,
        /// Who would sign.
        signer: String,
    },
    /// Only the leader does this.
    #[error("only the leader, {leader}, can do this: {what}")]
    NotLeader {
        /// The leader's crew id.
        leader: String,
        /// What.
        what: &'static str,
    },
    /// Someone with a key signs for themselves.
    #[error("{0} has a key and must sign")]
    HasKey(String),
    /// Something would stand behind the close.
    #[error("nothing goes behind the close")]
    BehindClose,
}

/// Says whether drafts may stand in the record that begins with this roster.
///
/// # Errors
/// [`DutyFault`] with the first that may not.
pub fn check_duty(drafts: &[Draft], roster: &Roster) -> Result<(), DutyFault> {
    for (n, draft) in drafts.iter().enumerate() {
        let who = draft
            .members
            .get("who")
            .and_then(Value::as_str)
            .unwrap_or_default();
        let seal = find(&draft.kind).map_or(Seal::Free, |kind| kind.seal);
        match &draft.signer {
            Some(signer) => check_signer(draft, (who, signer, seal), roster)?,
            None if draft.members.contains_key("named_by") => check_named(draft, who, roster)?,
            None => {}
        }
        if draft.kind == "close" && n + 1 < drafts.len() {
            return Err(DutyFault::BehindClose);
        }
    }
    Ok(())
}

fn check_signer(
    draft: &Draft,
    (who, signer, seal): (&str, &str, Seal),
    roster: &Roster,
) -> Result<(), DutyFault> {
    if !has_key(roster, signer) {
        return Err(DutyFault::NoKey(signer.to_owned()));
    }
    match seal {
        Seal::EachPresent if who != signer => Err(DutyFault::NotOwn {
            kind: draft.kind.clone(),
            who: who.to_owned(),
            signer: signer.to_owned(),
        }),
        Seal::Leader if signer != roster.leader => Err(DutyFault::NotLeader {
            leader: roster.leader.clone(),
            what: "close the record",
        }),
        Seal::Free | Seal::Person | Seal::EachPresent | Seal::Leader => Ok(()),
    }
}

fn check_named(draft: &Draft, who: &str, roster: &Roster) -> Result<(), DutyFault> {
    if draft.kind == "close" {
        let what = "close the record, with a key";
        return Err(DutyFault::NotLeader {
            leader: roster.leader.clone(),
            what,
        });
    }
    if draft.members.get("named_by").and_then(Value::as_str) != Some(&roster.leader) {
        let what = "name a person without a key";
        return Err(DutyFault::NotLeader {
            leader: roster.leader.clone(),
            what,
        });
    }
    if has_key(roster, who) {
        Err(DutyFault::HasKey(who.to_owned()))
    } else {
        Ok(())
    }
}

fn has_key(roster: &Roster, id: &str) -> bool {
    roster
        .people
        .get(id)
        .is_some_and(|person| person.fingerprint.is_some())
}

/// Why a batch cannot be written. Nothing of it was.
#[derive(Debug, thiserror::Error)]
pub enum DraftFault<E: std::error::Error + 'static> {
    /// The line would break the format.
    #[error("the entry \"{kind}\" cannot stand in the record: {fault}")]
    Line {
        /// Which kind.
        kind: String,
        /// What is wrong.
        fault: LineFault,
    },
    /// The kind must be signed and nobody is named.
    #[error("an entry \"{0}\" must be signed, or name a person without a key by the leader")]
    SignerMissing(String),
    /// Together longer than one write may be.
    #[error("the entries have {0} bytes together; one write holds at most {BATCH_BYTES_MAX}")]
    TooMuch(usize),
    /// The signing failed.
    #[error(transparent)]
    Signing(E),
}

/// The bytes of one write and the lines in them.
#[derive(Debug, Clone, PartialEq)]
pub struct Batch {
    /// What goes to disk.
    pub bytes: Vec<u8>,
    /// What became of each draft.
    pub written: Vec<Written>,
}

/// The signing, handed in: crew id and exact bytes in, one line of base64 out.
pub type Signing<'a, E> = dyn FnMut(&str, &[u8]) -> Result<String, E> + 'a;

/// Turns drafts into the bytes of one write; `sign` gets the crew id and the line's exact bytes.
///
/// # Errors
/// [`DraftFault`] with the first draft that cannot be written.
pub fn encode_batch<E: std::error::Error + 'static>(
    mut place: Place,
    stamp: &Stamp,
    drafts: &[Draft],
    sign: &mut Signing<'_, E>,
) -> Result<Batch, DraftFault<E>> {
    let mut batch = Batch {
        bytes: Vec::new(),
        written: Vec::new(),
    };
    for draft in drafts {
        let line = |fault| DraftFault::Line {
            kind: draft.kind.clone(),
            fault,
        };
        let mut members = draft.members.clone();
        match &draft.signer {
            Some(signer) => {
                members.insert("signer".into(), signer.clone().into());
            }
            None if needs_signer(&draft.kind) && !named(&members) => {
                return Err(DraftFault::SignerMissing(draft.kind.clone()));
            }
            None => {}
        }
        let bytes = line::encode(place, stamp, &draft.kind, &members).map_err(line)?;
        let entry = line::parse(&bytes).map_err(line)?;
        place = after(&entry);
        let mut signature = None;
        if let Some(signer) = &draft.signer {
            let sig = sign(signer, &bytes).map_err(DraftFault::Signing)?;
            let sig = Sig {
                signs: entry.seq,
                who: signer.clone(),
                sig,
            };
            let sig_bytes = line::encode_sig(place, &sig).map_err(line)?;
            let parsed = line::parse(&sig_bytes).map_err(line)?;
            place = after(&parsed);
            batch.bytes.extend_from_slice(&bytes);
            batch.bytes.extend_from_slice(&sig_bytes);
            signature = Some(parsed);
        } else {
            batch.bytes.extend_from_slice(&bytes);
        }
        batch.written.push(Written { entry, signature });
    }
    if batch.bytes.len() > BATCH_BYTES_MAX {
        return Err(DraftFault::TooMuch(batch.bytes.len()));
    }
    Ok(batch)
}

fn named(members: &Map<String, Value>) -> bool {
    members.get("signer") == Some(&Value::Null) && members.contains_key("named_by")
}

/// The place after a line.
pub const fn after(line: &ParsedLine) -> Place {
    Place {
        seq: line.seq + 1,
        prev: line.hash,
    }
}
