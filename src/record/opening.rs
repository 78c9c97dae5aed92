//! Line 0: what the record is about and who is on the crew. It binds, it does not judge.

use std::collections::BTreeMap;

use serde_json::{Map, Value};
use sha2::{Digest, Sha256};

use super::code::RecordCode;
use super::line::{ParsedLine, Stamp, hex, unhex};
use super::public_key::PublicKey;
use super::signers::{Signer, is_id};

/// One person of the crew as the plan names them.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct CrewMember {
    /// The crew id.
    pub id: String,
    /// The name people are called by.
    pub name: String,
    /// What they do today.
    pub roles: Vec<String>,
    /// Their public key; without one their acts are not verifiable.
    pub key: Option<PublicKey>,
}

/// Everything a new record begins with.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Opening {
    /// 128 random bits.
    pub record: [u8; 16],
    /// When.
    pub stamp: Stamp,
    /// The job's name.
    pub job: String,
    /// The plan's exact bytes.
    pub plan: Vec<u8>,
    /// The file name the plan was read from.
    pub plan_name: String,
    /// The leader's crew id.
    pub leader: String,
    /// The crew.
    pub crew: Vec<CrewMember>,
    /// Rule sets, methods and texts in use: name to the SHA-256 of their bytes.
    pub parts: BTreeMap<String, [u8; 32]>,
    /// The program and its version.
    pub program: String,
    /// The language of the texts read to the crew.
    pub language: String,
    /// The code of the record this one goes on from.
    pub continues: Option<RecordCode>,
}

impl Opening {
    /// The SHA-256 of the plan's bytes.
    pub fn plan_sha256(&self) -> [u8; 32] {
        Sha256::digest(&self.plan).into()
    }

    /// Whether anybody on the crew signs with a key for demonstrations.
    pub fn demo_keys(&self) -> bool {
        self.crew
            .iter()
            .filter_map(|person| person.key.as_ref())
            .any(PublicKey::is_demo)
    }

    /// The members of line 0.
    pub fn members(&self) -> Map<String, Value> {
        let crew: Vec<Value> = self.crew.iter().map(person).collect();
        let parts: Map<String, Value> = self
            .parts
            .iter()
            .map(|(name, hash)| (name.clone(), hex(hash).into()))
            .collect();
        let mut members = Map::new();
        members.insert("record".into(), hex(&self.record).into());
        members.insert("job".into(), self.job.clone().into());
        members.insert("plan".into(), self.plan_name.clone().into());
        members.insert("plan_sha256".into(), hex(&self.plan_sha256()).into());
        members.insert("leader".into(), self.leader.clone().into());
        members.insert("crew".into(), crew.into());
        members.insert("parts".into(), parts.into());
        members.insert("program".into(), self.program.clone().into());
        members.insert("language".into(), self.language.clone().into());
        members.insert("demo_keys".into(), self.demo_keys().into());
        members.insert(
            "continues".into(),
            self.continues.map(|code| code.to_string()).into(),
        );
        members
    }

    /// The crew list that lies beside the record for stock tools.
    pub fn signers(&self) -> Vec<Signer> {
        let with_key = |person: &CrewMember| {
            let key = person.key.clone()?;
            Some(Signer {
                id: person.id.clone(),
                key,
                valid_after_ms: None,
                valid_before_ms: None,
            })
        };
        self.crew.iter().filter_map(with_key).collect()
    }
}

fn person(person: &CrewMember) -> Value {
    let mut members = Map::new();
    members.insert("id".into(), person.id.clone().into());
    members.insert("name".into(), person.name.clone().into());
    members.insert("roles".into(), person.roles.clone().into());
    members.insert(
        "key".into(),
        person.key.as_ref().map(PublicKey::fingerprint).into(),
    );
    Value::Object(members)
}

/// What line 0 says, read back.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Roster {
    /// The record's id.
    pub record: [u8; 16],
    /// The job's name.
    pub job: String,
    /// The SHA-256 of the plan's bytes.
    pub plan_sha256: [u8; 32],
    /// The leader's crew id.
    pub leader: String,
    /// Crew id to name and fingerprint.
    pub people: BTreeMap<String, Person>,
    /// Whether keys for demonstrations are in use.
    pub demo_keys: bool,
}

/// One person of the roster.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Person {
    /// Their name.
    pub name: String,
    /// The fingerprint of their key.
    pub fingerprint: Option<String>,
}

/// Why line 0 does not open a record; each says which member.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum OpeningFault {
    /// Another kind stands there.
    #[error("the first line is of the kind \"{0}\", not \"open\"")]
    Kind(String),
    /// A member is missing or malformed.
    #[error("the member \"{0}\" of the first line is missing or malformed")]
    Member(&'static str),
    /// A person is named twice.
    #[error("\"{0}\" stands twice in the crew")]
    Twice(String),
    /// The leader is not on the crew.
    #[error("the leader \"{0}\" is not on the crew")]
    Leader(String),
}

impl Roster {
    /// Reads line 0.
    ///
    /// # Errors
    /// [`OpeningFault`] with the member that is wrong.
    pub fn read(line: &ParsedLine) -> Result<Self, OpeningFault> {
        if line.kind != "open" {
            return Err(OpeningFault::Kind(line.kind.clone()));
        }
        let member = |name: &'static str| line.text(name).ok_or(OpeningFault::Member(name));
        let record = unhex::<16>(member("record")?).ok_or(OpeningFault::Member("record"))?;
        let plan =
            unhex::<32>(member("plan_sha256")?).ok_or(OpeningFault::Member("plan_sha256"))?;
        let leader = member("leader")?.to_owned();
        let demo_keys = line.members.get("demo_keys").and_then(Value::as_bool);
        let crew = line.members.get("crew").and_then(Value::as_array);
        let mut people = BTreeMap::new();
        for item in crew.ok_or(OpeningFault::Member("crew"))? {
            let (id, person) = read_person(item).ok_or(OpeningFault::Member("crew"))?;
            if people.insert(id.clone(), person).is_some() {
                return Err(OpeningFault::Twice(id));
            }
        }
        if !people.contains_key(&leader) {
            return Err(OpeningFault::Leader(leader));
        }
        Ok(Self {
            record,
            job: member("job")?.to_owned(),
            plan_sha256: plan,
            leader,
            people,
            demo_keys: demo_keys.ok_or(OpeningFault::Member("demo_keys"))?,
        })
    }
}

fn read_person(item: &Value) -> Option<(String, Person)> {
    let id = item.get("id")?.as_str().filter(|id| is_id(id))?;
    let fingerprint = match item.get("key")? {
        Value::Null => None,
        Value::String(text) => Some(text.clone()),
        Value::Bool(_) | Value::Number(_) | Value::Array(_) | Value::Object(_) => return None,
    };
    let name = item.get("name")?.as_str()?.to_owned();
    Some((id.to_owned(), Person { name, fingerprint }))
}
