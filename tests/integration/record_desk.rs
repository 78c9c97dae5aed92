//! A desk that writes records in memory with invented people and fixed keys, for the other tests.
//! The keys come from fixed seeds, so the same record has the same bytes on every machine.
#![expect(
    clippy::unwrap_used,
    reason = "the desk is test code outside a test function"
)]

use std::collections::BTreeMap;
use std::convert::Infallible;

use ed25519_dalek::{Signer as _, SigningKey};
use serde_json::{Map, Value, json};
use stumpside::record::draft::encode_batch;
use stumpside::record::line::{self, Place};
use stumpside::record::public_key::PublicKey;
use stumpside::record::signature::{Blob, message};
use stumpside::record::signers::Signer;
use stumpside::record::{Boot, CrewMember, Draft, Opening, Stamp};

/// 2026-11-14T12:00:00Z.
pub const MORNING_MS: i64 = 1_794_657_600_000;

/// A key from a fixed seed.
pub fn key(seed: u8) -> SigningKey {
    SigningKey::from_bytes(&[seed; 32])
}

/// Its public half.
pub fn public(seed: u8, comment: &str) -> PublicKey {
    PublicKey::plain(*key(seed).verifying_key().as_bytes(), comment)
}

/// The plan the desk's records are about.
pub const PLAN: &[u8] = b"plan: 1\njob:\n  name: Kestrel Hollow windthrow\n";

pub fn stamp(minute: i64) -> Stamp {
    Stamp {
        utc_ms: MORNING_MS + minute * 60_000,
        off_min: -300,
        up_ms: 1_000_000 + minute * 60_000,
        boot: Boot([0x1a, 0x2b, 0x3c, 0x4d]),
    }
}

/// A person with the seed of their key.
pub fn person(id: &str, role: &str, seed: Option<u8>) -> CrewMember {
    CrewMember {
        id: id.to_owned(),
        name: format!("{id} of Kestrel Hollow"),
        roles: vec![role.to_owned()],
        key: seed.map(|seed| public(seed, id)),
    }
}

/// Odile leads, Tamsin saws, Rui spots and has no key.
pub fn crew() -> Vec<CrewMember> {
    vec![
        person("odile", "leader", Some(1)),
        person("tamsin", "sawyer", Some(2)),
        person("rui", "spotter", None),
    ]
}

pub fn opening(crew: Vec<CrewMember>) -> Opening {
    Opening {
        record: [7; 16],
        stamp: stamp(0),
        job: "Kestrel Hollow windthrow, lower bench".to_owned(),
        plan: PLAN.to_vec(),
        plan_name: "kestrel-hollow.yaml".to_owned(),
        leader: "odile".to_owned(),
        crew,
        parts: BTreeMap::from([("rules/us-logging".to_owned(), [9; 32])]),
        program: "stumpside 0.1.0".to_owned(),
        language: "en".to_owned(),
        continues: None,
    }
}

/// Members from a JSON object.
pub fn members(value: Value) -> Map<String, Value> {
    match value {
        Value::Object(members) => members,
        Value::Null | Value::Bool(_) | Value::Number(_) | Value::String(_) | Value::Array(_) => {
            panic!("members are an object")
        }
    }
}

/// Writes a record line by line.
pub struct Desk {
    pub bytes: Vec<u8>,
    pub next: Place,
    pub seeds: BTreeMap<String, u8>,
    pub minute: i64,
    pub clock_shift_ms: i64,
}

impl Desk {
    pub fn open(crew: Vec<CrewMember>) -> Self {
        Self::begin(crew, 0)
    }

    /// The usual crew under a wall clock that is wrong by so much.
    pub fn open_shifted(shift_ms: i64) -> Self {
        Self::begin(crew(), shift_ms)
    }

    fn begin(crew: Vec<CrewMember>, clock_shift_ms: i64) -> Self {
        let mut desk = Self {
            bytes: Vec::new(),
            next: Place {
                seq: 0,
                prev: [0; 32],
            },
            seeds: BTreeMap::from([("odile".to_owned(), 1), ("tamsin".to_owned(), 2)]),
            minute: 0,
            clock_shift_ms,
        };
        desk.write(&Draft::unsigned("open", opening(crew).members()));
        desk
    }

    pub fn write(&mut self, draft: &Draft) -> u64 {
        let seeds = &self.seeds;
        let mut sign = |id: &str, line: &[u8]| -> Result<String, Infallible> {
            let seed = seeds[id];
            Ok(Blob::plain(public(seed, id), key(seed).sign(&message(line)).to_bytes()).base64())
        };
        let mut now = stamp(self.minute);
        now.utc_ms += self.clock_shift_ms;
        let drafts = std::slice::from_ref(draft);
        let batch = encode_batch(self.next, &now, drafts, &mut sign).unwrap();
        let written = &batch.written[0];
        self.next = Place {
            seq: written.last_seq() + 1,
            prev: *written.hash(),
        };
        self.bytes.extend_from_slice(&batch.bytes);
        self.minute += 1;
        written.entry.seq
    }

