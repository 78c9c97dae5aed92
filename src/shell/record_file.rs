//! The record on disk: one write and one sync a batch, and only then is it recorded.
//! After any error of write or sync the file is dead for this start of the machine: never retried,
//! never read back; the acknowledged lines go from memory into a new file.

use std::path::{Path, PathBuf};

use super::files::{self, Readers};
use super::key_store::KeyStore;
pub use super::record_error::RecordError;
use super::record_store::{
    FileStore, Media, Store, check_media, keep_reserve, outlive_file_limits, spend_reserve,
};
use super::watermark::{Watermark, default_dir};
use crate::record::draft::{Written, after, check_duty, encode_batch};
use crate::record::kind::kept_for_the_end;
use crate::record::line::{self, Boot, ParsedLine, Place, hex};
use crate::record::opening::{Opening, Roster};
use crate::record::public_key::PublicKey;
use crate::record::signers;
use crate::record::{Draft, LINES_MAX, RECORD_BYTES_MAX, Stamp};

/// The record's file name.
pub const RECORD_FILE: &str = "record.jsonl";
/// The crew list beside it.
pub const SIGNERS_FILE: &str = "allowed_signers";

/// Where a job lies.
#[derive(Debug, Clone)]
pub struct Places {
    /// The job folder.
    pub job: PathBuf,
    /// A second medium to go on from when the first fails.
    pub second: Option<PathBuf>,
    /// Where the watermark lies; without one a roll-back stays unnoticed.
    pub state: Option<PathBuf>,
    /// Which media are taken.
    pub media: Media,
}

impl Places {
    /// A job folder on local disks with the watermark in its usual place.
    pub fn of_job(job: &Path) -> Self {
        Self {
            job: job.to_owned(),
            second: None,
            state: default_dir(),
            media: Media::LocalOnly,
        }
    }

    pub(super) fn watermark(&self, record: &[u8; 16]) -> Option<Watermark> {
        self.state.as_deref().map(|dir| Watermark::of(dir, record))
    }
}

/// A record open for writing.
pub struct RecordFile {
    pub(super) store: Box<dyn Store>,
    pub(super) path: PathBuf,
    pub(super) places: Places,
    pub(super) watermark: Option<Watermark>,
    pub(super) roster: Roster,
    /// All acknowledged bytes.
    pub(super) bytes: Vec<u8>,
    /// Where the next line goes.
    pub(super) next: Place,
    pub(super) lost: Option<Lost>,
    pub(super) closed: bool,
}

/// A write that failed.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Lost {
    seq: u64,
    error_number: Option<i32>,
}

impl RecordFile {
    /// Begins a record in a job folder, with the plan's bytes and the crew list beside it.
    ///
    /// # Errors
    /// [`RecordError`]; nothing is begun then.
    pub fn create(places: &Places, opening: &Opening) -> Result<(Self, Written), RecordError> {
        files::make_dir(&places.job)?;
        check_media(&places.job, places.media)?;
        let path = places.job.join(RECORD_FILE);
        let names = files::names(&places.job)?;
        let there: Vec<&String> = names.iter().filter(|name| is_record_name(name)).collect();
        // A file that never got its first line is no record yet: it was never acknowledged.
        let unbegun = there == [RECORD_FILE] && files::read_limited(&path, 0).is_ok();
        if !there.is_empty() && !unbegun {
            return Err(RecordError::Exists(path));
        }
        let plan = places
            .job
            .join(format!("plan.{}.yaml", hex(&opening.plan_sha256())));
        files::write_or_same(&plan, &opening.plan, Readers::Owner)?;
        let crew = signers::write(&opening.signers());
        if !crew.is_empty() {
            let list = places.job.join(SIGNERS_FILE);
            files::write_or_same(&list, crew.as_bytes(), Readers::Everyone)?;
        }
        outlive_file_limits(&path)?;
        keep_reserve(&places.job);
        let store = if unbegun {
            FileStore::open(&path)?
        } else {
            FileStore::create(&path)?
        };
        let store = Box::new(store);
        let begun = Self::begin(store, (places, &path), opening)?;
        sync_with_parent(&places.job)?;
        Ok(begun)
    }

