//! Opens a record that is there and goes on exactly where it ended.
//! A plainly torn last write is mended by appending, never by cutting; everything else is refused.

use std::path::{Path, PathBuf};

use serde_json::Map;
use sha2::{Digest, Sha256};

use super::files;
use super::record_file::{Places, RecordError, RecordFile, is_record_name, record_number};
use super::record_store::{FileStore, Store, check_media};
use crate::record::chain::{Walk, walk};
use crate::record::draft::after;
use crate::record::line::{self, ParsedLine, Place, Stamp, hex};
use crate::record::opening::Roster;
use crate::record::{BATCH_BYTES_MAX, RECORD_BYTES_MAX};

/// So many zero bytes in a row are a block the disk never got, not a line somebody changed.
/// Source: our judgement; a line of JSON holds no zero byte at all.
const ZEROS_OF_A_LOST_BLOCK: usize = 16;

impl RecordFile {
    /// Opens the record of a job to go on with it, and gives every line that stands in it.
    ///
    /// # Errors
    /// [`RecordError::Refused`] where it is not plainly a whole record or one with a torn last
    /// write; [`RecordError::Closed`] where the leader closed it.
    pub fn resume(places: &Places, stamp: &Stamp) -> Result<(Self, Vec<ParsedLine>), RecordError> {
        let path = choose(places)?;
        let dir = path.parent().unwrap_or(Path::new("."));
        check_media(dir, places.media)?;
        let store = FileStore::open(&path)?;
        let bytes = store.read(&path, RECORD_BYTES_MAX)?;
        Self::resume_on(Box::new(store), (places, &path, stamp), bytes)
    }

    /// Goes on with a record whose store is already open.
    ///
    /// # Errors
    /// As [`RecordFile::resume`].
    pub fn resume_on(
        store: Box<dyn Store>,
        (places, path, stamp): (&Places, &Path, &Stamp),
        bytes: Vec<u8>,
    ) -> Result<(Self, Vec<ParsedLine>), RecordError> {
        let refused = |why: &str| RecordError::Refused {
            path: path.to_owned(),
            why: why.to_owned(),
        };
        let found = walk(&bytes);
        let (lines, end) = good_lines(&found);
        let first = lines
            .first()
            .ok_or_else(|| refused("there is no whole first line"))?;
        let roster = Roster::read(first).map_err(|fault| refused(&fault.to_string()))?;
        let watermark = places.watermark(&roster.record);
        if let Some(watermark) = &watermark {
            if watermark.failed(path, stamp.boot) {
                return Err(refused(
                    "a write to it failed since the machine was started; restart the machine, or \
                     go on from a rebuilt copy",
                ));
            }
            if let Some(seen) = watermark.read() {
                check_watermark(&lines, seen).map_err(|why| refused(&why))?;
            }
        }
        let last = lines.last().unwrap_or(first);
        let closed = last.sig.is_some()
            && lines
                .iter()
                .rev()
                .nth(1)
                .is_some_and(|line| line.kind == "close");
        let tail = &bytes[end..];
        if closed {
            let behind = refused("bytes stand behind the leader's close");
            return Err(if tail.is_empty() {
                RecordError::Closed
            } else {
                behind
            });
        }
        let mend = mend(tail, (last, stamp)).map_err(|why| refused(&why))?;
        let next = after(last);
        let mut record = Self {
            store,
            path: path.to_owned(),
            places: places.clone(),
            watermark,
            roster,
            bytes,
            next,
            lost: None,
            closed: false,
        };
        let mut lines = lines;
        record.mend(mend, (&mut lines, stamp))?;
        record.note_watermark();
        Ok((record, lines))
    }

    fn mend(
        &mut self,
        mend: Mend,
        (lines, stamp): (&mut Vec<ParsedLine>, &Stamp),
    ) -> Result<(), RecordError> {
        if !mend.append.is_empty() {
            self.put(&mend.append, stamp.boot)?;
        }
        for line in mend.lines {
            self.next = after(&line);
            lines.push(line);
        }
        self.closed = is_closed(lines);
        Ok(())
    }
}

fn is_closed(lines: &[ParsedLine]) -> bool {
    matches!(lines, [.., close, sig] if close.kind == "close" && sig.sig.is_some())
}

/// What is appended to mend the tail, and the lines that stand then.
struct Mend {
    append: Vec<u8>,
    lines: Vec<ParsedLine>,
}

fn mend(tail: &[u8], (last, stamp): (&ParsedLine, &Stamp)) -> Result<Mend, String> {
    let place = after(last);
    let mut append = Vec::new();
    let mut lines = Vec::new();
    let mut last = last.clone();
    if let Some(line) = completed(tail, place) {
        append.push(b'\n');
        last = line.clone();
        lines.push(line);
    } else if !tail.is_empty() {
        plainly_torn(tail, place)?;
        if !tail.ends_with(b"\n") {
            append.push(b'\n');
        }
        let junk = [tail, &append].concat();
        let (bytes, line) = recover_line(place, (stamp, &junk))?;
        append.extend_from_slice(&bytes);
        lines.push(line);
        return Ok(Mend { append, lines });
    }
    if matches!(last.signer(), Some(Some(_))) {
        // Its signature was in the same write and is gone, so the act was never acknowledged.
        let (bytes, line) = recover_line(after(&last), (stamp, b""))?;
        append.extend_from_slice(&bytes);
        lines.push(line);
    }
    Ok(Mend { append, lines })
}

