//! Plain files: read whole within a limit, written new and never over another.
//! It never follows a link where it writes, and never interprets what it reads.
#![expect(clippy::disallowed_methods, reason = "this file is the door to files")]

use std::fs::{DirBuilder, File, OpenOptions};
use std::io::{self, Read, Write};
use std::os::unix::fs::{DirBuilderExt, OpenOptionsExt, PermissionsExt};
use std::path::{Path, PathBuf};

use rustix::fs::OFlags;

/// Why a file could not be read or written.
#[derive(Debug, thiserror::Error)]
pub enum FileError {
    /// It cannot be read.
    #[error("{}: cannot be read: {source}", path.display())]
    Read {
        /// Which file.
        path: PathBuf,
        /// What the system says.
        source: io::Error,
    },
    /// It is longer than what is read of its kind.
    #[error("{}: longer than {limit} bytes", path.display())]
    TooLong {
        /// Which file.
        path: PathBuf,
        /// The limit.
        limit: usize,
    },
    /// It is there already and is never written over.
    #[error("{}: is there already and is never written over", path.display())]
    Exists {
        /// Which file.
        path: PathBuf,
    },
    /// It cannot be written.
    #[error("{}: cannot be written: {source}", path.display())]
    Write {
        /// Which file.
        path: PathBuf,
        /// What the system says.
        source: io::Error,
    },
}

impl FileError {
    fn read(path: &Path, source: io::Error) -> Self {
        Self::Read {
            path: path.to_owned(),
            source,
        }
    }

    /// The error of a write to a path.
    pub fn write(path: &Path, source: io::Error) -> Self {
        let path = path.to_owned();
        if source.kind() == io::ErrorKind::AlreadyExists {
            Self::Exists { path }
        } else {
            Self::Write { path, source }
        }
    }
}

/// Reads a whole file of at most `limit` bytes.
///
/// # Errors
/// [`FileError`] where it cannot be read or is longer.
pub fn read_limited(path: &Path, limit: usize) -> Result<Vec<u8>, FileError> {
    let file = File::open(path).map_err(|source| FileError::read(path, source))?;
    read_open(file, path, limit)
}

/// Reads an open file from its beginning.
pub(super) fn read_open(file: File, path: &Path, limit: usize) -> Result<Vec<u8>, FileError> {
    let most = u64::try_from(limit).unwrap_or(u64::MAX).saturating_add(1);
    let mut bytes = Vec::new();
    file.take(most)
        .read_to_end(&mut bytes)
        .map_err(|source| FileError::read(path, source))?;
    if bytes.len() > limit {
        return Err(FileError::TooLong {
            path: path.to_owned(),
            limit,
        });
    }
    Ok(bytes)
}

/// Reads a file of at most `limit` bytes as text.
///
/// # Errors
/// [`FileError`] where it cannot be read, is longer, or is not UTF-8.
pub fn read_text(path: &Path, limit: usize) -> Result<String, FileError> {
    String::from_utf8(read_limited(path, limit)?).map_err(|_| {
        FileError::read(
            path,
            io::Error::new(io::ErrorKind::InvalidData, "not UTF-8"),
        )
    })
}

/// Who may read a new file.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Readers {
    /// Only its owner: private keys, the record.
    Owner,
    /// Whoever the system's settings let: public keys, the crew list.
    Everyone,
}

impl Readers {
    const fn mode(self) -> u32 {
        match self {
            Self::Owner => 0o600,
            Self::Everyone => 0o644,
        }
    }
}

/// Writes a new file and syncs it.
///
/// # Errors
/// [`FileError::Exists`] where one is there, [`FileError::Write`] where it cannot be written.
pub fn write_new(path: &Path, bytes: &[u8], readers: Readers) -> Result<(), FileError> {
    let fault = |source| FileError::write(path, source);
    let mut file = open_new(path, readers)?;
    let written = file.write_all(bytes).and_then(|()| file.sync_all());
    written.map_err(|source| {
        // Half a file would stand in the way of the next try; it was made here and is nobody's.
        let _ = remove(path);
        fault(source)
    })
}

/// Writes a new file, or finds the very same bytes there.
///
/// # Errors
/// [`FileError`] as [`write_new`], where another content is there.
pub fn write_or_same(path: &Path, bytes: &[u8], readers: Readers) -> Result<(), FileError> {
    match write_new(path, bytes, readers) {
        Err(FileError::Exists { path }) => {
            if read_limited(&path, bytes.len()).is_ok_and(|there| there == bytes) {
                Ok(())
            } else {
                Err(FileError::Exists { path })
            }
        }
        other => other,
    }
}

/// Opens a new file for appending; no link is followed and nothing is written over.
pub(super) fn open_new(path: &Path, readers: Readers) -> Result<File, FileError> {
    OpenOptions::new()
        .read(true)
        .append(true)
        .create_new(true)
        .mode(readers.mode())
        .custom_flags(no_follow())
        .open(path)
        .map_err(|source| FileError::write(path, source))
}

/// Opens a file that is there for appending; no link is followed.
pub(super) fn open_append(path: &Path) -> Result<File, FileError> {
    OpenOptions::new()
        .read(true)
        .append(true)
        .custom_flags(no_follow())
        .open(path)
        .map_err(|source| FileError::write(path, source))
}

fn no_follow() -> i32 {
    (OFlags::NOFOLLOW | OFlags::CLOEXEC).bits().cast_signed()
}

/// Writes a small file anew so that it is always whole, without syncing it.
pub(super) fn replace_unsynced(path: &Path, bytes: &[u8]) -> io::Result<()> {
    let beside = path.with_extension("new");
    std::fs::write(&beside, bytes)?;
    std::fs::rename(&beside, path)
}

/// Removes a file.
pub(super) fn remove(path: &Path) -> io::Result<()> {
    std::fs::remove_file(path)
}

/// Makes a folder only its owner may enter, where none is there.
///
/// # Errors
/// [`FileError::Write`] where it cannot be made.
pub fn make_dir(path: &Path) -> Result<(), FileError> {
    DirBuilder::new()
        .recursive(true)
        .mode(0o700)
        .create(path)
        .map_err(|source| FileError::write(path, source))
}

/// Syncs a folder, so that the names in it are on disk.
pub(super) fn sync_dir(path: &Path) -> Result<(), FileError> {
    let fault = |source| FileError::write(path, source);
    File::open(path).map_err(fault)?.sync_all().map_err(fault)
}

/// The plain file names in a folder, sorted.
///
/// # Errors
/// [`FileError::Read`] where the folder cannot be read.
pub fn names(path: &Path) -> Result<Vec<String>, FileError> {
    let fault = |source| FileError::read(path, source);
    let mut names = Vec::new();
    for entry in std::fs::read_dir(path).map_err(fault)? {
        if let Ok(name) = entry.map_err(fault)?.file_name().into_string() {
            names.push(name);
        }
    }
    names.sort();
    Ok(names)
}

/// Whether a path is a folder.
pub fn is_dir(path: &Path) -> bool {
    path.is_dir()
}

/// Whether people other than its owner may read a file.
///
/// # Errors
/// [`FileError::Read`] where the file cannot be looked at.
pub fn others_may_read(path: &Path) -> Result<bool, FileError> {
    let about = std::fs::metadata(path).map_err(|source| FileError::read(path, source))?;
    Ok(about.permissions().mode() & 0o077 != 0)
}

/// Opens a folder to ask which file system it lies on.
pub(super) fn open_dir(path: &Path) -> Result<File, FileError> {
    File::open(path).map_err(|source| FileError::read(path, source))
}
