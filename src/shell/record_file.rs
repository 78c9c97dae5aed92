//! The record on disk: one write and one sync a batch, and only then is it recorded.
//! After any error of write or sync the file is dead for this start of the machine: never retried,
//! never read back; the acknowledged lines go from memory into a new file.

use std::io;
use std::path::{Path, PathBuf};

use super::files::{self, FileError, Readers};
use super::key_store::{KeyError, KeyStore};
use super::record_store::{FileStore, Media, Store, check_media, keep_reserve, spend_reserve};
use super::watermark::{Watermark, default_dir};
use crate::record::draft::{DraftFault, Written, after, encode_batch};
use crate::record::kind::kept_for_the_end;
use crate::record::line::{Boot, LineFault, ParsedLine, Place, hex};
use crate::record::opening::Opening;
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

/// Why something could not be recorded.
#[derive(Debug, thiserror::Error)]
pub enum RecordError {
    /// The write or the sync failed. The act is not in the record.
    #[error("NOT RECORDED: entry {seq}: {source}")]
    NotRecorded {
        /// The entry that is lost.
        seq: u64,
        /// What the system says.
        source: io::Error,
    },
    /// An earlier write failed; the file takes nothing more in this start of the machine.
    #[error("NOT RECORDED: an earlier write to {} failed; rebuild the record first", .0.display())]
    Dead(PathBuf),
    /// A record is there already.
    #[error("{}: there is a record already", .0.display())]
    Exists(PathBuf),
    /// There is none.
    #[error("{}: there is no record here", .0.display())]
    NoRecord(PathBuf),
    /// Another program has it open.
    #[error("{}: another program holds the record open", .0.display())]
    Locked(PathBuf),
    /// The medium only reads.
    #[error("{}: the medium is read-only; the record can be verified there, not continued", .0.display())]
    ReadOnly(PathBuf),
    /// A network or user-space file system.
    #[error("{}: lies on {what}, where a sync is somebody else's word; choose a folder on this machine", dir.display())]
    Remote {
        /// The folder.
        dir: PathBuf,
        /// The kind of file system.
        what: &'static str,
    },
    /// The leader closed it.
    #[error("the record is closed; nothing goes behind its close")]
    Closed,
    /// The last tenth is kept for stop and close.
    #[error("the record is nearly full; only stop, sign-out and close are taken now")]
    NearlyFull,
    /// The draft breaks the format or cannot be signed.
    #[error(transparent)]
    Draft(#[from] DraftFault<KeyError>),
    /// A line cannot be written.
    #[error("the entry cannot stand in the record: {0}")]
    Line(#[from] LineFault),
    /// What is there is not plainly a torn last write.
    #[error("{}: not continued: {why}", path.display())]
    Refused {
        /// Which file.
        path: PathBuf,
        /// Why.
        why: String,
    },
    /// Two files that are not one record.
    #[error("{} and {} are two different continuations; a person must decide", .0.display(), .1.display())]
    Fork(PathBuf, PathBuf),
    /// A file beside the record.
    #[error(transparent)]
    File(#[from] FileError),
}

/// A record open for writing.
pub struct RecordFile {
    pub(super) store: Box<dyn Store>,
    pub(super) path: PathBuf,
    pub(super) places: Places,
    pub(super) watermark: Option<Watermark>,
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
        if files::names(&places.job)?
            .iter()
            .any(|name| is_record_name(name))
        {
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
        keep_reserve(&places.job);
        let store = Box::new(FileStore::create(&path)?);
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
        let mut record = Self {
            store,
            path: path.to_owned(),
            places: places.clone(),
            watermark: places.watermark(&opening.record),
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
        let bytes = crate::record::line::encode(self.next, stamp, "recover", &members)?;
        let line = crate::record::line::parse(&bytes)?;
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
