//! The chain: walks every line of a record and says which does not fit, and never stops at the first.
//! A junk rest of a torn write counts as mended only where a `recover` line accounts for its bytes.

use std::ops::Range;

use rayon::iter::{IntoParallelIterator, ParallelIterator};
use serde_json::Value;
use sha2::{Digest, Sha256};

use super::line::{self, LineFault, ParsedLine, hex};
use super::signature::Blob;
use super::{BATCH_BYTES_MAX, LINES_MAX, RECORD_BYTES_MAX};

/// Something wrong with one entry.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Bad {
    /// The entry's number.
    pub entry: u64,
    /// What is wrong with it.
    pub why: String,
}

/// A line where it stands in the file.
#[derive(Debug, Clone)]
pub struct Standing {
    /// Its bytes.
    pub range: Range<usize>,
    /// The number it counts under.
    pub entry: u64,
    /// The line, where it can be read.
    pub line: Option<ParsedLine>,
    /// Its own hash differs from what the next line holds, so it was certainly changed.
    pub disowned: bool,
}

/// A mended place.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Recovery {
    /// The `recover` entry.
    pub entry: u64,
    /// The bytes of junk before it.
    pub junk: usize,
}

/// What the walk found.
#[derive(Debug, Clone, Default)]
pub struct Walk {
    /// Every line, junk left out.
    pub lines: Vec<Standing>,
    /// What does not fit, in the order found.
    pub bad: Vec<Bad>,
    /// The mended places.
    pub recoveries: Vec<Recovery>,
    /// The rest behind the last newline.
    pub rest: Range<usize>,
    /// The hash of the last line.
    pub head: [u8; 32],
    /// The number the next line would have.
    pub next_seq: u64,
}

impl Walk {
    /// Whether nothing at all is wrong.
    pub fn whole(&self) -> bool {
        self.bad.is_empty() && self.rest.is_empty() && !self.lines.is_empty()
    }
}

struct Piece {
    range: Range<usize>,
    read: Result<ParsedLine, LineFault>,
    hash: [u8; 32],
}

impl Piece {
    fn line(&self) -> Option<&ParsedLine> {
        self.read.as_ref().ok()
    }
}

/// Walks the bytes of a record.
pub fn walk(bytes: &[u8]) -> Walk {
    let (ranges, rest) = split(bytes);
    if bytes.len() > RECORD_BYTES_MAX || ranges.len() > LINES_MAX {
        let why = format!(
            "the file is past the limits of a record: at most {LINES_MAX} lines and {RECORD_BYTES_MAX} bytes"
        );
        return Walk {
            bad: vec![Bad { entry: 0, why }],
            rest: 0..0,
            ..Walk::default()
        };
    }
    let pieces: Vec<Piece> = ranges
        .into_par_iter()
        .map(|range| read_piece(bytes, range))
        .collect();
    let recovers = (0..pieces.len()).filter(|n| is_torn_recover(pieces[*n].line()));
    let mut walker = Walker {
        bytes,
        recovers: recovers.collect(),
        pieces: &pieces,
        stands: Vec::new(),
        walk: Walk {
            rest,
            ..Walk::default()
        },
    };
    walker.run();
    let (stands, mut walk) = (walker.stands, walker.walk);
    let mut stands = stands.into_iter().peekable();
    for (n, piece) in pieces.into_iter().enumerate() {
        if let Some((_, entry, disowned)) = stands.next_if(|stand| stand.0 == n) {
            let line = piece.read.ok();
            walk.lines.push(Standing {
                range: piece.range,
                entry,
                line,
                disowned,
            });
        }
    }
    walk
}

fn split(bytes: &[u8]) -> (Vec<Range<usize>>, Range<usize>) {
    let mut ranges = Vec::new();
    let mut start = 0;
    for line in bytes.split_inclusive(|byte| *byte == b'\n') {
        let end = start + line.len();
        if line.ends_with(b"\n") {
            ranges.push(start..end);
            start = end;
        }
    }
    (ranges, start..bytes.len())
}

fn read_piece(bytes: &[u8], range: Range<usize>) -> Piece {
    let read = line::parse(&bytes[range.clone()]);
    let hash = match &read {
        Ok(line) => line.hash,
        Err(_) => Sha256::digest(&bytes[range.clone()]).into(),
    };
    Piece { range, read, hash }
}

fn is_torn_recover(line: Option<&ParsedLine>) -> bool {
    line.is_some_and(|line| line.kind == "recover" && line.text("how") == Some("torn"))
}

struct Walker<'a> {
    bytes: &'a [u8],
    pieces: &'a [Piece],
    recovers: Vec<usize>,
    /// Piece, entry number, whether the next line disowns it.
    stands: Vec<(usize, u64, bool)>,
    walk: Walk,
}

