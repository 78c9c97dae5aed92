//! The record on disks that fail: lost and halved writes, full disks, damaged and rolled-back files.
//! What was acknowledged is there afterwards, and what was not never counts.
#![expect(
    clippy::unwrap_used,
    reason = "functions that tests share stand outside the test functions"
)]
#![expect(clippy::disallowed_methods, reason = "a test damages files on purpose")]

use std::io;
use std::path::{Path, PathBuf};
use std::sync::{Arc, Mutex};

use serde_json::json;
use stumpside::record::duty::cut_off;
use stumpside::record::{Draft, Options, Trust, Verdict, verify};
use stumpside::shell::key_store::KeyStore;
use stumpside::shell::record_file::{Places, RecordError, RecordFile};
use stumpside::shell::record_store::{Media, Store};

use crate::record_desk::{members, opening, person, stamp};

/// A disk that keeps what was not synced apart, and fails when told.
#[derive(Default)]
pub struct Disk {
    pub durable: Vec<u8>,
    pub pending: Vec<u8>,
    pub writes: usize,
    pub syncs: usize,
    pub write_fails_at: Option<usize>,
    pub sync_fails_at: Option<usize>,
}

#[derive(Clone, Default)]
pub struct FakeStore(pub Arc<Mutex<Disk>>);

impl Store for FakeStore {
    fn append(&mut self, bytes: &[u8]) -> io::Result<()> {
        let mut disk = self.0.lock().unwrap();
        disk.writes += 1;
        if disk.write_fails_at == Some(disk.writes) {
            // A full disk takes the first half.
            disk.pending.extend_from_slice(&bytes[..bytes.len() / 2]);
            return Err(io::Error::from_raw_os_error(28));
        }
        disk.pending.extend_from_slice(bytes);
        Ok(())
    }

    fn sync(&mut self) -> io::Result<()> {
        let mut disk = self.0.lock().unwrap();
        disk.syncs += 1;
        if disk.sync_fails_at == Some(disk.syncs) {
            return Err(io::Error::from_raw_os_error(5));
        }
        let pending = std::mem::take(&mut disk.pending);
        disk.durable.extend_from_slice(&pending);
        Ok(())
    }

    fn reserve(&mut self, _end: usize) {}
}

pub fn nowhere() -> Places {
    Places {
        job: PathBuf::from("/nowhere"),
        second: None,
        state: None,
        media: Media::LocalOnly,
    }
}

/// Odile's key, unlocked from a file that is written for it.
pub fn keys() -> KeyStore {
    use ssh_key::{LineEnding, PrivateKey, private::Ed25519Keypair};
    let dir = tempfile::tempdir().unwrap();
    let path = dir.path().join("odile");
    let key = PrivateKey::from(Ed25519Keypair::from_seed(&[1; 32]));
    std::fs::write(&path, key.to_openssh(LineEnding::LF).unwrap().as_bytes()).unwrap();
    let mut keys = KeyStore::default();
    keys.unlock("odile", &path, None).unwrap();
    keys
}

pub fn day() -> Vec<Draft> {
    let present = members(json!({"who": "odile"}));
    let own = |kind: &str| Draft::signed(kind, members(json!({"who": "odile"})), "odile");
    vec![
        Draft::unsigned("present", present),
        own("brief_signed"),
        Draft::unsigned("stop", members(json!({"tree": "T1", "keyed_by": "odile"}))),
        own("stop_reason"),
        own("sign_out"),
        own("close"),
    ]
}

pub fn one_person() -> stumpside::record::Opening {
    opening(vec![person("odile", "leader", Some(1))])
}

fn begin(store: &FakeStore) -> Result<RecordFile, RecordError> {
    let path = Path::new("/nowhere/record.jsonl");
    RecordFile::begin(Box::new(store.clone()), (&nowhere(), path), &one_person())
        .map(|(file, _)| file)
}

fn verdict(bytes: &[u8]) -> Verdict {
    verify(bytes, &Trust::Roster, &Options::default()).verdict
}

#[test]
fn a_day_without_faults_closes() {
    let store = FakeStore::default();
    let mut record = begin(&store).unwrap();
    let keys = keys();
    for (minute, draft) in (1..).zip(day()) {
        let written = record.append(&[draft], &stamp(minute), &keys).unwrap();
        assert_eq!(written[0].hash(), record.last_hash());
    }
    let disk = store.0.lock().unwrap();
    assert_eq!(disk.durable, record.bytes());
    assert_eq!(
        (disk.writes, disk.syncs),
        (7, 7),
        "one write and one sync an act"
    );
    assert_eq!(verdict(&disk.durable), Verdict::ClosedOk);
    drop(disk);
    let late = Draft::unsigned("note", members(json!({"text": "late"})));
    assert!(matches!(
        record.append(&[late], &stamp(9), &keys),
        Err(RecordError::Closed)
    ));
}

