//! The record in real job folders: begun, held alone, rolled back, linked, full, rebuilt.
#![expect(clippy::disallowed_methods, reason = "a test lays out job folders")]

use std::io;
use std::path::Path;

use stumpside::shell::record_file::{Places, RECORD_FILE, RecordError, RecordFile};
use stumpside::shell::record_store::{FileStore, Media};

use crate::record_desk::stamp;
use crate::record_durability::{FakeStore, day, keys, nowhere, one_person};

fn in_folder(dir: &Path) -> Places {
    Places {
        job: dir.join("job"),
        second: None,
        state: Some(dir.join("state")),
        media: Media::LocalOnly,
    }
}

#[test]
fn a_record_begins_with_everything_beside_it_and_is_held_alone() {
    use std::os::unix::fs::PermissionsExt;
    let dir = tempfile::tempdir().unwrap();
    let places = in_folder(dir.path());
    let (mut record, first) = RecordFile::create(&places, &one_person()).unwrap();
    assert_eq!(first.entry.kind, "open");
    let plan = places.job.join(format!(
        "plan.{}.yaml",
        first.entry.text("plan_sha256").unwrap()
    ));
    assert_eq!(std::fs::read(plan).unwrap(), crate::record_desk::PLAN);
    assert!(places.job.join("allowed_signers").exists());
    let mode = std::fs::metadata(&places.job).unwrap().permissions().mode();
    assert_eq!(mode & 0o777, 0o700);
    assert!(matches!(
        RecordFile::create(&places, &one_person()),
        Err(RecordError::Exists(_))
    ));
    assert!(matches!(
        RecordFile::resume(&places, &stamp(1)),
        Err(RecordError::Locked(_))
    ));
    let keys = keys();
    record.append(&day()[..2], &stamp(1), &keys).unwrap();
    drop(record);
    let (record, lines) = RecordFile::resume(&places, &stamp(2)).unwrap();
    let kinds: Vec<&str> = lines.iter().map(|line| line.kind.as_str()).collect();
    assert_eq!(kinds, ["open", "present", "brief_signed", "sig"]);
    assert_eq!(std::fs::read(record.path()).unwrap(), record.bytes());
}

#[test]
fn an_older_copy_put_back_is_refused_on_the_same_laptop() {
    let dir = tempfile::tempdir().unwrap();
    let places = in_folder(dir.path());
    let (mut record, _) = RecordFile::create(&places, &one_person()).unwrap();
    let keys = keys();
    let path = places.job.join(RECORD_FILE);
    record.append(&day()[..1], &stamp(1), &keys).unwrap();
    let older = std::fs::read(&path).unwrap();
    record.append(&day()[1..2], &stamp(2), &keys).unwrap();
    drop(record);
    let newer = std::fs::read(&path).unwrap();
    std::fs::write(&path, &older).unwrap();
    let outcome = RecordFile::resume(&places, &stamp(3));
    assert!(matches!(outcome, Err(RecordError::Refused { why, .. }) if why.contains("older copy")));
    let mut last_changed = newer.clone();
    let at = newer.len() - 10;
    last_changed[at] = if newer[at] == b'A' { b'B' } else { b'A' };
    std::fs::write(&path, &last_changed).unwrap();
    let outcome = RecordFile::resume(&places, &stamp(3));
    assert!(
        matches!(outcome, Err(RecordError::Refused { why, .. }) if why.contains("another copy"))
    );
    std::fs::write(&path, &newer).unwrap();
    assert!(RecordFile::resume(&places, &stamp(3)).is_ok());
}

#[test]
fn a_link_in_place_of_the_record_is_not_followed() {
    let dir = tempfile::tempdir().unwrap();
    let places = in_folder(dir.path());
    drop(RecordFile::create(&places, &one_person()).unwrap());
    let path = places.job.join(RECORD_FILE);
    let elsewhere = dir.path().join("elsewhere.jsonl");
    std::fs::rename(&path, &elsewhere).unwrap();
    std::os::unix::fs::symlink(&elsewhere, &path).unwrap();
    assert!(matches!(
        RecordFile::resume(&places, &stamp(1)),
        Err(RecordError::File(_))
    ));
}