/// A last line that lacks nothing but its newline.
fn completed(tail: &[u8], place: Place) -> Option<ParsedLine> {
    let line = line::parse(&[tail, b"\n"].concat()).ok()?;
    (line.seq == place.seq && line.prev == place.prev).then_some(line)
}

fn plainly_torn(tail: &[u8], place: Place) -> Result<(), String> {
    if tail.len() > BATCH_BYTES_MAX {
        return Err(format!(
            "{} bytes at its end are more than one write leaves",
            tail.len()
        ));
    }
    let later = tail
        .split_inclusive(|byte| *byte == b'\n')
        .any(|piece| line::parse(piece).is_ok_and(|line| line.seq > place.seq));
    if later {
        return Err(format!(
            "entry {} is damaged and later ones follow it",
            place.seq
        ));
    }
    let lost_block = tail
        .chunk_by(|a, b| a == b)
        .any(|run| run[0] == 0 && run.len() >= ZEROS_OF_A_LOST_BLOCK);
    if tail.contains(&b'\n') && !lost_block {
        return Err(format!("entry {} is whole but was changed", place.seq));
    }
    Ok(())
}

fn recover_line(
    place: Place,
    (stamp, junk): (&Stamp, &[u8]),
) -> Result<(Vec<u8>, ParsedLine), String> {
    let mut members = Map::new();
    members.insert("how".into(), "torn".into());
    members.insert("torn_bytes".into(), junk.len().into());
    members.insert("torn_sha256".into(), hex(&Sha256::digest(junk)).into());
    let bytes = line::encode(place, stamp, "recover", &members).map_err(|e| e.to_string())?;
    let line = line::parse(&bytes).map_err(|e| e.to_string())?;
    Ok((bytes, line))
}

/// The lines before the first that does not fit, and where they end.
fn good_lines(found: &Walk) -> (Vec<ParsedLine>, usize) {
    let first_bad = found
        .bad
        .iter()
        .map(|bad| bad.entry)
        .min()
        .unwrap_or(u64::MAX);
    let good = found
        .lines
        .iter()
        .take_while(|standing| standing.entry < first_bad);
    let mut end = 0;
    let mut lines = Vec::new();
    for standing in good {
        if let Some(line) = &standing.line {
            end = standing.range.end;
            lines.push(line.clone());
        }
    }
    (lines, end)
}

fn check_watermark(lines: &[ParsedLine], seen: Place) -> Result<(), String> {
    let line = usize::try_from(seen.seq).ok().and_then(|n| lines.get(n));
    match line {
        None => Err(format!(
            "this laptop has seen entry {} of this record on disk, and it is not here: an older \
             copy was put back, or the file is damaged",
            seen.seq
        )),
        Some(line) if line.hash != seen.prev => Err(format!(
            "entry {} is not the one this laptop has seen on disk: this is another copy",
            seen.seq
        )),
        Some(_) => Ok(()),
    }
}

/// Chooses among the record files of a job: the one that goes on from all the others.
fn choose(places: &Places) -> Result<PathBuf, RecordError> {
    let mut found: Vec<(u32, PathBuf, Vec<u8>)> = Vec::new();
    for dir in [Some(&places.job), places.second.as_ref()]
        .into_iter()
        .flatten()
    {
        if !files::is_dir(dir) {
            continue;
        }
        for name in files::names(dir)?
            .into_iter()
            .filter(|name| is_record_name(name))
        {
            let path = dir.join(&name);
            let bytes = files::read_limited(&path, RECORD_BYTES_MAX)?;
            found.push((record_number(&name).unwrap_or(1), path, bytes));
        }
    }
    found.sort_by_key(|(number, _, _)| *number);
    let mut files = found.into_iter();
    let no_record = || RecordError::NoRecord(places.job.clone());
    let (_, mut path, mut bytes) = files.next().ok_or_else(no_record)?;
    for (_, other_path, other) in files {
        if goes_on_from(&other, &bytes) {
            (path, bytes) = (other_path, other);
        } else if !goes_on_from(&bytes, &other) {
            return Err(RecordError::Fork(path, other_path));
        }
    }
    Ok(path)
}

/// Whether a file holds all acknowledged lines of another: the other is its beginning, or ends in
/// at most one unacknowledged write where this one says it was rebuilt.
fn goes_on_from(newer: &[u8], older: &[u8]) -> bool {
    let common = newer.iter().zip(older).take_while(|(a, b)| a == b).count();
    let start = newer[..common]
        .iter()
        .rposition(|byte| *byte == b'\n')
        .map_or(0, |at| at + 1);
    if common == older.len() {
        return newer.len() >= older.len();
    }
    let next = newer[start..]
        .split_inclusive(|byte| *byte == b'\n')
        .next()
        .unwrap_or_default();
    let rebuilt = line::parse(next)
        .is_ok_and(|line| line.kind == "recover" && line.text("how") == Some("rebuilt"));
    rebuilt && one_write(&older[start..])
}

/// Whether bytes can be what one unacknowledged write left: not too many, and of one moment.
fn one_write(bytes: &[u8]) -> bool {
    let lines = bytes.split_inclusive(|byte| *byte == b'\n');
    let mut stamps = lines.filter_map(|line| line::parse(line).ok()?.stamp);
    let first = stamps.next();
    bytes.len() <= BATCH_BYTES_MAX && stamps.all(|stamp| Some(stamp) == first)
}