    /// Begins a record on a store that is already open.
    ///
    /// # Errors
    /// [`RecordError`] where the first line cannot be written.
    pub fn begin(
        store: Box<dyn Store>,
        (places, path): (&Places, &Path),
        opening: &Opening,
    ) -> Result<(Self, Written), RecordError> {
        let place = Place {
            seq: 0,
            prev: [0; 32],
        };
        let line = line::encode(place, &opening.stamp, "open", &opening.members())?;
        let roster = Roster::read(&line::parse(&line)?)?;
        let mut record = Self {
            store,
            path: path.to_owned(),
            places: places.clone(),
            watermark: places.watermark(&opening.record),
            roster,
            bytes: Vec::new(),
            next: Place {
                seq: 0,
                prev: [0; 32],
            },
            lost: None,
            closed: false,
        };
        let draft = Draft::unsigned("open", opening.members());
        let mut written = record.append(&[draft], &opening.stamp, &KeyStore::default())?;
        let first = written.pop().expect("one draft gives one written entry");
        Ok((record, first))
    }

    /// Writes a batch: each signed act with its signature, in one write and one sync.
    ///
    /// # Errors
    /// [`RecordError::NotRecorded`] where the disk fails: the file is dead then, and only
    /// [`RecordFile::rebuild`] goes on. Every other error leaves the record as it was.
    pub fn append(
        &mut self,
        drafts: &[Draft],
        stamp: &Stamp,
        keys: &KeyStore,
    ) -> Result<Vec<Written>, RecordError> {
        if self.lost.is_some() {
            return Err(RecordError::Dead(self.path.clone()));
        }
        if self.closed {
            return Err(RecordError::Closed);
        }
        check_duty(drafts, &self.roster)?;
        self.check_keys(drafts, keys)?;
        let mut sign = |id: &str, bytes: &[u8]| keys.sign(id, bytes);
        let batch = encode_batch(self.next, stamp, drafts, &mut sign)?;
        self.check_room(drafts, batch.bytes.len())?;
        self.put(&batch.bytes, stamp.boot)?;
        if let Some(last) = batch.written.last() {
            self.next = Place {
                seq: last.last_seq() + 1,
                prev: *last.hash(),
            };
            self.closed = last.entry.kind == "close" && last.signature.is_some();
            self.note_watermark();
        }
        Ok(batch.written)
    }

    fn check_keys(&self, drafts: &[Draft], keys: &KeyStore) -> Result<(), RecordError> {
        for signer in drafts.iter().filter_map(|draft| draft.signer.as_deref()) {
            let begun_with = self.roster.people.get(signer);
            let begun_with = begun_with.and_then(|person| person.fingerprint.as_deref());
            let unlocked = keys.public(signer).map(PublicKey::fingerprint);
            if unlocked.is_some() && unlocked.as_deref() != begun_with {
                return Err(RecordError::WrongKey(signer.to_owned()));
            }
        }
        Ok(())
    }

    fn check_room(&self, drafts: &[Draft], more: usize) -> Result<(), RecordError> {
        let lines = usize::try_from(self.next.seq).unwrap_or(usize::MAX);
        let lines_after = lines.saturating_add(2 * drafts.len());
        let bytes_after = self.bytes.len().saturating_add(more);
        let past = |tenths: usize| {
            lines_after > LINES_MAX / 10 * tenths || bytes_after > RECORD_BYTES_MAX / 10 * tenths
        };
        let for_the_end = drafts.iter().all(|draft| kept_for_the_end(&draft.kind));
        if past(10) || (past(9) && !for_the_end) {
            Err(RecordError::NearlyFull)
        } else {
            Ok(())
        }
    }

    /// One write, one sync; any error ends this file for this start of the machine.
    pub(super) fn put(&mut self, bytes: &[u8], boot: Boot) -> Result<(), RecordError> {
        self.store.reserve(self.bytes.len() + bytes.len());
        let done = self.store.append(bytes).and_then(|()| self.store.sync());
        match done {
            Ok(()) => {
                self.bytes.extend_from_slice(bytes);
                Ok(())
            }
            Err(source) => {
                let seq = self.next.seq;
                self.lost = Some(Lost {
                    seq,
                    error_number: source.raw_os_error(),
                });
                if let Some(watermark) = &self.watermark {
                    watermark.note_failed(&self.path, boot);
                }
                Err(RecordError::NotRecorded { seq, source })
            }
        }
    }

    pub(super) fn note_watermark(&self) {
        if let (Some(watermark), Some(seq)) = (&self.watermark, self.next.seq.checked_sub(1)) {
            watermark.note(Place {
                seq,
                prev: self.next.prev,
            });
        }
    }