    pub fn say(&mut self, kind: &str, value: Value) -> u64 {
        self.write(&Draft::unsigned(kind, members(value)))
    }

    pub fn sign(&mut self, kind: &str, value: Value, who: &str) -> u64 {
        self.write(&Draft::signed(kind, members(value), who))
    }

    pub fn name(&mut self, kind: &str, value: Value) -> u64 {
        self.write(&Draft::named_by(kind, members(value), "odile"))
    }

    pub fn morning(&mut self) {
        self.say(
            "roll_call",
            json!({"present": ["odile", "tamsin", "rui"], "absent": [], "keyed_by": "odile"}),
        );
        self.sign(
            "plan_signed",
            json!({"who": "odile", "said": "I stand for this plan.", "language": "en"}),
            "odile",
        );
        self.sign(
            "brief_signed",
            json!({"who": "odile", "role": "leader", "said": "I have heard it and agree."}),
            "odile",
        );
        self.sign(
            "brief_signed",
            json!({"who": "tamsin", "role": "sawyer", "said": "I have heard it and agree."}),
            "tamsin",
        );
        self.name(
            "brief_signed",
            json!({"who": "rui", "role": "spotter", "said": "I have heard it and agree."}),
        );
    }

    pub fn cuts(&mut self) -> u64 {
        self.say("tree_chosen", json!({"tree": "T1", "keyed_by": "odile"}));
        self.sign("step_done", json!({"tree": "T1", "step": 3, "who": "tamsin", "planned_um": 50_000, "measured_um": 38_000, "typed": "38 mm", "within": false, "told_by": "tamsin", "keyed_by": "tamsin", "heard": "radio"}), "tamsin")
    }

    pub fn go(&mut self) {
        self.sign(
            "go",
            json!({"tree": "T1", "step": 5, "who": "odile", "said": "Go."}),
            "odile",
        );
        self.sign(
            "go",
            json!({"tree": "T1", "step": 5, "who": "tamsin", "said": "Go."}),
            "tamsin",
        );
        self.say(
            "outcome",
            json!({"tree": "T1", "outcome": "down", "fell_toward_mdeg": 112_000}),
        );
    }

    pub fn evening(&mut self) {
        for who in ["odile", "tamsin"] {
            self.sign("sign_out", json!({"who": who, "said": "I am out."}), who);
        }
        self.name("sign_out", json!({"who": "rui", "said": "I am out."}));
        self.sign("close", json!({"who": "odile", "outcome": "done"}), "odile");
    }
}

/// A whole day, closed and signed by everyone who can.
pub fn whole_day() -> Desk {
    let mut desk = Desk::open(crew());
    desk.morning();
    desk.cuts();
    desk.go();
    desk.evening();
    desk
}

/// The smallest closed record: one person.
pub fn small_day() -> Vec<u8> {
    let mut desk = Desk::open(vec![person("odile", "leader", Some(1))]);
    desk.say("present", json!({"who": "odile"}));
    desk.sign(
        "brief_signed",
        json!({"who": "odile", "said": "Heard."}),
        "odile",
    );
    desk.sign("sign_out", json!({"who": "odile"}), "odile");
    desk.sign("close", json!({"who": "odile"}), "odile");
    desk.bytes
}

/// The crew list the office holds.
pub fn office_list() -> Vec<Signer> {
    opening(crew()).signers()
}

/// The lines of a record as objects.
pub fn objects(bytes: &[u8]) -> Vec<Map<String, Value>> {
    let text = std::str::from_utf8(bytes).unwrap();
    text.lines()
        .map(|line| serde_json::from_str(line).unwrap())
        .collect()
}

/// Gives lines new numbers and new hashes, as anybody with the file can; signatures stay as they are.
pub fn rehash(lines: &[Map<String, Value>]) -> Vec<u8> {
    let mut bytes = Vec::new();
    let mut place = Place {
        seq: 0,
        prev: [0; 32],
    };
    for object in lines {
        let mut object = object.clone();
        object.insert("seq".into(), place.seq.into());
        object.insert("prev".into(), line::hex(&place.prev).into());
        if object.contains_key("signs") {
            object.insert("signs".into(), place.seq.saturating_sub(1).into());
        }
        let text = format!("{}\n", Value::Object(object));
        place = Place {
            seq: place.seq + 1,
            prev: line::parse(text.as_bytes()).unwrap().hash,
        };
        bytes.extend_from_slice(text.as_bytes());
    }
    bytes
}