#[test]
fn every_failing_write_or_sync_loses_nothing_acknowledged() {
    let keys = keys();
    for fails_at in 2..=7 {
        for sync in [false, true] {
            let store = FakeStore::default();
            let failing = Some(fails_at);
            if sync {
                store.0.lock().unwrap().sync_fails_at = failing;
            } else {
                store.0.lock().unwrap().write_fails_at = failing;
            }
            let mut record = begin(&store).unwrap();
            let mut acknowledged = record.bytes().to_vec();
            let mut lost = None;
            for (minute, draft) in (1..).zip(day()) {
                match record.append(std::slice::from_ref(&draft), &stamp(minute), &keys) {
                    Ok(_) => acknowledged = record.bytes().to_vec(),
                    Err(RecordError::NotRecorded { seq, .. }) => {
                        assert_eq!(seq, record.next_seq());
                        lost = Some(draft);
                        break;
                    }
                    Err(other) => panic!("{other}"),
                }
            }
            let lost = lost.expect("one write failed");
            assert!(record.is_dead());
            let again = record.append(std::slice::from_ref(&lost), &stamp(8), &keys);
            assert!(
                matches!(again, Err(RecordError::Dead(_))),
                "a dead file takes nothing"
            );
            assert_eq!(record.bytes(), acknowledged);
            let other = FakeStore::default();
            let path = Path::new("/nowhere/record-2.jsonl");
            let line = record
                .rebuild_on(Box::new(other.clone()), (path, &stamp(8)))
                .unwrap();
            assert_eq!(line.text("how"), Some("rebuilt"));
            assert!(other.0.lock().unwrap().durable.starts_with(&acknowledged));
            record.append(&[lost], &stamp(9), &keys).unwrap();
            let bytes = other.0.lock().unwrap().durable.clone();
            assert_ne!(verdict(&bytes), Verdict::Fail);
        }
    }
}

#[test]
fn after_a_crash_at_any_byte_the_record_goes_on_and_keeps_what_was_acknowledged() {
    let store = FakeStore::default();
    let mut record = begin(&store).unwrap();
    let keys = keys();
    let drafts = day();
    let mut ends = vec![record.bytes().len()];
    for (minute, draft) in (1..).zip(&drafts[..4]) {
        record
            .append(std::slice::from_ref(draft), &stamp(minute), &keys)
            .unwrap();
        ends.push(record.bytes().len());
    }
    let whole = record.bytes().to_vec();
    for cut in ends[0]..=whole.len() {
        let acknowledged = ends.iter().rev().find(|end| **end <= cut).copied().unwrap();
        let store = FakeStore::default();
        store.0.lock().unwrap().durable = whole[..cut].to_vec();
        let path = Path::new("/nowhere/record.jsonl");
        let ground = (&nowhere(), path, &stamp(20));
        let (mut record, lines) =
            RecordFile::resume_on(Box::new(store.clone()), ground, whole[..cut].to_vec()).unwrap();
        record.append(&drafts[1..2], &stamp(21), &keys).unwrap();
        let bytes = store.0.lock().unwrap().durable.clone();
        assert!(bytes.starts_with(&whole[..cut]), "nothing is cut away");
        assert_ne!(verdict(&bytes), Verdict::Fail, "cut at {cut}");
        assert!(
            verify(&bytes, &Trust::Roster, &Options::default())
                .unsigned_required
                .is_empty()
        );
        let hashes = |bytes: &[u8]| stumpside::record::chain::walk(bytes).lines.len();
        let counted = lines.len() - cut_off(&lines).len();
        assert!(counted >= hashes(&whole[..acknowledged]), "cut at {cut}");
    }
}

#[test]
fn a_damaged_file_is_refused_and_never_mended() {
    let store = FakeStore::default();
    let mut record = begin(&store).unwrap();
    let keys = keys();
    record.append(&day()[..4], &stamp(1), &keys).unwrap();
    let whole = record.bytes().to_vec();
    let last_line = whole[..whole.len() - 1]
        .iter()
        .rposition(|b| *b == b'\n')
        .unwrap()
        + 1;
    let path = Path::new("/nowhere/record.jsonl");
    for at in 0..whole.len() - 1 {
        let mut damaged = whole.clone();
        damaged[at] ^= 0x10;
        let ground = (&nowhere(), path, &stamp(20));
        let outcome =
            RecordFile::resume_on(Box::new(FakeStore::default()), ground, damaged.clone());
        let refused = matches!(outcome, Err(RecordError::Refused { .. }));
        // A last line that stays readable has no later hash; only the watermark guards it.
        let unguarded = at >= last_line && verdict(&damaged) != Verdict::ClosedOk;
        assert!(refused || unguarded, "byte {at}");
    }
}