impl Walker<'_> {
    fn run(&mut self) {
        let mut n = 0;
        while n < self.pieces.len() {
            if self.fits(n) {
                self.accept(n, 0);
            } else if let Some(recover) = self.recover_after(n) {
                let junk = self.pieces[recover].range.start - self.pieces[n].range.start;
                self.accept(recover, junk);
                n = recover;
            } else {
                self.blame(n);
            }
            n += 1;
        }
    }

    fn fits(&self, n: usize) -> bool {
        self.pieces[n]
            .line()
            .is_some_and(|line| line.seq == self.walk.next_seq && line.prev == self.walk.head)
    }

    fn stand(&mut self, n: usize, entry: u64) {
        self.stands.push((n, entry, false));
        self.walk.next_seq = entry.saturating_add(1);
        self.walk.head = self.pieces[n].hash;
    }

    fn accept(&mut self, n: usize, junk: usize) {
        let entry = self.walk.next_seq;
        self.stand(n, entry);
        let line = self.pieces[n].line();
        if is_torn_recover(line) {
            let told = line
                .and_then(|line| line.members.get("torn_bytes"))
                .and_then(Value::as_u64);
            if told.and_then(|told| usize::try_from(told).ok()) != Some(junk) {
                let why = "it says bytes were torn off before it, and they are not there";
                self.walk.bad.push(Bad {
                    entry,
                    why: why.to_owned(),
                });
            }
            self.walk.recoveries.push(Recovery { entry, junk });
        }
    }

    /// The `recover` line that accounts for the junk beginning at a piece.
    fn recover_after(&self, n: usize) -> Option<usize> {
        let start = self.pieces[n].range.start;
        let first = self.recovers.partition_point(|recover| *recover <= n);
        for recover in &self.recovers[first..] {
            let junk = start..self.pieces[*recover].range.start;
            if junk.len() > BATCH_BYTES_MAX {
                return None;
            }
            let later = |piece: &Piece| piece.line().is_some_and(|l| l.seq > self.walk.next_seq);
            if self.fits(*recover)
                && accounts_for(&self.pieces[*recover], &self.bytes[junk])
                && !self.pieces[n..*recover].iter().any(later)
            {
                return Some(*recover);
            }
        }
        None
    }

    fn blame(&mut self, n: usize) {
        let expected = self.walk.next_seq;
        match &self.pieces[n].read {
            Err(fault) => {
                self.walk.bad.push(Bad {
                    entry: expected,
                    why: fault.to_string(),
                });
                self.stand(n, expected);
            }
            Ok(line) if line.seq != expected && line.prev == self.walk.head => {
                let why = format!("it was changed: it calls itself {}", line.seq);
                self.walk.bad.push(Bad {
                    entry: expected,
                    why,
                });
                self.stand(n, expected);
            }
            Ok(line) if line.seq > expected => {
                let why = format!("missing: entry {} stands in its place", line.seq);
                self.walk.bad.push(Bad {
                    entry: expected,
                    why,
                });
                self.stand(n, line.seq);
            }
            Ok(line) if line.seq < expected => {
                let why = "it stands here again, or out of its place".to_owned();
                self.walk.bad.push(Bad {
                    entry: line.seq,
                    why,
                });
                self.stand(n, line.seq);
            }
            Ok(_) => self.blame_link(n, expected),
        }
    }

    /// The number fits but the hash of the line before does not: one of the two was changed, or both.
    fn blame_link(&mut self, n: usize, entry: u64) {
        match self.stands.last().copied() {
            None => self.say(
                entry,
                "it does not begin a record: \"prev\" is not 64 zeros",
            ),
            Some((before, _, _)) if self.pieces[before].read.is_err() => {}
            Some((before, _, _)) if self.only_link_changed(n, before) => {
                self.say(
                    entry,
                    "it was changed: its \"prev\" is not the hash of the entry before it",
                );
            }
            Some((_, changed, _)) => {
                self.say(
                    changed,
                    "it was changed: its hash is not the one the next entry holds",
                );
                if let Some(last) = self.stands.last_mut() {
                    last.2 = true;
                }
            }
        }
        self.stand(n, entry);
    }

    /// Whether the line before is as it was: with its hash put back, this line is the one the next
    /// line holds, or this line is a signature that still fits the line before.
    fn only_link_changed(&self, n: usize, before: usize) -> bool {
        let Some(next) = self.pieces.get(n + 1) else {
            return self.signature_holds(n, before);
        };
        let text = &self.bytes[self.pieces[n].range.clone()];
        let Some(line) = self.pieces[n].line() else {
            return false;
        };
        let Ok(text) = std::str::from_utf8(text) else {
            return false;
        };
        let mended = text.replacen(&hex(&line.prev), &hex(&self.pieces[before].hash), 1);
        let mended: [u8; 32] = Sha256::digest(mended.as_bytes()).into();
        next.line().is_some_and(|next| next.prev == mended)
    }

    fn say(&mut self, entry: u64, why: &str) {
        if self.walk.bad.last().is_none_or(|bad| bad.entry != entry) {
            self.walk.bad.push(Bad {
                entry,
                why: why.to_owned(),
            });
        }
    }

    fn signature_holds(&self, sig: usize, signed: usize) -> bool {
        let sig = self.pieces[sig].line().and_then(|line| line.sig.as_ref());
        sig.and_then(|sig| Blob::read(&sig.sig).ok())
            .is_some_and(|blob| {
                blob.check(&self.bytes[self.pieces[signed].range.clone()])
                    .is_ok()
            })
    }
}

fn accounts_for(recover: &Piece, junk: &[u8]) -> bool {
    recover.line().is_some_and(|line| {
        let told = line.members.get("torn_bytes").and_then(Value::as_u64);
        told == u64::try_from(junk.len()).ok()
            && line.text("torn_sha256") == Some(&hex(&Sha256::digest(junk)))
    })
}