    /// After a failed write: writes every acknowledged line from memory into a new file, on the
    /// second medium first, and says so in the record. The lost act must be asked for again.
    ///
    /// # Errors
    /// [`RecordError`] where no place takes it: then only paper is left.
    pub fn rebuild(&mut self, stamp: &Stamp) -> Result<ParsedLine, RecordError> {
        let dirs: Vec<PathBuf> = self
            .places
            .second
            .iter()
            .chain([&self.places.job])
            .cloned()
            .collect();
        let mut last = RecordError::Dead(self.path.clone());
        for dir in dirs {
            if dir == self.places.job {
                spend_reserve(&dir);
            }
            match self.rebuild_in(&dir, stamp) {
                Ok(line) => return Ok(line),
                Err(error) => last = error,
            }
        }
        Err(last)
    }

    fn rebuild_in(&mut self, dir: &Path, stamp: &Stamp) -> Result<ParsedLine, RecordError> {
        files::make_dir(dir)?;
        let path = free_name(dir)?;
        self.rebuild_on(Box::new(FileStore::create(&path)?), (&path, stamp))
            .inspect(|_| {
                // The bytes are on disk; only the name may be lost with the power.
                let _ = sync_with_parent(dir);
            })
    }

    /// Rebuilds on a store that is already open.
    ///
    /// # Errors
    /// [`RecordError::NotRecorded`] where this store fails too.
    pub fn rebuild_on(
        &mut self,
        mut store: Box<dyn Store>,
        (path, stamp): (&Path, &Stamp),
    ) -> Result<ParsedLine, RecordError> {
        let lost = self.lost.unwrap_or(Lost {
            seq: self.next.seq,
            error_number: None,
        });
        let mut members = serde_json::Map::new();
        members.insert("how".into(), "rebuilt".into());
        members.insert("error_number".into(), lost.error_number.into());
        members.insert("lost_seq".into(), lost.seq.into());
        let bytes = line::encode(self.next, stamp, "recover", &members)?;
        let line = line::parse(&bytes)?;
        let mut all = self.bytes.clone();
        all.extend_from_slice(&bytes);
        let seq = line.seq;
        store
            .append(&all)
            .and_then(|()| store.sync())
            .map_err(|source| RecordError::NotRecorded { seq, source })?;
        self.store = store;
        self.path = path.to_owned();
        self.bytes = all;
        self.next = after(&line);
        self.lost = None;
        self.note_watermark();
        Ok(line)
    }

    /// The file being written.
    pub fn path(&self) -> &Path {
        &self.path
    }

    /// All acknowledged bytes.
    pub fn bytes(&self) -> &[u8] {
        &self.bytes
    }

    /// The hash of the last acknowledged line.
    pub const fn last_hash(&self) -> &[u8; 32] {
        &self.next.prev
    }

    /// The number the next entry gets.
    pub const fn next_seq(&self) -> u64 {
        self.next.seq
    }

    /// Whether a write failed and the record must be rebuilt.
    pub const fn is_dead(&self) -> bool {
        self.lost.is_some()
    }
}

/// Whether a file name is a record's: `record.jsonl`, `record-2.jsonl` and so on.
pub(super) fn is_record_name(name: &str) -> bool {
    record_number(name).is_some()
}

/// The number of a record file among those of its job.
pub(super) fn record_number(name: &str) -> Option<u32> {
    if name == RECORD_FILE {
        return Some(1);
    }
    let number = name.strip_prefix("record-")?.strip_suffix(".jsonl")?;
    number
        .parse()
        .ok()
        .filter(|parsed: &u32| *parsed >= 2 && parsed.to_string() == number)
}

fn free_name(dir: &Path) -> Result<PathBuf, RecordError> {
    let names = files::names(dir)?;
    let highest = names
        .iter()
        .filter_map(|name| record_number(name))
        .max()
        .unwrap_or(1);
    Ok(dir.join(format!("record-{}.jsonl", highest + 1)))
}

fn sync_with_parent(dir: &Path) -> Result<(), RecordError> {
    files::sync_dir(dir)?;
    // A job folder given as "." has no named parent to sync; its name was there before.
    match dir.parent().filter(|parent| !parent.as_os_str().is_empty()) {
        Some(parent) => Ok(files::sync_dir(parent)?),
        None => Ok(()),
    }
}
