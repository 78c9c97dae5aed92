//! Why something could not be recorded, each with the way out where there is one.

use std::io;
use std::path::PathBuf;

use super::files::FileError;
use super::key_store::KeyError;
use crate::record::draft::{DraftFault, DutyFault};
use crate::record::line::LineFault;
use crate::record::opening::OpeningFault;

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
    /// The act may not stand in this record.
    #[error(transparent)]
    Duty(#[from] DutyFault),
    /// The unlocked key is not the one the record's first line names.
    #[error("the unlocked key of {0} is not the one this record begins with")]
    WrongKey(String),
    /// The first line does not open a record.
    #[error(transparent)]
    Opening(#[from] OpeningFault),
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