#[test]
fn without_the_key_nothing_is_written_and_the_file_lives_on() {
    let store = FakeStore::default();
    let mut record = begin(&store).unwrap();
    let before = record.bytes().to_vec();
    let locked = KeyStore::default();
    let outcome = record.append(&day()[1..2], &stamp(1), &locked);
    assert!(matches!(outcome, Err(RecordError::Draft(_))));
    let decomposed = Draft::unsigned("note", members(json!({"text": "e\u{301}"})));
    assert!(matches!(
        record.append(&[decomposed], &stamp(1), &locked),
        Err(RecordError::Draft(_))
    ));
    assert_eq!(store.0.lock().unwrap().durable, before);
    record.append(&day()[..1], &stamp(2), &locked).unwrap();
}

#[test]
fn what_would_make_the_record_fail_is_not_taken() {
    use stumpside::record::draft::DutyFault;
    let store = FakeStore::default();
    let crew = vec![
        person("odile", "leader", Some(1)),
        person("tamsin", "sawyer", Some(2)),
        person("rui", "spotter", None),
    ];
    let path = Path::new("/nowhere/record.jsonl");
    let ground = (&nowhere(), path);
    let (mut record, _) =
        RecordFile::begin(Box::new(store.clone()), ground, &opening(crew)).unwrap();
    let keys = keys();
    let own = |kind: &str, who: &str, signer: &str| {
        Draft::signed(kind, members(json!({"who": who})), signer)
    };
    let named = |kind: &str, who: &str, leader: &str| {
        Draft::named_by(kind, members(json!({"who": who})), leader)
    };
    let mut fault = |drafts: &[Draft]| match record.append(drafts, &stamp(1), &keys) {
        Err(RecordError::Duty(fault)) => Some(fault),
        Ok(_) | Err(_) => None,
    };
    assert_eq!(
        fault(&[own("go", "rui", "rui")]),
        Some(DutyFault::NoKey("rui".into()))
    );
    let not_own = fault(&[own("sign_out", "tamsin", "odile")]);
    assert!(matches!(not_own, Some(DutyFault::NotOwn { .. })));
    let not_leader = fault(&[own("close", "tamsin", "tamsin")]);
    assert!(matches!(not_leader, Some(DutyFault::NotLeader { .. })));
    assert!(matches!(
        fault(&[named("go", "rui", "tamsin")]),
        Some(DutyFault::NotLeader { .. })
    ));
    assert_eq!(
        fault(&[named("go", "tamsin", "odile")]),
        Some(DutyFault::HasKey("tamsin".into()))
    );
    let behind = [
        own("close", "odile", "odile"),
        own("sign_out", "odile", "odile"),
    ];
    assert_eq!(fault(&behind), Some(DutyFault::BehindClose));
    let mut strange = KeyStore::default();
    let dir = tempfile::tempdir().unwrap();
    let new = stumpside::shell::key_store::NewKey {
        id: "odile",
        comment: "",
        passphrase: None,
    };
    stumpside::shell::key_store::make(dir.path(), new).unwrap();
    strange
        .unlock("odile", &dir.path().join("keys/odile"), None)
        .unwrap();
    let outcome = record.append(&[own("go", "odile", "odile")], &stamp(1), &strange);
    assert!(matches!(outcome, Err(RecordError::WrongKey(id)) if id == "odile"));
    assert_eq!(record.next_seq(), 1, "nothing was written");
    assert_eq!(store.0.lock().unwrap().writes, 1);
}

#[test]
fn the_last_tenth_is_kept_for_the_end() {
    let store = FakeStore::default();
    let mut record = begin(&store).unwrap();
    let keys = KeyStore::default();
    let text = "x".repeat(15_000);
    let big: Vec<Draft> = (0..4)
        .map(|_| Draft::unsigned("note", members(json!({"text": text}))))
        .collect();
    let full = loop {
        match record.append(&big, &stamp(1), &keys) {
            Ok(_) => {}
            Err(error) => break error,
        }
    };
    assert!(matches!(full, RecordError::NearlyFull));
    let tenths = record.bytes().len() * 10 / stumpside::record::RECORD_BYTES_MAX;
    assert_eq!(tenths, 8, "just under nine tenths");
    let stop = Draft::unsigned("stop", members(json!({"tree": "T1"})));
    for _ in 0..5 {
        record
            .append(std::slice::from_ref(&stop), &stamp(2), &keys)
            .unwrap();
    }
}
