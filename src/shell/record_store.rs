//! What the record needs of a disk: append all of it, sync it, nothing else.
//! The real store is a locked file; tests put a store here that loses and halves writes.

use std::fs::{File, TryLockError};
use std::io::{self, Write};
use std::path::Path;
use std::sync::Arc;
use std::sync::atomic::AtomicBool;

use rustix::fs::{FallocateFlags, fallocate, fstatfs};

use super::files::{self, FileError, Readers};
use super::record_error::RecordError;

/// A place that holds appended bytes.
pub trait Store: Send {
    /// Appends all the bytes.
    ///
    /// # Errors
    /// The system's error; after it the store is not used again.
    fn append(&mut self, bytes: &[u8]) -> io::Result<()>;

    /// Brings everything appended onto the disk.
    ///
    /// # Errors
    /// The system's error; after it the store is not used again.
    fn sync(&mut self) -> io::Result<()>;

    /// Reserves room behind the end; that it may fail is of no consequence.
    fn reserve(&mut self, end: usize);
}

/// Room kept behind the end of the file.
const RESERVE_BEHIND: u64 = 64 * 1024;
/// Bytes of the reserve file, deleted in need.
const RESERVE_FILE_BYTES: usize = 2 * 1024 * 1024;
/// The reserve file's name.
const RESERVE_FILE: &str = "record.reserve";

/// A record file opened for appending and locked.
#[derive(Debug)]
pub struct FileStore {
    file: File,
    reserved_to: u64,
}

impl FileStore {
    /// Makes a new record file.
    ///
    /// # Errors
    /// [`RecordError`] where one is there, it is locked, or it cannot be made.
    pub fn create(path: &Path) -> Result<Self, RecordError> {
        Self::hold(
            files::open_new(path, Readers::Owner).map_err(|e| read_only(path, e))?,
            path,
        )
    }

    /// Opens a record file that is there.
    ///
    /// # Errors
    /// [`RecordError`] where it is locked, on read-only media, or cannot be opened.
    pub fn open(path: &Path) -> Result<Self, RecordError> {
        Self::hold(
            files::open_append(path).map_err(|e| read_only(path, e))?,
            path,
        )
    }

    fn hold(file: File, path: &Path) -> Result<Self, RecordError> {
        outlive_file_limits(path)?;
        match file.try_lock() {
            Ok(()) => Ok(Self {
                file,
                reserved_to: 0,
            }),
            Err(TryLockError::WouldBlock) => Err(RecordError::Locked(path.to_owned())),
            Err(TryLockError::Error(source)) => Err(FileError::write(path, source).into()),
        }
    }

    /// Reads all that is in the file, under the lock.
    ///
    /// # Errors
    /// [`FileError`] where it cannot be read.
    pub fn read(&self, path: &Path, limit: usize) -> Result<Vec<u8>, FileError> {
        use std::io::{Seek, SeekFrom};
        let fault = |source| FileError::Read {
            path: path.to_owned(),
            source,
        };
        let mut file = self.file.try_clone().map_err(fault)?;
        file.seek(SeekFrom::Start(0)).map_err(fault)?;
        files::read_open(file, path, limit)
    }
}

/// The signal a write past the file-size limit raises, on Linux.
const SIGXFSZ: i32 = 25;

fn read_only(path: &Path, error: FileError) -> RecordError {
    match error {
        FileError::Exists { path } => RecordError::Exists(path),
        FileError::Write { source, .. } if source.kind() == io::ErrorKind::ReadOnlyFilesystem => {
            RecordError::ReadOnly(path.to_owned())
        }
        other @ (FileError::Read { .. } | FileError::TooLong { .. } | FileError::Write { .. }) => {
            RecordError::File(other)
        }
    }
}

impl Store for FileStore {
    fn append(&mut self, bytes: &[u8]) -> io::Result<()> {
        self.file.write_all(bytes)
    }

    fn sync(&mut self) -> io::Result<()> {
        self.file.sync_data()
    }

    fn reserve(&mut self, end: usize) {
        let end = u64::try_from(end).unwrap_or(u64::MAX);
        if end.saturating_add(RESERVE_BEHIND / 2) > self.reserved_to {
            let room = fallocate(&self.file, FallocateFlags::KEEP_SIZE, end, RESERVE_BEHIND);
            if room.is_ok() {
                self.reserved_to = end.saturating_add(RESERVE_BEHIND);
            }
        }
    }
}

/// Without a handler a file-size limit kills the process; with one the write fails, which is told
/// to the person at the keys.
///
/// # Errors
/// [`FileError`] where the handler cannot be set.
pub fn outlive_file_limits(path: &Path) -> Result<(), FileError> {
    let too_large = Arc::new(AtomicBool::new(false));
    signal_hook::flag::register(SIGXFSZ, too_large)
        .map_err(|source| FileError::write(path, source))?;
    Ok(())
}

/// Writes the reserve file that is deleted when the disk is full; without room for it there is none.
pub fn keep_reserve(dir: &Path) {
    let zeros = vec![0; RESERVE_FILE_BYTES];
    let _ = files::write_new(&dir.join(RESERVE_FILE), &zeros, Readers::Owner);
}

/// Deletes the reserve file, so that its room can be used.
pub fn spend_reserve(dir: &Path) {
    let _ = files::remove(&dir.join(RESERVE_FILE));
}

/// Where a live record may lie.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Media {
    /// Only on disks of this machine.
    LocalOnly,
    /// Wherever the person said, knowing that a network disk may lie about a sync.
    AsTold,
}

/// File systems where lock and sync are somebody else's word. Source: Linux statfs(2), from memory.
const REMOTE: &[(u64, &str)] = &[
    (0x6969, "NFS"),
    (0x517B, "SMB"),
    (0xFF53_4D42, "CIFS"),
    (0xFE53_4D42, "SMB2"),
    (0x6573_5546, "FUSE"),
    (0x0102_1997, "9P"),
    (0x00C3_6400, "Ceph"),
    (0x5346_414F, "AFS"),
    (0x7375_7245, "Coda"),
];

/// Refuses a folder on a network or user-space file system.
///
/// # Errors
/// [`RecordError::Remote`] with the kind of file system.
pub fn check_media(dir: &Path, media: Media) -> Result<(), RecordError> {
    let about = fstatfs(files::open_dir(dir)?).map_err(|errno| FileError::Read {
        path: dir.to_owned(),
        source: errno.into(),
    })?;
    let kind = about.f_type.cast_unsigned() & 0xFFFF_FFFF;
    let remote = remote_name(kind);
    match (media, remote) {
        (Media::LocalOnly, Some(what)) => Err(RecordError::Remote {
            dir: dir.to_owned(),
            what,
        }),
        (Media::LocalOnly, None) | (Media::AsTold, _) => Ok(()),
    }
}

fn remote_name(kind: u64) -> Option<&'static str> {
    REMOTE
        .iter()
        .find(|(magic, _)| *magic == kind)
        .map(|(_, name)| *name)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn network_file_systems_are_known_and_local_ones_are_not() {
        assert_eq!(remote_name(0x6969), Some("NFS"));
        assert_eq!(remote_name(0x6573_5546), Some("FUSE"));
        assert_eq!(remote_name(0xEF53), None);
    }
}
