//! How a day is begun or gone on with: keys that need no passphrase, line 0, the state a record
//! adds up to. It writes nothing.

use std::collections::BTreeMap;
use std::sync::Arc;

use thiserror::Error;

use super::entropy::{self, NoEntropy};
use super::files::FileError;
use super::job_folder::{self, FolderError};
use super::key_store::{KeyError, KeyStore};
use super::record_file::{Places, RecordError};
use crate::briefing::Job;
use crate::parts::Parts;
use crate::plan::Plan;
use crate::record::duty::cut_off;
use crate::record::line::hex;
use crate::record::opening::{Opening, Roster};
use crate::record::public_key::PublicKey;
use crate::record::{CrewMember, ParsedLine, Stamp as FullStamp, facts};
use crate::session::{Session, replay};

/// Why a day cannot be begun or gone on with.
#[derive(Debug, Error)]
pub enum DayError {
    /// The record.
    #[error(transparent)]
    Record(#[from] RecordError),
    /// The job folder.
    #[error(transparent)]
    Folder(#[from] FolderError),
    /// A key.
    #[error(transparent)]
    Key(#[from] KeyError),
    /// A file.
    #[error(transparent)]
    File(#[from] FileError),
    /// No randomness.
    #[error(transparent)]
    Entropy(#[from] NoEntropy),
    /// The record in the folder is about another plan.
    #[error(
        "the record in this folder is about another plan (its plan's hash begins {recorded}, this one's {here}); work on with the plan it names, or give this plan a folder of its own"
    )]
    AnotherPlan {
        /// Begin of the hash in the record.
        recorded: String,
        /// Begin of this plan's hash.
        here: String,
    },
    /// The texts, rules or keys are not those the record began with.
    #[error(
        "the {0} are not those this record began with; go on with the program, parts folder and keys it began with, or give the plan a folder of its own"
    )]
    OtherGround(&'static str),
    /// An entry that the program should know does not read.
    #[error(
        "entry {seq} ({kind}) does not read as this program writes it; the record is left as it is"
    )]
    Unreadable {
        /// Its number.
        seq: u64,
        /// Its kind.
        kind: String,
    },
    /// The leader has no key, so nobody could close the record.
    #[error(
        "the leader {0} has no key in the plan; a record needs one to be closed (see `stumpside crew add`)"
    )]
    LeaderWithoutKey(String),
}

/// What the day is about.
pub struct Ground {
    /// The plan.
    pub plan: Plan,
    /// Its exact bytes.
    pub plan_bytes: Vec<u8>,
    /// Where it lies.
    pub plan_path: std::path::PathBuf,
    /// The parts.
    pub parts: Parts,
    /// Codes of the plan's stop findings, by tree: such a tree is not begun.
    pub stops: BTreeMap<String, Vec<String>>,
    /// The crew with their keys.
    pub crew: Vec<CrewMember>,
    /// Where the record lies.
    pub places: Places,
}

/// Unlocks the keys that need no passphrase, where their private half lies beside the plan.
pub(super) fn unlock_open_keys(ground: &Ground, keys: &mut KeyStore) -> Result<(), DayError> {
    for member in &ground.crew {
        let Some(path) = job_folder::private_key(&ground.plan, &ground.plan_path, &member.id)
        else {
            continue;
        };
        match keys.unlock(&member.id, &path, None) {
            Ok(public) => {
                let named = member.key.as_ref().map(PublicKey::fingerprint);
                if named != Some(public.fingerprint()) {
                    keys.lock(&member.id);
                }
            }
            // Asked for when the person signs; a key that is elsewhere is said to be missing then.
            Err(KeyError::PassphraseNeeded(_) | KeyError::File(_)) => {}
            Err(error) => return Err(error.into()),
        }
    }
    Ok(())
}

pub(super) fn opening(ground: &Ground, stamp: FullStamp) -> Result<Opening, DayError> {
    let hash = |text: &String| {
        let mut bytes = [0_u8; 32];
        for (byte, pair) in bytes.iter_mut().zip(text.as_bytes().chunks(2)) {
            let digits = std::str::from_utf8(pair).unwrap_or("00");
            *byte = u8::from_str_radix(digits, 16).unwrap_or(0);
        }
        bytes
    };
    let file_name = ground
        .plan_path
        .file_name()
        .map_or(String::new(), |n| n.to_string_lossy().into_owned());
    Ok(Opening {
        record: entropy::bytes::<16>()?,
        stamp,
        job: ground.plan.job.name.value.clone(),
        plan: ground.plan_bytes.clone(),
        plan_name: file_name,
        leader: ground.plan.job.leader.value.clone(),
        crew: ground.crew.clone(),
        parts: ground
            .parts
            .hashes
            .iter()
            .map(|(name, text)| (name.clone(), hash(text)))
            .collect(),
        program: format!("stumpside {}", env!("CARGO_PKG_VERSION")),
        language: ground.parts.tailgate.language.clone(),
        continues: None,
    })
}

/// The state that the record's lines add up to.
pub(super) fn resumed(
    lines: &[ParsedLine],
    opening: &Opening,
    job: Arc<Job>,
) -> Result<Session, DayError> {
    let first = lines.first().map(Roster::read);
    if let Some(Ok(roster)) = first
        && roster.plan_sha256 != opening.plan_sha256()
    {
        let short = |hash: &[u8; 32]| hex(hash)[..12].to_owned();
        return Err(DayError::AnotherPlan {
            recorded: short(&roster.plan_sha256),
            here: short(&opening.plan_sha256()),
        });
    }
    let now = opening.members();
    for (member, words) in [("parts", "texts and rules"), ("crew", "crew and its keys")] {
        if lines
            .first()
            .is_some_and(|first| first.members.get(member) != now.get(member))
        {
            return Err(DayError::OtherGround(words));
        }
    }
    let void = cut_off(lines);
    let mut all = vec![];
    for line in lines
        .iter()
        .filter(|l| l.sig.is_none() && !void.contains(&l.seq))
    {
        match facts::fact(line) {
            Some(recorded) => all.push(recorded),
            None if matches!(line.kind.as_str(), "open" | "recover" | "clock_step") => {}
            None => {
                return Err(DayError::Unreadable {
                    seq: line.seq,
                    kind: line.kind.clone(),
                });
            }
        }
    }
    Ok(replay(job, &all))
}