#[test]
fn a_full_disk_is_told_at_once_and_the_record_goes_on_elsewhere() {
    let full = Path::new("/dev/full");
    let store = FileStore::open(full).unwrap();
    let outcome = RecordFile::begin(Box::new(store), (&nowhere(), full), &one_person());
    let Err(RecordError::NotRecorded { seq: 0, source }) = outcome else {
        panic!("a full disk took the first line");
    };
    assert_eq!(source.kind(), io::ErrorKind::StorageFull);
}

#[test]
fn a_rebuilt_record_stands_in_a_second_file_and_is_the_one_that_goes_on() {
    let dir = tempfile::tempdir().unwrap();
    let places = in_folder(dir.path());
    let keys = keys();
    let store = FakeStore::default();
    store.0.lock().unwrap().write_fails_at = Some(3);
    std::fs::create_dir_all(&places.job).unwrap();
    let path = places.job.join(RECORD_FILE);
    let (mut record, _) =
        RecordFile::begin(Box::new(store.clone()), (&places, &path), &one_person()).unwrap();
    record.append(&day()[..1], &stamp(1), &keys).unwrap();
    let lost = record.append(&day()[1..2], &stamp(2), &keys);
    let Err(RecordError::NotRecorded { seq: 2, .. }) = lost else {
        panic!("the write did not fail")
    };
    let disk = store.0.lock().unwrap();
    std::fs::write(&path, [disk.durable.as_slice(), &disk.pending].concat()).unwrap();
    drop(disk);
    let outcome = RecordFile::resume(&places, &stamp(3));
    assert!(
        matches!(outcome, Err(RecordError::Refused { why, .. }) if why.contains("since the machine was started")),
    );
    let line = record.rebuild(&stamp(3)).unwrap();
    assert_eq!(line.members["error_number"], 28);
    assert_eq!(record.path().file_name().unwrap(), "record-2.jsonl");
    record.append(&day()[1..2], &stamp(4), &keys).unwrap();
    drop(record);
    let (record, lines) = RecordFile::resume(&places, &stamp(5)).unwrap();
    assert_eq!(record.path().file_name().unwrap(), "record-2.jsonl");
    let kinds: Vec<&str> = lines.iter().map(|line| line.kind.as_str()).collect();
    assert_eq!(kinds, ["open", "present", "recover", "brief_signed", "sig"]);
    drop(record);
    std::fs::write(
        places.job.join("record-3.jsonl"),
        crate::record_desk::small_day(),
    )
    .unwrap();
    assert!(matches!(
        RecordFile::resume(&places, &stamp(6)),
        Err(RecordError::Fork(_, _))
    ));
}

#[test]
fn a_file_that_never_got_its_first_line_can_still_begin() {
    let dir = tempfile::tempdir().unwrap();
    let places = in_folder(dir.path());
    std::fs::create_dir_all(&places.job).unwrap();
    std::fs::write(places.job.join(RECORD_FILE), b"").unwrap();
    let (record, _) = RecordFile::create(&places, &one_person()).unwrap();
    assert_eq!(record.next_seq(), 1);
}

#[test]
fn a_file_that_could_not_be_written_whole_is_not_left_in_the_way() {
    // A full device takes the name and none of the bytes.
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("plan.yaml");
    let limit = "ulimit -f 1; trap '' XFSZ; exec \"$0\" \"$@\"";
    let run = |program: &[&str]| {
        std::process::Command::new("sh")
            .arg("-c")
            .arg(limit)
            .args(program)
            .output()
            .unwrap()
    };
    // One block of 512 bytes: the demo plan is longer.
    let output = run(&[
        env!("CARGO_BIN_EXE_stumpside"),
        "demo",
        "--copy-only",
        "--job",
        folder.path().to_str().unwrap(),
    ]);
    assert_eq!(output.status.code(), Some(4), "{output:?}");
    assert!(!path.exists(), "half a plan would stand in the way");
    let again = std::process::Command::new(env!("CARGO_BIN_EXE_stumpside"))
        .args([
            "demo",
            "--copy-only",
            "--job",
            folder.path().to_str().unwrap(),
        ])
        .output()
        .unwrap();
    assert_eq!(again.status.code(), Some(0), "{again:?}");
}
